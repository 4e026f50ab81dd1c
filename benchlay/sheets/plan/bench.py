"""The bench itself: outline, holes, datum and main dimensions."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from benchlay.sheets.contents import Holes, Picture
from benchlay.sheets.dimensions import below, beside
from benchlay.sheets.lettering import width_mm
from benchlay.sheets.plan.board import Board
from benchlay.sheets.primitives import (
    Circle,
    Dimension,
    Fill,
    Line,
    Point,
    Polyline,
    Primitive,
    figure,
    measured,
)
from benchlay.sheets.scale import Window

_CROSS_MM = 1.6
_ARROWS_MM = 8.0  # two arrowheads, and a little
_CLOSEST_MM = 9.0  # holes drawn nearer than this are specks: every second, fifth, … then
_STEPS = (1, 2, 4, 5, 10, 20, 50, 100)
USED_MM = 1.1  # radius of the ring round a hole that is used
ARROW_MM = 15.0  # of the directions from the datum


def bench(picture: Picture, board: Board) -> Iterator[Primitive]:
    """Draw the outline and the datum."""
    yield Polyline("BENCH", picture.outline, closed=True)
    board.crowd_model_line(picture.outline, closed=True, beam=True)
    if picture.holes is not None and picture.shows(picture.holes.first[0]):
        yield from _datum(picture.holes, board)


def hole_step(holes: Holes, scale: float) -> int:
    """Return of how many holes one is drawn; the first is always."""
    for step in _STEPS:
        if step * holes.pitch_mm / scale >= _CLOSEST_MM:
            return step
    return _STEPS[-1]


def holes(picture: Picture, board: Board, lettering: Sequence[Window]) -> Iterator[Line]:
    """Draw small crosses, none of them under lettering; outlines would be a grey field."""
    grid = picture.holes
    if grid is None:
        return
    step, half = hole_step(grid, board.scale), board.long(_CROSS_MM) / 2
    for row in range(0, grid.rows, step):
        y = grid.first[1] + row * grid.pitch_mm
        for column in range(0, grid.columns, step):
            x = grid.first[0] + column * grid.pitch_mm
            if picture.shows(x) and not _under(board.on_paper((x, y)), lettering):
                yield Line("HOLES", (x - half, y), (x + half, y))
                yield Line("HOLES", (x, y - half), (x, y + half))


def used_holes(picture: Picture, board: Board) -> Iterator[Circle]:
    """Ring the holes that something is held by."""
    for at in picture.used_holes:
        yield Circle("HOLES", at, board.long(USED_MM))


def _under(point: Point, boxes: Sequence[Window]) -> bool:
    x, y = point
    near = _CROSS_MM
    return any(
        left - near < x < right + near and low - near < y < high + near
        for left, low, right, high in boxes
    )


def _datum(holes: Holes, board: Board) -> Iterator[Primitive]:
    x, y = holes.first
    reach, tip, half = board.long(ARROW_MM), board.long(3.0), board.long(0.6)
    for radius in (2.0, 3.0):
        yield Circle("DATUM", holes.first, board.long(radius))
    for ux, uy in ((1.0, 0.0), (0.0, 1.0)):
        end = (x + reach * ux, y + reach * uy)
        back = (end[0] - tip * ux, end[1] - tip * uy)
        side = (half * uy, half * ux)
        yield Line("DATUM", holes.first, back)
        corners = (end, (back[0] + side[0], back[1] + side[1]))
        yield Fill("DATUM", (*corners, (back[0] - side[0], back[1] - side[1])))
        board.crowd_model_line((holes.first, end))


def main_dimensions(picture: Picture, board: Board) -> list[Dimension]:
    """Return overall sizes, and the datum hole from both edges and along its rows."""
    if picture.part is not None:
        return []  # they stand on the whole plan
    xs, ys = [p[0] for p in picture.outline], [p[1] for p in picture.outline]
    left, low = min(xs), min(ys)
    out: list[Dimension] = []
    rows = 0
    holes = picture.holes
    if holes is not None:
        last = (holes.columns - 1) * holes.pitch_mm, (holes.rows - 1) * holes.pitch_mm
        x, y = holes.first
        across = below("DIMENSIONS", (left, x, x + last[0]), low, 0, board.scale)
        up = beside("DIMENSIONS", (low, y, y + last[1]), left, 0, board.scale)
        # From the edge to the first hole there is mostly no room: below, where benches are long,
        # the figure stands beyond that hole, at the side before the edge.
        up[0] = up[0]._replace(figure_share=0.0)
        out += _with_counts(across, holes.columns, holes.pitch_mm, picture.decimal, board.scale)
        out += _with_counts(up, holes.rows, holes.pitch_mm, picture.decimal, board.scale)
        rows = 1
    out += below("DIMENSIONS", (left, max(xs)), low, rows, board.scale)
    out += beside("DIMENSIONS", (low, max(ys)), left, rows, board.scale)
    return out


def _with_counts(
    row: list[Dimension], count: int, pitch_mm: float, decimal: str, scale: float
) -> list[Dimension]:
    """Write a row of holes as so many pitches, never as a chain of them, where there is room."""
    if count > 1:
        pitch, total = (figure(v, 3, decimal) for v in (pitch_mm, (count - 1) * pitch_mm))
        text = f"{count - 1} × {pitch} (= {total})"
        if width_mm(text, row[-1].height_mm) < measured(row[-1]) / scale - _ARROWS_MM:
            row[-1] = row[-1]._replace(text=text)
    return row


def levels_note(picture: Picture) -> str:
    """Return the note that says from where heights are measured."""
    height = figure(picture.beam_height_mm, 2, picture.decimal)
    return f"Beam height +{height} where no level is written; heights are above the bench top (±0)."
