"""The board a plan is drawn on: its sheet, scale and place, and what crowds it."""

from __future__ import annotations

import math
from collections.abc import Iterable, Iterator, Sequence

from benchlay.named import NamedTuple
from benchlay.sheets.contents import Picture
from benchlay.sheets.frame import WIDTH_MM
from benchlay.sheets.placing_text import Crowd
from benchlay.sheets.primitives import Point
from benchlay.sheets.scale import (
    ABOVE_MM,
    COLUMN_MM,
    Choice,
    Window,
    choices,
    frame_of,
    view_of,
)
from benchlay.sheets.title_block import HEIGHT_MM

_CLEAR_MM = 2.0
BLOCK_MM, BLOCK_GAP_MM = 101.0, 4.0  # of the table of elements
_HEAD_MM, _ROW_MM = 11.0, 4.95  # of that table: its headings, each of its rows
_SCALE_BAR_MM = 17.0
_DIMENSIONS_MM = 26.0  # two rows below the view, with the figures


class Board(NamedTuple):
    """Sheet and scale, and the conversions between paper and model."""

    choice: Choice
    origin_mm: Point  # of the model, on paper
    field: Window  # where the drawing may go at all, on paper
    column: Window  # where tables go
    crowd: Crowd  # on paper; grows while the plan is drawn
    strip: tuple[Window, int] | None = None  # for the table of elements: where, and its blocks

    @property
    def scale(self) -> float:
        """N of 1:N."""
        return float(self.choice.scale)

    def long(self, paper_mm: float) -> float:
        """Return how long in the model is what has a length on paper."""
        return paper_mm * self.choice.scale

    def on_paper(self, point: Sequence[float]) -> Point:
        """Return where a point of the model lies on paper; a height is left aside."""
        x, y = self.origin_mm
        return (x + point[0] / self.choice.scale, y + point[1] / self.choice.scale)

    def in_model(self, point: Point) -> Point:
        """Return the point of the model at a place on paper."""
        x, y = self.origin_mm
        return ((point[0] - x) * self.choice.scale, (point[1] - y) * self.choice.scale)

    def field_in_model(self) -> Window:
        """Return the field, in the model's coordinates."""
        low = self.in_model((self.field.left, self.field.low))
        high = self.in_model((self.field.right, self.field.high))
        return Window(*low, *high)

    def crowd_model_line(
        self, points: Iterable[Point], *, closed: bool = False, beam: bool = False
    ) -> None:
        """Let tags keep off a line of the model; see `Crowd.add_line`."""
        self.crowd.add_line([self.on_paper(p) for p in points], closed=closed, beam=beam)


def boards(picture: Picture) -> Iterator[Board]:
    """Choose sheet and scale for a picture, then larger ones for what is too full for it.

    Raises
    ------
    NothingFitsError
        If no listed sheet and scale hold the bench with its panels.
    """
    left, low, right, high = extent(picture)
    for choice in choices((right - left, high - low), picture.sheet, picture.scale):
        yield lay_out(picture, choice)


def lay_out(picture: Picture, choice: Choice) -> Board:
    """Return where on a sheet the bench stands, and the tables."""
    left, low, right, high = extent(picture)
    view, inner = view_of(choice.size_mm), frame_of(choice.size_mm)
    n = choice.scale
    # In the middle of its field: light that leaves the bench needs room on every side.
    spare = (view.width - (right - left) / n, view.height - (high - low) / n)
    foot = view.low + spare[1] / 2
    strip = _strip(len(picture.items), inner, foot + spare[1] / 2 - _DIMENSIONS_MM)
    if strip is not None:
        foot = max(foot, strip[0].high + _DIMENSIONS_MM)
    origin = (view.left + spare[0] / 2 - left / n, foot - low / n)
    column_left = inner.right - COLUMN_MM + _CLEAR_MM
    title_top = inner.low + HEIGHT_MM + _CLEAR_MM
    field = Window(
        inner.left + _CLEAR_MM,
        title_top if strip is None else max(title_top, strip[0].high + _CLEAR_MM),
        column_left - _CLEAR_MM,
        inner.high - ABOVE_MM / 2,
    )
    column = Window(column_left, title_top, inner.right - _CLEAR_MM, inner.high - _CLEAR_MM)
    return Board(choice, origin, field, column, Crowd(field), strip)


def _strip(items: int, inner: Window, highest: float) -> tuple[Window, int] | None:
    """Return where a table of so many rows stands left of the title block, below the view."""
    low = inner.low + _SCALE_BAR_MM
    left, right = inner.left + _CLEAR_MM, inner.right - WIDTH_MM - _CLEAR_MM
    blocks = int((right - left + BLOCK_GAP_MM) // (BLOCK_MM + BLOCK_GAP_MM))
    if not items or not blocks:
        return None
    blocks = min(blocks, items)
    high = low + _HEAD_MM + _ROW_MM * math.ceil(items / blocks)
    if high > highest:
        return None
    return Window(left, low, right, high), blocks


def extent(picture: Picture) -> tuple[float, float, float, float]:
    """Return the corners of what must be seen: the bench, its panels, all that stands."""
    points = [*picture.outline]
    for panel in picture.panels:
        points += [panel.start, panel.end]
    points += [item.at[:2] for item in picture.items]
    xs, ys = [p[0] for p in points], [p[1] for p in points]
    return min(xs), min(ys), max(xs), max(ys)
