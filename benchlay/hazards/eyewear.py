"""Which eyewear: optical density and scale numbers, for every wavelength present together.

The density weakens the worst exposure, averaged over the limiting aperture, to the limit of
today, at all wavelengths together. The scale number (EN 207:2017, whose table rests on older
limits) is the smallest that bears the beam at its narrowest place in reach and has that
density too; pulses need one for their mode and one, D, for the mean.
"""

from __future__ import annotations

import math
from collections.abc import Iterator, Sequence

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
from benchlay.hazards.lines import Lit, aperture_mm, by_line, held, lit, of_line
from benchlay.hazards.matt import Struck, met_at_m, met_w
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


def eyewear(context: Context, reach: Reach, struck: tuple[Struck, ...]) -> tuple[Eyewear, ...]:
    """Return what eyewear must do in a state: a row for each place and wavelength.

    Every wavelength of the state has its row, also where no light of it can be met. Scattered
    light counts too, as that of a point.
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
            _wave(
                where,
                float(scene.wavelengths_nm[wave]),
                [
                    *_beams(context, way, wave),
                    *_scattered(context, reach.variant, struck, where, wave),
                ],
                context,
            )
            for wave in waves
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


class _Borne(NamedTuple):
    """Light of one line that eyewear must bear: power, W, and diameter (63 %), mm."""

    lit: Lit
    watts: float
    d63_mm: float


def _beams(context: Context, way: Way, wave: int) -> Iterator[_Borne]:
    """Yield the worst beam of each line of a wavelength."""
    for key in by_line(context, way):
        if key[1] == wave:
            own = of_line(context, way, key)
            yield _Borne(lit(context, own), *_hardest(context, own))


def _scattered(
    context: Context, variant: int, struck: tuple[Struck, ...], where: str, wave: int
) -> Iterator[_Borne]:
    """Yield the light that surfaces scatter, where it can be met nearest."""
    nm = float(context.trace.scene.wavelengths_nm[wave])
    for one in struck:
        distance = met_at_m(one, where)
        if one.wavelength_nm != nm or distance is None:
            continue
        told = context.limits[variant, one.source, nm]
        wide = aperture_mm(told)
        power = met_w(one, distance, wide)
        place = None, f"scattered from {one.surface}", one.at
        yield _Borne(held((one.source, nm, told), place, power), power, wide)


def _wave(where: str, nm: float, borne: Sequence[_Borne], context: Context) -> _Wave:
    if not borne:
        nothing = Eyewear(where, nm, 0.0, 0.0, None, None, None, 0.0, *(None,) * 6)
        return _Wave(nothing, {}, ())
    worst = max((one.lit for one in borne), key=lambda one: one.ratio)
    limit = worst.told.limit
    density = None
    if limit is not None:
        density = float(optical_density(worst.exposure_w_m2, limit.mpe_w_m2))
    row = Eyewear(
        where=where,
        wavelength_nm=nm,
        optical_density=None,
        alone=density,
        scale=None,
        beam_mm=min(one.d63_mm for one in borne),
        scale_1_mm=None,
        exposure_W_m2=worst.exposure_w_m2,
        mpe_W_m2=None if limit is None else limit.mpe_w_m2,
        time_base_s=None if limit is None else limit.time_base_s,
        source=worst.source,
        beam=None if worst.beam is None else int(context.numbers[worst.beam]),
        from_=worst.from_,
        at=worst.at,
    )
    levels = tuple(_levels(nm, one.watts, one.lit.told, one.d63_mm) for one in borne)
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
    """Return scale numbers as they are written, one of them with at least the density.

    A scale number is also the density that its filter has at this wavelength, whatever the mode:
    one that is high enough is enough, and otherwise the highest is raised.
    """
    least = math.ceil(density - 1e-9)
    highest: dict[Mode, int] = {}
    for levels in of_lines:
        for mode, level in levels.items():
            highest[mode] = max(highest.get(mode, 0), level)
    if highest and max(highest.values()) < least:
        highest[max(highest, key=lambda mode: (highest[mode], mode))] = least
    return " + ".join(
        f"{mode} LB{highest[mode]}" if highest[mode] <= HIGHEST_LEVEL else f"{mode} above LB10"
        for mode in Mode
        if mode in highest
    )
