"""Template: the plan 1:1 on sheets of A3 to be joined on the bench.

A3 lying, since the check line of 300 mm does not fit on A4. Every sheet shows one cell of the
plan and a strip beyond it; cells meet in their register crosses. Fine crosses are the bench's
holes, by which the paper is laid on it. What has nothing on it but bench is not printed.
"""

from __future__ import annotations

import math
from collections.abc import Iterable, Iterator

import shapely

from benchlay.exposure.cautions import SHORT
from benchlay.layout.layout import Layout
from benchlay.named import NamedTuple
from benchlay.placing.placed import PlacedState
from benchlay.sheets.contents import Item, Leg
from benchlay.sheets.drafting.outlines import items_of
from benchlay.sheets.drafting.surroundings import holes_of
from benchlay.sheets.layers import sheet_layers
from benchlay.sheets.lettering import LARGE_MM, MIDDLE_MM, SMALL_MM, shorten, width_mm
from benchlay.sheets.placing_text import Crowd
from benchlay.sheets.plan.items import placed, straightened
from benchlay.sheets.primitives import (
    Across,
    Circle,
    Line,
    Point,
    Polyline,
    Primitive,
    Sheet,
    Text,
    Up,
)
from benchlay.sheets.scale import SIZES_MM, Window
from benchlay.sheets.shop.drilling import used_holes
from benchlay.sheets.shop.setting_out import footing

CHECK_MM = 300.0
CELL_MM = (380.0, 240.0)
_SIZE_MM = SIZES_MM["A3"]
_CORNER_MM = (20.0, 30.0)  # of the cell, on paper: room for the check line below
_BEYOND_MM = 5.0
_CROSS_MM = 4.0
_OFF_MM = 6.0  # of words from what they name
_HOLE_MM = 3.0
_FINE_MM = 1.5  # of the crosses at holes, either way
_STEPS = 96  # of a circle as chords: off by 0.05 % of its radius

Stroke = tuple[str, tuple[Point, ...]]


class Drawing(NamedTuple):
    """All that the template shows, as chains of points, and words at places."""

    strokes: tuple[Stroke, ...]
    words: tuple[tuple[Point, str], ...]


class Tile(NamedTuple):
    """One cell: its column and row from 1, and where its lower left corner lies in the plan."""

    column: int
    row: int
    corner: Point

    @property
    def window(self) -> Window:
        """The cell and the strip beyond it, in the plan."""
        (x, y), (width, height), b = self.corner, CELL_MM, _BEYOND_MM
        return Window(x - b, y - b, x + width + b, y + height + b)


def drawing_of(state: PlacedState, legs: Iterable[Leg]) -> Drawing:
    """Return what is laid on the bench: outlines, feet, holes, and the axes of working beams."""
    strokes: list[Stroke] = [("BENCH", _ring(tuple(state.layout.bench.outline)))]
    words: list[tuple[Point, str]] = []
    for item in items_of(state):
        strokes += _of_item(item)
        words.append((item.at[:2], item.name))
    for name in sorted(state.elements):
        stands = footing(state.elements[name])
        if stands is not None:
            strokes += _cross(stands.at, 2 * _CROSS_MM)
    for hole in used_holes(state)[0]:
        strokes.append(("BENCH", _circle(hole.at, _HOLE_MM)))
        if hole.column is not None:
            at = (hole.at[0], hole.at[1] - _HOLE_MM - 2 * _OFF_MM - MIDDLE_MM)
            words.append((at, f"{hole.column}/{hole.row}"))
    strokes += [("AXIS", (leg.start[:2], leg.end[:2])) for leg in legs if not leg.stray]
    return Drawing(tuple(strokes), tuple(words))


def _of_item(item: Item) -> Iterator[Stroke]:
    for layer, shapes in (("BODIES", item.bodies), ("OPTICS", item.outlines)):
        for shape in shapes:
            yield layer, _ring(tuple(placed(item, p) for p in straightened(shape)))
    for line in item.lines:
        yield "OPTICS", tuple(placed(item, p) for p in line)


def _ring(points: tuple[Point, ...]) -> tuple[Point, ...]:
    return (*points, points[0])


def _circle(at: Point, radius: float) -> tuple[Point, ...]:
    turns = [math.tau * n / _STEPS for n in range(_STEPS)]
    return _ring(tuple((at[0] + radius * math.cos(t), at[1] + radius * math.sin(t)) for t in turns))


def _cross(at: Point, reach: float) -> list[Stroke]:
    x, y = at
    return [
        ("DATUM", ((x - reach, y), (x + reach, y))),
        ("DATUM", ((x, y - reach), (x, y + reach))),
    ]


def tiles(layout: Layout, drawing: Drawing) -> list[Tile]:
    """Return the cells that show more than the bare bench, row by row from the near left."""
    xs, ys = zip(*layout.bench.outline, strict=True)
    low, high = (min(xs), min(ys)), (max(xs), max(ys))
    counts = [max(1, math.ceil((high[k] - low[k]) / CELL_MM[k] - 1e-9)) for k in (0, 1)]
    things = shapely.union_all(
        [shapely.LineString(points) for layer, points in drawing.strokes if layer != "BENCH"]
        + [shapely.LineString(points) for layer, points in drawing.strokes[:1]]
    )
    every = [
        Tile(i + 1, j + 1, (low[0] + i * CELL_MM[0], low[1] + j * CELL_MM[1]))
        for j in range(counts[1])
        for i in range(counts[0])
    ]
    return [t for t in every if shapely.intersects(shapely.box(*t.window), things)]


