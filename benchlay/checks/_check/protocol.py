"""What a check is: a function from a trace to findings, with its papers."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Protocol, TypeAlias

from benchlay.checks._check.context import Context
from benchlay.document.span import Span
from benchlay.findings import Finding
from benchlay.named import NamedTuple


class Unevaluated(NamedTuple):
    """What a check yields for a part that it could not evaluate; never counted as passed.

    `reason` is a clause without a full stop; `remedy` says what would make it possible.
    """

    reason: str
    remedy: str
    element: str | None = None
    span: Span | None = None


Found: TypeAlias = Finding | Unevaluated


class Run(NamedTuple):
    """Whether a check could be evaluated in a state, and if not, why."""

    check: str
    state: str
    ran: bool
    reason: str | None = None


class Check(Protocol):
    """Every module of the package `checks` whose name has no leading underscore."""

    NAME: str

    def check(self, context: Context, variant: int) -> Iterator[Found]:
        """Yield what is wrong in one state, in the order of the beams or of names."""
