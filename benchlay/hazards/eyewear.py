"""Which eyewear: optical density and scale numbers, for every wavelength present together.

The density weakens the worst exposure, averaged over the limiting aperture, to the limit of
today, at all wavelengths together. The scale number (EN 207:2017, whose table rests on older
limits) is the smallest that bears the beam at its narrowest place in reach and has that
density too; pulses need one for their mode and one, D, for the mean.
"""

from __future__ import annotations

import math
from collections.abc import Sequence

import numpy as np

from benchlay.checks import Context, LineLimit
from benchlay.exposure import OutOfRange
from benchlay.exposure.eyewear import (
    HIGHEST_LEVEL,
    Mode,
    continuous_load_w_m2,
    continuous_scale,
    optical_density,
    pulsed_scale,
)
from benchlay.exposure.together import Ratios, densities, eye_ratios
from benchlay.hazards.lines import Lit, by_line, lit, of_line
from benchlay.hazards.model import Eyewear
from benchlay.hazards.reach import INSIDE, OUTSIDE, Reach, Way, narrowest_mm
from benchlay.named import NamedTuple
from benchlay.scene.tables import Floats

_TEST_SPOT_MM = 1.0
"""Filters are tried with a spot of 1 mm (from memory); one at a focus is hit by less light."""


class _Levels(NamedTuple):
    """Scale numbers by mode; one above the last for none that suffices."""

    narrowest: dict[Mode, int]
    of_1_mm: dict[Mode, int]


class _Wave(NamedTuple):
    """The worst light of one wavelength in reach, and what eyewear must bear of all of it."""

    row: Eyewear
    ratios: Ratios
    levels: tuple[_Levels, ...]


def eyewear(context: Context, reach: Reach) -> tuple[Eyewear, ...]:
    """Return what eyewear must do in a state: a row for each place and wavelength.

    Every wavelength of the state has its row, also where no light of it can be met.
    """
    start, scene = context.trace.beams.start, context.trace.scene
    rows = context.beams_of(reach.variant)
    waves = sorted(set(start.wave[rows[start.power[rows] > 0.0]].tolist()))
    places = [(INSIDE, reach.within)]
    if reach.beyond is not None:
        places.append((OUTSIDE, reach.beyond))
    out: list[Eyewear] = []
    for where, way in places:
        found = [
            _wave(context, where, way, float(scene.wavelengths_nm[wave]), wave) for wave in waves
        ]
        together = densities([one.ratios for one in found])
        out += [_finished(one, density) for one, density in zip(found, together, strict=True)]
    return tuple(out)


def _finished(wave: _Wave, together: float) -> Eyewear:
    """Return a row with the density that is enough for all wavelengths, and scale numbers."""
    alone = wave.row.alone
    if alone is None:
        return wave.row
    density = max(alone, together)
    if density <= 0.0:
        return wave.row._replace(optical_density=0.0)
    return wave.row._replace(
        optical_density=density,
        scale=_words([levels.narrowest for levels in wave.levels], density),
        scale_1_mm=_words([levels.of_1_mm for levels in wave.levels], density),
    )


def _wave(context: Context, where: str, way: Way, nm: float, wave: int) -> _Wave:
    keys = [key for key in by_line(context, way) if key[1] == wave]
    lines = [lit(context, of_line(context, way, key)) for key in keys]
    if not lines:
        nothing = Eyewear(where, nm, 0.0, 0.0, None, None, None, 0.0, *(None,) * 6)
        return _Wave(nothing, {}, ())
    worst = max(lines, key=lambda line: line.ratio)
    hardest = [_hardest(context, of_line(context, way, key)) for key in keys]
    levels = tuple(
        _levels(nm, watts, line.told, width)
        for line, (watts, width) in zip(lines, hardest, strict=True)
    )
    mpe = None if worst.told.limit is None else worst.told.limit.mpe_w_m2
    row = Eyewear(
        where=where,
        wavelength_nm=nm,
        optical_density=None,
        alone=None if mpe is None else float(optical_density(worst.exposure_w_m2, mpe)),
        scale=None,
        beam_mm=min(width for _, width in hardest),
        scale_1_mm=None,
        exposure_W_m2=worst.exposure_w_m2,
        mpe_W_m2=mpe,
        time_base_s=None if worst.told.limit is None else worst.told.limit.time_base_s,
        source=worst.source,
        beam=int(context.numbers[worst.beam]),
        from_=context.left_at(worst.beam),
        at=worst.at,
    )
    return _Wave(row, ratios_of(worst), levels)


def _levels(nm: float, watts: float, told: LineLimit, width_mm: float) -> _Levels:
    widths = width_mm, max(width_mm, _TEST_SPOT_MM)
    return _Levels(*(scale_levels(nm, watts, told, mm) for mm in widths))


def ratios_of(line: Lit) -> Ratios:
    """Return the ratios of a line to the eye's limits by tissue; none where there is no limit."""
    limit, pulse = line.told.limit, line.told.pulse
    if limit is None:
        return {}
    exposure = line.exposure_w_m2 if pulse is None else line.exposure_w_m2 / pulse.rate_hz
    try:
        return eye_ratios(line.wavelength_nm, limit.time_base_s, exposure, pulse)
    except OutOfRange:
        return {}


def _hardest(context: Context, way: Way) -> tuple[float, float]:
    """Return power, W, and narrowest diameter (63 %), mm, of the beam that is hardest to bear."""
    start = context.trace.beams.start
    widths: Floats = np.maximum(narrowest_mm(context, way), np.finfo(np.float64).tiny)
    watts: Floats = start.power[way.beams] / start.kept[way.beams]
    worst = int(np.argmax(continuous_load_w_m2.over(watts, widths)))
    return float(watts[worst]), float(widths[worst])


def scale_levels(nm: float, power_w: float, told: LineLimit, d63_mm: float) -> dict[Mode, int]:
    """Return the scale number for every mode that a beam needs; one above the last for none.

    Parameters
    ----------
    nm : float
        Wavelength.
    power_w : float
        Mean power, W.
    told : LineLimit
        Its limit and pulses.
    d63_mm : float
        Diameter with 63 % of the power, mm.
    """
    if told.limit is None:
        return {}
    pulse = told.pulse
    if pulse is None:
        scale = continuous_scale(nm, power_w, d63_mm)
    else:
        energy_j = power_w / pulse.rate_hz
        scale = pulsed_scale(nm, energy_j, pulse.duration_s, pulse.rate_hz, d63_mm)
    return {m: HIGHEST_LEVEL + 1 if level is None else level for m, level in scale.levels}


def _words(of_lines: Sequence[dict[Mode, int]], density: float) -> str:
    """Return scale numbers as they are written, each with at least the density."""
    least = math.ceil(density - 1e-9)
    highest: dict[Mode, int] = {}
    for levels in of_lines:
        for mode, level in levels.items():
            highest[mode] = max(highest.get(mode, 0), level, least)
    return " + ".join(
        f"{mode} LB{highest[mode]}" if highest[mode] <= HIGHEST_LEVEL else f"{mode} above LB10"
        for mode in Mode
        if mode in highest
    )
