"""Where an element stands: at, hole, after with distance, in; and what moves it afterwards."""

import numpy as np
import pytest

EXACT = {"abs": 1e-9, "rel": 0}
T = "  T: {kind: target, "


def test_at_takes_its_height_from_the_bench_unless_it_has_one(standing):
    s = standing(
        T + "at: [400, 300], facing: 90}\n  U: {kind: target, at: [1, 2, 33], facing: 0}\n"
    )
    assert s.at("T") == pytest.approx([400, 300, 100], **EXACT)
    assert s.at("U") == pytest.approx([1, 2, 33], **EXACT)


def test_height_overrides_every_other_z(standing):
    s = standing(
        T + "at: [1, 2, 33], height: 44, facing: 0}\n"
        "  U: {kind: target, after: laser, distance: 50, height: 120}\n"
    )
    assert s.at("T")[2] == 44
    assert s.at("U") == pytest.approx([150, 450, 120], **EXACT)


def test_the_post_stands_in_its_hole(standing):
    """Column 12 and row 7 from 1: (25 + 11 x 25, 25 + 6 x 25); the post 9 mm behind the front."""
    s = standing("  M: {kind: mirror, hole: [12, 7], facing: 90, diameter: 25.4, metal: gold}\n")
    assert s.at("M") == pytest.approx([300, 175 + 9, 100], **EXACT)


def test_a_post_beside_the_optic_goes_into_the_hole(standing):
    s = standing(
        "  M: {kind: mirror, hole: [12, 7], facing: 30, diameter: 25.4, metal: gold,"
        " mount: {post: [-20, 5]}}\n"
    )
    c, n = np.cos(np.radians(30)), np.sin(np.radians(30))
    post = s.at("M") + np.array([-20 * c - 5 * n, -20 * n + 5 * c, 0])
    assert post == pytest.approx([300, 175, 100], **EXACT)


def test_a_hole_and_an_aim_hang_on_each_other_and_both_hold(standing):
    s = standing(
        "  M: {kind: mirror, hole: [16, 18], after: laser, aim: [700, 800], diameter: 25.4,"
        " metal: gold}\n"
    )
    normal = s.axes("M")[0]
    post = s.at("M") - 9 * normal
    assert post[:2] == pytest.approx([400, 450], **EXACT)
    # The ray is reflected where it meets the mirror's plane, and passes the point.
    start, k = s.ray("M")
    met = start + ((s.at("M") - start) @ normal) / (k @ normal) * k
    out = k - 2 * (k @ normal) * normal
    beyond = np.array([700, 800, 100]) - met
    assert np.linalg.norm(np.cross(out, beyond)) < 1e-9


def test_what_stands_over_a_hole_faces_a_point_from_there(standing):
    s = standing("  T: {kind: target, hole: [16, 18], facing: [900, 700], size: [20, 20]}\n")
    towards = np.array([900, 700, 100]) - s.at("T")
    assert s.axes("T")[0] == pytest.approx(towards / np.linalg.norm(towards), **EXACT)


def test_a_tube_over_a_hole_leads_to_its_goal(standing):
    s = standing("  B: {kind: tube, hole: [16, 18], to: [900, 700], bore: 20}\n")
    back = s.at("B") - np.array([900, 700, 100])
    assert s.axes("B")[0] == pytest.approx(back / np.linalg.norm(back), **EXACT)


def test_distance_counts_along_the_ray_from_the_last_face(standing):
    s = standing(
        "  M: {kind: mirror, after: laser, distance: 300, turn: left 90, diameter: 25.4,"
        " metal: gold}\n" + T + "after: M, distance: 120}\n"
    )
    assert s.at("M") == pytest.approx([400, 450, 100], **EXACT)
    assert s.at("T") == pytest.approx([400, 570, 100], **EXACT)


def test_a_tilted_plate_shifts_what_stands_behind_it(standing):
    """t sin(a - b) / cos b to the side; 200 mm from where the ray leaves its back."""
    s = standing(
        "  W: {kind: window, after: laser, distance: 200, incidence: 45, size: [40, 40],"
        " glass: {index: 1.5168}, thickness: 6}\n" + T + "after: W, distance: 200}\n"
    )
    a = np.radians(45)
    b = np.arcsin(np.sin(a) / 1.5168)
    inside = 6 / np.cos(b)
    expected = [300 + inside * np.cos(a - b) + 200, 450 - inside * np.sin(a - b), 100]
    assert s.at("T") == pytest.approx(expected, **EXACT)
    assert s.facing("T") == pytest.approx((180, 0), abs=1e-9)


