"""The controlled area of a state: all its hazard zones as one area."""

from __future__ import annotations

import shapely

from benchlay.named import NamedTuple
from benchlay.zones.compose import Zone, Zones
from benchlay.zones.polygons import Ring, rings, united

_MM2_PER_M2 = 1e6


class ControlledArea(NamedTuple):
    """One polygon of the area in which light of some wavelength exceeds its limit.

    Attributes
    ----------
    state : str
    area_m2 : float
    wavelengths_nm : tuple of float
        Of the zones that make it, rising: eyewear in it has to stop them all.
    kinds : tuple of str
        Of those zones: ``direct``, ``diffuse``, ``over``.
    polygon : tuple of rings
        mm; the outer first, the rest holes.
    """

    state: str
    area_m2: float
    wavelengths_nm: tuple[float, ...]
    kinds: tuple[str, ...]
    polygon: tuple[Ring, ...]


def controlled_areas(zones: Zones) -> tuple[ControlledArea, ...]:
    """Return the union of all zones of each state, one entry a polygon.

    It is what the zones are: the area inside a closed enclosure belongs to it, and what
    they could not be computed for (`Zones.not_computed`) is missing from it too.
    """
    found = []
    for state in dict.fromkeys(zone.state for zone in zones.zones):
        own = [zone for zone in zones.zones if zone.state == state]
        areas = [shapely.Polygon(zone.polygon[0], zone.polygon[1:]) for zone in own]
        parts = [_area(state, own, areas, polygon) for polygon in united(shapely.make_valid(areas))]
        found += sorted(parts, key=lambda part: part.polygon)
    return tuple(found)


def _area(
    state: str, zones: list[Zone], areas: list[shapely.Polygon], polygon: shapely.Polygon
) -> ControlledArea:
    meets = shapely.intersects(areas, polygon)
    makers = [zone for zone, met in zip(zones, meets.tolist(), strict=True) if met]
    return ControlledArea(
        state,
        polygon.area / _MM2_PER_M2,
        tuple(sorted({zone.wavelength_nm for zone in makers})),
        tuple(sorted({zone.kind for zone in makers})),
        rings(polygon),
    )
