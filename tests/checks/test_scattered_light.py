"""Scattered light at people's places, doors and windows: fires, and narrowly does not."""

import math
import re

import pytest

from benchlay.checks import CHECKS
from benchlay.exposure import Pulse, accessible_limit

BY_NAME = {module.NAME: module for module in CHECKS}
LIMIT = accessible_limit(1064.0, None, Pulse(0.1, 8e-9, 10.0))
# A point (its 1/e2 radius is 0.1 mm) of 1 W mean, all scattered: to this distance.
FAR = 1e3 * math.sqrt(1.0 / (math.pi * LIMIT.mpe_w_m2))

BENCH = """
bench: {size: [1000, 600], surface_height: 1400}
sources:
  ir:
    {wavelength: 1064, pulse: {energy: 100 mJ, duration: 8 ns, rate: 10 Hz}, at: [400, 300],
     beam: {waist_radius: 0.1, waist_ahead: 200}, heading: 180, body: none}
elements:
  S: {kind: target, at: [200, 300], facing: 0, diffuse: 1, mount: none}
limits: {reach: 9 m}
room:
  outline: [[-500, -500], [EAST, -500], [EAST, 1500], [-500, 1500]]
  MORE
enclosure: {material: black, to_height: TOP, panels: {p: {from: [500, 0], to: [500, 600]}}}
materials: {black: {thickness: 2, diffuse: 0, specular: 0}}
"""


def found(make_context, check, more, east=9000, top=20):
    text = BENCH.replace("EAST", str(east)).replace("MORE", more).replace("TOP", str(top))
    findings = list(BY_NAME[check].check(make_context(text), 0))
    return [f for f in findings if "scattered" in f.message]


def test_the_distance_is_that_of_the_inverse_square():
    assert 1000.0 < FAR < 4000.0


@pytest.mark.parametrize(("share", "fires"), [(0.998, True), (1.002, False)])
def test_a_person_within_the_distance_and_one_beyond(make_context, share, fires):
    # Standing eyes begin 30 mm below the bench top and reach 480 mm above the spot.
    x = 200.0 + share * FAR
    findings = found(make_context, "eye-level", f"people: {{guard: {{at: [{x}, 300]}}}}")
    assert bool(findings) == fires
    for finding in findings:
        assert finding.value == pytest.approx(finding.limit / share**2, rel=2e-3)
        assert finding.limit == LIMIT.mpe_w_m2
        assert re.search(r"1 times the limit of .* for 100 s \(IEC 60825-1:2014", finding.message)


def test_a_person_behind_the_surface_sees_nothing(make_context):
    behind = "people: {guard: {at: [150, 300]}}"
    assert not found(make_context, "eye-level", behind)


@pytest.mark.parametrize(("top", "fires"), [(300, True), (338, True), (342, False), (700, False)])
def test_a_panel_hides_it_from_a_person_where_it_is_high_enough(make_context, top, fires):
    """Half way to the person: an eye 580 mm above the bench sees a spot at 100 mm over 340 mm."""
    findings = found(make_context, "eye-level", "people: {guard: {at: [800, 300]}}", top=top)
    assert bool(findings) == fires


def test_people_who_sit_have_their_own_band(make_context):
    """Seated eyes end 20 mm below the bench top: the panel's 20 mm hide the spot, 100 mm up."""
    place = "people: {{clerk: {{at: [1400, 300], eyes: {}}}}}"
    assert found(make_context, "eye-level", place.format("standing"))
    assert found(make_context, "eye-level", place.format("seated"))
    assert not found(make_context, "eye-level", place.format("seated"), top=90)


@pytest.mark.parametrize(("east", "fires"), [(0.99, True), (1.01, False)])
@pytest.mark.parametrize(
    "what",
    [
        "doors: {way: {from: [E, 100], to: [E, 500]}}",
        "windows: {way: {from: [E, 100], to: [E, 500], from_height: 1450, to_height: 1600}}",
    ],
)
def test_a_door_and_a_window_within_the_distance_and_beyond(make_context, what, east, fires):
    x = round(200.0 + east * FAR, 3)
    findings = found(make_context, "at-door", what.replace("E,", f"{x},"), east=x)
    assert bool(findings) == fires
    if fires:
        assert findings[0].limit == LIMIT.mpe_w_m2
        assert findings[0].value == pytest.approx(LIMIT.mpe_w_m2 / east**2, rel=5e-3)


def test_a_door_behind_a_wall_of_panels_is_not_reached(make_context):
    door = "doors: {way: {from: [1000, 250], to: [1000, 350]}}"
    assert found(make_context, "at-door", door, east=1000)
    assert not found(make_context, "at-door", door, east=1000, top=1000)
