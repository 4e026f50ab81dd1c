"""What stops a line of sight: upright prisms with windows through them, and convex bodies."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Sequence
from functools import cached_property
from math import acos, atan2, cos, hypot, pi, sin, sqrt
from typing import TypeAlias

from benchlay.coverage.planar import Convex, Pair
from benchlay.named import NamedTuple

Place: TypeAlias = tuple[float, float, float]

_SIDES = 256  # of the polygon that stands for a circle
# Drawn out so that its area is the circle's; its corners then stand out by 5 parts in 100 000 of
# the radius: below a hundredth of a millimetre for any opening in a panel.
_DRAWN_OUT = sqrt(2.0 * pi / _SIDES / sin(2.0 * pi / _SIDES))


class Window(NamedTuple):
    """An opening through an upright sheet, in the sheet's own frame.

    `origin` is where the sheet's inner face starts, `along` its unit vector in plan; the inside
    is on its left. `box` is (start, end, low, high) along it and in height; a round one fills
    its box. The passage leads from the inner face `depth_mm` outwards. `clear` is the box, drawn
    out without end where it reaches the sheet's own edge: there nothing is left of the sheet.
    """

    name: str
    origin: Pair
    along: Pair
    box: tuple[float, float, float, float]
    round: bool
    depth_mm: float
    clear: tuple[float, float, float, float]

    def place(self, point: Pair, out_mm: float = 0.0) -> Place:
        """Return a point of the sheet in space: along it, height."""
        (x, y), (c, s) = self.origin, self.along
        return (x + point[0] * c + out_mm * s, y + point[0] * s - out_mm * c, point[1])

    def seen_from(self, eye: Place) -> list[Place]:
        """Return the part of the nearer mouth through which a ray from the eye also gets out."""
        (c, s), away = self.along, (eye[0] - self.origin[0], eye[1] - self.origin[1])
        foot = (away[0] * c + away[1] * s, eye[2])
        within = away[1] * c - away[0] * s
        if within > 0.0:
            near, near_out = within, 0.0
        elif within < -self.depth_mm:
            near, near_out = -within - self.depth_mm, self.depth_mm
        else:
            return []
        share = near / (near + self.depth_mm)
        low, high = (
            tuple(f + share * (value - f) for f, value in zip(foot, corner, strict=True))
            for corner in (self.clear[::2], self.clear[1::2])
        )
        other = (low[0], high[0], low[1], high[1])
        seen = _lens(self.clear, other) if self.round else _rectangle(self.clear, other)
        return [self.place(point, near_out) for point in seen]


class Prism(NamedTuple):
    """An upright prism over a convex outline, with windows through it."""

    name: str
    outline: tuple[Pair, ...]
    low_mm: float
    high_mm: float
    windows: tuple[Window, ...] = ()


class Hull:
    """The convex hull of points in space, with a ball round it; the points are made when asked."""

    def __init__(self, centre: Place, reach_mm: float, make: Callable[[], Sequence[Place]]) -> None:
        self.centre, self.reach_mm, self._make = centre, reach_mm, make

    @cached_property
    def points(self) -> Sequence[Place]:
        """The points."""
        return self._make()


Blocker: TypeAlias = Prism | Hull


def stopped(eye: Place, through: Place, blockers: Sequence[Blocker]) -> bool:
    """Whether the ray from the eye through a point may meet a blocker, before or beyond it.

    Exact for prisms; a hull counts as met where its ball is.
    """
    way = (through[0] - eye[0], through[1] - eye[1], through[2] - eye[2])
    return any(
        _meets_prism(eye, way, one) if isinstance(one, Prism) else _meets_ball(eye, way, one)
        for one in blockers
    )


def outline_of_hole(window: Window) -> Convex:
    """Return the shape of an opening as a polygon in the sheet's frame."""
    if window.round:
        return _lens(window.box, window.box)
    return _rectangle(window.box, window.box)


def _meets_ball(eye: Place, way: Place, body: Hull) -> bool:
    x, y, z = (c - e for c, e in zip(body.centre, eye, strict=True))
    along = x * way[0] + y * way[1] + z * way[2]
    length = way[0] ** 2 + way[1] ** 2 + way[2] ** 2
    away = x * x + y * y + z * z
    reach = body.reach_mm**2
    return away <= reach or (along > 0.0 and away - along * along / length <= reach)


