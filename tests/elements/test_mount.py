"""Mounts: boxes from the front plane backwards, posts and feet."""

from math import radians

import numpy as np
import pytest

from benchlay.elements.mount import DEFAULT_MOUNT, MOUNT, NO_MOUNT, NOTHING, Mount, holder
from tests.geometry.solid_checks import assert_convex_and_outward

KEYS = (
    "'width', 'depth', 'height', 'post', 'post_diameter', 'foot', 'slots', 'optic_height', "
    "'adjusters'"
)


def bounds(solid):
    """Return lowest and highest of x, y and z of a box."""
    points = np.array(solid.points)
    return points.min(axis=0).tolist(), points.max(axis=0).tolist()


@pytest.fixture
def held(make):
    def hold(keys, mount=None, height_mm=100.0):
        record = make(keys)
        return holder(record, record.geometry(), mount, height_mm)

    return hold


def test_the_default_round_mount(held):
    """14 wider and higher, 12 deeper than the optic, post in the middle of the depth."""
    box, upright, at = held("kind: mirror, diameter: 25.4, metal: gold")
    assert bounds(box) == ([-18.0, -19.7, -19.7], [0.0, 19.7, 19.7])
    assert box.part == "mount"
    assert not box.upright
    assert at == (-9.0, 0.0)
    post, foot = upright
    assert post.cylinder == (0, 3, 6.35)
    assert post.points[0] == (-9.0, 0.0, pytest.approx(100.0 - 19.7))
    assert post.points[3] == (-9.0, 0.0, 0.0)
    assert bounds(foot) == ([-46.5, -25.0, 0.0], [28.5, 25.0, 10.0])
    assert post.upright
    assert foot.upright
    for solid in (box, *upright):
        assert_convex_and_outward(solid)


def test_the_mount_of_a_lens_begins_in_the_plane_where_the_lens_acts(held):
    box, _, at = held("kind: lens, diameter: 25.4, focal: 100, thickness: 4")
    assert bounds(box)[0][0] == -16.0
    assert bounds(box)[1][0] == 0.0
    assert at == (-8.0, 0.0)


@pytest.mark.parametrize(("diameter", "fits"), [(50, True), (50.01, False)])
def test_the_default_is_for_round_optics_up_to_fifty(held, diameter, fits):
    got = held(f"kind: mirror, diameter: {diameter}, metal: gold")
    assert (got.box is not None) == fits
    assert (got == NOTHING) == (not fits)


@pytest.mark.parametrize(
    "keys",
    [
        "kind: mirror, size: [20, 20], metal: gold",
        "kind: cube, reflectance: 50 %",
        "kind: screen",
        "kind: aperture, opening: 3",
        "kind: shutter",
    ],
)
def test_there_is_no_default_for_others(held, keys):
    assert held(keys) == NOTHING


def test_what_is_not_round_is_held_when_asked(held):
    box, upright, _ = held("kind: cube, reflectance: 50 %, side: 20", Mount())
    assert bounds(box) == ([-22.0, -17.0, -17.0], [10.0, 17.0, 17.0])
    assert [solid.part for solid in upright] == ["post", "foot"]


def test_none_means_neither_box_nor_post_nor_foot(held):
    for keys in ("kind: mirror, diameter: 20, metal: gold", "kind: target", "kind: dump"):
        assert held(keys, NO_MOUNT) == NOTHING


def test_written_sizes_count(held):
    mount = Mount(
        width_mm=40.0,
        depth_mm=30.0,
        height_mm=50.0,
        post_mm=(-20.0, 5.0),
        post_diameter_mm=20.0,
        foot_mm=(60.0, 70.0),
        optic_height_mm=20.0,
    )
    box, (post, foot), at = held("kind: mirror, diameter: 25.4, metal: gold", mount)
    assert bounds(box) == ([-30.0, -20.0, -20.0], [0.0, 20.0, 30.0])
    assert at == (-20.0, 5.0)
    assert post.cylinder[2] == 10.0
    assert post.points[0] == (-20.0, 5.0, 80.0)
    assert bounds(foot) == ([-55.0, -25.0, 0.0], [15.0, 35.0, 10.0])


def test_the_post_stays_in_the_middle_of_the_depth_written(held):
    assert held("kind: mirror, diameter: 20, metal: gold", Mount(depth_mm=30.0)).post_mm == (
        -15.0,
        0.0,
    )


def test_a_box_that_reaches_the_bench_needs_no_post(held):
    keys = "kind: mirror, diameter: 26, metal: gold"
    assert held(keys, height_mm=20.0).upright == ()
    post, foot = held(keys, height_mm=26.0).upright
    assert post.points[0][2] == 6.0
    assert bounds(foot)[1][2] == 6.0  # a foot thicker than the post is high would enter the box


