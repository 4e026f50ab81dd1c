"""The sheets' font inside a PDF file: the glyphs that are used, and which letters they are."""

from __future__ import annotations

from collections.abc import Mapping

from pikepdf import Array, Dictionary, Name, Object, Pdf, Stream

from benchlay.sheets.font import CAP_HEIGHT, NAME, UNITS_PER_EM, font, subset

_NAME = Name(f"/BNCHLY+{NAME}")  # six letters before the name say that the font is not whole
_UPRIGHT_SYMBOLS = 4  # flags of a font with letters of its own numbering
_MOST_AT_ONCE = 100  # letters in one list of a character map


def add_font(file: Pdf, letters: Mapping[int, str]) -> Object:
    """Embed the glyphs that were used, by glyph the letter each stands for; return the font."""
    known = font()
    descendant = Dictionary(
        Type=Name.Font,
        Subtype=Name.CIDFontType2,
        BaseFont=_NAME,
        CIDSystemInfo=Dictionary(Registry="Adobe", Ordering="Identity", Supplement=0),
        FontDescriptor=file.make_indirect(_descriptor(file, letters)),
        CIDToGIDMap=Name.Identity,
        W=Array(
            part for n in sorted({0, *letters}) for part in (n, [_thousandths(known.advances[n])])
        ),
    )
    return file.make_indirect(
        Dictionary(
            Type=Name.Font,
            Subtype=Name.Type0,
            BaseFont=_NAME,
            Encoding=Name("/Identity-H"),
            DescendantFonts=[file.make_indirect(descendant)],
            ToUnicode=Stream(file, _to_unicode(letters)),
        )
    )


def _descriptor(file: Pdf, letters: Mapping[int, str]) -> Dictionary:
    program = subset(letters)
    box = [_thousandths(side) for side in font().box]
    return Dictionary(
        Type=Name.FontDescriptor,
        FontName=_NAME,
        Flags=_UPRIGHT_SYMBOLS,
        FontBBox=box,
        ItalicAngle=0,
        Ascent=box[3],
        Descent=box[1],
        CapHeight=_thousandths(CAP_HEIGHT),
        StemV=80,
        FontFile2=Stream(file, program, Length1=len(program)),
    )


def _thousandths(units: int) -> float:
    """Return a length of the font as PDF measures glyphs, in thousandths of the em."""
    return round(1000 * units / UNITS_PER_EM, 4)


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
