"""Findings by state: which holds where, and where it is worst.

On the terminal the marks come first, so that they stand in line however long an id is.
"""

from __future__ import annotations

import textwrap
from collections.abc import Iterator, Sequence

from benchlay.named import NamedTuple
from benchlay.report.model import Reported, Review

_HOLDS, _WORST, _NOT = "x", "X", "."
_WIDTH = 80
_FEWEST = 8  # states a block, where ids are so long that fewer would fit


class Row(NamedTuple):
    """One finding: whether it holds in each state, and the state in which it is worst."""

    id: str
    in_: tuple[bool, ...]
    worst: str


class Matrix(NamedTuple):
    """All findings of a review by all its states."""

    states: tuple[str, ...]
    rows: tuple[Row, ...]


def matrix_of(review: Review) -> Matrix:
    """Return the findings of a review by state, in the order in which they are reported."""
    states = review.states
    return Matrix(states, tuple(_row(finding, states) for finding in review.findings))


def _row(finding: Reported, states: Sequence[str]) -> Row:
    return Row(finding.id, tuple(s in finding.states for s in states), finding.worst_state)


def matrix_lines(matrix: Matrix) -> Iterator[str]:
    """Write the matrix for a terminal; nothing where there is one state or no finding."""
    count = len(matrix.states)
    if count < 2 or not matrix.rows:  # noqa: PLR2004 (of one state there is nothing to compare)
        return
    yield f"findings by state ({_HOLDS}: holds there, {_WORST}: the worst there)"
    column = len(str(count)) + 1
    longest = max(len(row.id) for row in matrix.rows)
    block = max((_WIDTH - 4 - longest) // column, _FEWEST)
    for first in range(0, count, block):
        yield from _block(matrix, range(first, min(first + block, count)), column)
    named = ", ".join(f"{number} {name}" for number, name in enumerate(matrix.states, start=1))
    yield from textwrap.wrap(
        named, _WIDTH - 2, initial_indent="  ", subsequent_indent="  ", break_on_hyphens=False
    )
    yield ""


def _block(matrix: Matrix, states: range, column: int) -> Iterator[str]:
    yield "  " + "".join(f"{number + 1:>{column}}" for number in states)
    for row in matrix.rows:
        marks = (_mark(row, number, matrix.states[number]) for number in states)
        yield "  " + "".join(f"{mark:>{column}}" for mark in marks) + f"  {row.id}"


def _mark(row: Row, number: int, state: str) -> str:
    if not row.in_[number]:
        return _NOT
    return _WORST if state == row.worst else _HOLDS
