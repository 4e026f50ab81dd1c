"""Blanks of panels: sizes, holes and bends against what is worked out by hand."""

import math

import pytest
import shapely

RING = """
  panels:
    south: {from: [0, 0], to: [1500, 0]%s}
    east: {from: [1500, 0], to: [1500, 900]%s}
    north: {from: [1500, 900], to: [0, 900]}
    west: {from: [0, 900], to: [0, 0]}
"""
BA = math.pi / 2 * (2 + 0.33 * 2)
SHIFT = 20 - 2 * (2 + 2) + BA  # of a flange of 20, radius 2, thickness 2


def test_four_butt_panels_close_their_corners_and_two_and_two_are_alike(parts):
    made = parts(RING % ("", ""))
    assert {n: (p.names, p.blank.flat_mm) for n, p in made.items()} == {
        "east": (("east", "west"), (902.0, 300.0)),
        "north": (("north", "south"), (1502.0, 300.0)),
    }
    east = made["east"]
    assert east.mass_kg == pytest.approx(0.902 * 0.3 * 0.002 * 2700)
    assert (east.quantity, east.lacks, east.draft.remarks) == (2, (), ())


def footprint(panel, start, end, reach, thickness=2.0):
    """The plan of an unfolded panel: a rectangle from its line outwards."""
    (ax, ay), (bx, by) = start, end
    length = math.dist(start, end)
    ux, uy = (bx - ax) / length, (by - ay) / length
    a = (ax - reach[0] * ux, ay - reach[0] * uy)
    b = (bx + reach[1] * ux, by + reach[1] * uy)
    out = (uy * thickness, -ux * thickness)
    return shapely.Polygon([a, b, (b[0] + out[0], b[1] + out[1]), (a[0] + out[0], a[1] + out[1])])


def test_a_ring_of_butt_panels_leaves_no_slit_and_no_overlap(parts):
    # An L, with one corner that turns the other way: lengths from the blanks, laid out here.
    corners = [(0, 0), (600, 0), (600, 300), (300, 300), (300, 600), (0, 600)]
    names = "abcdef"
    text = "  panels:\n" + "".join(
        f"    {n}: {{from: {list(p)}, to: {list(q)}}}\n"
        for n, p, q in zip(names, corners, corners[1:] + corners[:1], strict=True)
    )
    made = parts(text)
    widths = {name: p.blank.flat_mm[0] for p in made.values() for name in p.names}
    sheets = []
    for n, (p, q) in enumerate(zip(corners, corners[1:] + corners[:1], strict=True)):
        extra = widths[names[n]] - math.dist(p, q)
        reach = (0.0, extra)
        if names[n] == "d":  # it starts at the corner that turns right, and ends at a left one
            assert extra == 0.0
            reach = (-2.0, 2.0)
        sheets.append(footprint(n, p, q, reach))
    assert sum(s.area for s in sheets) == pytest.approx(shapely.union_all(sheets).area)
    ring = shapely.union_all(sheets)
    assert ring.geom_type == "Polygon"
    assert len(ring.interiors) == 1
    assert shapely.Polygon(ring.interiors[0]).area == pytest.approx(shapely.Polygon(corners).area)


def test_a_folded_foot(parts):
    made = parts(
        "  panels:\n    wall: {from: [0, 0], to: [500, 0], fold: {flange: 20, radius: 2},\n"
        "           fix: {hole: 6.6, pitch: 150, inset: 8}}"
    )
    blank = made["wall"].blank
    assert blank.flat_mm == pytest.approx((500.0, 300.0 + SHIFT))
    assert blank.formed_mm == (500.0, 300.0)
    # The straight part of the sheet is 296 long, that of the flange 16: all but the bend.
    assert blank.flat_mm[1] == pytest.approx(296 + 16 + BA)
    (bend,) = blank.bends
    assert not bend.up
    assert bend.start == pytest.approx((0, 16 + BA / 2))
    assert bend.end == pytest.approx((500, 16 + BA / 2))
    assert [h.centre for h in blank.holes] == [(25, 8), (175, 8), (325, 8), (475, 8)]
    assert blank.area_mm2 == pytest.approx(500 * blank.flat_mm[1] - 4 * math.pi * 3.3**2)


