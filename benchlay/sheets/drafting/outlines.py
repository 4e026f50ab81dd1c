"""Elements and sources seen from above, true to size, with what holds them."""

from __future__ import annotations

import math
from collections.abc import Iterable, Iterator

import shapely

from benchlay.elements._kind import Stroke
from benchlay.geometry.solid import Solid
from benchlay.placing.placed import PlacedElement, PlacedSource, PlacedState
from benchlay.placing.pose import Pose
from benchlay.sheets.contents import SOURCE, Item, Shape
from benchlay.sheets.primitives import Point

_LEVEL_RAD = math.radians(0.5)  # tilted by less, an outline looks the same from above
_STEPS = 32  # of a round end seen at a slant
_SAME_MM = 1e-6
Edge = tuple[Point, Point]


def items_of(state: PlacedState) -> tuple[Item, ...]:
    """Return sources and elements of a state, in name order; what is taken out is not there."""
    sources = (state.sources[name] for name in sorted(state.sources))
    elements = (state.elements[name] for name in sorted(state.elements))
    return (
        *(_source(item) for item in sources if not item.source.stand.out),
        *(_element(item) for item in elements if not item.out),
    )


def _source(placed: PlacedSource) -> Item:
    body = placed.source.body
    bodies: tuple[Shape, ...] = ()
    if body is not None:
        length, half = body.length_mm * math.cos(placed.pose.pitch_rad), body.width_mm / 2
        bodies = (Shape(((0.0, -half), (0.0, half), (-length, half), (-length, -half))),)
    return Item(placed.source.name, SOURCE, placed.pose.at, _facing(placed.pose), bodies=bodies)


def _element(placed: PlacedElement) -> Item:
    element, geometry = placed.element, placed.geometry
    item = Item(
        element.name,
        element.kind,
        placed.pose.at,
        _facing(placed.pose),
        bodies=tuple(_holders(placed)),
    )
    upright = any(solid.upright for solid in geometry.solids)
    if abs(placed.pose.pitch_rad) > _LEVEL_RAD and geometry.solids and not upright:
        seen = [_from_above(solid, placed.pose) for solid in geometry.solids]
        return item._replace(outlines=tuple(seen))
    return _with_strokes(item, geometry.strokes)


def _facing(pose: Pose) -> float:
    return math.degrees(pose.facing_rad) % 360.0


def _with_strokes(item: Item, strokes: Iterable[Stroke]) -> Item:
    """Add an element's own drawing: an edge that bears a coating, or a line by itself."""
    strokes = tuple(strokes)
    closed = [s.points for s in strokes if s.role == "outline" and s.closed]
    edges = [edge for points in closed for edge in _edges(points)]
    coated = [s.points for s in strokes if s.role == "coated"]
    on_edges = [points for points in coated if any(_same(points, edge) for edge in edges)]
    by_itself = [points for points in coated if points not in on_edges]
    open_ones = [s.points for s in strokes if s.role == "outline" and not s.closed]
    return item._replace(
        outlines=tuple(Shape(points) for points in closed),
        coated=tuple((points[0], points[-1]) for points in on_edges),
        lines=(*open_ones, *by_itself),
        hidden=tuple(s.points for s in strokes if s.role == "hidden"),
    )


def _edges(points: tuple[Point, ...]) -> list[Edge]:
    return list(zip(points, (*points[1:], points[0]), strict=True))


def _same(points: tuple[Point, ...], edge: Edge) -> bool:
    ends = (points[0], points[-1])
    return any(
        all(math.dist(a, b) < _SAME_MM for a, b in zip(ends, way, strict=True))
        for way in (edge, edge[::-1])
    )


def _holders(placed: PlacedElement) -> Iterator[Shape]:
    """Yield mount, foot and post, in the element's plan frame."""
    box = placed.holder.box
    if box is not None:
        yield _from_above(box, placed.pose)
    level = placed.pose._replace(pitch_rad=0.0)
    for solid in reversed(placed.holder.upright):  # the post stands on the foot
        yield _from_above(solid, level)


def _from_above(solid: Solid, pose: Pose) -> Shape:
    """Return the outline of a solid seen from above, in its owner's frame without pitch."""
    if solid.upright and solid.cylinder is not None:
        (x, y, _), radius = solid.points[solid.cylinder[0]], solid.cylinder[2]
        return Shape(((x - radius, y), (x + radius, y)), (1.0, 1.0))
    cos, sin = math.cos(pose.pitch_rad), math.sin(pose.pitch_rad)
    level = [(cos * x - sin * z, y) for x, y, z in _corners(solid)]
    hull = shapely.convex_hull(shapely.MultiPoint(level))
    return Shape(tuple((float(x), float(y)) for x, y in hull.exterior.coords[:-1]))


def _corners(solid: Solid) -> Iterator[tuple[float, float, float]]:
    used = {index for disc in solid.discs for index in disc}
    yield from (point for index, point in enumerate(solid.points) if index not in used)
    for centre, first, second in solid.discs:
        c, a, b = solid.points[centre], solid.points[first], solid.points[second]
        for n in range(_STEPS):
            cos, sin = math.cos(math.tau * n / _STEPS), math.sin(math.tau * n / _STEPS)
            x, y, z = (o + cos * (p - o) + sin * (q - o) for o, p, q in zip(c, a, b, strict=True))
            yield (x, y, z)
