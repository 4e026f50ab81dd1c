"""Directions from a point to regions of planes: azimuth, elevation, solid angle, all exact."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from itertools import pairwise
from math import asin, atan, atan2, hypot, pi, sqrt

from benchlay.coverage.blockers import Place
from benchlay.named import NamedTuple

_UPRIGHT = 1e-9  # of its length: a direction with less than that sideways has no azimuth
_SAME_RAD = 1e-9  # intervals nearer than this touch; a gap of a micrometre at 20 m is 5e-8


class Directions(NamedTuple):
    """An interval of azimuth (start, end), end below start + 2 pi, with what lies in it, rad."""

    azimuth: tuple[float, float]
    elevation: tuple[float, float]
    solid_angle_sr: float


def directions(eye: Place, polygons: Iterable[Sequence[Place]]) -> list[Directions]:
    """Return the directions to convex polygons, joined where their azimuths meet."""
    return _joined([_of_one(eye, polygon) for polygon in polygons])


def solid_angle(ways: Sequence[Place]) -> float:
    """Return the solid angle of a convex polygon, given by ways to its corners, in sr.

    Triangle by triangle [1]_.

    References
    ----------
    .. [1] Van Oosterom, A., Strackee, J. (1983). The solid angle of a plane triangle. IEEE
       Trans. Biomed. Eng. 30(2), 125-126.
    """
    units = [_unit(way) for way in ways]
    total, a = 0.0, units[0]
    for b, c in pairwise(units[1:]):
        triple = _dot(a, _cross(b, c))
        total += 2.0 * atan2(triple, 1.0 + _dot(a, b) + _dot(b, c) + _dot(c, a))
    return abs(total)


def _of_one(eye: Place, polygon: Sequence[Place]) -> Directions:
    ways = [(x - eye[0], y - eye[1], z - eye[2]) for x, y, z in polygon]
    elevations, bearings = [], []
    for way, following in zip(ways, [*ways[1:], ways[0]], strict=True):
        flat, length = hypot(way[0], way[1]), hypot(*way)
        elevations.append(asin(max(-1.0, min(1.0, way[2] / length))))
        if flat > _UPRIGHT * length:
            bearings.append(atan2(way[1], way[0]))
        elevations += _extreme(way, following)
    middle = [sum(parts) for parts in zip(*map(_unit, ways), strict=True)]
    about = atan2(middle[1], middle[0])
    off = [_wrapped(bearing - about) for bearing in bearings]
    return Directions(
        (about + min(off), about + max(off)),
        (min(elevations), max(elevations)),
        solid_angle(ways),
    )


def _extreme(way: Place, following: Place) -> list[float]:
    """Return the elevation that the side between two corners reaches between them.

    Seen from the eye, a straight side lies on a great circle: the tangent of its elevation goes
    as the cosine of the azimuth from the circle's highest point.
    """
    nx, ny, nz = _cross(way, following)
    flat = hypot(nx, ny)
    if abs(nz) <= _UPRIGHT * flat or flat == 0.0:
        return []
    # The highest point of the circle: the way in its plane that goes up most.
    top = (-nx * nz, -ny * nz, flat * flat)
    found = []
    for end in (top, (-top[0], -top[1], -top[2])):
        between = _dot(_cross(way, end), (nx, ny, nz)) > 0.0
        between &= _dot(_cross(end, following), (nx, ny, nz)) > 0.0
        if between:
            found.append(atan(end[2] / hypot(end[0], end[1])))
    return found


def _joined(found: list[Directions]) -> list[Directions]:
    """Join what meets in azimuth, across the seam too; starts lie in [-pi, pi)."""
    found = sorted(_settled(one) for one in found)
    joined: list[Directions] = []
    for one in found:
        if joined and one.azimuth[0] <= joined[-1].azimuth[1] + _SAME_RAD:
            joined[-1] = _union(joined[-1], one)
        else:
            joined.append(one)
    # What runs past the seam may meet the first ones again, one turn further on.
    while len(joined) > 1:
        start, end = joined[0].azimuth
        if joined[-1].azimuth[1] + _SAME_RAD < start + 2.0 * pi:
            break
        moved = joined.pop(0)._replace(azimuth=(start + 2.0 * pi, end + 2.0 * pi))
        joined[-1] = _union(joined[-1], moved)
    if len(joined) == 1 and joined[0].azimuth[1] - joined[0].azimuth[0] >= 2.0 * pi - _SAME_RAD:
        joined[0] = joined[0]._replace(azimuth=(-pi, pi))
    return joined


def _settled(one: Directions) -> Directions:
    start, end = one.azimuth
    turn = _wrapped(start) - start
    return one._replace(azimuth=(start + turn, end + turn))


def _union(a: Directions, b: Directions) -> Directions:
    return Directions(
        (a.azimuth[0], max(a.azimuth[1], b.azimuth[1])),
        (min(a.elevation[0], b.elevation[0]), max(a.elevation[1], b.elevation[1])),
        a.solid_angle_sr + b.solid_angle_sr,
    )


def _wrapped(angle: float) -> float:
    """Return an angle in [-pi, pi)."""
    return (angle + pi) % (2.0 * pi) - pi


def _unit(way: Sequence[float]) -> Place:
    x, y, z = way
    length = sqrt(x * x + y * y + z * z)
    return x / length, y / length, z / length


def _dot(a: Sequence[float], b: Sequence[float]) -> float:
    return a[0] * b[0] + a[1] * b[1] + a[2] * b[2]


def _cross(a: Sequence[float], b: Sequence[float]) -> Place:
    return (
        a[1] * b[2] - a[2] * b[1],
        a[2] * b[0] - a[0] * b[2],
        a[0] * b[1] - a[1] * b[0],
    )
