"""Lit surfaces of a state, and what of their light is met at a place.

It takes polygons, so that a check loads it only where there are people, doors or windows.
"""

from __future__ import annotations

from collections.abc import Iterator
from math import pi

from benchlay.checks._check.context import Context
from benchlay.exposure import AccessibleLimit
from benchlay.geometry.polygon import Point
from benchlay.named import NamedTuple
from benchlay.zones.diffuse import Spot, spots
from benchlay.zones.limits import limits_of
from benchlay.zones.sight import Band
from benchlay.zones.upright import nearest_seen_mm

_M2_PER_MM2 = 1e-6


class Lit(NamedTuple):
    """A lit spot with its limit."""

    spot: Spot
    nm: float
    limit: AccessibleLimit


class Met(NamedTuple):
    """Scattered light at a place."""

    spot: Spot
    nm: float
    limit: AccessibleLimit
    far_mm: float
    irradiance_w_m2: float

    @property
    def ratio(self) -> float:
        """Times the limit of a point source."""
        return self.irradiance_w_m2 / self.limit.mpe_w_m2


def lit(context: Context, variant: int) -> tuple[Lit, ...]:
    """Return what is lit in a state and scatters too much; what has no limit is told elsewhere."""
    trace = context.trace
    table = limits_of(trace)
    found = []
    for wave, nm in enumerate(trace.scene.wavelengths_nm.tolist()):
        for spot in spots(trace, table, variant, wave):
            told = context.limits.get((variant, context.source_of(spot.beam), nm))
            if told is not None and told.limit is not None:
                found.append(Lit(spot, nm, told.limit))
    return tuple(found)


def met_at(places: tuple[Lit, ...], point: Point, heights: Band) -> Iterator[Met]:
    """Yield what is met over a point of the plan, at heights (mm above the bench) that count."""
    for spot, nm, limit in places:
        far = nearest_seen_mm(spot.view, spot.opaque, point, heights)
        if far is not None:
            area = pi * far**2 * _M2_PER_MM2
            yield Met(spot, nm, limit, far, spot.reflectance * spot.power_w / area)
