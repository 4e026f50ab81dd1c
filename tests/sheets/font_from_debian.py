"""Writes the font that benchlay ships, and its licence, from DejaVu's own file.

    python tests/sheets/font_from_debian.py \
        /usr/share/fonts/truetype/dejavu/DejaVuSansCondensed.ttf benchlay/sheets/fonts

The file comes from Debian's package fonts-dejavu-core, version 2.37. What is left out: letters
of scripts that a title block does not need, hints for screens, kerning and ligatures.
"""

import sys
from pathlib import Path

from fontTools.subset import Options, Subsetter
from fontTools.ttLib import TTFont

RANGES = (
    (0x20, 0x7F), (0xA0, 0x250),  # Latin
    (0x2C6, 0x2DE), (0x370, 0x400), (0x400, 0x460), (0x1E00, 0x1F00),  # Greek, Cyrillic
    (0x2010, 0x2045), (0x2070, 0x209D), (0x20A0, 0x20BE), (0x2100, 0x2150),
    (0x2150, 0x2190), (0x2190, 0x21AA), (0x2200, 0x2270), (0x2300, 0x2312),
    (0x25A0, 0x2600), (0x26A0, 0x26A2), (0x2713, 0x2718), (0xFFFD, 0xFFFE),
)  # fmt: skip


def main(source, folder):
    options = Options()
    options.layout_features = []
    options.hinting = False
    options.glyph_names = False
    options.notdef_outline = True
    options.recalc_timestamp = False
    options.name_IDs = [0, 1, 2, 3, 4, 5, 6, 13, 14]
    options.drop_tables += ["GPOS", "GSUB", "GDEF", "kern", "MATH", "FFTM", "gasp"]
    font = TTFont(source, recalcTimestamp=False)
    licence = f"{font['name'].getDebugName(0)}\n\n{font['name'].getDebugName(13)}\n"
    subsetter = Subsetter(options)
    subsetter.populate(unicodes={c for low, high in RANGES for c in range(low, high)})
    subsetter.subset(font)
    font.save(Path(folder, Path(source).name))
    Path(folder, "LICENSE.txt").write_text(licence, encoding="utf-8")


if __name__ == "__main__":
    main(*sys.argv[1:])
