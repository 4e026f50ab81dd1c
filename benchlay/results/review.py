"""Everything that is said of one layout, put together from trace and findings."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from datetime import date
from typing import TYPE_CHECKING

from benchlay.checks import Context, Run
from benchlay.findings import Finding, MergedFinding, identify, merge_states, sort_key
from benchlay.named import NamedTuple
from benchlay.report.model import Acceptance, CheckRun, Reported, Review, reported
from benchlay.results.accept import hold
from benchlay.results.limits import limits_used
from benchlay.tracing import Trace

if TYPE_CHECKING:
    from benchlay.zones import Zones


class Paper(NamedTuple):
    """What a review says of the file itself."""

    name: str
    sha256: str
    lines: tuple[str, ...]


class Checked(NamedTuple):
    """What was found in a trace, held against limits."""

    context: Context  # with which it was found
    findings: tuple[Finding, ...]
    runs: tuple[Run, ...]
    states: tuple[str, ...]  # that are spoken of, in order
    zones: Zones | None = None  # where they were worked out

    @property
    def trace(self) -> Trace:
        """The trace."""
        return self.context.trace


class Judged(NamedTuple):
    """Findings over all states, held against the layout's accept entries."""

    findings: tuple[Reported, ...]
    runs: tuple[CheckRun, ...]


def judge(checked: Checked, on: date | None) -> Judged:
    """Name, merge, accept and sort what was found.

    Parameters
    ----------
    checked : Checked
        What was found, state by state.
    on : date or None
        The day on which accept entries are held against findings; None leaves them alone.
    """
    placed = checked.trace.placed
    spoken_of = [f for f in checked.findings if f.state in checked.states]
    own = merge_states(spoken_of)
    held = hold(own, placed, on, checked.states)
    about = merge_states(identify(f._replace(state=checked.states[0]) for f in held.findings))
    runs = [CheckRun(*run) for run in checked.runs if run.state in checked.states]
    return Judged(_reported([*own, *about], held.accepted), (*runs, *held.runs))


def _reported(
    merged: Sequence[MergedFinding], accepted: Mapping[str, Acceptance]
) -> tuple[Reported, ...]:
    ordered = sorted(merged, key=lambda one: sort_key(one.finding))
    return tuple(reported(one, accepted.get(one.id)) for one in ordered)


def review(checked: Checked, paper: Paper, on: date, *, in_full: bool) -> Review:
    """Return the review of a layout; what costs time only where it is asked for in full."""
    context, trace = checked.context, checked.trace
    layout = trace.placed.base.layout
    judged = judge(checked, on)
    short = Review(
        layout=paper.name,
        sha256=paper.sha256,
        title=layout.title or None,
        revision=layout.revision or None,
        as_of=on.isoformat() if layout.accept else None,
        findings=judged.findings,
        checks=judged.runs,
        limits_used=limits_used(trace, context.limits, checked.states),
        lines=paper.lines,
    )
    if not in_full:
        return short
    from benchlay.results.details import with_details
    from benchlay.results.panels import panels_of_states
    from benchlay.results.stretches import with_stretches

    full = with_details(short, trace, checked.states, checked.zones)
    full = full._replace(
        findings=with_stretches(full.findings, context),
        panels=panels_of_states(context, checked.states),
    )
    if checked.zones is None:
        return full
    from benchlay.results.hazards import with_hazards

    return with_hazards(full, context, checked.states, checked.zones)
