"""The parts of a gap that are seen from a place: where rays from there get out."""

from __future__ import annotations

from collections.abc import Iterator
from itertools import pairwise

from benchlay.coverage.blockers import Place
from benchlay.coverage.enclosed import Enclosed, OpenLid, from_line
from benchlay.coverage.gaps import (
    EDGE,
    OPENING,
    OVER,
    SHEET,
    SIDE,
    UNDER,
    Gap,
    nearest_side,
    windows,
)
from benchlay.coverage.planar import Convex, Pair, common, less, middle, wide
from benchlay.coverage.sight import Cell, View, level, upright, visible

_SLIVER = 1e-9  # of a side


def open_parts(enclosed: Enclosed, gap: Gap, eye: Place) -> list[list[Place]]:
    """Return the parts of a gap, in space, through which rays from a place meet nothing.

    A part counts where the ray leaves the line for the first time, so that no direction counts
    twice.
    """
    return list(parts_seen(enclosed, gap, eye))


def parts_seen(enclosed: Enclosed, gap: Gap, eye: Place) -> Iterator[list[Place]]:
    """Yield the same one by one, for those whom the first one answers."""
    for count, number in enumerate(gap.sides):
        short_end = count > 0 and gap.kind in (OVER, UNDER)
        for span in _first_met(enclosed, number, eye[:2]):
            for cell in () if short_end else _upright_cells(enclosed, gap, number, span):
                yield from _in_space(cell, visible(cell, eye, enclosed.blockers))
            for cell in _level_cells(enclosed, gap, span, eye):
                parts = visible(cell, eye, enclosed.blockers)
                parts = _under_lids(enclosed, gap, View(cell, eye), parts)
                if short_end:  # what is open there is of the side next to it
                    own = gap.sides[0]
                    parts = [p for p in parts if nearest_side(enclosed, gap, middle(p)) == own]
                yield from _in_space(cell, parts)


def _in_space(cell: Cell, parts: list[Convex]) -> Iterator[list[Place]]:
    for part in parts:
        yield [cell.place(point) for point in part]


def _first_met(enclosed: Enclosed, number: int, eye: Pair) -> list[tuple[Pair, Pair]]:
    """Return the parts of a side that no other side hides: all of it where the line is convex."""
    side = enclosed.line.sides[number]
    if enclosed.convex:
        return [(side.start, side.end)]
    (ax, ay), (bx, by) = side.start, side.end
    left = [(0.0, 1.0)]
    for other, wall in enumerate(enclosed.line.sides):
        if other == number:
            continue
        hidden = _hidden((side.start, side.end), (wall.start, wall.end), eye)
        if hidden is not None:
            low, high = hidden
            left = [
                part
                for start, end in left
                for part in ((start, min(end, low)), (max(start, high), end))
                if part[1] - part[0] > _SLIVER
            ]
    return [
        ((ax + s * (bx - ax), ay + s * (by - ay)), (ax + t * (bx - ax), ay + t * (by - ay)))
        for s, t in left
    ]


def _hidden(side: tuple[Pair, Pair], wall: tuple[Pair, Pair], eye: Pair) -> Pair | None:
    """Return from where to where (shares of it) a side is hidden by a wall in plan."""
    cell = upright(*side, 0.0, 1.0)
    view = View(cell, (*eye, 0.5))
    if view.depth == 0.0:
        return None
    within = view.in_wedge(wall)
    if not within:
        return None
    x, y = (0.5 * (min(c) + max(c)) for c in zip(*within, strict=True))
    depth = (x - eye[0]) * view.normal[0] + (y - eye[1]) * view.normal[1]
    if depth > view.depth * (1.0 - _SLIVER):
        return None
    length = cell.polygon[1][0]
    shares = [u / length for u, _ in view.thrown((px, py, 0.5) for px, py in within)]
    return min(shares), max(shares)


def _upright_cells(
    enclosed: Enclosed, gap: Gap, number: int, span: tuple[Pair, Pair]
) -> Iterator[Cell]:
    (low, high), (start, end) = gap.heights_mm, span
    if high - low <= 0.0:
        return
    if gap.kind != OPENING:
        yield upright(start, end, low, high)
        return
    for window in windows(enclosed, enclosed.line.sides[number].panel or ""):
        if window.name == gap.through:
            (x, y), (c, s) = window.origin, window.along
            own = sorted((px - x) * c + (py - y) * s for px, py in span)
            first, last = max(window.box[0], own[0]), min(window.box[1], own[1])
            if last > first:
                near, far = (window.place((along, 0.0))[:2] for along in (first, last))
                yield upright(near, far, low, high)


def _level_cells(
    enclosed: Enclosed, gap: Gap, span: tuple[Pair, Pair], eye: Place
) -> Iterator[Cell]:
    """Yield the triangles between the eye and a side, in the top and where no bench is below."""
    (x, y, z), (start, end) = eye, span
    corners = ((x, y), start, end)
    if (start[0] - x) * (end[1] - y) - (start[1] - y) * (end[0] - x) < 0.0:
        corners = ((x, y), end, start)
    if gap.kind in (OVER, SIDE, SHEET, EDGE) and (enclosed.roofless or gap.kind == SHEET):
        panel_off = gap.kind == SHEET and gap.sheets[0] in enclosed.enclosure.panels
        if z < enclosed.top_mm and not panel_off:
            yield level(corners, enclosed.top_mm)
    below = gap.kind in (SIDE, UNDER, EDGE) and enclosed.floorless
    if below and z > enclosed.bottom_mm:
        yield level(corners, enclosed.bottom_mm)


def _under_lids(enclosed: Enclosed, gap: Gap, view: View, parts: list[Convex]) -> list[Convex]:
    """Keep what lies under the gap's own lid; for other gaps, what lies under no open lid."""
    if view.normal[2] <= 0.0:
        return parts
    rest: list[Convex] = []
    for lid in enclosed.lids_off:
        for piece in lid.pieces:
            light = view.light([(x, y, lid.height_mm) for x, y in piece])
            if not light:
                continue
            if gap.kind == SHEET and gap.sheets == (lid.name,):
                rest += wide(common(part, light) for part in parts)
            parts = less(parts, light)
    if gap.kind != SHEET:
        return parts
    if not enclosed.roofless:  # past a lid's edge and over an open one: of the one it is nearest to
        rest += [part for part in parts if _nearest_lid(enclosed, middle(part)) == gap.sheets[0]]
    return rest


def _nearest_lid(enclosed: Enclosed, point: Pair) -> str:
    def away(lid: OpenLid) -> float:
        rims = [(p, q) for piece in lid.pieces for p, q in pairwise((*piece, piece[0]))]
        return min(from_line(point, *rim) for rim in rims)

    return min(enclosed.lids_off, key=away).name
