"""From which stretch of a beam one flat mirror could throw it out through a gap.

A mirror can be turned every way, so that from each point of a beam it may send the light in
every direction: what matters is whether the point sees the gap. Where that changes along a beam
is found from critical points (where the beam crosses lines through two upright edges) and made
exact by halving.
"""

from __future__ import annotations

from collections.abc import Iterator
from itertools import pairwise
from math import atan2

import numpy as np

from benchlay.coverage.blockers import Hull, Place, Prism, stopped
from benchlay.coverage.enclosed import Enclosed
from benchlay.coverage.filled import corners
from benchlay.coverage.gaps import OPENING, Gap, windows
from benchlay.coverage.planar import Pair
from benchlay.named import NamedTuple
from benchlay.placing.placed import PlacedState
from benchlay.scene.tables import PARTS, Scene
from benchlay.zones.enclosure_line import inside

_EXACT_MM = 1e-4  # to which the ends of a stretch are found: far below what is set on a bench
# Beside the critical points, so many steps, for edges that are not upright: of what is seen over
# or under something, the ends are found from there by halving.
_STEPS = 12
_SAME_MM = 1e-3
_HOLDS_BACK = ("post", "foot", "source")
_OF_OPAQUE = ("body", "mount", "edge")


class Leg(NamedTuple):
    """A straight piece of a beam: start, unit direction, from and to along it in mm."""

    start: Place
    direction: Place
    from_mm: float
    to_mm: float

    def at(self, way_mm: float) -> Place:
        """Return a point of it."""
        x, y, z = (s + way_mm * k for s, k in zip(self.start, self.direction, strict=True))
        return x, y, z


def among_bodies(enclosed: Enclosed, state: PlacedState, scene: Scene, variant: int) -> Enclosed:
    """Return an enclosure with what stands on the bench among what stops light.

    Only what surely does: posts, feet, sources, and the bodies and mounts of elements that pass
    no light. A tube lets light through along itself, so it counts for nothing.
    """
    s = scene.solids
    opaque = [
        "transmitted" not in state.elements[name].element.record.branches()
        for name in scene.elements
    ]
    part = s.part
    kept = np.isin(part, [PARTS.index(name) for name in _HOLDS_BACK])
    dense = np.zeros(len(scene.elements) + len(scene.sources) + 1, dtype=np.bool_)
    dense[: len(opaque)] = opaque
    kept |= dense[s.owner] & np.isin(part, [PARTS.index(name) for name in _OF_OPAQUE])
    rows = np.flatnonzero(kept & s.present[variant] & ~scene.fixed.pierced).tolist()
    bodies = (_body(scene, row) for row in rows)
    return enclosed._replace(blockers=(*enclosed.blockers, *bodies))


def _body(scene: Scene, row: int) -> Hull:
    def points() -> list[Place]:
        return [(x, y, z) for x, y, z in corners(scene, row, within=True).tolist()]

    x, y, z = scene.solids.centre[row].tolist()
    return Hull((x, y, z), float(scene.solids.reach[row]), points)


def upright_only(enclosed: Enclosed) -> Enclosed:
    """Return an enclosure without a lid as one of which only the sides are looked at."""
    return enclosed if enclosed.enclosure.lids else enclosed._replace(roofless=(), floorless=())


def within(enclosed: Enclosed, start: Place, direction: Place, length_mm: float) -> list[Leg]:
    """Return the parts of a leg that lie within the enclosure."""
    whole = Leg(start, direction, 0.0, length_mm)
    if enclosed.convex and enclosed.holds(start) and enclosed.holds(whole.at(length_mm)):
        return [whole]
    stops = {0.0, length_mm}
    for side in enclosed.line.sides:
        way = _crossing(start, direction, side.start, side.end)
        if way is not None and 0.0 < way < length_mm:
            stops.add(way)
    if direction[2] and 0.0 < (up := (enclosed.top_mm - start[2]) / direction[2]) < length_mm:
        stops.add(up)
    found: list[Leg] = []
    for one, other in pairwise(sorted(stops)):
        x, y, z = whole.at(0.5 * (one + other))
        if other - one > _SAME_MM and z < enclosed.top_mm and inside(enclosed.line, (x, y)):
            found.append(whole._replace(from_mm=one, to_mm=other))
    return found


def sees(enclosed: Enclosed, gap: Gap, place: Place) -> bool:
    """Whether a mirror at a place could throw light out through a gap."""
    if not stopped(place, gap.at, enclosed.blockers):
        return True
    # Loaded where one ray does not answer it.
    from benchlay.coverage.regions import parts_seen

    return next(parts_seen(enclosed, gap, place), None) is not None


def guilty(enclosed: Enclosed, gap: Gap, leg: Leg) -> bool:
    """Whether a mirror anywhere on a leg could throw light out through a gap."""
    # Bodies only hold back: where the sheets alone hide a gap, they need not be looked at.
    sheets = tuple(one for one in enclosed.blockers if isinstance(one, Prism))
    bare = enclosed._replace(blockers=sheets)
    if not any(sees(bare, gap, leg.at(way)) for way in _trials(bare, gap, leg)):
        return False
    return any(sees(enclosed, gap, leg.at(way)) for way in _trials(enclosed, gap, leg))


