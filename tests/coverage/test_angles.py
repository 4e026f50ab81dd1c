"""Directions through known gaps against closed forms, from a place at 300, 400, 100.

The box is 1000 x 800, panels 300 high and 2 thick (outwards), so that from there the east side is
700 away, north and south 400, west 300.
"""

import math
import re

import pytest
from boxes import LID, box, enclosed, gap_named, opening

from benchlay.coverage.angles import directions, solid_angle
from benchlay.coverage.gaps import gaps_of
from benchlay.coverage.regions import open_parts

EYE = (300.0, 400.0, 100.0)
CLOSE_DEG = 1e-6  # asked for is 0.01


def deg(y, x):
    return math.degrees(math.atan2(y, x))


def seen(text, through, eye=EYE):
    found = enclosed(text)
    return directions(eye, open_parts(found, gap_named(found, through), eye))


def only(text, through, eye=EYE):
    (one,) = seen(text, through, eye)
    return [math.degrees(a) for a in (*one.azimuth, *one.elevation)], one.solid_angle_sr


def test_a_closed_box_has_no_gap():
    assert gaps_of(enclosed(box())) == []


def test_a_missing_corner_lies_between_the_inner_edges_of_the_two_panels():
    angles, _ = only(box(south="{from: [0, 0], to: [988, 0]}"), "south/east corner")
    low = deg(-100, math.hypot(400, 688))  # the edge of the bench at its nearest
    high = deg(200, math.hypot(400, 688))  # the lid over it
    expected = [deg(-400, 688), deg(-400, 700), low, high]
    assert angles == pytest.approx(expected, abs=CLOSE_DEG)


def test_a_slot_is_narrowed_by_the_thickness_of_its_sheet():
    hole = opening("east", "{along: 420, width: 40, from_height: 130, to_height: 150}")
    angles, _ = only(box(east=hole), "east.hole")
    # near edge at the inner face, far edge at the outer one; upper edges likewise
    expected = [deg(20, 700), deg(60, 702)]
    # highest where the upper edge of the outer mouth is nearest; lowest at the farthest corner
    # of the inner one's lower edge that is not hidden: both mouths narrow the azimuth
    low = math.degrees(math.atan(30 / math.hypot(700, 60 * 700 / 702)))
    high = math.degrees(math.atan(50 / math.hypot(702, 20 * 702 / 700)))
    assert angles == pytest.approx([*expected, low, high], abs=CLOSE_DEG)


@pytest.mark.parametrize("depth", [10, 50, 300])
def test_a_duct_narrows_it_further(depth):
    hole = f"{{along: 420, width: 40, from_height: 50, to_height: 150, depth: {depth}}}"
    angles, _ = only(box(east=opening("east", hole)), "east.hole")
    assert angles[:2] == pytest.approx([deg(20, 700), deg(60, 700 + depth)], abs=CLOSE_DEG)


def test_a_duct_longer_than_it_lets_light_through_is_closed():
    # along the wall: edges at 20 and 60 beside the foot; 20/700 = 60/(700 + d) at d = 1400
    for depth, sees in ((1399, True), (1401, False)):
        hole = f"{{along: 420, width: 40, from_height: 50, to_height: 150, depth: {depth}}}"
        assert bool(seen(box(east=opening("east", hole)), "east.hole")) == sees


def test_a_round_opening_is_a_cone_seen_from_its_axis():
    hole = opening("east", "{along: 400, height: 100, diameter: 30, depth: 50}")
    angles, solid = only(box(east=hole), "east.hole")
    half = math.degrees(math.atan(15 / 750))
    assert angles == pytest.approx([-half, half, -half, half], abs=1e-4)
    exact = 2 * math.pi * (1 - math.cos(math.atan(15 / 750)))
    assert solid == pytest.approx(exact, rel=1e-6)


def test_a_round_opening_from_aside_is_the_lens_of_its_two_mouths():
    hole = opening("east", "{along: 500, height: 100, diameter: 30, depth: 50}")
    angles, _ = only(box(east=hole), "east.hole")
    assert angles[:2] == pytest.approx([deg(85, 700), deg(115, 750)], abs=1e-4)


