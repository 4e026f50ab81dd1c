"""The accessible limit of every line of every source, in every state."""

from __future__ import annotations

import numpy as np

from benchlay.exposure import EDITION, OutOfRange, Pulse, accessible_limit
from benchlay.layout.light import Line
from benchlay.named import NamedTuple
from benchlay.scene.tables import Floats, Ints
from benchlay.tracing.trace import Trace


class LimitTable(NamedTuple):
    """Limits by (state, source, wavelength); NaN where a source has no such line.

    A line for which no limit exists has a limit of 0 W: all of it then counts as exceeding,
    and `unknown` says so.
    """

    accessible_w: Floats  # (V, S, L)
    mpe_w_m2: Floats  # (V, S, L)
    aperture_mm: Floats  # (V, S, L)
    time_base_s: Floats  # (V, S, L)
    unknown: tuple[str, ...]
    edition: str = EDITION

    def of(self, trace: Trace, beams: Ints) -> tuple[Floats, Floats, Floats]:
        """Return accessible power (W), irradiance (W/m2) and aperture (mm) for some beams."""
        s = trace.beams.start
        at = s.variant[beams], s.source[beams], s.wave[beams]
        return self.accessible_w[at], self.mpe_w_m2[at], self.aperture_mm[at]


def limits_of(trace: Trace) -> LimitTable:
    """Return the limits of all lines of a trace, each for its own pulses and time base."""
    scene = trace.scene
    shape = (len(scene.variants), len(scene.sources), len(scene.wavelengths_nm))
    tables = np.full((4, *shape), np.nan)
    number = {nm: i for i, nm in enumerate(scene.wavelengths_nm.tolist())}
    unknown: list[str] = []
    for variant, state in enumerate(trace.placed.states):
        time_base = state.layout.limits.time_base_s
        for source, name in enumerate(scene.sources):
            for line in state.lines(name):
                at = (slice(None), variant, source, number[line.wavelength_nm])
                tables[at], why = _limit(line, time_base)
                if why:
                    unknown.append(f"no exposure limit for {name}: {why}")
    accessible, mpe, aperture, times = tables
    return LimitTable(accessible, mpe, aperture, times, tuple(dict.fromkeys(unknown)))


def _limit(line: Line, time_base_s: float | None) -> tuple[tuple[float, ...], str]:
    pulse = None
    if line.pulse is not None:
        pulse = Pulse(line.pulse.energy_j, line.pulse.duration_s, line.pulse.rate_hz)
    try:
        found = accessible_limit(line.wavelength_nm, time_base_s, pulse)
    except OutOfRange as error:
        return (0.0, 0.0, _WIDEST_MM, np.nan), str(error)
    return (found.accessible_w, found.mpe_w_m2, found.aperture_mm, found.time_base_s), ""


_WIDEST_MM = 11.0  # of all limiting apertures: the largest zone where nothing is known
