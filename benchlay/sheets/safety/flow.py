"""Tables poured into columns, from sheet to sheet, broken between rows."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence

from benchlay.named import NamedTuple
from benchlay.sheets.primitives import Primitive
from benchlay.sheets.safety.contents import Block
from benchlay.sheets.safety.marks import warning_mark
from benchlay.sheets.scale import Window
from benchlay.sheets.tables import BETWEEN_MM, Drawn, Table, table

_DEEP_MM = 1e5  # a window in which every table fits
_AGAIN = " (continued)"
_MARK_MM = 5.0
_WHOLE_MM = 50.0  # tables up to this are not broken
_PAD_MM = 1.6


class Piece(NamedTuple):
    """A block, or some of its rows, at the top of what is left of a column."""

    block: Block
    window: Window


def paged(blocks: Iterable[Block], columns: Sequence[Window]) -> list[list[Piece]]:
    """Return what stands on each page, whose columns are filled one after the other.

    A table is broken between two rows where a column ends; its headings are then repeated.
    A row that is longer than a whole column is cut, and says so.
    """
    pages: list[list[Piece]] = [[]]
    room, left = columns[0], list(columns[1:])

    def next_column() -> None:
        nonlocal room, left
        if not left:
            pages.append([])
            left = list(columns)
        room = left.pop(0)

    for block in blocks:
        rest: Block | None = block
        while rest is not None:
            fitting = _fitting(rest, room.height)
            begun = room not in columns
            if begun and (fitting == 0 or _kept_whole(rest, fitting)):
                next_column()
                continue
            piece, rest = _split(rest, max(fitting, 1))
            pages[-1].append(Piece(piece, room))
            room = room._replace(high=room.high - _depth(piece.table) - BETWEEN_MM)
            if rest is not None:
                next_column()
    return pages


def drawn(pieces: Iterable[Piece]) -> Iterator[Primitive]:
    """Draw what stands on a page."""
    for piece in pieces:
        yield from table(piece.block.table, piece.window).primitives
        yield from _marks(piece)


def _marks(piece: Piece) -> Iterator[Primitive]:
    """Draw the warning triangles in the first column, each in the middle of its row."""
    content, room = piece.block.table, piece.window
    for n, number in enumerate(piece.block.marks):
        if number:
            above, through = (
                _depth(content._replace(rows=content.rows[:count])) for count in (n, n + 1)
            )
            at = (room.left + _PAD_MM + _MARK_MM / 2, room.high - (above + through) / 2)
            yield from warning_mark(at, _MARK_MM, number)


def _fitting(block: Block, room_mm: float) -> int:
    """Return how many rows of a table fit, its headings included."""
    rows = block.table.rows
    fitting = 0
    while fitting < len(rows):
        tried = block.table._replace(rows=rows[: fitting + 1])
        if _depth(tried) > room_mm:
            break
        fitting += 1
    return fitting


def _kept_whole(block: Block, fitting: int) -> bool:
    """Whether a table that does not fit is better begun in the next column than broken."""
    return fitting < len(block.table.rows) and _depth(block.table) <= _WHOLE_MM


def _split(block: Block, rows: int) -> tuple[Block, Block | None]:
    content, marks = block
    first = Block(content._replace(rows=content.rows[:rows]), marks[:rows])
    if rows >= len(content.rows):
        return first, None
    heading = content.heading.removesuffix(_AGAIN) + _AGAIN
    rest = content._replace(heading=heading, rows=content.rows[rows:])
    return first, Block(rest, marks[rows:])


def _depth(content: Table) -> float:
    whole: Drawn = table(content, Window(0.0, -_DEEP_MM, 1.0, 0.0))
    return -whole.foot
