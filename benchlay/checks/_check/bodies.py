"""What stands on the bench, seen from above, with its heights: for clashes and corridors."""

from __future__ import annotations

from math import hypot
from typing import NamedTuple

import numpy as np
import shapely
from shapely.geometry.base import BaseGeometry

from benchlay.scene.tables import PARTS, Floats, Ints, Scene, Solids

_ROUND = 32  # sides of the polygon round a circle: it is drawn round it, 0.5 % too wide at most
_TOUCH_MM = 1e-6
_SURROUNDINGS = ("bench", "floor", "wall", "ceiling")


class Body(NamedTuple):
    """One convex solid: whose it is, which part, its outline in plan and its heights, mm."""

    name: str
    part: str
    outline: BaseGeometry
    low_mm: float
    high_mm: float


class Bodies:
    """The solids of a scene as bodies, S of them; all outlines are worked out in one go."""

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
        self.outline = shapely.convex_hull(shapely.multipoints(points[:, :2], indices=owner))
        self.low_mm: Floats = np.minimum.reduceat(points, first, axis=0)  # (S, 3)
        self.high_mm: Floats = np.maximum.reduceat(points, first, axis=0)  # (S, 3)

    def rows(self, variant: int) -> Ints:
        """Return the rows of the solids of a state, without bench and room."""
        s = self._scene.solids
        wanted = ~np.isin(s.part, [PARTS.index(part) for part in _SURROUNDINGS])
        rows: Ints = np.flatnonzero(s.present[variant] & wanted & (s.name >= 0))
        return rows

    def body(self, row: int) -> Body:
        """Return a solid as a body."""
        s = self._scene.solids
        return Body(
            self._scene.names[s.name[row]],
            PARTS[s.part[row]],
            self.outline[row],
            float(self.low_mm[row, 2]),
            float(self.high_mm[row, 2]),
        )

    def near_pairs(self, rows: Ints, within_mm: float) -> list[tuple[int, int]]:
        """Return the pairs of rows of different names that come nearer than that."""
        if not len(rows):
            return []
        low, high = self.low_mm[rows], self.high_mm[rows] + within_mm
        apart = (low[:, None] > high[None]).any(axis=2)
        names = self._scene.solids.name[rows]
        near = ~(apart | apart.T) & (names[:, None] != names)
        first, second = (rows[side] for side in np.nonzero(np.triu(near, k=1)))
        gaps = shapely.distance(self.outline[first], self.outline[second])
        low, high = self.low_mm[:, 2], self.high_mm[:, 2]
        above = np.maximum(low[first] - high[second], low[second] - high[first])
        close = np.hypot(gaps, np.maximum(above, 0.0)) < within_mm
        return list(zip(first[close].tolist(), second[close].tolist(), strict=True))

    def overlapping(self, rows: Ints, other: Body) -> list[int]:
        """Return the rows whose bodies share room with another body (touching is none)."""
        x0, y0, x1, y1 = shapely.bounds(other.outline).tolist()
        low, high = self.low_mm[rows], self.high_mm[rows]
        near = (low[:, 2] < other.high_mm - _TOUCH_MM) & (high[:, 2] > other.low_mm + _TOUCH_MM)
        near &= (low[:, 0] < x1) & (high[:, 0] > x0) & (low[:, 1] < y1) & (high[:, 1] > y0)
        rows = rows[near]
        shared = shapely.intersection(self.outline[rows], other.outline)
        found: list[int] = rows[shapely.area(shared) > _TOUCH_MM].tolist()
        return found


def distance_mm(a: Body, b: Body) -> float:
    """Return the clear distance between two bodies; 0 where they touch or overlap.

    Exact for bodies that stand upright; for tilted ones no more than the true distance.
    """
    above = max(a.low_mm - b.high_mm, b.low_mm - a.high_mm, 0.0)
    return hypot(float(shapely.distance(a.outline, b.outline)), above)


def overlap_mm(a: Body, b: Body) -> float:
    """Return by how much two bodies that overlap do so: the least of width and height."""
    shared = shapely.intersection(a.outline, b.outline)
    if shapely.is_empty(shared):
        return 0.0
    x0, y0, x1, y1 = shapely.bounds(shared).tolist()
    height = min(a.high_mm, b.high_mm) - max(a.low_mm, b.low_mm)
    return float(max(min(x1 - x0, y1 - y0, height), 0.0))


def middle_between(a: Body, b: Body) -> tuple[float, float, float]:
    """Return the place where two bodies come nearest to each other."""
    if shapely.intersects(a.outline, b.outline):
        spot = shapely.centroid(shapely.intersection(a.outline, b.outline))
        x, y = float(spot.x), float(spot.y)
    else:
        ends = shapely.get_coordinates(shapely.shortest_line(a.outline, b.outline))
        x, y = (float(value) for value in ends.mean(axis=0))
    heights = sorted((a.low_mm, a.high_mm, b.low_mm, b.high_mm))
    return x, y, 0.5 * (heights[1] + heights[2])


def _circles(s: Solids) -> Floats:
    """Return polygons (D, sides, 3) drawn round the round ends of solids."""
    angle = (np.arange(_ROUND) + 0.5) * (2.0 * np.pi / _ROUND)
    wider = 1.0 / np.cos(np.pi / _ROUND)
    unit = wider * np.stack((np.cos(angle), np.sin(angle)), axis=1)
    circles: Floats = s.disc_centre[:, None, :] + np.einsum("ka,dai->dki", unit, s.disc_axes)
    return circles
