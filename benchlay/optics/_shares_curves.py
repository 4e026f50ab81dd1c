"""The outlines of a cross-section as straight pieces and ellipses in its scaled plane.

Everything here is a flat table over all problems, rows sorted by problem, so that a
call with forty problems costs hardly more than a call with one.
"""

from __future__ import annotations

from typing import TypeVar

import numpy as np
from numpy.typing import NDArray

from benchlay.named import NamedTuple

Floats = NDArray[np.float64]
Ints = NDArray[np.intp]
Bools = NDArray[np.bool_]
Complexes = NDArray[np.complex128]
Table = TypeVar("Table", Floats, Ints)

CUT_RADIUS = 4.6  # exp(-2 r^2) is 4e-19 here: nothing farther out is looked at
DEPTH_TIE_MM = 1e-9  # far above rounding of a metre in mm, far below any real gap
SMALLEST_AREA = 1e-15  # a sliver below this holds less than the accuracy aimed at
_ON_AXIS = 1e-14  # a line this close to the axis is taken to pass through it


class Shapes(NamedTuple):
    """The bodies and their holes in all cross-sections of one call, a row a shape.

    Coordinates are xi = W^-1 x (dimensionless), in which the power density of the beam
    is (2/pi) exp(-2 |xi|^2). Rows of one problem stand together.
    """

    problem: Ints  # (S,) non-decreasing, which cross-section
    corners: Ints  # (S,) 0 for an ellipse, else the number of corners, at least 3
    vertices: Floats  # (S, V, 2) convex; rows past `corners` repeat the last corner
    centre: Floats  # (S, 2) centre of an ellipse
    axes: Floats  # (S, 2, 2) ellipse = centre + axes @ unit circle
    depth: Floats  # (S, 3) depth at xi = d0 + d1 xi1 + d2 xi2, in mm
    order: Ints  # (S,) in front at equal depth: the lower one
    hole_of: Ints  # (S,) -1 for a body, else the row of the body this is a hole in


class Bodies(NamedTuple):
    """The shapes that matter; bodies in order of precedence, then holes."""

    source: Ints  # (N,) row in Shapes
    problem: Ints  # (N,)
    slot: Ints  # (N,) place within the problem
    host: Ints  # (N,) slot of the body a hole belongs to, -1 for a body
    depth: Floats  # (N, 3)
    first: Ints  # (problems + 1,) first row of each problem


class Polygons(NamedTuple):
    """Convex polygons; the last axis of the corner tables is the polygon."""

    body: Ints  # (P,) row in Bodies
    corner: Floats  # (2, V, P)
    normal: Floats  # (2, V, P) unit, from the axis to the line of the edge; 0 if no edge
    distance: Floats  # (V, P) of that line from the axis, >= 0
    start: Floats  # (V, P) place of the edge's ends along the line, from the foot
    end: Floats  # (V, P) start > end: the edge stays outside the cut radius


class Ellipses(NamedTuple):
    """Ellipses = centre + axes @ unit circle, with det(axes) > 0."""

    body: Ints  # (E,)
    centre: Floats  # (2, E)
    axes: Floats  # (2, 2, E)
    inverse: Floats  # (2, 2, E)
    axis: Floats  # (2, E) the beam's axis in coordinates where the ellipse is the unit circle
    reach: Floats  # (E,) larger semi-axis


class Lines(NamedTuple):
    """Straight pieces: point = distance * normal + s * tangent, start <= s <= end."""

    problem: Ints  # (L,) non-decreasing
    body: Ints  # (L,) row in Bodies; -1 for a line where two depths are equal
    distance: Floats  # (L,)
    normal: Floats  # (2, L); the tangent is this turned anticlockwise
    start: Floats  # (L,)
    end: Floats  # (L,)


def spans(first: Ints, count: Ints) -> tuple[Ints, Ints]:
    """List, for each row i, the members first[i] .. first[i] + count[i] - 1.

    Returns
    -------
    row, member : (sum(count),) ndarray of intp
    """
    row = np.arange(len(count)).repeat(count)
    before = count.cumsum() - count
    return row, np.arange(len(row)) - (before - first).take(row)


def starts(problem: Ints, problems: int) -> Ints:
    """First row of each problem in a sorted table, with the end as a last entry."""
    return problem.searchsorted(np.arange(problems + 1))


def select(table: Table, index: Ints) -> Table:
    """Columns of a table whose last axis is the row of a body, line or problem."""
    return table.take(index, -1)


