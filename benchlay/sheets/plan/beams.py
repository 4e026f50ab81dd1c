"""Beams on the plan: working ones by wavelength, strays told apart, envelopes to scale."""

from __future__ import annotations

import itertools
import math
from collections.abc import Iterator

from benchlay.sheets.contents import Leg, Picture
from benchlay.sheets.layers import beam_layer
from benchlay.sheets.plan.board import Board
from benchlay.sheets.primitives import Circle, Fill, Line, Point, Polyline, Primitive
from benchlay.sheets.scale import Window

_ARROW_MM, _ARROW_WIDE_MM = 4.0, 2.4
_OPEN_MM, _OPEN_HALF_DEG = 3.0, 25.0
_SHORT_MM = 9.0  # shorter legs bear no arrow
_END_MM = 1.6
_STEEP = 1e-3  # a leg that goes sideways by less, for its height, is a point from above

DUMPS = frozenset({"dump"})
STOPS = frozenset({"panel", "wall", "screen", "body", "bench", "rim", "target"})
LEAVES = frozenset({"escaped", "handed-over"})


def layer_of(leg: Leg) -> str:
    """Return the layer that a leg is drawn on."""
    return "STRAY" if leg.stray else beam_layer(leg.wavelength_nm)


def beams(picture: Picture, board: Board) -> Iterator[Primitive]:
    """Draw every leg with its envelope, arrow and end."""
    field = board.field_in_model()
    for leg in picture.legs:
        start, end = leg.start[:2], leg.end[:2]
        seen = clipped(start, end, field)
        if seen is None:
            continue
        board.crowd_model_line(seen, beam=True)
        if math.dist(start, end) < _STEEP * abs(leg.end[2] - leg.start[2]):
            yield from _upright(leg, board)
            continue
        yield Line(layer_of(leg), *seen, leg.note)
        if leg.weak or leg.inside:
            continue
        yield from _envelope(leg, field)
        yield from _arrow(leg, seen, board)
        if seen[1] == end:
            yield from _ending(leg, board)
        else:
            yield from _goes_on(leg, seen, board)


def clipped(start: Point, end: Point, field: Window) -> tuple[Point, Point] | None:
    """Return the part of a segment inside a window, its ends kept where they are inside."""
    first, last = 0.0, 1.0
    for axis in (0, 1):
        step = end[axis] - start[axis]
        low, high = field[axis] - start[axis], field[axis + 2] - start[axis]
        if step == 0.0:
            if low > 0.0 or high < 0.0:
                return None
            continue
        near, far = sorted((low / step, high / step))
        first, last = max(first, near), min(last, far)
    if first >= last and start != end:
        return None

    def at(t: float) -> Point:
        return (start[0] + t * (end[0] - start[0]), start[1] + t * (end[1] - start[1]))

    return (start if first == 0.0 else at(first), end if last == 1.0 else at(last))


def _along(seen: tuple[Point, Point]) -> Point:
    (ax, ay), (bx, by) = seen
    length = math.hypot(bx - ax, by - ay)
    return ((bx - ax) / length, (by - ay) / length)


def _arrow(leg: Leg, seen: tuple[Point, Point], board: Board) -> Iterator[Primitive]:
    if math.dist(*seen) < board.long(_SHORT_MM):
        return
    ux, uy = _along(seen)
    # Strays often run back along working beams: their arrows stand elsewhere on the leg.
    share = 0.36 if leg.stray else 0.5
    (ax, ay), (bx, by) = seen
    reach = board.long(_ARROW_MM / 2)
    tip = (ax + share * (bx - ax) + reach * ux, ay + share * (by - ay) + reach * uy)
    if leg.stray:
        yield from _open_arrow(layer_of(leg), tip, (ux, uy), board)
    else:
        length, half = board.long(_ARROW_MM), board.long(_ARROW_WIDE_MM / 2)
        back = (tip[0] - length * ux, tip[1] - length * uy)
        left = (back[0] - half * uy, back[1] + half * ux)
        right = (back[0] + half * uy, back[1] - half * ux)
        yield Fill(layer_of(leg), (tip, left, right))


