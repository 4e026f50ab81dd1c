"""Gaps of the enclosure, and the stretches of beams from which a mirror could reach them."""

from __future__ import annotations

import math
from collections.abc import Iterator, Sequence

import shapely

from benchlay.sheets.contents import GapMark, Picture
from benchlay.sheets.hatching import hatch
from benchlay.sheets.plan.board import Board
from benchlay.sheets.primitives import Line, Point, Polyline, Primitive

_BAR_MM = 2.0  # across each end of a gap
_WAVE_MM, _HIGH_MM = 2.4, 0.8  # of the line that stands for what is missing
_BAND_MM, _SPACING_MM = 1.8, 1.2  # of the hatching along a beam
_LEAST_MM = 0.5  # on paper: a shorter stretch bears no hatching


def gaps(picture: Picture, board: Board) -> Iterator[Primitive]:
    """Draw each gap that lies in a side as a zigzag between two bars."""
    for gap in picture.gaps:
        if gap.ends is None:
            continue
        start, end = gap.ends
        board.crowd_model_line((start, end))
        ux, uy = _unit(start, end)
        half = board.long(_BAR_MM / 2)
        for x, y in (start, end):
            yield Line("HAZARD", (x - half * uy, y + half * ux), (x + half * uy, y - half * ux))
        yield Polyline("HAZARD", tuple(_zigzag(start, end, board)))


def anchors(gap: GapMark, board: Board) -> Sequence[tuple[Point, float]]:
    """Return where a gap's tag may stand: at its middle, else along it."""
    shares = (0.5, 0.3, 0.7, 0.15, 0.85)
    places = [gap.at]
    if gap.ends is not None:
        (ax, ay), (bx, by) = gap.ends
        places += [(ax + s * (bx - ax), ay + s * (by - ay)) for s in shares]
    return tuple((board.on_paper(place), 1.6) for place in places)


def shading(picture: Picture, board: Board) -> Iterator[Line]:
    """Hatch the stretches, once where they overlap."""
    half = board.long(_BAND_MM / 2)
    lines = [
        shapely.LineString(ends)
        for ends in picture.mirror_stretches
        if math.dist(*ends) > board.long(_LEAST_MM)
    ]
    if not lines:
        return
    bands = shapely.buffer(lines, half, cap_style="flat")
    area = shapely.intersection(shapely.union_all(bands), shapely.box(*board.field_in_model()))
    # Steeper than the rims of zones, so that the two are told apart.
    yield from hatch("HAZARD", area, board.long(_SPACING_MM), 75.0)


def _zigzag(start: Point, end: Point, board: Board) -> Iterator[Point]:
    (ux, uy), length = _unit(start, end), math.dist(start, end)
    count = max(2, 2 * round(length / board.long(_WAVE_MM)))
    high = min(board.long(_HIGH_MM), length)
    yield start
    for n in range(1, count):
        along, off = n * length / count, high * (0.5 if n % 2 else -0.5)
        yield start[0] + along * ux - off * uy, start[1] + along * uy + off * ux
    yield end


def _unit(start: Point, end: Point) -> Point:
    length = math.dist(start, end)
    return (end[0] - start[0]) / length, (end[1] - start[1]) / length
