"""The table of elements: where everything stands, from the datum, in blocks side by side."""

from __future__ import annotations

import math
from collections.abc import Iterator, Sequence

from benchlay.sheets.contents import Item, Picture
from benchlay.sheets.plan.board import BLOCK_GAP_MM, BLOCK_MM, Board
from benchlay.sheets.primitives import Primitive, figure
from benchlay.sheets.tables import Column, Table, table

_COLUMNS = (
    Column("Tag", 20.0),
    Column("Kind", 21.0),
    Column("X", 16.0),
    Column("Y", 16.0),
    Column("Z", 11.0),
    Column("Facing °", 17.0),
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
    origin = "X, Y FROM DATUM" if picture.holes else "X, Y FROM NEAR LEFT CORNER"
    return Table(f"ELEMENTS, {origin}", _COLUMNS, rows, "the layout", most_lines=1)


def _row(item: Item, picture: Picture) -> tuple[str, ...]:
    x, y = picture.holes.first if picture.holes else (0.0, 0.0)
    numbers = (item.at[0] - x, item.at[1] - y, item.at[2])
    lengths = (figure(value, 1, picture.decimal) for value in numbers)
    facing = figure(item.facing_deg % 360.0, 2, picture.decimal)
    return (item.name, item.kind, *lengths, facing)