def _open_arrow(layer: str, tip: Point, along: Point, board: Board) -> Iterator[Line]:
    length = board.long(_OPEN_MM)
    heading = math.atan2(-along[1], -along[0])
    for half in (_OPEN_HALF_DEG, -_OPEN_HALF_DEG):
        angle = heading + math.radians(half)
        end = (tip[0] + length * math.cos(angle), tip[1] + length * math.sin(angle))
        yield Line(layer, tip, end)


def _ending(leg: Leg, board: Board) -> Iterator[Primitive]:
    """Draw how a stray ends: filled square, bar or open ring."""
    if not leg.stray:
        return
    yield from end_mark(layer_of(leg), leg.ends, leg.start[:2], leg.end[:2], board.scale)


def end_mark(layer: str, ends: str, start: Point, end: Point, scale: float) -> Iterator[Primitive]:
    """Draw the mark of how a stray ends, `scale` times its size on paper."""
    ux, uy = _along((start, end))
    half = _END_MM / 2 * scale
    (x, y) = end
    if ends in DUMPS:
        corners = ((-1, -1), (1, -1), (1, 1), (-1, 1))
        turned = [(a * ux - b * uy, a * uy + b * ux) for a, b in corners]
        yield Fill(layer, tuple((x + half * a, y + half * b) for a, b in turned))
    elif ends in STOPS:
        reach = 1.6 * half
        yield Line(layer, (x - reach * uy, y + reach * ux), (x + reach * uy, y - reach * ux))
    elif ends in LEAVES:
        yield Circle(layer, (x + half * ux, y + half * uy), half)


def _goes_on(leg: Leg, seen: tuple[Point, Point], board: Board) -> Iterator[Primitive]:
    """Mark a beam that leaves the sheet: a zigzag across it, then an arrow."""
    ux, uy = _along(seen)
    x, y = seen[1]
    mm = board.long(1.0)

    def at(along: float, left: float) -> Point:
        a, b = along * mm, left * mm
        return (x + a * ux - b * uy, y + a * uy + b * ux)

    layer = "TAGS"
    yield Polyline(layer, (at(-8, 2.4), at(-7.2, 0.6), at(-8.8, -0.6), at(-8, -2.4)))
    if leg.stray:
        yield from _open_arrow(layer_of(leg), at(-0.5, 0.0), (ux, uy), board)
    else:
        yield Fill(layer_of(leg), (at(-0.5, 0), at(-4.5, 1.2), at(-4.5, -1.2)))


def _upright(leg: Leg, board: Board) -> Iterator[Primitive]:
    """Draw a leg seen end on: a ring with a dot where it rises, with a cross where it falls."""
    at, radius = leg.start[:2], board.long(1.4)
    yield Circle("LEVELS", at, radius)
    if leg.end[2] > leg.start[2]:
        yield Circle("LEVELS", at, radius / 5)
        return
    reach = radius / math.sqrt(2.0)
    for side in (1.0, -1.0):
        low = (at[0] - reach, at[1] - side * reach)
        yield Line("LEVELS", low, (at[0] + reach, at[1] + side * reach))


def _envelope(leg: Leg, field: Window) -> Iterator[Primitive]:
    """Draw the 1/e2 radius on either side of a leg, as far as it is on the sheet."""
    length = math.dist(leg.start[:2], leg.end[:2])
    space = math.dist(leg.start, leg.end)
    if len(leg.radii_mm) < 2 or length == 0.0:  # noqa: PLR2004 (start and end)
        return
    ux, uy = _along((leg.start[:2], leg.end[:2]))
    flat = length / space  # a climbing leg is shorter from above
    for side in (1.0, -1.0):
        points = [
            (
                leg.start[0] + s * flat * ux - side * w * uy,
                leg.start[1] + s * flat * uy + side * w * ux,
            )
            for s, w in leg.radii_mm
        ]
        yield from _clipped_chain(points, field)


def _clipped_chain(points: list[Point], field: Window) -> Iterator[Polyline]:
    run: list[Point] = []
    for start, end in itertools.pairwise(points):
        seen = clipped(start, end, field)
        if seen is None or (run and run[-1] != seen[0]):
            if len(run) > 1:
                yield Polyline("ENVELOPE", tuple(run))
            run = []
        if seen is not None:
            run = [*run, seen[1]] if run else list(seen)
    if len(run) > 1:
        yield Polyline("ENVELOPE", tuple(run))
