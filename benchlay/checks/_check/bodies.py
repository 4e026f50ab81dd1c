"""What stands on the bench, seen from above, with its heights: for clashes and corridors."""

from __future__ import annotations

from math import hypot

import numpy as np

from benchlay.geometry import convex
from benchlay.named import NamedTuple
from benchlay.scene.tables import PARTS, Floats, Ints, Scene, Solids

_ROUND = 32  # sides of the polygon round a circle: it is drawn round it, 0.5 % too wide at most
_TOUCH_MM = 1e-6
_SURROUNDINGS = ("bench", "floor", "wall", "ceiling")


class Body(NamedTuple):
    """One convex solid: whose it is, which part, its outline in plan and its heights, mm.

    The outline is a convex polygon, as in `geometry.convex`.
    """

    name: str
    part: str
    outline: Floats
    low_mm: float
    high_mm: float


class Bodies:
    """The solids of a scene as bodies, S of them; outlines are worked out as they are asked for.

    Boxes tell most bodies apart, and most from the edge of the bench.
    """

    def __init__(self, scene: Scene) -> None:
        self._scene = scene
        s = scene.solids
        circles = _circles(s)
        flat = s.patch_points.reshape(-1, 3)
        points = np.concatenate((flat, circles.reshape(-1, 3)))
        owner = np.concatenate(
            (
                np.repeat(s.patch_solid, s.patch_points.shape[1]),
                np.repeat(s.disc_solid, circles.shape[1]),
            )
        )
        order = np.argsort(owner, kind="stable")
        points, owner = points[order], owner[order]
        first = np.searchsorted(owner, np.arange(len(s.owner)))
        self._points = points
        self._ends = [*first.tolist(), len(points)]
        self._bodies: dict[int, Body] = {}
        self.low_mm: Floats = np.minimum.reduceat(points, first, axis=0)  # (S, 3)
        self.high_mm: Floats = np.maximum.reduceat(points, first, axis=0)  # (S, 3)

    def rows(self, variant: int) -> Ints:
        """Return the rows of the solids of a state, without bench and room."""
        s = self._scene.solids
        wanted = ~np.isin(s.part, [PARTS.index(part) for part in _SURROUNDINGS])
        rows: Ints = np.flatnonzero(s.present[variant] & wanted & (s.name >= 0))
        return rows

    def label(self, row: int) -> tuple[str, str]:
        """Return whose a solid is, and which part."""
        s = self._scene.solids
        return self._scene.names[s.name[row]], PARTS[s.part[row]]

    def body(self, row: int) -> Body:
        """Return a solid as a body."""
        if row not in self._bodies:
            outline = convex.hull(self.corners(row)[:, :2])
            low, high = float(self.low_mm[row, 2]), float(self.high_mm[row, 2])
            self._bodies[row] = Body(*self.label(row), outline, low, high)
        return self._bodies[row]

    def corners(self, row: int) -> Floats:
        """Return points (N, 3) whose hull a solid is."""
        return self._points[self._ends[row] : self._ends[row + 1]]

    def near_pairs(self, rows: Ints, within_mm: float) -> list[tuple[int, int]]:
        """Return the pairs of rows of different names whose boxes come that near."""
        if not len(rows):
            return []
        low, high = self.low_mm[rows], self.high_mm[rows] + within_mm
        apart = (low[:, None] > high[None]).any(axis=2)
        names = self._scene.solids.name[rows]
        near = ~(apart | apart.T) & (names[:, None] != names)
        first, second = (rows[side].tolist() for side in np.nonzero(np.triu(near, k=1)))
        return list(zip(first, second, strict=True))

    def in_box(self, rows: Ints, other: Body) -> Ints:
        """Return the rows whose boxes share room with that of another body."""
        (x0, y0), (x1, y1) = other.outline.min(axis=0), other.outline.max(axis=0)
        low, high = self.low_mm[rows], self.high_mm[rows]
        near = (low[:, 2] < other.high_mm - _TOUCH_MM) & (high[:, 2] > other.low_mm + _TOUCH_MM)
        near &= (low[:, 0] < x1) & (high[:, 0] > x0) & (low[:, 1] < y1) & (high[:, 1] > y0)
        found: Ints = rows[near]
        return found


def overlapping(a: Body, b: Body) -> bool:
    """Whether two bodies share room (touching is none)."""
    height = min(a.high_mm, b.high_mm) - max(a.low_mm, b.low_mm)
    return height > _TOUCH_MM and convex.area(convex.common(a.outline, b.outline)) > _TOUCH_MM


def distance_mm(a: Body, b: Body) -> float:
    """Return the clear distance between two bodies; 0 where they touch or overlap.

    Exact for bodies that stand upright; for tilted ones no more than the true distance.
    """
    above = max(a.low_mm - b.high_mm, b.low_mm - a.high_mm, 0.0)
    return hypot(convex.distance(a.outline, b.outline), above)


def overlap_mm(a: Body, b: Body) -> float:
    """Return by how much two bodies that overlap do so: the least of width and height."""
    shared = convex.common(a.outline, b.outline)
    if not len(shared):
        return 0.0
    width, depth = np.ptp(shared, axis=0).tolist()
    height = min(a.high_mm, b.high_mm) - max(a.low_mm, b.low_mm)
    return float(max(min(width, depth, height), 0.0))


def middle_between(a: Body, b: Body) -> tuple[float, float, float]:
    """Return the place where two bodies come nearest to each other."""
    shared = convex.common(a.outline, b.outline)
    x, y = convex.centroid(shared) if len(shared) else convex.between(a.outline, b.outline)
    heights = sorted((a.low_mm, a.high_mm, b.low_mm, b.high_mm))
    return x, y, 0.5 * (heights[1] + heights[2])


def _circles(s: Solids) -> Floats:
    """Return polygons (D, sides, 3) drawn round the round ends of solids."""
    angle = (np.arange(_ROUND) + 0.5) * (2.0 * np.pi / _ROUND)
    wider = 1.0 / np.cos(np.pi / _ROUND)
    unit = wider * np.stack((np.cos(angle), np.sin(angle)), axis=1)
    circles: Floats = s.disc_centre[:, None, :] + np.einsum("ka,dai->dki", unit, s.disc_axes)
    return circles
