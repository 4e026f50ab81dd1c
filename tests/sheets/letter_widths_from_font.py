"""Prints benchlay/sheets/letter_widths.py from the font file named on the command line.

The font is DejaVu Sans Condensed 2.37 (free licence); the table holds advance widths only.
"""

import sys
import textwrap

from fontTools.ttLib import TTFont

RANGES = ((0x20, 0x7F), (0xA0, 0x180), (0x370, 0x400), (0x2010, 0x2040), (0x2070, 0x20A0))
SINGLES = "€Ω√∞≈≠≤≥−→←↑↓⌀△▲□■○●♦×÷"

HEAD = '''"""Advance widths of DejaVu Sans Condensed, for boxes that fit without the font at hand.

Made by tests/sheets/letter_widths_from_font.py; not to be edited by hand.
"""

UNITS_PER_EM = {units}
CAP_HEIGHT = {cap}
WIDEST = {widest}  # taken for any letter that is not in the table
'''


def rows(font):
    """Runs of code points with their widths: {first code: 'w w w …'}."""
    glyphs, advances = font.getBestCmap(), font["hmtx"]
    codes = sorted({c for a, b in RANGES for c in range(a, b)} | {ord(c) for c in SINGLES})
    runs = {}
    first = previous = None
    for code in codes:
        if code not in glyphs:
            continue
        if previous is None or code != previous + 1:
            first = code
            runs[first] = []
        runs[first].append(advances[glyphs[code]][0])
        previous = code
    return runs


def main(path):
    font = TTFont(path)
    runs = rows(font)
    widest = max(max(r) for r in runs.values())
    cap = font["OS/2"].sCapHeight if font["OS/2"].version > 1 else 1493
    print(HEAD.format(units=font["head"].unitsPerEm, cap=cap or 1493, widest=widest))
    print("RUNS: dict[int, str] = {")
    for first, widths in runs.items():
        text = " ".join(map(str, widths))
        print(f"    0x{first:04X}: (")
        for line in textwrap.wrap(text, 72):
            print(f'        "{line} "')
        print("    ),")
    print("}")


if __name__ == "__main__":
    main(sys.argv[1])
