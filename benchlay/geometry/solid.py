"""Convex solids as plain data: what stops light besides optical faces.

A solid is given by corner points, by planar patches (index tuples, anticlockwise seen
from outside, which also give its bounding planes), by elliptical end faces and, where it
is round, by the cylinder that bounds it.
"""

from __future__ import annotations

from typing import TypeAlias

from benchlay.named import NamedTuple

Vector: TypeAlias = tuple[float, float, float]


class Hole(NamedTuple):
    """An opening right through a solid, given on one of its sides.

    `half_axes` are two vectors at right angles from its centre: to the middle of its sides,
    or of a round one its radii. `through` leads from its centre to the other side.
    """

    name: str
    round: bool
    centre: Vector
    half_axes: tuple[Vector, Vector]
    through: Vector


class Solid(NamedTuple):
    """A convex solid; points in mm, in the frame of its owner.

    `patches` index `points`; `discs` are (centre, end of first half axis, end of second)
    with the outward normal along the cross product of the half axes; `cylinder` is (centre
    of one end, centre of the other, radius in mm). `upright` solids stand on the bench
    whatever their element's pitch is: their origin is the bench surface below the element.
    """

    part: str
    points: tuple[Vector, ...]
    patches: tuple[tuple[int, ...], ...]
    discs: tuple[tuple[int, int, int], ...] = ()
    cylinder: tuple[int, int, float] | None = None
    upright: bool = False
    holes: tuple[Hole, ...] = ()


def box(
    part: str,
    x: tuple[float, float],
    y: tuple[float, float],
    z: tuple[float, float],
    *,
    upright: bool = False,
) -> Solid:
    """Return the box between two values of each coordinate, in mm."""
    points = tuple((a, b, c) for a in x for b in y for c in z)
    # points are numbered x, y, z as bits 4, 2, 1
    patches = (
        (4, 6, 7, 5),
        (0, 1, 3, 2),
        (2, 3, 7, 6),
        (0, 4, 5, 1),
        (1, 5, 7, 3),
        (0, 2, 6, 4),
    )
    return Solid(part, points, patches, upright=upright)


def prism(
    part: str,
    outline: tuple[tuple[float, float], ...],
    z: tuple[float, float],
    *,
    upright: bool = False,
) -> Solid:
    """Return the upright prism over a convex outline (anticlockwise), in mm."""
    count = len(outline)
    points = tuple((x, y, z[0]) for x, y in outline) + tuple((x, y, z[1]) for x, y in outline)
    sides = tuple((i, (i + 1) % count, (i + 1) % count + count, i + count) for i in range(count))
    bottom = tuple(reversed(range(count)))
    top = tuple(range(count, 2 * count))
    return Solid(part, points, (*sides, bottom, top), upright=upright)


def disc(
    part: str,
    radius_mm: float,
    x: tuple[float, float],
    slope: tuple[float, float] = (0.0, 0.0),
) -> Solid:
    """Return the round slab along the x axis from x[0] (back) to x[1] (front).

    The back may be tilted: it lies on ``x[0] - slope . (y, z)``.
    """
    r = radius_mm
    front = ((x[1], 0.0, 0.0), (x[1], r, 0.0), (x[1], 0.0, r))
    back = (
        (x[0], 0.0, 0.0),
        (x[0] - slope[1] * r, 0.0, r),
        (x[0] - slope[0] * r, r, 0.0),
    )
    return Solid(part, (*front, *back), (), discs=((0, 1, 2), (3, 4, 5)), cylinder=(0, 3, r))


def slab(
    part: str,
    outline: tuple[tuple[float, float], ...],
    x: tuple[float, float],
    slope: tuple[float, float] = (0.0, 0.0),
) -> Solid:
    """Return the slab along x over a convex outline in (y, z), the back tilted as in `disc`."""
    count = len(outline)
    front = tuple((x[1], y, z) for y, z in outline)
    back = tuple((x[0] - slope[0] * y - slope[1] * z, y, z) for y, z in outline)
    sides = tuple((i, i + count, (i + 1) % count + count, (i + 1) % count) for i in range(count))
    return Solid(
        part,
        front + back,
        (tuple(range(count)), tuple(range(2 * count - 1, count - 1, -1)), *sides),
    )


def post(radius_mm: float, at: tuple[float, float], z: tuple[float, float]) -> Solid:
    """Return an upright round post, in mm; `at` is its axis in the element's plan frame."""
    x, y = at
    r = radius_mm
    top = ((x, y, z[1]), (x + r, y, z[1]), (x, y + r, z[1]))
    foot = ((x, y, z[0]), (x, y + r, z[0]), (x + r, y, z[0]))
    return Solid(
        "post",
        (*top, *foot),
        (),
        discs=((0, 1, 2), (3, 4, 5)),
        cylinder=(0, 3, r),
        upright=True,
    )
