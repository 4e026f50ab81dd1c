"""The title block, after the fields of ISO 7200 (from memory), 180 mm wide, bottom right.

A value that is too long at 3,5 mm is written at 2,5 mm, never lower. A long title runs on in
the line of the supplementary title. What still does not fit is cut, and three points say so.
"""

from __future__ import annotations

from collections.abc import Iterator

from benchlay.named import NamedTuple
from benchlay.sheets.frame import WIDTH_MM, rectangle
from benchlay.sheets.lettering import (
    MIDDLE_MM,
    SMALL_MM,
    plain,
    shorten,
    width_mm,
    wrap,
)
from benchlay.sheets.primitives import Circle, Line, Point, Polyline, Primitive, Text
from benchlay.sheets.scale import Window, frame_of

ROW_MM = 8.8
HEIGHT_MM = 5 * ROW_MM
_INSET_MM = 1.2
_CAPTION_MM = 5.7  # base line of a cell's caption above its foot
_VALUE_MM = 1.3
DIGITS = 16  # of the layout's SHA-256 that are written out: enough to tell two layouts apart
NOTHING = "-"  # a field that the layout leaves out is seen to be empty


class TitleFields(NamedTuple):
    """What the title block says; everything comes from the layout, nothing from a clock."""

    owner: str = ""
    title: str = ""
    document_type: str = ""
    number: str = ""
    revision: str = ""
    date: str = ""
    drawn_by: str = ""
    approved_by: str = ""
    scale: str = ""
    sheet: str = "1/1"
    projection: str = "first"  # or third
    tolerance: str = "as stated at the dimension"  # where a dimension states none
    sha256: str = ""  # of the layout's bytes; its first digits are written


class _Cell(NamedTuple):
    caption: str
    value: str
    width_mm: float


def title_block(fields: TitleFields, size_mm: Point) -> Iterator[Primitive]:
    """Draw the title block of a sheet."""
    inner = frame_of(size_mm)
    left, low = inner.right - WIDTH_MM, inner.low
    yield rectangle("SHEET", Window(left, low, inner.right, low + HEIGHT_MM))
    for row, cells in enumerate(reversed(_rows(fields))):
        foot = low + row * ROW_MM
        if row:
            yield Line("TITLE", (left, foot), (inner.right, foot))
        yield from _row(cells, left, foot)
    yield from _projection(fields.projection, (inner.right - 7.2, low + 3.4 * ROW_MM))


def _rows(fields: TitleFields) -> list[list[_Cell]]:
    width = 120.0
    lines = wrap(fields.title, width - 2 * _INSET_MM, MIDDLE_MM, most=2)
    title, more = lines[0], (lines[1] if len(lines) > 1 else "")
    return [
        [
            _Cell("General tolerance", fields.tolerance, 70.0),
            _Cell("Layout, SHA-256 begins", fields.sha256[:DIGITS], 60.0),
            _Cell("Do not scale", "print at 100 %", 50.0),
        ],
        [
            _Cell("Owner", fields.owner, 90.0),
            _Cell("Document type", fields.document_type, 60.0),
            _Cell("Projection", " ", 30.0),
        ],
        [_Cell("Title", title, width), _Cell("Drawing number", fields.number, 60.0)],
        [
            _Cell("Supplementary title", more or " ", width),
            _Cell("Revision", fields.revision, 20.0),
            _Cell("Date", fields.date, 40.0),
        ],
        [
            _Cell("Drawn by", fields.drawn_by, 60.0),
            _Cell("Approved by", fields.approved_by, 60.0),
            _Cell("Scale", fields.scale, 20.0),
            _Cell("Unit", "mm", 20.0),
            _Cell("Sheet", fields.sheet, 20.0),
        ],
    ]


def _row(cells: list[_Cell], left: float, foot: float) -> Iterator[Primitive]:
    x = left
    for cell in cells:
        room = cell.width_mm - 2 * _INSET_MM
        if x > left:
            yield Line("TITLE", (x, foot), (x, foot + ROW_MM))
        at = (x + _INSET_MM, foot + _CAPTION_MM)
        yield Text("NOTES", at, shorten(cell.caption, room, SMALL_MM), SMALL_MM)
        value = cell.value or NOTHING
        # The smaller of the listed heights rather than words lost; nothing in between.
        fits = width_mm(plain(value), MIDDLE_MM) <= room
        height = MIDDLE_MM if fits else SMALL_MM
        if value.strip():
            at = (x + _INSET_MM, foot + _VALUE_MM)
            yield Text("TITLE", at, shorten(value, room, height), height)
        x += cell.width_mm


def _projection(name: str, at: Point) -> Iterator[Primitive]:
    """Draw the sign of the projection: a cut cone and its end, after ISO 5456-2.

    First angle has the circles at the right of the cone, third angle at its left.
    """
    x, y = at
    cone, rings = (x - 3.4, x + 3.4) if name == "first" else (x + 3.4, x - 3.4)
    small, large, half = 1.1, 2.2, 2.2
    corners = (
        (cone - half, y - small),
        (cone + half, y - large),
        (cone + half, y + large),
        (cone - half, y + small),
    )
    yield Polyline("TITLE", corners, closed=True)
    yield Circle("TITLE", (rings, y), small)
    yield Circle("TITLE", (rings, y), large)
    reach = large + 0.5
    yield Line("AXIS", (cone - reach, y), (cone + reach, y))
    yield Line("AXIS", (rings - reach, y), (rings + reach, y))
    yield Line("AXIS", (rings, y - reach), (rings, y + reach))