def test_a_fold_outwards_comes_up(parts):
    made = parts(
        "  panels:\n    wall: {from: [0, 0], to: [500, 0], fold: {flange: 20, sense: out}}"
    )
    assert [bend.up for bend in made["wall"].blank.bends] == [True]


@pytest.mark.parametrize("sense", ["in", "out"])
@pytest.mark.parametrize("turn", ["left", "right"])
@pytest.mark.parametrize("folded", ["ends", "starts"])
def test_holes_of_a_folded_end_meet_those_of_its_neighbour(parts, sense, turn, folded):
    # The flange's holes are placed here in the plan by the shape it is folded to.
    side = 1 if turn == "left" else -1
    fold = f", fold: {{flange: 30, sense: {sense}}}, fix: {{hole: 5.5, pitch: 100, inset: 10}}"
    first = f"{fold}, ends: {{end: folded}}" if folded == "ends" else ""
    second = f"{fold}, ends: {{start: folded}}" if folded == "starts" else ""
    made = parts(
        "  panels:\n"
        f"    a: {{from: [0, 0], to: [400, 0]{first}}}\n"
        f"    b: {{from: [400, 0], to: [400, {side * 300}]{second}}}\n"
    )
    bent, flat = ("a", "b") if folded == "ends" else ("b", "a")
    through = [h for h in made[flat].blank.holes if h.use == f"to {bent}"]
    if (turn, sense) == ("right", "in"):
        assert through == []  # the flange turns away from the neighbour
        return
    # From the outer face for a fold inwards, from the inner one for a fold outwards; the hole
    # lies 20 from there, 10 from the flange's free edge.
    across = 20 - 2 if sense == "in" else -20
    reach = {  # how far the flat panel runs on beyond its line at the corner
        ("left", "in"): 2.0,
        ("left", "out"): 30.0,
        ("right", "out"): 0.0,
    }[turn, sense]
    along = across if turn == "left" else -across
    where = along + reach
    width = made[flat].blank.flat_mm[0]
    x = where if flat == "b" else width - where
    assert [h.centre[0] for h in through] == pytest.approx([x] * len(through))
    own = [h for h in made[bent].blank.holes if h.centre[1] > 50]
    # Heights above the bench: the bent one's blank is longer by its foot.
    lift = made[bent].blank.flat_mm[1] - 300.0
    assert [h.centre[1] for h in through] == pytest.approx([h.centre[1] - lift for h in own])
    assert len(own) == 3


def test_flanges_at_the_foot_do_not_run_into_each_other(parts):
    fold = ", fold: {flange: 20}"
    made = parts(RING % (fold, fold))
    south, east = made["south"].blank, made["east"].blank
    # Inner faces meet at x = 1500. The flange of 'east' reaches 18 inside; that of 'south'
    # keeps 1 clear of it, and the one of 'east' 1 clear of the sheet of 'south'.
    (bend,) = south.bends
    assert bend.end[0] == pytest.approx(1500 - 18 - 1)
    (bend,) = east.bends
    assert bend.start[0] == pytest.approx(1.0)


