"""A dimension taken apart, for formats that have no dimension of their own.

Proportions after ISO 129-1 (from memory): extension lines start 1 mm clear of the feature
and overshoot by 2 mm; arrowheads are filled, 3 mm long at about 20 degrees; the figure stands
1 mm above its line and is read from below or from the right.
"""

from __future__ import annotations

import math

from benchlay.named import NamedTuple
from benchlay.sheets.lettering import width_mm
from benchlay.sheets.primitives import (
    RUNNING_OUT_MM,
    Across,
    Dimension,
    Fill,
    Line,
    Point,
    Text,
    Up,
    direction_of,
    label_of,
    line_ends,
    outward,
)

GAP_MM = 1.0
OVERSHOOT_MM = 2.0
ARROW_MM = 3.0
ARROW_WIDE_MM = 1.0
ABOVE_MM = 1.0
RUNNING_GAP_MM = 0.5
# Shorter than two arrows and a gap: the arrows stand outside and point inwards.
_TIGHT_MM = 2 * ARROW_MM + 2.0


class Parts(NamedTuple):
    """The lines, arrowheads and figure of one dimension.

    Of a running one the last line leads to the figure.
    """

    lines: tuple[Line, ...]
    arrows: tuple[Fill, ...]
    text: Text


def take_apart(dimension: Dimension, scale: float, decimal: str) -> Parts:
    """Return the parts of a dimension, in the coordinates of its own space.

    Parameters
    ----------
    dimension : Dimension
        In a space where `scale` units are 1 mm on paper.
    scale : float
        N of the space: the model's 1:N, or 1 on paper.
    decimal : str
        The sign between units and tenths.
    """
    if dimension.running:
        return _running(dimension, scale, decimal)
    start, end = line_ends(dimension)
    ux, uy = direction_of(dimension)
    if (end[0] - start[0]) * ux + (end[1] - start[1]) * uy < 0.0:
        start, end = end, start
    length = math.dist(start, end) / scale
    tight = length < _TIGHT_MM
    reach = (2 * ARROW_MM if tight else 0.0) * scale
    layer = dimension.layer
    main = Line(layer, _move(start, (ux, uy), -reach), _move(end, (ux, uy), reach))
    inward = -1.0 if tight else 1.0
    arrows = (
        _arrow(layer, start, (inward * ux, inward * uy), scale),
        _arrow(layer, end, (-inward * ux, -inward * uy), scale),
    )
    extensions = (
        _extension(layer, dimension.first, line_ends(dimension)[0], scale),
        _extension(layer, dimension.second, line_ends(dimension)[1], scale),
    )
    lines = (main, *(line for line in extensions if line is not None))
    return Parts(lines, arrows, _figure(dimension, start, end, scale, decimal))


def _running(dimension: Dimension, scale: float, decimal: str) -> Parts:
    """Return the parts of one of several dimensions from the same point."""
    start, end = line_ends(dimension)
    out = outward(dimension)
    layer, length = dimension.layer, math.dist(start, end)
    lines = [Line(layer, start, end)]
    extension = _extension(layer, dimension.second, end, scale)
    if extension is not None:
        lines.append(extension._replace(end=end))
    at = running_figure(dimension, scale)
    lines.append(Line(layer, end, _move(at, out, -RUNNING_GAP_MM * scale)))
    arrows: tuple[Fill, ...] = ()
    if length > ARROW_MM * scale:
        back = ((start[0] - end[0]) / length, (start[1] - end[1]) / length)
        arrows = (_arrow(layer, end, back, scale),)
    angle = 90.0 if out[1] else 0.0
    across = Across.RIGHT if min(out) < 0.0 else Across.LEFT  # away from the line, on either side
    label = label_of(dimension, decimal)
    text = Text(layer, at, label, dimension.height_mm, across, Up.MIDDLE, angle)
    return Parts(tuple(lines), arrows, text)


def running_figure(dimension: Dimension, scale: float) -> Point:
    """Return where the figure of a running dimension begins."""
    end = line_ends(dimension)[1]
    ux, uy = direction_of(dimension)
    aside = _move(end, (ux, uy), dimension.figure_aside_mm * scale)
    return _move(aside, outward(dimension), RUNNING_OUT_MM * scale)


def _move(point: Point, along: Point, by: float) -> Point:
    return (point[0] + by * along[0], point[1] + by * along[1])


def _arrow(layer: str, tip: Point, along: Point, scale: float) -> Fill:
    """Return an arrowhead whose body lies along the direction from its tip."""
    back = _move(tip, along, ARROW_MM * scale)
    side = (-along[1], along[0])
    half = ARROW_WIDE_MM / 2 * scale
    return Fill(layer, (tip, _move(back, side, half), _move(back, side, -half)))


def _extension(layer: str, feature: Point, foot: Point, scale: float) -> Line | None:
    distance = math.dist(feature, foot)
    if distance <= GAP_MM * scale:
        return None
    along = ((foot[0] - feature[0]) / distance, (foot[1] - feature[1]) / distance)
    return Line(
        layer,
        _move(feature, along, GAP_MM * scale),
        _move(foot, along, OVERSHOOT_MM * scale),
    )


def _figure(dimension: Dimension, start: Point, end: Point, scale: float, decimal: str) -> Text:
    """Return the figure: above the middle of the line, or beside it where it is short."""
    ux, uy = direction_of(dimension)
    label = label_of(dimension, decimal)
    room = math.dist(start, end) / scale - 2 * ARROW_MM
    share = dimension.figure_share
    middle = (
        start[0] + share * (end[0] - start[0]),
        start[1] + share * (end[1] - start[1]),
    )
    width = width_mm(label, dimension.height_mm)
    if width > room:
        out = (2 * ARROW_MM + 1.0 + width / 2) * scale
        before = dimension.figure_share == 0.0
        middle = _move(start, (ux, uy), -out) if before else _move(end, (ux, uy), out)
    at = _move(middle, (-uy, ux), ABOVE_MM * scale)
    angle = math.degrees(math.atan2(uy, ux))
    return Text(dimension.layer, at, label, dimension.height_mm, Across.CENTRE, rotation_deg=angle)
