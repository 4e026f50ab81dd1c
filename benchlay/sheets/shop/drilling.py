"""Drilling sheet: the bench or base plate with the holes that this layout needs.

Places are counted from the first hole, the datum; where a bench has no grid, from its near left
corner, and holes are to be drilled where posts stand.
"""

from __future__ import annotations

from collections.abc import Iterator
from math import dist

import shapely

from benchlay.layout.layout import Layout
from benchlay.named import NamedTuple
from benchlay.placing.placed import PlacedState
from benchlay.sheets.drafting.picture import title_fields
from benchlay.sheets.form import Form, form_for
from benchlay.sheets.lettering import LARGE_MM
from benchlay.sheets.primitives import (
    Point,
    Primitive,
    Sheet,
    Text,
    figure,
)
from benchlay.sheets.scale import SCALES, Window
from benchlay.sheets.shop.bench_top import HEADING_MM, RIGHT_MM, bench_top, extent
from benchlay.sheets.shop.ordinates import ROOM_MM
from benchlay.sheets.shop.rows import MARKS_MM, Cell, Heading, Rows, shown
from benchlay.sheets.shop.setting_out import Footing, footing, hole_at, nearest_hole
from benchlay.sheets.tables import BETWEEN_MM, Column, Table, notes, table
from benchlay.sheets.title_block import TitleFields

TITLE = "Drilling sheet"
MOST_BESIDE = 28  # holes in the table beside the view; more of them have sheets of their own
_FORK_MM = 40.0  # what a clamping fork reaches from a post's axis (common practice)
_COLUMN_MM = 132.0
_READABLE = 10
_SIZES = ("A3", "A2", "A1", "A0")
_HEADINGS = (
    Heading("hole", 12.0),
    Heading("column", 15.0),
    Heading("row", 11.0),
    Heading("X from datum", 20.0, "mm"),
    Heading("Y from datum", 20.0, "mm"),
    Heading("for", 23.0),
    Heading("reach", 15.0, "mm"),
    Heading("by", 12.0),
)


class Used(NamedTuple):
    """A hole that something is held by."""

    at: Point
    column: int | None
    row: int | None
    use: str  # the element
    reach_mm: float  # from the hole to the bolt; to the post's axis where no slot is stated
    by: str  # slot, foot, fork, drill


def used_holes(state: PlacedState) -> tuple[list[Used], list[str]]:
    """Return the holes that elements are held by, by place, and those with none in reach."""
    found, without = [], []
    for name in sorted(state.elements):
        stands = footing(state.elements[name])
        if stands is None:
            continue
        own = list(_of(name, stands, state.layout))
        found += own
        if not own:
            without.append(name)
    return sorted(found, key=lambda h: (h.at[1], h.at[0], h.use)), without


def _of(name: str, stands: Footing, layout: Layout) -> Iterator[Used]:
    grid = layout.bench.holes
    if grid is None:
        yield Used(stands.at, None, None, name, 0.0, "drill")
        return
    table_top = shapely.Polygon(layout.bench.outline)
    marks = [("slot", at) for at in stands.slots] or [("foot", stands.at)]
    if not stands.foot and not stands.slots:
        marks = [("fork", stands.at)]
    for by, at in marks:
        column, row = nearest_hole(grid, at)
        hole = hole_at(grid, column, row)
        reach = dist(hole, at)
        near = {
            "slot": reach <= grid.pitch_mm,
            "fork": reach <= _FORK_MM,
            "foot": bool(stands.foot)
            and shapely.intersects_xy(shapely.Polygon(stands.foot), *hole),
        }[by]
        if near and shapely.intersects_xy(table_top, *hole):
            yield Used(hole, column, row, name, reach, by)


def drilling_rows(state: PlacedState) -> Rows:
    """Return the table of holes."""
    holes, without = used_holes(state)
    grid = state.layout.bench.holes
    x0, y0 = grid.first_mm if grid else (0.0, 0.0)
    rows: list[tuple[Cell, ...]] = [
        (
            f"H{n}",
            h.column,
            h.row,
            round(h.at[0] - x0, 9) + 0.0,
            round(h.at[1] - y0, 9) + 0.0,
            h.use,
            round(h.reach_mm, 9),
            h.by,
        )
        for n, h in enumerate(holes, start=1)
    ]
    return Rows("drilling", TITLE, _HEADINGS, tuple(rows), tuple(_notes(state, holes, without)))


