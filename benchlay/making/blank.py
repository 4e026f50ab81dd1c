"""A blank: a sheet laid flat as it is cut, before it is folded.

Lower left corner of its extent in the origin, mm. A panel's blank is seen from outside, so
that its start is at the left; a lid's from above. Whoever looks at it has bends *up* come
towards them.
"""

from __future__ import annotations

from math import pi

from benchlay.geometry.polygon import Point, Polygon, signed_area
from benchlay.making.rectilinear import Rectangle
from benchlay.named import NamedTuple


class RoundHole(NamedTuple):
    """A round hole, and what it is for."""

    centre: Point
    diameter_mm: float
    use: str


class Bend(NamedTuple):
    """The middle line of a bend at a right angle."""

    start: Point
    end: Point
    up: bool
    radius_mm: float
    degrees: float = 90.0


class Folding(NamedTuple):
    """How the bends of a blank were reckoned."""

    allowance_mm: float
    k: float
    radius_mm: float
    flange_mm: float  # over the outer faces
    sense: str


class Blank(NamedTuple):
    """A flat blank."""

    outer: Polygon  # anticlockwise
    inner: tuple[Polygon, ...] = ()  # clockwise
    rounds: tuple[RoundHole, ...] = ()  # openings
    holes: tuple[RoundHole, ...] = ()  # of fixings
    bends: tuple[Bend, ...] = ()
    flat_mm: Point = (0.0, 0.0)
    formed_mm: Point = (0.0, 0.0)  # over the outer faces
    folding: Folding | None = None
    named: tuple[tuple[str, Rectangle], ...] = ()  # rectangular openings, notches too

    @property
    def area_mm2(self) -> float:
        """Of one face, without its openings and holes."""
        cut = sum(signed_area(loop) for loop in self.inner)  # negative: they run clockwise
        circles = sum(pi / 4 * h.diameter_mm**2 for h in (*self.rounds, *self.holes))
        return signed_area(self.outer) + cut - circles


class Draft(NamedTuple):
    """A blank with what was left open when it was worked out."""

    blank: Blank
    lacks: tuple[str, ...] = ()  # what keeps it from being made
    remarks: tuple[str, ...] = ()  # what whoever makes or mounts it must know