def stretches(enclosed: Enclosed, gap: Gap, leg: Leg) -> list[tuple[float, float]]:
    """Return from where to where along a leg (mm) a mirror could throw light out."""
    trials = [
        (way, sees(enclosed, gap, leg.at(way))) for way in sorted(_trials(enclosed, gap, leg))
    ]
    found: list[tuple[float, float]] = []
    begun = leg.from_mm if trials and trials[0][1] else None
    for (one, seen), (other, then) in pairwise(trials):
        if seen == then:
            continue
        edge = _edge(enclosed, gap, leg, (one, other), seen=seen)
        if begun is None:
            begun = edge
        else:
            found.append((begun, edge))
            begun = None
    if begun is not None:
        found.append((begun, leg.to_mm))
    return found


def _edge(
    enclosed: Enclosed, gap: Gap, leg: Leg, between: tuple[float, float], *, seen: bool
) -> float:
    low, high = between
    while high - low > _EXACT_MM:
        middle = 0.5 * (low + high)
        if sees(enclosed, gap, leg.at(middle)) == seen:
            low = middle
        else:
            high = middle
    return 0.5 * (low + high)


def _trials(enclosed: Enclosed, gap: Gap, leg: Leg) -> Iterator[float]:
    """Yield the middles between critical points of a leg, the middle of the whole first.

    Critical is where the leg crosses a line through two upright edges: one of the gap or of a
    baffle, the other of anything; and one that touches a body on its way from the gap.
    """
    yield 0.5 * (leg.from_mm + leg.to_mm)
    step = (leg.to_mm - leg.from_mm) / _STEPS
    stops = [leg.from_mm + n * step for n in range(_STEPS)] + [leg.to_mm]
    for one, other in _lines(enclosed, gap, leg):
        way = _on_line(leg.start, leg.direction, one, other)
        if way is not None and leg.from_mm < way < leg.to_mm:
            stops.append(way)
    last = leg.from_mm
    for stop in sorted(stops):
        if stop - last > _SAME_MM:
            yield 0.5 * (last + stop)
            last = stop


def _lines(enclosed: Enclosed, gap: Gap, leg: Leg) -> Iterator[tuple[Pair, Pair]]:
    own = list(_edges_of(enclosed, gap))
    prisms = [one for one in enclosed.blockers if isinstance(one, Prism)]
    sides = {side.panel for side in enclosed.line.sides} | {"bench", *enclosed.enclosure.lids}
    edges = own + [point for one in prisms if one.name not in sides for point in one.outline]
    others = edges + [point for one in prisms if one.name in sides for point in one.outline]
    for number, edge in enumerate(edges):
        for other in others[number + 1 :]:
            yield edge, other
    within = [*own, *(leg.at(way)[:2] for way in (leg.from_mm, leg.to_mm))]
    low, high = ([pick(c) for c in zip(*within, strict=True)] for pick in (min, max))
    for body in enclosed.blockers:
        if isinstance(body, Hull) and all(
            a - body.reach_mm < c < b + body.reach_mm
            for a, c, b in zip(low, body.centre, high, strict=False)
        ):
            for edge in own:
                for point in _tangents(edge, body):
                    yield edge, point


def _tangents(edge: Pair, body: Hull) -> Iterator[Pair]:
    """Yield the outermost points of a body in plan, to either side as seen from an edge."""
    x, y = body.centre[0] - edge[0], body.centre[1] - edge[1]

    def aside(point: Place) -> float:
        px, py = point[0] - edge[0], point[1] - edge[1]
        return atan2(x * py - y * px, x * px + y * py)

    for point in (min(body.points, key=aside), max(body.points, key=aside)):
        yield point[:2]


def _edges_of(enclosed: Enclosed, gap: Gap) -> Iterator[Pair]:
    """Yield the upright edges of a gap in plan: of an opening, those of both its mouths."""
    for number in gap.sides:
        side = enclosed.line.sides[number]
        if gap.kind != OPENING:
            yield side.start
            yield side.end
            continue
        for window in windows(enclosed, side.panel or ""):
            if window.name == gap.through:
                for along in window.box[:2]:
                    for out in (0.0, window.depth_mm):
                        yield window.place((along, 0.0), out)[:2]


def _crossing(start: Place, direction: Place, a: Pair, b: Pair) -> float | None:
    """Return how far along a ray a segment in plan is crossed."""
    ex, ey = b[0] - a[0], b[1] - a[1]
    turn = direction[0] * ey - direction[1] * ex
    if turn == 0.0:
        return None
    x, y = a[0] - start[0], a[1] - start[1]
    share = (x * direction[1] - y * direction[0]) / turn
    return (x * ey - y * ex) / turn if 0.0 <= share <= 1.0 else None


def _on_line(start: Place, direction: Place, a: Pair, b: Pair) -> float | None:
    """Return how far along a ray it crosses the endless line through two points in plan."""
    ex, ey = b[0] - a[0], b[1] - a[1]
    turn = direction[0] * ey - direction[1] * ex
    if abs(turn) < 1e-12 * (abs(ex) + abs(ey)) or not (ex or ey):
        return None
    return ((a[0] - start[0]) * ey - (a[1] - start[1]) * ex) / turn
