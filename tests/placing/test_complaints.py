"""What cannot be placed says where, why, what was expected and how to mend it."""

import pytest

MIRROR = (
    "  M: {kind: mirror, after: laser, distance: 300, turn: left 90, size: [60, 60], metal: gold}\n"
)


def lines(problem):
    return problem.split("\n")


def test_a_beam_that_passes_beside_does_not_arrive(complaints):
    (problem,) = complaints(
        "  M: {kind: mirror, at: [400, 500], facing: 135, after: laser, size: [60, 60],"
        " metal: gold}\n"
        "  T: {kind: target, after: M, distance: 100}\n"
    )
    first, *rest = lines(problem)
    assert first.startswith("b.yaml:6:28: error: ")
    assert "'M'" in first
    assert "beside" in first
    assert any("to mend" in line for line in rest)


def test_a_ground_back_lets_nothing_through(complaints):
    (problem,) = complaints(MIRROR + "  T: {kind: target, after: M.transmitted, distance: 100}\n")
    assert lines(problem) == [
        "b.yaml:6:28: error: no nominal beam leaves 'M.transmitted' towards 'T': "
        "face 'back' of 'M' is opaque",
        "  expected: an item that a beam reaches and leaves by that branch",
        "  to mend: name another item or branch in `after`, or see that a beam arrives at 'M'",
    ]


def test_nothing_says_which_beam_arrives(complaints):
    (problem,) = complaints("  W: {kind: window, at: [400, 450], size: [40, 40]}\n")
    assert "facing" in problem
    assert problem.startswith("b.yaml:5:")


@pytest.mark.parametrize("way", ["turn: left 90", "aim: [1, 2]", "incidence: 30"])
def test_turning_by_a_beam_needs_after(complaints, way):
    kind = "mirror, metal: gold"
    (problem,) = complaints(f"  W: {{kind: {kind}, at: [400, 450], size: [40, 40], {way}}}\n")
    key = way.split(":")[0]
    assert f"`{key}` needs" in problem or f"'{key}'" in problem
    assert "after" in problem


def test_a_vertical_beam_cannot_be_turned_in_plan(complaints):
    (problem,) = complaints(
        MIRROR.replace("left", "up")
        + "  N: {kind: mirror, after: M, distance: 90, turn: left 90, size: [60, 60],"
        " metal: gold}\n"
    )
    assert problem.startswith("b.yaml:6:")
    assert "vertical" in problem
    assert "aim" in problem


@pytest.mark.parametrize(
    "keys", ["cube, side: 20, reflectance: 50 %", "lens, focal: 100, diameter: 20"]
)
def test_turn_is_for_fronts_that_reflect(complaints, keys):
    (problem,) = complaints(f"  C: {{kind: {keys}, after: laser, distance: 90, turn: left 90}}\n")
    assert "incidence" in problem
    assert problem.startswith("b.yaml:5:")


def test_places_that_hang_on_each_other(complaints):
    from benchlay.layout import read_layout

    text = (
        "bench: {size: [1500, 900]}\nsources:\n"
        "  laser: {wavelength: 633, power: 1 W, beam: {waist_radius: 0.5}, at: [1, 4],"
        " heading: 0}\n"
        "elements:\n"
        "  A: {kind: mirror, after: C, distance: 30, turn: left 90, size: [9, 9], metal: gold}\n"
        "  B: {kind: mirror, after: A, distance: 30, turn: left 90, size: [9, 9], metal: gold}\n"
        "  C: {kind: mirror, after: B, distance: 30, turn: left 90, size: [9, 9], metal: gold}\n"
    )
    source, problems = read_layout(text, "b.yaml")
    said = [str(p) for p in problems.sorted()] if source is None else complaints(text, whole=True)
    assert len(said) == 1
    assert all(name in said[0] for name in ("A", "B", "C"))
    assert said[0].startswith("b.yaml:5:"), said


def test_two_places_that_cannot_be_found_are_both_said(complaints):
    said = complaints(
        "  A: {kind: window, at: [400, 450], size: [40, 40]}\n"
        "  B: {kind: window, at: [500, 450], size: [40, 40]}\n"
    )
    assert [problem.split(":")[1] for problem in said] == ["5", "6"]


def test_what_hangs_on_a_missing_place_is_not_reported_again(complaints):
    said = complaints(
        "  A: {kind: window, at: [400, 450], size: [40, 40]}\n"
        "  B: {kind: target, after: A, distance: 40}\n"
    )
    assert len(said) == 1
