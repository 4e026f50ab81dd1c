"""Words in messages: quoted, listed, and the nearest known one."""

from __future__ import annotations

from collections.abc import Iterable, Sequence

_SHOWN = 60
_LISTED = 40
_LONGEST_WORD = 64


def quote(text: str) -> str:
    """Return `text` between quotes, shortened, with nothing that could garble a terminal."""
    short = text if len(text) <= _SHOWN else text[: _SHOWN - 1] + "…"
    clean = "".join(c if c.isprintable() else c.encode("unicode_escape").decode() for c in short)
    return f"'{clean}'"


def format_choices(choices: Iterable[str], conjunction: str = "or") -> str:
    """List words in a sentence: ``'a', 'b' or 'c'``; very long lists are cut, and say so."""
    words = list(choices)
    shown = [quote(word) for word in words[:_LISTED]]
    left = len(words) - len(shown)
    if left:
        return f"{', '.join(shown)} and {left} more"
    if len(shown) < 2:  # noqa: PLR2004 - one word needs no conjunction
        return "".join(shown)
    return f"{', '.join(shown[:-1])} {conjunction} {shown[-1]}"


def nearest(word: str, choices: Iterable[str]) -> str | None:
    """Return the choice a slip of the hand away from `word`, or None.

    A slip is a letter left out, added, changed or swapped with its neighbour; one is allowed
    for every three letters of the word, and in a word of one letter none. Case does not count.
    Of equals the first wins.
    """
    if not word or len(word) > _LONGEST_WORD:
        return None
    written = word.casefold()
    best, bound = None, min(max(1, len(word) // 3) + 1, len(word))
    for choice in choices:
        other = choice.casefold()
        if abs(len(other) - len(written)) >= bound:
            continue
        slips = _slips(written, other)
        if slips < bound:
            best, bound = choice, slips
    return best


def _slips(a: Sequence[str], b: Sequence[str]) -> int:
    """Count the slips between two words (edit distance with neighbouring swaps)."""
    before: list[int] = []
    row = list(range(len(b) + 1))
    for i, x in enumerate(a, start=1):
        earlier, before, row = before, row, [i]
        for j, y in enumerate(b, start=1):
            cost = min(row[j - 1] + 1, before[j] + 1, before[j - 1] + (x != y))
            if i > 1 and j > 1 and x == b[j - 2] and y == a[i - 2]:
                cost = min(cost, earlier[j - 2] + 1)
            row.append(cost)
    return row[-1]
