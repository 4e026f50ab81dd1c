"""How far the light of a lit spot exceeds the limit, the size of the spot taken into account."""

from __future__ import annotations

import math

import numpy as np

from benchlay.exposure import OutOfRange, Pulse
from benchlay.exposure.viewing import viewing_distance_m
from benchlay.optics import moments
from benchlay.tracing.trace import Trace
from benchlay.zones.limits import LimitTable

_MM_PER_M = 1e3
_WHOLE = 1.0 - 1e-6  # of a beam: one that lost less has its full width


def spot_d63_mm(trace: Trace, beam: int) -> float:
    """Return the smaller diameter of a beam's end that holds 63 % of the power, mm.

    That is the root of 2 times the 1/e^2 radius. A beam that something cut, of which a part
    lands, may be as small as a point: 0.
    """
    if float(trace.beams.end_kept[beam]) < _WHOLE:
        return 0.0
    w1, w2, _ = moments.radii(trace.beams.end_moments[:, [beam]])
    return math.sqrt(2.0) * float(min(w1[0], w2[0]))


def scattered_mm(
    trace: Trace, limits: LimitTable, beam: int, light: tuple[float, float, float]
) -> float:
    """Return how far scattered light exceeds the limit, mm; infinite where there is none.

    Parameters
    ----------
    trace : Trace
    limits : LimitTable
    beam : int
        Whose source, wavelength and pulses hold.
    light : (float, float, float)
        Mean power on the surface, W, share scattered, diameter of the spot (63 %), mm.
    """
    power, share, d63_mm = light
    _, mpe, _ = limits.of(trace, np.array([beam]))
    if not float(mpe[0]) > 0.0:
        return math.inf
    s, scene = trace.beams.start, trace.scene
    nm = float(scene.wavelengths_nm[s.wave[beam]])
    at = int(s.variant[beam]), int(s.source[beam]), int(s.wave[beam])
    base_s = float(limits.time_base_s[at])
    lines = trace.placed.states[at[0]].lines(scene.sources[at[1]])
    pulses = next((line.pulse for line in lines if line.wavelength_nm == nm), None)
    shone: float | Pulse = power
    if pulses is not None and pulses.duration_s < base_s:
        energy = power / pulses.rate_hz if pulses.rate_hz > 0.0 else power * base_s
        shone = Pulse(energy, pulses.duration_s, pulses.rate_hz)
    try:
        distance = viewing_distance_m(nm, base_s, shone, spot_d63_mm=d63_mm, reflectance=share)
    except OutOfRange:
        return math.inf
    return _MM_PER_M * distance
