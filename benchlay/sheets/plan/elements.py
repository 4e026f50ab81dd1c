"""The table of elements: where everything stands, from the datum, in blocks side by side."""

from __future__ import annotations

import math
from collections.abc import Iterator, Sequence

from benchlay.sheets.contents import Item, Picture
from benchlay.sheets.plan.board import BLOCK_GAP_MM, BLOCK_MM, Board
from benchlay.sheets.primitives import Primitive, figure
from benchlay.sheets.tables import Column, Table, table

# As wide as six figures and a point for places, four and a point for heights and angles.
_COLUMNS = (
    Column("Tag", 25.6),
    Column("Kind", 20.4),
    Column("X", 14.6),
    Column("Y", 14.6),
    Column("Z", 12.2),
    Column("Facing", 13.6),
)
assert math.isclose(sum(column.width_mm for column in _COLUMNS), BLOCK_MM)


def elements(picture: Picture, board: Board) -> Iterator[Primitive]:
    """Draw the table in the strip below the view, where the board has one."""
    strip = board.strip
    if strip is None:
        return
    window, blocks = strip
    rows = math.ceil(len(picture.items) / blocks)
    for block in range(blocks):
        items = picture.items[block * rows : (block + 1) * rows]
        if not items:
            return
        content = elements_table(picture, items)
        if block:
            content = content._replace(heading=" ")
        left = window.left + block * (BLOCK_MM + BLOCK_GAP_MM)
        yield from table(content, window._replace(left=left, right=left + BLOCK_MM)).primitives


def elements_table(picture: Picture, items: Sequence[Item]) -> Table:
    """Return where items stand, from the datum hole where there is one."""
    rows = tuple(_row(item, picture) for item in items)
    origin = "DATUM" if picture.holes else "NEAR LEFT CORNER"
    return Table(f"ELEMENTS, X, Y FROM {origin}", _COLUMNS, rows, "the layout", most_lines=1)


def _row(item: Item, picture: Picture) -> tuple[str, ...]:
    x, y = picture.holes.first if picture.holes else (0.0, 0.0)
    numbers = (item.at[0] - x, item.at[1] - y, item.at[2])
    lengths = (figure(value, 1, picture.decimal) for value in numbers)
    facing = figure(round(item.facing_deg, 1) % 360.0, 1, picture.decimal)
    return (item.name, item.kind, *lengths, facing)
