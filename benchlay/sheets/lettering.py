"""How wide lettering is, and which characters may stand on a sheet at all."""

from __future__ import annotations

import unicodedata

from benchlay.sheets.font import CAP_HEIGHT, UNITS_PER_EM, font

# ISO 3098-1: heights in steps of root 2; 2,5 for tables, tags and notes, 3,5 for headings,
# 5 for titles. Nothing on our sheets is lower than the first.
SMALL_MM = 2.5
MIDDLE_MM = 3.5
LARGE_MM = 5.0

FONT_FAMILY = "DejaVu Sans Condensed, DejaVu Sans, sans-serif"

# Another font may be wider; a reader that lacks ours must still keep inside the boxes.
SLACK = 1.1
LINE_PITCH = 1.6  # of the height of capitals; ISO 3098 asks for at least 1.4

_REPLACEMENT = "\N{REPLACEMENT CHARACTER}"
# Cc control, Cf format (turns of direction hide what is written), Cs lone surrogates,
# Co private use, Cn unassigned, Zl and Zp separators of lines.
_BLANKS = frozenset("\t\n\v\f\r\x85\u2028\u2029")
_UNFIT = frozenset({"Cc", "Cf", "Cs", "Co", "Cn"})


def plain(text: str) -> str:
    r"""Text that every format can carry: one line, no control or hidden characters.

    Line ends and tabs become blanks; everything else that does not print becomes the
    replacement character, so that it is seen to be there.

    Examples
    --------
    >>> plain("two\nlines"), plain("bell\x07")
    ('two lines', 'bell\ufffd')
    """
    return "".join(_fit(letter) for letter in text)


def _fit(letter: str) -> str:
    if letter in _BLANKS:
        return " "
    if letter.isascii():
        return letter if letter.isprintable() else _REPLACEMENT
    return _REPLACEMENT if unicodedata.category(letter) in _UNFIT else letter


def font_size_mm(height_mm: float) -> float:
    """Size of the em for a height of capitals, as formats that speak of fonts want it.

    Examples
    --------
    >>> round(font_size_mm(2.5), 3)
    3.429
    """
    return height_mm * UNITS_PER_EM / CAP_HEIGHT


def width_mm(text: str, height_mm: float) -> float:
    """Width to reserve for a line of lettering, with slack for other fonts.

    Parameters
    ----------
    text : str
        One line, as it will be drawn.
    height_mm : float
        Height of capitals on paper, mm.

    Returns
    -------
    float
        mm on paper. Letters that the font lacks count as twice as wide as they are high.
    """
    known = font()
    lacking = sum(letter not in known.glyphs for letter in text)
    units = known.advance("".join(letter for letter in text if letter in known.glyphs))
    return SLACK * (units * height_mm / CAP_HEIGHT + 2.0 * lacking * height_mm)


def shorten(text: str, room_mm: float, height_mm: float) -> str:
    """Text cut to the room there is, with an ellipsis where something is missing."""
    text = plain(text)
    if width_mm(text, height_mm) <= room_mm:
        return text
    low, high = 0, len(text)
    while low < high:
        middle = (low + high + 1) // 2
        fits = width_mm(text[:middle].rstrip() + "...", height_mm) <= room_mm
        low, high = (middle, high) if fits else (low, middle - 1)
    return text[:low].rstrip() + "..."


def wrap(text: str, room_mm: float, height_mm: float, most: int = 99) -> list[str]:
    """Lines of a text that each keep to the room; what exceeds `most` lines is cut.

    A word longer than a line is broken where the line ends. The last line shows by an
    ellipsis that something was cut.
    """
    lines = [""]
    for word in plain(text).split():
        joined = f"{lines[-1]} {word}" if lines[-1] else word
        if width_mm(joined, height_mm) <= room_mm:
            lines[-1] = joined
            continue
        pieces = _broken(word, room_mm, height_mm)
        lines = lines + pieces if lines[-1] else pieces
        if len(lines) > most:
            break
    if len(lines) > most:
        rest = lines[most - 1] + " " + lines[most] + "..."
        lines = [*lines[: most - 1], shorten(rest, room_mm, height_mm)]
    return lines


def _broken(word: str, room_mm: float, height_mm: float) -> list[str]:
    """Break a word that is longer than a line into pieces that are not."""
    pieces = [""]
    for letter in word[:1000]:  # a longer word says nothing more on a drawing
        if pieces[-1] and width_mm(pieces[-1] + letter, height_mm) > room_mm:
            pieces.append("")
        pieces[-1] += letter
    return pieces
