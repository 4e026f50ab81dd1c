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
    """The strongest light of one line in reach, as the limiting aperture takes it."""

    source: str
    wavelength_nm: float
    told: LineLimit
    beam: int | None  # of the trace; None for scattered light
    from_: str
    at: Place  # from where on it can be reached; the surface that scatters it
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
    best, power = strongest(context, way, aperture_mm(told))
    beam = int(way.beams[best])
    at = context.point(start.position[beam] + way.from_mm[best] * start.direction[beam])
    return held((source, nm, told), (beam, context.left_at(beam), at), power)


def held(
    line: tuple[str, float, LineLimit], place: tuple[int | None, str, Place], power_w: float
) -> Lit:
    """Return light through the aperture held against the limit of its line.

    Parameters
    ----------
    line : (str, float, LineLimit)
        Source, wavelength in nm, limit and pulses.
    place : (int or None, str, Place)
        Beam, what it left, and where it can be reached.
    power_w : float
        Through the aperture, W.
    """
    told = line[2]
    ratio = math.inf if told.limit is None else power_w / told.limit.accessible_w
    return Lit(*line, *place, power_w, power_w / circle_area_m2(aperture_mm(told)), ratio)


def aperture_mm(told: LineLimit) -> float:
    """Return the diameter of a line's limiting aperture, mm; the widest where there is no limit."""
    return _WIDEST_MM if told.limit is None else told.limit.aperture_mm
