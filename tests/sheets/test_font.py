"""The font that comes with benchlay, and the parts of it that files embed."""

from io import BytesIO
from pathlib import Path

from fontTools.ttLib import TTFont
from PIL import ImageFont

from benchlay.sheets import font

FONT_FILE = Path(font.__file__).parent / "fonts" / font.FILE


def test_letters_are_as_wide_as_another_reader_has_them():
    known = font.font()
    free_type = ImageFont.truetype(
        str(FONT_FILE), font.UNITS_PER_EM, layout_engine=ImageFont.Layout.BASIC
    )
    assert len(known.glyphs) > 1500
    for letter in (*known.glyphs, "世"):  # and one that it lacks
        assert known.advance(letter) == free_type.getlength(letter), letter
    _, top, _, bottom = free_type.getbbox("H", anchor="ls")
    assert (-top, bottom) == (font.CAP_HEIGHT, 0)


def test_the_licence_lies_beside_the_font():
    words = (FONT_FILE.parent / "LICENSE.txt").read_text(encoding="utf-8")
    name = TTFont(FONT_FILE)["name"]
    assert str(name.getDebugName(13)) in words
    assert str(name.getDebugName(0)) in words


def test_put_together_letters_bring_their_parts():
    whole = TTFont(FONT_FILE)
    order = whole.getGlyphOrder()
    composite = next(n for n, g in enumerate(order) if whole["glyf"][g].isComposite())
    part = TTFont(BytesIO(font.subset([composite])), checkChecksums=2)
    names = part.getGlyphOrder()
    parts = part["glyf"][names[composite]].components
    assert len(parts) > 1
    for component in parts:
        assert part["glyf"][component.glyphName].numberOfContours != 0
    drawn = part["glyf"][names[composite]].getCoordinates(part["glyf"])[0]
    assert drawn == whole["glyf"][order[composite]].getCoordinates(whole["glyf"])[0]


def test_a_part_bears_the_hour_of_the_whole():
    part, whole = TTFont(BytesIO(font.subset([40]))), TTFont(FONT_FILE)
    assert part["head"].modified == whole["head"].modified
