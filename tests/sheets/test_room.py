"""The room plan: true to size, with every sign in a place of its own."""

import io
from pathlib import Path

import ezdxf
import pytest
import shapely

from benchlay import pipeline
from benchlay.checks import Context, limits_of
from benchlay.results.drawings import drawings
from benchlay.sheets import SHEETS, Subject
from benchlay.sheets.lettering import width_mm
from benchlay.sheets.primitives import (
    Across,
    Circle,
    Dimension,
    Line,
    Polyline,
    Text,
    Up,
    measured,
    to_paper,
)
from benchlay.zones import zones_of

ROOT = Path(__file__).parents[2]
LAYOUT = (ROOT / "layouts" / "stone-cleaning.yaml").read_text()


@pytest.fixture(scope="module")
def trace():
    return pipeline.trace(pipeline.place(pipeline.read("x.yaml", LAYOUT)))


@pytest.fixture(scope="module")
def sheet(trace):
    (planned,) = SHEETS["room"](
        Subject(
            Context(trace, limits_of(trace.placed)),
            zones_of(trace, states=("as drawn",)),
            (),
            "0" * 64,
        )
    )
    return planned.compose("4/9")


def test_clear_widths_by_hand(sheet):
    # The bench is 1800 by 1000 at the origin, the room from (-1500, -2000) to (3500, 1800).
    found = sorted(measured(p) for p in sheet.model if isinstance(p, Dimension))
    assert found == [800.0, 1500.0, 1700.0, 2000.0, 3800.0, 5000.0]


def test_walls_are_the_layouts(sheet):
    walls = [p.points for p in sheet.model if isinstance(p, Polyline) and p.layer == "PANELS"]
    assert set(walls[0]) == {(-1500, -2000), (3500, -2000), (3500, 1800), (-1500, 1800)}


def test_every_sign_is_marked_once(sheet):
    words = [p.text for p in sheet.paper if isinstance(p, Text)]
    listed = {w for w in words if w.startswith("LB") and " " not in w}
    marked = [n for w in words if w.startswith("LB") for n in w.split()]
    assert listed
    assert all(marked.count(n) == 2 for n in {*marked})  # in the schedule and in the plan


def test_no_words_lie_on_one_another_and_all_on_the_sheet(sheet):
    texts = [p for p in sheet.paper if isinstance(p, Text) and p.layer == "TAGS"]
    places = [(round(p.at[0], 1), round(p.at[1], 1)) for p in texts]
    assert len(set(places)) == len(places)
    width, height = sheet.size_mm
    assert all(0 < x < width and 0 < y < height for x, y in places)


def test_read_back(trace):
    files = drawings(trace, sheet="room", form="dxf")
    doc = ezdxf.read(io.StringIO(files["room.dxf"].decode()))
    assert not doc.audit().errors
    said = sorted(d.get_measurement() for d in doc.modelspace().query("DIMENSION"))
    assert said == pytest.approx([800, 1500, 1700, 2000, 3800, 5000], abs=1e-6)


def test_there_is_none_without_a_room():
    text = "".join(LAYOUT.partition("room:\n")[::2]).replace(
        LAYOUT.partition("room:\n")[2].partition("sources:\n")[0], ""
    )
    trace = pipeline.trace(pipeline.place(pipeline.read("x.yaml", text)))
    assert not list(SHEETS["room"](Subject(Context(trace, limits_of(trace.placed)), None, (), "")))


@pytest.mark.parametrize("name", ["bad", "gas-cell", "stone-cleaning"])
def test_no_words_overlap_or_stand_on_walls_bench_people_and_doors(name):
    trace = pipeline.trace(pipeline.place(pipeline.read(ROOT / "layouts" / f"{name}.yaml")))
    context = Context(trace, limits_of(trace.placed))
    (planned,) = SHEETS["room"](Subject(context, zones_of(trace), (), "0" * 64))
    sheet = planned.compose("1/1")
    lines = []
    for p in sheet.model:
        if isinstance(p, Polyline) and p.layer in {"PANELS", "BENCH"}:
            lines.append(shapely.LinearRing([to_paper(sheet, at) for at in p.points]))
        if isinstance(p, Line) and p.layer != "HAZARD":
            lines.append(shapely.LineString([to_paper(sheet, at) for at in (p.start, p.end)]))
        if isinstance(p, Circle):
            disc = shapely.Point(to_paper(sheet, p.centre)).buffer(p.radius / sheet.scale)
            lines.append(disc.exterior)
    boxes = []
    for p in sheet.paper:
        if isinstance(p, Text) and p.layer == "TAGS":
            wide, tall = width_mm(p.text, p.height_mm) / 1.1, p.height_mm
            x = p.at[0] - {Across.LEFT: 0.0, Across.CENTRE: wide / 2, Across.RIGHT: wide}[p.across]
            y = p.at[1] - {Up.BASELINE: 0.0, Up.MIDDLE: tall / 2, Up.TOP: tall}[p.up]
            boxes.append((p.text, shapely.box(x, y, x + wide, y + tall)))
    assert len(boxes) > 2
    for n, (words, box) in enumerate(boxes):
        assert not any(box.intersects(line) for line in lines), words
        assert not any(box.intersects(other) for _, other in boxes[n + 1 :]), words
