"""The line in plan that light should not cross: through the panels, or round the bench."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from itertools import pairwise
from math import dist, inf, isfinite

from benchlay.geometry.polygon import Point, Polygon, simple
from benchlay.layout.enclosure import Panel
from benchlay.layout.layout import Layout
from benchlay.named import NamedTuple

_SAME_MM = 1e-6  # ends of neighbouring panels nearer than this are one corner
_FEWEST = 2  # panels; below that the bench's outline is the line


class Side(NamedTuple):
    """A side of the line and the panel that stands on it; None where none does."""

    start: Point
    end: Point
    panel: str | None


class EnclosureLine(NamedTuple):
    """A closed line in plan; `enclosed` tells whether panels make it or the bench's edge.

    `top_mm` is the height above which nothing of the enclosure reaches (infinite without).
    """

    sides: tuple[Side, ...]
    enclosed: bool
    top_mm: float

    @property
    def corners(self) -> Polygon:
        """The corners in order."""
        return tuple(side.start for side in self.sides)


class Crossing(NamedTuple):
    """Where a leg leaves for the other side: how far along it, and by which side."""

    way_mm: float
    side: Side | None


def enclosure_line(layout: Layout) -> EnclosureLine:
    """Return the line of a layout: through the panels' ends in order, missing sides straight.

    With fewer than two panels it is the outline of the bench. Panels are put in order by
    going from each to the one that starts nearest to its end, begun where that leaves the
    shortest missing sides, so the order of the file does not matter. Panels that meet short of
    their ends have their corner where they meet. Where every such line crosses itself, the
    panel without which the missing sides are shortest is taken for a baffle and left out, and
    so on; where two panels are too few, the outline of the bench is taken.
    """
    enclosure = layout.enclosure
    if enclosure is None or len(enclosure.panels) < _FEWEST:
        return bench_line(layout)
    heights = [enclosure.heights_mm(panel)[1] for panel in enclosure.panels.values()]
    heights += [lid.height_mm for lid in enclosure.lids.values()]
    panels: Mapping[str, Panel] = enclosure.panels
    while len(panels) >= _FEWEST:
        for order in _orders(panels):
            sides = _sides(order, panels)
            if simple(tuple(side.start for side in sides)):
                return EnclosureLine(sides, enclosed=True, top_mm=max(heights))
        panels = _without_a_baffle(panels)
    return bench_line(layout)


def bench_line(layout: Layout) -> EnclosureLine:
    """Return the outline of the bench."""
    outline = layout.bench.outline
    pairs = zip(outline, outline[1:] + outline[:1], strict=True)
    return EnclosureLine(tuple(Side(a, b, None) for a, b in pairs), enclosed=False, top_mm=inf)


def _without_a_baffle(panels: Mapping[str, Panel]) -> dict[str, Panel]:
    """Leave out the panel without which the missing sides are shortest (of equals the last)."""

    def missing(left_out: str) -> float:
        rest = {name: panel for name, panel in panels.items() if name != left_out}
        return min((_missing(order, rest) for order in _orders(rest)), default=inf)

    baffle = min(sorted(panels, reverse=True), key=missing)
    return {name: panel for name, panel in panels.items() if name != baffle}


def _orders(panels: Mapping[str, Panel]) -> list[list[str]]:
    """Return orders of the panels, the one with the shortest missing sides first."""
    chains = [_chain(first, panels) for first in sorted(panels)]
    return [order for _, order in sorted((_missing(o, panels), o) for o in chains)]


def _chain(first: str, panels: Mapping[str, Panel]) -> list[str]:
    order, left = [first], sorted(set(panels) - {first})
    while left:
        end = panels[order[-1]].to_mm
        nearest = min(left, key=lambda name: (dist(end, panels[name].from_mm), name))
        left.remove(nearest)
        order.append(nearest)
    return order


def _missing(order: list[str], panels: Mapping[str, Panel]) -> float:
    following = order[1:] + order[:1]
    pairs = zip(order, following, strict=True)
    # To the micrometre, so that chains of one ring that differ by rounding are a tie.
    return round(sum(dist(panels[a].to_mm, panels[b].from_mm) for a, b in pairs), 3)


def _sides(order: list[str], panels: Mapping[str, Panel]) -> tuple[Side, ...]:
    following = order[1:] + order[:1]
    corners = [_meeting(panels[a], panels[b]) for a, b in zip(order, following, strict=True)]
    sides: list[Side] = []
    for number, name in enumerate(order):
        panel, after = panels[name], panels[following[number]]
        end = corners[number]
        sides.append(Side(corners[number - 1] or panel.from_mm, end or panel.to_mm, name))
        if end is None and dist(panel.to_mm, after.from_mm) > _SAME_MM:
            sides.append(Side(panel.to_mm, after.from_mm, None))
    return tuple(sides)


def _meeting(panel: Panel, following: Panel) -> Point | None:
    """Return where a panel meets the following one short of an end of either; None if nowhere.

    Only the latter half of the one and the former half of the other count: a panel that runs
    into the far end of the next is no corner of the ring.
    """
    (ax, ay), (bx, by) = panel.from_mm, panel.to_mm
    (cx, cy), (dx, dy) = following.from_mm, following.to_mm
    turn = (bx - ax) * (dy - cy) - (by - ay) * (dx - cx)
    if dist(panel.to_mm, following.from_mm) <= _SAME_MM or abs(turn) < (
        1e-9 * panel.length_mm * following.length_mm
    ):
        return None
    on_first = ((cx - ax) * (dy - cy) - (cy - ay) * (dx - cx)) / turn
    on_second = ((cx - ax) * (by - ay) - (cy - ay) * (bx - ax)) / turn
    slack = _SAME_MM / panel.length_mm, _SAME_MM / following.length_mm
    if not (0.5 < on_first <= 1.0 + slack[0] and -slack[1] <= on_second < 0.5):  # noqa: PLR2004
        return None
    return ax + on_first * (bx - ax), ay + on_first * (by - ay)


def inside(line: EnclosureLine, point: Point) -> bool:
    """Whether a point in plan lies within the line (even-odd rule)."""
    return _odd(((side.start, side.end) for side in line.sides), point)


def covers(polygon: Polygon, point: Point) -> bool:
    """Whether a point in plan lies within a polygon (even-odd rule)."""
    return _odd(zip(polygon, polygon[1:] + polygon[:1], strict=True), point)


def _odd(sides: Iterable[tuple[Point, Point]], point: Point) -> bool:
    x, y = point
    within = False
    for (ax, ay), (bx, by) in sides:
        if (ay > y) != (by > y) and x < ax + (y - ay) * (bx - ax) / (by - ay):
            within = not within
    return within


def leaving(
    line: EnclosureLine, start: Point, direction: tuple[float, float], length_mm: float
) -> Crossing | None:
    """Return where a straight leg first goes from within the line to beyond it.

    Parameters
    ----------
    start : Point
        In plan, mm.
    direction : (float, float)
        Plan part of the unit direction in space; shorter than 1 for a leg that climbs.
    length_mm : float
        Length of the leg in space.

    Returns
    -------
    Crossing or None
        None for a leg that does not leave. A leg that starts on the line and goes outwards
        leaves at once; one that ends on the line (on a panel's inner face) does not.
    """
    ways = _ways(line, start, direction, length_mm)
    stops = [0.0, *(max(way, 0.0) for way, _ in ways), length_mm]
    before = True
    for number, (here, there) in enumerate(pairwise(stops)):
        if there - here < _SAME_MM:
            continue
        middle = 0.5 * (here + there)
        now = inside(line, (start[0] + middle * direction[0], start[1] + middle * direction[1]))
        if before and not now and number > 0:
            return Crossing(here, line.sides[ways[number - 1][1]])
        before = now
    return None


def passes(
    line: EnclosureLine, start: Point, direction: tuple[float, float], length_mm: float
) -> bool:
    """Whether some part of a straight leg (as for `leaving`) lies within the line."""
    ways = _ways(line, start, direction, length_mm)
    stops = [0.0, *(max(way, 0.0) for way, _ in ways), length_mm]
    middles = (0.5 * (a + b) for a, b in pairwise(stops) if b - a >= _SAME_MM)
    return any(
        inside(line, (start[0] + way * direction[0], start[1] + way * direction[1]))
        for way in middles
    )


def _ways(
    line: EnclosureLine, start: Point, direction: tuple[float, float], length_mm: float
) -> list[tuple[float, int]]:
    """Return how far along a leg it meets the line, with the number of the side, in order."""
    return sorted(
        (way, number)
        for number, side in enumerate(line.sides)
        if isfinite(way := _way(side, start, direction)) and -_SAME_MM <= way <= length_mm
    )


def _way(side: Side, start: Point, direction: tuple[float, float]) -> float:
    """Return how far along a ray a side is crossed; infinite if it is not."""
    (ax, ay), (bx, by) = side.start, side.end
    ex, ey = bx - ax, by - ay
    turn = direction[0] * ey - direction[1] * ex
    if abs(turn) < 1e-12 * max(abs(ex), abs(ey)):
        return inf
    away_x, away_y = ax - start[0], ay - start[1]
    along = (away_x * direction[1] - away_y * direction[0]) / turn
    slack = _SAME_MM / max(abs(ex), abs(ey))
    if not -slack <= along <= 1.0 + slack:
        return inf
    return (away_x * ey - away_y * ex) / turn
