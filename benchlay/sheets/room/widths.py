"""Dimensions of a room plan: what is clear round the bench, and the room itself."""

from __future__ import annotations

import math

import shapely

from benchlay.layout.layout import Layout
from benchlay.layout.room import Room
from benchlay.sheets.primitives import Axis, Dimension, Point

WALK_MM = 900.0  # common practice: what two people need to pass
_OVERALL_MM = 9.0  # of the dimensions of the whole room, off it: signs stand nearer


def extent(room: Room) -> tuple[Point, Point]:
    """Return the lower left and the upper right corner of the box round a room."""
    xs, ys = zip(*room.outline, strict=True)
    return (min(xs), min(ys)), (max(xs), max(ys))


def walkways(layout: Layout, room: Room) -> list[Dimension]:
    """Return what is clear between each side of the bench and the wall beyond it."""
    x0, y0, x1, y1 = shapely.Polygon(layout.bench.outline).bounds
    walls = shapely.Polygon(room.outline).boundary
    reach = sum(abs(v) for corner in extent(room) for v in corner) + abs(x1) + abs(y1)
    # Off the middle, where a bench has its name and a door often is.
    x, y = x0 + 0.3 * (x1 - x0), y0 + 0.3 * (y1 - y0)
    out = []
    for start, (dx, dy) in (
        ((x0, y), (-1, 0)),
        ((x1, y), (1, 0)),
        ((x, y0), (0, -1)),
        ((x, y1), (0, 1)),
    ):
        ray = shapely.LineString([start, (start[0] + dx * reach, start[1] + dy * reach)])
        hits = shapely.get_coordinates(shapely.intersection(ray, walls)).tolist()
        if not hits:
            continue
        _, end = min((math.dist(hit, start), tuple(hit)) for hit in hits)
        if math.dist(start, end) > 1.0:
            axis = Axis.HORIZONTAL if dx else Axis.VERTICAL
            first, second = sorted((start, (float(end[0]), float(end[1]))))
            out.append(Dimension("DIMENSIONS", axis, first, second, start))
    return out


def overall(room: Room, scale: float) -> list[Dimension]:
    """Return how long and how wide the room is, below it and at its left."""
    (x0, y0), (x1, y1) = extent(room)
    off = _OVERALL_MM * scale
    return [
        Dimension("DIMENSIONS", Axis.HORIZONTAL, (x0, y0), (x1, y0), (x0, y0 - off)),
        Dimension("DIMENSIONS", Axis.VERTICAL, (x0, y0), (x0, y1), (x0 - off, y0)),
    ]
