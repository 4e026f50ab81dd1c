"""Which heights over one point of the plan see a lit place: what a person or a window meets.

All is in the upright plane through the place and the point. A convex solid cuts it in a convex
polygon, and hides the heights between the lowest and the highest way that meets it.
"""

from __future__ import annotations

from collections.abc import Iterable
from math import hypot, sqrt

import numpy as np

from benchlay.scene.tables import Floats
from benchlay.zones.sight import Band, View

_LEAST_MM = 1.0  # of free height: less is no way for light that a person could meet
_LEAST = 1e-6  # of the way: nearer to the place than that is above or below it
_BEHIND_MM = 1e-2  # a solid that comes this little before the lit surface lies behind it


def nearest_seen_mm(
    view: View, solids: Iterable[Floats], point: tuple[float, float], heights: Band
) -> float | None:
    """Return how near a height over a point that sees the place is to it, mm; None for none.

    Parameters
    ----------
    view : View
    solids : iterable of (N, 3) ndarray of float64
        Corners of convex solids that stand in the way, mm.
    point : (float, float)
        Point of the plan, mm.
    heights : (float, float)
        Those that count, mm above the bench.
    """
    x, y = point[0] - float(view.at[0]), point[1] - float(view.at[1])
    way = hypot(x, y)
    if way <= 0.0 or way > view.radius_mm:
        return None
    ahead = np.array([x / way, y / way])
    high = sqrt(view.radius_mm**2 - way**2)
    z = float(view.at[2])
    free = [(max(heights[0] - z, -high), min(heights[1] - z, high))]
    if view.normal is not None:
        free = _before(view.normal, way * float(view.normal[:2] @ ahead), free)
    for solid in solids:
        if not any(low < up for low, up in free):
            return None
        hidden = _hidden(view, solid - view.at, ahead, way)
        if hidden is not None:
            free = [part for old in free for part in _without(old, hidden)]
    # The middle height of the place itself is the nearest where it is free.
    rises = [min(max(0.0, low), up) for low, up in free if up - low >= _LEAST_MM]
    return min((hypot(way, rise) for rise in rises), default=None)


def _before(normal: Floats, flat: float, free: list[Band]) -> list[Band]:
    """Keep what lies before the lit surface."""
    up = float(normal[2])
    if abs(up) < 1e-9:  # noqa: PLR2004 - of a unit vector: upright
        return free if flat > 0.0 else []
    edge = -flat / up
    return [(max(a, edge), b) if up > 0.0 else (a, min(b, edge)) for a, b in free]


def _hidden(view: View, away: Floats, ahead: Floats, way: float) -> Band | None:
    """Return the heights over the point, from the place's, that a solid hides."""
    if view.normal is not None and float((away @ view.normal).max()) <= _BEHIND_MM:
        return None
    flat = away[:, :2] @ np.array([[ahead[0], -ahead[1]], [ahead[1], ahead[0]]])
    points = _section(np.column_stack([flat, away[:, 2]]), 1, 0.0)[:, [0, 2]]
    least = _LEAST * way
    if len(points) and points[:, 0].min() < least:  # over, under or round the place itself
        at_place = _section(points, 0, least)[:, 1]
        if not len(at_place) or at_place.min() < 0.0 < at_place.max():
            return None
        points = np.concatenate([points[points[:, 0] > least], _section(points, 0, least)])
    if len(points) and points[:, 0].max() > way:
        points = np.concatenate([points[points[:, 0] < way], _section(points, 0, way)])
    if not len(points):
        return None
    slopes = points[:, 1] / points[:, 0]
    return way * float(slopes.min()), way * float(slopes.max())


def _section(points: Floats, axis: int, value: float) -> Floats:
    """Return points of a convex hull where a coordinate has a value; its corners are among them."""
    height = points[:, axis] - value
    below, above = np.flatnonzero(height < 0.0), np.flatnonzero(height >= 0.0)
    if not len(below) or not len(above):
        return points[:0]
    share = (height[above] / (height[above] - height[below][:, None]))[..., None]
    between = points[above] + share * (points[below][:, None] - points[above])
    found: Floats = between.reshape(-1, points.shape[1])
    return found


def _without(part: Band, hidden: Band) -> list[Band]:
    low, high = part
    return [
        one for one in ((low, min(high, hidden[0])), (max(low, hidden[1]), high)) if one[1] > one[0]
    ]
