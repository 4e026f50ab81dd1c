"""First causes speak: what explains a lost leg is told, and nothing that follows from it."""

import math

import pytest

from benchlay.checks import run_checks
from benchlay.findings import merge_states

SOURCE = """
bench: {size: [900, 600]}
sources:
  red:
    wavelength: 633
    power: 0.3 mW
    beam: {waist_radius: 0.4}
    polarization: vertical
    at: [100, 200]
    heading: 0
"""
ELEMENTS = """
elements:
  M1: {kind: mirror, at: [400, 200], facing: 135, diameter: 25.4, metal: silver, mount: none}
  M2: {kind: mirror, at: [400, 400], facing: 315, diameter: 25.4, metal: silver, mount: none}
  T1: {kind: target, at: [700, 400], facing: 180}
"""
ROUTE = """
routes:
  main: [red, M1, M2, T1]
"""
GOOD = SOURCE + ELEMENTS + ROUTE


def names(make_context, text):
    findings, runs = run_checks(make_context(text))
    assert all(run.ran for run in runs)
    open_ = ("open-side", "opening-mirror", "probe-access")  # an open port, and no lid
    return sorted(
        (f.check, f.element) for f in findings if f.state == "as drawn" and f.check not in open_
    )


def in_states(make_context, text):
    findings, _ = run_checks(make_context(text))
    return {(m.finding.check, m.finding.element): m.states for m in merge_states(findings)}


def test_a_bench_that_works_has_no_finding(make_context):
    assert names(make_context, GOOD) == []


def test_a_turned_mirror_breaks_its_route_and_nothing_more(make_context):
    text = GOOD.replace("facing: 135", "facing: 100")
    assert names(make_context, text) == [("route-broken", "M2")]


def test_a_body_in_the_way_is_told_instead_of_the_break(make_context):
    text = GOOD.replace(
        "  T1:",
        "  post: {kind: obstacle, at: [400, 300], facing: 0, "
        "outline: [[-5, -5], [5, -5], [5, 5], [-5, 5]], to_height: 200}\n  T1:",
    )
    assert names(make_context, text) == [("beam-blocked", "post")]


def test_a_screen_left_in_the_way_blocks(make_context):
    text = GOOD.replace("  T1:", "  SC: {kind: screen, at: [400, 300], facing: 270}\n  T1:")
    assert names(make_context, text) == [("beam-blocked", "SC")]


def test_an_optic_in_the_way_breaks_the_route(make_context):
    window = "  W9: {kind: window, at: [400, 300], facing: 250, diameter: 25.4, mount: none}\n"
    assert names(make_context, GOOD.replace("  T1:", window + "  T1:")) == [("route-broken", "M2")]


def test_a_beam_that_goes_astray_to_a_post_is_a_broken_route(make_context):
    """The post is not in the way: the mirror is turned wrongly."""
    text = GOOD.replace("facing: 135", "facing: 115").replace(
        "  T1:",
        "  post: "
        "{kind: obstacle, at: [271, 353], facing: 0, "
        "outline: [[-40, -40], [40, -40], [40, 40], [-40, 40]], to_height: 200}\n  T1:",
    )
    found = names(make_context, text)
    assert found == [("route-broken", "M2")]


def test_a_missed_rim_is_clipped_and_not_broken(make_context):
    text = GOOD.replace("at: [400, 400]", "at: [391.5, 400]")
    found = names(make_context, text)
    assert ("clipped", "M2") in found
    assert not [f for f in found if f[0] in ("route-broken", "dark-element")]


def test_a_reversed_mirror_breaks_the_route(make_context):
    text = GOOD.replace("at: [400, 400], facing: 315", "at: [400, 400], facing: 135")
    findings, _ = run_checks(make_context(text))
    (broken,) = [f for f in findings if f.check == "route-broken"]
    assert "the back of 'M2'" in broken.message


STATES = """
states:
  blocked: {elements.M1.facing: 100}
"""


def test_a_state_that_turns_a_mirror_away_has_no_finding(make_context):
    assert in_states(make_context, GOOD + STATES) == {}


def test_an_element_drawn_out_interrupts_without_finding(make_context):
    assert names(make_context, GOOD.replace("facing: 135,", "facing: 135, out: yes,")) == []


@pytest.mark.parametrize("route", ["[red, S1, M1, M2, T1]", "[red, M1, M2, T1]"])
def test_a_closed_shutter_interrupts_without_finding(make_context, route):
    text = GOOD.replace(
        "elements:", "elements:\n  S1: {kind: shutter, at: [250, 200], facing: 180, closed: yes}"
    ).replace("[red, M1, M2, T1]", route)
    assert names(make_context, text) == []


FLIP = """
elements:
  F1: {kind: mirror, at: [250, 200], facing: 135, diameter: 25.4, metal: silver, mount: none}
  M1: {kind: mirror, at: [400, 200], facing: 135, diameter: 25.4, metal: silver, mount: none}
  T1: {kind: target, at: [400, 400], facing: 270}
  T2: {kind: target, at: [250, 400], facing: 270}
routes:
  a: [red, F1, T2]
  b: [red, M1, T1]
states:
  straight: {elements.F1.out: yes}
"""


def test_flip_mirrors_serve_two_routes_without_finding(make_context):
    assert in_states(make_context, SOURCE + FLIP) == {}


