"""Convex polygons of a handful of corners, as lists of pairs: cut, taken away, measured.

A line of sight takes a few of these, often none: plain numbers are quicker here than arrays.
Corners run anticlockwise.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from itertools import pairwise
from math import hypot
from typing import TypeAlias

from benchlay.geometry.convex import left_turns

Pair: TypeAlias = tuple[float, float]
Convex: TypeAlias = list[Pair]

# What is left over between sheets that meet is as thin as rounding, some 1e-10 mm on a bench; a
# nanometre is far below what any sheet is made to.
THIN_MM = 1e-6
_CORNERS = 3


def cut(polygon: Sequence[Pair], a: float, b: float, c: float) -> Convex:
    """Return the part of a polygon where ``a x + b y >= c``."""
    beside = [a * x + b * y - c for x, y in polygon]
    kept: Convex = []
    before, last = beside[-1] if beside else 0.0, polygon[-1] if polygon else (0.0, 0.0)
    for point, here in zip(polygon, beside, strict=True):
        if (here > 0.0 > before) or (here < 0.0 < before):
            share = before / (before - here)
            kept.append(
                (last[0] + share * (point[0] - last[0]), last[1] + share * (point[1] - last[1]))
            )
        if here >= 0.0:
            kept.append(point)
        before, last = here, point
    return kept


def common(polygon: Sequence[Pair], other: Sequence[Pair]) -> Convex:
    """Return the common part of two polygons; fewer than three corners where there is none."""
    # The sides of the simpler one cut the other: a circle has many.
    rest, other = sorted((list(polygon), list(other)), key=len, reverse=True)
    for a, b, c in _sides(other):
        if len(rest) < _CORNERS:
            return []
        rest = cut(rest, a, b, c)
    return rest


def less(pieces: Iterable[Convex], other: Sequence[Pair]) -> list[Convex]:
    """Return what a polygon leaves of others, as convex pieces; slivers are left out."""
    if len(other) < _CORNERS:
        return list(pieces)
    sides = list(_sides(other))
    left: list[Convex] = []
    for piece in pieces:
        rest, outer = piece, []
        for a, b, c in sides:
            if all(a * x + b * y >= c for x, y in rest):
                continue
            outer.append(cut(rest, -a, -b, -c))
            rest = cut(rest, a, b, c)
            if not _is_wide(rest):
                break
        if _is_wide(rest):
            left += [part for part in outer if _is_wide(part)]
        else:
            left.append(piece)
    return left


def wide(pieces: Iterable[Convex]) -> list[Convex]:
    """Return the pieces that are more than slivers."""
    return [piece for piece in pieces if _is_wide(piece)]


def area(polygon: Sequence[Pair]) -> float:
    """Return the area in mm² (shoelace formula)."""
    if len(polygon) < _CORNERS:
        return 0.0
    x0, y0 = polygon[0]
    total = 0.0
    for (ax, ay), (bx, by) in pairwise(polygon[1:]):
        total += (ax - x0) * (by - y0) - (bx - x0) * (ay - y0)
    return 0.5 * total


def hull(points: Iterable[Pair]) -> Convex:
    """Return the convex hull of points (Andrew's monotone chain)."""
    ordered = sorted(set(points))
    if len(ordered) < _CORNERS:
        return ordered
    return left_turns(ordered)[:-1] + left_turns(ordered[::-1])[:-1]


def least_width(polygon: Sequence[Pair]) -> float:
    """Return the least distance of two parallel lines that hold a polygon between them."""
    if len(polygon) < _CORNERS:
        return 0.0
    widths = []
    for a, b, c in _sides(polygon):
        length = hypot(a, b)
        widths.append(max(a * x + b * y - c for x, y in polygon) / length)
    return min(widths, default=0.0)


def middle(polygon: Sequence[Pair]) -> Pair:
    """Return the mean of the corners."""
    count = len(polygon)
    return sum(x for x, _ in polygon) / count, sum(y for _, y in polygon) / count


def _is_wide(polygon: Convex) -> bool:
    if len(polygon) < _CORNERS:
        return False
    xs, ys = zip(*polygon, strict=True)
    extent: float = max(max(xs) - min(xs), max(ys) - min(ys))
    return extent > 0.0 and area(polygon) > THIN_MM * extent


def _sides(polygon: Sequence[Pair]) -> Iterable[tuple[float, float, float]]:
    """Yield a, b, c of each side, ``a x + b y >= c`` inside."""
    ax, ay = polygon[-1]
    for bx, by in polygon:
        a, b = ay - by, bx - ax
        if a or b:
            yield a, b, a * ax + b * ay
        ax, ay = bx, by
