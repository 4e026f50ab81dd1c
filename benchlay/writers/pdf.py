"""PDF, true to size on paper: vectors, lettering that can be searched, layers as in the DXF.

What stands on a page is composed in `pdf_page`; pikepdf makes the file of it. Nothing is
compressed: the bytes then depend on the drawing and on no compressor's version, and a
comparison of two revisions can be read. Pages may differ in size. A viewer is told not to
shrink them when they are printed.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from decimal import Decimal
from io import BytesIO

from pikepdf import (
    Array,
    Dictionary,
    Name,
    Object,
    OutlineItem,
    Page,
    Pdf,
    Stream,
)

from benchlay.sheets.lettering import plain
from benchlay.sheets.primitives import Layer, Sheet
from benchlay.writers.backend import send
from benchlay.writers.pdf_font import add_font
from benchlay.writers.pdf_page import POINTS_PER_MM, PdfPage, known_as

_VERSION = "1.7"  # ISO 32000-1
_NOT_PRINTED = frozenset({"VIEWPORT"})


def write(sheet: Sheet) -> bytes:
    """Return a sheet as a PDF file of one page; the same sheet gives the same bytes."""
    return write_set([sheet])


def write_set(sheets: Sequence[Sheet]) -> bytes:
    """Return sheets as one PDF file, a page each, with bookmarks.

    Raises
    ------
    ValueError
        Without sheets.
    """
    if not sheets:
        msg = "a file of no pages is none"
        raise ValueError(msg)
    letters: dict[int, str] = {}
    contents = [send(sheet, PdfPage(sheet, letters)) for sheet in sheets]
    with Pdf.new() as file:
        layers = {layer.name: layer for sheet in sheets for layer in sheet.layers}
        groups = {known_as(layer): _group(file, layer) for layer in layers.values()}
        resources = file.make_indirect(
            Dictionary(
                Font=Dictionary(F=add_font(file, letters)),
                Properties=Dictionary(groups),
            )
        )
        for sheet, content in zip(sheets, contents, strict=True):
            file.pages.append(_page(file, sheet, content, resources))
        _describe(file, sheets, groups.values())
        return _saved(file)


def _group(file: Pdf, layer: Layer) -> Object:
    """Add a group of content that a viewer can switch off."""
    out = Dictionary(Type=Name.OCG, Name=layer.name)
    if layer.name in _NOT_PRINTED:
        out.Usage = Dictionary(Print=Dictionary(PrintState=Name.OFF))
    return file.make_indirect(out)


def _page(file: Pdf, sheet: Sheet, content: bytes, resources: Object) -> Page:
    box = Array([0, 0, *(Decimal(f"{side * POINTS_PER_MM:.8f}") for side in sheet.size_mm)])
    return Page(
        Dictionary(
            Type=Name.Page,
            MediaBox=box,
            TrimBox=box,
            Resources=resources,
            Contents=Stream(file, content),
        )
    )


def _describe(file: Pdf, sheets: Sequence[Sheet], groups: Iterable[Object]) -> None:
    """Say what the file is of, how it is to be shown, and where each sheet is in it.

    A sheet's bookmark has its name, which is that of its files, and its title.
    """
    first, every = sheets[0], Array(groups)
    for key, value in _info(first).items():
        file.docinfo[Name(f"/{key}")] = value
    file.Root.Lang = "en"
    file.Root.PageMode = Name.UseOutlines if len(sheets) > 1 else Name.UseNone
    file.Root.ViewerPreferences = Dictionary(PrintScaling=Name("/None"), DisplayDocTitle=True)
    file.Root.OCProperties = Dictionary(OCGs=every, D=Dictionary(BaseState=Name.ON, Order=every))
    with file.open_outline() as outline:
        outline.root.extend(
            OutlineItem(plain(f"{sheet.name}: {sheet.title}"), n, "Fit")
            for n, sheet in enumerate(sheets)
        )


def _info(first: Sheet) -> Mapping[str, str]:
    return {
        **{plain(key): plain(value) for key, value in first.properties},
        "Title": plain(first.title),
        "Subject": plain(first.description),
        "Producer": "benchlay",
    }


def _saved(file: Pdf) -> bytes:
    """Return the file; its ID is the sum of what it holds, so that it too is the drawing's."""
    out = BytesIO()
    file.save(
        out,
        force_version=_VERSION,
        deterministic_id=True,
        compress_streams=False,
    )
    return out.getvalue()
