"""Accepted findings: which are covered by an entry of the layout, and which entries fail.

An entry covers its finding up to its day, while the finding's value stays at or under
`at_most` (at or over it, where the smaller value is the worse) and the named elements within
`bound`, in every state in which the finding holds.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping, Sequence
from datetime import date
from math import dist, isnan, pi

from benchlay.document.quantity import Dimension
from benchlay.findings import Finding, MergedFinding, Severity
from benchlay.layout import AS_DRAWN
from benchlay.layout.accept import Accept
from benchlay.named import NamedTuple
from benchlay.placing.placed import Placed
from benchlay.report.model import Acceptance, CheckRun
from benchlay.report.numbers import shown

UNMATCHED, EXPIRED, WIDENED = "accept-unmatched", "accept-expired", "accept-widened"
NAMES = (EXPIRED, UNMATCHED, WIDENED)

# An element put back where it was accepted stands within `within: 0` but for rounding.
_TOUCH_MM = 1e-6

_UNITS: Mapping[str, tuple[Dimension, float]] = {
    "W": (Dimension.POWER, 1.0),
    "J": (Dimension.ENERGY, 1.0),
    "mm": (Dimension.LENGTH, 1.0),
    "W/m2": (Dimension.IRRADIANCE, 1.0),
    "W/cm2": (Dimension.IRRADIANCE, 1e4),
    "J/m2": (Dimension.FLUENCE, 1.0),
    "J/cm2": (Dimension.FLUENCE, 1e4),
    "deg": (Dimension.ANGLE, pi / 180.0),
    "rad": (Dimension.ANGLE, 1.0),
    "mrad": (Dimension.ANGLE, 1e-3),
    "s": (Dimension.DURATION, 1.0),
}
"""What a finding's unit measures, and how many of the dimension's own units it is."""

_BARE = ("", "mm", "deg", "nm")
"""Units that a bare number has in the language; other quantities must carry theirs."""


class Held(NamedTuple):
    """What holding the entries against the findings gives."""

    accepted: Mapping[str, Acceptance]  # by id of the finding
    findings: tuple[Finding, ...]  # about the entries themselves
    runs: tuple[CheckRun, ...]


def hold(
    merged: Sequence[MergedFinding], placed: Placed, on: date | None, states: Sequence[str]
) -> Held:
    """Hold a layout's accept entries against what was found.

    Parameters
    ----------
    merged : sequence of MergedFinding
        What was found, over the states that were checked.
    placed : Placed
        Says where the elements named in `bound` stand.
    on : date or None
        The day; None holds no entry against anything.
    states : sequence of str
        The states that were checked.
    """
    layout = placed.base.layout
    if not layout.accept or on is None:
        return Held({}, (), ())
    by_id = {finding.id: finding for finding in merged}
    # What holds in a state that was not checked cannot be told from what is gone.
    every_state = {AS_DRAWN, *layout.states} <= set(states)
    accepted: dict[str, Acceptance] = {}
    about: list[Finding] = []
    for entry in layout.accept:
        finding = by_id.get(entry.finding)
        if finding is None:
            about += [_unmatched(entry, by_id)] if every_state else []
            continue
        faults = [*_expired(entry, on), *_widened(entry, finding, placed)]
        about += faults
        if not faults:
            at_most = None if entry.at_most is None else entry.at_most.text
            accepted[finding.id] = Acceptance(entry.reason, entry.by, entry.until, at_most)
    return Held(accepted, tuple(about), _runs(layout.state, every_state=every_state))


def _runs(state: str, *, every_state: bool) -> tuple[CheckRun, ...]:
    runs = [CheckRun(name, state, True) for name in NAMES]
    if not every_state:
        reason = "not every state was checked"
        runs[NAMES.index(UNMATCHED)] = CheckRun(UNMATCHED, state, False, reason)
    return tuple(runs)


def _about(check: str, entry: Accept, message: str, expected: str, remedy: str) -> Finding:
    return Finding(
        check,
        Severity.WARN,
        message,
        expected,
        remedy,
        span=entry.span_of("finding"),
        key=(entry.finding,),
    )


def _unmatched(entry: Accept, known: Iterable[str]) -> Finding:
    near = sorted(i for i in known if i.rpartition("/")[0] == entry.finding.rpartition("/")[0])
    remedy = f"write {near[0]!r} if that is meant, else remove" if near else "remove"
    return _about(
        UNMATCHED,
        entry,
        f"the accepted finding {entry.finding!r} is not found",
        "the id of a finding that still holds, as printed with it",
        f"{remedy} the entry",
    )


def _expired(entry: Accept, on: date) -> Iterator[Finding]:
    if on > date.fromisoformat(entry.until):
        yield _about(
            EXPIRED,
            entry,
            f"the finding {entry.finding!r} was accepted until {entry.until} only",
            f"a day from {on.isoformat()} on",
            "judge the finding again; set `until` anew or remove the entry",
        )


def _widened(entry: Accept, finding: MergedFinding, placed: Placed) -> Iterator[Finding]:
    reasons = [*_too_much(entry, finding), *_moved(entry, finding, placed)]
    if reasons:
        yield _about(
            WIDENED,
            entry,
            f"the finding {entry.finding!r} goes beyond what was accepted: {'; '.join(reasons)}",
            "a value and places within `at_most` and `bound`",
            "judge the finding again; then widen the entry or remove it",
        )


def _too_much(entry: Accept, merged: MergedFinding) -> Iterator[str]:
    if entry.at_most is None:
        return
    finding = merged.finding
    bound, text = _in_unit_of(entry, finding.unit), entry.at_most.text
    if finding.value is None or isnan(finding.value):
        yield f"its value is not known, {text} is accepted"
    elif bound is None:
        yield f"its value is in {finding.unit or 'no unit'}, {text} is accepted"
    elif finding.value < bound if finding.smaller_is_worse else finding.value > bound:
        yield f"its value is {shown(finding.value, finding.unit)}, {text} is accepted"


def _in_unit_of(entry: Accept, unit: str) -> float | None:
    """Return `at_most` in a finding's unit; None where it measures something else."""
    amount = entry.at_most
    if amount is None:
        return None
    if amount.dimension is None:
        return amount.value if unit in _BARE else None
    if not unit:
        return amount.value if amount.dimension is Dimension.RATIO else None
    dimension, size = _UNITS.get(unit, (None, 1.0))
    return amount.value / size if dimension is amount.dimension else None


def _moved(entry: Accept, merged: MergedFinding, placed: Placed) -> Iterator[str]:
    states = [state for state in placed.states if state.name in merged.states]
    for name, bound in sorted(entry.bound.items()):
        found = [
            item.pose.at
            for state in states
            if (item := state.elements.get(name) or state.sources.get(name)) is not None
        ]
        given = len(bound.at_mm)  # x and y, or x, y and z
        away = max((dist(at[:given], bound.at_mm) for at in found), default=0.0)
        if away > bound.within_mm + _TOUCH_MM:
            yield (
                f"{name!r} stands {shown(away, 'mm')} from where it was accepted, "
                f"{shown(bound.within_mm, 'mm')} are"
            )
