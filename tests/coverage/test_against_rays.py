"""The open directions of made-up enclosures against rays thrown every way at boxes.

The referee knows the sheets as boxes along the axes and openings as boxes cut out of them, meets
them by the slab method, and counts the rays that meet none. What is open must have the solid angle
that this share says, and lie where the rays that got out do.
"""

import math

import numpy as np
import pytest
from boxes import box, enclosed

from benchlay.coverage.angles import directions
from benchlay.coverage.gaps import gaps_of
from benchlay.coverage.regions import open_parts

RAYS = 40_000


def rays(count, seed):
    """Directions spread evenly over the sphere."""
    dice = np.random.default_rng(seed)
    z = dice.uniform(-1, 1, count)
    turn = dice.uniform(-math.pi, math.pi, count)
    flat = np.sqrt(1 - z * z)
    return np.stack((flat * np.cos(turn), flat * np.sin(turn), z), axis=1)


def span(eye, ways, solid):
    """From where to where along each ray it is inside a box."""
    low, high = np.array(solid, dtype=float)[::2], np.array(solid, dtype=float)[1::2]
    with np.errstate(divide="ignore", invalid="ignore"):
        one, other = (low - eye) / ways, (high - eye) / ways
    enter = np.nanmax(np.minimum(one, other), axis=1)
    leave = np.nanmin(np.maximum(one, other), axis=1)
    return enter, leave


def stopped(eye, ways, sheets):
    """Which rays meet a sheet other than wholly within one of its holes."""
    out = np.zeros(len(ways), dtype=bool)
    for solid, holes in sheets:
        enter, leave = span(eye, ways, solid)
        met = (enter < leave) & (leave > 0)
        for hole in holes:
            first, last = span(eye, ways, hole)
            met &= ~((first <= np.maximum(enter, 0) + 1e-9) & (last >= leave - 1e-9))
        out |= met
    return out


BENCH = ((0, 1000, 0, 800, -50, 0), ())
SOUTH = ((0, 1000, -2, 0, 0, 300), ())
EAST = ((1000, 1002, 0, 800, 0, 300), ())
NORTH = ((0, 1000, 800, 802, 0, 300), ())
WEST = ((-2, 0, 0, 800, 0, 300), ())
LID = ((0, 1000, 0, 800, 300, 302), ())
FULL = {"bench": BENCH, "south": SOUTH, "east": EAST, "north": NORTH, "west": WEST, "lid": LID}

CASES = {
    "no lid": (box(lids={}), {"lid": None}),
    "a low wall and a short lid": (
        box(
            north="{from: [1000, 800], to: [0, 800], to_height: 120}",
            lids={"main": "{height: 300, outline: [[0, 0], [900, 0], [900, 800], [0, 800]]}"},
        ),
        {
            "north": ((0, 1000, 800, 802, 0, 120), ()),
            "lid": ((0, 900, 0, 800, 300, 302), ()),
        },
    ),
    "openings, one of them with a sheet before it": (
        box(
            east="{from: [1000, 0], to: [1000, 800], openings: {"
            "a: {along: 100, width: 200, from_height: 50, to_height: 250}, "
            "b: {along: 500, width: 150, from_height: 0, to_height: 300}}}",
            cover="{from: [900, 450], to: [900, 600], to_height: 180}",
        ),
        {
            "east": (
                (1000, 1002, 0, 800, 0, 300),
                ((999, 1003, 100, 300, 50, 250), (999, 1003, 500, 650, 0, 300)),
            ),
            "cover": ((900, 902, 450, 600, 0, 180), ()),
        },
    ),
    "a lid lower than the panels, open, and one that stays": (
        box(
            lids={
                "a": "{height: 250, open: yes, outline: [[0, 0], [600, 0], [600, 800], [0, 800]]}",
                "b": "{height: 280, outline: [[600, 0], [1000, 0], [1000, 800], [600, 800]]}",
            }
        ),
        {"lid": ((600, 1000, 0, 800, 280, 282), ())},
    ),
    "a corner off, sheets that overlap outside, nothing below": (
        box(
            south="{from: [0, 0], to: [700, 0], from_height: 20}",
            s2="{from: [600, -60], to: [1000, -60]}",
            east="{from: [1000, -60], to: [1000, 650]}",
        ),
        {
            "south": ((0, 700, -2, 0, 20, 300), ()),
            "s2": ((600, 1000, -62, -60, 0, 300), ()),
            "east": ((1000, 1002, -60, 650, 0, 300), ()),
        },
    ),
    "a notch: the line is not convex": (
        box(
            north="{from: [1000, 800], to: [500, 800]}",
            n2="{from: [500, 800], to: [500, 400]}",
            n3="{from: [500, 400], to: [0, 400], to_height: 200}",
            west="{from: [0, 400], to: [0, 0], openings: {a: {along: 50, width: 100, "
            "from_height: 20, to_height: 220}}}",
            lids={},
        ),
        {
            "north": ((500, 1000, 800, 802, 0, 300), ()),
            # its outside is to the west, n3's to the north
            "n2": ((498, 500, 400, 800, 0, 300), ()),
            "n3": ((0, 500, 400, 402, 0, 200), ()),
            "west": ((-2, 0, 0, 400, 0, 300), ((-3, 1, 250, 350, 20, 220),)),
            "lid": None,
        },
    ),
}
EYES = [(300.0, 300.0, 100.0), (870.0, 610.0, 40.0), (640.0, 90.0, 210.0)]


@pytest.mark.parametrize("eye", EYES)
@pytest.mark.parametrize("what", CASES)
def test_what_is_open_is_what_rays_get_out_of(what, eye):
    text, sheets = CASES[what]
    sheets = [sheet for sheet in {**FULL, **sheets}.values() if sheet]
    ways = rays(RAYS, 7)
    free = ways[~stopped(np.array(eye), ways, sheets)]
    found = enclosed(text)
    open_ = [one for gap in gaps_of(found) for one in directions(eye, open_parts(found, gap, eye))]
    share = sum(one.solid_angle_sr for one in open_) / (4 * math.pi)
    spread = math.sqrt(max(share * (1 - share), 1 / RAYS) / RAYS)
    assert len(free) / RAYS == pytest.approx(share, abs=5 * spread)
    for x, y, z in free.tolist():
        assert any(_holds(one, math.atan2(y, x), math.asin(z)) for one in open_), (x, y, z)


def _holds(one, azimuth, elevation):
    low, high = one.azimuth
    turns = (azimuth - low) % (2 * math.pi)
    return turns <= high - low + 1e-9 and (
        one.elevation[0] - 1e-9 <= elevation <= one.elevation[1] + 1e-9
    )