def test_a_flip_mirror_set_wrongly_is_found_in_the_state_it_serves(make_context):
    text = SOURCE + FLIP.replace("[250, 200], facing: 135", "[250, 200], facing: 100")
    assert in_states(make_context, text) == {("route-broken", "T2"): ("as drawn",)}


def test_a_flip_mirror_brought_in_by_a_state_is_not_excused_by_that(make_context):
    text = SOURCE + FLIP.replace("[250, 200], facing: 135", "[250, 200], facing: 100, out: yes")
    text = text.replace("straight: {elements.F1.out: yes}", "aside: {elements.F1.out: no}")
    assert in_states(make_context, text) == {("route-broken", "T2"): ("aside",)}


def test_light_that_a_state_lets_go_on_has_to_be_stopped(make_context):
    text = (SOURCE + ELEMENTS + ROUTE).replace("0.3 mW", "30 mW") + STATES.replace(
        "{elements.M1.facing: 100}", "{elements.M2.out: yes}"
    )
    psu = """  psu:
    kind: obstacle
    at: [400, 550]
    facing: 0
    outline: [[-20, 0], [20, 0], [20, 20], [-20, 20]]
    to_height: 200
  T1:"""
    found = in_states(make_context, text.replace("  T1:", psu))
    assert found == {("stray-unstopped", "M1"): ("blocked",)}
    found = in_states(
        make_context,
        text.replace("  T1:", "  D1: {kind: dump, at: [400, 550], facing: 270}\n  T1:"),
    )
    assert found == {}


def test_dark_in_one_state_only_is_no_finding(make_context):
    text = SOURCE + FLIP.replace(
        "  straight: {elements.F1.out: yes}", "  none: {sources.red.power: 0.2 mW}"
    )
    found = in_states(make_context, text)
    assert ("dark-element", "M1") not in found
    assert ("route-broken", "M1") in found


def test_findings_keep_their_ids_when_the_file_is_reordered_or_moved(make_context):
    text = GOOD.replace("facing: 135", "facing: 100")
    lines = ELEMENTS.strip().splitlines()
    other = GOOD.replace(ELEMENTS.strip(), "\n".join([lines[0], *reversed(lines[1:])]))
    other = other.replace("facing: 135", "facing: 100").replace("at: [700, 400]", "at: [701, 400]")
    first, second = (
        {f.id for f in run_checks(make_context(t))[0] if f.check != "off-centre"}
        for t in (text, other)
    )
    assert first == second
    assert first


def test_an_opening_as_last_item_hands_the_beam_over(make_context):
    text = (
        SOURCE.replace("0.3 mW", "30 mW")
        + """
routes:
  out: [red, east.port]
enclosure:
  panels:
    south: {from: [0, 0], to: [900, 0]}
    east:
      from: [900, 0]
      to: [900, 600]
      openings: {port: {along: 200, height: 100, diameter: 20}}
    north: {from: [900, 600], to: [0, 600]}
    west: {from: [0, 600], to: [0, 0]}
elements:
  T9: {kind: target, at: [700, 400], facing: 180, out: yes}
"""
    )
    assert names(make_context, text) == []
    found = names(make_context, text.replace("[red, east.port]", "[red, T9]"))
    assert ("escape", "red") in found


PORT = """
bench: {size: [900, 600], beam_height: 100}
sources:
  red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 2}, polarization: vertical,
        at: [100, 100], heading: 0}
elements:
  M1: {kind: mirror, after: red, distance: 200, turn: left 90, diameter: 25.4, metal: silver}
routes:
  out: [red, M1, north.port]
enclosure:
  panels:
    south: {from: [0, 0], to: [900, 0]}
    east: {from: [900, 0], to: [900, 600]}
    north:
      from: [900, 600]
      to: [0, 600]
      openings: {port: {along: 600, height: 100, diameter: 20}}
    west: {from: [0, 600], to: [0, 0]}
"""


def of_checks(make_context, text, *checks):
    findings, _ = run_checks(make_context(text))
    return [f for f in findings if f.check in checks]


def test_what_is_handed_over_neither_escapes_nor_strays_nor_breaks_its_route(make_context):
    assert names(make_context, PORT) == []
    (leg,) = make_context(PORT).routes.of_state(0)
    assert leg.arrives


def test_the_same_light_named_to_no_opening_escapes(make_context):
    text = PORT.replace("  out: [red, M1, north.port]", "  out: [red, M1]")
    assert ("escape", "M1") in names(make_context, text)


def test_the_edge_of_an_opening_clips(make_context):
    text = PORT.replace("diameter: 20", "diameter: 5")
    (finding,) = of_checks(make_context, text, "clipped", "beam-blocked", "route-broken")
    w = 2.0 * math.hypot(1.0, 700.0 * 633e-6 / (math.pi * 4.0))
    assert finding.value == pytest.approx(math.exp(-2.0 * (2.5 / w) ** 2), rel=1e-3)
    assert finding.message == (
        "4.41 % (219 µW) of the beam of 'out' ends on panel 'north' beside 'north.port'"
    )
    assert finding.remedy == "widen 'north.port', or bring the beam to its middle"


def test_a_beam_beside_its_opening_is_told_once(make_context):
    text = PORT.replace("along: 600", "along: 500")
    (finding,) = of_checks(make_context, text, "clipped", "beam-blocked", "route-broken")
    assert finding.check == "clipped"
    assert finding.remedy == "bring 'north.port' and the beam together"
