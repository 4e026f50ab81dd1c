"""What has no room beside the plan: its tables in full, on further sheets."""

from __future__ import annotations

from collections.abc import Callable, Iterable

from benchlay.sheets.contents import Picture
from benchlay.sheets.form import form_for
from benchlay.sheets.primitives import Sheet
from benchlay.sheets.safety import COLUMN_MM, columns
from benchlay.sheets.safety.contents import Block
from benchlay.sheets.safety.flow import Piece, drawn, paged
from benchlay.sheets.tables import Table

_SIZE = "A3"
_MOST_LINES = 12  # to a cell: here things are said in full


def further(picture: Picture, tables: Iterable[Table]) -> list[tuple[str, Callable[[str], Sheet]]]:
    """Return name and maker of each sheet that tables need, in full."""
    blocks = [Block(_in_full(content)) for content in tables]
    if not blocks:
        return []
    pages = paged(blocks, columns(form_for(picture.fields, size=_SIZE)))
    return [_page(picture, n, pieces) for n, pieces in enumerate(pages, start=2)]


def _in_full(content: Table) -> Table:
    """Return a table as wide as a column of these sheets; its own last column gets the rest."""
    spare = COLUMN_MM - sum(column.width_mm for column in content.columns)
    *others, last = content.columns
    wide = last._replace(width_mm=last.width_mm + spare)
    return content._replace(columns=(*others, wide), most_lines=_MOST_LINES)


def _page(picture: Picture, page: int, pieces: list[Piece]) -> tuple[str, Callable[[str], Sheet]]:
    name = f"{picture.name}-{page}"

    def made(number: str) -> Sheet:
        fields = picture.fields._replace(
            sheet=number, document_type=f"{picture.fields.document_type}, tables"
        )
        heads = ", ".join(dict.fromkeys(piece.block.table.heading for piece in pieces))
        return form_for(fields, size=_SIZE).sheet(
            name,
            f"Tables of the plan, state {picture.state}: {heads}.",
            paper=drawn(pieces),
            properties=picture.properties,
            decimal=picture.decimal,
        )

    return name, made
