"""Routes that break at one place are told together; what stands in an opening may be dark."""

import numpy as np
import pytest

from benchlay.checks import run_checks

HEAD = """
bench: {size: [800, 400]}
sources:
  red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
"""


def found(make_context, text, check):
    return [f for f in run_checks(make_context(HEAD + text))[0] if f.check == check]


TWO = """
elements:
  X: {kind: mirror, at: [200, 200], facing: 135, diameter: 25.4, reflectance: 99 %}
  M1: {kind: splitter, after: red, distance: 300, turn: left 90, diameter: 25.4, reflectance: 50 %}
  T1: {kind: target, after: M1.reflected, distance: 100}
  T2: {kind: target, after: M1.transmitted, distance: 100}
routes:
  a: [red, M1.reflected, T1]
  b: [red, M1.transmitted, T2]
"""


def test_routes_that_break_at_one_place_are_all_named(make_context):
    (finding,) = found(make_context, TWO, "route-broken")
    assert finding.message == (
        "routes 'a' and 'b' break between 'red' and 'M1': the beam (5 mW) goes to 'X' instead"
    )
    assert finding.expected == "the beam that leaves 'red' meets 'M1' and goes on as named"
    assert finding.remedy == ("take 'X' out of the way, or name it in these routes before 'M1'")
    assert [words for _, words in finding.related] == ["route 'a'", "route 'b'"]


def test_routes_with_the_same_branch_name_it(make_context):
    text = TWO.replace("[red, M1.transmitted, T2]", "[red, M1.reflected, T1]")
    (finding,) = found(make_context, text, "route-broken")
    assert finding.message == (
        "routes 'a' and 'b' break between 'red' and 'M1.reflected': the beam (5 mW) goes to "
        "'X' instead"
    )


CLEAR = """
elements:
  M1:
    {kind: splitter, after: red, distance: 300, turn: left 90, diameter: 25.4, reflectance: 0 %,
     back: 0 %}
  T1: {kind: target, at: [400, 300], facing: 270}
  T2: {kind: target, at: [600, 200], facing: 180}
routes:
  a: [red, M1.reflected, T1]
  b: [red, M1.reflected, T2]
"""


def test_routes_that_do_not_go_on_as_named_are_told_together(make_context):
    (finding,) = found(make_context, CLEAR, "route-broken")
    assert finding.message == (
        "routes 'a' and 'b' break between 'red' and 'M1.reflected': the beam (5 mW) meets "
        "'M1' but does not leave it as the routes say"
    )
    assert finding.remedy == (
        "turn 'M1' the other way round, or name the branch that is meant in these routes"
    )


WINDOW = """
elements:
  T1: {kind: target, after: red, distance: 400}
  VW: {kind: filter, PLACE, size: [150, 100], density: OD 6, mount: none}
routes: {main: [red, T1]}
enclosure:
  panels:
    south:
      from: [0, 0]
      to: [800, 0]
      openings: {view: {along: 300, width: 150, from_height: 50, to_height: 150}}
    east: {from: [800, 0], to: [800, 400]}
    north: {from: [800, 400], to: [0, 400]}
    west: {from: [0, 400], to: [0, 0]}
"""


@pytest.mark.parametrize(
    ("place", "dark"), [("in: south.view", []), ("at: [375, 50], facing: 270", ["VW"])]
)
def test_what_stands_in_an_opening_may_be_dark(make_context, place, dark):
    findings = found(make_context, WINDOW.replace("PLACE", place), "dark-element")
    assert [f.element for f in findings] == dark
    for finding in findings:
        assert finding.message == "no beam reaches filter 'VW', in any state"


def test_how_far_a_place_is_from_what_routes_need(make_context):
    text = TWO.replace("  X: {kind: mirror, at: [200, 200]", "  X: {kind: mirror, at: [600, 300]")
    context = make_context(HEAD + text)
    leaves = context.trace.beams.start.position
    (emitted,) = [n for n, at in enumerate(leaves.tolist()) if at[0] == 100.0]
    beside = np.array([200.0, 230.0, 140.0])  # 30 beside the first leg and 40 above it
    assert context.routes.apart(beside, -1) == pytest.approx(50.0, abs=1e-9)
    # Without that leg the nearest is the one that leaves 'M1' at (400, 200).
    assert context.routes.apart(beside, emitted) == pytest.approx(np.hypot(200.0, 40.0), abs=1.0)
    behind = np.array([70.0, 200.0, 60.0])  # a leg ends where it ends
    assert context.routes.apart(behind, -1) == pytest.approx(50.0, abs=1e-9)
