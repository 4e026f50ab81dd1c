"""Beams in words and figures, against figures worked out by hand."""

import math

import pytest

from benchlay.results.beam_rows import beam_rows

MIRROR_BENCH = """
bench: {{size: [900, 600], beam_height: 100, medium: vacuum}}
sources:
  red: {{wavelength: 633, power: 8 mW, beam: {{waist_radius: 0.5}}, polarization: {state},
        at: [100, 100], heading: 0}}
elements:
{elements}
"""


@pytest.fixture
def rows(traced):
    """Return the rows of a bench with one source and these elements."""

    def make(elements, state="vertical", more=""):
        text = MIRROR_BENCH.format(state=state, elements=elements) + more
        return beam_rows(traced(text), 0)

    return make


def test_the_first_leg_of_a_corner(corner):
    beam = beam_rows(corner, 0)[0]
    assert (beam.beam, beam.parent, beam.source, beam.splits) == (0, None, "red", 0)
    assert (beam.from_, beam.from_face, beam.to, beam.to_face) == ("red", "exit", "M1", "front")
    assert (beam.ends, beam.event) == ("optic", "emitted")
    assert (beam.route, beam.routes, beam.leg) == ("work", ("work",), 0)
    assert beam.start == pytest.approx((100.0, 100.0, 100.0))
    assert beam.end == pytest.approx((400.0, 100.0, 100.0))
    assert beam.direction == pytest.approx((1.0, 0.0, 0.0))
    assert (beam.power_W, beam.power_at_end_W) == pytest.approx((8e-3, 8e-3))
    assert (beam.medium_index, beam.optical_path_mm) == pytest.approx((1.0, 300.0))
    assert beam.lost_W == {"rim": 0.0}
    assert beam.pulse_energy_J is None
    assert beam.m2 == pytest.approx((1.0, 1.0))
    # Of a waist of 0.5 mm after 300 mm, w = w0 sqrt(1 + (z / zR)²) with zR = pi w0² / lambda.
    w = 0.5 * math.hypot(1.0, 300.0 * 633e-6 / (math.pi * 0.25))
    assert beam.w_start_mm == pytest.approx((0.5, 0.5))
    assert beam.w_end_mm == pytest.approx((w, w), rel=1e-12)
    assert beam.peak_irradiance_end_W_cm2 == pytest.approx(200.0 * 8e-3 / (math.pi * w * w))


def test_the_second_leg_ends_on_the_target(corner):
    beam = beam_rows(corner, 0)[2]
    assert (beam.parent, beam.event, beam.leg) == (0, "reflected", 1)
    assert (beam.from_, beam.to, beam.ends) == ("M1", "T1", "target")
    assert beam.optical_path_mm == pytest.approx(500.0)
    assert beam.power_at_end_W == pytest.approx(7.2e-3, rel=1e-12)


def test_beams_are_numbered_from_0_in_every_state(corner):
    for variant in range(len(corner.scene.variants)):
        found = beam_rows(corner, variant)
        assert [beam.beam for beam in found] == list(range(len(found)))
        assert all(b.parent is None or b.parent < b.beam for b in found)
    assert [b.parent for b in beam_rows(corner, 0)] == [None, 0, 0]


def test_light_that_leaves_has_no_place_to_name(corner):
    (beam,) = beam_rows(corner, corner.scene.variants.index("away"))
    assert (beam.to, beam.to_face, beam.ends) == (None, None, "escaped")
    assert beam.end[0] == pytest.approx(100.0 + corner.scene.reach_mm)


def test_what_a_ground_back_swallows(corner):
    beam = beam_rows(corner, 0)[1]
    assert (beam.from_, beam.from_face, beam.to, beam.to_face) == ("M1", "front", "M1", "back")
    assert (beam.ends, beam.route, beam.routes, beam.leg) == ("absorbed", None, (), None)
    assert beam.splits == 1
    assert beam.medium_index == pytest.approx(1.515, abs=2e-3)
    assert beam.power_at_end_W == pytest.approx(0.06 * 8e-3)


