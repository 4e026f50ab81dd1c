"""Other opaque bodies."""

import pytest

from benchlay.elements.mount import NO_MOUNT, holder
from tests.geometry.solid_checks import assert_convex_and_outward, volume

ELL = "[[0, 0], [60, 0], [60, 20], [20, 20], [20, 60], [0, 60]]"
SQUARE = "[[0, 0], [20, 0], [20, 20], [0, 20]]"


def test_defaults(make):
    made = make(f"kind: obstacle, outline: {SQUARE}, to_height: 50")
    assert (made.from_height_mm, made.material) == (0.0, None)
    assert not made.MOUNTED
    assert not made.DARK_MATTERS


@pytest.mark.parametrize(
    "outline", [ELL, "[[0, 60], [20, 60], [20, 20], [60, 20], [60, 0], [0, 0]]"]
)
def test_it_fills_its_outline_between_its_heights_either_way_round(make, outline):
    geometry = make(
        f"kind: obstacle, outline: {outline}, from_height: 10, to_height: 30"
    ).geometry()
    for solid in geometry.solids:
        assert_convex_and_outward(solid)
        assert solid.upright
        assert {z for _, _, z in solid.points} == {10.0, 30.0}
    assert sum(map(volume, geometry.solids)) == pytest.approx(2000.0 * 20.0)
    (stroke,) = geometry.strokes
    assert stroke.closed
    assert len(stroke.points) == 6


def held(make, keys, mount=None):
    record = make(f"kind: obstacle, outline: {SQUARE}, {keys}")
    return holder(record, record.geometry(), mount, 100.0)


def test_on_the_bench_it_needs_no_post(make):
    assert held(make, "to_height: 50").upright == ()
    assert held(make, "from_height: -5, to_height: 50").upright == ()


def test_above_the_bench_it_stands_on_a_post(make):
    (post,) = held(make, "from_height: 70, to_height: 120").upright
    assert post.points[0] == (10.0, 10.0, 70.0)
    assert post.points[3] == (10.0, 10.0, 0.0)


def test_hung_up_it_needs_none(make):
    assert held(make, "from_height: 70, to_height: 120", NO_MOUNT).upright == ()


def test_an_ell_has_its_post_inside(make):
    record = make(f"kind: obstacle, outline: {ELL}, from_height: 40, to_height: 50")
    x, y = record.geometry().post_at
    assert 0.0 < x < 60.0
    assert 0.0 < y < 60.0
    assert x < 20.0 or y < 20.0


@pytest.mark.parametrize(
    ("keys", "problem"),
    [
        (
            f"outline: {SQUARE}, from_height: 50, to_height: 50",
            (
                "the upper side at 50 mm is not above the lower one at 50 mm",
                "'to_height' above 'from_height'",
                "set 'to_height' to 51 or more",
            ),
        ),
        (
            "outline: [[0, 0], [1, 1], [1, 0], [0, 1]], to_height: 50",
            (
                "the outline crosses itself or encloses nothing",
                "corners in order round the body",
                "put the corners in order",
            ),
        ),
        (
            "outline: [[0, 0], [1, 1]], to_height: 50",
            (
                "outline: a list of 2 is not what is read here",
                "a list of at least 3, each item a list of 2, each a length in mm or with its "
                "unit (nm um mm m cm in ft)",
                "write it in that form, such as [[25, 25], [25, 25], [25, 25]]",
            ),
        ),
    ],
)
def test_says_what_is_wrong(complaints, keys, problem):
    assert complaints(f"kind: obstacle, {keys}") == [problem]
