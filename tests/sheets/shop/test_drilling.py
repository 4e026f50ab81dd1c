"""The drilling sheet: which holes, where, and how far from the bolts; read back from the DXF."""

import io
from pathlib import Path

import ezdxf
import pyogrio
import pytest
import shapely

from benchlay import pipeline
from benchlay.checks import Context, limits_of
from benchlay.sheets import SHEETS, Subject
from benchlay.sheets.lettering import width_mm
from benchlay.sheets.primitives import Line, Polyline, Text
from benchlay.sheets.shop.drilling import drilling_rows, drilling_sheet, used_holes
from benchlay.writers import dxf

ROOT = Path(__file__).parents[3]
BENCHES = sorted((ROOT / "layouts").glob("*.yaml"))
TEXT = """
bench: {size: [900, 600], beam_height: 100%s}
sources:
  red: {wavelength: 633, power: 8 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
elements:
  M1: {kind: mirror, at: [410, 203], facing: 180, diameter: 25.4, metal: silver,
       mount: {post: [0, 0], slots: [[0, -30], [0, 30]]}}
  M2: {kind: mirror, at: [602, 297], facing: 180, diameter: 25.4, metal: silver,
       mount: {post: [0, 0]}}
  T1: {kind: target, at: [810, 200], facing: 180}
  far: {kind: target, at: [1200, 200], facing: 180}
  P1: {kind: aperture, at: [300, 200], facing: 180, opening: 5}
"""
GRID = ", holes: {pitch: 25, first: [12.5, 12.5]}"


def base(text):
    return pipeline.place(pipeline.read("x.yaml", text)).base


def test_holes_by_hand():
    holes, without = used_holes(base(TEXT % GRID))
    found = {(h.use, h.by): (h.at, h.column, h.row, h.reach_mm) for h in holes if h.use != "M1"}
    # Holes lie at 12.5 + 25 n. M2's post at (602, 297): hole (612.5, 287.5) is nearest.
    assert found["M2", "foot"] == ((612.5, 287.5), 25, 12, pytest.approx((10.5**2 + 9.5**2) ** 0.5))
    # A target's own post stands behind its face, which looks to -x: in the column of 812.5.
    assert found["T1", "fork"][1] == 33
    # Facing 180 turns the slots' left to the plan's -y: bolts at (410, 233) and (410, 173).
    slots = [(h.at, round(h.reach_mm, 6)) for h in holes if h.use == "M1"]
    assert slots == [
        ((412.5, 162.5), round((2.5**2 + 10.5**2) ** 0.5, 6)),
        ((412.5, 237.5), round((2.5**2 + 4.5**2) ** 0.5, 6)),
    ]
    assert without == ["far"]


def test_without_a_grid_holes_are_drilled_where_posts_stand():
    rows = drilling_rows(base(TEXT % ""))
    places = {row[5]: (row[3], row[4], row[7]) for row in rows.rows}
    assert places["M1"] == (410.0, 203.0, "drill")
    assert "no grid" in rows.notes[0]


def test_two_readers_find_the_holes_where_the_table_says(tmp_path):
    state = base(TEXT % GRID)
    data = dxf.write(drilling_sheet(state, "0" * 64, "1/1"))
    doc = ezdxf.read(io.StringIO(data.decode()))
    assert not doc.audit().errors
    holes = [h.at for h in used_holes(state)[0]]
    first = sorted(
        (c.dxf.center.y, c.dxf.center.x) for c in doc.modelspace().query("CIRCLE[layer=='BENCH']")
    )
    assert first == [
        pytest.approx((y, x), abs=1e-6) for x, y in sorted(holes, key=lambda p: p[::-1])
    ]
    (tmp_path / "d.dxf").write_bytes(data)
    _, _, shapes, (layers, kinds) = pyogrio.raw.read(
        tmp_path / "d.dxf", columns=["Layer", "SubClasses"]
    )
    rounds = [
        shapely.from_wkb(shape).bounds
        for shape, layer, kind in zip(shapes, layers, kinds, strict=True)
        if layer == "BENCH" and "AcDbCircle" in kind
    ]
    second = sorted(((y0 + y1) / 2, (x0 + x1) / 2) for x0, y0, x1, y1 in rounds)
    assert second == [pytest.approx(place, abs=1e-6) for place in first]
    datum = drilling_rows(state).rows
    assert sorted((row[4] + 12.5, row[3] + 12.5) for row in datum) == first


