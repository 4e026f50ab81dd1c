"""Numbers beside holes: inside the sheet, clear of one another."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from benchlay.making.blank import RoundHole
from benchlay.sheets.lettering import SMALL_MM, width_mm
from benchlay.sheets.primitives import Across, Point, Text, Up

_OFF_MM = 2.0
_WAYS = ((1, 0), (-1, 0), (0, 1), (0, -1), (1, 1), (-1, 1), (1, -1), (-1, -1), (2, 2), (-2, 2))
_Box = tuple[float, float, float, float]


def numbered(
    holes: Sequence[RoundHole], size_mm: Point, scale: float, names: Sequence[str] = ()
) -> Iterator[Text]:
    """Write a name beside each hole, where there is room within the sheet.

    Parameters
    ----------
    holes : sequence of RoundHole
        In the order of their numbers.
    size_mm : tuple of float
        Of the sheet, model mm; its lower left corner is the origin.
    scale : float
        N of 1:N.
    names : sequence of str
        H1, H2, ... by default; nothing is written for an empty one.
    """
    taken: list[_Box] = [_round(hole, scale) for hole in holes]
    for n, hole in enumerate(holes, start=1):
        words = names[n - 1] if names else f"H{n}"
        if not words:
            continue
        half = (width_mm(words, SMALL_MM) / 2 * scale, SMALL_MM / 2 * scale)
        boxes = [_beside(hole, way, half, scale) for way in _WAYS]
        free = [b for b in boxes if _within(b, size_mm) and not any(_meet(b, t) for t in taken)]
        box = (free or boxes)[0]
        taken.append(box)
        at = ((box[0] + box[2]) / 2, (box[1] + box[3]) / 2)
        yield Text("TAGS", at, words, SMALL_MM, Across.CENTRE, Up.MIDDLE)


def _round(hole: RoundHole, scale: float) -> _Box:
    (x, y), r = hole.centre, hole.diameter_mm / 2 + scale
    return x - r, y - r, x + r, y + r


def _beside(hole: RoundHole, way: tuple[int, int], half: Point, scale: float) -> _Box:
    (x, y), off = hole.centre, hole.diameter_mm / 2 + _OFF_MM * scale
    x, y = x + way[0] * (off + half[0]), y + way[1] * (off + half[1])
    return x - half[0], y - half[1], x + half[0], y + half[1]


def _within(box: _Box, size_mm: Point) -> bool:
    return box[0] > 0.0 and box[1] > 0.0 and box[2] < size_mm[0] and box[3] < size_mm[1]


def _meet(a: _Box, b: _Box) -> bool:
    return a[0] < b[2] and b[0] < a[2] and a[1] < b[3] and b[1] < a[3]
