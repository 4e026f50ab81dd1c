"""Solids: convex, patches and discs facing outwards, of the right size."""

import numpy as np
import pytest

from benchlay.geometry.outline import rectangle
from benchlay.geometry.solid import box, disc, post, prism, slab
from tests.geometry.solid_checks import (
    assert_closed,
    assert_convex_and_outward,
    planes,
    rim_of,
    volume,
)

TRIANGLE = ((0.0, 0.0), (4.0, 0.0), (0.0, 3.0))


def test_a_box_lies_between_its_coordinates():
    solid = box("mount", (-12.0, 0.0), (-20.0, 20.0), (-25.0, 15.0), upright=True)
    assert_convex_and_outward(solid)
    assert_closed(solid)
    assert volume(solid) == pytest.approx(12.0 * 40.0 * 40.0)
    points = np.array(solid.points)
    assert points.min(axis=0).tolist() == [-12.0, -20.0, -25.0]
    assert points.max(axis=0).tolist() == [0.0, 20.0, 15.0]
    assert (solid.part, solid.upright, solid.holes) == ("mount", True, ())


def test_a_prism_stands_over_its_outline():
    solid = prism("body", TRIANGLE, (10.0, 15.0))
    assert_convex_and_outward(solid)
    assert_closed(solid)
    assert volume(solid) == pytest.approx(6.0 * 5.0)
    assert {z for _, _, z in solid.points} == {10.0, 15.0}
    assert not solid.upright


@pytest.mark.parametrize("slope", [(0.0, 0.0), (0.1, 0.0), (-0.1, 0.0), (0.0, 0.2), (0.0, -0.2)])
def test_a_slab_keeps_its_thickness_in_the_middle(slope):
    solid = slab("edge", rectangle(20.0, 10.0).corners, (-5.0, 0.0), slope)
    assert_convex_and_outward(solid)
    assert_closed(solid)
    assert volume(solid) == pytest.approx(20.0 * 10.0 * 5.0)
    for x, y, z in solid.points[4:]:
        assert x == pytest.approx(-5.0 - slope[0] * y - slope[1] * z)


@pytest.mark.parametrize("slope", [(0.0, 0.0), (0.1, 0.0), (-0.1, 0.0), (0.0, 0.2), (0.0, -0.2)])
def test_a_disc_is_a_cylinder_cut_by_its_back(slope):
    solid = disc("edge", 10.0, (-5.0, 0.0), slope)
    assert_convex_and_outward(solid)
    assert solid.cylinder == (0, 3, 10.0)
    for rim in (point for d in solid.discs for point in rim_of(solid, d)):
        assert np.hypot(rim[1], rim[2]) == pytest.approx(10.0)
    for x, y, z in rim_of(solid, solid.discs[1]):
        assert x == pytest.approx(-5.0 - slope[0] * y - slope[1] * z)
    front, back = (normal for normal, _ in planes(solid))
    assert front.tolist() == [1.0, 0.0, 0.0]
    assert back[0] < 0.0


def test_a_post_stands_upright_on_the_bench():
    solid = post(6.35, (-9.0, 2.0), (0.0, 60.0))
    assert_convex_and_outward(solid)
    assert solid.upright
    assert solid.part == "post"
    assert solid.points[0] == (-9.0, 2.0, 60.0)
    assert solid.points[3] == (-9.0, 2.0, 0.0)
    assert solid.cylinder == (0, 3, 6.35)
    top, foot = (normal for normal, _ in planes(solid))
    assert top.tolist() == [0.0, 0.0, 1.0]
    assert foot.tolist() == [0.0, 0.0, -1.0]
