"""Tables and notes that stand in the column at the right of a sheet.

A column is filled from the top. What no longer fits is never left out unsaid: the last line
says how much is missing and where it can be read.
"""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from benchlay.named import NamedTuple
from benchlay.sheets.frame import rectangle
from benchlay.sheets.lettering import LINE_PITCH, MIDDLE_MM, SMALL_MM, shorten, wrap
from benchlay.sheets.primitives import Line, Primitive, Text
from benchlay.sheets.scale import Window

PITCH_MM = LINE_PITCH * SMALL_MM + 0.2
_PAD_MM = 1.2
_HEADING_MM = MIDDLE_MM + 2.4
BETWEEN_MM = 4.0
_INDENT_MM = 5.0
_NOTE_SHARE = 0.93


class Column(NamedTuple):
    """A column of a table: its heading, and its share of the width."""

    heading: str
    width_mm: float


class Table(NamedTuple):
    """A heading, columns, and rows of as many cells."""

    heading: str
    columns: tuple[Column, ...]
    rows: tuple[tuple[str, ...], ...]
    elsewhere: str  # where the rows that do not fit can be read
    layer: str = "TABLES"
    most_lines: int = 3  # to a cell


class Drawn(NamedTuple):
    """What was drawn, and how far down it reaches."""

    primitives: tuple[Primitive, ...]
    foot: float
    missing: int = 0  # rows for which there was no room


def table(content: Table, window: Window) -> Drawn:
    """Draw a table at the top of a window, as many rows as there is room for."""
    headings = tuple(column.heading for column in content.columns)
    rows = [_cells(content, row) for row in (headings, *content.rows)]
    top = window.high - _HEADING_MM
    shown = _fitting([_depth(row) for row in rows], top - window.low)
    width = sum(column.width_mm for column in content.columns)
    out: list[Primitive] = [_heading(content.heading, window.left, window.high, width)]
    edges = [top]
    for row in rows[:shown]:
        out += _lettering(content, row, window.left, edges[-1])
        edges.append(edges[-1] - _depth(row))
    foot = edges[-1]
    if shown < len(rows):
        missing = _missing(len(rows) - shown, content.elsewhere, width)
        at = (window.left + _PAD_MM, foot - _PAD_MM - SMALL_MM)
        out.append(Text(content.layer, at, missing, SMALL_MM))
        edges.append(foot - _line_depth())
    out += _grid(content, window.left, edges, foot)
    return Drawn(tuple(out), edges[-1], len(rows) - shown)


def _fitting(depths: list[float], room: float) -> int:
    """Return how many rows fit, where a line that says what is missing must fit too."""
    if sum(depths) <= room:
        return len(depths)
    used, shown = _line_depth(), 0
    while used + depths[shown] <= room:
        used += depths[shown]
        shown += 1
    return shown


def _cells(content: Table, row: Sequence[str]) -> list[list[str]]:
    if len(row) != len(content.columns):
        msg = f"{content.heading}: a row of {len(row)} for {len(content.columns)} columns"
        raise ValueError(msg)
    return [
        wrap(cell, column.width_mm - 2 * _PAD_MM, SMALL_MM, content.most_lines)
        for cell, column in zip(row, content.columns, strict=True)
    ]


def _line_depth(lines: int = 1) -> float:
    return (lines - 1) * PITCH_MM + SMALL_MM + 2 * _PAD_MM


def _depth(row: list[list[str]]) -> float:
    return _line_depth(max(len(cell) for cell in row))


def _heading(words: str, left: float, top: float, width: float) -> Text:
    at = (left, top - MIDDLE_MM)
    return Text("TABLES", at, shorten(words, width, MIDDLE_MM), MIDDLE_MM)


def _missing(rest: int, elsewhere: str, width: float) -> str:
    return shorten(f"... and {rest} more: see {elsewhere}", width - 2 * _PAD_MM, SMALL_MM)


def _lettering(content: Table, row: list[list[str]], left: float, top: float) -> Iterator[Text]:
    x = left + _PAD_MM
    for cell, column in zip(row, content.columns, strict=True):
        for n, words in enumerate(cell):
            y = top - _PAD_MM - SMALL_MM - n * PITCH_MM
            if words:
                yield Text(content.layer, (x, y), words, SMALL_MM)
        x += column.width_mm


def _grid(content: Table, left: float, edges: list[float], foot: float) -> Iterator[Primitive]:
    """Draw the lines; those between columns end with the last whole row."""
    layer, right = content.layer, left + sum(c.width_mm for c in content.columns)
    yield rectangle(layer, Window(left, edges[-1], right, edges[0]))
    for y in edges[1:-1]:
        yield Line(layer, (left, y), (right, y))
    x = left
    for column in content.columns[:-1]:
        x += column.width_mm
        yield Line(layer, (x, foot), (x, edges[0]))


def notes(heading: str, lines: Sequence[str], window: Window, elsewhere: str) -> Drawn:
    """Write numbered notes at the top of a window, as many as there is room for."""
    # Nothing at the right holds a note in: fonts of other programs run wider still.
    room = _NOTE_SHARE * (window.width - _INDENT_MM)
    wrapped = [wrap(note, room, SMALL_MM) for note in lines]
    y = window.high - _HEADING_MM
    shown = _fitting([len(w) * PITCH_MM for w in wrapped], y - window.low)
    out: list[Primitive] = [_heading(heading, window.left, window.high, window.width)]
    for n, note in enumerate(wrapped[:shown], start=1):
        out.append(Text("NOTES", (window.left, y - SMALL_MM), f"{n}", SMALL_MM))
        for words in note:
            at = (window.left + _INDENT_MM, y - SMALL_MM)
            out.append(Text("NOTES", at, words, SMALL_MM))
            y -= PITCH_MM
    if shown < len(wrapped):
        missing = _missing(len(wrapped) - shown, elsewhere, window.width)
        out.append(Text("NOTES", (window.left, y - SMALL_MM), missing, SMALL_MM))
        y -= PITCH_MM
    return Drawn(tuple(out), y, len(wrapped) - shown)
