"""Polygons: area, simplicity, convex pieces."""

from math import cos, pi, sin

import pytest
from hypothesis import given
from hypothesis import strategies as st

from benchlay.geometry.polygon import convex_pieces, holds, is_convex, middle, signed_area, simple

SQUARE = ((0.0, 0.0), (2.0, 0.0), (2.0, 2.0), (0.0, 2.0))
ELL = ((0.0, 0.0), (3.0, 0.0), (3.0, 1.0), (1.0, 1.0), (1.0, 3.0), (0.0, 3.0))
FLAT_CORNER = ((0.0, 0.0), (1.0, 0.0), (2.0, 0.0), (2.0, 2.0))
COMB = (
    (0.0, 0.0), (7.0, 0.0), (7.0, 3.0), (6.0, 1.0), (5.0, 3.0),
    (4.0, 1.0), (3.0, 3.0), (2.0, 1.0), (1.0, 3.0),
)  # fmt: skip
# The corner (2, 2) lies on the line that would cut off the corner (0, 0).
TOUCHED = ((0.0, 0.0), (4.0, 0.0), (5.0, 3.0), (2.0, 2.0), (3.0, 5.0), (0.0, 4.0))


def test_area_has_the_sign_of_the_order():
    assert signed_area(SQUARE) == 4.0
    assert signed_area(SQUARE[::-1]) == -4.0
    assert signed_area(ELL) == 5.0


@pytest.mark.parametrize("corners", [SQUARE, SQUARE[::-1], ELL, FLAT_CORNER, COMB])
def test_outlines_that_enclose_an_area_are_simple(corners):
    assert simple(corners)


@pytest.mark.parametrize(
    "corners",
    [
        pytest.param(((0.0, 0.0), (1.0, 0.0)), id="two corners"),
        pytest.param(((0.0, 0.0), (1.0, 0.0), (3.0, 0.0)), id="no area"),
        pytest.param(((0.0, 0.0), (2.0, 1.0), (2.0, 0.0), (0.0, 2.0)), id="crosses itself"),
        pytest.param((*SQUARE, SQUARE[-1]), id="a corner twice"),
        pytest.param(
            ((0.0, 0.0), (4.0, 0.0), (4.0, 4.0), (2.0, 0.0), (0.0, 4.0)), id="touches itself"
        ),
        pytest.param(((0.0, 0.0), (4.0, 0.0), (2.0, 0.0), (2.0, 3.0)), id="a spike"),
    ],
)
def test_what_meets_itself_is_not_simple(corners):
    assert not simple(corners)


def test_convex_means_no_reflex_corner():
    assert is_convex(SQUARE)
    assert is_convex(FLAT_CORNER)
    assert not is_convex(ELL)
    assert not is_convex(SQUARE[::-1])


def test_a_convex_outline_is_its_own_piece():
    assert convex_pieces(SQUARE) == (SQUARE,)


@pytest.mark.parametrize("corners", [ELL, COMB, ELL[2:] + ELL[:2], TOUCHED])
def test_pieces_are_convex_and_tile_the_outline(corners):
    pieces = convex_pieces(corners)
    assert all(is_convex(piece) and signed_area(piece) > 0.0 for piece in pieces)
    assert sum(map(signed_area, pieces)) == pytest.approx(signed_area(corners), rel=1e-12)
    assert all(_inside(middle(piece), corners) for piece in pieces)


def test_no_corner_is_cut_off_through_another():
    assert ((0.0, 4.0), (0.0, 0.0), (4.0, 0.0)) not in convex_pieces(TOUCHED)


def test_pieces_of_an_ell_leave_out_its_notch():
    assert not any(_inside((2.0, 2.0), piece) for piece in convex_pieces(ELL))


@given(st.lists(st.floats(1.0, 10.0), min_size=5, max_size=12))
def test_pieces_of_stars_tile_them(radii):
    count = len(radii)
    angles = [2.0 * pi * i / count for i in range(count)]
    star = tuple((r * cos(a), r * sin(a)) for r, a in zip(radii, angles, strict=True))
    assert simple(star)
    pieces = convex_pieces(star)
    assert all(is_convex(piece) for piece in pieces)
    assert sum(map(signed_area, pieces)) == pytest.approx(signed_area(star), rel=1e-9)


def test_a_clockwise_outline_breaks_the_contract():
    with pytest.raises(ValueError, match="once round a simple outline, anticlockwise"):
        convex_pieces(SQUARE[::-1])


def test_the_middle_is_the_mean_of_the_corners():
    assert middle(SQUARE) == (1.0, 1.0)


def _inside(point, corners):
    """Count how often a line to the right crosses the outline."""
    x, y = point
    sides = zip(corners, corners[1:] + corners[:1], strict=True)
    crossed = [
        ax + (y - ay) / (by - ay) * (bx - ax) > x
        for (ax, ay), (bx, by) in sides
        if (ay > y) != (by > y)
    ]
    return sum(crossed) % 2 == 1


ANGLE = ((0.0, 0.0), (4.0, 0.0), (4.0, 1.0), (1.0, 1.0), (1.0, 4.0), (0.0, 4.0))


@pytest.mark.parametrize("outline", [ANGLE, ANGLE[::-1]], ids=["anticlockwise", "clockwise"])
def test_an_outline_holds_what_lies_in_it_and_on_it(outline):
    for point in (
        (0.5, 0.5),
        (3.0, 0.5),
        (0.5, 3.0),
        (0.0, 0.0),
        (2.0, 1.0),
        (1.0, 1.0),
        (0.0, 2.0),
    ):
        assert holds(outline, point)
    for point in ((2.0, 2.0), (-1.0, 0.0), (5.0, 1.0), (-1.0, 4.0), (2.0, 4.0), (0.5, 5.0)):
        assert not holds(outline, point)


@given(st.floats(-5.0, 5.0), st.floats(-5.0, 5.0))
def test_a_square_holds_what_its_bounds_do(x, y):
    square = ((-1.0, -2.0), (3.0, -2.0), (3.0, 2.0), (-1.0, 2.0))
    assert holds(square, (x, y)) == (-1.0 <= x <= 3.0 and -2.0 <= y <= 2.0)