def pick_lines(lines: Lines, index: Ints) -> Lines:
    """Rows of a table of straight pieces."""
    return Lines(
        lines.problem[index],
        lines.body[index],
        lines.distance[index],
        lines.normal.take(index, 1),
        lines.start[index],
        lines.end[index],
    )


def join_lines(first: Lines, second: Lines) -> Lines:
    """Rows of two tables of straight pieces, one after the other."""
    return Lines(
        np.concatenate((first.problem, second.problem)),
        np.concatenate((first.body, second.body)),
        np.concatenate((first.distance, second.distance)),
        np.concatenate((first.normal, second.normal), axis=1),
        np.concatenate((first.start, second.start)),
        np.concatenate((first.end, second.end)),
    )


def pick_ellipses(ellipses: Ellipses, index: Ints) -> Ellipses:
    """Rows of a table of ellipses."""
    return Ellipses(ellipses.body[index], *(x.take(index, -1) for x in ellipses[1:]))


def measure_polygons(vertices: Floats) -> tuple[Polygons, Floats, Bools]:
    """Edges, areas, and whether the axis lies inside, of polygons (P, V, 2)."""
    corner = np.ascontiguousarray(np.moveaxis(vertices, 0, -1).swapaxes(0, 1))
    after = following(corner, 1)
    along = after - corner
    arm = corner - corner[:, :1]
    area = 0.5 * np.sum(arm[0] * along[1] - arm[1] * along[0], axis=0)
    length = np.hypot(along[0], along[1])
    unit = along / np.where(length > 0.0, length, 1.0)
    offset = corner[0] * unit[1] - corner[1] * unit[0]  # > 0: axis to the left
    inside = np.all(offset * np.sign(area) >= 0.0, axis=0)
    sign = np.where(offset < 0.0, -1.0, 1.0)
    normal = np.array((unit[1] * sign, -unit[0] * sign))
    distance = np.abs(offset)
    distance[distance < _ON_AXIS] = 0.0
    here = corner[1] * normal[0] - corner[0] * normal[1]
    there = after[1] * normal[0] - after[0] * normal[1]
    half = np.sqrt(np.maximum(CUT_RADIUS**2 - distance**2, 0.0))
    start = np.maximum(np.minimum(here, there), -half)
    end = np.minimum(np.maximum(here, there), half)
    end[(length == 0.0) | (distance >= CUT_RADIUS)] = -np.inf
    none = np.zeros(len(vertices), dtype=np.intp)
    return Polygons(none, corner, normal, distance, start, end), np.abs(area), inside


def measure_ellipses(centre: Floats, axes: Floats) -> tuple[Ellipses, Floats]:
    """Inverse maps and areas of ellipses with centre (E, 2) and axes (E, 2, 2)."""
    matrix = np.array(np.moveaxis(axes, 0, -1), order="C")
    middle = np.ascontiguousarray(centre.T)
    det = matrix[0, 0] * matrix[1, 1] - matrix[0, 1] * matrix[1, 0]
    matrix[:, 1] *= np.where(det < 0.0, -1.0, 1.0)
    det = np.abs(det)
    safe = np.where(det > 0.0, det, 1.0)
    inverse = np.empty_like(matrix)
    inverse[0, 0], inverse[1, 1] = matrix[1, 1] / safe, matrix[0, 0] / safe
    inverse[0, 1], inverse[1, 0] = -matrix[0, 1] / safe, -matrix[1, 0] / safe
    axis = -transform(inverse, middle)
    none = np.zeros(len(centre), dtype=np.intp)
    table = Ellipses(none, middle, matrix, inverse, axis, largest_stretch(matrix))
    return table, np.pi * det


def following(values: Floats, axis: int) -> Floats:
    """Return along an axis, for each corner of an outline, what the next one has."""
    rows = list(range(1, values.shape[axis])) + [0] * min(1, values.shape[axis])
    return values.take(rows, axis)


def transform(matrix: Floats, point: Floats) -> Floats:
    """Apply matrices (2, 2, N) to points (2, N)."""
    image: Floats = matrix[:, 0] * point[0]
    image += matrix[:, 1] * point[1]
    return image


def largest_stretch(matrix: Floats) -> Floats:
    """Larger singular value of matrices (2, 2, N)."""
    even = np.hypot(matrix[0, 0] + matrix[1, 1], matrix[1, 0] - matrix[0, 1])
    odd = np.hypot(matrix[0, 0] - matrix[1, 1], matrix[1, 0] + matrix[0, 1])
    stretch: Floats = 0.5 * (even + odd)
    return stretch
