"""Convex polygons in the plane: hull, distance and common part, as arrays of corners.

A polygon is an array (M, 2) of corners, anticlockwise, in mm, and has an area. A check measures
a handful of them: a library for polygons would take longer to load than that takes.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

Corners = NDArray[np.float64]

_TOUCH_MM = 1e-9  # nearer than that, outlines touch: the rounding of sums over a bench


def hull(points: Corners) -> Corners:
    """Return the convex hull of points (N, 2), without corners on its sides.

    Sorted by x, the points are taken as a lower and an upper chain [1]_.

    References
    ----------
    .. [1] Andrew, A. M. (1979). Another efficient algorithm for convex hulls in two
       dimensions. Inf. Process. Lett. 9(5), 216-219.
    """
    ordered = sorted({(x, y) for x, y in points.tolist()})
    if len(ordered) < 3:  # noqa: PLR2004 (a segment or a point)
        return np.array(ordered)
    lower, upper = left_turns(ordered), left_turns(ordered[::-1])
    return np.array(lower[:-1] + upper[:-1])


def left_turns(ordered: list[tuple[float, float]]) -> list[tuple[float, float]]:
    """Return the corners of one side of the hull of points in order: those that turn left."""
    chain: list[tuple[float, float]] = []
    for x, y in ordered:
        while len(chain) > 1:
            (ax, ay), (bx, by) = chain[-2:]
            if (bx - ax) * (y - ay) - (by - ay) * (x - ax) > 0.0:
                break
            chain.pop()
        chain.append((x, y))
    return chain


def distances(points: Corners, polygon: Corners) -> NDArray[np.float64]:
    """Return how far points (N, 2) are from a polygon; 0 inside and on its rim."""
    away: NDArray[np.float64] = np.hypot(*_ways(points, polygon).T)
    return away


def distance(a: Corners, b: Corners) -> float:
    """Return the distance of two polygons; 0 where they touch or overlap."""
    if max(_apart(a, b), _apart(b, a)) <= _TOUCH_MM:
        return 0.0
    return float(min(distances(a, b).min(), distances(b, a).min()))


def between(a: Corners, b: Corners) -> tuple[float, float]:
    """Return the point halfway where two polygons that are apart come nearest to each other.

    Along parallel sides, the middle of the stretch where they face each other.
    """
    halfway, lengths = [], []
    for points, polygon in ((a, b), (b, a)):
        ways = _ways(points, polygon)
        halfway.append(points + 0.5 * ways)
        lengths.append(np.hypot(*ways.T))
    away = np.concatenate(lengths)
    nearest = np.concatenate(halfway)[away <= away.min() + _TOUCH_MM]
    x, y = (0.5 * (nearest.min(axis=0) + nearest.max(axis=0))).tolist()
    return x, y


def common(a: Corners, b: Corners) -> Corners:
    """Return the common part of two polygons (L, 2); what only touches has no area, or no corner.

    The sides of one cut the other, one after the other [1]_.

    References
    ----------
    .. [1] Sutherland, I. E., Hodgman, G. W. (1974). Reentrant polygon clipping. Commun. ACM
       17(1), 32-42.
    """
    rest = a
    for from_, along in zip(b, _sides(b), strict=True):
        if not len(rest):
            break
        x, y = (rest - from_).T
        beside = (along[0] * y - along[1] * x) / np.hypot(*along)  # positive inside
        rest = _cut(rest, np.where(np.abs(beside) <= _TOUCH_MM, 0.0, beside))
    return rest


def area(polygon: Corners) -> float:
    """Return the area in mm² (shoelace formula)."""
    if not len(polygon):
        return 0.0
    x, y = (polygon - polygon[0]).T
    return 0.5 * float(x @ np.roll(y, -1) - y @ np.roll(x, -1))


def centroid(polygon: Corners) -> tuple[float, float]:
    """Return the centre of a polygon's area; of one without area, the middle of its extent."""
    x, y = (polygon - polygon[0]).T
    turns = x * np.roll(y, -1) - y * np.roll(x, -1)
    twice = float(turns.sum())
    x0, y0 = polygon[0].tolist()
    if abs(twice) <= _TOUCH_MM:
        return x0 + 0.5 * float(x.min() + x.max()), y0 + 0.5 * float(y.min() + y.max())
    mean_x = float((x + np.roll(x, -1)) @ turns) / (3.0 * twice)
    return x0 + mean_x, y0 + float((y + np.roll(y, -1)) @ turns) / (3.0 * twice)


def _sides(polygon: Corners) -> Corners:
    return np.roll(polygon, -1, axis=0) - polygon


def _ways(points: Corners, polygon: Corners) -> Corners:
    """Return the ways (N, 2) from points to the nearest place of a polygon; 0 inside."""
    sides = _sides(polygon)
    seen = points[:, None] - polygon
    share = np.einsum("nmk,mk->nm", seen, sides) / np.einsum("mk,mk->m", sides, sides)
    ways = np.clip(share, 0.0, 1.0)[:, :, None] * sides - seen
    nearest = np.hypot(ways[..., 0], ways[..., 1]).argmin(axis=1)
    found: Corners = ways[np.arange(len(points)), nearest]
    inside = (sides[:, 0] * seen[..., 1] - sides[:, 1] * seen[..., 0] >= 0.0).all(axis=1)
    found[inside] = 0.0
    return found


def _apart(a: Corners, b: Corners) -> float:
    """Return by how much a side of a keeps the polygons apart; negative where none does."""
    sides = _sides(a)
    seen = b[None] - a[:, None]
    beside = seen[..., 0] * sides[:, None, 1] - seen[..., 1] * sides[:, None, 0]
    return float((beside.min(axis=1) / np.hypot(*sides.T)).max())


def _cut(polygon: Corners, beside: NDArray[np.float64]) -> Corners:
    """Return what of a polygon lies on the positive side, by how far each corner does."""
    if (beside >= 0.0).all():
        return polygon
    kept: list[Corners] = []
    for i, here in enumerate(beside):
        before = beside[i - 1]
        if here * before < 0.0:
            share = before / (before - here)
            kept.append(polygon[i - 1] + share * (polygon[i] - polygon[i - 1]))
        if here >= 0.0:
            kept.append(polygon[i])
    return np.array(kept).reshape(-1, 2)
