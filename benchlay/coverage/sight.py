"""What of a plane region a point can see, with nothing that stops the ray before or beyond.

Shadows are thrown from the point on the region's plane. Convex things throw convex shadows, so
what is left is exact (but for round openings, which are polygons of 256 sides).
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from math import acos, asin, sqrt

from benchlay.coverage.blockers import Blocker, Hull, Place, Prism
from benchlay.coverage.planar import Convex, Pair, common, cut, hull, less, wide
from benchlay.named import NamedTuple

# In front of the eye means further than this share of the distance to the plane: what is nearer
# throws its shadow far outside of any region.
_FRONT = 1e-6
_BESIDE_MM = 1.0  # how far outside a region shadows are still followed


class Cell(NamedTuple):
    """A convex region of a plane: ``origin + u first + v second``, unit vectors at right angles."""

    origin: Place
    first: Place
    second: Place
    polygon: tuple[Pair, ...]

    def place(self, point: Pair) -> Place:
        """Return a point of the plane in space."""
        u, v = point
        x, y, z = (
            o + u * a + v * b for o, a, b in zip(self.origin, self.first, self.second, strict=True)
        )
        return x, y, z


def upright(start: Pair, end: Pair, low_mm: float, high_mm: float) -> Cell:
    """Return the upright rectangle over a line in plan."""
    x, y = end[0] - start[0], end[1] - start[1]
    length = (x * x + y * y) ** 0.5
    corners = ((0.0, low_mm), (length, low_mm), (length, high_mm), (0.0, high_mm))
    return Cell((*start, 0.0), (x / length, y / length, 0.0), (0.0, 0.0, 1.0), corners)


def level(corners: Sequence[Pair], height_mm: float) -> Cell:
    """Return the level region over an outline in plan."""
    return Cell((0.0, 0.0, height_mm), (1.0, 0.0, 0.0), (0.0, 1.0, 0.0), tuple(corners))


class View:
    """A cell as seen from a point: throws things on its plane."""

    def __init__(self, cell: Cell, eye: Place) -> None:
        self.cell, self.eye = cell, eye
        (ax, ay, az), (bx, by, bz) = cell.first, cell.second
        normal = (ay * bz - az * by, az * bx - ax * bz, ax * by - ay * bx)
        away = tuple(o - e for o, e in zip(cell.origin, eye, strict=True))
        depth = _dot(normal, away)
        self._turned = depth < 0.0
        self.normal: Place = tuple(-n for n in normal) if self._turned else normal  # type: ignore[assignment]
        self.depth = abs(depth)
        self.is_level = cell.first[2] == cell.second[2] == 0.0
        self._cone: tuple[Place, float] | None = None

    def may_meet(self, body: Hull) -> bool:
        """Whether the ball round a body comes into a cone round the cell."""
        if self._cone is None:
            ways = [_unit(_minus(self.cell.place(p), self.eye)) for p in self.cell.polygon]
            axis = _unit(tuple(map(sum, zip(*ways, strict=True))))
            self._cone = axis, max(acos(max(-1.0, min(1.0, _dot(axis, way)))) for way in ways)
        axis, half = self._cone
        way = _minus(body.centre, self.eye)
        away = sqrt(_dot(way, way))
        if away <= body.reach_mm:
            return True
        off = acos(max(-1.0, min(1.0, _dot(axis, way) / away)))
        return off <= half + asin(body.reach_mm / away)

    def thrown(self, points: Iterable[Place]) -> list[Pair]:
        """Return where rays through points in front meet the plane."""
        cell, (ex, ey, ez), (nx, ny, nz), depth = self.cell, self.eye, self.normal, self.depth
        (ax, ay, az), (bx, by, bz), (ox, oy, oz) = cell.first, cell.second, cell.origin
        base_u = (ex - ox) * ax + (ey - oy) * ay + (ez - oz) * az
        base_v = (ex - ox) * bx + (ey - oy) * by + (ez - oz) * bz
        out = []
        for x, y, z in points:
            x, y, z = x - ex, y - ey, z - ez
            far = depth / (x * nx + y * ny + z * nz)
            out.append(
                (
                    base_u + far * (x * ax + y * ay + z * az),
                    base_v + far * (x * bx + y * by + z * bz),
                )
            )
        return out

    def in_front(self, points: Sequence[Place]) -> list[Place]:
        """Return points whose hull is the part in front of the hull of others."""
        least = _FRONT * self.depth
        deep = [_dot(self.normal, _minus(point, self.eye)) - least for point in points]
        kept = [point for point, d in zip(points, deep, strict=True) if d >= 0.0]
        if not kept or len(kept) == len(points):
            return kept
        behind = [(p, d) for p, d in zip(points, deep, strict=True) if d < 0.0]
        for p, d in zip(points, deep, strict=True):
            if d >= 0.0:
                kept += [_between(q, p, -e / (d - e)) for q, e in behind]
        return kept

    def shadow(self, blocker: Blocker) -> Convex:
        """Return the shadow of a blocker, as far as it may meet the cell."""
        if isinstance(blocker, Hull):
            return hull(self.thrown(self.in_front(blocker.points)))
        if self.is_level:
            return self._level_shadow(blocker)
        return hull(self.thrown(_ends(self.in_wedge(blocker.outline), blocker)))

    def light(self, points: Sequence[Place]) -> Convex:
        """Return a convex polygon in space (such as a window) thrown on the plane."""
        shape = hull(self.thrown(self.in_front(points))) if len(points) > 1 else []
        return shape

    def in_wedge(self, outline: Sequence[Pair]) -> Convex:
        """Return the part of an outline in plan within the wedge that the cell fills."""
        us = [u for u, _ in self.cell.polygon]
        ends = (min(us) - _BESIDE_MM, max(us) + _BESIDE_MM)
        if self._turned:
            ends = ends[::-1]
        (x, y, _), rest = self.eye, list(outline)
        for u, sign in zip(ends, (-1.0, 1.0), strict=True):
            px, py, _ = self.cell.place((u, 0.0))
            a, b = sign * (py - y), -sign * (px - x)
            rest = cut(rest, a, b, a * x + b * y)
        nx, ny, _ = self.normal
        return cut(rest, nx, ny, nx * x + ny * y + _FRONT * self.depth) if rest else []

    def _level_shadow(self, prism: Prism) -> Convex:
        up = self.normal[2] > 0.0
        z, least = self.eye[2], _FRONT * self.depth
        low, high = prism.low_mm, prism.high_mm
        if up:
            low = max(low, z + least)
        else:
            high = min(high, z - least)
        if low > high:
            return []
        return hull(self.thrown((x, y, h) for x, y in prism.outline for h in (low, high)))


def visible(
    cell: Cell,
    eye: Place,
    blockers: Iterable[Blocker],
) -> list[Convex]:
    """Return the parts of a cell through which rays from a point meet nothing.

    Parameters
    ----------
    cell : Cell
    eye : (x, y, z)
    blockers : iterable of Blocker
        They stop rays before and beyond the cell.

    Returns
    -------
    list of Convex
        In the cell's own plane; empty if the eye lies in that plane.
    """
    view = View(cell, eye)
    pieces = wide([list(cell.polygon)])
    if view.depth <= _FRONT:
        return []
    for blocker in blockers:
        if not pieces:
            break
        if isinstance(blocker, Hull) and not view.may_meet(blocker):
            continue
        dark = view.shadow(blocker)
        if len(dark) < 3:  # noqa: PLR2004 (no area)
            continue
        bright: list[Convex] = []
        if isinstance(blocker, Prism):
            for window in blocker.windows:
                shape = view.light(window.seen_from(eye))
                shape = common(shape, dark) if shape else []
                bright += [common(piece, shape) for piece in pieces] if shape else []
        pieces = less(pieces, dark) + wide(bright)
    return pieces


def _ends(outline: Sequence[Pair], prism: Prism) -> list[Place]:
    return [(x, y, z) for x, y in outline for z in (prism.low_mm, prism.high_mm)]


def _dot(a: Sequence[float], b: Sequence[float]) -> float:
    return a[0] * b[0] + a[1] * b[1] + a[2] * b[2]


def _unit(way: Sequence[float]) -> Place:
    x, y, z = way
    length = sqrt(x * x + y * y + z * z)
    return x / length, y / length, z / length


def _minus(a: Place, b: Place) -> Place:
    return a[0] - b[0], a[1] - b[1], a[2] - b[2]


def _between(a: Place, b: Place, share: float) -> Place:
    return (
        a[0] + share * (b[0] - a[0]),
        a[1] + share * (b[1] - a[1]),
        a[2] + share * (b[2] - a[2]),
    )
