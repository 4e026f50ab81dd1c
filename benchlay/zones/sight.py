r"""From where in plan a lit place can be seen, and from near enough.

A point of the plan belongs to the region if, at any height at which eyes may be, it is within
the distance in space and the straight way from the place to there is free. Eyes may be from
the height of the place itself (someone bends to look) through the bands of eye height. What
stands in the way are convex solids, given by their corners.

The region is exact but for rounding. Above a point of the plan the free heights are open
intervals. Of those above the place the lowest begins at its level or just above an edge of
something, of those below it the highest ends there or just below an edge. So all that is seen
is seen in one of the planes through the place that graze an edge, or in the level one. In
such a plane a convex solid throws a convex shadow: the hull of the section with the plane
and the same section far away.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence
from typing import TypeAlias

import numpy as np
import shapely
from shapely.geometry.base import BaseGeometry

from benchlay.named import NamedTuple
from benchlay.scene.tables import Flags, Floats

Band: TypeAlias = tuple[float, float]
"""Lower and upper height above the bench, mm."""

# A way must clear an edge by this, so that a lid that lies on a panel leaves no gap.
_CLEAR_MM = 1e-3
_FLAT = 1e-9  # of a unit normal: planes steeper than this hold no point of the plan but a line
_SPECK_MM2 = 1e-3
# Slits narrower than twice this are rounding where two solids touch.
_SLIT_MM = 5e-3
_ON_MM = 1e-2  # a solid that comes this little before the lit surface lies behind it
_SIDES = 64  # of a circle in plan
_LEVEL = np.zeros(2)


class View(NamedTuple):
    """A lit place and how far it counts.

    `area` is what is within the distance at the height of the place, and before the surface
    at any height. The normal points to where the light comes from; None for light that goes
    all round.
    """

    at: Floats  # (3,) mm
    normal: Floats | None  # (3,)
    radius_mm: float
    area: BaseGeometry


def seen(view: View, solids: Iterable[Floats], band: Band) -> BaseGeometry:
    """Return the part of the view's area from which the place is seen.

    Parameters
    ----------
    view : View
    solids : iterable of (N, 3) ndarray of float64
        Corners of convex solids, mm; what is left out shades nothing.
    band : (float, float)
        Heights of eyes above the bench, mm; the height of the place counts as well.
    """
    z = float(view.at[2])
    heights = min(band[0], z), max(band[1], z)
    near = [solid for solid in solids if _matters(view, solid, heights)]
    found, rest = shapely.Polygon(), view.area
    for slope, sector in _planes(view, near, heights):
        ground = _ground(view, slope, heights, shapely.intersection(sector, rest))
        if ground.area <= _SPECK_MM2:
            continue
        shadows = [shadow for s in near if (shadow := _shadow(view, s, slope)) is not None]
        free = shapely.difference(ground, shapely.union_all(shadows))
        if free.area > _SPECK_MM2:
            found = shapely.union(found, free)
            rest = shapely.difference(rest, free)
        if rest.area <= _SPECK_MM2:
            break
    return _without_slits(found)


def _without_slits(area: BaseGeometry) -> BaseGeometry:
    """Close what rounding opened between the pieces, and what it opened between solids."""
    for way in (_SLIT_MM, -2.0 * _SLIT_MM, _SLIT_MM):
        area = shapely.buffer(area, way, join_style="mitre")
    return area


def _matters(view: View, solid: Floats, heights: Band) -> bool:
    """Whether a solid can stand between the place and an eye."""
    away = solid - view.at
    if solid[:, 2].max() <= heights[0] or solid[:, 2].min() >= heights[1]:
        return False
    if view.normal is not None and float((away @ view.normal).max()) <= _ON_MM:
        return False  # behind the surface, or the body that has it
    ground = shapely.convex_hull(shapely.multipoints(away[:, :2]))
    origin = shapely.Point(0.0, 0.0)
    if shapely.distance(ground, origin) > view.radius_mm:
        return False
    # What the place lies inside of is what is lit: a hull between its own faces.
    within = solid[:, 2].min() < view.at[2] < solid[:, 2].max()
    return not (within and shapely.covers(shapely.buffer(ground, _ON_MM), origin))


def _planes(
    view: View, solids: list[Floats], heights: Band
) -> Iterator[tuple[Floats, BaseGeometry]]:
    """Yield the slopes of planes in which all is seen that can be, and where each counts.

    The height of a plane over a point p of the plan is that of the place and slope . (p - at).
    """
    yield _LEVEL, view.area
    if view.normal is not None and abs(view.normal[2]) > _FLAT:
        # The surface itself is looked over: eyes begin just before its plane.
        yield -view.normal[:2] / view.normal[2] * (1.0 + _FLAT), view.area
    for solid in solids:
        away = solid - view.at
        if heights[1] > view.at[2] and away[:, 2].max() > 0.0:
            yield from _grazing(view, away, 1.0)
        if heights[0] < view.at[2] and away[:, 2].min() < 0.0:
            yield from _grazing(view, away, -1.0)


def _grazing(view: View, away: Floats, up: float) -> Iterator[tuple[Floats, BaseGeometry]]:
    """Yield the planes just above (up: 1) or below (-1) a solid's edges, and what is beyond."""
    first, second = np.triu_indices(len(away), 1)
    normal = np.cross(away[first], away[second])
    length = np.sqrt(np.einsum("ij,ij->i", normal, normal))
    turned = np.where(normal[:, 2] < 0.0, -up, up)[:, None] * normal
    steep: Flags = np.abs(normal[:, 2]) <= _FLAT * np.maximum(length, 1.0)
    # Nothing of the solid is beyond the plane, by the least that counts.
    edge = (away @ turned.T).max(axis=0) <= 1e-3 * _CLEAR_MM * length
    leads = np.maximum(up * away[first, 2], up * away[second, 2]) > -_CLEAR_MM
    for i in np.flatnonzero(edge & ~steep & leads).tolist():
        ends = away[[first[i], second[i]]]
        raised = ends[:, 2] + up * _CLEAR_MM
        slope = np.asarray(np.linalg.solve(ends[:, :2], raised), dtype=np.float64)
        sector = _beyond(view, ends[:, :2])
        if sector is not None:
            yield slope, sector


