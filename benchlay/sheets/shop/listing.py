"""Tables on sheets of their own, as many as they take; their rows are never cut."""

from __future__ import annotations

from typing import TypeAlias

from benchlay.layout.layout import Layout
from benchlay.sheets.drafting.picture import title_fields
from benchlay.sheets.form import Form, form_for
from benchlay.sheets.primitives import Sheet
from benchlay.sheets.scale import Window
from benchlay.sheets.shop.rows import MARKS_MM, Rows, shown
from benchlay.sheets.tables import BETWEEN_MM, Column, Table, notes, table
from benchlay.sheets.title_block import TitleFields

Page: TypeAlias = tuple[tuple[str, ...], ...]
_SIZE = "A3"
_MOST_LINES = 6


def pages(rows: Rows, layout: Layout) -> list[Page]:
    """Return the rows as words, in as many parts as there are sheets."""
    decimal = "." if layout.drawing.decimal == "point" else ","
    form = _form(title_fields(layout, rows.title))
    left = [tuple(shown(cell, decimal) for cell in row) for row in rows.rows]
    out: list[Page] = []
    while left:
        count = _fitting(rows, left, form)
        out.append(tuple(left[:count]))
        left = left[count:]
    return out or [()]


def _fitting(rows: Rows, left: list[tuple[str, ...]], form: Form) -> int:
    low, high = 1, len(left)
    while low < high:
        middle = (low + high + 1) // 2
        drawn = table(_table(rows, tuple(left[:middle])), _room(form)._replace(low=-1e6))
        low, high = (middle, high) if drawn.foot >= _room(form).low else (low, middle - 1)
    return low


def listing(rows: Rows, part: Page, name: str, layout: Layout, fields: TitleFields) -> Sheet:
    """Return one sheet of a table.

    Parameters
    ----------
    rows : Rows
        The whole table.
    part : tuple of rows
        What stands on this sheet, of `pages`.
    name : str
        The sheet's.
    layout : Layout
    fields : TitleFields
        Of its title block, its number in them.
    """
    form = _form(fields._replace(scale="-"))
    drawn = table(_table(rows, part), _room(form))
    paper = [*drawn.primitives]
    if form.beside is not None:
        left, high = form.beside.left + MARKS_MM, form.beside.high - BETWEEN_MM
        room = form.beside._replace(left=left, high=high)
        paper += notes("NOTES", rows.notes, room, f"{rows.name}.csv").primitives
    return form.sheet(
        name,
        f"{rows.title} of the bench",
        paper=paper,
        properties=(("drawing number", layout.drawing.number), ("layout sha256", fields.sha256)),
        decimal="." if layout.drawing.decimal == "point" else ",",
    )


def _form(fields: TitleFields) -> Form:
    return form_for(fields, size=_SIZE)


def _room(form: Form) -> Window:
    return form.window._replace(left=form.window.left + MARKS_MM)


def _table(rows: Rows, part: Page) -> Table:
    columns = tuple(
        Column(f"{h.name}, {h.unit}" if h.unit else h.name, h.width_mm) for h in rows.headings
    )
    return Table(rows.title.upper(), columns, part, f"{rows.name}.csv", most_lines=_MOST_LINES)
