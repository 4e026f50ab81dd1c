"""Hazard zones of one state, numbered, labelled and listed."""

from __future__ import annotations

from collections.abc import Iterable

from benchlay.sheets.contents import Zone as DrawnZone
from benchlay.sheets.drafting.legs import limit_words
from benchlay.sheets.layers import wavelength_words
from benchlay.zones import Zone
from benchlay.zones.words import above_words, number, with_unit

_KINDS = {"direct": "direct beam", "diffuse": "scattered light", "over": "beam above the enclosure"}


def zones_drawn(zones: Iterable[Zone], state: str, decimal: str) -> tuple[DrawnZone, ...]:
    """Return the zones of a state, the largest first."""
    own = [zone for zone in zones if zone.state == state]
    own.sort(key=lambda zone: (-zone.area_m2, zone.wavelength_nm, zone.kind, zone.polygon))
    return tuple(_drawn(zone, f"Z{n}", decimal) for n, zone in enumerate(own, start=1))


def _drawn(zone: Zone, name: str, decimal: str) -> DrawnZone:
    wavelength = wavelength_words(zone.wavelength_nm, decimal)
    reach = f"reach {with_unit(zone.reach_m, 'm', decimal=decimal)}"
    makers = "; ".join(zone.makers)
    power = with_unit(zone.power_w, "W", decimal=decimal)
    limit = limit_words(zone.limit_w, zone.aperture_mm, zone.time_base_s, decimal)
    area = f"{number(zone.area_m2, 2, decimal)} m²"
    return DrawnZone(
        name,
        zone.kind,
        zone.polygon,
        (f"{zone.kind} {wavelength}", reach, above_words(zone.ratio, decimal)),
        (
            f"{_KINDS[zone.kind]} {wavelength}",
            f"limit {limit}",
            above_words(zone.ratio, decimal),
            f"{reach}, {area}",
            f"up to {power}: {makers}",
        ),
    )
