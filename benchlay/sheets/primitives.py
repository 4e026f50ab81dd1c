"""The sheet as plain data: what every drawing is made of, and nothing of what it shows.

Two spaces. *Model* space holds the bench true to size, 1 unit = 1 mm. *Paper* space holds
the frame, the title block and the tables, 1 unit = 1 mm on the printed sheet. A sheet says
where the model's origin comes to lie on the paper and how much smaller the model is shown.

Coordinates are those of the primitive's own space. Heights of lettering, line widths and dash
patterns are always millimetres on paper, in either space: that is how a drafter thinks of
them, and the writers enlarge them where their format wants it otherwise.

Angles are degrees, anticlockwise from +x, since both formats speak degrees.

The classes are named tuples: cheap to make by the thousand, immutable, compared by value.
"""

from __future__ import annotations

import math
from enum import StrEnum

from benchlay.named import NamedTuple

Point = tuple[float, float]

RUNNING_OUT_MM = 4.0  # figures of running dimensions begin so far beyond their line, on paper


class Across(StrEnum):
    """Which point of a line of lettering its place names, across."""

    LEFT = "left"
    CENTRE = "centre"
    RIGHT = "right"


class Up(StrEnum):
    """Which point of a line of lettering its place names, in height."""

    BASELINE = "baseline"
    MIDDLE = "middle"
    TOP = "top"


class Axis(StrEnum):
    """What a dimension measures: along x, along y, or straight from point to point."""

    HORIZONTAL = "horizontal"
    VERTICAL = "vertical"
    ALIGNED = "aligned"


class Space(StrEnum):
    """The two spaces of a sheet."""

    MODEL = "model"
    PAPER = "paper"


class Layer(NamedTuple):
    """One meaning, one look: everything on a layer takes colour, width and pattern from it."""

    name: str
    meaning: str
    colour: str = "#000000"  # always #rrggbb
    width_mm: float = 0.25  # on paper
    pattern_mm: tuple[float, ...] = ()  # dash, gap, dash, gap, … on paper; empty: continuous
    pattern_name: str = ""  # for readers that know patterns by the trade's names only


class Line(NamedTuple):
    """A straight line.

    `note` is what a pointer that rests on it is told, in the formats that can do that (SVG);
    whatever must be read on paper is lettering.
    """

    layer: str
    start: Point
    end: Point
    note: str = ""


class Arc(NamedTuple):
    """A circular arc, anticlockwise from the first angle to the second."""

    layer: str
    centre: Point
    radius: float
    from_deg: float
    to_deg: float


class Circle(NamedTuple):
    """A full circle."""

    layer: str
    centre: Point
    radius: float


class Polyline(NamedTuple):
    """A chain of straight or curved pieces.

    `bulges`, where given, has one entry a point: the tangent of a quarter of the angle of the
    arc from that point to the next, positive for anticlockwise, 0 for straight.
    """

    layer: str
    points: tuple[Point, ...]
    closed: bool = False
    bulges: tuple[float, ...] = ()


class Fill(NamedTuple):
    """A small filled triangle or convex quadrilateral, for arrowheads and end marks."""

    layer: str
    points: tuple[Point, ...]


class Text(NamedTuple):
    """One line of lettering; `height_mm` is the height of capitals on paper."""

    layer: str
    at: Point
    text: str
    height_mm: float = 2.5
    across: Across = Across.LEFT
    up: Up = Up.BASELINE
    rotation_deg: float = 0.0


class Dimension(NamedTuple):
    """The distance between two measured points, with its line through a third.

    `text` replaces the figure; without it the figure is what is measured, to `decimals`
    places, trailing zeros dropped. A running one is one of several from the same first point:
    its arrow and figure stand at the second alone, the figure beyond the line and square to it,
    on the side of the line that looks away from what is measured.
    """

    layer: str
    axis: Axis
    first: Point
    second: Point
    line_through: Point
    text: str | None = None
    decimals: int = 1
    height_mm: float = 3.5
    figure_share: float = 0.5  # where on the line the figure stands; 0: before it, if too wide
    running: bool = False
    figure_aside_mm: float = 0.0  # of a running one: moved along the line, on paper


class Block(NamedTuple):
    """A named group of primitives in its own frame (x along the front normal)."""

    name: str
    primitives: tuple[Line | Arc | Circle | Polyline | Fill, ...]