def test_a_low_wall_is_open_between_its_edge_and_the_lid():
    angles, solid = only(
        box(north="{from: [1000, 800], to: [0, 800], to_height: 150}"), "over north"
    )
    low = deg(50, math.hypot(700, 400))  # its farther end
    expected = [deg(400, 700), deg(400, -300), low, deg(200, 400)]
    assert angles == pytest.approx(expected, abs=CLOSE_DEG)
    # Under a level edge, h above and d away, the solid angle to the horizontal from azimuth -a to b
    # off its normal is asin(t sin a / sqrt(1 + t2)) + the same of b, with t = h / d.
    a, b = math.atan(700 / 400), math.atan(300 / 400)

    def under(height):
        t = height / 400
        return sum(math.asin(t * math.sin(x) / math.sqrt(1 + t * t)) for x in (a, b))

    assert solid == pytest.approx(under(200) - under(50), rel=1e-9)


def test_a_raised_panel_is_open_between_the_bench_and_its_lower_edge():
    angles, _ = only(box(west="{from: [0, 800], to: [0, 0], from_height: 5}"), "under west")
    high = deg(-95, math.hypot(300, 400))
    expected = [deg(400, -300), 360 + deg(-400, -300), deg(-100, 300), high]
    assert angles == pytest.approx(expected, abs=CLOSE_DEG)


def test_a_lid_that_is_short_leaves_a_strip_over_a_panel():
    lid = LID.replace("[1000, 800], [0, 800]", "[1000, 790], [0, 790]")
    angles, _ = only(box(lids={"main": lid}), "over north")
    expected = [deg(390, 700), deg(390, -300), deg(200, math.hypot(700, 400)), deg(200, 390)]
    assert angles == pytest.approx(expected, abs=CLOSE_DEG)


def test_an_open_lid_is_the_whole_top():
    angles, solid = only(box(lids={"main": LID.replace("{h", "{open: yes, h")}), "lid main")
    expected = [-180, 180, deg(200, math.hypot(700, 400)), 90]
    assert angles == pytest.approx(expected, abs=CLOSE_DEG)
    # A rectangle 200 above, its corner over the eye: atan(a b / (h sqrt(a2 + b2 + h2))).
    exact = sum(
        math.atan(a * b / (200 * math.sqrt(a * a + b * b + 200**2)))
        for a, b in ((700, 400), (700, 400), (300, 400), (300, 400))
    )
    assert solid == pytest.approx(exact, rel=1e-9)


def test_without_a_lid_the_top_is_shared_by_the_panels():
    text = box(lids={})
    through = ["over east", "over north", "over south", "over west"]
    assert [gap.through for gap in gaps_of(enclosed(text))] == through
    parts = [only(text, name) for name in through]
    assert parts[0][0] == pytest.approx(
        [deg(-400, 700), deg(400, 700), deg(200, math.hypot(700, 400)), 90], abs=CLOSE_DEG
    )
    whole = only(box(lids={"main": LID.replace("{h", "{open: yes, h")}), "lid main")[1]
    assert sum(solid for _, solid in parts) == pytest.approx(whole, rel=1e-12)


def test_a_panel_that_stands_open_is_as_large_as_it_is():
    angles, _ = only(box(east="{from: [1000, 0], to: [1000, 800], open: yes}"), "east")
    assert angles == pytest.approx(
        [deg(-400, 700), deg(400, 700), deg(-100, 700), deg(200, 700)], abs=CLOSE_DEG
    )


def test_a_missing_side_is_named_by_those_beside_it():
    angles, _ = only(box(east=None), "south/north side")
    assert angles[:2] == pytest.approx([deg(-400, 700), deg(400, 700)], abs=CLOSE_DEG)


def test_a_post_in_the_middle_of_a_gap_leaves_two():
    split = box(east=None, post="{from: [900, 380], to: [900, 420]}")
    found = enclosed(split)
    ways = [one for gap in gaps_of(found) for one in directions(EYE, open_parts(found, gap, EYE))]
    dark = math.atan(20 / 600)
    assert not any(one.azimuth[0] < dark - 1e-9 and one.azimuth[1] > -dark + 1e-9 for one in ways)
    whole = sum(one.azimuth[1] - one.azimuth[0] for one in ways)
    assert whole == pytest.approx(2 * (math.atan(400 / 700) - dark), abs=1e-9)


