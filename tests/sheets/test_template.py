"""The template: true to size on paper, joined at its crosses, nothing lost between cells."""

import io
import math
from pathlib import Path

import pypdf
import pytest
import shapely

from benchlay import pipeline
from benchlay.checks import Context, limits_of
from benchlay.results.drawings import drawings
from benchlay.sheets import SHEETS, Subject
from benchlay.sheets.lettering import width_mm
from benchlay.sheets.primitives import Circle, Line, Polyline, Text, to_paper
from benchlay.sheets.template import CELL_MM, drawing_of, tiles

ROOT = Path(__file__).parents[2]
TEXT = """
bench: {size: [900, 600], beam_height: 100, holes: {pitch: 25, first: [25, 25]}}
sources:
  red: {wavelength: 633, power: 8 mW, beam: {waist_radius: 0.5}, at: [100, 100], heading: 0}
elements:
  M1: {kind: mirror, after: red, distance: 300, turn: left 90, diameter: 25.4, metal: silver}
  T1: {kind: target, after: M1, distance: 200}
routes:
  work: [red, M1, T1]
"""


@pytest.fixture(scope="module")
def trace():
    return pipeline.trace(pipeline.place(pipeline.read("x.yaml", TEXT)))


@pytest.fixture(scope="module")
def sheets(trace):
    planned = SHEETS["template"](
        Subject(Context(trace, limits_of(trace.placed)), None, (), "0" * 64)
    )
    return [one.compose("") for one in planned]


def test_cells_cover_the_bench_and_meet(sheets):
    corners = [(20.0 - s.origin_mm[0], 30.0 - s.origin_mm[1]) for s in sheets]
    boxes = [shapely.box(x, y, x + CELL_MM[0], y + CELL_MM[1]) for x, y in corners]
    # 900 by 600 takes three columns and three rows; the middle cell of it has its share too.
    outline = shapely.Polygon([(0, 0), (900, 0), (900, 600), (0, 600)]).boundary
    assert shapely.covers(shapely.union_all(boxes), outline)
    assert sum(box.area for box in boxes) == pytest.approx(shapely.union_all(boxes).area)


def test_crosses_stand_at_the_same_place_of_the_bench_on_neighbours(sheets):
    def crosses(sheet):
        return {
            (round(c.centre[0] - sheet.origin_mm[0], 9), round(c.centre[1] - sheet.origin_mm[1], 9))
            for c in sheet.paper
            if isinstance(c, Circle)
        }

    first, second = (next(s for s in sheets if s.name == f"template-{n}-1") for n in (1, 2))
    assert crosses(first) & crosses(second) == {(380.0, 0.0), (380.0, 240.0)}


def test_nothing_is_lost_between_cells(trace, sheets):
    drawn = shapely.union_all(
        [shapely.LineString(p.points) for s in sheets for p in s.model if isinstance(p, Polyline)]
    )
    whole = drawing_of(trace.placed.base, ())
    cells = shapely.union_all(
        [shapely.box(*t.window) for t in tiles(trace.placed.base.layout, whole)]
    )
    for _, points in whole.strokes:
        line = shapely.intersection(shapely.LineString(points), cells)
        assert shapely.difference(line, shapely.buffer(drawn, 1e-6)).length < 1e-6


def test_the_check_line_is_300_mm_on_every_page(sheets):
    for sheet in sheets:
        lines = [p for p in sheet.paper if isinstance(p, Line) and p.layer == "DIMENSIONS"]
        assert max(math.dist(p.start, p.end) for p in lines) == 300.0
        assert sheet.scale == 1.0


def test_a_mirror_is_where_it_stands(sheets):
    found = [
        (sheet, p)
        for sheet in sheets
        for p in sheet.model
        if isinstance(p, Text) and p.text == "M1"
    ]
    assert found
    for sheet, text in found:
        assert math.dist(text.at, (400.0, 100.0)) < 40.0
        x, y = to_paper(sheet, (400.0, 100.0))
        left, low = 20.0 - sheet.origin_mm[0], 30.0 - sheet.origin_mm[1]
        assert (x - 20.0 + left, y - 30.0 + low) == pytest.approx((400.0, 100.0))


def test_words_stand_on_no_line_and_holes_are_where_the_bench_has_them(sheets):
    for sheet in sheets:
        lines = [shapely.LineString(p.points) for p in sheet.model if isinstance(p, Polyline)]
        crosses = [p for p in sheet.model if isinstance(p, Line) and p.layer == "HOLES"]
        for text in (p for p in sheet.model if isinstance(p, Text)):
            wide, tall = width_mm(text.text, text.height_mm) / 2.2, text.height_mm / 2
            x, y = text.at
            box = shapely.box(x - wide, y - tall, x + wide, y + tall)
            assert not any(box.intersects(line) for line in lines), (sheet.name, text.text)
            assert not any(box.intersects(shapely.LineString([c.start, c.end])) for c in crosses)
        assert crosses
        for c in crosses:
            for a, b in zip(c.start, c.end, strict=True):
                assert ((a + b) / 2) % 25.0 == pytest.approx(0.0, abs=1e-9)
    headings = [p.text for s in sheets for p in s.paper if isinstance(p, Text)]
    count = len(sheets)
    assert f"TEMPLATE 1:1  column 1, row 1; page 1/{count}" in headings


def test_one_file_of_many_pages_all_a3(trace):
    files = drawings(trace, sheet="template")
    assert list(files) == ["template.pdf"]
    pages = pypdf.PdfReader(io.BytesIO(files["template.pdf"])).pages
    assert len(pages) >= 8
    for page in pages:
        size = [float(v) * 25.4 / 72 for v in page.mediabox[2:]]
        assert size == pytest.approx([420.0, 297.0], abs=1e-4)
        assert "300 mm" in page.extract_text()
