"""Polygons in the plane as tuples of corners: area, simplicity, convex pieces."""

from __future__ import annotations

from itertools import combinations
from typing import TypeAlias

Point: TypeAlias = tuple[float, float]
Polygon: TypeAlias = tuple[Point, ...]

_NO_AREA_MM2 = 1e-9


def signed_area(corners: Polygon) -> float:
    """Return the area in mm², positive for corners in anticlockwise order (shoelace formula)."""
    pairs = zip(corners, corners[1:] + corners[:1], strict=True)
    return sum(ax * by - bx * ay for (ax, ay), (bx, by) in pairs) / 2


def middle(corners: Polygon) -> Point:
    """Return the mean of the corners; for a convex outline it lies inside."""
    count = len(corners)
    return sum(x for x, _ in corners) / count, sum(y for _, y in corners) / count


def _turn(a: Point, b: Point, c: Point) -> float:
    """Return twice the area of abc, positive for a turn to the left."""
    return (b[0] - a[0]) * (c[1] - a[1]) - (b[1] - a[1]) * (c[0] - a[0])


def _cross(a: Point, b: Point, c: Point, d: Point) -> bool:
    """Whether the segments ab and cd meet (touching counts)."""
    first, second = _turn(a, b, c), _turn(a, b, d)
    third, fourth = _turn(c, d, a), _turn(c, d, b)
    if first * second < 0 and third * fourth < 0:
        return True
    return any(
        value == 0 and _between(p, q, r)
        for value, p, q, r in (
            (first, a, b, c),
            (second, a, b, d),
            (third, c, d, a),
            (fourth, c, d, b),
        )
    )


def _between(a: Point, b: Point, c: Point) -> bool:
    """Whether c, on the line through a and b, lies on the segment ab."""
    return min(a[0], b[0]) <= c[0] <= max(a[0], b[0]) and min(a[1], b[1]) <= c[1] <= max(a[1], b[1])


def simple(corners: Polygon) -> bool:
    """Whether the outline encloses an area and nowhere meets itself."""
    count = len(corners)
    if count < 3 or abs(signed_area(corners)) < _NO_AREA_MM2:  # noqa: PLR2004 (a triangle)
        return False
    sides = [(corners[i], corners[(i + 1) % count]) for i in range(count)]
    if any(a == b for a, b in sides):
        return False
    apart = (
        (i, j)
        for i, j in combinations(range(count), 2)
        if (i + 1) % count != j and (j + 1) % count != i
    )
    return not any(_cross(*sides[i], *sides[j]) for i, j in apart)


def holds(corners: Polygon, point: Point) -> bool:
    """Whether a point lies in a simple outline or on it (a ray to the right crosses it oddly)."""
    inside = False
    for a, b in zip(corners, corners[1:] + corners[:1], strict=True):
        side = _turn(a, b, point)
        if side == 0 and _between(a, b, point):
            return True
        if (a[1] > point[1]) != (b[1] > point[1]):
            inside ^= (side > 0) == (b[1] > a[1])
    return inside


def is_convex(corners: Polygon) -> bool:
    """Whether a simple anticlockwise outline has no reflex corner (flat ones may be)."""
    count = len(corners)
    return all(
        _turn(corners[i - 1], corners[i], corners[(i + 1) % count]) >= 0 for i in range(count)
    )


def convex_pieces(corners: Polygon) -> tuple[Polygon, ...]:
    """Return convex pieces that tile a simple anticlockwise outline: itself, or its triangles.

    Triangles are cut off one ear at a time: every simple polygon has at least two [1]_.
    Slivers of no area are left out.

    Raises
    ------
    ValueError
        If the corners run clockwise or cross one another so that no ear is left.

    References
    ----------
    .. [1] Meisters, G. H. (1975). Polygons have ears. Amer. Math. Monthly 82(6), 648-651.
    """
    if is_convex(corners):
        return (corners,)
    rest = list(corners)
    pieces: list[Polygon] = []
    while len(rest) > 3:  # noqa: PLR2004 (a triangle is left)
        ear = next((i for i in range(len(rest)) if _is_ear(rest, i)), None)
        if ear is None:
            msg = "corners must go once round a simple outline, anticlockwise"
            raise ValueError(msg)
        pieces.append((rest[ear - 1], rest[ear], rest[(ear + 1) % len(rest)]))
        del rest[ear]
    return tuple(piece for piece in (*pieces, tuple(rest)) if signed_area(piece) > _NO_AREA_MM2)


def _is_ear(rest: list[Point], i: int) -> bool:
    """Whether the triangle at a corner lies inside and no other corner in it or on its rim."""
    a, b, c = rest[i - 1], rest[i], rest[(i + 1) % len(rest)]
    if _turn(a, b, c) <= 0:
        return False
    others = (p for p in rest if p not in (a, b, c))
    return not any(
        _turn(a, b, p) >= 0 and _turn(b, c, p) >= 0 and _turn(c, a, p) >= 0 for p in others
    )
