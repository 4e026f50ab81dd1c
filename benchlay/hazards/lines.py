"""The light of a state line by line: which of its beams an eye can meet most of."""

from __future__ import annotations

import math

import numpy as np

from benchlay.checks import Context, LineLimit
from benchlay.exposure.apertures import circle_area_m2
from benchlay.hazards.model import Place
from benchlay.hazards.reach import Way, strongest
from benchlay.named import NamedTuple

_WIDEST_MM = 11.0
"""Of all limiting apertures: what is taken where no limit is known."""


class Lit(NamedTuple):
    """The strongest beam of one line in reach, as the limiting aperture takes it."""

    source: str
    wavelength_nm: float
    told: LineLimit
    beam: int  # of the trace
    at: Place  # from where on it can be reached
    power_w: float  # through the aperture
    exposure_w_m2: float  # over the aperture
    ratio: float  # to the limit; infinite where there is none


def by_line(context: Context, way: Way) -> list[tuple[int, int]]:
    """Return the lines (numbers of source and wavelength) of some beams, in order."""
    s = context.trace.beams.start
    return sorted(set(zip(s.source[way.beams].tolist(), s.wave[way.beams].tolist(), strict=True)))


def of_line(context: Context, way: Way, key: tuple[int, int]) -> Way:
    """Return the beams of one line."""
    s = context.trace.beams.start
    own = (s.source[way.beams] == key[0]) & (s.wave[way.beams] == key[1])
    return way.take(np.flatnonzero(own))


def lit(context: Context, way: Way) -> Lit:
    """Return the strongest of one line's beams in reach."""
    start, first = context.trace.beams.start, int(way.beams[0])
    source, nm = context.source_of(first), context.wavelength_nm(first)
    told = context.limits[int(start.variant[first]), source, nm]
    aperture_mm = _WIDEST_MM if told.limit is None else told.limit.aperture_mm
    best, power = strongest(context, way, aperture_mm)
    beam = int(way.beams[best])
    return Lit(
        source,
        nm,
        told,
        beam,
        context.point(start.position[beam] + way.from_mm[best] * start.direction[beam]),
        power,
        power / circle_area_m2(aperture_mm),
        math.inf if told.limit is None else power / told.limit.accessible_w,
    )
