"""Exact sums and differences of upright rectangles, as closed outlines.

Every coordinate of the result is one of those put in: nothing is computed, so nothing rounds.
"""

from __future__ import annotations

from bisect import bisect_left
from collections.abc import Iterable

from benchlay.geometry.polygon import Point, Polygon
from benchlay.named import NamedTuple

_Step = tuple[int, int]


class Rectangle(NamedTuple):
    """An upright rectangle."""

    left: float
    low: float
    right: float
    high: float

    @property
    def empty(self) -> bool:
        """Whether it has no area."""
        return self.right <= self.left or self.high <= self.low


def outlines(
    added: Iterable[Rectangle], taken: Iterable[Rectangle] = ()
) -> tuple[tuple[Polygon, ...], tuple[Polygon, ...]]:
    """Return the outlines of the first rectangles without the second.

    Returns
    -------
    tuple of (outer, inner)
        Outer ones anticlockwise, inner ones clockwise, each beginning with its lowest leftmost
        corner, without corners that lie on a straight line. None crosses itself; where what
        is left hangs together in a corner only, that corner stands twice in the result.
    """
    added = [r for r in added if not r.empty]
    taken = [r for r in taken if not r.empty]
    xs = sorted({x for r in (*added, *taken) for x in (r.left, r.right)})
    ys = sorted({y for r in (*added, *taken) for y in (r.low, r.high)})
    cells = _cells(added, xs, ys) - _cells(taken, xs, ys)
    loops = _loops(_edges(cells))
    named = [_corners(loop, xs, ys) for loop in loops]
    outer = sorted(loop for loop in named if _turns_left(loop))
    inner = sorted(loop for loop in named if not _turns_left(loop))
    return tuple(outer), tuple(inner)


def _cells(rectangles: list[Rectangle], xs: list[float], ys: list[float]) -> set[_Step]:
    return {
        (i, j)
        for r in rectangles
        for i in range(bisect_left(xs, r.left), bisect_left(xs, r.right))
        for j in range(bisect_left(ys, r.low), bisect_left(ys, r.high))
    }


def _edges(cells: set[_Step]) -> dict[_Step, list[_Step]]:
    """Return the edges with sheet on their left only, by where they start."""
    found: dict[_Step, list[_Step]] = {}
    for i, j in sorted(cells):
        for beside, start, end in (
            ((i, j - 1), (i, j), (i + 1, j)),
            ((i + 1, j), (i + 1, j), (i + 1, j + 1)),
            ((i, j + 1), (i + 1, j + 1), (i, j + 1)),
            ((i - 1, j), (i, j + 1), (i, j)),
        ):
            if beside not in cells:
                found.setdefault(start, []).append(end)
    return found


def _loops(edges: dict[_Step, list[_Step]]) -> list[list[_Step]]:
    left = {(start, end) for start, ends in edges.items() for end in ends}
    loops = []
    for first in sorted(left):
        if first not in left:
            continue
        loop, edge = [], first
        while edge in left:
            left.remove(edge)
            loop.append(edge[0])
            edge = (edge[1], _next(edge, edges[edge[1]]))
        loops.append(loop)
    return loops


def _next(edge: tuple[_Step, _Step], ways: list[_Step]) -> _Step:
    """Return where an outline goes on: to the left where two cells touch in a corner only."""
    return max(ways, key=lambda end: _turn(*edge, end))


def _turn(a: _Step, b: _Step, c: _Step) -> int:
    return (b[0] - a[0]) * (c[1] - b[1]) - (b[1] - a[1]) * (c[0] - b[0])


def _corners(loop: list[_Step], xs: list[float], ys: list[float]) -> Polygon:
    count = len(loop)
    kept = [n for n in range(count) if _turn(loop[n - 1], loop[n], loop[(n + 1) % count])]
    points = [(xs[loop[n][0]], ys[loop[n][1]]) for n in kept]
    first = min(range(len(points)), key=lambda n: (points[n][1], points[n][0]))
    return (*points[first:], *points[:first])


def _turns_left(corners: tuple[Point, ...]) -> bool:
    """Whether it is anticlockwise: from its lowest leftmost corner it sets out to the right."""
    return corners[1][0] > corners[0][0]
