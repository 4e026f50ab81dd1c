"""Numbers beside holes: inside the sheet, clear of one another and of the lines round them."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence

from benchlay.making.blank import RoundHole
from benchlay.sheets.lettering import SMALL_MM, width_mm
from benchlay.sheets.placing_text import Crowd
from benchlay.sheets.primitives import Across, Line, Point, Text, Up
from benchlay.sheets.scale import Window

_OFF_MM = 1.0


def numbered(
    holes: Sequence[RoundHole],
    corners: tuple[Point, Point],
    scale: float,
    names: Sequence[str] = (),
    *,
    lines: Iterable[Sequence[Point]] = (),
    lettering: Iterable[Text] = (),
) -> Iterator[Text | Line]:
    """Write a name beside each hole, where there is room, with a leader where that is far.

    Parameters
    ----------
    holes : sequence of RoundHole
        In the order of their numbers.
    corners : tuple of Point
        Lower left and upper right of the sheet, model mm: all names stand inside.
    scale : float
        N of 1:N.
    names : sequence of str
        H1, H2, ... by default; nothing is written for an empty one.
    lines : iterable of sequence of Point
        What no name may stand on, model mm.
    lettering : iterable of Text
        What stands there already: level or upright, about the middle of its place.
    """
    (x0, y0), (x1, y1) = ((x / scale, y / scale) for x, y in corners)
    crowd = Crowd(Window(x0, y0, x1, y1))
    for points in lines:
        crowd.add_line([(x / scale, y / scale) for x, y in points], beam=True)
    for text in lettering:
        half = (width_mm(text.text, text.height_mm) / 2, text.height_mm)
        wide, tall = half[::-1] if text.rotation_deg else half
        x, y = (v / scale for v in text.at)
        crowd.add_box(Window(x - wide, y - tall, x + wide, y + tall))
    for hole in holes:
        crowd.add_box(_round(hole, scale))
    for n, hole in enumerate(holes, start=1):
        words = names[n - 1] if names else f"H{n}"
        if not words:
            continue
        size = (width_mm(words, SMALL_MM), SMALL_MM)
        middle = (hole.centre[0] / scale, hole.centre[1] / scale)
        place = crowd.place(size, [(middle, hole.diameter_mm / 2 / scale + _OFF_MM)])
        x, y = place.middle if place is not None else _aside(middle, size, x1)
        yield Text("TAGS", (x * scale, y * scale), words, SMALL_MM, Across.CENTRE, Up.MIDDLE)
        if place is not None and place.leader is not None:
            (ax, ay), (bx, by) = place.leader
            yield Line("TAGS", (ax * scale, ay * scale), (bx * scale, by * scale))


def _aside(middle: Point, size: Point, right: float) -> Point:
    """Return where a name stands for which there is no room: on lines, but not left out."""
    off = size[0] / 2 + 2.0 * _OFF_MM
    return (middle[0] + (off if middle[0] + 2.0 * off < right else -off), middle[1])


def _round(hole: RoundHole, scale: float) -> Window:
    (x, y), r = hole.centre, hole.diameter_mm / 2 / scale + _OFF_MM
    return Window(x / scale - r, y / scale - r, x / scale + r, y / scale + r)
