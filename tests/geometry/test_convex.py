"""Convex polygons against a library for polygons, which the checks do without."""

import numpy as np
import pytest
import shapely
from hypothesis import given, settings
from hypothesis import strategies as st

from benchlay.geometry.convex import area, between, centroid, common, distance, distances, hull

SQUARE = np.array([[0.0, 0.0], [2.0, 0.0], [2.0, 2.0], [0.0, 2.0]])


def moved(x, y):
    return SQUARE + np.array([x, y])


@st.composite
def clouds(draw, around=0.0):
    seed = draw(st.integers(0, 2**32 - 1))
    made = np.random.default_rng(seed)
    points = made.normal(size=(draw(st.integers(3, 40)), 2)) * made.uniform(1.0, 60.0, 2)
    return points + made.uniform(-around, around, 2)


@settings(max_examples=60, deadline=None)
@given(clouds())
def test_the_hull_is_that_of_the_library(points):
    ours, theirs = hull(points), shapely.convex_hull(shapely.multipoints(points))
    assert shapely.equals(shapely.Polygon(ours), theirs)
    assert area(ours) == pytest.approx(shapely.area(theirs), rel=1e-9)
    assert centroid(ours) == pytest.approx(tuple(shapely.get_coordinates(theirs.centroid)[0]))


def test_a_hull_leaves_out_what_lies_on_a_side_or_twice():
    beside = np.array([[1.0, 0.0], [2.0, 1.0], [1.0, 1.0], [0.0, 0.0]])
    np.testing.assert_array_equal(hull(np.concatenate((SQUARE, beside))), SQUARE)


@settings(max_examples=100, deadline=None)
@given(clouds(), clouds(around=200.0))
def test_distance_and_common_part_are_those_of_the_library(first, second):
    a, b = hull(first), hull(second)
    theirs = shapely.Polygon(a), shapely.Polygon(b)
    shared = shapely.intersection(*theirs)
    assert distance(a, b) == pytest.approx(shapely.distance(*theirs), abs=1e-9)
    assert area(common(a, b)) == pytest.approx(shapely.area(shared), abs=1e-6)
    if shapely.area(shared) > 1.0:
        ours = common(a, b)
        box = (*ours.min(axis=0), *ours.max(axis=0))
        assert box == pytest.approx(shapely.bounds(shared), abs=1e-6)
        assert centroid(ours) == pytest.approx((shared.centroid.x, shared.centroid.y), abs=1e-6)
    elif distance(a, b) > 0.0:
        ends = shapely.get_coordinates(shapely.shortest_line(*theirs))
        assert between(a, b) == pytest.approx(tuple(ends.mean(axis=0)), abs=1e-6)


@settings(max_examples=60, deadline=None)
@given(clouds(), clouds(around=100.0))
def test_distances_of_points_are_those_of_the_library(cloud, points):
    theirs = shapely.distance(shapely.points(points), shapely.Polygon(hull(cloud)))
    np.testing.assert_allclose(distances(points, hull(cloud)), theirs, atol=1e-9)


def test_what_touches_is_at_no_distance_and_shares_no_area():
    beside = moved(2.0, 1.0)
    assert distance(SQUARE, beside) == 0.0
    assert area(common(SQUARE, beside)) == 0.0
    assert centroid(common(SQUARE, beside)) == (2.0, 1.5)  # the middle of the shared side
    assert distance(SQUARE, moved(2.0, 2.0)) == 0.0
    assert centroid(common(SQUARE, moved(2.0, 2.0))) == (2.0, 2.0)


def test_parallel_sides_are_nearest_in_the_middle_of_where_they_face_each_other():
    assert between(SQUARE, moved(3.0, 1.0)) == (2.5, 1.5)
