"""The horizontal of each beam: the direction from which its angles are told."""

from __future__ import annotations

import numpy as np

from benchlay.optics.rays import bench_basis
from benchlay.placing.pose import UPRIGHT, Vector, add, cross, dot, unit
from benchlay.scene.tables import Floats, Ints

_OPPOSITE = 1e-12  # 1 + cosine below which two directions count as opposite


def horizontals(direction: Floats, parent: Ints) -> Floats:
    """Return the horizontal (N, 3) of beams, unit vectors across their directions.

    Parameters
    ----------
    direction : (N, 3) ndarray of float64
        Unit directions, parents before their children.
    parent : (N,) ndarray of int
        Number of each beam's parent, -1 for none.

    Notes
    -----
    It is level and to the left, looking along the beam. A vertical beam has no such
    direction of its own: it keeps that of the beam it came from, turned as the beam was
    turned, by the least rotation. A beam sent straight back keeps it as it is.
    """
    level = bench_basis(direction)[0]
    vertical = np.hypot(direction[:, 0], direction[:, 1]) < UPRIGHT
    for beam in np.flatnonzero(vertical & (parent >= 0)).tolist():
        before = parent[beam]
        level[beam] = carried(
            _vector(level[before]), _vector(direction[before]), _vector(direction[beam])
        )
    return level


def _vector(row: Floats) -> Vector:
    x, y, z = row.tolist()
    return (x, y, z)


def carried(axis: Vector, before: Vector, after: Vector) -> Vector:
    r"""Turn an axis of one beam into the axis of the next by the least rotation.

    .. math:: R a = a + v \times a + \frac{v \times (v \times a)}{1 + k \cdot k'},
              \quad v = k \times k'

    Examples
    --------
    >>> carried((0.0, 1.0, 0.0), (1.0, 0.0, 0.0), (0.0, 0.0, 1.0))
    (0.0, 1.0, 0.0)
    """
    turn = cross(before, after)
    scale = 1.0 + dot(before, after)
    if scale > _OPPOSITE:
        once = cross(turn, axis)
        axis = add(add(axis, once), cross(turn, once), 1.0 / scale)
    across = unit(add(axis, after, -dot(axis, after)))
    return axis if across is None else across
