"""Lettering, scales, tables, hatching and the placing of tags, each by itself."""

import math

import pytest
import shapely
from hypothesis import given, settings
from hypothesis import strategies as st

from benchlay.sheets import font, hatching, lettering, scale, tables
from benchlay.sheets.frame import frame
from benchlay.sheets.placing_text import Crowd
from benchlay.sheets.primitives import Text
from benchlay.sheets.scale import Window, choose
from benchlay.sheets.title_block import TitleFields, title_block

A3 = (420.0, 297.0)


# Advance widths read with fontTools from the file of DejaVu Sans Condensed 2.37, letter by letter.
FROM_THE_FONT = {" ": 585, "H": 1386, "i": 512, "W": 1822, "g": 1170, "µ": 1172, "Ω": 1408,
                 "²": 738, "−": 1544, "0": 1172}  # fmt: skip


@pytest.mark.parametrize(("letter", "units"), FROM_THE_FONT.items())
def test_widths_are_those_of_the_font(letter, units):
    assert font.font().advance(letter) == units


def test_a_letter_that_the_font_lacks_is_taken_as_wide():
    assert "世" not in font.font().glyphs
    assert lettering.width_mm("世", 2.5) > lettering.width_mm("W", 2.5)


def test_a_line_is_as_wide_as_its_letters_with_slack():
    # From the font's file: H is 1540 · 0,9 = 1386 units wide, capitals are 1493 high.
    assert lettering.width_mm("HH", 2.5) == pytest.approx(1.1 * 2 * 1386 / 1493 * 2.5)


@settings(max_examples=60, deadline=None)
@given(st.text(max_size=80), st.floats(10.0, 80.0))
def test_wrapped_and_shortened_text_keeps_to_its_room(text, room):
    for line in (*lettering.wrap(text, room, 2.5, 3), lettering.shorten(text, room, 2.5)):
        assert lettering.width_mm(line, 2.5) <= room + 1e-9
        assert lettering.plain(line) == line
    assert len(lettering.wrap(text, room, 2.5, 3)) <= 3


def test_wrapping_loses_no_words():
    words = "one two three four five six seven"
    assert " ".join(lettering.wrap(words, 20.0, 2.5)) == words


@pytest.mark.parametrize(
    ("view", "sheet", "denominator"),
    [
        ((1200.0, 900.0), "A3", 5),
        ((1500.0, 900.0), "A2", 5),
        ((2400.0, 1200.0), "A3", 10),
        ((3600.0, 1200.0), "A2", 10),
        ((300.0, 200.0), "A3", 2),
        ((100.0, 100.0), "A3", 1),
    ],
)
def test_the_largest_scale_on_the_handiest_sheet(view, sheet, denominator):
    choice = choose(view)
    assert (choice.sheet, choice.scale) == (sheet, denominator)


def test_a_view_just_too_large_goes_one_scale_down():
    window = scale.view_of(A3)
    exact = (window.width * 5, window.height * 5)
    assert choose(exact, "A3").scale == 5
    assert choose((exact[0] + 0.01, exact[1]), "A3").scale == 10


def test_what_was_asked_for_is_kept_or_refused():
    assert choose((1000.0, 500.0), "A2", 20) == ("A2", (594.0, 420.0), 20)
    assert choose((3000.0, 500.0), scale=5).sheet == "A1"
    with pytest.raises(scale.NothingFitsError, match="5000 by 500 mm do not fit on A3 at 1:5"):
        choose((5000.0, 500.0), "A3", 5)


def test_zones_of_the_sheet_follow_the_standard():
    letters = [p.text for p in frame("A3", A3) if isinstance(p, Text)]
    # ISO 5457 (from memory): A3 has 8 by 6 zones, written on both sides.
    assert {t for t in letters if t.isdigit()} == set("12345678")
    assert {t for t in letters if len(t) == 1 and t.isalpha()} == set("ABCDEF")


def test_a_long_title_runs_on_and_is_then_cut():
    block = list(title_block(TitleFields(title="varnish " * 40), A3))
    texts = [p.text for p in block if isinstance(p, Text)]
    assert sum(t.startswith("varnish") for t in texts) == 2
    assert any(t.endswith("...") for t in texts)
    for p in block:
        if isinstance(p, Text):
            assert p.at[0] + lettering.width_mm(p.text, p.height_mm) <= 410.0


def test_the_projection_is_drawn_as_named():
    def cone(name):
        lines = title_block(TitleFields(projection=name), A3)
        return min(p.points[0][0] for p in lines if hasattr(p, "points") and p.layer == "TITLE")

    assert cone("first") < cone("third")


