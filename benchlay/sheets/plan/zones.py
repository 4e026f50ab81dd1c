"""Hazard zones: the limit with ticks to its inside, and a hatched band along it."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

import shapely
from shapely.geometry.base import BaseGeometry

from benchlay.sheets.contents import Picture, Zone
from benchlay.sheets.hatching import hatch, region, rim, ticks
from benchlay.sheets.plan.board import Board
from benchlay.sheets.primitives import Line, Polyline, Primitive
from benchlay.sheets.scale import Window

_BAND_MM = 6.0
_SPACING_MM = 3.0
_TICK_MM, _EVERY_MM = 2.0, 10.0
_AROUND_TEXT_MM = 0.8
_NARROW_MM = 2.4  # a narrower zone bears no hatching: that would hide the beam in it
_ANGLES_DEG = {"direct": 45.0, "over": 0.0}  # all others lean the other way
_OTHER_DEG = 135.0


def seen(zone: Zone, board: Board) -> BaseGeometry:
    """Return the part of a zone that lies on the sheet."""
    return shapely.intersection(region(zone.rings), shapely.box(*board.field_in_model()))


def limits(picture: Picture, board: Board) -> Iterator[Primitive]:
    """Draw where zones end, with ticks; the sheet's own edge is no limit."""
    for zone in picture.zones:
        whole = region(zone.rings)
        field = shapely.box(*board.field_in_model())
        edge = shapely.intersection(shapely.boundary(whole), field)
        for line in shapely.get_parts(shapely.line_merge(edge)):
            points = tuple((float(x), float(y)) for x, y in line.coords)
            if len(points) > 1:
                board.crowd_model_line(points)
                yield Polyline("HAZARD", points)
        wide = _wide(whole, board)
        for tick in ticks("HAZARD", whole, board.long(_EVERY_MM), board.long(_TICK_MM), field):
            yield from _inside(tick, wide, field)


def _wide(area: BaseGeometry, board: Board) -> BaseGeometry:
    """Return the parts of an area that are wide enough on paper to be hatched."""
    half = board.long(_NARROW_MM / 2)
    core = shapely.buffer(area, -half, join_style="mitre")
    return shapely.intersection(area, shapely.buffer(core, half, join_style="mitre"))


def _inside(tick: Line, *areas: BaseGeometry) -> Iterator[Line]:
    """Return what of a tick lies in all areas: narrow zones have short ones."""
    line = shapely.LineString([tick.start, tick.end])
    for area in areas:
        line = shapely.intersection(line, area)
    if line.geom_type == "LineString" and not line.is_empty:
        (ax, ay), *_, (bx, by) = line.coords
        yield Line(tick.layer, (ax, ay), (bx, by))


def hatching(picture: Picture, board: Board, lettering: Sequence[Window]) -> Iterator[Line]:
    """Hatch the rims of zones, broken for lettering."""
    boxes = [_grown(box, board) for box in lettering]
    for zone in picture.zones:
        band = rim(_wide(seen(zone, board), board), board.long(_BAND_MM))
        free = shapely.difference(band, shapely.union_all(boxes))
        angle = _ANGLES_DEG.get(zone.kind, _OTHER_DEG)
        yield from hatch("HAZARD", free, board.long(_SPACING_MM), angle)


def _grown(box: Window, board: Board) -> BaseGeometry:
    low = (box.left - _AROUND_TEXT_MM, box.low - _AROUND_TEXT_MM)
    high = (box.right + _AROUND_TEXT_MM, box.high + _AROUND_TEXT_MM)
    return shapely.box(*board.in_model(low), *board.in_model(high))