@pytest.mark.parametrize(
    ("state", "angle", "ellipticity", "degree"),
    [
        ("horizontal", 0.0, 0.0, 1.0),
        ("vertical", 90.0, 0.0, 1.0),
        ("{angle: 30}", 30.0, 0.0, 1.0),
        ("{angle: -30}", 150.0, 0.0, 1.0),
        ("{circular: right}", 0.0, 45.0, 1.0),
        ("{circular: left}", 0.0, -45.0, 1.0),
        ("none", 0.0, 0.0, 0.0),
    ],
)
def test_states_of_polarization_at_the_source(rows, state, angle, ellipticity, degree):
    beam = rows("  T1: {kind: target, after: red, distance: 200}", state)[0]
    told = beam.polarization
    assert told.degree == pytest.approx(degree, abs=1e-12)
    assert told.angle_deg == pytest.approx(angle, abs=1e-9)
    assert told.ellipticity_deg == pytest.approx(ellipticity, abs=1e-9)
    assert told.horizontal == pytest.approx((0.0, 1.0, 0.0))


def test_a_mirror_turns_an_angle_to_its_other_side(rows):
    """What lies 30 degrees to one side lies 30 degrees to the other after an odd reflection."""
    mirror = "M1: {kind: mirror, after: red, distance: 90, turn: left 90, diameter: 25"
    beams = rows(f"  {mirror}, reflectance: 99 %}}", "{angle: 30}")
    beam = next(b for b in beams if b.event == "reflected")
    assert beam.polarization.angle_deg == pytest.approx(150.0)
    assert beam.polarization.horizontal == pytest.approx((-1.0, 0.0, 0.0))


def test_a_periscope_turns_horizontal_into_vertical(rows):
    up = """
  P1: {kind: mirror, after: red, distance: 200, turn: up 90, diameter: 25, reflectance: 99 %}
  P2: {kind: mirror, after: P1, distance: 150, aim: [300, 500, 250], diameter: 25,
       reflectance: 99 %}
"""
    beams = rows(up, "horizontal")
    upright = next(b for b in beams if b.from_ == "P1" and b.event == "reflected")
    last = next(b for b in beams if b.from_ == "P2" and b.event == "reflected")
    assert upright.direction == pytest.approx((0.0, 0.0, 1.0), abs=1e-12)
    assert upright.polarization.horizontal == pytest.approx((0.0, 1.0, 0.0), abs=1e-12)
    assert upright.polarization.angle_deg % 180.0 == pytest.approx(0.0, abs=1e-9)
    assert last.direction == pytest.approx((0.0, 1.0, 0.0), abs=1e-12)
    assert last.polarization.angle_deg == pytest.approx(90.0, abs=1e-9)


def test_an_aperture_takes_the_rim_of_a_beam(rows):
    """Of a round beam exp(-2 a² / w²) falls outside a centred opening of radius a."""
    beams = rows(
        "  A1: {kind: aperture, after: red, distance: 200, opening: 1}\n"
        "  T1: {kind: target, after: A1, distance: 100}"
    )
    w = 0.5 * math.hypot(1.0, 200.0 * 633e-6 / (math.pi * 0.25))
    lost = 8e-3 * math.exp(-2.0 * 0.25 / w**2)
    first, second = beams
    assert first.lost_W == {"rim": pytest.approx(lost, rel=1e-9)}
    assert first.power_at_end_W == pytest.approx(8e-3 - lost, rel=1e-12)
    assert (first.to, first.ends) == ("A1", "optic")
    assert (second.from_, second.event) == ("A1", "transmitted")
    assert second.power_W == pytest.approx(8e-3 - lost, rel=1e-12)
    # On its axis the light is as strong as if nothing had been cut.
    w = 0.5 * math.hypot(1.0, 300.0 * 633e-6 / (math.pi * 0.25))
    assert second.peak_irradiance_end_W_cm2 == pytest.approx(200.0 * 8e-3 / (math.pi * w * w))


