"""Small pieces of text output: quoting the layout, colour, and taming what files contain."""

from __future__ import annotations

import unicodedata
from collections.abc import Sequence

from benchlay.named import NamedTuple

_QUOTE_AT_MOST = 100
"""Characters of a layout's line that are quoted; longer ones are cut round the place."""

_COLOURS = {"fail": "31;1", "error": "31;1", "warn": "33;1", "note": "36"}

# Control characters, and those that change the order of what is read: a title must not be
# able to steer the terminal or to make a finding look like another.
_UNSEEN = {"Cc", "Cf", "Cs", "Zl", "Zp"}


class Ink(NamedTuple):
    """Whether the stream takes colour."""

    coloured: bool = False

    def paint(self, word: str) -> str:
        """Colour a severity where the stream takes it."""
        code = _COLOURS.get(word)
        if not self.coloured or code is None:
            return word
        return f"\x1b[{code}m{word}\x1b[0m"


def tame(text: str) -> str:
    r"""Make a piece of a file fit to be printed: what is invisible becomes an escape.

    >>> tame("a\x1b[2J\tb")
    'a\\x1b[2J b'
    """
    text = text.replace("\t", " ")
    if text.isprintable():
        return text
    return "".join(_escape(c) if unicodedata.category(c) in _UNSEEN else c for c in text)


def _escape(character: str) -> str:
    return character.encode("unicode_escape").decode("ascii")


def quoted(lines: Sequence[str], line: int | None, column: int | None) -> list[str]:
    """Return the layout's own line with a mark below the place, indented; [] if unknown.

    >>> quoted(["bench:", "  size: [1, 2]"], 2, 3)
    ['  2 |   size: [1, 2]', '    |   ^']
    """
    if line is None or not 1 <= line <= len(lines):
        return []
    text = lines[line - 1].rstrip().replace("\t", " ")
    at = min(max(column or 1, 1) - 1, len(text))
    start = max(0, at - _QUOTE_AT_MOST // 2) if len(text) > _QUOTE_AT_MOST else 0
    before = tame(text[start:at])
    rest = tame(text[at : start + _QUOTE_AT_MOST])
    margin = " " * len(str(line))
    return [f"  {line} | {before}{rest}", f"  {margin} | {' ' * len(before)}^"]


def listed(words: Sequence[str]) -> str:
    """Join words by commas; a dash for none."""
    return ", ".join(words) if words else "-"
