"""Results as plain data, field by field what the JSON says; what is said in full is in `details`.

The pipeline fills these; every form of output (JSON, text, later the record) reads them and
nothing else. A field's name is its JSON key; a trailing underscore, put where the key is a
word of Python's, is dropped in the JSON. Units stand in the names, as in the JSON: here W
and mm are written as users of the JSON see them.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, TypeAlias

from benchlay.document.problems import Problem
from benchlay.findings import MergedFinding, Severity
from benchlay.named import NamedTuple

if TYPE_CHECKING:
    from benchlay.hazards.model import Sign, StateHazards
    from benchlay.report.details import (
        Cavity,
        ControlledArea,
        Coverage,
        HandedOver,
        Ledger,
        Match,
        PanelLoad,
        RouteResult,
        Zone,
    )
    from benchlay.report.faults import FaultsResult

Point: TypeAlias = tuple[float, float, float]


class Acceptance(NamedTuple):
    """Why a finding stays on the record and out of the verdict."""

    reason: str
    by: str
    until: str
    at_most: str | None = None


class Elsewhere(NamedTuple):
    """Another place in the file that a finding or a clash is about."""

    file: str
    line: int
    column: int
    message: str


class Stretch(NamedTuple):
    """A part of a beam, from where to where."""

    beam: int
    from_: Point
    to: Point


class Reported(NamedTuple):
    """A finding as it is reported: over all its states, with the data of the worst.

    `stretch` is the guilty part of its beam, start and end, and `stretches` that of every
    guilty beam: of `opening-mirror`, where a review is asked for in full.
    """

    id: str
    check: str
    severity: str
    states: tuple[str, ...]
    worst_state: str
    message: str
    expected: str
    remedy: str
    element: str | None
    beam: int | None
    at: Point | None
    file: str | None
    line: int | None
    column: int | None
    value: float | None
    limit: float | None
    unit: str | None
    accepted: Acceptance | None
    related: tuple[Elsewhere, ...] = ()
    stretch: tuple[Point, Point] | None = None
    stretches: tuple[Stretch, ...] = ()


class CheckRun(NamedTuple):
    """Whether a check could be evaluated in a state, and if not, why."""

    check: str
    state: str
    ran: bool
    reason: str | None = None


class LimitUsed(NamedTuple):
    """An exposure limit that findings were held against."""

    wavelength_nm: float
    time_base_s: float
    mpe_W_m2: float | None
    aperture_mm: float
    accessible_W: float
    edition: str
    overridden: bool
    accessible_J: float | None = None  # of each pulse; the power is their mean


class Remedy(NamedTuple):
    """A change that was tried out: it clears a finding and raises no other.

    `kind` is screen, dump, panel, lid, coating, tilt or wedge, `yaml` what is to be pasted into
    the layout, `clears_too` the other findings that it clears, `adds` the names of what it puts
    on the bench or round it.
    """

    finding: str
    kind: str
    words: str
    yaml: str
    clears_too: tuple[str, ...] = ()
    adds: tuple[str, ...] = ()


class FaultRemedy(NamedTuple):
    """A change that was tried out: with it a single fault lets nothing out at any setting.

    No check finds anything new, and no other fault lets light out by another way. `clears_too`
    names other faults that let nothing out any more, each with its state.
    """

    fault: str
    state: str
    kind: str
    words: str
    yaml: str
    clears_too: tuple[str, ...] = ()


class Remedies(NamedTuple):
    """What would clear escapes and strays, what nothing clears, and how many were tried.

    `of_faults` are changes that keep in what single faults send out, `faults_without` names the
    faults for which none of those tried does, and `faults_left` counts those with no remedy yet.
    """

    offered: tuple[Remedy, ...] = ()
    without: tuple[str, ...] = ()
    tried: int = 0
    of_faults: tuple[FaultRemedy, ...] = ()
    faults_without: tuple[str, ...] = ()
    faults_left: int = 0


class Review(NamedTuple):
    """Everything that is said of one layout.

    `hazards` says what each state asks of people, `signs` is the schedule of labels and signs,
    `not_computed` says in sentences what the zones leave out. `lines` are the layout's own
    lines, for quoting; they are no part of the JSON.
    """

    layout: str
    sha256: str
    title: str | None
    revision: str | None
    as_of: str | None
    findings: tuple[Reported, ...]
    checks: tuple[CheckRun, ...]
    limits_used: tuple[LimitUsed, ...]
    routes: tuple[RouteResult, ...] = ()
    ledger: tuple[Ledger, ...] = ()
    zones: tuple[Zone, ...] = ()
    controlled_areas: tuple[ControlledArea, ...] = ()
    coverage: tuple[Coverage, ...] = ()
    panels: tuple[PanelLoad, ...] = ()
    cavities: tuple[Cavity, ...] = ()
    matched: tuple[Match, ...] = ()
    handed_over: tuple[HandedOver, ...] = ()
    hazards: tuple[StateHazards, ...] = ()
    signs: tuple[Sign, ...] = ()
    not_computed: tuple[str, ...] = ()
    remedies: Remedies | None = None  # where they were asked for
    faults: FaultsResult | None = None  # where they were reviewed: a file of its own
    lines: tuple[str, ...] = ()

    @property
    def verdict(self) -> str:
        """The worst severity that no accept entry covers, or ``none``."""
        open_ones = [Severity[f.severity.upper()] for f in self.findings if not f.accepted]
        return max(open_ones).word if open_ones else "none"

    @property
    def states(self) -> tuple[str, ...]:
        """The states in which something was checked, in their order."""
        return tuple(dict.fromkeys(run.state for run in self.checks))


class LayoutErrors(NamedTuple):
    """What stands in place of a result when the layout cannot be used."""

    layout: str
    errors: tuple[Problem, ...]
    lines: tuple[str, ...] = ()


def reported(merged: MergedFinding, accepted: Acceptance | None = None) -> Reported:
    """Flatten a merged finding into the form in which it is reported."""
    finding = merged.finding
    span = finding.span if finding.span is not None and finding.span.line else None
    return Reported(
        id=finding.id,
        check=finding.check,
        severity=finding.severity.word,
        states=merged.states,
        worst_state=merged.worst_state,
        message=finding.message,
        expected=finding.expected,
        remedy=finding.remedy,
        element=finding.element,
        beam=finding.beam,
        at=finding.at,
        file=span.file if span else None,
        line=span.line if span else None,
        column=span.column if span else None,
        value=finding.value,
        limit=finding.limit,
        unit=finding.unit or None,
        accepted=accepted,
        related=tuple(Elsewhere(*place, text) for place, text in finding.related),
    )
