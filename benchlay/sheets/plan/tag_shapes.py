"""What a tag looks like: its size, its border, its lines, the triangle of a zone."""

from __future__ import annotations

import math
from collections.abc import Iterator, Sequence

from benchlay.named import NamedTuple
from benchlay.sheets.frame import rectangle
from benchlay.sheets.lettering import LINE_PITCH, SMALL_MM, plain, width_mm
from benchlay.sheets.placing_text import Place
from benchlay.sheets.primitives import Across, Line, Point, Polyline, Primitive, Text
from benchlay.sheets.scale import Window

_PAD_MM = 0.8
_X_MM = 0.8
_CORNER = 0.9  # mm, of the rounded border of a stray's tag
_QUARTER = math.tan(math.pi / 8)  # bulge of a quarter circle
_TRIANGLE_MM = 8.0


class Wanted(NamedTuple):
    """A tag: its lines with the layers they are written on, its border, where it belongs."""

    name: str
    lines: tuple[tuple[str, str, float], ...]  # layer, words, height
    border: str  # "", square, rounded
    layer: str  # of border and leader
    anchors: tuple[tuple[Point, float], ...]
    within: Window | None = None  # a body that it may stand in the middle of


def size_of(tag: Wanted) -> Point:
    """Return width and height of a tag's box."""
    pad = 2 * _PAD_MM if tag.border else 0.0
    width = max(width_mm(words, height) for _, words, height in tag.lines)
    tall = _tall(tag.lines)
    if tag.border == "zone":
        return (width + pad + _TRIANGLE_MM + 1.6, max(tall + pad, _TRIANGLE_MM))
    return (width + pad, tall + pad)


def _tall(lines: Sequence[tuple[str, str, float]]) -> float:
    """Return the height from the top of the first line to the foot of the last."""
    descent = 0.25 * lines[-1][2]
    return lines[0][2] + sum(LINE_PITCH * line[2] for line in lines[1:]) + descent


def drawn(tag: Wanted, place: Place) -> Iterator[Primitive]:
    """Draw a tag in its place."""
    box, pad = place.box, _PAD_MM if tag.border else 0.0
    left = box.left + pad
    if tag.border == "square":
        yield rectangle(tag.layer, box)
    elif tag.border == "rounded":
        yield _rounded(tag.layer, box)
    elif tag.border == "zone":
        yield rectangle(tag.layer, box)
        yield from _sign(tag, (box.left + 0.6, (box.low + box.high) / 2))
        left += _TRIANGLE_MM + 0.8
    y = box.high - pad
    for n, (layer, words, height) in enumerate(tag.lines):
        y -= height if n == 0 else LINE_PITCH * height
        if tag.border == "zone":
            yield Text(layer, (left, y), words, height)
        else:
            at = ((box.left + box.right) / 2, y)
            yield Text(layer, at, words, height, Across.CENTRE)
    if place.leader is not None:
        yield Line("TAGS" if tag.layer == "STRAY" else tag.layer, *place.leader)


def _sign(tag: Wanted, at: Point) -> Iterator[Primitive]:
    """Draw the number of a zone in a triangle; a plain one, no safety sign."""
    x, y = at
    side, tall = _TRIANGLE_MM, _TRIANGLE_MM * math.sqrt(0.75)
    low = y - tall / 2
    corners = ((x, low), (x + side, low), (x + side / 2, low + tall))
    yield Polyline(tag.layer, corners, closed=True)
    at = (x + side / 2, low + 0.7)
    yield Text(tag.layer, at, plain(tag.name), SMALL_MM, Across.CENTRE)


def _rounded(layer: str, box: Window) -> Polyline:
    left, low, right, high = box
    c = _CORNER
    points = (
        (left + c, low),
        (right - c, low),
        (right, low + c),
        (right, high - c),
        (right - c, high),
        (left + c, high),
        (left, high - c),
        (left, low + c),
    )
    return Polyline(layer, points, closed=True, bulges=(0.0, _QUARTER) * 4)


def cross(at: Point) -> Iterator[Line]:
    """Mark the point whose height is written."""
    x, y = at
    yield Line("LEVELS", (x - _X_MM, y - _X_MM), (x + _X_MM, y + _X_MM))
    yield Line("LEVELS", (x - _X_MM, y + _X_MM), (x + _X_MM, y - _X_MM))
