"""The gaps of an enclosure, by name, each with its place, its width and the regions it fills.

A gap is where the enclosure's line, or its top, has nothing that is meant to stop light; whether
anything can be seen through it is another question (see `sight`).
"""

from __future__ import annotations

from collections.abc import Iterator
from itertools import pairwise
from math import dist, hypot, inf

from benchlay.coverage.blockers import Place, Window
from benchlay.coverage.enclosed import Enclosed, from_line, windows_of
from benchlay.coverage.planar import Convex, Pair, cut, hull, least_width, middle
from benchlay.layout.enclosure import Panel
from benchlay.named import NamedTuple
from benchlay.zones.enclosure_line import inside

# Sheets are cut and fixed to no better than this (common practice); what is drawn nearer than
# that is meant to meet.
LEAST_MM = 0.1
_ROUNDING_MM = 1e-6
_PARALLEL = 1e-3  # rad: panels that differ by less run in one line, or face each other

OPENING, SHEET, SIDE, OVER, UNDER, EDGE = "opening", "sheet", "side", "over", "under", "edge"


class Gap(NamedTuple):
    """One gap of an enclosure.

    Attributes
    ----------
    through : str
        Its name: "south/east corner", "east.port", "over north", "under west", "lid main".
    kind : str
        OPENING of a panel; SHEET that is off; SIDE without a panel; OVER or UNDER a panel;
        EDGE of a bench that has fewer than two panels.
    sheets : tuple of str
        The panels or lids that it belongs to.
    at : Place
        Its middle.
    width_mm : float
        Of an opening the lesser of width and height; of a side its length in plan; over and
        under a panel the clear distance to what comes next.
    sides : tuple of int
        The sides of the line that it lies on; of a lid all, and over and under a panel its own
        and then the short ends of strips that a lid or the bench top leaves open.
    heights_mm : (float, float)
        What of those sides it takes; without extent where it lies in the top alone.
    roofless : bool
        Whether it is a part of the top of an enclosure that has no lid at all.
    """

    through: str
    kind: str
    sheets: tuple[str, ...]
    at: Place
    width_mm: float
    sides: tuple[int, ...]
    heights_mm: tuple[float, float]
    roofless: bool = False

    @property
    def key(self) -> tuple[str | None, str]:
        """What makes the id of its finding: panel or lid, and name; one where no lid is at all."""
        return (None, "no lid") if self.roofless else (self.sheets[0], self.through)


def gaps_of(enclosed: Enclosed) -> list[Gap]:
    """Return all gaps wider than `LEAST_MM`, sorted by name."""
    if not enclosed.line.enclosed:
        return [_edge(enclosed)]
    found = list(_lids(enclosed))
    for number, side in enumerate(enclosed.line.sides):
        if side.panel is None:
            found.append(_missing(enclosed, number))
        else:
            found += _of_panel(enclosed, number, enclosed.enclosure.panels[side.panel])
            if (over := _over(enclosed, number)) is not None:
                found.append(over)
    return sorted(gap for gap in found if gap.width_mm > LEAST_MM + _ROUNDING_MM)


def _of_panel(enclosed: Enclosed, number: int, panel: Panel) -> Iterator[Gap]:
    name = enclosed.line.sides[number].panel or ""
    low, high = enclosed.enclosure.heights_mm(panel)
    x, y = _half_way(enclosed, number)
    if panel.open:
        width = panel.length_mm
        at = (x, y, 0.5 * (low + high))
        yield Gap(name, SHEET, (name,), at, width, (number,), (low, high))
    else:
        for window in windows(enclosed, name):
            if window.name not in enclosed.closed:
                yield _opening(window, name, number)
    under = max(low - enclosed.bottom_mm, _off_bench(enclosed, number) or 0.0)
    at = (x, y, 0.5 * (low + enclosed.bottom_mm))
    ends = [n for n in _panelled(enclosed) if n != number and _off_bench(enclosed, n) is None]
    heights = (enclosed.bottom_mm, low)
    yield Gap(f"under {name}", UNDER, (name,), at, under, (number, *ends), heights)


def _opening(window: Window, name: str, number: int) -> Gap:
    start, end, low, high = window.box
    at = window.place((0.5 * (start + end), 0.5 * (low + high)))
    return Gap(
        window.name, OPENING, (name,), at, min(end - start, high - low), (number,), (low, high)
    )