@pytest.mark.parametrize("bench", BENCHES, ids=lambda b: b.stem)
def test_the_sheet_of_every_bench_can_be_read(bench, legible):
    legible(drilling_sheet(pipeline.place(pipeline.read(bench)).base, "0" * 64, "3/12"))


def test_many_holes_are_listed_on_sheets_of_their_own(words_of):
    mirrors = "".join(
        f"  E{n}: {{kind: mirror, at: [{60 + 85 * (n % 10)}, {60 + 90 * (n // 10)}], facing: 0, "
        "diameter: 25.4, metal: silver}\n"
        for n in range(60)
    )
    text = TEXT % GRID
    text = text[: text.index("  M1:")] + mirrors
    trace = pipeline.trace(pipeline.place(pipeline.read("x.yaml", text)))
    sheets = [
        one.compose("")
        for one in SHEETS["drilling"](
            Subject(Context(trace, limits_of(trace.placed)), None, (), "")
        )
    ]
    assert [sheet.name for sheet in sheets] == ["drilling", "drilling-holes", "drilling-holes-2"]
    listed = {w for sheet in sheets[1:] for w in words_of(sheet)}
    assert {f"H{n}" for n in range(1, 61)} <= listed
    assert {f"E{n}" for n in range(60)} <= listed


def test_holes_and_the_bench_are_dimensioned_from_the_datum():
    state = base(TEXT % GRID)
    sheet = drilling_sheet(state, "0" * 64, "1/1")
    doc = ezdxf.read(io.StringIO(dxf.write(sheet).decode()))
    audit = doc.audit()
    assert not audit.errors
    assert not audit.fixes
    found = {round(d.get_measurement(), 6) for d in doc.modelspace().query("DIMENSION")}
    assert {900.0, 600.0} <= found
    # Some readers draw figures along the line: running ones are TEXT, and stated once.
    told = [t.dxf.text for t in doc.modelspace().query("TEXT[layer=='DIMENSIONS']")]
    without = [d for d in doc.modelspace().query("DIMENSION") if d.dxf.text == " "]
    assert len(told) == len(without) + 2 > 8  # the noughts of both rows besides
    for hole in used_holes(state)[0]:
        assert {round(hole.at[0] - 12.5, 6), round(hole.at[1] - 12.5, 6)} <= found


@pytest.mark.parametrize("bench", BENCHES, ids=lambda b: b.stem)
def test_no_number_of_a_hole_stands_on_a_line(bench):
    sheet = drilling_sheet(pipeline.place(pipeline.read(bench)).base, "0" * 64, "3/12")
    lines = []
    for p in sheet.model:
        if isinstance(p, Polyline) and p.layer in {"BODIES", "BENCH"}:
            lines.append(shapely.LinearRing(p.points))
        if isinstance(p, Line) and p.layer in {"AXIS", "HOLES"}:
            lines.append(shapely.LineString([p.start, p.end]))
    numbers = [p for p in sheet.model if isinstance(p, Text) and p.layer == "TAGS"]
    assert len(numbers) == len(used_holes(pipeline.place(pipeline.read(bench)).base)[0]) > 0
    for text in numbers:
        wide, tall = (
            v / 2.2 * sheet.scale for v in (width_mm(text.text, text.height_mm), text.height_mm)
        )
        x, y = text.at
        box = shapely.box(x - wide, y - tall, x + wide, y + tall)
        assert not any(box.intersects(line) for line in lines), text.text
