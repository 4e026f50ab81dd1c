"""Faults against angles and ranges that are worked out by hand."""

from math import asin, atan, atan2, cos, degrees, radians, sin, tan

import numpy as np
import pytest

from benchlay.faults.batches import Tracer, Variant
from benchlay.faults.families import families

MIRROR = (
    "elements:\n  M1: {kind: mirror, at: %s, facing: %s, diameter: 25.4, reflectance: 100 %%}\n"
)
WALL = """\
enclosure:
  panels:
    far: {from: %s, to: %s%s}
    near: {from: %s, to: %s}
"""


def leaving(placed, family, setting):
    """Return the directions in which beams leave an element at a setting of a fault."""
    tracer = Tracer(placed)
    variant = Variant(family.made(setting), None)
    ((_, context),) = tracer.contexts([variant])
    beams, scene = context.trace.beams, context.trace.scene
    own = scene.elements.index(family.element)
    mine = (beams.start.owner == own) & (beams.start.within < 0) & (beams.start.event > 0)
    mine &= beams.start.variant == len(placed.states)
    return beams.start.direction[mine], beams.start.power[mine]


def family_of(placed, words):
    return next(one for one in families(placed, (0,)) if words in one.name(0.1))


@pytest.mark.parametrize(
    ("facing", "lift"), [(180, 8.0), (135, degrees(asin(cos(radians(45)) * sin(radians(8)))))]
)
def test_a_knocked_mirror_lifts_its_beam(bench, facing, lift):
    placed = bench(MIRROR % ("[1000, 1000]", facing))
    directions, _ = leaving(placed, family_of(placed, "M1 pitch"), radians(4))
    assert degrees(asin(directions[0, 2])) == pytest.approx(lift, abs=1e-9)
    assert lift == pytest.approx({180: 8.00, 135: 5.65}[facing], abs=0.005)


def test_yaw_turns_the_beam_twice_as_far(bench):
    placed = bench(MIRROR % ("[1000, 1000]", 135))
    directions, _ = leaving(placed, family_of(placed, "M1 yaw"), radians(4))
    heading = degrees(atan2(directions[0, 1], directions[0, 0]))
    assert heading == pytest.approx(98.0, abs=1e-9)


@pytest.mark.parametrize("roll", [30, -30, 75, 150])
def test_a_rolled_cube_sends_its_rejected_beam_up_by_as_much(bench, roll):
    placed = bench(
        "elements:\n  PBS: {kind: cube, after: red, distance: 500, faces: 0.01 %,\n"
        "        reflectance: {s: 100 %, p: 0 %}}\n"
    )
    directions, power = leaving(placed, family_of(placed, "PBS rolled"), radians(roll))
    upright = [d for d, p in zip(directions, power, strict=True) if abs(d[0]) < 1e-6 and p > 1e-3]
    climbs = degrees(asin(upright[0][2]))
    assert abs(climbs) == pytest.approx(min(abs(roll), 180 - abs(roll)), abs=1e-9)
    # Anticlockwise seen from where the beam goes to: what was sent left goes down, then right.
    assert np.sign(upright[0][2]) == np.sign(roll)


# The panel of 300 stands beyond the mirror's beam, which runs 100 above the bench.
@pytest.mark.parametrize(
    ("facing", "distance", "over"),
    [(180, 1424, True), (180, 1422, False), (135, 2025, True), (135, 2000, False)],
)
def test_where_a_panel_is_overshot(reviewed, named, facing, distance, over):
    if facing == 180:  # back along the beam, over where it comes from
        x = 2500 - distance
        ends = (f"[{x}, 2000]", f"[{x}, 0]", "", "[2600, 0]", "[2600, 2000]")
        body, head = MIRROR % ("[2500, 1000]", facing), {"at": f"[{x + 50}, 1000]"}
    else:
        ends = (
            f"[3000, {500 + distance}]", f"[0, {500 + distance}]", "", "[0, 400]", "[3000, 400]",
        )  # fmt: skip
        body, head = MIRROR % ("[1000, 500]", facing), {"at": "[500, 500]"}
    review = reviewed(body + WALL % ends, **head)
    fault = named(review, "M1", "pitch")
    escapes = [light for light in fault.lights if light.through == "over far"]
    assert bool(escapes and fault.outcome == "escape") == over
    if not over:
        return
    low = degrees(fault.range_of_worst.low_rad)
    assert fault.name == "M1 pitch +4°"
    assert low == pytest.approx(degrees(lowest(facing, distance)), abs=1e-3)
    assert degrees(fault.range_of_worst.high_rad) == pytest.approx(4.0, abs=1e-12)
    assert fault.worst.at[2] > 300.0


