"""A place in a file."""

from __future__ import annotations

from benchlay.named import NamedTuple


class Span(NamedTuple):
    """Where something is written; line and column count from 1."""

    file: str
    line: int
    column: int

    def __str__(self) -> str:
        """Write the place as editors and terminals understand it."""
        return f"{self.file}:{self.line}:{self.column}"


NOWHERE = Span("", 0, 0)
"""The place of what no file says: defaults and objects made in code."""
