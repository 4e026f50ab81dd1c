"""Which beam arrives: tails of paths, branches, lines, routes, double passes."""

import numpy as np
import pytest

EXACT = {"abs": 1e-9, "rel": 0}
SPLIT = (
    "  BS: {kind: splitter, after: laser, distance: 200, turn: left 90, size: [40, 40],"
    " reflectance: 50 %, glass: {index: 1.5}, thickness: 4}\n"
)


def test_both_branches_of_a_splitter(standing):
    s = standing(
        SPLIT + "  A: {kind: target, after: BS.reflected, distance: 70}\n"
        "  B: {kind: target, after: BS.transmitted, distance: 70}\n"
    )
    assert s.at("A") == pytest.approx([300, 520, 100], **EXACT)
    a = np.radians(45)
    b = np.arcsin(np.sin(a) / 1.5)
    assert s.at("B")[1] == pytest.approx(450 - 4 / np.cos(b) * np.sin(a - b), **EXACT)


@pytest.mark.parametrize(("sends", "side"), [("left", 1), ("right", -1)])
def test_a_cube_sends_where_it_says(standing, sends, side):
    s = standing(
        f"  C: {{kind: cube, after: laser, distance: 100, side: 20, reflectance: 50 %,"
        f" sends: {sends}}}\n"
        "  A: {kind: target, after: C.reflected, distance: 40}\n"
        "  B: {kind: target, after: C.transmitted, distance: 40}\n"
    )
    assert s.at("A") == pytest.approx([200, 450 + side * 50, 100], **EXACT)
    assert s.at("B") == pytest.approx([250, 450, 100], **EXACT)


def test_the_leak_behind_a_polished_mirror(standing):
    s = standing(
        "  M: {kind: mirror, after: laser, distance: 200, incidence: 0, size: [40, 40],"
        " reflectance: 99 %, back: polished, thickness: 6}\n"
        "  T: {kind: target, after: M.transmitted, distance: 30}\n"
    )
    assert s.at("T") == pytest.approx([336, 450, 100], **EXACT)


INTERFEROMETER = (
    SPLIT.replace("thickness: 4", "thickness: 0")
    + "  MA: {kind: mirror, after: BS.reflected, distance: 200, turn: right 90, size: [40, 40],"
    " metal: silver}\n"
    "  MB: {kind: mirror, after: BS.transmitted, distance: 200, turn: left 90, size: [40, 40],"
    " metal: silver}\n"
    "  BC: {kind: splitter, at: [500, 650], facing: 135, size: [40, 40], reflectance: 50 %,"
    " thickness: 0, glass: {index: 1.5}}\n"
)


def test_an_interferometer_closes_where_both_arms_meet(standing):
    s = standing(
        INTERFEROMETER + "  T: {kind: target, after: [MA, BC.transmitted], distance: 100}\n"
        "  U: {kind: target, after: [MB, BC.transmitted], distance: 100}\n"
        "  V: {kind: target, after: [MB, BC.reflected], distance: 150}\n"
    )
    assert s.at("T") == pytest.approx([600, 650, 100], **EXACT)
    assert s.at("U") == pytest.approx([500, 750, 100], **EXACT)
    assert s.at("V") == pytest.approx([650, 650, 100], **EXACT)


def test_which_arm_is_asked_where_the_answer_hangs_on_it(complaints):
    text = INTERFEROMETER + (
        "  T: {kind: target, after: BC.transmitted, distance: 100}\n"
        "routes:\n"
        "  a: [laser, BS.reflected, MA, BC.transmitted]\n"
        "  b: [laser, BS.transmitted, MB, BC.transmitted]\n"
    )
    (problem,) = complaints(text)
    assert problem.startswith("b.yaml:9:"), problem
    assert "more than one beam could be meant to arrive at 'T'" in problem
    assert "[laser, BS.reflected, MA, BC.transmitted]" in problem
    assert "[laser, BS.transmitted, MB, BC.transmitted]" in problem


def test_a_mend_of_the_list_is_followed(standing):
    s = standing(
        INTERFEROMETER
        + "  T: {kind: target, after: [laser, BS.reflected, MA, BC.transmitted], distance: 100}\n"
    )
    assert s.at("T") == pytest.approx([600, 650, 100], **EXACT)


