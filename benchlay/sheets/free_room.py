"""Where on a sheet there is nothing yet: a raster of the paper, in which room is looked up.

A tag that finds no place beside what it names goes to the nearest free room anywhere, with a
leader. With the sums of all cells to the left and below, every place for a box is tried at
once, whatever stands on the sheet (Crow, 1984, Summed-area tables).
"""

from __future__ import annotations

import math

import numpy as np
from numpy.typing import NDArray

from benchlay.sheets.primitives import Point
from benchlay.sheets.scale import Window

Floats = NDArray[np.float64]

CELL_MM = 1.0
_STEP = 0.25  # of a cell: so finely lines are sampled

_LONG_MM = 10_000.0  # longer than any sheet: only what runs over the window is sampled


class FreeRoom:
    """Cells of a window on paper, and which of them are taken."""

    def __init__(self, window: Window) -> None:
        """Start with an empty window."""
        self._window = window
        rows = max(0, math.floor(window.height / CELL_MM))
        columns = max(0, math.floor(window.width / CELL_MM))
        self._taken = np.zeros((rows, columns), dtype=np.bool_)

    def take_box(self, box: Window) -> None:
        """Take every cell that a box touches."""
        left, low = self._window.left, self._window.low
        x0, y0 = math.floor((box.left - left) / CELL_MM), math.floor((box.low - low) / CELL_MM)
        x1, y1 = math.ceil((box.right - left) / CELL_MM), math.ceil((box.high - low) / CELL_MM)
        self._taken[max(y0, 0) : max(y1, 0), max(x0, 0) : max(x1, 0)] = True

    def take_line(self, start: Point, end: Point) -> None:
        """Take the cells that a straight line runs through."""
        if math.dist(start, end) > _LONG_MM:
            start, end = self._near(start, end)
        count = max(2, math.ceil(math.dist(start, end) / (_STEP * CELL_MM)))
        x = np.linspace(start[0], end[0], count) - self._window.left
        y = np.linspace(start[1], end[1], count) - self._window.low
        columns, rows = (np.floor(v / CELL_MM).astype(np.int64) for v in (x, y))
        high, wide = self._taken.shape
        inside = (rows >= 0) & (rows < high) & (columns >= 0) & (columns < wide)
        self._taken[rows[inside], columns[inside]] = True

    def _near(self, start: Point, end: Point) -> tuple[Point, Point]:
        """Return the stretch of a line over the window; one of no length where it misses it."""
        window = self._window
        low, high = 0.0, 1.0
        for a, b, least, most in (
            (start[0], end[0], window.left, window.right),
            (start[1], end[1], window.low, window.high),
        ):
            if a != b:
                first, last = sorted(((least - a) / (b - a), (most - a) / (b - a)))
                low, high = max(low, first), min(high, last)
        high = max(low, high)
        at, to = (
            (start[0] + t * (end[0] - start[0]), start[1] + t * (end[1] - start[1]))
            for t in (low, high)
        )
        return at, to

    def places(self, size_mm: Point, near: Point, most: int) -> Floats:
        """Return free boxes (K, 4) of a size, the nearest to a point first, `most` at most.

        Parameters
        ----------
        size_mm : tuple of float
            Width and height on paper.
        near : tuple of float
            On paper.
        most : int
        """
        wide, high = (math.ceil(side / CELL_MM) for side in size_mm)
        sums = np.zeros(tuple(n + 1 for n in self._taken.shape), dtype=np.int64)
        sums[1:, 1:] = self._taken.cumsum(axis=0).cumsum(axis=1)
        if wide >= sums.shape[1] or high >= sums.shape[0]:
            return np.empty((0, 4))
        inside = sums[high:, wide:] - sums[:-high, wide:] - sums[high:, :-wide]
        rows, columns = np.nonzero(inside + sums[:-high, :-wide] == 0)
        x = self._window.left + CELL_MM * columns
        y = self._window.low + CELL_MM * rows
        boxes = np.stack([x, y, x + size_mm[0], y + size_mm[1]], axis=1)
        aside = np.clip(near[0], boxes[:, 0], boxes[:, 2]) - near[0]
        above = np.clip(near[1], boxes[:, 1], boxes[:, 3]) - near[1]
        order = np.argsort(np.hypot(aside, above), kind="stable")[:most]
        nearest: Floats = boxes[order]
        return nearest
