"""What all checks share: power an eye could meet, floors, chains, and ends in words."""

import math

import numpy as np
import pytest

from benchlay.checks import floors_w, limits_of
from benchlay.exposure import accessible_limit
from benchlay.layout import read_layout
from benchlay.placing import place

HEAD = "bench: {size: [800, 400]}\n"


def placed_of(text):
    layouts, problems = read_layout(text, "x.yaml")
    assert layouts is not None, problems.sorted()
    placed = place(layouts, problems)
    assert placed is not None, problems.sorted()
    return placed


def source(keys):
    return (
        HEAD + f"sources:\n  s: {{{keys}, beam: {{waist_radius: 0.5}}, at: [9, 200], heading: 0}}\n"
    )


def test_the_floor_is_a_hundredth_of_the_limit_or_a_millionth_of_the_source():
    strong = placed_of(source("wavelength: 532, power: 10 W"))
    limit = accessible_limit(532.0).accessible_w
    assert floors_w(strong, limits_of(strong)) == {532.0: pytest.approx(0.01 * limit)}
    weak = placed_of(source("wavelength: 532, power: 1 mW"))
    assert floors_w(weak, limits_of(weak)) == {532.0: pytest.approx(1e-9)}


def test_the_floor_is_the_lowest_over_the_states():
    text = source("wavelength: 532, power: 10 W") + "states: {low: {sources.s.power: 2 W}}\n"
    placed = placed_of(text)
    assert floors_w(placed, limits_of(placed)) == {532.0: pytest.approx(2e-6)}
    text = source("wavelength: 532, power: 10 W") + "states: {fine: {limits.floor: 0.1 %}}\n"
    placed = placed_of(text)
    limit = accessible_limit(532.0).accessible_w
    assert floors_w(placed, limits_of(placed)) == {532.0: pytest.approx(0.001 * limit)}


def test_without_a_limit_the_floor_follows_from_the_source_alone():
    text = source("wavelength: 150, power: 1 W").replace("400]}", "400], medium: vacuum}")
    placed = placed_of(text)
    limits = limits_of(placed)
    assert [line.limit for line in limits.values()] == [None]
    assert "150" in next(iter(limits.values())).reason
    assert floors_w(placed, limits) == {150.0: pytest.approx(1e-6)}


def test_limits_take_the_time_base_of_their_state_and_the_pulses_of_their_source():
    text = HEAD + (
        "sources:\n"
        "  a: {wavelength: 532, power: 1 W, beam: {waist_radius: 1}, at: [9, 100], heading: 0}\n"
        "  b: {wavelength: 532, pulse: {energy: 1 mJ, duration: 8 ns, rate: 10 Hz}, "
        "beam: {waist_radius: 1}, at: [9, 200], heading: 0}\n"
        "states: {short: {limits.time_base: 0.25 s}}\n"
    )
    limits = limits_of(placed_of(text))
    at = {key: line.limit for key, line in limits.items()}
    assert at[0, "a", 532.0].time_base_s == 100.0
    assert at[1, "a", 532.0].time_base_s == 0.25
    assert at[0, "a", 532.0].accessible_j is None
    assert at[0, "b", 532.0].accessible_j is not None


def test_between_two_waists_the_worst_place_is_found(make_context):
    """Astigmatic: neither end nor waist is worst; the share is compared with a fine scan."""
    text = HEAD + (
        "sources:\n  s: {wavelength: 1064, power: 1 W, at: [9, 200], heading: 0, "
        "beam: {waist_radius_h: 0.02, waist_radius_v: 0.02, waist_ahead_h: 300, "
        "waist_ahead_v: 500}}\n"
        "elements:\n  T1: {kind: target, after: s, distance: 780, size: [90, 90]}\n"
    )
    context = make_context(text)
    from benchlay.optics import moments
    from benchlay.optics.special import circle_share

    start = context.trace.beams.start
    z = np.linspace(0.0, 780.0, 2001)
    m = moments.propagate(start.moments[:, [0]], z, start.index[0])
    w1, w2, _ = moments.radii(m)
    best = circle_share(w1, w2, 0.5 * context.aperture_mm[0]).max()
    assert context.accessible_w[0] == pytest.approx(best, rel=2e-3)


def test_a_cut_beam_keeps_the_middle_that_an_eye_takes_in(make_context):
    """Cut outside the pupil, as much passes the pupil as before; never more than is left."""
    text = HEAD + (
        "sources:\n  s: {wavelength: 633, power: 100 mW, beam: {waist_radius: 10}, "
        "at: [9, 200], heading: 0}\n"
        "elements:\n  A1: {kind: aperture, after: s, distance: 1, opening: {d}}\n"
        "routes: {main: [s, A1]}\n"
    )
    whole = 0.1 * -math.expm1(-2 * (3.5 / 10) ** 2)
    context = make_context(text.replace("{d}", "12"))
    assert context.accessible_w[1] == pytest.approx(whole, rel=1e-3)
    context = make_context(text.replace("{d}", "4"))
    assert context.accessible_w[1] == pytest.approx(
        float(context.trace.beams.start.power[1]), rel=1e-12
    )


def test_chains_name_what_was_met_and_never_where(make_context):
    text = HEAD + (
        "sources:\n  s: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, "
        "polarization: vertical, at: [9, 200], heading: 0}\n"
        "elements:\n"
        "  W1: {kind: window, after: s, distance: 200, incidence: 45, diameter: 25.4}\n"
        "  T1: {kind: target, after: W1, distance: 100}\n"
        "routes: {main: [s, W1, T1]}\n"
    )
    context = make_context(text)
    start = context.trace.beams.start
    (first,) = [b for b in range(len(start.node)) if start.node[b] < 0 and start.parent[b] == 0]
    assert context.chain(first) == ("s", 633.0, "W1.front reflected")
    assert context.astray_since(first) == first
    arriving = next(b for b in range(len(start.node)) if context.end_name(b) == "T1")
    assert context.chain(arriving)[2:] == ("W1.front transmitted", "W1.back transmitted")
    assert context.end_words(arriving) == "'T1'"
    later = [b for b in range(len(start.node)) if context.astray_since(b) not in (b, first)]
    assert later
    assert {context.left_at(context.astray_since(b)) for b in later} == {"W1.back"}
