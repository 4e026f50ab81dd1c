"""Hatching as plain clipped lines, since readers of DXF draw hatches each in their own way."""

from __future__ import annotations

import math
from collections.abc import Iterable, Iterator

import numpy as np
import shapely
from numpy.typing import NDArray
from shapely.geometry.base import BaseGeometry
from shapely.geometry.polygon import orient

from benchlay.sheets.primitives import Line, Point

_SHORTEST = 0.2  # of the spacing; shorter pieces are specks


def region(rings: Iterable[Iterable[Point]]) -> BaseGeometry:
    """Return the area of one outer ring and its holes, mended where it crosses itself."""
    outer, *holes = [[(float(x), float(y)) for x, y in ring] for ring in rings]
    return shapely.make_valid(shapely.Polygon(outer, holes))


def rim(area: BaseGeometry, width: float) -> BaseGeometry:
    """Return the band along the inside of an area's edge; all of it where it is narrow."""
    return shapely.difference(area, shapely.buffer(area, -width, join_style="mitre"))


def hatch(layer: str, area: BaseGeometry, spacing: float, angle_deg: float) -> list[Line]:
    """Return parallel lines that fill an area.

    Lines of one spacing and angle run through all areas alike, since they are counted from
    the origin, not from the area.

    Parameters
    ----------
    layer : str
        For the lines.
    area : shapely geometry
        Anything without area gives no lines.
    spacing : float
        Distance of the lines, in the area's units.
    angle_deg : float
        Direction of the lines, degrees from +x.
    """
    if shapely.is_empty(area):
        return []
    angle = math.radians(angle_deg)
    along = np.array([math.cos(angle), math.sin(angle)])
    across = np.array([-along[1], along[0]])
    x0, y0, x1, y1 = shapely.bounds(area)
    corners = np.array([(x0, y0), (x1, y0), (x1, y1), (x0, y1)])
    u, v = corners @ along, corners @ across
    rows = np.arange(math.ceil(v.min() / spacing), math.floor(v.max() / spacing) + 1)
    middles = rows[:, None] * spacing * across
    ends = np.stack([middles + u.min() * along, middles + u.max() * along], axis=1)
    cut = shapely.intersection(shapely.linestrings(ends), area)
    return [
        Line(layer, start, end)
        for start, end in _pieces(cut)
        if math.dist(start, end) > _SHORTEST * spacing
    ]


def _pieces(cut: NDArray[np.object_]) -> Iterator[tuple[Point, Point]]:
    """Return the straight pieces among what an intersection left, points dropped."""
    parts = shapely.get_parts(cut)
    # Where a line only touches, an intersection gives points, or a mixture of both.
    parts = shapely.get_parts(parts)
    wanted = shapely.get_type_id(parts) == shapely.GeometryType.LINESTRING
    for part in parts[wanted & ~shapely.is_empty(parts)]:
        (ax, ay), *_, (bx, by) = shapely.get_coordinates(part).tolist()
        yield (ax, ay), (bx, by)


def ticks(
    layer: str, area: BaseGeometry, every: float, length: float, field: BaseGeometry
) -> list[Line]:
    """Return short strokes along an area's edge that point to its inside, near a field."""
    near = field.buffer(length)
    out: list[Line] = []
    for polygon in shapely.get_parts(area):
        if polygon.geom_type != "Polygon":
            continue
        polygon = orient(polygon)  # inside on the left of every edge
        for ring in (polygon.exterior, *polygon.interiors):
            out += _ring_ticks(layer, ring, every, length, near)
    return out


def _ring_ticks(
    layer: str, ring: BaseGeometry, every: float, length: float, near: BaseGeometry
) -> Iterator[Line]:
    places = np.arange(every / 2, ring.length, every)
    step = 1e-3 * every
    feet = shapely.get_coordinates(shapely.line_interpolate_point(ring, places))
    drawn = shapely.contains_xy(near, feet)  # a zone may reach far beyond the sheet
    places, feet = places[drawn], feet[drawn]
    ahead = np.minimum(places + step, ring.length)
    behind = np.maximum(places - step, 0.0)
    points = shapely.get_coordinates(shapely.line_interpolate_point(ring, ahead))
    points -= shapely.get_coordinates(shapely.line_interpolate_point(ring, behind))
    sizes = np.hypot(points[:, 0], points[:, 1])
    for (x, y), (dx, dy), size in zip(feet.tolist(), points.tolist(), sizes.tolist(), strict=True):
        if size > 0.0:
            end = (x - length * dy / size, y + length * dx / size)
            yield Line(layer, (x, y), end)
