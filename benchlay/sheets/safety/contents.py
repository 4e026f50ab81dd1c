"""What a safety sheet says, as plain data: tables in the order in which they are read."""

from __future__ import annotations

from benchlay.named import NamedTuple
from benchlay.sheets.tables import Table
from benchlay.sheets.title_block import TitleFields


class Block(NamedTuple):
    """A table, and the marks of its rows: `marks` holds a sign's number, or nothing, for each."""

    table: Table
    marks: tuple[str, ...] = ()


class SafetyContents(NamedTuple):
    """All that the safety sheets of a layout say."""

    fields: TitleFields
    blocks: tuple[Block, ...]
    states: tuple[str, ...]
    properties: tuple[tuple[str, str], ...] = ()
    decimal: str = ","
