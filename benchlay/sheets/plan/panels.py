"""Enclosure panels from above: two faces, with gaps where openings are."""

from __future__ import annotations

import math
from collections.abc import Iterator

import shapely

from benchlay.sheets.contents import LidOutline, PanelLine, Picture
from benchlay.sheets.plan.board import Board
from benchlay.sheets.primitives import Line, Point, Polyline, Primitive

_LEAST_MM = 0.8  # thinner sheets would run together on paper
_TICK_MM = 1.6
_DASH_MM, _GAP_MM = 4.0, 2.0
_WITHIN_MM = 1.6  # lids mostly end on panels: their edge is drawn this far inside, on paper


def panels(picture: Picture, board: Board) -> Iterator[Primitive]:
    """Draw every panel; one that stands open is drawn as its two ends only."""
    for panel in picture.panels:
        board.crowd_model_line((panel.start, panel.end), beam=True)
        yield from _panel(panel, board)


def lid_line(lid: LidOutline, board: Board) -> tuple[Point, ...]:
    """Return the corners of a lid's edge as it is drawn: a little inside the true one."""
    inner = shapely.buffer(
        shapely.Polygon(lid.corners), -board.long(_WITHIN_MM), join_style="mitre"
    )
    if inner.geom_type != "Polygon" or inner.is_empty:
        return lid.corners
    return tuple((float(x), float(y)) for x, y in inner.exterior.coords[:-1])


def lids(picture: Picture, board: Board) -> Iterator[Line]:
    """Draw the edges of lids in dashes, since they lie above what is seen."""
    for lid in picture.lids:
        corners = lid_line(lid, board)
        board.crowd_model_line(corners, closed=True)
        for start, end in zip(corners, (*corners[1:], corners[0]), strict=True):
            yield from _dashes(start, end, board)


def _dashes(start: Point, end: Point, board: Board) -> Iterator[Line]:
    """Draw a line in dashes that begin and end it."""
    length = math.dist(start, end)
    dash, gap = board.long(_DASH_MM), board.long(_GAP_MM)
    count = max(1, round((length + gap) / (dash + gap)))
    # Gaps give way, so that corners are closed.
    step = (length - min(dash, length)) / (count - 1) if count > 1 else 0.0
    for n in range(count):
        a, b = n * step / length, min(n * step + dash, length) / length
        yield Line("PANELS", _between(start, end, a), _between(start, end, b))


def _between(start: Point, end: Point, share: float) -> Point:
    return (
        start[0] + share * (end[0] - start[0]),
        start[1] + share * (end[1] - start[1]),
    )


def point_on(panel: PanelLine, along_mm: float, out_mm: float = 0.0) -> Point:
    """Return the point at a distance along a panel's inner face, and outwards from it.

    The inside is on the left of the line from start to end.
    """
    (ax, ay), (bx, by) = panel.start, panel.end
    length = math.hypot(bx - ax, by - ay)
    ux, uy = (bx - ax) / length, (by - ay) / length
    return (ax + along_mm * ux + out_mm * uy, ay + along_mm * uy - out_mm * ux)


def _panel(panel: PanelLine, board: Board) -> Iterator[Primitive]:
    length = math.dist(panel.start, panel.end)
    thick = max(panel.thickness_mm, board.long(_LEAST_MM))
    if panel.is_open:
        end = min(length / 4, board.long(4.0))
        runs = [(0.0, end), (length - end, length)]
    else:
        runs = _solid_runs(panel, length)
    for start, end in runs:
        corners = ((start, 0.0), (end, 0.0), (end, thick), (start, thick))
        outline = tuple(point_on(panel, along, out) for along, out in corners)
        yield Polyline("PANELS", outline, closed=True)
    tick = board.long(_TICK_MM)
    for opening in panel.openings:
        for along in (opening.start_mm, opening.end_mm):
            yield Line(
                "PANELS", point_on(panel, along, -tick), point_on(panel, along, thick + tick)
            )


def _solid_runs(panel: PanelLine, length: float) -> list[tuple[float, float]]:
    """Return the stretches of a panel between its openings."""
    runs, at = [], 0.0
    for opening in sorted(panel.openings, key=lambda o: o.start_mm):
        if opening.start_mm > at:
            runs.append((at, opening.start_mm))
        at = max(at, opening.end_mm)
    if at < length:
        runs.append((at, length))
    return runs
