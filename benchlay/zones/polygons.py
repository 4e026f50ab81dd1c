"""Polygons in one form: the same area always gives the same numbers in the same order."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from typing import TypeAlias

import shapely
from shapely.geometry.base import BaseGeometry
from shapely.geometry.polygon import orient

Point: TypeAlias = tuple[float, float]
Ring: TypeAlias = tuple[Point, ...]

_DECIMALS = 6  # of a mm: above the rounding of unions, below anything that can be built
_SPECK_MM2 = 1e-3  # unions of strips that share an edge leave slivers; no zone is one


def united(areas: Iterable[BaseGeometry]) -> list[BaseGeometry]:
    """Return the separate polygons of a union, specks left out."""
    parts = shapely.get_parts(shapely.union_all(list(areas)))
    return [_whole(p) for p in shapely.get_parts(parts) if _counts(p)]


def _whole(part: BaseGeometry) -> BaseGeometry:
    """Return a polygon without holes that are specks."""
    holes = [ring for ring in part.interiors if shapely.Polygon(ring).area > _SPECK_MM2]
    if len(holes) == len(part.interiors):
        return part
    return shapely.Polygon(part.exterior, holes)


def _counts(part: BaseGeometry) -> bool:
    return bool(part.geom_type == "Polygon" and part.area > _SPECK_MM2)


def rings(polygon: BaseGeometry) -> tuple[Ring, ...]:
    """Return the rings of a polygon: the outer anticlockwise, then the holes, clockwise.

    Each starts at its least corner and does not repeat it; holes are in order.
    """
    turned = orient(polygon)
    holes = sorted(_from_least(ring.coords[:-1]) for ring in turned.interiors)
    return (_from_least(turned.exterior.coords[:-1]), *holes)


def _from_least(corners: Sequence[Sequence[float]]) -> Ring:
    # Adding 0 turns a negative nought into a plain one.
    points = [(round(x, _DECIMALS) + 0.0, round(y, _DECIMALS) + 0.0) for x, y in corners]
    kept = [p for i, p in enumerate(points) if p != points[i - 1]]
    first = kept.index(min(kept))
    return (*kept[first:], *kept[:first])
