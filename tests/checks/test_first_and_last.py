"""What a hostile reading found: what comes from outside, ends inside, or lies off the wall."""

import pytest

from benchlay.checks import CHECKS
from benchlay.checks._check import Unevaluated

BY_NAME = {module.NAME: module for module in CHECKS}
RED = """\
sources:
  red: {wavelength: 633, power: 5 W, beam: {waist_radius: 0.5}, polarization: vertical,
    at: [100, 200], heading: 0}
"""


def found(make_context, name, text):
    return list(BY_NAME[name].check(make_context(text), 0))


@pytest.mark.parametrize(("end", "lost"), [(202, False), (206, True), (220, True)])
def test_a_skew_tube_is_told_once(make_context, end, lost):
    """The wall of a tube takes the beam: `clipped` tells it, and no broken route besides."""
    text = (
        "bench: {size: [800, 400]}\n"
        + RED
        + f"""\
elements:
  B: {{kind: tube, after: red, distance: 100, bore: 10, to: [500, {end}]}}
  T: {{kind: target, at: [600, 200], facing: 180}}
routes: {{m: [red, B, T]}}
"""
    )
    assert [one.element for one in found(make_context, "clipped", text)] == ["B"] * lost
    assert not found(make_context, "route-broken", text)


def _shone_into(height):
    return (
        "bench: {outline: [[-500, 0], [800, 0], [800, 400], [-500, 400]]}\n"
        + RED.replace("[100, 200]", "[-300, 200]")
        + f"""\
enclosure:
  material: black
  panels:
    south: {{from: [0, 0], to: [800, 0], access: tool}}
    east: {{from: [800, 0], to: [800, 400]}}
    north: {{from: [800, 400], to: [0, 400]}}
    west:
      from: [0, 400]
      to: [0, 0]
      openings: {{port: {{along: 200, height: {height}, diameter: 30}}}}
materials: {{black: {{thickness: 2, diffuse: 0.01, specular: 0}}}}
"""
    )


@pytest.mark.parametrize(("height", "count"), [(100, 1), (150, 0)])
def test_a_beam_that_comes_in_from_outside_wants_an_interlock(make_context, height, count):
    findings = found(make_context, "no-interlock", _shone_into(height))
    assert [finding.element for finding in findings] == ["south"] * count


@pytest.mark.parametrize(("x", "count"), [(2000, 0), (1900, 1)])
def test_a_door_off_the_walls_is_not_passed(make_context, x, count):
    text = (
        "bench: {size: [800, 400]}\n"
        + RED
        + f"""\
room:
  outline: [[-1000, -1500], [2000, -1500], [2000, 1500], [-1000, 1500]]
  doors: {{side: {{from: [{x}, 800], to: [{x}, 1400]}}}}
"""
    )
    said = found(make_context, "at-door", text)
    assert [isinstance(one, Unevaluated) for one in said] == [True] * count
    assert all("'side'" in one.reason for one in said)


FACING = """\
  blue: {{wavelength: 450, power: 5 mW, beam: {{waist_radius: 0.5}}, at: [700, {y}], heading: 180,
    body: {{length: 60, width: 40, height: 40}}}}
"""


@pytest.mark.parametrize(("y", "count"), [(200, 1), (203, 0)])
def test_a_source_that_shines_into_another_is_told(make_context, y, count):
    text = "bench: {size: [800, 400]}\n" + RED + FACING.format(y=y)
    findings = found(make_context, "into-source", text)
    into_blue = [finding for finding in findings if finding.element == "blue"]
    assert len(into_blue) == count
    for finding in into_blue:
        assert "from 'red' shines into 'blue'" in finding.message
        assert "before it meets 'blue'" in finding.remedy


def test_what_sends_light_back_is_named_where_no_route_is(make_context):
    text = (
        "bench: {size: [800, 400]}\n"
        + RED
        + "elements:\n  M: {kind: mirror, after: red, distance: 200, diameter: 25.4, "
        "metal: silver}\n"
    )
    (finding,) = found(make_context, "into-source", text)
    assert "sent back by 'M.front'" in finding.message
    assert finding.remedy.startswith("tilt 'M'")


def test_of_a_cell_the_window_is_named(make_context):
    text = (
        "bench: {size: [800, 400]}\n"
        + RED
        + """\
elements:
  C: {kind: cell, after: red, distance: 100, length: 200, bore: 20,
    windows: {incidence: brewster, glass: BK7}, mount: none}
  T: {kind: target, after: C, distance: 100}
routes: {m: [red, C, T]}
"""
    )
    (finding,) = found(make_context, "off-brewster", text)
    assert finding.message.startswith("the entry window of 'C' is meant to")


@pytest.mark.parametrize(
    ("state", "retardance", "lost"),
    [
        ("horizontal", "1", False),
        ("horizontal", "0.015", False),  # 2.7 degrees of ellipticity: 99.8 % linear
        ("horizontal", "0.04", True),  # 7.2 degrees: sin(7.2)^2 = 1.57 % of it is not
        ("horizontal", "quarter", True),
        ("none", "1", True),
        ("{circular: right}", "1", True),
    ],
)
def test_a_wanted_angle_wants_linear_light(make_context, state, retardance, lost):
    """A plate at 45 degrees turns no main direction: it makes the light round."""
    text = (
        "bench: {size: [800, 400]}\n"
        + RED.replace("vertical", state)
        + f"""\
elements:
  H: {{kind: waveplate, after: red, distance: 200, diameter: 25.4, retardance: {retardance},
    axis: 45}}
  T: {{kind: target, after: H, distance: 100}}
routes: {{m: {{path: [red, H, T], needs: {{polarization: {{angle: 0, within: 2}}}}}}}}
"""
    )
    assert bool(found(make_context, "polarization-lost", text)) == lost