def _over(enclosed: Enclosed, number: int) -> Gap | None:
    """Return what is open over a panel: up to the top, and inwards to the first lid."""
    name, top = enclosed.line.sides[number].panel or "", enclosed.top_mm
    high = enclosed.enclosure.heights_mm(enclosed.enclosure.panels[name])[1]
    inwards = _inwards(enclosed, number)
    if _is_short_end(enclosed, inwards):
        if top - high <= LEAST_MM:
            return None
        inwards = inwards._replace(far_mm=0.0)
    (x, y), (nx, ny), far = inwards.point, inwards.way, inwards.far_mm
    if not enclosed.enclosure.lids:
        far *= 0.5  # without any lid each panel has its share, up to the middle
    at = (x + 0.5 * far * nx, y + 0.5 * far * ny, 0.5 * (high + top))
    ends = () if not enclosed.roofless else tuple(_short_ends(enclosed))
    sides = (number, *(n for n in ends if n != number))
    width, roofless = hypot(top - high, far), top == high and not enclosed.enclosure.lids
    return Gap(f"over {name}", OVER, (name,), at, width, sides, (high, top), roofless)


def _is_short_end(enclosed: Enclosed, inwards: _Inwards) -> bool:
    """Whether a side is the short end of a strip that a lid leaves open along another."""
    return bool(enclosed.enclosure.lids) and 0.0 < inwards.along_mm < inwards.far_mm


def _short_ends(enclosed: Enclosed) -> Iterator[int]:
    for number, side in enumerate(enclosed.line.sides):
        if side.panel is not None and _is_short_end(enclosed, _inwards(enclosed, number)):
            yield number


def nearest_side(enclosed: Enclosed, gap: Gap, point: Pair) -> int:
    """Return the side with a panel that is nearest to a point, short ends of strips left out."""
    sides = enclosed.line.sides
    rest = [n for n in _panelled(enclosed) if n not in gap.sides[1:]]
    return min(rest, key=lambda n: from_line(point, sides[n].start, sides[n].end))


def _panelled(enclosed: Enclosed) -> list[int]:
    return [n for n, side in enumerate(enclosed.line.sides) if side.panel is not None]


def _missing(enclosed: Enclosed, number: int) -> Gap:
    side = enclosed.line.sides[number]
    before, after = enclosed.neighbours(number) or ("", "")
    panels = enclosed.enclosure.panels
    one, other = panels[before], panels[after]
    turn = hypot(*_away(one)) * hypot(*_away(other))
    (ax, ay), (bx, by) = _away(one), _away(other)
    cross, along = (ax * by - ay * bx) / turn, (ax * bx + ay * by) / turn
    word = "corner" if abs(cross) > _PARALLEL else "joint" if along > 0.0 else "side"
    x, y = _half_way(enclosed, number)
    heights = (enclosed.bottom_mm, enclosed.top_mm)
    return Gap(
        f"{before}/{after} {word}",
        SIDE,
        (before, after),
        (x, y, 0.5 * sum(heights)),
        dist(side.start, side.end),
        (number,),
        heights,
    )


def _lids(enclosed: Enclosed) -> Iterator[Gap]:
    every = tuple(range(len(enclosed.line.sides)))
    for lid in enclosed.lids_off:
        corners = enclosed.enclosure.lids[lid.name].outline
        x, y = middle(max(lid.pieces, key=lambda piece: least_width(piece)))
        width = least_width(hull(corners))
        at = (x, y, lid.height_mm)
        yield Gap(f"lid {lid.name}", SHEET, (lid.name,), at, width, every, (0.0, 0.0))


def _edge(enclosed: Enclosed) -> Gap:
    """Return the one gap of a bench with fewer than two panels: all round it."""
    sides = enclosed.line.sides
    longest = max(range(len(sides)), key=lambda n: dist(sides[n].start, sides[n].end))
    x, y = _half_way(enclosed, longest)
    heights = (enclosed.bottom_mm, enclosed.top_mm)
    width = dist(sides[longest].start, sides[longest].end)
    every = tuple(range(len(sides)))
    sheets = tuple(sorted(enclosed.enclosure.panels)) or tuple(sorted(enclosed.enclosure.lids))
    return Gap("bench edge", EDGE, sheets, (x, y, 0.5 * sum(heights)), width, every, heights)


