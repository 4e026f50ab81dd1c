"""Findings: what a check has to say, as data.

A finding's `id` is made of what stays the same from run to run, so that a record of accepted
findings keeps its hold when an element is moved by a millimetre or the file is reordered.
"""

from __future__ import annotations

import math
from collections.abc import Iterable, Sequence
from enum import IntEnum
from typing import TypeAlias

from benchlay.document.span import Span
from benchlay.named import NamedTuple

_SHORTEST = 4
_LONGEST = 32


class Severity(IntEnum):
    """How much a finding weighs."""

    NOTE = 0
    WARN = 1
    FAIL = 2

    @property
    def word(self) -> str:
        """The word in text and JSON."""
        return self.name.lower()


KeyPart: TypeAlias = str | int | float | None


class Finding(NamedTuple):
    """One thing a check found, in one state.

    Attributes
    ----------
    check : str
        Name of the check.
    severity : Severity
        How much it weighs.
    message, expected, remedy : str
        What is wrong (complete by itself), what was expected, how to mend it.
    state : str
        The state in which it was found.
    element : str or None
        What it is about: an element, source, panel or lid.
    beam : int or None
        Number of the beam in that state's trace.
    at : (x, y, z) or None
        Place on the bench in mm.
    span : Span or None
        Place in the file.
    value, limit : float or None
        What was found and what it is held against, both in `unit`.
    unit : str
        As in the JSON.
    related : tuple of (Span, str)
        Other places in the file, each with what stands there.
    key : tuple
        What stays the same from run to run: source, wavelength, sequence of faces.
    smaller_is_worse : bool
        Whether, between states, the smaller value counts as the worse.
    weight : float
        Of equal values between states, the one of larger weight counts as the worse.
    id : str
        Given by `identify`.
    """

    check: str
    severity: Severity
    message: str
    expected: str
    remedy: str
    state: str = "as drawn"
    element: str | None = None
    beam: int | None = None
    at: tuple[float, float, float] | None = None
    span: Span | None = None
    value: float | None = None
    limit: float | None = None
    unit: str = ""
    related: tuple[tuple[Span, str], ...] = ()
    key: tuple[KeyPart, ...] = ()
    smaller_is_worse: bool = False
    weight: float = 0.0
    id: str = ""


class MergedFinding(NamedTuple):
    """One finding in all the states in which it holds, with the data of the worst."""

    finding: Finding
    states: tuple[str, ...]
    worst_state: str

    @property
    def id(self) -> str:
        """The id shared by all of them."""
        return self.finding.id


def make_id(
    check: str,
    element: str | None,
    key: Sequence[KeyPart],
    length: int = _SHORTEST,
) -> str:
    """Return ``check/element/hash``; the hash is of all three, `length` digits long.

    >>> make_id("escape", "W1", ("green", 532.0, "W1.front")).rpartition("/")[0]
    'escape/W1'
    """
    # Loaded here: a bench without findings needs no digest. `hashlib` has this function too, but
    # loads a library of ciphers before it, in a hundredth of the time of a plain check.
    try:
        from _blake2 import blake2s
    except ImportError:  # another Python than that of most
        from hashlib import blake2s

    parts = [check, element or "", *(_stable(part) for part in key)]
    # The length of each part goes in too, so that no two different lists can look alike.
    told = "".join(f"{len(part)}:{part}" for part in parts)
    digest = blake2s(told.encode("utf-8")).hexdigest()
    return f"{check}/{element or '-'}/{digest[:length]}"


def _stable(part: KeyPart) -> str:
    """Write a part of a key; numbers to six figures, well above the last bits."""
    if part is None:
        return "-"
    return f"{part + 0.0:.6g}" if isinstance(part, float) else str(part)


def identify(findings: Iterable[Finding]) -> list[Finding]:
    """Give every finding its id.

    Where the short hashes of two different findings agree, both become longer. Where one
    state holds several findings with the same key, those after the first are numbered.
    """
    listed = list(findings)
    names = {(f.check, f.element, f.key) for f in listed}
    ids = {}
    for check, element, key in names:
        ids[check, element, key] = make_id(check, element, key)
    length = _SHORTEST
    while length < _LONGEST and (clashing := _clashing(ids)):
        length += 2
        ids |= {name: make_id(*name, length) for name in clashing}
    seen: dict[tuple[str, str], int] = {}
    named = []
    for finding in listed:
        name = ids[finding.check, finding.element, finding.key]
        count = seen[name, finding.state] = seen.get((name, finding.state), 0) + 1
        named.append(finding._replace(id=name if count == 1 else f"{name}-{count}"))
    return named


_Named: TypeAlias = tuple[str, str | None, tuple[KeyPart, ...]]


def _clashing(ids: dict[_Named, str]) -> list[_Named]:
    """Return the names whose id another name has too."""
    holders: dict[str, list[_Named]] = {}
    for name, short in ids.items():
        holders.setdefault(short, []).append(name)
    return [name for names in holders.values() if len(names) > 1 for name in names]


def merge_states(findings: Iterable[Finding]) -> list[MergedFinding]:
    """Make one finding of those with the same id, in the order in which ids first appear.

    States keep the order in which they appear. The worst has the largest severity, then the
    worst value, then the largest weight; of equals the first. Findings without an id are never
    merged.
    """
    groups: dict[str | int, list[Finding]] = {}
    for number, finding in enumerate(findings):
        groups.setdefault(finding.id or number, []).append(finding)
    merged = []
    for group in groups.values():
        worst = max(group, key=_badness)
        states = tuple(dict.fromkeys(finding.state for finding in group))
        merged.append(MergedFinding(worst, states, worst.state))
    return merged


def _badness(finding: Finding) -> tuple[int, float, float]:
    value = finding.value
    if value is None:
        return finding.severity, -math.inf, finding.weight
    if math.isnan(value):  # could not be computed: the worst is to be assumed
        return finding.severity, math.inf, finding.weight
    return finding.severity, -value if finding.smaller_is_worse else value, finding.weight


def sort_key(finding: Finding) -> tuple[int, str, str, str, str]:
    """Order findings for a report: the gravest first, then by check, element, id, state."""
    return (
        -finding.severity,
        finding.check,
        finding.element or "",
        finding.id,
        finding.state,
    )
