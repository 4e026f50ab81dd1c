"""What stands on the bench, seen from above, with its heights: for clashes and corridors."""

from __future__ import annotations

from collections.abc import Sequence
from math import hypot
from typing import NamedTuple

import numpy as np
import shapely
from shapely.geometry.base import BaseGeometry

from benchlay.scene.tables import PARTS, Flags, Floats, Ints, Scene, Solids

_ROUND = 32  # sides of the polygon round a circle: it is drawn round it, 0.5 % too wide at most
_SURROUNDINGS = ("bench", "floor", "wall", "ceiling")


class Body(NamedTuple):
    """One convex solid: whose it is, which part, its outline in plan and its heights, mm."""

    name: str
    part: str
    outline: BaseGeometry
    low_mm: float
    high_mm: float


class Bodies:
    """The solids of a scene as bodies; outlines are worked out when first asked for."""

    def __init__(self, scene: Scene) -> None:
        self._scene = scene
        self._known: dict[int, Body] = {}
        self._low, self._high = _boxes(scene.solids)

    def rows(self, variant: int, parts: Sequence[str] | None = None) -> list[int]:
        """Return the rows of the solids of a state: all but bench and room, or some parts."""
        s = self._scene.solids
        wanted = (
            ~np.isin(s.part, [PARTS.index(part) for part in _SURROUNDINGS])
            if parts is None
            else np.isin(s.part, [PARTS.index(part) for part in parts])
        )
        rows: list[int] = np.flatnonzero(s.present[variant] & wanted & (s.name >= 0)).tolist()
        return rows

    def body(self, row: int) -> Body:
        """Return a solid as a body."""
        if row not in self._known:
            s = self._scene.solids
            points = _points(s, row)
            self._known[row] = Body(
                self._scene.names[s.name[row]],
                PARTS[s.part[row]],
                shapely.convex_hull(shapely.multipoints(points[:, :2])),
                float(points[:, 2].min()),
                float(points[:, 2].max()),
            )
        return self._known[row]

    def near_pairs(self, rows: list[int], within_mm: float) -> list[tuple[int, int]]:
        """Return the pairs of rows whose upright boxes come as near as that."""
        if not rows:
            return []
        low, high = self._low[rows] - 0.5 * within_mm, self._high[rows] + 0.5 * within_mm
        apart = (low[:, None] > high[None]).any(axis=2)
        apart |= apart.T
        first, second = np.nonzero(np.triu(~apart, k=1))
        return [(rows[a], rows[b]) for a, b in zip(first.tolist(), second.tolist(), strict=True)]


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


def _boxes(s: Solids) -> tuple[Floats, Floats]:
    """Return the least and greatest coordinates of every solid (S, 3)."""
    count = len(s.owner)
    low, high = np.full((count, 3), np.inf), np.full((count, 3), -np.inf)
    for solid, points in (
        (s.patch_solid, s.patch_points),
        (s.disc_solid, _circles(s, np.ones(len(s.disc_solid), dtype=np.bool_))),
    ):
        if len(solid):
            np.minimum.at(low, solid, points.min(axis=1))
            np.maximum.at(high, solid, points.max(axis=1))
    return low, high


def _circles(s: Solids, chosen: Flags | Ints) -> Floats:
    """Return polygons (D, sides, 3) drawn round the round ends of solids."""
    angle = (np.arange(_ROUND) + 0.5) * (2.0 * np.pi / _ROUND)
    wider = 1.0 / np.cos(np.pi / _ROUND)
    unit = wider * np.stack((np.cos(angle), np.sin(angle)), axis=1)
    circles: Floats = s.disc_centre[chosen][:, None, :] + np.einsum(
        "ka,dai->dki", unit, s.disc_axes[chosen]
    )
    return circles


def _points(s: Solids, row: int) -> Floats:
    flat = s.patch_points[s.patch_solid == row].reshape(-1, 3)
    return np.concatenate((flat, _circles(s, s.disc_solid == row).reshape(-1, 3)))
