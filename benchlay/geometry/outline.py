"""Convex regions in a plane: what bounds an optical face or an opening."""

from __future__ import annotations

from typing import TypeAlias

from benchlay.named import NamedTuple

Point: TypeAlias = tuple[float, float]


class Outline(NamedTuple):
    """An ellipse, or a convex polygon, in a face's own axes (left, up), in mm.

    A polygon has `corners` (anticlockwise seen from outside), an ellipse has none. `radii`
    are half of width and height, along left and up.
    """

    corners: tuple[Point, ...]
    centre: Point
    radii: Point

    @property
    def round(self) -> bool:
        """Whether this is an ellipse."""
        return not self.corners

    def scaled(self, factor: float) -> Outline:
        """Return the outline drawn in (or out) by a factor about its centre."""
        return self.stretched((factor, factor))

    def stretched(self, factors: Point) -> Outline:
        """Return the outline drawn out by factors along left and up about its centre."""
        (cx, cy), (fx, fy) = self.centre, factors
        corners = tuple((cx + fx * (x - cx), cy + fy * (y - cy)) for x, y in self.corners)
        return Outline(corners, self.centre, (fx * self.radii[0], fy * self.radii[1]))


def circle(radius_mm: float) -> Outline:
    """Return a circle about the origin."""
    return Outline((), (0.0, 0.0), (radius_mm, radius_mm))


def rectangle(width_mm: float, height_mm: float, centre: Point = (0.0, 0.0)) -> Outline:
    """Return an upright rectangle about a centre."""
    a, b = width_mm / 2, height_mm / 2
    x, y = centre
    corners = ((x - a, y - b), (x + a, y - b), (x + a, y + b), (x - a, y + b))
    return Outline(corners, centre, (a, b))