def test_a_gap_across_the_seam_of_azimuth_is_one():
    hole = opening("west", "{along: 380, width: 40, from_height: 80, to_height: 120}")
    angles, _ = only(box(west=hole), "west.hole")
    half = deg(20, 302)
    assert angles[:2] == pytest.approx([180 - half, 180 + half], abs=CLOSE_DEG)


def test_the_bench_top_stops_light_beyond_the_panels_too():
    """The bench reaches 50 beyond the west panel: what passes under that steeply ends on it."""
    text = box(west="{from: [0, 800], to: [0, 0], from_height: 10}", lids={})
    wide = "{outline: [[-50, -900], [1000, -900], [1000, 1700], [-50, 1700]]}"
    found = enclosed(text.replace("{size: [1000, 800]}", wide))
    gap = gap_named(found, "under west")
    # From 300, what reaches the edge of the bench passes the panel at 100 x 50 / 350 = 14.
    assert open_parts(found, gap, EYE) == []
    far = (950.0, 400.0, 100.0)  # from 950 it passes at 5
    (one,) = directions(far, open_parts(found, gap, far))
    ends = [math.degrees(angle) for angle in one.elevation]
    high = deg(-90, math.hypot(950, 400))  # under the farther ends of the panel
    assert ends == pytest.approx([deg(-100, 1000), high], abs=CLOSE_DEG)


def turned(text, angle, shift):
    """Turn and shift every place in plan that is written as a pair."""
    c, s = math.cos(angle), math.sin(angle)

    def place(match):
        x, y = float(match[1]), float(match[2])
        return f"[{c * x - s * y + shift[0]!r}, {s * x + c * y + shift[1]!r}]"

    outline = text.replace("{size: [1000, 800]}", f"{{outline: {CORNERS}}}")
    return re.sub(r"\[(-?[\d.]+), (-?[\d.]+)\]", place, outline)


CORNERS = "[[0, 0], [1000, 0], [1000, 800], [0, 800]]"


@pytest.mark.parametrize("angle", [0.3, 2.0, -1.1])
def test_turning_the_whole_bench_turns_the_gaps(angle):
    hole = "{from: [0, 800], to: [0, 0], openings: {hole: {along: 90, height: 120, diameter: 60}}}"
    text = box(
        south="{from: [0, 0], to: [970, 0]}",
        north="{from: [1000, 800], to: [0, 800], from_height: 7, to_height: 260}",
        west=hole,
        lids={"a": f"{{height: 310, open: yes, outline: {CORNERS.replace('1000', '400')}}}"},
    )
    c, s = math.cos(angle), math.sin(angle)
    shift = (120.0, -450.0)
    x, y, z = EYE
    eye = (c * x - s * y + shift[0], s * x + c * y + shift[1], z)
    first, second = enclosed(text), enclosed(turned(text, angle, shift))
    assert [g.through for g in gaps_of(first)] == [g.through for g in gaps_of(second)]
    for one, other in zip(gaps_of(first), gaps_of(second), strict=True):
        assert other.width_mm == pytest.approx(one.width_mm, abs=1e-6)
        ways, then = (
            sorted(directions(at, open_parts(whole, gap, at)), key=lambda d: d.solid_angle_sr)
            for whole, gap, at in ((first, one, EYE), (second, other, eye))
        )
        assert len(ways) == len(then)
        for way, after in zip(ways, then, strict=True):
            assert after.solid_angle_sr == pytest.approx(way.solid_angle_sr, rel=1e-7)
            assert after.elevation == pytest.approx(way.elevation, abs=1e-7)
            if way.azimuth == (-math.pi, math.pi):
                assert after.azimuth == way.azimuth  # all round
                continue
            off = (after.azimuth[0] - way.azimuth[0] - angle + math.pi) % (2 * math.pi)
            assert off - math.pi == pytest.approx(0.0, abs=1e-7)


def test_the_solid_angle_of_an_octant():
    assert solid_angle([(1, 0, 0), (0, 1, 0), (0, 0, 1)]) == pytest.approx(math.pi / 2, rel=1e-15)
