"""Sums and differences of rectangles against shapely, and what is never computed."""

import random

import pytest
import shapely

from benchlay.making.rectilinear import Rectangle, outlines


def area(loops):
    return sum(shapely.Polygon(loop).area for loop in loops)


def test_a_notch_a_window_and_nothing_else():
    outer, inner = outlines(
        [Rectangle(0.0, 0.0, 10.0, 6.0)],
        [Rectangle(2.0, 0.0, 3.0, 1.0), Rectangle(5.0, 2.0, 7.0, 4.0)],
    )
    assert outer == (
        (
            (0.0, 0.0), (2.0, 0.0), (2.0, 1.0), (3.0, 1.0), (3.0, 0.0), (10.0, 0.0),
            (10.0, 6.0), (0.0, 6.0),
        ),
    )  # fmt: skip
    assert inner == (((5.0, 2.0), (5.0, 4.0), (7.0, 4.0), (7.0, 2.0)),)


def test_openings_that_overlap_become_one():
    outer, inner = outlines(
        [Rectangle(0.0, 0.0, 10.0, 6.0)],
        [Rectangle(2.0, 2.0, 5.0, 4.0), Rectangle(4.0, 1.0, 6.0, 3.0)],
    )
    assert len(outer) == len(inner) == 1
    assert area(inner) == 6.0 + 4.0 - 1.0


@pytest.mark.parametrize("seed", range(40))
def test_against_shapely(seed):
    dice = random.Random(seed)

    def some(count):
        for _ in range(count):
            x, y = dice.randrange(12), dice.randrange(12)
            yield Rectangle(x, y, x + dice.randrange(1, 6), y + dice.randrange(1, 6))

    added, taken = list(some(4)), list(some(4))
    outer, inner = outlines(added, taken)
    wanted = shapely.union_all([shapely.box(*r) for r in added]).difference(
        shapely.union_all([shapely.box(*r) for r in taken])
    )
    assert area(outer) - area(inner) == wanted.area
    corners = [corner for loop in (*outer, *inner) for corner in loop]
    if len(set(corners)) == len(corners):  # nothing hangs together in a corner only
        assert all(shapely.Polygon(loop).is_valid for loop in (*outer, *inner))
    assert all(shapely.LinearRing(loop).is_ccw for loop in outer)
    assert not any(shapely.LinearRing(loop).is_ccw for loop in inner)
    # Together they are the border, each piece of it once.
    lines = [shapely.LinearRing(loop) for loop in (*outer, *inner)]
    assert sum(line.length for line in lines) == wanted.length
    assert not shapely.MultiLineString(lines).symmetric_difference(wanted.boundary).length