def template_sheet(tile: Tile, drawing: Drawing, layout: Layout, sha256: str, number: str) -> Sheet:
    """Return the sheet of a cell; its number is that among the template's pages, as 2/7."""
    origin = (_CORNER_MM[0] - tile.corner[0], _CORNER_MM[1] - tile.corner[1])
    name = name_of(tile)
    return Sheet(
        name=name,
        title=f"Template, column {tile.column}, row {tile.row}",
        description="Plan 1:1, to be joined at the register crosses",
        size_mm=_SIZE_MM,
        scale=1.0,
        origin_mm=origin,
        window_mm=(_CORNER_MM, (_CORNER_MM[0] + CELL_MM[0], _CORNER_MM[1] + CELL_MM[1])),
        layers=sheet_layers(()),
        model=tuple(_shown(tile, drawing, layout)),
        paper=tuple(_furniture(tile, layout, sha256, number)),
        properties=(("layout sha256", sha256),),
    )


def name_of(tile: Tile) -> str:
    """Return the name of a cell's sheet."""
    return f"template-{tile.column}-{tile.row}"


def _shown(tile: Tile, drawing: Drawing, layout: Layout) -> Iterator[Primitive]:
    window = tile.window
    crowd = Crowd(window)
    for layer, points in drawing.strokes:
        piece = shapely.clip_by_rect(shapely.LineString(points), *window)
        for part in shapely.get_parts(piece):
            corners = tuple((float(x), float(y)) for x, y in part.coords)
            if len(corners) > 1:
                crowd.add_line(corners, beam=True)
                yield Polyline(layer, corners)
    for at, words in drawing.words:
        if window.left <= at[0] <= window.right and window.low <= at[1] <= window.high:
            yield from _named(words, at, crowd)
    yield from _holes(layout, window, crowd.boxes)


def _named(words: str, at: Point, crowd: Crowd) -> Iterator[Primitive]:
    """Write words near their place, clear of lines, with a leader where that is not beside it."""
    place = crowd.place((width_mm(words, MIDDLE_MM), MIDDLE_MM), [(at, _OFF_MM)])
    if place is None:
        yield Text("TAGS", (at[0] + _OFF_MM, at[1] + _OFF_MM), words, MIDDLE_MM)
        return
    yield Text("TAGS", place.middle, words, MIDDLE_MM, Across.CENTRE, Up.MIDDLE)
    if place.leader is not None:
        yield Line("TAGS", *place.leader)


def _holes(layout: Layout, window: Window, lettering: Iterable[Window]) -> Iterator[Line]:
    """Draw a small cross at every hole of the bench, none of them under lettering."""
    grid, reach, boxes = holes_of(layout), _FINE_MM, list(lettering)
    if grid is None:
        return
    for column in range(grid.columns):
        x = grid.first[0] + column * grid.pitch_mm
        if not window.left + reach <= x <= window.right - reach:
            continue
        for row in range(grid.rows):
            y = grid.first[1] + row * grid.pitch_mm
            if not window.low + reach <= y <= window.high - reach:
                continue
            near = (b.left - reach < x < b.right + reach for b in boxes)
            over = (b.low - reach < y < b.high + reach for b in boxes)
            if not any(map(all, zip(near, over, strict=True))):
                yield Line("HOLES", (x - reach, y), (x + reach, y))
                yield Line("HOLES", (x, y - reach), (x, y + reach))


def _furniture(tile: Tile, layout: Layout, sha256: str, number: str) -> Iterator[Primitive]:
    (x0, y0), (width, height) = _CORNER_MM, CELL_MM
    for x in (x0, x0 + width):
        for y in (y0, y0 + height):
            yield Circle("SHEET", (x, y), _CROSS_MM / 2)
            yield Line("SHEET", (x - _CROSS_MM, y), (x + _CROSS_MM, y))
            yield Line("SHEET", (x, y - _CROSS_MM), (x, y + _CROSS_MM))
    left = (_SIZE_MM[0] - CHECK_MM) / 2
    yield Line("DIMENSIONS", (left, 14.0), (left + CHECK_MM, 14.0))
    for n in range(4):
        x, reach = left + n * CHECK_MM / 3, 3.0 if n in (0, 3) else 1.5
        yield Line("DIMENSIONS", (x, 14.0 - reach), (x, 14.0 + reach))
    words = f"{CHECK_MM:g} mm: measure before use; print at 100 %"
    yield Text("NOTES", (_SIZE_MM[0] / 2, 16.0), words, SMALL_MM, Across.CENTRE)
    top = _SIZE_MM[1] - 12.0
    heading = f"TEMPLATE 1:1  column {tile.column}, row {tile.row}; page {number}"
    yield Text("NOTES", (_SIZE_MM[0] / 2, 6.5), SHORT, SMALL_MM, Across.CENTRE)
    yield Text("TITLE", (x0, top), heading, LARGE_MM, up=Up.MIDDLE)
    d = layout.drawing
    about = [layout.title, d.number, layout.revision and f"rev {layout.revision}", sha256[:16]]
    words = shorten(", ".join(w for w in about if w), 210.0, SMALL_MM)
    yield Text("NOTES", (x0 + width, top), words, SMALL_MM, Across.RIGHT, Up.MIDDLE)
    corner = f"lower left cross: x = {tile.corner[0]:g}, y = {tile.corner[1]:g} of the bench"
    yield Text("NOTES", (x0, 22.0), corner, SMALL_MM)
    joined = "rows run away from the operator, columns to the right; lay cross on cross"
    yield Text("NOTES", (x0 + width, 22.0), joined, SMALL_MM, Across.RIGHT)
