"""What is said of how to mend: it names what can be turned, coated or moved."""

import pytest

from benchlay.checks import run_checks
from benchlay.findings import Severity, merge_states

HEAD = """
bench: {size: [900, 600]}
sources:
  red: {wavelength: 633, power: %s, beam: {waist_radius: 0.4}, polarization: vertical,
        at: [100, 200], heading: 0}
elements:
"""


def found(make_context, body, check, power="0.3 mW"):
    findings, _ = run_checks(make_context(HEAD % power + body))
    return [f for f in findings if f.check == check]


WINDOW = (
    "  W: {kind: window, at: [300, 200], facing: 180, diameter: 25.4, mount: none}\n"
    "  T: {kind: target, at: [700, 300], facing: 180}\n"
)


def test_what_only_passes_the_beam_is_not_turned(make_context):
    (finding,) = found(make_context, WINDOW + "routes: {main: [red, W, T]}\n", "route-broken")
    assert finding.remedy == "turn 'red' so that the beam meets 'T', or move 'T' there"


def test_the_last_mirror_before_it_is_turned(make_context):
    body = (
        "  M: {kind: mirror, at: [300, 200], facing: 135, diameter: 25.4, metal: silver}\n"
        "  A: {kind: aperture, at: [300, 300], facing: 270, opening: 10}\n"
        "  T: {kind: target, at: [400, 500], facing: 270}\n"
        "routes: {main: [red, M, A, T]}\n"
    )
    (finding,) = found(make_context, body, "route-broken")
    assert finding.message == (
        "route 'main' breaks between 'A' and 'T': the beam (298 µW) leaves the bench "
        "and meets nothing"
    )
    assert finding.remedy == "turn 'M' so that the beam meets 'T', or move 'T' there"


def test_a_corner_cube_turns_nothing_when_it_is_turned(make_context):
    body = (
        "  R: {kind: retroreflector, at: [400, 205], facing: 180, diameter: 25.4}\n"
        "  T: {kind: target, at: [250, 260], facing: 0}\n"
        "routes: {main: [red, R, T]}\n"
    )
    (finding,) = found(make_context, body, "route-broken")
    assert finding.remedy == "turn 'red' so that the beam meets 'T', or move 'T' there"


GHOST = (
    "  A: {kind: aperture, at: [200, 200], facing: 180, opening: 6}\n"
    "  L: {kind: %s, at: [500, 200], facing: 180, diameter: 25.4, mount: none}\n"
    "  T: {kind: target, at: [700, 200], facing: 180}\n"
    "routes: {main: [red, A, L, T]}\n"
)


def test_a_ghost_in_the_working_beam_is_coated_or_turned_away(make_context):
    findings = found(make_context, GHOST % "lens, focal: -30", "stray-unstopped", "30 mW")
    assert sorted(f.message.split("'")[3] for f in findings) == ["L.back", "L.front"]
    for finding in findings:
        side = finding.message.split("'")[3].removeprefix("L.")
        assert finding.remedy == (
            f"give the {side} of 'L' a coating that reflects less at 633 nm, or turn 'L' so that "
            "the light leaves the way of the beams, and stop it there"
        )


def test_a_filter_met_squarely_sends_its_ghost_into_no_dump_of_ours(make_context):
    body = (
        "  A: {kind: aperture, at: [200, 200], facing: 180, opening: 2}\n"
        "  F: {kind: filter, at: [500, 200], facing: 179.7, diameter: 25.4, density: 1,"
        " back: 0.01 %}\n"
        "  T: {kind: target, at: [700, 200], facing: 180}\n"
        "routes: {main: [red, A, F, T]}\n"
    )
    (finding,) = found(make_context, body, "stray-unstopped", "50 mW")
    assert finding.message.startswith(
        "2.1 mW of stray 633 nm light from 'red', reflected by 'F.front', ends on the rim of 'A': "
    )
    assert finding.remedy == (
        "give the front of 'F' a coating that reflects less at 633 nm, or turn 'F' so that the "
        "light leaves the way of the beams, and stop it there"
    )


COATED = (
    "  M: {kind: mirror, at: [400, 200], facing: 135, diameter: 25.4,\n"
    "      reflectance: [{from: 520, to: 545, is: 99.5 %}]}\n"
    "  T: {kind: target, at: [400, 400], facing: 270}\n"
    "routes: {main: [red, M, T]}\n"
)


def test_faint_light_that_no_coating_speaks_of_is_one_note_an_element(make_context):
    (finding,) = found(make_context, COATED, "coating-unstated")
    assert finding.severity == Severity.NOTE
    assert finding.message == (
        "'M' says nothing of 633 nm, of which at most 300 µW meets a face, within the limit all "
        "together; the bare material is assumed"
    )
    assert finding.expected == "coatings that state their reflectance at 633 nm, where it matters"
    assert finding.remedy == (
        "add bands for 633 nm to the coatings of 'M', if their figures are at hand"
    )


@pytest.mark.parametrize(("power", "severity"), [("0.38 mW", 0), ("0.39 mW", 1)])
def test_from_the_accessible_limit_on_it_is_a_warning(make_context, power, severity):
    (finding,) = found(make_context, COATED, "coating-unstated", power)
    assert finding.severity == severity


FLIP_IN = """
  F: {kind: mirror, at: [300, 200], facing: 135, diameter: 25.4, metal: silver, %sout: yes}
  T: {kind: target, after: F, distance: 200}
  U: {kind: target, at: [700, 200], facing: 180}
  post: {kind: obstacle, at: [600, 200.3], facing: 0,
         outline: [[0, 0], [20, 0], [20, 20], [0, 20]], to_height: 200}
routes: {aside: [red, F, T]%s}
states: {aside: {elements.F.out: no}}
"""


def in_states(make_context, routes="", error=""):
    findings, _ = run_checks(make_context(HEAD % "0.3 mW" + FLIP_IN % (error, routes)))
    return {(m.finding.check, m.finding.element): m.states for m in merge_states(findings)}


def test_where_a_flip_in_element_is_out_its_route_asks_nothing_of_what_lies_beyond(make_context):
    assert in_states(make_context) == {}


def test_where_it_is_in_its_route_is_followed(make_context):
    turned = in_states(make_context, error="yaw_error: 8, ")
    assert turned == {("route-broken", "T"): ("aside",)}


def test_another_route_by_the_same_beam_is_followed_where_it_is_out(make_context):
    found = in_states(make_context, ", on: [red, U]")
    assert found == {("beam-blocked", "post"): ("as drawn",)}