@pytest.mark.parametrize("keys", ["kind: target, size: [40, 30]", "kind: dump, opening: 20"])
def test_bodies_have_a_post_and_no_box_or_foot(held, keys):
    box, upright, at = held(keys)
    assert box is None
    assert [solid.part for solid in upright] == ["post"]
    assert upright[0].points[0] == (*at, 85.0)


def test_a_body_has_a_foot_where_one_is_written(make, read_text):
    element, problems = read_text(
        "T1: {kind: target, at: [0, 0], facing: 0, mount: {foot: [50, 75]}}"
    )
    assert problems == []
    _, upright, _ = holder(element.record, element.record.geometry(), element.mount, 100.0)
    assert [solid.part for solid in upright] == ["post", "foot"]


def test_a_mount_is_read_with_its_defaults(read_text):
    element, problems = read_text(
        "M1: {kind: mirror, at: [0, 0], facing: 0, diameter: 20, metal: gold, mount: {}}"
    )
    assert problems == []
    assert element.mount == DEFAULT_MOUNT
    assert DEFAULT_MOUNT.foot_mm == (50.0, 75.0)
    assert DEFAULT_MOUNT.post_diameter_mm == 12.7
    assert DEFAULT_MOUNT.adjusters == "back"
    assert radians(4.0) == DEFAULT_MOUNT.range_rad


def test_none_is_read_as_no_mount(read_text):
    element, problems = read_text(
        "M1: {kind: mirror, at: [0, 0], facing: 0, diameter: 20, metal: gold, mount: none}"
    )
    assert problems == []
    assert element.mount is NO_MOUNT
    assert MOUNT.show(NO_MOUNT) == "none"


@pytest.mark.parametrize(
    ("mount", "problem"),
    [
        (
            "nun",
            (
                "mount: 'nun' is not what is read here",
                f"'none'; or a table with the keys {KEYS} and 'range'",
                "write it in that form, such as 'none'",
            ),
        ),
        (
            "{widht: 4}",
            (
                "mount: 'widht' is not a key here",
                f"the keys {KEYS} or 'range'",
                "write 'width', or remove the key",
            ),
        ),
        (
            "{adjusters: front}",
            (
                "mount.adjusters: 'front' is not known here",
                "one of 'back', 'left', 'right' or 'top'",
                "write one of 'back', 'left', 'right' or 'top'",
            ),
        ),
        (
            "{height: 20, optic_height: 20}",
            (
                "mount: the optical centre, 20 mm up, lies above the box of 20 mm",
                "'optic_height' below 'height'",
                "set 'optic_height' below 20",
            ),
        ),
        (
            "{width: 0}",
            (
                "mount.width: '0' is too small",
                "a length above 0 mm, in mm or with its unit (nm um mm m cm in ft)",
                "write a value within the bounds, such as '25'",
            ),
        ),
        (
            "{width: 19.9}",
            (
                "mount: the mount's width of 19.9 mm is less than that of its optic, 20 mm",
                "'width' of at least 20",
                "set 'width' to 34, or remove it: that is the default",
            ),
        ),
        (
            "{height: 15}",
            (
                "mount: the mount's height of 15 mm is less than that of its optic, 20 mm",
                "'height' of at least 20",
                "set 'height' to 34, or remove it: that is the default",
            ),
        ),
        (
            "{optic_height: 9}",
            (
                "mount: with its centre 9 mm up the optic sticks out of the box of 34 mm",
                "'optic_height' from 10 to 24",
                "set 'optic_height' to 17, the middle, or raise 'height'",
            ),
        ),
        (
            "{height: 30, optic_height: 20.5}",
            (
                "mount: with its centre 20.5 mm up the optic sticks out of the box of 30 mm",
                "'optic_height' from 10 to 20",
                "set 'optic_height' to 15, the middle, or raise 'height'",
            ),
        ),
        (
            "nne",
            (
                "mount: 'nne' is not what is read here",
                "'none'; or a table with the keys 'width', 'depth', 'height', 'post', "
                "'post_diameter', 'foot', 'slots', 'optic_height', 'adjusters' and 'range'",
                "write it in that form, such as 'none'",
            ),
        ),
    ],
)
def test_says_what_is_wrong(complaints, mount, problem):
    assert complaints(f"kind: mirror, diameter: 20, metal: gold, mount: {mount}") == [problem]


@pytest.mark.parametrize(
    "mount",
    [
        "{width: 20, height: 20, optic_height: 10}",
        "{optic_height: 10}",
        "{optic_height: 24}",
        "none",
    ],
)
def test_a_box_may_end_where_its_optic_does(complaints, mount):
    assert complaints(f"kind: mirror, diameter: 20, metal: gold, mount: {mount}") == []


def test_sizes_in_inches_are_no_smaller_for_it(complaints):
    keys = "kind: mirror, diameter: 1 in, metal: gold, mount: {width: 25.4, height: 2.54 cm}"
    assert complaints(keys) == []


def test_what_has_no_box_needs_none_as_large(complaints):
    assert complaints("kind: dump, mount: {width: 5}") == []
