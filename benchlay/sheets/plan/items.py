"""Elements and sources: their own outlines, true to scale, as blocks that bear their data."""

from __future__ import annotations

import math
from collections.abc import Iterator

from benchlay.sheets.contents import Item, Picture, Shape
from benchlay.sheets.plan.board import Board
from benchlay.sheets.primitives import (
    Block,
    BlockUse,
    Line,
    Point,
    Polyline,
    figure,
)

_COATED_MM = 0.9  # the mark of a coated side lies this far before the face, on paper
_AXIS_MM = 3.0  # an axis stands out this far
_ARC_STEPS = 8  # for keeping tags off curved outlines


def blocks_and_uses(picture: Picture, board: Board) -> Iterator[tuple[Block, BlockUse]]:
    """Return a block for every item, and its place; equal items share nothing."""
    for item in picture.items:
        block = Block(f"E-{item.name}", tuple(_shapes(item, board)))
        if not block.primitives:
            continue
        yield block, BlockUse("OPTICS", block.name, item.at[:2], item.facing_deg, _data(item))
        for shape in (*item.outlines, *item.bodies):
            points = [placed(item, p) for p in straightened(shape)]
            board.crowd_model_line(points, closed=True)
        for line in item.lines:
            board.crowd_model_line([placed(item, p) for p in line])


def _data(item: Item) -> tuple[tuple[str, str], ...]:
    """Return an item's data; always with a point, since programs read it."""
    numbers = [figure(v, 3, ".") for v in (*item.at, item.facing_deg)]
    keys = ("TAG", "KIND", "X", "Y", "Z", "FACING")
    return tuple(zip(keys, (item.name, item.kind, *numbers), strict=True))


def _shapes(item: Item, board: Board) -> Iterator[Line | Polyline]:
    for body in item.bodies:
        yield Polyline("BODIES", body.points, closed=True, bulges=body.bulges)
    for outline in item.outlines:
        yield Polyline("OPTICS", outline.points, closed=True, bulges=outline.bulges)
    for points in item.lines:
        yield Polyline("OPTICS", points)
    for points in item.hidden:
        yield Polyline("BODIES", points)
    middle = _middle(item)
    for start, end in item.coated:
        yield _beside(start, end, middle, board.long(_COATED_MM))
    xs = [p[0] for points in _seen(item) for p in points]
    if xs:
        reach = board.long(_AXIS_MM)
        yield Line("AXIS", (min(xs) - reach, 0.0), (max(xs) + reach, 0.0))


def _middle(item: Item) -> Point:
    points = [p for line in _seen(item) for p in line]
    if not points:
        return (-1.0, 0.0)
    xs, ys = [p[0] for p in points], [p[1] for p in points]
    return ((min(xs) + max(xs)) / 2, (min(ys) + max(ys)) / 2)


def _seen(item: Item) -> list[tuple[Point, ...]]:
    return [*(shape.points for shape in item.outlines), *item.lines]


def _beside(start: Point, end: Point, middle: Point, by: float) -> Line:
    """Return a line along a face, moved off it to the side away from the middle."""
    dx, dy = end[0] - start[0], end[1] - start[1]
    length = math.hypot(dx, dy)
    nx, ny = -dy / length, dx / length
    if nx * (start[0] - middle[0]) + ny * (start[1] - middle[1]) < 0.0:
        nx, ny = -nx, -ny
    return Line(
        "OPTICS",
        (start[0] + by * nx, start[1] + by * ny),
        (end[0] + by * nx, end[1] + by * ny),
    )


def placed(item: Item, point: Point) -> Point:
    """Return a point of an item's own frame in the plan."""
    angle = math.radians(item.facing_deg)
    cos, sin = math.cos(angle), math.sin(angle)
    return (
        item.at[0] + cos * point[0] - sin * point[1],
        item.at[1] + sin * point[0] + cos * point[1],
    )


def straightened(shape: Shape) -> list[Point]:
    """Return an outline with its arcs as chords."""
    bulges = shape.bulges or (0.0,) * len(shape.points)
    ends = (*shape.points[1:], shape.points[0])
    out: list[Point] = []
    for start, end, bulge in zip(shape.points, ends, bulges, strict=True):
        out.append(start)
        if bulge:
            out += _chords(start, end, bulge)
    return out


def _chords(start: Point, end: Point, bulge: float) -> list[Point]:
    """Return points within an arc: a turn of the chord about the arc's centre."""
    (ax, ay), (bx, by) = start, end
    offset = (1.0 - bulge * bulge) / (4.0 * bulge)
    cx = (ax + bx) / 2 - (by - ay) * offset
    cy = (ay + by) / 2 + (bx - ax) * offset
    sweep = 4.0 * math.atan(bulge)
    out = []
    for n in range(1, _ARC_STEPS):
        angle = sweep * n / _ARC_STEPS
        cos, sin = math.cos(angle), math.sin(angle)
        dx, dy = ax - cx, ay - cy
        out.append((cx + cos * dx - sin * dy, cy + sin * dx + cos * dy))
    return out