def _away(panel: Panel) -> Pair:
    return panel.to_mm[0] - panel.from_mm[0], panel.to_mm[1] - panel.from_mm[1]


def _half_way(enclosed: Enclosed, number: int) -> Pair:
    side = enclosed.line.sides[number]
    return 0.5 * (side.start[0] + side.end[0]), 0.5 * (side.start[1] + side.end[1])


class _Inwards(NamedTuple):
    """Where a side is open farthest inwards in the top: the point, the way, how far, how long."""

    point: Pair
    way: Pair
    far_mm: float
    along_mm: float


def _inwards(enclosed: Enclosed, number: int) -> _Inwards:
    side = enclosed.line.sides[number]
    (ax, ay), length = side.start, dist(side.start, side.end)
    cx, cy = (side.end[0] - ax) / length, (side.end[1] - ay) / length
    x, y = _half_way(enclosed, number)
    # A panel may have been drawn the wrong way round: what counts is where the inside is.
    sign = 1.0 if inside(enclosed.line, (x - LEAST_MM * cy, y + LEAST_MM * cx)) else -1.0
    way = (-sign * cy, sign * cx)
    # Along the side, the way to the first lid is straight from corner to corner of the open area.
    stops = {0.0, length}
    for piece in enclosed.roofless:
        stops |= {(x - ax) * cx + (y - ay) * cy for x, y in piece}
    ordered = sorted(s for s in stops if 0.0 <= s <= length)
    best, along = (0.0, 0.5 * length), 0.0
    for one, other in pairwise(ordered):
        middle_mm = 0.5 * (one + other)
        point = (ax + middle_mm * cx, ay + middle_mm * cy)
        far = _open_from(enclosed.roofless, point, way) if other - one > LEAST_MM else 0.0
        along += other - one if far > LEAST_MM else 0.0
        if far > best[0] + LEAST_MM:
            best = (far, middle_mm)
    return _Inwards((ax + best[1] * cx, ay + best[1] * cy), way, best[0], along)


def _open_from(pieces: tuple[Convex, ...], point: Pair, way: Pair) -> float:
    """Return how far pieces that meet reach from a point along a way in plan."""
    spans = []
    for piece in pieces:
        span = _span(piece, point, way)
        if span is not None:
            spans.append(span)
    reached = 0.0
    for start, end in sorted(spans):
        if start > reached + 1e-6:  # a lid lies between
            break
        reached = max(reached, end)
    return reached


def _span(piece: Convex, point: Pair, way: Pair) -> Pair | None:
    first, last = -inf, inf
    ax, ay = piece[-1]
    for bx, by in piece:
        nx, ny = by - ay, ax - bx
        gap, slope = (ax - point[0]) * nx + (ay - point[1]) * ny, way[0] * nx + way[1] * ny
        if slope > 0.0:
            last = min(last, gap / slope)
        elif slope < 0.0:
            first = max(first, gap / slope)
        elif gap < 0.0:
            return None
        ax, ay = bx, by
    return (first, last) if last > max(first, 0.0) else None


def _off_bench(enclosed: Enclosed, number: int) -> float | None:
    """Return how wide a strip is left beside the bench top; None at the short end of one."""
    side = enclosed.line.sides[number]
    cx, cy = side.end[0] - side.start[0], side.end[1] - side.start[1]
    length, widest, is_end = hypot(cx, cy), 0.0, False
    for piece in enclosed.floorless:
        along = cut(piece, cx, cy, cx * side.start[0] + cy * side.start[1])
        along = cut(along, -cx, -cy, -cx * side.end[0] - cy * side.end[1]) if along else along
        away = [abs((x - side.start[0]) * cy - (y - side.start[1]) * cx) / length for x, y in along]
        if away and min(away) < LEAST_MM:
            ways = [x * cx + y * cy for x, y in along]
            is_end |= (max(ways) - min(ways)) / length < max(away)
            widest = max(widest, 0.0 if is_end else max(away))
    return None if is_end and widest == 0.0 else widest


def windows(enclosed: Enclosed, name: str) -> tuple[Window, ...]:
    """Return the openings of a panel of the enclosure."""
    return windows_of(enclosed.enclosure, enclosed.layout, name, enclosed.enclosure.panels[name])
