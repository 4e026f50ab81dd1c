"""Rows of dimensions round a rectangle, and the room their figures take.

Spacing after ISO 129-1 (from memory): the first row 10 mm from the outline, each next one 8.
"""

from __future__ import annotations

import itertools
import math
from collections.abc import Iterable

from benchlay.sheets.lettering import width_mm
from benchlay.sheets.primitives import (
    RUNNING_OUT_MM,
    Axis,
    Dimension,
    Point,
    Sheet,
    direction_of,
    label_of,
    line_ends,
    outward,
    to_paper,
)
from benchlay.sheets.scale import Window

FIRST_ROW_MM = 12.0
NEXT_ROW_MM = 8.0
_BETWEEN_MM = 1.0  # figure above its line
_ARROWS_MM = 6.0


def below(
    layer: str, places: Iterable[float], low: float, rows: int, scale: float
) -> list[Dimension]:
    """Dimension consecutive places along x in one row below a rectangle.

    Parameters
    ----------
    layer : str
        For the dimensions.
    places : iterable of float
        x of the features, model mm, ascending; repeated ones are taken once.
    low : float
        y of the rectangle's lower edge, model mm.
    rows : int
        How many rows are already there.
    scale : float
        N of 1:N.
    """
    y = low - (FIRST_ROW_MM + rows * NEXT_ROW_MM) * scale
    ordered = sorted(set(places))
    return [
        Dimension(layer, Axis.HORIZONTAL, (a, low), (b, low), (a, y))
        for a, b in itertools.pairwise(ordered)
    ]


def beside(
    layer: str, places: Iterable[float], left: float, rows: int, scale: float
) -> list[Dimension]:
    """Dimension consecutive places along y in one row left of a rectangle; see `below`."""
    x = left - (FIRST_ROW_MM + rows * NEXT_ROW_MM) * scale
    ordered = sorted(set(places))
    return [
        Dimension(layer, Axis.VERTICAL, (left, a), (left, b), (x, a))
        for a, b in itertools.pairwise(ordered)
    ]


def figure_box(dimension: Dimension, sheet: Sheet) -> Window:
    """Return the box on paper round a model dimension's figure, upright or turned."""
    if dimension.running:
        return _running_box(dimension, sheet)
    start, end = (to_paper(sheet, point) for point in line_ends(dimension))
    ux, uy = direction_of(dimension)
    if (end[0] - start[0]) * ux + (end[1] - start[1]) * uy < 0.0:
        start, end = end, start
    width = width_mm(label_of(dimension, sheet.decimal), dimension.height_mm)
    share = dimension.figure_share
    middle = (
        start[0] + share * (end[0] - start[0]),
        start[1] + share * (end[1] - start[1]),
    )
    if width > math.dist(start, end) - _ARROWS_MM:
        out = _ARROWS_MM + 1.0 + width / 2
        if dimension.figure_share == 0.0:
            middle = (start[0] - ux * out, start[1] - uy * out)
        else:
            middle = (end[0] + ux * out, end[1] + uy * out)
    lift = _BETWEEN_MM + dimension.height_mm / 2
    x, y = middle[0] - uy * lift, middle[1] + ux * lift
    half = _turned((width / 2, dimension.height_mm / 2 + 0.5), (ux, uy))
    return Window(x - half[0], y - half[1], x + half[0], y + half[1])


def _running_box(dimension: Dimension, sheet: Sheet) -> Window:
    ux, uy = direction_of(dimension)
    x, y = to_paper(sheet, line_ends(dimension)[1])
    out = outward(dimension)
    x += ux * dimension.figure_aside_mm + out[0] * RUNNING_OUT_MM
    y += uy * dimension.figure_aside_mm + out[1] * RUNNING_OUT_MM
    width = width_mm(label_of(dimension, sheet.decimal), dimension.height_mm)
    half = dimension.height_mm / 2 + 0.3
    far = (x + out[0] * width, y + out[1] * width)
    if ux:
        return Window(x - half, min(y, far[1]), x + half, max(y, far[1]))
    return Window(min(x, far[0]), y - half, max(x, far[0]), y + half)


def _turned(half: Point, along: Point) -> Point:
    """Return half the size of the upright box round a turned one."""
    ux, uy = abs(along[0]), abs(along[1])
    return (half[0] * ux + half[1] * uy, half[0] * uy + half[1] * ux)
