"""The sheets' font inside a PDF file: the glyphs that are used, and which letters they are."""

from __future__ import annotations

from collections.abc import Mapping

from benchlay.sheets.font import CAP_HEIGHT, NAME, UNITS_PER_EM, font, subset
from benchlay.writers.pdf_file import PdfFile, Raw, array, dictionary, number

_TAG = "BNCHLY+"  # says that the font is not whole
_UPRIGHT_SYMBOLS = 4  # flags of a font with letters of its own numbering
_MOST_AT_ONCE = 100  # letters in one list of a character map
_THOUSAND = 1000 / UNITS_PER_EM  # PDF measures glyphs in thousandths of the em


def add_font(file: PdfFile, letters: Mapping[int, str]) -> Raw:
    """Embed the glyphs that were used, by glyph the letter each stands for; return the font."""
    known = font()
    program = subset(letters)
    stream = file.add_stream(program, {"Length1": str(len(program))})
    box = [number(_THOUSAND * v) for v in _box()]
    descriptor = file.add(
        dictionary(
            {
                "Type": "/FontDescriptor",
                "FontName": f"/{_TAG}{NAME}",
                "Flags": str(_UPRIGHT_SYMBOLS),
                "FontBBox": array(box),
                "ItalicAngle": "0",
                "Ascent": box[3],
                "Descent": box[1],
                "CapHeight": number(_THOUSAND * CAP_HEIGHT),
                "StemV": "80",
                "FontFile2": stream,
            }
        )
    )
    widths = [f"{n} [{number(_THOUSAND * known.advances[n])}]" for n in sorted({0, *letters})]
    descendant = file.add(
        dictionary(
            {
                "Type": "/Font",
                "Subtype": "/CIDFontType2",
                "BaseFont": f"/{_TAG}{NAME}",
                "CIDSystemInfo": "<</Registry (Adobe) /Ordering (Identity) /Supplement 0>>",
                "FontDescriptor": descriptor,
                "CIDToGIDMap": "/Identity",
                "W": array(widths),
            }
        )
    )
    return file.add(
        dictionary(
            {
                "Type": "/Font",
                "Subtype": "/Type0",
                "BaseFont": f"/{_TAG}{NAME}",
                "Encoding": "/Identity-H",
                "DescendantFonts": array([descendant]),
                "ToUnicode": file.add_stream(_to_unicode(letters)),
            }
        )
    )


def _box() -> tuple[int, int, int, int]:
    """Return the box round all glyphs: four numbers of the font's table head."""
    head = font().tables["head"]
    low_x, low_y, high_x, high_y = (
        int.from_bytes(head[at : at + 2], "big", signed=True) for at in (36, 38, 40, 42)
    )
    return low_x, low_y, high_x, high_y


def _to_unicode(letters: Mapping[int, str]) -> bytes:
    """Return the map from glyphs to letters, so that text can be searched and copied."""
    rows = [
        f"<{glyph:04X}> <{letter.encode('utf-16-be').hex().upper()}>"
        for glyph, letter in sorted(letters.items())
    ]
    lists = [rows[n : n + _MOST_AT_ONCE] for n in range(0, len(rows), _MOST_AT_ONCE)]
    maps = "".join("\n".join([f"{len(p)} beginbfchar", *p, "endbfchar", ""]) for p in lists)
    return (
        "/CIDInit /ProcSet findresource begin\n12 dict begin\nbegincmap\n"
        "/CIDSystemInfo <</Registry (Adobe) /Ordering (UCS) /Supplement 0>> def\n"
        "/CMapName /Adobe-Identity-UCS def\n/CMapType 2 def\n"
        "1 begincodespacerange\n<0000> <FFFF>\nendcodespacerange\n"
        f"{maps}endcmap\nCMapName currentdict /CMap defineresource pop\nend\nend\n"
    ).encode("ascii")
