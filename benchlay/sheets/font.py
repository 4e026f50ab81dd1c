"""The font that sheets are lettered in: how wide its letters are, and parts of it to embed.

DejaVu Sans Condensed 2.37, of free licence (``fonts/LICENSE.txt``), without the scripts that a
title block does not need; made by ``tests/sheets/font_from_debian.py``. fontTools reads it, and
is loaded when the first letter is measured.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from functools import cache
from io import BytesIO
from pathlib import Path

from benchlay.named import NamedTuple

NAME = "DejaVuSansCondensed"
FILE = f"{NAME}.ttf"
UNITS_PER_EM = 2048
CAP_HEIGHT = 1493  # of H; the file itself does not say it

_PATH = Path(__file__).parent / "fonts" / FILE
_EMBEDDED = frozenset({"head", "hhea", "maxp", "hmtx", "loca", "glyf"})  # what PDF asks for


class Font(NamedTuple):
    """What is known of the font."""

    glyphs: Mapping[str, int]  # by letter
    advances: tuple[int, ...]  # by glyph, in units of the em
    box: tuple[int, int, int, int]  # round all glyphs: low x and y, high x and y

    def advance(self, text: str) -> int:
        """Return how wide a line is; a letter that the font lacks takes the missing one's box."""
        return sum(self.advances[self.glyphs.get(letter, 0)] for letter in text)


@cache
def font() -> Font:
    """Return the font, read once."""
    from fontTools.ttLib import TTFont

    with TTFont(_PATH, lazy=True) as file:
        place, head = file.getReverseGlyphMap(), file["head"]
        return Font(
            {chr(code): place[glyph] for code, glyph in file.getBestCmap().items()},
            tuple(file["hmtx"][glyph][0] for glyph in file.getGlyphOrder()),
            (head.xMin, head.yMin, head.xMax, head.yMax),
        )


def subset(glyphs: Iterable[int]) -> bytes:
    """Return the font as a file in which the glyphs that are not needed are empty.

    Numbers of glyphs stay what they are. The glyph of missing letters is always there, and so
    are those that others are put together from.
    """
    from fontTools.subset import Options, Subsetter
    from fontTools.ttLib import TTFont

    # As it was drawn: neither the hour nor the letters used go into the font's head.
    with TTFont(_PATH, recalcBBoxes=False, recalcTimestamp=False) as file:
        cutter = Subsetter(Options(retain_gids=True, notdef_outline=True))
        cutter.populate(gids=sorted(glyphs))
        cutter.subset(file)
        for table in set(file.keys()) - _EMBEDDED - {"GlyphOrder"}:
            del file[table]
        out = BytesIO()
        file.save(out)
    return out.getvalue()
