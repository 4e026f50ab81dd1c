"""Whether holes and openings of a blank keep clear of one another."""

from __future__ import annotations

from math import dist

from benchlay.making.blank import RoundHole
from benchlay.making.rectilinear import Rectangle


def lies_in(box: Rectangle, straight: Rectangle) -> bool:
    """Whether a box lies within another, clear of its sides."""
    return (
        box.left > straight.left
        and box.right < straight.right
        and box.low > straight.low
        and box.high < straight.high
    )


def meets(a: Rectangle, b: Rectangle) -> bool:
    """Whether two boxes touch or overlap."""
    return a.left <= b.right and b.left <= a.right and a.low <= b.high and b.low <= a.high


def round_box(hole: RoundHole) -> tuple[float, float, float, float]:
    """Return the sides of the box round a hole."""
    (x, y), r = hole.centre, hole.diameter_mm / 2
    return x - r, y - r, x + r, y + r


def circles_meet(hole: RoundHole, box: Rectangle) -> bool:
    """Whether a hole meets the circle in a square box."""
    centre = ((box.left + box.right) / 2, (box.low + box.high) / 2)
    return dist(hole.centre, centre) <= (hole.diameter_mm + box.right - box.left) / 2


def in_opening(hole: RoundHole, boxes: list[Rectangle], rounds: tuple[RoundHole, ...]) -> bool:
    """Whether a hole touches an opening."""
    box = Rectangle(*round_box(hole))
    return any(meets(box, b) for b in boxes) or any(circles_meet(r, box) for r in rounds)
