"""Beams that are handed over in openings, and what the panel's edge takes of them."""

import numpy as np
from scipy.special import erf

from tests.tracing.bench import Bench, layout, length, power, scene, vectors

W = 4.0
WAIST = f"{{waist_radius: {W}}}"


def ported(opening, *, panel="[1400, 0], to: [1400, 900]", elements="", path="laser", more=""):
    text = layout(elements or "  D: {kind: dump, at: [1450, 850], facing: 0}\n", beam=WAIST)
    return Bench(
        f"{text}routes: {{out: [{path}, east.port]}}\n"
        f"enclosure:\n  panels:\n    east: {{from: {panel}, openings: {{port: {opening}}}}}\n{more}"
    )


def w_at(distance):
    return W * np.hypot(1.0, distance * 632.8e-6 / (np.pi * W * W))


def ended(bench, state=None):
    (beam,) = [b for b in bench.beams(state) if bench.trace.beams.end_kind[b.number] == 3]
    return beam


@scene
def a_round_opening_hands_over_what_passes_it():
    bench = ported(
        "{along: 450, height: 100, diameter: 10}",
        elements="  SC: {kind: screen, at: [1450, 450], facing: 180, size: [200, 150]}\n",
    )
    past = np.exp(-2.0 * (5.0 / w_at(1300.0)) ** 2)
    yield power("handed over", bench.sink("handed-over", "east.port"), 1.0 - past)
    yield power("the panel's edge", bench.sink("panel", "east"), past)
    beam = ended(bench)
    yield from vectors("it ends at the panel's line", beam.end, (1400.0, 450.0, 100.0))
    yield length("beams", len(bench.beams()), 1)
    yield power("nothing beyond", bench.sink("screen", "SC"), 0.0)


@scene
def a_slanted_panel_cuts_an_ellipse():
    """At 45 degrees a square opening of 9 by 9 is seen 9/sqrt 2 wide."""
    bench = ported(
        "{along: 590.9, width: 9, from_height: 95.5, to_height: 104.5}",
        panel="[1000, 29], to: [1800, 829]",
    )
    middle = 1000.0 + (590.9 + 4.5) / np.sqrt(2.0), 29.0 + (590.9 + 4.5) / np.sqrt(2.0)
    at = 1000.0 + (450.0 - 29.0)
    w = w_at(at - 100.0)
    off, half = (middle[1] - 450.0), 4.5 / np.sqrt(2.0)
    across = 0.5 * (erf(np.sqrt(2.0) * (off + half) / w) - erf(np.sqrt(2.0) * (off - half) / w))
    share = across * erf(np.sqrt(2.0) * 4.5 / w)
    yield power("handed over", bench.sink("handed-over", "east.port"), share, 3e-6)
    yield from vectors("end", ended(bench).end, (at, 450.0, 100.0))
    yield length("its middle is met nearly", off, 0.0, 5.0)


@scene
def what_stands_before_an_opening_still_takes_its_share():
    bench = ported(
        "{along: 450, height: 100, diameter: 60}",
        elements=(
            "  SC: {kind: screen, at: [1300, 477], facing: 180, size: [50, 75]}\n"
            "  S2: {kind: screen, at: [1410, 425], facing: 180, size: [50, 75]}\n"
        ),
    )
    taken = 0.5 * (1.0 - erf(np.sqrt(2.0) * 2.0 / w_at(1200.0)))
    yield power("screen before", bench.sink("screen", "SC"), taken)
    yield power("screen behind", bench.sink("screen", "S2"), 0.0)
    yield power("handed over", bench.sink("handed-over", "east.port"), 1.0 - taken)


@scene
def an_open_panel_is_handed_through_where_its_opening_would_be():
    bench = ported(
        "{along: 450, height: 100, diameter: 10}",
        more="states: {loading: {enclosure.panels.east.open: yes}}\n",
    )
    yield power("whole", bench.sink("handed-over", "east.port", state="loading"), 1.0)
    yield from vectors("end", ended(bench, "loading").end, (1400.0, 450.0, 100.0))


@scene
def a_window_in_an_opening_sends_on_what_is_handed_over():
    """Its light starts in the opening itself, or beyond its line by the window's thickness."""
    for facing, start in (("facing: 0, ", 1400.0), ("facing: 180, ", 1405.0)):
        bench = ported(
            "{along: 450, height: 100, diameter: 30}",
            elements=(
                f"  W: {{kind: window, in: east.port, {facing}diameter: 30, clear: 1,"
                " thickness: 5, glass: {index: 1.5}, mount: none}\n"
            ),
            path="laser, W",
        )
        yield power("handed over", bench.sink("handed-over", "east.port"), 0.96**2, 1e-5)
        yield from vectors("end", ended(bench).end, (start, 450.0, 100.0))


@scene
def a_beam_beside_the_opening_is_not_handed_over():
    bench = ported("{along: 480, height: 100, diameter: 20}")
    yield power("panel", bench.sink("panel", "east"), 0.95, 1e-9)
    yield power("handed over", bench.sink("handed-over", "east.port"), 0.0)
