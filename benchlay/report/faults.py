"""The review of single faults as plain data, field by field what its JSON says."""

from __future__ import annotations

from typing import TYPE_CHECKING, TypeAlias

from benchlay.named import NamedTuple

if TYPE_CHECKING:
    from benchlay.report.details import PanelLoad
    from benchlay.report.model import Point

Settings: TypeAlias = tuple[float, float]
"""From and to, in degrees."""


class FaultFinding(NamedTuple):
    """Hazardous light that a fault sends out, or astray inside."""

    check: str
    message: str
    source: str
    wavelength_nm: float
    last_at: str
    through: str
    power_W: float
    limit_W: float
    times_limit: float
    at: Point
    direction: Point


class FanRow(NamedTuple):
    """Where the light goes that a fault sends out; angles in degrees, azimuth anticlockwise."""

    origin: Point
    azimuth: Settings
    elevation: Settings
    reach_mm: float


class FaultRow(NamedTuple):
    """One fault in one state; what is null does not apply."""

    fault: str
    element: str
    kind: str
    state: str
    outcome: str
    power_W: float | None
    through: str | None
    at: Point | None
    direction: Point | None
    findings: tuple[FaultFinding, ...]
    range: Settings | None
    ranges: tuple[Settings, ...]
    setting_deg: float | None
    times_limit: float | None
    cases: int
    reason: str | None
    number: str | None = None  # #1: of its fan on the plan
    fan: FanRow | None = None


class Resolution(NamedTuple):
    """How finely settings were gone through.

    Up to the first surface and beyond, rays between neighbouring settings were held against the
    bench at most `step_mm` apart; ends of ranges in which light gets out are known within
    `range_deg`, of those in which it ends astray inside within `stray_range_deg`.
    """

    step_mm: float
    range_deg: float
    stray_range_deg: float
    narrowest_gap_mm: float


class WindowRow(NamedTuple):
    """A window in a panel's opening, at one wavelength.

    `density` is at normal incidence, null where it lets nothing through; `needed_density` is for
    the strongest beam that comes to it in any state or by any fault, `needed_density_full` for
    all that a source emits.
    """

    window: str
    opening: str
    wavelength_nm: float
    density: float | None
    arriving_W: float | None
    state: str | None
    fault: str | None
    needed_density: float | None
    needed_density_full: float | None
    enough: bool | None
    enough_for_full: bool | None


class OpenedRow(NamedTuple):
    """What an access panel or lid gives access to while it is open."""

    panel: str
    sheet: str
    state: str
    access: str
    power_W: float | None
    times_limit: float | None
    source: str | None
    wavelength_nm: float | None
    last_at: str | None
    at: Point | None
    direction: Point | None
    inside_W: float | None
    inside_times_limit: float | None


class FaultsResult(NamedTuple):
    """The review of single faults of one layout."""

    layout: str
    sha256: str
    states: tuple[str, ...]
    cases: int
    passed_over: int
    faults: tuple[FaultRow, ...]
    resolution: Resolution
    assumed: tuple[str, ...]
    panels: tuple[PanelLoad, ...] = ()
    windows: tuple[WindowRow, ...] = ()
    opened: tuple[OpenedRow, ...] = ()

    def count(self, outcome: str) -> int:
        """Count the faults with an outcome."""
        return sum(fault.outcome == outcome for fault in self.faults)