def test_openings(parts):
    made = parts(
        "  panels:\n    wall:\n      from: [0, 0]\n      to: [500, 0]\n      openings:\n"
        "        port: {along: 250, height: 100, diameter: 30}\n"
        "        cable: {along: 60, width: 40, from_height: 0, to_height: 20}\n"
        "        view: {along: 300, width: 100, from_height: 150, to_height: 200}\n"
        "      fix: {hole: 6.6, pitch: 50, inset: 10}\n"
        "      fold: {flange: 20}\n"
    )
    part = made["wall"]
    blank = part.blank
    assert [(r.use, r.centre, r.diameter_mm) for r in blank.rounds] == [
        ("port", pytest.approx((250, 100 + SHIFT)), 30)
    ]
    (view,) = blank.inner
    assert shapely.Polygon(view).area == pytest.approx(5000)
    assert shapely.Polygon(view).bounds == pytest.approx((300, 150 + SHIFT, 400, 200 + SHIFT))
    assert {(60.0, 0.0), (100.0, 0.0)} <= set(blank.outer)
    # The bend line is broken there, and the hole at x = 75 has nothing to be in.
    assert [(b.start[0], b.end[0]) for b in blank.bends] == [(0, 60), (100, 500)]
    assert 75.0 not in [h.centre[0] for h in blank.holes]
    assert part.draft.remarks == (
        "1 of its fixing holes left out: in an opening",
        "9 holes are nearer to a bend than 2.5 t + R: drill them after bending",
    )
    wanted = 500 * (300 + SHIFT) - 100 * 50 - 40 * (20 + SHIFT) - math.pi * 15**2
    assert blank.area_mm2 == pytest.approx(wanted - len(blank.holes) * math.pi * 3.3**2)


@pytest.mark.parametrize(
    ("keys", "lack"),
    [
        ("fold: {flange: 6}", "a flange of at least 8 (it is 6, drawn unfolded)"),
        ("ends: {end: folded}", "the flange of its folded end ('fold'; drawn unfolded)"),
        (
            "openings: {a: {along: 100, width: 50, from_height: 50, to_height: 90},"
            " b: {along: 120, height: 80, diameter: 30}}",
            "a place for opening b clear of bends and other openings",
        ),
        (
            "openings: {a: {along: 0, width: 500, from_height: 50, to_height: 90}}",
            "openings that leave the sheet in one piece",
        ),
        (
            "fold: {flange: 20}, "
            "openings: {a: {along: 50, width: 50, from_height: 2, to_height: 90}}",
            "a place for opening a clear of the bend at the lower edge",
        ),
    ],
)
def test_what_keeps_a_panel_from_being_made(parts, keys, lack):
    (part,) = parts(f"  panels:\n    wall: {{from: [0, 0], to: [500, 0], {keys}}}").values()
    assert part.lacks == (lack,)


def test_a_corner_that_is_not_square_is_left_as_drawn_and_said(parts):
    made = parts(
        "  panels:\n    a: {from: [0, 0], to: [500, 0]}\n    b: {from: [500, 0], to: [700, 200]}"
    )
    assert made["a"].blank.flat_mm[0] == 500.0
    (remark,) = made["a"].draft.remarks
    assert remark == "its end meets b at 45 deg: cut square, fit not worked out"


def test_lids_have_names_of_their_own(parts):
    made = parts(
        "  panels:\n    top: {from: [0, 0], to: [500, 0]}\n"
        "    lid-top: {from: [0, 50], to: [90, 50]}\n"
        "  lids:\n    top: {height: 300, outline: [[10, 20], [10, 220], [410, 220], [410, 20]]}"
    )
    assert sorted(made) == ["lid-top", "lid-top_", "top"]
    lid = made["lid-top_"]
    assert (lid.names, lid.blank.flat_mm, lid.blank.area_mm2) == (("top",), (400.0, 200.0), 8e4)
    assert shapely.LinearRing(lid.blank.outer).is_ccw


def test_holes_near_a_bend_are_drilled_after_bending(parts):
    # The bend's middle lies 18.09 from the free edge; 2.5 t + R is 7.
    made = parts(
        "  panels:\n    a: {from: [0, 0], to: [500, 0], fold: {flange: 20},\n"
        "        fix: {hole: 6.6, pitch: 150, inset: 7.78}}\n"
        "    b: {from: [0, 50], to: [500, 50], fold: {flange: 20},\n"
        "        fix: {hole: 6.6, pitch: 150, inset: 7.8}}"
    )
    assert made["a"].draft.remarks == ()
    assert made["b"].draft.remarks == (
        "4 holes are nearer to a bend than 2.5 t + R: drill them after bending",
    )
