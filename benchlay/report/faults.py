"""The review of single faults as plain data, field by field what its JSON says."""

from __future__ import annotations

from typing import TYPE_CHECKING, TypeAlias

from benchlay.named import NamedTuple

if TYPE_CHECKING:
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


class Resolution(NamedTuple):
    """How finely settings were gone through.

    Up to the first surface and beyond, rays between neighbouring settings were held against the
    bench at most `step_mm` apart; ends of ranges are known within `range_deg`.
    """

    step_mm: float
    range_deg: float
    narrowest_gap_mm: float


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

    def count(self, outcome: str) -> int:
        """Count the faults with an outcome."""
        return sum(fault.outcome == outcome for fault in self.faults)
