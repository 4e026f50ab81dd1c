"""From the caller's shapes to the tables of curves: what matters, and in which order."""

from __future__ import annotations

import numpy as np

from benchlay.named import NamedTuple
from benchlay.optics._shares_curves import (
    CUT_RADIUS,
    DEPTH_TIE_MM,
    SMALLEST_AREA,
    Bodies,
    Bools,
    Ellipses,
    Floats,
    Ints,
    Lines,
    Polygons,
    Shapes,
    join_lines,
    measure_ellipses,
    measure_polygons,
    pick_ellipses,
    pick_lines,
    select,
    spans,
    starts,
)


class Section(NamedTuple):
    """Everything that is known of the cross-sections before a direction is chosen."""

    problems: int
    bodies: Bodies
    polygons: Polygons
    ellipses: Ellipses
    lines: Lines


def unusable(shapes: Shapes, problems: int) -> Bools:
    """Problems with a number that is not finite in a field that is used."""
    round_ = shapes.corners == 0
    good = np.isfinite(shapes.depth).all(axis=1)
    outline = np.isfinite(shapes.centre).all(axis=1)
    outline &= np.isfinite(shapes.axes).all(axis=(1, 2))
    good &= np.where(round_, outline, np.isfinite(shapes.vertices).all(axis=(1, 2)))
    bad: Bools = np.bincount(shapes.problem[~good], minlength=problems) > 0
    return bad


def prepare(shapes: Shapes, rows: Ints, problems: int) -> Section:
    """Build the tables for the given rows of `shapes`, dropping what cannot matter."""
    round_ = shapes.corners[rows] == 0
    cornered, curved = rows[~round_], rows[round_]
    polygons, area, holds_axis = measure_polygons(shapes.vertices[cornered])
    near = (polygons.start <= polygons.end).any(axis=0) | holds_axis
    keep_polygon = near & (area >= SMALLEST_AREA)
    ellipses, area = measure_ellipses(shapes.centre[curved], shapes.axes[curved])
    distance = np.hypot(ellipses.centre[0], ellipses.centre[1])
    keep_ellipse = (distance - ellipses.reach < CUT_RADIUS) & (area >= SMALLEST_AREA)
    kept = np.zeros(len(shapes.problem), dtype=bool)
    kept[cornered[keep_polygon]] = True
    kept[curved[keep_ellipse]] = True
    hosts = shapes.hole_of
    kept &= (hosts < 0) | kept[hosts]
    bodies, row_of = _rank(shapes, np.flatnonzero(kept), problems)
    polygons = _polygons(polygons, row_of[cornered])
    ellipses = _ellipses(ellipses, row_of[curved])
    lines = _lines(bodies, polygons, ellipses)
    return Section(problems, bodies, polygons, ellipses, lines)


def _rank(shapes: Shapes, kept: Ints, problems: int) -> tuple[Bodies, Ints]:
    """Sort by problem, holes last, then precedence; also row in Bodies of each shape."""
    hole = shapes.hole_of[kept] >= 0
    source = kept[np.lexsort((shapes.order[kept], hole, shapes.problem[kept]))]
    problem = shapes.problem[source]
    first = starts(problem, problems)
    slot = np.arange(len(source)) - first[problem]
    row_of = np.full(len(shapes.problem), -1)
    row_of[source] = np.arange(len(source))
    hole_of = shapes.hole_of[source]
    host = np.where(hole_of < 0, -1, slot[row_of[hole_of]] if len(slot) else -1)
    return Bodies(source, problem, slot, host, shapes.depth[source], first), row_of


def _polygons(table: Polygons, body: Ints) -> Polygons:
    keep = (body >= 0).nonzero()[0]
    keep = keep[body[keep].argsort(kind="stable")]
    return Polygons(body[keep], *(select(column, keep) for column in table[1:]))


def _ellipses(table: Ellipses, body: Ints) -> Ellipses:
    keep = (body >= 0).nonzero()[0]
    keep = keep[body[keep].argsort(kind="stable")]
    return pick_ellipses(table._replace(body=body), keep)


def _lines(bodies: Bodies, polygons: Polygons, ellipses: Ellipses) -> Lines:
    """Edges within the cut radius, and the lines where two bodies change depth order."""
    which, edge = np.nonzero((polygons.start <= polygons.end).T)
    body = polygons.body[which]
    edges = Lines(
        bodies.problem[body],
        body,
        polygons.distance[edge, which],
        polygons.normal[:, edge, which],
        polygons.start[edge, which],
        polygons.end[edge, which],
    )
    meets = _depth_lines(bodies, polygons, ellipses)
    if not len(meets.problem):
        return edges
    both = join_lines(edges, meets)
    sequence = np.argsort(both.problem, kind="stable")
    return pick_lines(both, sequence)


def _depth_lines(bodies: Bodies, polygons: Polygons, ellipses: Ellipses) -> Lines:
    """Find where the depths of two bodies are equal inside the boxes of both.

    The body of higher precedence stays in front up to a depth difference of the tie, so
    the line is laid exactly there.
    """
    low, high = _boxes(len(bodies.problem), polygons, ellipses)
    row = np.arange(len(bodies.problem))
    ahead, behind = spans(row + 1, bodies.first[bodies.problem + 1] - row - 1)
    solid = (bodies.host[ahead] < 0) & (bodies.host[behind] < 0)
    ahead, behind = ahead[solid], behind[solid]
    gap = (bodies.depth[ahead] - bodies.depth[behind]).T
    offset = gap[0] - DEPTH_TIE_MM
    left = np.maximum(select(low, ahead), select(low, behind))
    right = np.minimum(select(high, ahead), select(high, behind))
    middle = offset + 0.5 * np.sum(gap[1:] * (left + right), axis=0)
    swing = 0.5 * np.sum(np.abs(gap[1:]) * (right - left), axis=0)
    slope = np.hypot(gap[1], gap[2])
    cross = (left < right).all(axis=0) & (np.abs(middle) < swing)
    cross &= np.abs(offset) < CUT_RADIUS * slope
    pick = cross.nonzero()[0]
    sign = np.where(offset[pick] > 0.0, -1.0, 1.0)
    distance = np.abs(offset[pick]) / slope[pick]
    half = np.sqrt(CUT_RADIUS**2 - distance**2)
    problem, nobody = bodies.problem[ahead[pick]], np.full(len(pick), -1)
    return Lines(problem, nobody, distance, gap[1:, pick] * sign / slope[pick], -half, half)


def _boxes(count: int, polygons: Polygons, ellipses: Ellipses) -> tuple[Floats, Floats]:
    """Bounding boxes (2, N) of the bodies, cut at the cut radius."""
    low, high = np.empty((2, count)), np.empty((2, count))
    low[:, polygons.body] = polygons.corner.min(axis=1)
    high[:, polygons.body] = polygons.corner.max(axis=1)
    reach = np.hypot(ellipses.axes[:, 0], ellipses.axes[:, 1])
    low[:, ellipses.body] = ellipses.centre - reach
    high[:, ellipses.body] = ellipses.centre + reach
    return np.maximum(low, -CUT_RADIUS), np.minimum(high, CUT_RADIUS)