class BlockUse(NamedTuple):
    """A block put in its place, with data for programs that read the drawing."""

    layer: str
    block: str
    at: Point
    rotation_deg: float = 0.0
    attributes: tuple[tuple[str, str], ...] = ()  # TAG, KIND, …: not drawn


Shape = Line | Arc | Circle | Polyline | Fill
Primitive = Shape | Text | Dimension | BlockUse


class Sheet(NamedTuple):
    """A whole sheet, ready for any writer."""

    name: str  # the file's stem
    title: str
    description: str  # in words, for those who cannot see it
    size_mm: Point  # trimmed, width by height
    scale: float  # N of 1:N
    origin_mm: Point  # where the model's origin lies on the paper
    window_mm: tuple[Point, Point]  # the view on the paper, two corners
    layers: tuple[Layer, ...]  # in the order of inking: later ones lie above
    model: tuple[Primitive, ...]
    paper: tuple[Primitive, ...]
    blocks: tuple[Block, ...] = ()
    properties: tuple[tuple[str, str], ...] = ()  # drawing number, revision, SHA-256, …
    decimal: str = ","  # the sign between units and tenths


def to_paper(sheet: Sheet, point: Point) -> Point:
    """Return where a point of the model lies on the sheet, in mm from its lower left corner."""
    return (
        sheet.origin_mm[0] + point[0] / sheet.scale,
        sheet.origin_mm[1] + point[1] / sheet.scale,
    )


def to_model(sheet: Sheet, point: Point) -> Point:
    """Return the point of the model that lies at a place on the sheet."""
    return (
        (point[0] - sheet.origin_mm[0]) * sheet.scale,
        (point[1] - sheet.origin_mm[1]) * sheet.scale,
    )


def direction_of(dimension: Dimension) -> Point:
    """Return the unit vector along a dimension's line, pointing right or up."""
    if dimension.axis is Axis.HORIZONTAL:
        return (1.0, 0.0)
    if dimension.axis is Axis.VERTICAL:
        return (0.0, 1.0)
    dx = dimension.second[0] - dimension.first[0]
    dy = dimension.second[1] - dimension.first[1]
    length = math.hypot(dx, dy)
    if length == 0.0:
        msg = "an aligned dimension needs two distinct points"
        raise ValueError(msg)
    sign = -1.0 if (dx, dy) < (0.0, 0.0) else 1.0
    return (sign * dx / length, sign * dy / length)


def line_ends(dimension: Dimension) -> tuple[Point, Point]:
    """Return the ends of the dimension's line: the measured points moved square to it, onto it."""
    ux, uy = direction_of(dimension)
    tx, ty = dimension.line_through

    def foot(point: Point) -> Point:
        along = (point[0] - tx) * ux + (point[1] - ty) * uy
        return (tx + along * ux, ty + along * uy)

    return foot(dimension.first), foot(dimension.second)


def outward(dimension: Dimension) -> Point:
    """Return the unit vector across a running dimension's line, away from what it measures.

    Up, or to the right, where the line runs through the measured point itself.
    """
    ux, uy = direction_of(dimension)
    end = line_ends(dimension)[1]
    off = (end[0] - dimension.second[0]) * uy + (end[1] - dimension.second[1]) * ux
    return (-uy, -ux) if off < 0.0 else (uy, ux)


def measured(dimension: Dimension) -> float:
    """Return the distance that a dimension states, in the units of its space."""
    (ax, ay), (bx, by) = line_ends(dimension)
    return math.hypot(bx - ax, by - ay)


def figure(value: float, decimals: int, decimal: str) -> str:
    """Return a number as it stands on a drawing: rounded, trailing zeros dropped, no minus zero.

    Examples
    --------
    >>> figure(1500.0, 1, ","), figure(12.54, 1, ","), figure(-0.001, 1, ".")
    ('1500', '12,5', '0')
    """
    text = f"{value:.{decimals}f}"
    if "." in text:
        text = text.rstrip("0").rstrip(".")
    return ("0" if text == "-0" else text).replace(".", decimal)


def label_of(dimension: Dimension, decimal: str) -> str:
    """Return the words that stand on a dimension's line."""
    if dimension.text is not None:
        return dimension.text
    return figure(measured(dimension), dimension.decimals, decimal)