def lowest(facing, distance):
    """The pitch at which a beam just clears 200 more than its height, by bisection."""
    low, high = 0.0, radians(4)
    for _ in range(60):
        pitch = (low + high) / 2
        yaw = radians(facing)
        n = np.array([cos(pitch) * cos(yaw), cos(pitch) * sin(yaw), sin(pitch)])
        k = np.array([1.0, 0, 0]) - 2 * n[0] * n
        run = -k[0] if facing == 180 else k[1]
        low, high = (pitch, high) if distance * k[2] / run < 200.0 else (low, pitch)
    return high


def test_the_distances_are_those_of_the_trade():
    assert 200 / tan(radians(8)) == pytest.approx(1423, abs=1)
    assert 200 / tan(asin(cos(radians(45)) * sin(radians(8)))) == pytest.approx(2022, abs=1)


@pytest.mark.parametrize("slot", [1400.0, 1100.25, 1533.3])
def test_a_slot_of_3_mm_is_found_by_a_knocked_mirror(reviewed, named, slot):
    heights = "from_height: 50, to_height: 150"
    opening = f", openings: {{slot: {{along: {3000 - slot - 3}, width: 3, {heights}}}}}"
    ends = ("[3000, 2500]", "[0, 2500]", opening, "[0, 0]", "[3000, 0]")
    body = MIRROR % ("[1300, 500]", 135)
    review = reviewed(body + WALL % ends, at="[500, 500]")
    fault = named(review, "M1", "yaw")
    assert fault.outcome == "escape"
    assert fault.worst.through == "far/slot"
    # The beam goes up the plan and is turned by twice the yaw, anticlockwise.
    turns = sorted(-degrees(atan((x - 1300.0) / 2000.0)) / 2 for x in (slot, slot + 3))
    low, high = (degrees(x) for x in fault.ranges[0])
    # What passes the sheet, 2 mm thick, must clear both its faces.
    assert low == pytest.approx(turns[0], abs=5e-3)
    assert high == pytest.approx(turns[1], abs=5e-3)
    assert low >= turns[0] - 1e-3
    assert high <= turns[1] + 1e-3
    assert fault.worst.at == pytest.approx((slot + 1.5, 2500, 100), abs=1.6)


def test_a_slot_out_of_reach_is_not(reviewed, named):
    opening = ", openings: {slot: {along: 1000, width: 3, from_height: 50, to_height: 150}}"
    ends = ("[3000, 2500]", "[0, 2500]", opening, "[0, 0]", "[3000, 0]")
    review = reviewed(MIRROR % ("[1300, 500]", 135) + WALL % ends, at="[500, 500]")
    assert named(review, "M1", "yaw").outcome != "escape"


def test_how_near_the_ends_of_ranges_are_known_is_said_for_what_ends_inside_too(reviewed, named):
    """A post 60 wide stands 1000 on, beside the beam: knocks from 1.7 to 3.4 degrees send it there.

    Nothing gets out, so nothing is halved: the ends are known to within the first settings.
    """
    post = (
        "  P1: {kind: obstacle, at: [1300, 1500], facing: 0, from_height: 0, to_height: 200,\n"
        "       outline: [[60, 0], [120, 0], [120, 60], [60, 60]]}\n"
    )
    walls = WALL % ("[3000, 2500]", "[0, 2500]", "", "[0, 0]", "[3000, 0]")
    review = reviewed(MIRROR % ("[1300, 500]", 135) + post + walls, at="[500, 500]")
    fault = named(review, "M1", "yaw")
    assert fault.outcome == "stray"
    low, high = fault.range_of_worst
    # The beam is turned by twice the yaw, clockwise: it meets the post from 60 to 120 aside.
    edges = sorted(-atan(x / 1000.0) / 2 for x in (60.0, 120.0))
    assert edges[0] <= low <= high <= edges[1]
    doubt = max(low - edges[0], edges[1] - high)
    assert radians(1e-3) < doubt <= fault.open_rad <= review.stray_open_rad
    assert review.open_rad < radians(1e-3)
