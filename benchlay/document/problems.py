"""What is wrong with a file: collected, never raised, so that all of it comes out at once."""

from __future__ import annotations

from benchlay.document.span import Span
from benchlay.document.words import format_choices, nearest
from benchlay.named import NamedTuple

__all__ = ["Problem", "Problems", "format_choices", "nearest"]

LIMIT = 200
"""More than this in one file is not a slip but the wrong file; the rest is only counted."""


class Problem(NamedTuple):
    """One thing wrong: where, what, what was expected, how to mend it."""

    span: Span
    message: str
    expected: str
    remedy: str

    def __str__(self) -> str:
        """Write it in the form shared with findings: three lines, the first complete."""
        head = f"{self.span}: error: {self.message}"
        return f"{head}\n  expected: {self.expected}\n  to mend: {self.remedy}"


class Problems:
    """All problems of one reading.

    `len` counts every problem added (also repeated ones and those beyond the limit), so that
    a caller can tell whether a step went well by comparing before and after.
    """

    def __init__(self) -> None:
        self._kept: dict[Problem, None] = {}
        self._added = 0
        self._dropped = 0

    def add(self, span: Span, message: str, *, expected: str, remedy: str) -> None:
        """Keep one problem; the same one at the same place is kept once."""
        self._added += 1
        if self.full:
            self._dropped += 1
            return
        self._kept[Problem(span, message, expected, remedy)] = None

    @property
    def full(self) -> bool:
        """Whether further problems will only be counted; spares making long hints."""
        return len(self._kept) >= LIMIT

    def __len__(self) -> int:
        """Count what was added."""
        return self._added

    def __bool__(self) -> bool:
        """Tell whether anything is wrong."""
        return self._added > 0

    def sorted(self) -> list[Problem]:
        """Return the problems by place; beyond the limit a last one says how many."""
        ordered = sorted(self._kept)
        if self._dropped:
            ordered.append(
                Problem(
                    ordered[-1].span,
                    f"{self._dropped} further problems are not shown",
                    f"a file with fewer than {LIMIT} problems",
                    "mend the problems above first, then run again",
                )
            )
        return ordered
