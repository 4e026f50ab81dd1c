"""The safety sheets: what stands on them, and that all of it can be read."""

import itertools
import re
import sys
import xml.etree.ElementTree as ET
from datetime import date
from io import StringIO
from pathlib import Path

import ezdxf
import pytest

from benchlay import pipeline
from benchlay.checks import Context, limits_of
from benchlay.exposure.cautions import CAUTIONS
from benchlay.hazards import hazards_of, signs_of
from benchlay.sheets import sheets_of
from benchlay.sheets.drafting.safety import safety_contents
from benchlay.sheets.lettering import width_mm
from benchlay.sheets.primitives import Across, Line, Polyline, Text, Up
from benchlay.sheets.scale import frame_of
from benchlay.writers import dxf, svg
from benchlay.zones import zones_of

sys.path.insert(0, str(Path(__file__).parents[1] / "hazards"))
from judged import BOX, OPEN, TWO

MANY = BOX + "".join(
    f"  s{n}: {{sources.green.power: {100 + n} mW, elements.S1.closed: no}}\n" for n in range(20)
)


def traced(text):
    return pipeline.trace(pipeline.place(pipeline.read("bench.yaml", text)))


def pages(text):
    return [composed.sheet for composed in sheets_of(traced(text), only="safety", sha256="ab" * 32)]


def contents(text):
    trace = traced(text)
    found = hazards_of(Context(trace, limits_of(trace.placed)), zones_of(trace))
    layout = trace.placed.base.layout
    return safety_contents(layout, found, signs_of(layout, found))


def texts(sheet):
    return [p for p in sheet.paper if isinstance(p, Text)]


def words(sheets):
    return " ".join(p.text for sheet in sheets for p in texts(sheet))


def box(text):
    width, height = width_mm(text.text, text.height_mm), text.height_mm
    x = {Across.LEFT: 0.0, Across.CENTRE: -width / 2, Across.RIGHT: -width}[text.across]
    y = {Up.BASELINE: 0.0, Up.MIDDLE: -height / 2, Up.TOP: -height}[text.up]
    low = text.at[1] + y - 0.33 * height
    return text.at[0] + x, low, text.at[0] + x + width, text.at[1] + y + height


def meet(a, b):
    return a[0] < b[2] and b[0] < a[2] and a[1] < b[3] and b[1] < a[3]


@pytest.mark.parametrize("text", [OPEN, BOX, TWO, MANY], ids=["open", "box", "two", "many"])
def test_nothing_overlaps_and_nothing_is_outside_the_frame(text):
    for sheet in pages(text):
        frame = frame_of(sheet.size_mm)
        of_tables = [t for t in texts(sheet) if t.layer in ("TABLES", "TAGS")]
        for text_ in of_tables:
            x0, y0, x1, y1 = box(text_)
            assert frame.left < x0
            assert x1 < frame.right
            assert frame.low < y0
            assert y1 < frame.high
        for a, b in itertools.combinations(texts(sheet), 2):
            if "TABLES" in (a.layer, b.layer):
                assert not meet(box(a), box(b)), (a.text, b.text)
        marks = [p for p in sheet.paper if isinstance(p, Line) and p.layer == "SHEET"]
        for mark, text_ in itertools.product(marks, of_tables):
            xs, ys = zip(mark.start, mark.end, strict=True)
            assert not meet(
                box(text_), (min(xs) - 0.4, min(ys) - 0.4, max(xs) + 0.4, max(ys) + 0.4)
            )


def test_one_page_answers_what_a_reviewer_asks():
    first, *_ = pages(BOX)
    told = words([first])
    for answer in (
        "Eyewear", "D LB5", "532 nm", "green itself",  # which, and where from
        "Until when", "for exposures of up to 100 s",
        "Who may stand where", "desk", "INSIDE the controlled area", "REACHED",
        "Assumed", "a point source", "light-tight",
        "Sources, after IEC 60825-1:2014", "class 3B", "0 m to 289 m",
        "abababababababab",  # the layout's hash
    ):  # fmt: skip
        assert answer in told, answer
    for state in ("as drawn", "alignment", "service"):
        assert state in told


def test_every_caution_is_there():
    told = words(pages(OPEN))
    for caution in CAUTIONS:
        assert caution.replace("  ", " ") in told


def test_what_does_not_fit_goes_on_and_no_row_is_lost():
    sheets = pages(MANY)
    assert len(sheets) >= 2
    assert [s.name for s in sheets] == [
        "safety",
        *(f"safety-{n}" for n in range(2, len(sheets) + 1)),
    ]
    drawn = [t.text for sheet in sheets for t in texts(sheet)]
    assert not any("more: see" in line or line.endswith("...") for line in drawn)
    for block in contents(MANY).blocks:
        first = block.table.rows[-1][1].split()[0]
        assert any(line.startswith(first) for line in drawn), (block.table.heading, first)
    (eyewear,) = [b.table for b in contents(MANY).blocks if b.table.heading == "Eyewear"]
    assert sum("LB5" in line for line in drawn) == sum("LB5" in row[4] for row in eyewear.rows)


def test_a_plain_triangle_stands_for_each_sign():
    sheets = pages(BOX)
    triangles = [
        p
        for sheet in sheets
        for p in sheet.paper
        if isinstance(p, Polyline) and p.layer == "TAGS" and len(p.points) == 3
    ]
    tags = [t.text for sheet in sheets for t in texts(sheet) if t.layer == "TAGS"]
    assert tags == ["LB1", "LB3", "LB4"]  # LB2 is the label of the aperture: words alone
    assert len(triangles) == 2 * len(tags)
    assert "to be confirmed by the laser safety officer" in words(sheets)


def test_rows_that_states_share_stand_once():
    (sources,) = [b.table for b in contents(BOX).blocks if b.table.heading.startswith("Sources")]
    assert [row[0] for row in sources.rows] == ["as drawn, service", "alignment"]


def test_decimal_commas_are_kept_to():
    told = words(pages(BOX + "drawing: {decimal: comma}\n"))
    assert "2,6" in told
    assert not re.search(r"\d\.\d+ (m|mm|mW|W)\b", told)


def test_the_sheets_are_written_and_read_back():
    first, *_ = pages(BOX)
    root = ET.fromstring(svg.write(first))
    assert root.get("width") == "420mm"
    document = ezdxf.read(StringIO(dxf.write(first).decode()))
    assert not document.audit().errors
    told = " ".join(e.dxf.text for e in document.modelspace() if e.dxftype() == "TEXT")
    assert "D LB5" in told


def test_a_review_of_one_state_has_the_sheet_of_that_state():
    result = pipeline.review_files(
        BOX.encode(), "bench.yaml", on=date(2026, 12, 1), state="service"
    )
    told = " ".join(" ".join(ET.fromstring(result[1]["safety.svg"]).itertext()).split())
    assert "panel east is open" in told
    assert "0.3 mW" not in told  # of state alignment
    assert "INSIDE the controlled area" in told


def test_one_surface_is_one_surface():
    said = words(pages(BOX))
    assert "1 surface" in said
    assert "1 surfaces" not in said
