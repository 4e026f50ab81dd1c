"""Results as plain data, field by field what the JSON says.

The pipeline fills these; every form of output (JSON, text, later the record) reads them and
nothing else. A field's name is its JSON key; a trailing underscore, put where the key is a
word of Python's, is dropped in the JSON. Units stand in the names, as in the JSON: here W
and mm are written as users of the JSON see them.
"""

from __future__ import annotations

from collections.abc import Mapping
from typing import NamedTuple, TypeAlias

from benchlay.document.problems import Problem
from benchlay.findings import MergedFinding, Severity

Point: TypeAlias = tuple[float, float, float]
Ring: TypeAlias = tuple[tuple[float, float], ...]
Angles: TypeAlias = tuple[float, float]


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


class Reported(NamedTuple):
    """A finding as it is reported: over all its states, with the data of the worst."""

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


class Polarization(NamedTuple):
    """State of polarization of a beam; angles from its own horizontal."""

    degree: float
    angle_deg: float | None
    ellipticity_deg: float | None
    horizontal: Point


class RouteResult(NamedTuple):
    """What became of a route in a state."""

    route: str
    state: str
    arrives: bool
    power_W: float
    transmission: float
    path_mm: float
    optical_path_mm: float
    polarization: Polarization | None


class Sink(NamedTuple):
    """Where some of the emitted power ended."""

    kind: str
    name: str | None
    wavelength_nm: float
    power_W: float
    largest_W: float | None = None


class Ledger(NamedTuple):
    """The power of one source in one state: what was emitted, where it all went."""

    state: str
    source: str
    emitted_W: float
    sinks: tuple[Sink, ...]
    unaccounted_W: float


class Zone(NamedTuple):
    """A polygon in which a beam exceeds the exposure limit; outer ring first, then holes."""

    state: str
    kind: str
    wavelength_nm: float
    reason: str
    area_m2: float
    reach_m: float
    polygon: tuple[Ring, ...]


class Gap(NamedTuple):
    """Directions in which nothing would stop a beam; angles in degrees."""

    id: str
    azimuth: Angles
    elevation: Angles
    solid_angle_sr: float
    through: str
    width_mm: float


class Coverage(NamedTuple):
    """How much of what surrounds a place on the bench is closed."""

    state: str
    from_: str
    covered: float
    gaps: tuple[Gap, ...]


class PanelLoad(NamedTuple):
    """The worst a panel takes, beside what it withstands."""

    panel: str
    worst_irradiance_W_cm2: float | None
    state: str | None
    withstands_W_cm2: float | None
    margin: float | None


class Cavity(NamedTuple):
    """Whether a declared cavity holds a mode."""

    cavity: str
    stable: bool
    g: tuple[float, ...]
    waists_mm: tuple[float, ...]
    spots_mm: Mapping[str, tuple[float, ...]]
    loss: float
    gain: float
    mode_spacing_Hz: float


class Match(NamedTuple):
    """How far two routes that are meant to be equally long differ."""

    routes: tuple[str, str]
    difference_mm: float
    visibility: float | None


class Axis(NamedTuple):
    """A ray in space."""

    at: Point
    direction: Point


class HandedOver(NamedTuple):
    """A beam that leaves through a port on purpose."""

    through: str
    axis: Axis
    w_mm: tuple[float, float]
    power_W: float


class Review(NamedTuple):
    """Everything that is said of one layout.

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
    routes: tuple[RouteResult, ...]
    ledger: tuple[Ledger, ...]
    zones: tuple[Zone, ...]
    coverage: tuple[Coverage, ...]
    panels: tuple[PanelLoad, ...]
    cavities: tuple[Cavity, ...]
    matched: tuple[Match, ...]
    handed_over: tuple[HandedOver, ...]
    not_computed: tuple[str, ...] = ()
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


class BeamRow(NamedTuple):
    """One leg of light, from where it was made to where it ends."""

    beam: int
    parent: int | None
    source: str
    wavelength_nm: float
    splits: int
    route: str | None
    routes: tuple[str, ...]
    leg: int | None
    from_: str
    from_face: str
    to: str | None
    to_face: str | None
    ends: str
    event: str
    start: Point
    end: Point
    direction: Point
    medium_index: float
    power_W: float | None
    power_at_end_W: float | None
    lost_W: Mapping[str, float]
    pulse_energy_J: float | None
    w_start_mm: tuple[float, float]
    w_end_mm: tuple[float, float]
    w_axis_deg: float
    m2: tuple[float, float]
    optical_path_mm: float
    polarization: Polarization | None
    peak_irradiance_end_W_cm2: float | None


class Pose(NamedTuple):
    """Where an element's reference point stands and its front faces; degrees."""

    at: Point
    facing: float
    pitch: float


class TraceResult(NamedTuple):
    """The light of one state."""

    layout: str
    state: str
    beams: tuple[BeamRow, ...]
    placed: Mapping[str, Pose]
    ledger: tuple[Ledger, ...]


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