def test_the_mirror_that_sends_light_back_is_named_beyond_a_fold(make_context):
    """The window lets a little pass; the mirror behind it sends it back."""
    text = (
        "bench: {size: [800, 400]}\n"
        + RED
        + """\
elements:
  W: {kind: splitter, after: red, distance: 200, turn: left 90, diameter: 25.4,
    reflectance: 90 %, back: 0 %, mount: none}
  E: {kind: mirror, after: W.transmitted, distance: 100, diameter: 25.4, metal: silver}
  T: {kind: target, after: W.reflected, distance: 100}
routes: {m: [red, W.reflected, T]}
"""
    )
    (finding,) = found(make_context, "into-source", text)
    assert "sent back by 'E.front'" in finding.message
    assert finding.remedy.startswith("tilt 'E'")


PULSED = "pulse: {energy: 50 mJ, duration: 8 ns, rate: 10 Hz}"


@pytest.mark.parametrize(
    ("light", "rated_j_cm2", "fires"),
    [(PULSED, 3.17, True), (PULSED, 3.20, False), ("power: 5 W", 3.17, False)],
)
def test_a_dump_may_be_rated_for_the_fluence_of_a_pulse(make_context, light, rated_j_cm2, fires):
    """2 E / (pi w2) with w = 1.00057 mm after 200 mm: 3.1794 J/cm2."""
    text = f"""\
bench: {{size: [800, 400]}}
sources:
  a: {{wavelength: 532, {light}, beam: {{waist_radius: 1}}, at: [100, 200], heading: 0}}
elements:
  D: {{kind: dump, after: a, distance: 200, withstands: {{fluence: {rated_j_cm2} J/cm2, at: 8 ns}}}}
routes: {{m: [a, D]}}
"""
    findings = found(make_context, "dump-overload", text)
    assert len(findings) == fires
    for finding in findings:
        assert finding.value == pytest.approx(3.1794, rel=1e-4)
        assert finding.unit == "J/cm2"


@pytest.mark.parametrize(
    ("light", "unit"), [("power: 5 W", "W/cm2"), (PULSED.replace("50", "90"), "J/cm2")]
)
def test_a_panel_rated_for_pulses_is_not_shown_to_bear_continuous_light(make_context, light, unit):
    text = f"""\
bench: {{size: [800, 400]}}
sources:
  a: {{wavelength: 532, {light}, beam: {{waist_radius: 1}}, at: [100, 200], heading: 0}}
materials: {{m: {{thickness: 2, specular: 0, withstands: {{fluence: 3.2 J/cm2, at: 8 ns}}}}}}
enclosure: {{material: m, panels: {{east: {{from: [800, 0], to: [800, 400]}}}}}}
"""
    (finding,) = found(make_context, "panel-overload", text)
    assert (finding.element, finding.unit) == ("east", unit)
    assert finding.message.startswith("not shown") == (unit == "W/cm2")


@pytest.mark.parametrize(("own", "fires"), [("", True), (", withstands: {power: 6 W}", False)])
def test_a_screen_bears_what_its_material_does_unless_it_says_otherwise(make_context, own, fires):
    text = (
        "bench: {size: [800, 400]}\n"
        + RED
        + f"""\
materials: {{card: {{thickness: 2, specular: 0, withstands: {{power: 4.9 W}}}}}}
elements:
  S: {{kind: screen, after: red, distance: 200, material: card{own}}}
"""
    )
    assert bool(found(make_context, "dump-overload", text)) == fires


def _scattered(needs, screen=""):
    return (
        "bench: {size: [800, 400]}\n"
        + RED
        + f"""\
elements:
  T: {{kind: target, after: red, distance: 200, incidence: 30, side: left}}
  C: {{kind: target, at: [200, 340], facing: T, mount: none}}
{screen}routes: {{m: [red, T], cam: {{path: [red, T.scattered, C], needs: {needs}}}}}
"""
    )


@pytest.mark.parametrize(
    ("name", "needs"),
    [
        ("needs-unmet", "{power: 1 uW}"),
        ("needs-unmet", "{transmits: 1 %}"),
        ("polarization-lost", "{polarization: vertical}"),
    ],
)
def test_what_scattered_light_brings_is_not_known(make_context, name, needs):
    (said,) = found(make_context, name, _scattered(needs))
    assert isinstance(said, Unevaluated)
    assert "route 'cam'" in said.reason


@pytest.mark.parametrize(("way", "count"), [(372, 0), (375, 1)])
def test_the_path_of_scattered_light_is(make_context, way, count):
    """200 mm there and hypot(100, 140) = 172.05 mm on, in air: 372.15 mm."""
    text = _scattered(f"{{path: {{is: {way}, within: 1}}}}")
    assert len(found(make_context, "needs-unmet", text)) == count


def test_a_break_of_scattered_light_names_no_power(make_context):
    screen = "  X: {kind: screen, at: [250, 270], facing: 306, mount: none}\n"
    (broken,) = found(make_context, "route-broken", _scattered("{}", screen))
    assert "the beam goes to 'X' instead" in broken.message


@pytest.mark.parametrize(("at", "count"), [("[200, 340]", 0), ("[400, 100]", 1)])
def test_light_is_scattered_from_the_front_only(make_context, at, count):
    text = _scattered("{}").replace("[200, 340]", at)
    assert [one.element for one in found(make_context, "route-broken", text)] == ["C"] * count
