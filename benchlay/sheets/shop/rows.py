"""Tables for the workshop as values, to be written as CSV or drawn on a sheet."""

from __future__ import annotations

from typing import TypeAlias

from benchlay.named import NamedTuple
from benchlay.sheets.primitives import figure

Cell: TypeAlias = str | int | float | None
_DECIMALS = 2
MARKS_MM = 4.0  # off the sides of a window: the sheet's centring marks reach in


class Heading(NamedTuple):
    """A column: its name and unit, and how wide it is on a sheet."""

    name: str
    width_mm: float
    unit: str = ""


class Rows(NamedTuple):
    """A table."""

    name: str  # of its file
    title: str
    headings: tuple[Heading, ...]
    rows: tuple[tuple[Cell, ...], ...]
    notes: tuple[str, ...] = ()  # how its figures came about


def shown(cell: Cell, decimal: str) -> str:
    """Return a cell as it stands on a sheet: to a hundredth."""
    if cell is None:
        return "-"
    return figure(cell, _DECIMALS, decimal) if isinstance(cell, float) else str(cell)