def test_a_chief_ray_on_the_rim_ends_there(rows):
    beams = rows("  W1: {kind: window, at: [300, 136.2], facing: 180, diameter: 76.2, mount: none}")
    (beam,) = beams
    assert (beam.to, beam.to_face, beam.ends) == ("W1", "front", "rim")
    assert beam.power_at_end_W == pytest.approx(8e-3, rel=1e-6)
    assert beam.lost_W["rim"] == 0.0


def test_a_chief_ray_on_the_rim_of_which_much_goes_on_ends_on_the_optic(rows):
    """The middle lies 0.57 mm, or 1.1 w, beside the clear region: a hundredth goes on."""
    first, *others = rows(
        "  W1: {kind: window, at: [300, 112], facing: 180, diameter: 25.4, mount: none}"
    )
    assert first.ends == "optic"
    assert first.power_at_end_W == pytest.approx(sum(b.power_W for b in others if b.parent == 0))


def test_a_filter_swallows_light_on_the_way(rows):
    beams = rows(
        "  F1: {kind: filter, after: red, distance: 200, density: 1, diameter: 25, mount: none}\n"
        "  T1: {kind: target, after: F1, distance: 100}"
    )
    inside = next(b for b in beams if b.from_face == "front" and b.event == "transmitted")
    assert inside.lost_W["absorbed"] == pytest.approx(0.9 * inside.power_W, rel=1e-9)
    assert inside.power_at_end_W == pytest.approx(0.1 * inside.power_W, rel=1e-9)


def test_bodies_have_no_face_and_dumps_an_opening(rows):
    beams = rows("  D1: {kind: dump, after: red, distance: 200}")
    assert (beams[0].to, beams[0].to_face, beams[0].ends) == ("D1", "opening", "dump")
    beams = rows(
        "  M1: {kind: mirror, at: [300, 115], facing: 180, diameter: 25.4, reflectance: 99 %}"
    )
    assert (beams[0].to, beams[0].to_face, beams[0].ends) == ("M1", None, "body")


def test_panels_have_a_front_and_throw_light_back(rows):
    panel = """
enclosure:
  material: shiny
  panels: {east: {from: [900, 0], to: [900, 600]}}
materials: {shiny: {specular: 50 %, diffuse: 10 %}}
"""
    first, second = rows("  T1: {kind: target, at: [100, 500], facing: 0}", more=panel)[:2]
    assert (first.to, first.to_face, first.ends) == ("east", "front", "panel")
    assert (second.from_, second.from_face, second.event) == ("east", "front", "reflected")
    assert second.power_W == pytest.approx(4e-3)


def test_pulses_carry_their_energy(traced):
    text = MIRROR_BENCH.format(
        state="none", elements="  T1: {kind: target, after: red, distance: 90}"
    )
    text = text.replace("power: 8 mW", "pulse: {energy: 2 mJ, duration: 8 ns, rate: 10 Hz}")
    (beam,) = beam_rows(traced(text), 0)
    assert beam.power_W == pytest.approx(0.02)
    assert beam.pulse_energy_J == pytest.approx(2e-3)


def test_an_elliptical_beam_has_its_axes_in_order(rows, traced):
    text = MIRROR_BENCH.format(
        state="none", elements="  T1: {kind: target, after: red, distance: 90}"
    )
    text = text.replace(
        "{waist_radius: 0.5}", "{waist_radius_h: 0.3, waist_radius_v: 0.6, m2_h: 2, m2_v: 1}"
    )
    (beam,) = beam_rows(traced(text), 0)
    assert beam.w_start_mm == pytest.approx((0.3, 0.6))
    assert beam.m2 == pytest.approx((2.0, 1.0))
    assert beam.w_axis_deg == pytest.approx(0.0, abs=1e-9)
