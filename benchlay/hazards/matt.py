"""Matt surfaces that are struck: from how far off an eye meets no more than its limit.

See `benchlay.exposure.viewing` for the distance. Of an elliptical spot the smaller diameter
is taken: the smaller angle, the lower limit.
"""

from __future__ import annotations

import math

import shapely
from shapely.geometry.base import BaseGeometry

from benchlay.checks import Context
from benchlay.exposure import OutOfRange, Pulse
from benchlay.exposure.viewing import NEAREST_M, viewing_distance_m
from benchlay.hazards.model import Diffuse, Place
from benchlay.named import NamedTuple
from benchlay.optics import moments
from benchlay.zones import LimitTable
from benchlay.zones.diffuse import Spot, spots
from benchlay.zones.enclosure_line import enclosure_line

_MM_PER_M = 1e3
_DECIMALS = 6  # of a metre


class Struck(NamedTuple):
    """A surface that scatters more than the limit of one aperture.

    `outside_m` is how near its light can be met beyond the enclosure's line, None where the
    zone of it ends within.
    """

    surface: str
    source: str
    wavelength_nm: float
    at: Place
    power_W: float
    reflectance: float
    spot_mm: float
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
    line = enclosure_line(context.layout(variant))
    area = shapely.Polygon(line.corners) if line.enclosed else None
    return tuple(
        _struck(context, spot, area)
        for wave in range(len(trace.scene.wavelengths_nm))
        for spot in spots(trace, limits, variant, wave)
    )


def _struck(context: Context, spot: Spot, enclosed: BaseGeometry | None) -> Struck:
    w1, w2, _ = moments.radii(context.trace.beams.end_moments[:, [spot.beam]])
    return Struck(
        spot.name or f"the {spot.sink}",
        context.source_of(spot.beam),
        context.wavelength_nm(spot.beam),
        spot.at,
        spot.power_w,
        spot.reflectance,
        math.sqrt(2.0) * float(min(w1[0], w2[0])),
        _outside_m(spot, enclosed),
    )


def _outside_m(spot: Spot, enclosed: BaseGeometry | None) -> float | None:
    if enclosed is None:
        return NEAREST_M
    beyond = shapely.difference(spot.area, enclosed)
    if beyond.area <= 0.0:
        return None
    nearest = float(shapely.distance(beyond, shapely.Point(spot.at[:2])))
    return max(NEAREST_M, nearest / _MM_PER_M)


def viewing(context: Context, variant: int, struck: tuple[Struck, ...]) -> tuple[Diffuse, ...]:
    """Return the viewing distance of struck surfaces, the longest first."""
    rows = [_viewed(context, variant, one) for one in struck]
    return tuple(sorted(rows, key=lambda row: (-row.distance_m, row.surface, row.wavelength_nm)))


def _viewed(context: Context, variant: int, one: Struck) -> Diffuse:
    far, point = (_distance_m(context, variant, one, mm) for mm in (one.spot_mm, 0.0))
    return Diffuse(
        one.surface,
        one.wavelength_nm,
        one.at,
        one.power_W,
        one.reflectance,
        one.spot_mm,
        one.spot_mm / far if far > 0.0 else math.inf,  # mm/m is mrad
        far,
        point,
    )


def _distance_m(context: Context, variant: int, one: Struck, spot_mm: float) -> float:
    """Return the viewing distance of a spot, m; infinite where there is no limit."""
    told = context.limits[variant, one.source, one.wavelength_nm]
    if told.limit is None:
        return math.inf
    light: float | Pulse = one.power_W
    if told.pulse is not None and told.pulse.duration_s < told.limit.time_base_s:
        light = told.pulse._replace(energy_j=one.power_W / told.pulse.rate_hz)
    try:
        far = viewing_distance_m(
            one.wavelength_nm,
            told.limit.time_base_s,
            light,
            spot_d63_mm=spot_mm,
            reflectance=one.reflectance,
        )
    except OutOfRange:
        return math.inf
    return round(far, _DECIMALS)
