"""Matt surfaces that are struck: from how far off an eye meets no more than its limit.

The distance is that of the zones (`benchlay.zones.viewing`), which take the size of the spot
into account; beside it stands that of a point.
"""

from __future__ import annotations

import math

import shapely
from shapely.geometry.base import BaseGeometry

from benchlay.checks import Context
from benchlay.exposure.apertures import circle_area_m2
from benchlay.exposure.viewing import NEAREST_M
from benchlay.hazards.model import Diffuse, Place
from benchlay.hazards.places import ROUNDING_MM, beyond, enclosed_area
from benchlay.hazards.reach import INSIDE
from benchlay.named import NamedTuple
from benchlay.zones import LimitTable
from benchlay.zones.diffuse import Spot, spots
from benchlay.zones.viewing import scattered_mm

_MM_PER_M = 1e3
_DECIMALS = 6  # of a metre


class Struck(NamedTuple):
    """A surface that scatters more than the limit of one aperture.

    `far_m` is how far its light exceeds the limit, `point_m` how far a point's would.
    `outside_m` is how near it can be met beyond the enclosure's line, None where the zone of it
    ends within.
    """

    surface: str
    source: str
    wavelength_nm: float
    at: Place
    power_W: float
    reflectance: float
    spot_mm: float
    far_m: float
    point_m: float
    outside_m: float | None


def struck_in(context: Context, limits: LimitTable, variant: int) -> tuple[Struck, ...]:
    """Return the struck surfaces of a state, by wavelength, the strongest first.

    Parameters
    ----------
    context : Context
    limits : LimitTable
        Of all lines, from `benchlay.zones.limits_of`.
    variant : int
        Number of the state.
    """
    trace = context.trace
    area = enclosed_area(context.layout(variant))
    return tuple(
        _struck(context, limits, spot, area)
        for wave in range(len(trace.scene.wavelengths_nm))
        for spot in spots(trace, limits, variant, wave)
    )


def _struck(
    context: Context, limits: LimitTable, spot: Spot, enclosed: BaseGeometry | None
) -> Struck:
    far, point = (
        scattered_mm(context.trace, limits, spot.beam, (spot.power_w, spot.reflectance, mm))
        for mm in (spot.d63_mm, 0.0)
    )
    return Struck(
        spot.name or f"the {spot.sink}",
        context.source_of(spot.beam),
        context.wavelength_nm(spot.beam),
        spot.at,
        spot.power_w,
        spot.reflectance,
        spot.d63_mm,
        round(far / _MM_PER_M, _DECIMALS),
        round(point / _MM_PER_M, _DECIMALS),
        _outside_m(spot, enclosed),
    )


def met_w(one: Struck, distance_m: float, aperture_mm: float) -> float:
    """Return what an aperture takes of a surface's light at a distance, along its normal, W."""
    irradiance = one.reflectance * one.power_W / (math.pi * distance_m**2)
    return min(one.reflectance * one.power_W, irradiance * circle_area_m2(aperture_mm))


def met_at_m(one: Struck, where: str) -> float | None:
    """Return how near to a surface its light can be met on one side of the enclosure, m."""
    return NEAREST_M if where == INSIDE else one.outside_m


def _outside_m(spot: Spot, enclosed: BaseGeometry | None) -> float | None:
    if enclosed is None:
        return NEAREST_M
    outside = beyond(spot.area, enclosed)
    if outside.is_empty:
        return None
    nearest = float(shapely.distance(outside, shapely.Point(spot.at[:2]))) - ROUNDING_MM
    return max(NEAREST_M, nearest / _MM_PER_M)


def viewing(struck: tuple[Struck, ...]) -> tuple[Diffuse, ...]:
    """Return the viewing distance of struck surfaces, the longest first."""
    rows = [
        Diffuse(
            one.surface,
            one.wavelength_nm,
            one.at,
            one.power_W,
            one.reflectance,
            one.spot_mm,
            one.spot_mm / one.far_m if one.far_m > 0.0 else math.inf,  # mm/m is mrad
            one.far_m,
            one.point_m,
        )
        for one in struck
    ]
    return tuple(sorted(rows, key=lambda row: (-row.distance_m, row.surface, row.wavelength_nm)))
