r"""How the power of a beam is shared among the bodies that stand in its way.

The cross-section of a beam is taken in scaled coordinates xi, in which the power density
is (2/pi) exp(-2 |xi|^2) and the flow lines of the beam are xi = const. A body is the
region it covers (an ellipse or a convex polygon, less its holes) on a plane of depth. Along
a flow line the light lands on the covering body of least depth. `partition` gives the power
on each body and the power that passes all of them, each added up where it lands.

The plane is divided in polar coordinates about the axis. Along a direction each convex
region is one interval of radius, the nearest body owns each elementary interval, and the
radial integral is exact. Which outlines follow each other changes only at the corners,
tangents and crossings, so the order is found once between two such angles
(`_shares_breaks`, `_shares_order`), and what is left is an integral along each visible
stretch of outline (`_shares_integral`).
"""

from __future__ import annotations

from itertools import pairwise

import numpy as np
from numpy.typing import ArrayLike

from benchlay.geometry.distinct import ranked
from benchlay.named import NamedTuple
from benchlay.optics._shares_breaks import break_angles
from benchlay.optics._shares_curves import Bools, Floats, Ints, Shapes
from benchlay.optics._shares_integral import shares
from benchlay.optics._shares_order import cast, intervals, stretches
from benchlay.optics._shares_prepare import prepare, unusable

__all__ = ["Partition", "Shapes", "inside", "partition"]

_BLOCK = 100_000  # pairs of shapes worked on at once: bounds the memory, not the result


class Partition(NamedTuple):
    """The power of beams of power 1, divided."""

    share: Floats  # (S,) on each shape; 0 for holes
    free: Floats  # (problems,) on none


def partition(shapes: Shapes, problems: int) -> Partition:
    r"""Divide the power of beams among the bodies in their cross-sections.

    .. math:: P_k = \frac{2}{\pi} \int_{\text{first on } k} e^{-2 |\xi|^2} d^2\xi

    Parameters
    ----------
    shapes : Shapes
        The bodies and holes of all problems; depths in mm, all else dimensionless.
    problems : int
        Number of problems; one without shapes is free.

    Returns
    -------
    Partition
        Shares of the unit power, dimensionless.

    Raises
    ------
    ValueError
        If `shapes.problem` falls, or leaves 0 .. problems - 1, or a hole lies in a body of
        another problem.

    Notes
    -----
    Absolute error about 1e-13, relative error of shares above 1e-9 better than 1e-9 (less
    for slivers, whose width is known only to the rounding of the corners). Nothing beyond
    4.6 w is looked at (4e-19 of the power). Outlines of an area below 1e-15 are left out.
    At depths equal within 1e-9 mm the lower `order` is in front, then the lower row. A
    number that is not finite gives NaN throughout its own problem.

    The sum of all shares and `free` is 1 by telescoping and is no proof of the parts.

    Examples
    --------
    A stop of radius w lets nothing pass of what it covers:

    >>> import numpy as np
    >>> stop = Shapes(
    ...     problem=np.array([0]),
    ...     corners=np.array([0]),
    ...     vertices=np.zeros((1, 3, 2)),
    ...     centre=np.zeros((1, 2)),
    ...     axes=np.eye(2)[None],
    ...     depth=np.array([[10.0, 0.0, 0.0]]),
    ...     order=np.array([0]),
    ...     hole_of=np.array([-1]),
    ... )
    >>> share, free = partition(stop, 1)
    >>> f"{share[0]:.6f} {free[0]:.6f}"
    '0.864665 0.135335'
    """
    shapes = _checked(shapes, problems)
    share, free = np.zeros(len(shapes.problem)), np.ones(problems)
    bad = unusable(shapes, problems)
    rows = np.flatnonzero(~bad[shapes.problem])
    for block in _blocks(shapes.problem[rows]):
        _fill(shapes, rows[block], share, free)
    share[bad[shapes.problem]] = np.nan
    free[bad] = np.nan
    return Partition(share, free)


def _checked(shapes: Shapes, problems: int) -> Shapes:
    """Arrays of the right types, or a ValueError."""
    arrays = Shapes(
        problem=np.asarray(shapes.problem, dtype=np.intp),
        corners=np.asarray(shapes.corners, dtype=np.intp),
        vertices=np.asarray(shapes.vertices, dtype=np.float64),
        centre=np.asarray(shapes.centre, dtype=np.float64),
        axes=np.asarray(shapes.axes, dtype=np.float64),
        depth=np.asarray(shapes.depth, dtype=np.float64),
        order=np.asarray(shapes.order, dtype=np.intp),
        hole_of=np.asarray(shapes.hole_of, dtype=np.intp),
    )
    problem, hole_of = arrays.problem, arrays.hole_of
    if len(problem) and (problem[0] < 0 or problem[-1] >= problems):
        msg = f"problem must lie in 0 .. {problems - 1}"
        raise ValueError(msg)
    if (np.diff(problem) < 0).any():
        msg = "problem must be non-decreasing"
        raise ValueError(msg)
    hole = hole_of >= 0
    if (problem[hole_of[hole]] != problem[hole]).any():
        msg = "hole_of must name a body of the same problem"
        raise ValueError(msg)
    return arrays


def _blocks(problem: Ints) -> list[slice]:
    """Cut into runs of whole problems with about `_BLOCK` pairs of rows."""
    many = np.bincount(problem)[problem]  # of each row's own problem: partners to pair with
    pairs = np.cumsum(many)
    cuts = [0]
    while cuts[-1] < len(problem):
        done = pairs[cuts[-1] - 1] if cuts[-1] else 0
        reach = min(int(np.searchsorted(pairs, done + _BLOCK)), len(problem) - 1)
        cuts.append(int(np.searchsorted(problem, problem[reach], side="right")))
    return [slice(a, b) for a, b in pairwise(cuts)]


def _fill(shapes: Shapes, rows: Ints, share: Floats, free: Floats) -> None:
    """Work out the problems of some rows, and write their shares in place."""
    named, local = ranked(shapes.problem[rows])
    problem = np.zeros(len(shapes.problem), dtype=np.intp)
    problem[rows] = local
    section = prepare(shapes._replace(problem=problem), rows, len(named))
    if not len(section.bodies.problem):
        return
    sweep = intervals(*break_angles(section), len(named))
    rays = cast(section, sweep)
    if not len(rays.enter):  # no outline lies in any direction: all is free
        return
    on_body, on_none = shares(section, sweep, rays, stretches(section, sweep, rays))
    share[section.bodies.source] = on_body
    busy = np.diff(section.bodies.first) > 0
    free[named[busy]] = on_none[busy]


def inside(shapes: Shapes, point: ArrayLike) -> Bools:
    """Tell which outlines hold a point: a plain test, for drawings and cross-checks.

    Parameters
    ----------
    shapes : Shapes
    point : (N, 2) array_like of float

    Returns
    -------
    (S, N) ndarray of bool
        Whether the outline of each shape, holes not taken out, holds each point.
    """
    xi = np.asarray(point, dtype=np.float64)
    result = np.zeros((len(shapes.problem), len(xi)), dtype=bool)
    for row, corners in enumerate(shapes.corners):
        if corners:
            corner = shapes.vertices[row, :corners]
            along, arm = np.roll(corner, -1, axis=0) - corner, xi[:, None] - corner
            turn = along[:, 0] * arm[..., 1] - along[:, 1] * arm[..., 0]
            result[row] = (turn >= 0.0).all(axis=1)
        else:
            unit = np.linalg.solve(shapes.axes[row], (xi - shapes.centre[row]).T)
            result[row] = np.sum(unit**2, axis=0) <= 1.0
    return result
