"""Finds places for words and signs beside what they belong to, none on another."""

from __future__ import annotations

import math

from benchlay.sheets.lettering import width_mm
from benchlay.sheets.primitives import Line, Point
from benchlay.sheets.scale import Window

_STEPS_MM = (0.0, 5.0, 8.0, 11.0, 15.0, 20.0, 26.0, 33.0, 41.0, 50.0, 60.0)
_WAYS = 16
_ALONG_MM = 3.0  # a line is kept free in pieces: their boxes hug it
_CLEAR_MM = 0.8
_LED_MM = 9.0  # farther off, a line leads to what is meant


class Places:
    """The boxes taken so far on the paper, mm."""

    def __init__(self, field: Window) -> None:
        """Start with an empty field."""
        self._field = field
        self._taken: list[Window] = []

    def take(self, box: Window) -> None:
        """Keep a box free of words."""
        self._taken.append(box)

    def take_line(self, start: Point, end: Point) -> None:
        """Keep words off a line."""
        count = max(1, math.ceil(math.dist(start, end) / _ALONG_MM))
        for n in range(count):
            (ax, ay), (bx, by) = (
                tuple(a + share / count * (b - a) for a, b in zip(start, end, strict=True))
                for share in (n, n + 1)
            )
            self.take(Window(min(ax, bx), min(ay, by), max(ax, bx), max(ay, by)))

    def put(self, anchor: Point, width: float, height: float) -> Point:
        """Return the middle of the nearest free box of a size about an anchor; it is then taken.

        Where nothing is free within reach it is put on the anchor: better on another than lost.
        """
        for step in _STEPS_MM:
            for way in range(_WAYS if step else 1):
                angle = math.tau * way / _WAYS
                # Boxes are wider than high: they go farther to the sides.
                reach = step + abs(math.cos(angle)) * (width / 2 if step else 0.0)
                x, y = anchor[0] + reach * math.cos(angle), anchor[1] + step * math.sin(angle)
                box = Window(x - width / 2, y - height / 2, x + width / 2, y + height / 2)
                if self._free(box):
                    self._taken.append(box)
                    return x, y
        return anchor

    def _free(self, box: Window) -> bool:
        f = self._field
        within = box.left > f.left and box.right < f.right and box.low > f.low
        return (
            within
            and box.high < f.high
            and not any(
                box.left < t.right + _CLEAR_MM
                and t.left < box.right + _CLEAR_MM
                and box.low < t.high + _CLEAR_MM
                and t.low < box.high + _CLEAR_MM
                for t in self._taken
            )
        )


def leader(layer: str, anchor: Point, at: Point, width: float, height: float) -> list[Line]:
    """Return the line from what is meant to words that had to go far from it."""
    if math.dist(anchor, at) <= _LED_MM:
        return []
    half = (width / 2 + _CLEAR_MM, height / 2 + _CLEAR_MM)
    x, y = (min(max(a, m - h), m + h) for a, m, h in zip(anchor, at, half, strict=True))
    return [Line(layer, anchor, (x, y))]


def box_of(middle: Point, words: str, height_mm: float, turned: bool = False) -> Window:
    """Return the box round a line of lettering about its middle."""
    half = (width_mm(words, height_mm) / 2, height_mm / 2)
    if turned:
        half = half[::-1]
    return Window(
        middle[0] - half[0], middle[1] - half[1], middle[0] + half[0], middle[1] + half[1]
    )