def _notes(state: PlacedState, holes: list[Used], without: list[str]) -> Iterator[str]:
    bench = state.layout.bench
    decimal = "." if state.layout.drawing.decimal == "point" else ","
    if bench.holes is None:
        yield (
            "The bench states no grid: holes are to be drilled where posts stand, X and Y from "
            "its near left corner."
        )
    else:
        g = bench.holes
        first = " and ".join(figure(v, 3, decimal) for v in g.first_mm)
        yield (
            f"Grid {figure(g.pitch_mm, 3, decimal)}, thread {g.thread}. X and Y run from the "
            f"datum, hole column 1, row 1, which lies {first} from the bench's near left corner."
        )
        yield (
            "Reach: from the hole to the bolt of the slot, or to the post's axis. By: slot, "
            "stated in the layout; foot, a hole under it, slots not stated; fork, within 40 of a "
            "bare post."
        )
    yield f"{len(holes)} holes. Positions of new holes ±{figure(0.2, 1, decimal)}; deburr."
    if without:
        yield f"No hole in reach of: {', '.join(without)}."
    bare = [n for n, item in sorted(state.elements.items()) if footing(item) is None]
    if bare:
        yield f"Without post or foot in the layout, and so without holes: {', '.join(bare)}."
    yield "Sources stand by their own means: their feet are not in the layout."


def drilling_sheet(state: PlacedState, sha256: str, number: str) -> Sheet:
    """Return the drilling sheet of the bench as drawn."""
    layout = state.layout
    decimal = "." if layout.drawing.decimal == "point" else ","
    fields = title_fields(layout, TITLE, sha256)._replace(
        tolerance="ISO 2768-m; hole positions ±0,2".replace(",", decimal), sheet=number
    )
    form, view, scale = _form(fields, layout)
    low, high = extent(layout)
    origin = (
        (view.left + view.right) / 2 - (low[0] + high[0]) / 2 / scale,
        (view.low + view.high) / 2 - (low[1] + high[1]) / 2 / scale,
    )
    rows = drilling_rows(state)
    return form.sheet(
        "drilling",
        "Bench top with the holes that the layout uses",
        model=bench_top(state, [h.at for h in used_holes(state)[0]], scale, decimal),
        paper=_column(rows, form.window, decimal),
        scale=scale,
        origin_mm=origin,
        properties=(
            ("drawing number", layout.drawing.number),
            ("revision", layout.revision),
            ("layout sha256", sha256),
        ),
        decimal=decimal,
    )


def _form(fields: TitleFields, layout: Layout) -> tuple[Form, Window, int]:
    low, high = extent(layout)
    size = (high[0] - low[0], high[1] - low[1])
    for paper in _SIZES:
        form = form_for(fields, size=paper)
        left, foot, right, top = form.window
        view = Window(
            left + ROOM_MM, foot + ROOM_MM, right - _COLUMN_MM - RIGHT_MM, top - HEADING_MM
        )
        fits = [n for n in SCALES if size[0] <= view.width * n and size[1] <= view.height * n]
        if fits and (fits[0] <= _READABLE or paper == _SIZES[-1]):
            break
    scale = fits[0] if fits else SCALES[-1]
    return form_for(fields._replace(scale=f"1:{scale}"), size=paper), view, scale


def _column(rows: Rows, window: Window, decimal: str) -> list[Primitive]:
    at = (window.left, window.high - LARGE_MM)
    heading = Text("TITLE", at, "Bench top, seen from above", LARGE_MM)
    room = window._replace(left=window.right - _COLUMN_MM, right=window.right - MARKS_MM)
    drawn = notes("NOTES", list(rows.notes), room, "drilling.csv")
    room = room._replace(high=drawn.foot - BETWEEN_MM)
    words = tuple(tuple(shown(cell, decimal) for cell in row) for row in rows.rows)
    columns = tuple(
        Column(f"{h.name}, {h.unit}" if h.unit else h.name, h.width_mm) for h in rows.headings
    )
    if len(words) > MOST_BESIDE:
        words = words[:0]
        heading = heading._replace(text=f"{heading.text}; its holes: sheet drilling-holes")
    content = Table("HOLES", columns, words, "drilling.csv")
    return [heading, *drawn.primitives, *(table(content, room).primitives if words else ())]