def table_of(rows, window):
    columns = (tables.Column("No.", 20.0), tables.Column("What", 60.0))
    return tables.table(tables.Table("LIST", columns, rows, "the report"), window)


def test_a_table_that_fits_shows_every_row():
    drawn = table_of((("1", "a"), ("2", "b")), Window(0.0, 0.0, 80.0, 100.0))
    assert [p.text for p in drawn.primitives if isinstance(p, Text)][1:] == [
        *("No.", "What", "1", "a", "2", "b"),
    ]


def test_a_table_that_does_not_fit_says_how_much_is_missing():
    rows = tuple((f"{n}", "words") for n in range(50))
    drawn = table_of(rows, Window(0.0, 0.0, 80.0, 60.0))
    texts = [p.text for p in drawn.primitives if isinstance(p, Text)]
    assert texts[-1] == f"... and {50 - texts.count('words')} more: see the report"
    assert drawn.foot >= 0.0


def test_a_row_of_the_wrong_length_is_a_mistake_of_the_caller():
    with pytest.raises(ValueError, match="a row of 1 for 2 columns"):
        table_of((("1",),), Window(0.0, 0.0, 80.0, 60.0))


def test_hatching_lies_inside_at_its_spacing():
    area = hatching.rim(shapely.box(0, 0, 100, 60), 6.0)
    lines = hatching.hatch("HAZARD", area, 3.0, 45.0)
    grown = area.buffer(1e-6)
    assert all(grown.contains(shapely.LineString([p.start, p.end])) for p in lines)
    # A band of this area, cut by lines 3 apart, holds area / 3 of them in length.
    total = sum(math.dist(p.start, p.end) for p in lines)
    assert total == pytest.approx(area.area / 3.0, rel=0.02)


def test_a_narrow_zone_is_hatched_whole():
    strip = shapely.box(0, 0, 100, 4)
    assert hatching.rim(strip, 6.0).equals(strip)


def test_hatching_of_nothing_is_nothing():
    assert hatching.hatch("HAZARD", shapely.Polygon(), 3.0, 45.0) == []


@pytest.mark.parametrize("turn", [1, -1])
def test_ticks_point_inside_whichever_way_the_ring_runs(turn):
    ring = shapely.Polygon([(0, 0), (50, 0), (50, 50), (0, 50)][::turn])
    ticks = hatching.ticks("HAZARD", ring, 10.0, 2.0, field=ring)
    assert len(ticks) == 20
    assert all(ring.contains(shapely.Point(p.end)) for p in ticks)


def test_ticks_far_from_the_sheet_are_not_made():
    ring = shapely.box(0, 0, 50, 50)
    field = shapely.box(-10, -10, 20, 20)
    ticks = hatching.ticks("HAZARD", ring, 10.0, 2.0, field=field)
    assert sorted(p.start for p in ticks) == [(0, 5), (0, 15), (5, 0), (15, 0)]


WINDOW = Window(0.0, 0.0, 200.0, 100.0)


def test_tags_do_not_overlap_each_other():
    crowd = Crowd(WINDOW)
    places = [crowd.place((20.0, 4.0), [((100.0, 50.0), 2.0)]) for _ in range(12)]
    boxes = [shapely.box(*p.box) for p in places]
    assert all(not a.intersects(b) for n, a in enumerate(boxes) for b in boxes[:n])
    assert all(shapely.box(*WINDOW).contains(box) for box in boxes)


def test_a_tag_keeps_off_lines_where_it_can():
    crowd = Crowd(WINDOW)
    beam = ((0.0, 50.0), (200.0, 50.0))
    crowd.add_line(beam)
    place = crowd.place((20.0, 4.0), [((100.0, 50.0), 0.0)])
    assert not shapely.box(*place.box).intersects(shapely.LineString(beam))


def test_a_far_tag_has_a_leader_to_its_thing():
    crowd = Crowd(WINDOW)
    crowd.add_box(Window(85.0, 40.0, 115.0, 60.0))
    place = crowd.place((20.0, 4.0), [((100.0, 50.0), 2.0)])
    assert place.leader[0] == (100.0, 50.0)
    assert shapely.box(*place.box).distance(shapely.Point(place.leader[1])) == 0.0


def test_no_room_is_said():
    crowd = Crowd(Window(0.0, 0.0, 10.0, 10.0))
    assert crowd.place((20.0, 4.0), [((5.0, 5.0), 0.0)]) is None
