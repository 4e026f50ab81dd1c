"""What only looks open has no gap, or none that is seen; and what is open by little has one."""

import pytest
from boxes import LID, PANELS, box, enclosed, gap_named, opening

from benchlay.coverage.gaps import LEAST_MM, gaps_of
from benchlay.coverage.regions import open_parts

EYES = [
    (x, y, z)
    for x in (4.0, 300.0, 640.0, 996.0)
    for y in (1.0, 410.0, 799.0)
    for z in (20.0, 250.0)
]


def seen(text):
    found = enclosed(text)
    return {gap.through for gap in gaps_of(found) for eye in EYES if open_parts(found, gap, eye)}


SHUT = {
    "panels that meet": box(),
    "a butt joint over the south panel's edge": box(east="{from: [1000, -2], to: [1000, 800]}"),
    "a south panel over the east panel's edge": box(south="{from: [0, 0], to: [1002, 0]}"),
    "panels that cross": box(south="{from: [-20, 0], to: [1030, 0]}"),
    "two panels in one line": box(
        south="{from: [0, 0], to: [400, 0]}", s2="{from: [400, 0], to: [1000, 0]}"
    ),
    "two panels that overlap face to face": box(
        south="{from: [0, 0], to: [450, 0]}",
        s2="{from: [400, -2], to: [1000, -2]}",
        east="{from: [1000, -2], to: [1000, 800]}",
    )
    .replace("{size: [1000, 800]}", "{outline: [[0, -4], [1000, -4], [1000, 800], [0, 800]]}")
    .replace("[[0, 0], [1000, 0]", "[[0, -4], [1000, -4]"),
    "folded ends": box(
        south=PANELS["south"][:-1] + ", ends: {start: folded, end: folded}, fold: {flange: 20}}"
    ),
    "sums that are no round numbers": box(
        south="{from: [0, 0], to: [0.3, 0]}",
        s2=f"{{from: [{0.1 + 0.2!r}, 0], to: [1000, 0]}}",
    ),
    "a lid above that reaches beyond": box(
        lids={"main": LID.replace("[[0, 0], [1000, 0]", "[[-20, -20], [1020, -20]")}
    ),
    "two lids side by side": box(
        lids={
            "west": "{height: 300, outline: [[0, 0], [500, 0], [500, 800], [0, 800]]}",
            "east": "{height: 300, outline: [[500, 0], [1000, 0], [1000, 800], [500, 800]]}",
        }
    ),
    "a lid between panels that stand higher": box(lids={"main": LID.replace("300", "280")}),
    "an opening behind a sheet that overlaps it": box(
        east=opening("east", "{along: 400, width: 40, from_height: 0, to_height: 40}"),
        cover="{from: [997, 60], to: [997, 790], to_height: 300}",
    ),
}


@pytest.mark.parametrize("what", SHUT)
def test_near_misses_do_not_fire(what):
    assert seen(SHUT[what]) == set()


OPEN = {
    "a slot of 3 between two panels": (
        box(south="{from: [0, 0], to: [400, 0]}", s2="{from: [403, 0], to: [1000, 0]}"),
        {"south/s2 joint"},
    ),
    "two panels that overlap 20 apart, seen along the gap": (
        box(
            south="{from: [0, 0], to: [600, 0]}",
            s2="{from: [500, -20], to: [1000, -20]}",
            east="{from: [1000, -20], to: [1000, 800]}",
        )
        .replace("{size: [1000, 800]}", "{outline: [[0, -30], [1000, -30], [1000, 800], [0, 800]]}")
        .replace("[[0, 0], [1000, 0]", "[[0, -30], [1000, -30]"),
        {"south/s2 joint"},
    ),
    "a sheet before an opening that does not reach": (
        box(
            east=opening("east", "{along: 400, width: 40, from_height: 0, to_height: 40}"),
            cover="{from: [990, 398], to: [990, 442], to_height: 300}",
        ),
        {"east.hole"},
    ),
    "a lid higher than the panels": (
        box(lids={"main": LID.replace("300", "303")}),
        {"over east", "over north", "over south", "over west"},
    ),
    "a panel beside the bench": (
        box(
            east="{from: [1003, 0], to: [1003, 800]}",
            south="{from: [0, 0], to: [1003, 0]}",
            north="{from: [1003, 800], to: [0, 800]}",
            lids={"main": LID.replace("1000", "1003")},
        ),
        {"under east"},
    ),
}


@pytest.mark.parametrize("what", OPEN)
def test_what_is_open_by_little_is_found(what):
    text, through = OPEN[what]
    assert seen(text) == through


@pytest.mark.parametrize(("width", "fires"), [(0.99, False), (1.0, False), (1.01, True)])
def test_the_least_gap(width, fires):
    end = 1000 - width * LEAST_MM
    text = box(south=f"{{from: [0, 0], to: [{end!r}, 0]}}")
    assert bool(gaps_of(enclosed(text))) == fires


def test_a_wall_of_the_room_closes_a_side_where_the_panels_end_at_it():
    room = "room: {outline: [[-900, -900], [1000.2, -900], [1000.2, 1700], [-900, 1700]]}\n"
    assert seen(box(east=None, room=room)) == set()
    away = room.replace("1000.2", "1001")
    assert seen(box(east=None, room=away)) == {"south/north side"}


def test_fewer_than_two_panels_are_one_gap_round_the_bench():
    text = box(south=None, east=None, north=None, lids={})
    (gap,) = gaps_of(enclosed(text))
    assert (gap.through, gap.sheets) == ("bench edge", ("west",))
    assert open_parts(enclosed(text), gap, (300.0, 400.0, 100.0))


@pytest.mark.parametrize(
    ("panels", "through", "at", "width"),
    [
        ({"south": "{from: [0, 0], to: [988, 0]}"}, "south/east corner", (994, 0, 150), 12),
        (
            {"west": opening("west", "{along: 100, width: 60, from_height: 10, to_height: 30}")},
            "west.hole",
            (0, 670, 20),
            20,
        ),
        ({"north": f"{PANELS['north'][:-1]}, to_height: 210}}"}, "over north", (500, 800, 255), 90),
        ({"north": f"{PANELS['north'][:-1]}, from_height: 8}}"}, "under north", (500, 800, 4), 8),
        ({"east": f"{PANELS['east'][:-1]}, open: yes}}"}, "east", (1000, 400, 150), 800),
    ],
)
def test_where_a_gap_is_and_how_wide(panels, through, at, width):
    gap = gap_named(enclosed(box(**panels)), through)
    assert gap.at == pytest.approx(at, abs=1e-9)
    assert gap.width_mm == pytest.approx(width, abs=1e-9)


def test_panels_drawn_the_wrong_way_round_are_open_where_they_are():
    turned = {
        "south": "{from: [1000, 0], to: [0, 0]}",
        "west": "{from: [0, 0], to: [0, 800]}",
        "north": "{from: [0, 800], to: [1000, 800]}",
        "east": "{from: [1000, 800], to: [1000, 0]}",
    }
    assert seen(box(**turned)) == set()
    assert seen(box(**turned, lids={})) == {"over east", "over north", "over south", "over west"}
    short = LID.replace("[1000, 800], [0, 800]", "[1000, 790], [0, 790]")
    assert seen(box(**turned, lids={"main": short})) == {"over north"}
