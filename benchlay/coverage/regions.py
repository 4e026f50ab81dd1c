"""The parts of a gap that are seen from a place: where rays from there get out."""

from __future__ import annotations

from collections.abc import Iterator

from benchlay.coverage.blockers import Place
from benchlay.coverage.enclosed import Enclosed
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


def open_parts(enclosed: Enclosed, gap: Gap, eye: Place) -> list[list[Place]]:
    """Return the parts of a gap, in space, through which rays from a place meet nothing."""
    found: list[list[Place]] = []
    for count, number in enumerate(gap.sides):
        walls = _walls_before(enclosed, number)
        short_end = count > 0 and gap.kind in (OVER, UNDER)
        for cell in () if short_end else _upright_cells(enclosed, gap, number):
            found += _in_space(cell, visible(cell, eye, enclosed.blockers, walls))
        for cell in _level_cells(enclosed, gap, number, eye):
            parts = visible(cell, eye, enclosed.blockers, walls)
            parts = _under_lids(enclosed, gap, View(cell, eye), parts)
            if short_end:  # what is open there is of the side next to it
                parts = [p for p in parts if nearest_side(enclosed, gap, middle(p)) == gap.sides[0]]
            found += _in_space(cell, parts)
    return found


def _in_space(cell: Cell, parts: list[Convex]) -> Iterator[list[Place]]:
    for part in parts:
        yield [cell.place(point) for point in part]


def _walls_before(enclosed: Enclosed, number: int) -> list[tuple[Pair, Pair]]:
    """Return the sides that a ray may leave by before it reaches another: none of a convex line."""
    if enclosed.convex:
        return []
    return [(s.start, s.end) for n, s in enumerate(enclosed.line.sides) if n != number]


def _upright_cells(enclosed: Enclosed, gap: Gap, number: int) -> Iterator[Cell]:
    side, (low, high) = enclosed.line.sides[number], gap.heights_mm
    if high - low <= 0.0:
        return
    if gap.kind != OPENING:
        yield upright(side.start, side.end, low, high)
        return
    for window in windows(enclosed, side.panel or ""):
        if window.name == gap.through:
            x, y, _ = window.place((0.0, 0.0))
            start, end = window.box[:2]
            corners = ((start, low), (end, low), (end, high), (start, high))
            cell = upright((x, y), window.place((1.0, 0.0))[:2], low, high)
            yield cell._replace(polygon=corners)


def _level_cells(enclosed: Enclosed, gap: Gap, number: int, eye: Place) -> Iterator[Cell]:
    """Yield the triangles between the eye and a side, in the top and where no bench is below."""
    side, (x, y, z) = enclosed.line.sides[number], eye
    corners = ((x, y), side.start, side.end)
    turn = (side.start[0] - x) * (side.end[1] - y) - (side.start[1] - y) * (side.end[0] - x)
    if turn < 0.0:
        corners = ((x, y), side.end, side.start)
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
    return rest if gap.kind == SHEET else parts
