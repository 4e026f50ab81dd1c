"""The frame of a sheet: border, centring marks and reference zones.

Measures after ISO 5457 (from memory): frame 0,7 wide, 20 mm from the left edge and 10 mm from
the others; zones of 50 mm counted from the centring marks, letters down, numbers across,
without I and O, in a strip 5 mm wide outside the frame.
"""

from __future__ import annotations

import itertools
import math
from collections.abc import Iterator

from benchlay.sheets.lettering import SMALL_MM
from benchlay.sheets.primitives import Across, Line, Point, Polyline, Primitive, Text, Up
from benchlay.sheets.scale import Window, frame_of

_ZONE_MM = 50.0
_STRIP_MM = 5.0
_MARK_INSIDE_MM = 5.0
WIDTH_MM = 180.0  # of the title block, at the right
_LETTERS = "ABCDEFGHJKLMNPQRSTUVWXYZ"


def rectangle(layer: str, window: Window) -> Polyline:
    """Return the outline of a window."""
    left, low, right, high = window
    corners = ((left, low), (right, low), (right, high), (left, high))
    return Polyline(layer, corners, closed=True)


def frame(size_name: str, size_mm: Point) -> Iterator[Primitive]:
    """Draw the frame of a sheet, with the sheet's size in the lower margin."""
    inner = frame_of(size_mm)
    left, low, right, high = inner
    strip = Window(left - _STRIP_MM, low - _STRIP_MM, right + _STRIP_MM, high + _STRIP_MM)
    yield rectangle("SHEET", inner)
    yield rectangle("TITLE", strip)
    yield from _centring_marks(inner, size_mm)
    yield from _numbers(inner, strip, size_mm[0] / 2)
    yield from _letters(inner, strip)
    at = (inner.right, strip.low - 1.0)
    yield Text("TITLE", at, size_name, SMALL_MM, Across.RIGHT, Up.TOP)


def _centring_marks(inner: Window, size_mm: Point) -> Iterator[Line]:
    """Draw four marks at the middles of the sheet's sides, from the strip's outer edge."""
    x, y = size_mm[0] / 2, size_mm[1] / 2
    out, into = _STRIP_MM, _MARK_INSIDE_MM
    # On A4 the title block stands over the middle, and the mark would run into its lettering.
    foot = into if inner.right - WIDTH_MM > x else 0.0
    yield Line("SHEET", (x, inner.low - out), (x, inner.low + foot))
    yield Line("SHEET", (x, inner.high - into), (x, inner.high + out))
    yield Line("SHEET", (inner.left - out, y), (inner.left + into, y))
    yield Line("SHEET", (inner.right - into, y), (inner.right + out, y))


def _edges(low: float, high: float, middle: float) -> list[float]:
    """Return where zones end: every 50 mm from the middle, the rest in the end zones."""
    below = max(1, math.floor((middle - low) / _ZONE_MM + 0.5))
    above = max(1, math.floor((high - middle) / _ZONE_MM + 0.5))
    inner = [middle + n * _ZONE_MM for n in range(1 - below, above)]
    return [low, *inner, high]


def _numbers(inner: Window, strip: Window, middle: float) -> Iterator[Primitive]:
    edges = _edges(inner.left, inner.right, middle)
    for n, (start, end) in enumerate(itertools.pairwise(edges), start=1):
        x = (start + end) / 2
        for low, high in ((strip.low, inner.low), (inner.high, strip.high)):
            at = (x, (low + high) / 2)
            yield Text("TITLE", at, str(n), SMALL_MM, Across.CENTRE, Up.MIDDLE)
            if end < inner.right:
                yield Line("TITLE", (end, low), (end, high))


def _letters(inner: Window, strip: Window) -> Iterator[Primitive]:
    edges = _edges(inner.low, inner.high, (inner.low + inner.high) / 2)
    zones = list(itertools.pairwise(edges))
    for letter, (start, end) in zip(_LETTERS, reversed(zones), strict=False):
        y = (start + end) / 2
        for left, right in ((strip.left, inner.left), (inner.right, strip.right)):
            at = ((left + right) / 2, y)
            yield Text("TITLE", at, letter, SMALL_MM, Across.CENTRE, Up.MIDDLE)
            if start > inner.low:
                yield Line("TITLE", (left, start), (right, start))