def _meets_prism(eye: Place, way: Place, prism: Prism) -> bool:
    first, last = 0.0, float("inf")
    for gap, slope in _planes(eye, way, prism):
        # gap is how far inside the plane the eye is, slope how fast the ray goes outwards
        if slope > 0.0:
            last = min(last, gap / slope)
        elif slope < 0.0:
            first = max(first, gap / slope)
        elif gap < 0.0:
            return False
        if first >= last:
            return False
    return not any(_passes(eye, way, window) for window in prism.windows)


def _planes(eye: Place, way: Place, prism: Prism) -> Iterator[tuple[float, float]]:
    yield prism.high_mm - eye[2], way[2]
    yield eye[2] - prism.low_mm, -way[2]
    ax, ay = prism.outline[-1]
    for bx, by in prism.outline:
        nx, ny = by - ay, ax - bx  # outwards
        yield (ax - eye[0]) * nx + (ay - eye[1]) * ny, way[0] * nx + way[1] * ny
        ax, ay = bx, by


def _passes(eye: Place, way: Place, window: Window) -> bool:
    """Whether a ray goes through both mouths of a window."""
    (c, s), away = window.along, (eye[0] - window.origin[0], eye[1] - window.origin[1])
    within, inwards = away[1] * c - away[0] * s, way[1] * c - way[0] * s
    if inwards == 0.0:
        return False
    for at in (0.0, -window.depth_mm):
        share = (at - within) / inwards
        if share <= 0.0:
            return False
        along = (away[0] + share * way[0]) * c + (away[1] + share * way[1]) * s
        if not _is_in(window, along, eye[2] + share * way[2]):
            return False
    return True


def _is_in(window: Window, along: float, height: float) -> bool:
    start, end, low, high = window.clear
    if window.round:
        x, y = along - 0.5 * (start + end), height - 0.5 * (low + high)
        return hypot(x, y) < 0.5 * (end - start)
    return start < along < end and low < height < high


def _rectangle(
    a: tuple[float, float, float, float], b: tuple[float, float, float, float]
) -> Convex:
    x0, x1, y0, y1 = max(a[0], b[0]), min(a[1], b[1]), max(a[2], b[2]), min(a[3], b[3])
    return [(x0, y0), (x1, y0), (x1, y1), (x0, y1)] if x1 > x0 and y1 > y0 else []


def _circle(box: tuple[float, float, float, float]) -> tuple[Pair, float]:
    return (0.5 * (box[0] + box[1]), 0.5 * (box[2] + box[3])), 0.5 * (box[1] - box[0])


def _lens(a: tuple[float, float, float, float], b: tuple[float, float, float, float]) -> Convex:
    """Return the common part of the circles that fill two boxes."""
    (p, r), (q, s) = sorted((_circle(a), _circle(b)), key=lambda circle: circle[1])
    away = hypot(q[0] - p[0], q[1] - p[1])
    if away + r <= s:
        return _arc(p, _DRAWN_OUT * r, -pi, pi)[:-1]
    if away >= r + s:
        return []
    heading = atan2(q[1] - p[1], q[0] - p[0])
    # Half angles of the arcs of each circle that lie in the other (law of cosines).
    own = acos(max(-1.0, min(1.0, (away**2 + r**2 - s**2) / (2.0 * away * r))))
    other = acos(max(-1.0, min(1.0, (away**2 + s**2 - r**2) / (2.0 * away * s))))
    return [
        *_arc(p, r, heading - own, heading + own),
        *_arc(q, s, heading + pi - other, heading + pi + other)[1:-1],
    ]


def _arc(centre: Pair, radius: float, start: float, end: float) -> Convex:
    count = max(4, int(_SIDES * (end - start) / (2.0 * pi)))
    angles = [start + (end - start) * i / count for i in range(count + 1)]
    return [(centre[0] + radius * cos(t), centre[1] + radius * sin(t)) for t in angles]
