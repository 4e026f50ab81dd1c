"""What is said in full, as plain data in the manner of `model`: beams, ledgers, routes, zones.

A plain check needs none of it, so it stands apart from the findings.
"""

from __future__ import annotations

from collections.abc import Mapping
from typing import TypeAlias

from benchlay.named import NamedTuple
from benchlay.report.model import Point

Ring: TypeAlias = tuple[tuple[float, float], ...]
Angles: TypeAlias = tuple[float, float]


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


class ControlledArea(NamedTuple):
    """A polygon of the union of a state's zones, whatever the wavelength; rings as a zone's."""

    state: str
    area_m2: float
    wavelengths_nm: tuple[float, ...]
    kinds: tuple[str, ...]
    polygon: tuple[Ring, ...]


class Gap(NamedTuple):
    """Directions in which nothing would stop a beam; angles in degrees.

    `at` is the middle of the gap, `power_W` the strongest beam that starts or arrives at the
    place that sees it, in this state.
    """

    id: str
    azimuth: Angles
    elevation: Angles
    solid_angle_sr: float
    through: str
    width_mm: float
    at: Point | None = None
    power_W: float = 0.0


class Coverage(NamedTuple):
    """How much of what surrounds a place on the bench is closed."""

    state: str
    from_: str
    covered: float
    gaps: tuple[Gap, ...]


class PanelLoad(NamedTuple):
    """The worst a panel or lid takes, beside what it withstands.

    `governs` is state or fault. The rating speaks in `unit`, in which `value` and `limit` are;
    `margin` is null where nothing shows that it holds, for the `reason`.
    """

    panel: str
    worst_irradiance_W_cm2: float | None
    state: str | None
    withstands_W_cm2: float | None
    margin: float | None
    governs: str | None = None
    fault: str | None = None
    value: float | None = None
    limit: float | None = None
    unit: str | None = None
    exposed_s: float | None = None
    rated_s: float | None = None
    source: str | None = None
    wavelength_nm: float | None = None
    last_at: str | None = None
    shown: bool = False
    reason: str | None = None
    sheet: str = "panel"  # or lid: the two may have one name


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
    """A beam that leaves through a port on purpose, in a state."""

    through: str
    axis: Axis
    w_mm: tuple[float, float]
    power_W: float
    state: str


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