def _beyond(view: View, points: Floats) -> BaseGeometry | None:
    """Return the hull of points (from the place, in plan) and of all that lies behind them.

    None where the place lies among them.
    """
    hull = shapely.convex_hull(shapely.multipoints(points))
    nearest = float(shapely.distance(hull, shapely.Point(0.0, 0.0)))
    if nearest <= 0.0:
        return None
    far = points * max(4.0 * view.radius_mm / nearest, 4.0)
    return shapely.convex_hull(shapely.multipoints(np.concatenate([points, far]) + view.at[:2]))


def _ground(view: View, slope: Floats, heights: Band, ground: BaseGeometry) -> BaseGeometry:
    """Return where a plane is at the height of eyes, near enough, and before the surface."""
    if ground.area <= _SPECK_MM2:
        return ground
    z = float(view.at[2])
    if slope.any():
        ground = _where(view, slope, z - heights[0], ground)
        ground = _where(view, -slope, heights[1] - z, ground)
        ground = shapely.intersection(ground, _near(view, slope))
    if view.normal is not None and abs(view.normal[2]) > _FLAT:
        ground = _where(view, view.normal[:2] + view.normal[2] * slope, 0.0, ground)
    return ground


def _near(view: View, slope: Floats) -> BaseGeometry:
    """Return what of a plane through the place is within the distance: in plan an ellipse."""
    angle = 2.0 * np.pi * np.arange(_SIDES) / _SIDES
    outer = view.radius_mm / np.cos(np.pi / _SIDES)
    points = outer * np.stack([np.cos(angle), np.sin(angle)], axis=1)
    steep = float(np.hypot(*slope))
    ahead = slope / steep
    short = 1.0 - 1.0 / np.hypot(1.0, steep)
    return shapely.Polygon(points - short * np.outer(points @ ahead, ahead) + view.at[:2])


def _where(view: View, gradient: Floats, offset: float, ground: BaseGeometry) -> BaseGeometry:
    """Return where gradient . (p - at) + offset is not negative."""
    length, far = float(np.hypot(*gradient)), 4.0 * view.radius_mm
    if length * far <= abs(offset):  # of one sign wherever it matters
        return ground if offset >= 0.0 else shapely.Polygon()
    if length == 0.0:
        return ground
    ahead = gradient / length
    aside = np.array([-ahead[1], ahead[0]])
    edge = view.at[:2] - offset / length * ahead
    corners = [edge - far * aside, edge + far * aside]
    corners += [corners[1] + 2.0 * far * ahead, corners[0] + 2.0 * far * ahead]
    return shapely.intersection(ground, shapely.Polygon(corners))


def _shadow(view: View, solid: Floats, slope: Floats) -> BaseGeometry | None:
    """Return the shadow of a solid in a plane through the place, in plan."""
    away = solid - view.at
    height = away[:, 2] - away[:, :2] @ slope
    below, above = np.flatnonzero(height <= 0.0), np.flatnonzero(height > 0.0)
    if not len(below) or not len(above):
        return None
    share = (height[above] / (height[above] - height[below][:, None]))[..., None]
    cut = (away[above] + share * (away[below][:, None] - away[above]))[..., :2].reshape(-1, 2)
    hull = _beyond(view, cut)
    return hull if hull is not None and hull.geom_type == "Polygon" else None


def reaches(view: View, solids: Sequence[Floats], band: Band, at: BaseGeometry) -> bool:
    """Whether the place is seen from anywhere on a point or line in plan."""
    if not shapely.intersects(view.area, at):
        return False
    return bool(shapely.intersects(shapely.buffer(seen(view, solids, band), 2.0 * _SLIT_MM), at))
