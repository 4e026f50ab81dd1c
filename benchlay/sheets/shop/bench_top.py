"""The view of the drilling sheet: the bench top, what stands on it, its holes and dimensions."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from benchlay.layout.layout import Layout
from benchlay.making.blank import RoundHole
from benchlay.placing.placed import PlacedState
from benchlay.sheets.drafting.surroundings import holes_of
from benchlay.sheets.lettering import SMALL_MM, width_mm
from benchlay.sheets.primitives import (
    Across,
    Axis,
    Circle,
    Dimension,
    Line,
    Point,
    Polyline,
    Primitive,
    Text,
    Up,
)
from benchlay.sheets.scale import Window
from benchlay.sheets.shop.numbering import numbered
from benchlay.sheets.shop.ordinates import DECIMALS, datum_mark, distinct, fits, running
from benchlay.sheets.shop.setting_out import footing

RIGHT_MM = 20.0  # that the view takes beyond the bench top
HEADING_MM = 26.0
_OVERALL_MM = 14.0  # of the dimensions of the whole bench, off it: beyond the letters
_EVERY = 5  # columns and rows that are lettered
_DRAWN_MM = 6.0  # of a hole whose thread gives no size


def extent(layout: Layout) -> tuple[Point, Point]:
    """Return the lower left and the upper right corner of the bench top's box."""
    xs, ys = zip(*layout.bench.outline, strict=True)
    return (min(xs), min(ys)), (max(xs), max(ys))


def bench_top(
    state: PlacedState, places: Sequence[Point], scale: int, decimal: str
) -> list[Primitive]:
    """Draw the bench top with its holes at their places, in their order."""
    layout = state.layout
    low, high = extent(layout)
    out: list[Primitive] = [Polyline("BENCH", tuple(layout.bench.outline), closed=True)]
    standing = list(_standing(state, scale))
    out += standing
    grid = layout.bench.holes
    datum = grid.first_mm if grid else low
    radius = _radius(grid.thread if grid else "")
    out += [Circle("BENCH", at, max(radius, 0.7 * scale)) for at in places]
    lines: list[Sequence[Point]] = [(*layout.bench.outline, layout.bench.outline[0])]
    for p in standing:
        lines.append((p.start, p.end) if isinstance(p, Line) else (*p.points, p.points[0]))
    numbers = list(
        numbered([RoundHole(at, 2 * radius, "") for at in places], (low, high), scale, lines=lines)
    )
    out += _grid_marks(layout, scale, [_box(t, scale) for t in numbers if isinstance(t, Text)])
    out += numbers
    for k, across in enumerate((True, False)):
        edges = [low[k] - datum[k], high[k] - datum[k], 0.0]
        wanted = distinct([*edges, *(at[k] - datum[k] for at in places)])
        told = wanted if fits(len(wanted), high[k] - low[k], scale) else edges
        out += running(
            told, across=across, datum=datum, edge=low[1 - k], scale=scale, decimal=decimal
        )
    off = _OVERALL_MM * scale
    for axis, line in (
        (Axis.HORIZONTAL, (low[0], high[1] + off)),
        (Axis.VERTICAL, (high[0] + off, low[1])),
    ):
        near = (low[0], high[1]) if axis is Axis.HORIZONTAL else (high[0], low[1])
        out.append(Dimension("DIMENSIONS", axis, near, high, line, decimals=DECIMALS))
    return out + datum_mark(datum, scale)


def _standing(state: PlacedState, scale: int) -> Iterator[Line | Polyline]:
    """Draw feet, and a cross where posts and bolts are."""
    for name in sorted(state.elements):
        stands = footing(state.elements[name])
        if stands is None:
            continue
        if stands.foot:
            yield Polyline("BODIES", stands.foot, closed=True)
        for x, y in (*stands.slots, stands.at):
            reach = 1.5 * scale
            yield Line("AXIS", (x - reach, y), (x + reach, y))
            yield Line("AXIS", (x, y - reach), (x, y + reach))


def _box(text: Text, scale: int) -> Window:
    """Return the box round a number, model mm, with room for a grid mark's arm."""
    (x, y), wide = text.at, (width_mm(text.text, text.height_mm) / 2 + 1.0) * scale
    tall = (text.height_mm / 2 + 1.0) * scale
    return Window(x - wide, y - tall, x + wide, y + tall)


def _radius(thread: str) -> float:
    """Return the radius of a metric thread's crest; others are drawn as M6."""
    digits = thread[1:].split("x")[0].strip() if thread[:1] in "Mm" else ""
    try:
        return float(digits) / 2
    except ValueError:
        return _DRAWN_MM / 2


def _grid_marks(layout: Layout, scale: int, lettered: list[Window]) -> Iterator[Primitive]:
    """Letter columns and rows along the upper and the right edge, and cross every fifth hole.

    No cross stands under lettering.
    """
    holes = holes_of(layout)
    if holes is None:
        return
    _, high = extent(layout)
    (x0, y0), pitch, reach = holes.first, holes.pitch_mm, 0.8 * scale
    columns = [1, *range(_EVERY, holes.columns + 1, _EVERY)]
    rows = [1, *range(_EVERY, holes.rows + 1, _EVERY)]
    for column in columns:
        x = x0 + (column - 1) * pitch
        at = (x, high[1] + 1.5 * scale)
        yield Text("HOLES", at, str(column), SMALL_MM, Across.CENTRE)
        for row in rows:
            y = y0 + (row - 1) * pitch
            if any(b.left < x < b.right and b.low < y < b.high for b in lettered):
                continue
            yield Line("HOLES", (x - reach, y), (x + reach, y))
            yield Line("HOLES", (x, y - reach), (x, y + reach))
    for row in rows:
        at = (high[0] + 1.5 * scale, y0 + (row - 1) * pitch)
        yield Text("HOLES", at, str(row), SMALL_MM, Across.LEFT, Up.MIDDLE)
