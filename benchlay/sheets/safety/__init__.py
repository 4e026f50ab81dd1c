"""The safety sheet: which eyewear, where from, until when, who may stand where, what was assumed.

Tables only, in two columns on A3; what does not fit goes on to a further sheet.
"""

from __future__ import annotations

from collections.abc import Callable

from benchlay.sheets.form import Form, form_for
from benchlay.sheets.primitives import Sheet
from benchlay.sheets.safety.contents import Block, SafetyContents
from benchlay.sheets.safety.flow import Piece, drawn, paged
from benchlay.sheets.safety.marks import warning_mark
from benchlay.sheets.scale import Window

__all__ = ["COLUMN_MM", "Block", "SafetyContents", "columns", "compose", "warning_mark"]

_SIZE = "A3"
COLUMN_MM = 183.0
"""Width of a column of tables."""
_MARKS_MM = 4.0  # off the window's sides and its middle: the sheet's centring marks reach in


def compose(contents: SafetyContents) -> list[Callable[[str], Sheet]]:
    """Return the sheets, each to be made once its number in the set is known."""
    pages = paged(contents.blocks, columns(form_for(contents.fields, size=_SIZE)))
    return [_page(contents, number, pieces) for number, pieces in enumerate(pages, start=1)]


def _page(contents: SafetyContents, page: int, pieces: list[Piece]) -> Callable[[str], Sheet]:
    def made(number: str) -> Sheet:
        form = form_for(contents.fields._replace(sheet=number), size=_SIZE)
        heads = ", ".join(dict.fromkeys(piece.block.table.heading for piece in pieces))
        return form.sheet(
            name_of(page),
            f"Safety sheet {page}, states {', '.join(contents.states)}: {heads}.",
            paper=drawn(pieces),
            properties=contents.properties,
            decimal=contents.decimal,
        )

    return made


def name_of(page: int) -> str:
    """Return the stem of a page's file: `safety`, `safety-2`, ..."""
    return "safety" if page == 1 else f"safety-{page}"


def columns(form: Form) -> list[Window]:
    """Return the two columns: the left one runs down beside the title block."""
    window, beside = form.window, form.beside
    low = window.low if beside is None else beside.low
    left, right = window.left + _MARKS_MM, window.right - _MARKS_MM
    return [
        Window(left, low, left + COLUMN_MM, window.high),
        Window(right - COLUMN_MM, window.low, right, window.high),
    ]
