"""What must be seen at arm's length: the hazard in reach, and what eyes must wear."""

from __future__ import annotations

import math
from collections.abc import Iterator

from benchlay.sheets.contents import Picture
from benchlay.sheets.lettering import MIDDLE_MM, shorten, width_mm
from benchlay.sheets.plan.board import Board
from benchlay.sheets.primitives import Fill, Point, Polyline, Primitive, Text
from benchlay.sheets.scale import Window, frame_of
from benchlay.sheets.tables import Column, Table

_SIDE_MM = 13.0  # of the triangle; plain: the sign itself is that of ISO 7010
_TOP_MM = 4.0  # below the frame
_PITCH_MM = 5.4
_BETWEEN_MM = 8.0
_SIGNS = (Column("No.", 13.0), Column("Size", 19.0), Column("Sign, and its place", 76.0))


def warning(picture: Picture, board: Board, left: float) -> Iterator[Primitive]:
    """Draw the warning right of the view's title, from `left` to the end of the field."""
    if not picture.warning:
        return
    inner = frame_of(board.choice.size_mm)
    left += _BETWEEN_MM
    top = inner.high - _TOP_MM
    text_left = left + _SIDE_MM + 2.0
    room = board.field.right - text_left
    y, widest = top - MIDDLE_MM - 1.0, 0.0
    yield from _triangle((left, top - _SIDE_MM * math.sqrt(0.75)))
    for line in picture.warning:
        words = shorten(line, room, MIDDLE_MM)
        widest = max(widest, width_mm(words, MIDDLE_MM))
        yield Text("HAZARD", (text_left, y), words, MIDDLE_MM)
        y -= _PITCH_MM
    foot = min(y + _PITCH_MM - 1.2, top - _SIDE_MM)
    board.crowd.add_box(Window(left, foot, text_left + widest, top))


def _triangle(at: Point) -> Iterator[Primitive]:
    """Draw a triangle with a thick border and the mark of exclamation."""
    x, low = at
    tall = _SIDE_MM * math.sqrt(0.75)
    middle = x + _SIDE_MM / 2
    for inset in (0.0, 0.35, 0.7):  # lines have one width a layer: three make a border
        aside = inset * math.sqrt(3.0)
        corners = (
            (x + aside, low + inset),
            (x + _SIDE_MM - aside, low + inset),
            (middle, low + tall - 2.0 * inset),
        )
        yield Polyline("HAZARD", corners, closed=True)
    yield Fill(
        "HAZARD", ((middle - 0.9, low + 7.2), (middle + 0.9, low + 7.2), (middle, low + 3.4))
    )
    square = ((middle - 0.6, low + 1.6), (middle + 0.6, low + 1.6))
    yield Fill("HAZARD", (*square, (middle + 0.6, low + 2.7), (middle - 0.6, low + 2.7)))


def signs_table(picture: Picture) -> Table:
    """Return the signs and labels that are needed, and where."""
    return Table("SIGNS AND LABELS", _SIGNS, picture.signs, "the safety sheet", most_lines=2)