def test_a_double_pass_through_a_splitter(standing):
    """Sent straight back by the end mirror, reflected by the splitter on the way home."""
    s = standing(
        SPLIT + "  M: {kind: mirror, after: BS.transmitted, distance: 200, incidence: 0,"
        " size: [40, 40], metal: silver}\n"
        "  T: {kind: target, after: [BS.transmitted, M, BS.reflected], distance: 100}\n"
    )
    # From behind: through the back, off the front, out of the back, downwards.
    a = np.radians(45)
    b = np.arcsin(np.sin(a) / 1.5)
    assert s.at("T")[1] < 450
    shift = 4 / np.cos(b) * np.sin(a - b)
    # It leaves 2 t tan b / cos(a) ... from where the way out ran: along the back.
    along = 2 * 4 * np.tan(b) * np.sin(a)
    out = 300 + 4 / np.cos(b) * np.cos(a - b)
    assert s.at("T")[0] == pytest.approx(out - along, **EXACT)
    assert s.at("T")[1] == pytest.approx(450 - shift - along - 100, **EXACT)


TWO_LINES = (
    "bench: {size: [1500, 900]}\nsources:\n"
    "  laser: {lines: [{wavelength: 532, power: 1 W}, {wavelength: 1064, power: 1 W}],"
    " beam: {waist_radius: 0.5}, at: [100, 450], heading: 0, body: none}\nelements:\n"
)


def test_a_wavelength_chooses_its_line(standing):
    s = standing(
        TWO_LINES
        + "  W: {kind: window, after: laser, distance: 200, incidence: 60, size: [60, 60],"
        " glass: SF10, thickness: 10, wavelength: 532}\n"
        "  G: {kind: target, after: W, distance: 100, wavelength: 532}\n"
        "  R: {kind: target, after: W, distance: 120, wavelength: 1064}\n",
        whole=True,
    )
    from tests.tracing.referee.indices import INDEX

    for name, um in (("G", 0.532), ("R", 1.064)):
        inside = np.arcsin(np.sin(np.radians(60)) / INDEX["SF10"](um))
        shift = 10 / np.cos(inside) * np.sin(np.radians(60) - inside)
        assert s.at(name)[1] == pytest.approx(450 - shift, **EXACT)


def test_lines_that_run_alike_need_no_choice(standing):
    s = standing(TWO_LINES + "  T: {kind: target, after: laser, distance: 200}\n", whole=True)
    assert s.at("T") == pytest.approx([300, 450, 100], **EXACT)


def test_lines_that_part_need_one(complaints):
    (problem,) = complaints(
        TWO_LINES
        + "  W: {kind: window, after: laser, distance: 200, incidence: 60, size: [60, 60],"
        " glass: SF10, thickness: 10}\n"
        "  T: {kind: target, after: W, distance: 100}\n",
        whole=True,
    )
    assert problem.startswith("b.yaml:6:"), problem
    assert "wavelength: 532; wavelength: 1064" in problem


def test_brewster_needs_one_line(complaints):
    (problem,) = complaints(
        TWO_LINES + "  W: {kind: window, after: laser, distance: 200, incidence: brewster,"
        " size: [60, 60]}\n",
        whole=True,
    )
    assert "wavelength: 532; wavelength: 1064" in problem


def test_a_wavelength_that_does_not_come_is_an_error(complaints):
    (problem,) = complaints(
        TWO_LINES + "  T: {kind: target, after: laser, distance: 200, wavelength: 633}\n",
        whole=True,
    )
    assert problem.split("\n") == [
        "b.yaml:5:62: error: no light of 633 nm arrives at 'T'",
        "  expected: one of these: wavelength: 532; wavelength: 1064",
        "  to mend: write the line that is meant, such as `wavelength: 532`",
    ]


def test_after_beside_at_says_only_which_beam_arrives(standing):
    s = standing("  M: {kind: mirror, at: [400, 450], after: laser, turn: left 60, size: [40, 40],"
                 " metal: gold}\n  T: {kind: target, after: M, distance: 100}\n")  # fmt: skip
    assert s.at("M") == pytest.approx([400, 450, 100], **EXACT)
    assert s.at("T") == pytest.approx(
        [400 + 100 * np.cos(np.radians(60)), 450 + 100 * np.sin(np.radians(60)), 100], **EXACT
    )


@pytest.mark.parametrize("drawn", ["closed: yes", "closed: no", "out: yes"])
def test_a_shutter_drawn_closed_or_out_is_at_rest_for_the_nominal_ray(standing, drawn):
    s = standing(
        f"  S: {{kind: shutter, after: laser, distance: 100, {drawn}}}\n"
        "  T: {kind: target, after: S, distance: 60}\n"
    )
    assert s.at("T") == pytest.approx([260, 450, 100], **EXACT)
