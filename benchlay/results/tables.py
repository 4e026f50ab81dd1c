"""The tables of a review as CSV: RFC 4180, UTF-8, decimal points, units in the heading.

What a spreadsheet would take for a formula is put behind an apostrophe, which spreadsheets
hide: names and titles come from whoever wrote the layout.
"""

from __future__ import annotations

import csv
import io
from collections.abc import Callable, Mapping

from benchlay.placing.placed import Placed
from benchlay.report.numbers import rounded
from benchlay.sheets.shop.drilling import drilling_rows
from benchlay.sheets.shop.parts_list import parts_list
from benchlay.sheets.shop.rows import Cell, Rows
from benchlay.sheets.shop.setting_out import setting_out

TABLES: Mapping[str, Callable[[Placed], Rows]] = {
    "parts": lambda placed: parts_list(placed.base),
    "setting-out": setting_out,
    "drilling": lambda placed: drilling_rows(placed.base),
}
"""All tables there are, by the name of their file."""

_FORMULA = ("=", "+", "-", "@", "\t", "\r", "\n")
_DECIMALS = 9  # of a millimetre or a degree: what is beyond is rounding


def tables(placed: Placed) -> dict[str, bytes]:
    """Return every table as a file, by its name."""
    return {f"{name}.csv": csv_bytes(make(placed)) for name, make in TABLES.items()}


def csv_bytes(rows: Rows) -> bytes:
    """Return a table as CSV."""
    stream = io.StringIO(newline="")
    writer = csv.writer(stream, lineterminator="\r\n")
    writer.writerow(f"{h.name} ({h.unit})" if h.unit else h.name for h in rows.headings)
    for row in rows.rows:
        writer.writerow([_text(cell) for cell in row])
    return stream.getvalue().encode("utf-8")


def _text(cell: Cell) -> str:
    """Return a cell's text, harmless to spreadsheets.

    >>> _text(-0.4), _text("=1+1"), _text(None)
    ('-0.4', "'=1+1", '')
    """
    if cell is None:
        return ""
    if isinstance(cell, float):
        value = rounded(cell, _DECIMALS)
        return "" if value is None else f"{value!r}".removesuffix(".0")
    text = str(cell)
    return f"'{text}" if text.startswith(_FORMULA) and isinstance(cell, str) else text
