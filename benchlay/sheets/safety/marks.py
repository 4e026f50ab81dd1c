"""The warning triangle of a drawing: plain, with the number of its sign beside it.

It stands for the sign of ISO 7010 (W004) and is no picture of it; the schedule of signs says
which goes where.
"""

from __future__ import annotations

import math
from collections.abc import Iterator

from benchlay.sheets.lettering import SMALL_MM
from benchlay.sheets.primitives import Point, Polyline, Primitive, Text, Up

LAYER = "TAGS"
_GAP_MM = 1.0


def warning_mark(at: Point, side_mm: float, number: str = "") -> Iterator[Primitive]:
    """Draw a triangle about a point, and the number of its sign at its right.

    Parameters
    ----------
    at : Point
        The middle of the triangle's height and width, on paper.
    side_mm : float
        Length of its sides.
    number : str
        Such as LB1; nothing is written for none.
    """
    x, y = at
    half, height = side_mm / 2.0, side_mm * math.sqrt(3.0) / 2.0
    low, top = y - height / 2.0, y + height / 2.0
    yield Polyline(LAYER, ((x - half, low), (x + half, low), (x, top)), closed=True)
    inset = 0.14 * side_mm
    inner = (
        (x - half + 1.73 * inset, low + inset),
        (x + half - 1.73 * inset, low + inset),
        (x, top - 2.0 * inset),
    )
    yield Polyline(LAYER, inner, closed=True)
    if number:
        yield Text(LAYER, (x + half + _GAP_MM, y), number, SMALL_MM, up=Up.MIDDLE)
