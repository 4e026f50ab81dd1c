"""What a review says where it is asked for in full: routes, ledgers, zones, beams handed over."""

from __future__ import annotations

from collections.abc import Iterable, Sequence

from benchlay.report.details import ControlledArea, Zone
from benchlay.report.model import Review
from benchlay.results.coverage import coverage_rows
from benchlay.results.handed_over import handed_over
from benchlay.results.ledger import ledgers
from benchlay.results.routes import route_results
from benchlay.tracing import Trace
from benchlay.zones import Zone as DrawnZone
from benchlay.zones import Zones, controlled_areas


def with_details(
    review: Review, trace: Trace, states: Sequence[str], zones: Zones | None
) -> Review:
    """Return a review with what is known of some states beyond their findings."""
    variants = [trace.scene.variants.index(name) for name in states]
    return review._replace(
        routes=tuple(row for variant in variants for row in route_results(trace, variant)),
        ledger=tuple(row for variant in variants for row in ledgers(trace, variant)),
        zones=tuple(_zones(zones.zones if zones else ())),
        controlled_areas=tuple(_controlled(zones)),
        coverage=tuple(
            row for variant in variants for row in coverage_rows(trace, variant, review.findings)
        ),
        handed_over=tuple(row for variant in variants for row in handed_over(trace, variant)),
        not_computed=zones.not_computed if zones else (),
    )


def _zones(zones: Iterable[DrawnZone]) -> Iterable[Zone]:
    for z in zones:
        yield Zone(z.state, z.kind, z.wavelength_nm, z.reason, z.area_m2, z.reach_m, z.polygon)


def _controlled(zones: Zones | None) -> Iterable[ControlledArea]:
    for a in controlled_areas(zones) if zones else ():
        yield ControlledArea(a.state, a.area_m2, a.wavelengths_nm, a.kinds, a.polygon)