@pytest.mark.parametrize(
    ("towards", "axis", "sense"), [("left", 1, 1), ("right", 1, -1), ("up", 2, 1), ("down", 2, -1)]
)
def test_a_wedge_bends_the_ray_towards_its_thick_edge(standing, towards, axis, sense):
    s = standing(
        "  W: {kind: window, after: laser, distance: 200, size: [40, 40], glass: {index: 1.5},"
        f" thickness: 6, wedge: 2, wedge_towards: {towards}}}\n" + T + "after: W, distance: 300}\n"
    )
    turned = np.arcsin(1.5 * np.sin(np.radians(2))) - np.radians(2)
    away = s.at("T") - np.array([306, 450, 100])
    assert away[axis] == pytest.approx(sense * 300 * np.sin(turned), **EXACT)
    assert away[0] == pytest.approx(300 * np.cos(turned), **EXACT)


def test_a_pitched_source_raises_what_stands_on_its_beam(standing):
    s = standing(T + "after: laser, distance: 200}\n", source=", pitch: 5")
    angle = np.radians(5)
    assert s.at("T") == pytest.approx([100 + 200 * np.cos(angle), 450, 100 + 200 * np.sin(angle)])
    assert s.facing("T") == pytest.approx((180, -5), abs=1e-9), "targets stand squarely"


def test_plates_on_a_pitched_beam_stay_upright_without_a_word(standing):
    s = standing(
        "  W: {kind: window, after: laser, distance: 200, size: [40, 40]}\n", source=", pitch: 5"
    )
    assert s.facing("W") == pytest.approx((180, 0), abs=1e-9)


def test_in_the_middle_of_an_opening(standing):
    enclosure = (
        "enclosure:\n  panels:\n    east:\n      from: [1500, 0]\n      to: [1500, 900]\n"
        "      openings:\n        slit: {along: 100, width: 40, from_height: 20, to_height: 60}\n"
        "        port: {along: 600, height: 110, diameter: 30}\n"
    )
    s = standing(
        "  A: {kind: window, in: east.slit, size: [60, 60]}\n"
        "  B: {kind: window, in: east.port, diameter: 40, facing: 170}\n" + enclosure
    )
    assert s.at("A") == pytest.approx([1500, 120, 40], **EXACT)
    assert s.facing("A") == pytest.approx((0, 0), abs=1e-9), "the panel's outward normal"
    assert s.at("B") == pytest.approx([1500, 600, 110], **EXACT)
    assert s.facing("B") == pytest.approx((170, 0), abs=1e-9)


def test_the_point_beam_at_stands_on_the_ray(standing):
    s = standing(
        "  M: {kind: mirror, after: laser, distance: 300, turn: left 90, size: [60, 60],"
        " metal: gold, beam_at: [7, -4]}\n" + T + "after: M, distance: 50}\n"
    )
    _, left, up = s.axes("M")
    assert s.at("M") + 7 * left - 4 * up == pytest.approx([400, 450, 100], **EXACT)
    assert s.at("T") == pytest.approx([400, 500, 100], **EXACT)


def test_offset_and_errors_move_it_along_its_own_axes_and_nothing_else(standing):
    text = (
        "  M: {kind: mirror, after: laser, distance: 300, turn: left 90, size: [60, 60],"
        " metal: gold%s}\n" + T + "after: M, distance: 50}\n"
    )
    rest = standing(text % "")
    s = standing(text % ", offset: [1, 2, -3], yaw_error: 1, pitch_error: 2 mrad")
    normal, left, up = rest.axes("M")
    assert s.at("M") == pytest.approx(rest.at("M") + normal + 2 * left - 3 * up, **EXACT)
    assert s.facing("M") == pytest.approx((136, np.degrees(2e-3)), abs=1e-9)
    assert (s.at("T") == rest.at("T")).all(), "the nominal ray knows of no error"


def test_a_state_that_sets_a_pose_key_solves_that_element_alone(standing):
    s = standing(
        "  M: {kind: mirror, after: laser, distance: 300, turn: left 90, size: [60, 60],"
        " metal: gold}\n" + T + "after: M, distance: 50}\n"
        "states:\n  farther: {elements.M.distance: 350}\n  lower: {elements.T.distance: 20}\n"
    )
    assert s.at("M", "farther") == pytest.approx([450, 450, 100], **EXACT)
    assert s.at("T", "farther") == pytest.approx([400, 500, 100], **EXACT)
    assert s.at("T", "lower") == pytest.approx([400, 470, 100], **EXACT)


def test_apertures_screens_and_shutters_are_met_at_their_front(standing):
    for kind in ("aperture, opening: 4", "shutter"):
        s = standing(
            f"  A: {{kind: {kind}, after: laser, distance: 100}}\n"
            + T
            + "after: A, distance: 60}\n"
        )
        assert s.at("T") == pytest.approx([260, 450, 100], **EXACT)


def test_a_thin_lens_and_a_cube_stand_by_their_middle(standing):
    s = standing(
        "  L: {kind: lens, after: laser, distance: 100, diameter: 20, focal: 100}\n"
        "  C: {kind: cube, after: L, distance: 80, side: 20, reflectance: 50 %}\n"
        + T
        + "after: C.reflected, distance: 50}\n"
    )
    assert s.at("C") == pytest.approx([280, 450, 100], **EXACT)
    assert s.at("T") == pytest.approx([280, 450 + 10 + 50, 100], **EXACT)
