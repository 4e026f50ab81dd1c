"""Light of several wavelengths at once: what adds up, and what stands apart.

Exposures that harm the same tissue in the same way add as ratios to their limits, and the
sum must not exceed one. Heat and photochemistry of the retina are summed apart; light below
315 nm stands alone; 315 to 400 nm and the infrared from 1400 nm up meet at the front of the
eye (table 1 of IEC 60825-1:2014 for exposures at one time; from memory).
"""

from __future__ import annotations

import math
from collections.abc import Mapping, Sequence
from enum import StrEnum

from benchlay.exposure.accessible import Pulse
from benchlay.exposure.factors import ALPHA_MIN_MRAD, check_wavelength, is_retinal
from benchlay.exposure.limits import (
    ANTERIOR_FROM_NM,
    eye_limit,
    eye_photochemical_limit_j_m2,
    eye_thermal_limit_j_m2,
    skin_limit,
)
from benchlay.exposure.trains import DoseOf, Train, rules
from benchlay.named import NamedTuple

_ALONE_BELOW_NM = 315.0


class Tissue(StrEnum):
    """What is harmed, and how: ratios add within one of these, never across."""

    CORNEA_SHORT = "front of the eye, below 315 nm"
    CORNEA = "front of the eye, 315 to 400 nm and the infrared"
    RETINA_HEAT = "retina, heat"
    RETINA_BLUE = "retina, photochemical"
    SKIN_SHORT = "skin, below 315 nm"
    SKIN = "skin"


Ratios = Mapping[Tissue, float]
"""Exposure over limit by tissue, of light of one wavelength."""


class Sum(NamedTuple):
    """The worst tissue, and its sum of ratios; above one the limits are exceeded."""

    tissue: Tissue
    ratio: float


def eye_ratios(
    wavelength_nm: float,
    exposure_s: float,
    exposure: float,
    pulse: Pulse | None = None,
    *,
    alpha_mrad: float = ALPHA_MIN_MRAD,
) -> dict[Tissue, float]:
    """Ratios of one wavelength to its limits, for every tissue of the eye it reaches.

    Parameters
    ----------
    wavelength_nm, exposure_s : float
        Vacuum wavelength, nm, and duration of the whole exposure, s.
    exposure : float
        Averaged over the limiting aperture: W/m2 for continuous light, J/m2 of one pulse
        for pulses. Where the rules for pulses have apertures of different sizes (from
        1400 nm up) it must be the largest of their averages.
    pulse : Pulse, optional
        The pulses (their energy plays no part); None for continuous light.
    alpha_mrad : float, keyword-only
        Angular subtense of the source, mrad.

    Raises
    ------
    OutOfRange
        If no limit exists for these values.

    Examples
    --------
    >>> {str(k): v for k, v in eye_ratios(440.0, 1000.0, 2.0).items()}
    {'retina, heat': 0.2, 'retina, photochemical': 2.0}
    """
    wl = check_wavelength(wavelength_nm)
    if not is_retinal(wl):
        tissue = Tissue.CORNEA_SHORT if wl < _ALONE_BELOW_NM else Tissue.CORNEA
        limit = _least(wl, exposure_s, pulse, lambda t: eye_limit(wl, t).dose_j_m2)
        return {tissue: exposure / limit}

    def heat(t: float) -> float:
        return eye_thermal_limit_j_m2(wl, t, alpha_mrad=alpha_mrad)

    def blue(t: float) -> float:
        return eye_photochemical_limit_j_m2(wl, t, alpha_mrad=alpha_mrad)

    found = {Tissue.RETINA_HEAT: exposure / _least(wl, exposure_s, pulse, heat, alpha_mrad)}
    dose = _least(wl, exposure_s, pulse, blue)
    if math.isfinite(dose):
        found[Tissue.RETINA_BLUE] = exposure / dose
    if wl >= ANTERIOR_FROM_NM:
        front = _least(wl, exposure_s, pulse, lambda t: skin_limit(wl, t).dose_j_m2)
        found[Tissue.CORNEA] = exposure / front
    return found


def skin_ratios(
    wavelength_nm: float, exposure_s: float, exposure: float, pulse: Pulse | None = None
) -> dict[Tissue, float]:
    """Ratio of one wavelength to the limit of the skin. Parameters as of `eye_ratios`."""
    wl = check_wavelength(wavelength_nm)
    tissue = Tissue.SKIN_SHORT if wl < _ALONE_BELOW_NM else Tissue.SKIN
    limit = _least(wl, exposure_s, pulse, lambda t: skin_limit(wl, t).dose_j_m2)
    return {tissue: exposure / limit}


def _least(
    wl: float,
    exposure_s: float,
    pulse: Pulse | None,
    dose_of: DoseOf,
    alpha_mrad: float | None = None,
) -> float:
    """Limit of one kind of harm: W/m2, or J/m2 of a pulse. With an angle, C5 applies."""
    if pulse is None or pulse.duration_s >= exposure_s:
        irradiance = dose_of(exposure_s) / exposure_s
        return irradiance if pulse is None else irradiance * pulse.duration_s
    found = rules(
        Train(pulse.duration_s, pulse.rate_hz),
        exposure_s,
        dose_of,
        wavelength_nm=wl,
        thermal_of=None if alpha_mrad is None else dose_of,
        alpha_mrad=alpha_mrad or ALPHA_MIN_MRAD,
    )
    return min(rule.per_pulse for rule in found)


def sums(parts: Sequence[Ratios]) -> dict[Tissue, float]:
    """Sum the ratios of all wavelengths, each tissue by itself.

    Examples
    --------
    >>> green, red = eye_ratios(532.0, 0.25, 15.0), eye_ratios(633.0, 0.25, 15.0)
    >>> {str(k): round(v, 3) for k, v in sums([green, red]).items()}
    {'retina, heat': 1.179}
    """
    return {
        tissue: math.fsum(part.get(tissue, 0.0) for part in parts)
        for tissue in Tissue
        if any(tissue in part for part in parts)
    }


def worst(parts: Sequence[Ratios]) -> Sum | None:
    """Find the tissue with the largest sum; None for no light at all."""
    found = sums(parts)
    if not found:
        return None
    tissue = max(found, key=lambda one: found[one])
    return Sum(tissue, found[tissue])


def densities(parts: Sequence[Ratios]) -> tuple[float, ...]:
    """Optical density of eyewear at each wavelength, for all of them at once.

    Behind the eyewear the sum of every tissue is one at most. In each tissue the strong
    wavelengths are weakened to one level, the same for all, and the weak that lie below it
    anyway not at all; a wavelength's density is the largest that one of its tissues asks.

    Examples
    --------
    Alone, each of two lasers at a hundred times the limit needs a density of 2:

    >>> [round(d, 3) for d in densities([{Tissue.SKIN: 100.0}, {Tissue.SKIN: 100.0}])]
    [2.301, 2.301]
    >>> [round(d, 3) for d in densities([{Tissue.SKIN: 100.0}, {Tissue.SKIN: 0.1}])]
    [2.046, 0.0]
    """
    needed = [0.0] * len(parts)
    for tissue in Tissue:
        level = _level([part.get(tissue, 0.0) for part in parts])
        for i, part in enumerate(parts):
            ratio = part.get(tissue, 0.0)
            if ratio > level:
                needed[i] = max(needed[i], math.log10(ratio / level))
    return tuple(needed)


def _level(ratios: Sequence[float]) -> float:
    """Find the level c with a sum of min(ratio, c) of one; infinite if nothing is too much."""
    if math.fsum(ratios) <= 1.0:
        return math.inf
    weak, room = 0, 1.0
    for ratio in sorted(ratios):
        level = room / (len(ratios) - weak)
        if ratio > level:
            return level
        weak, room = weak + 1, room - ratio
    return 1.0  # only rounding leads here
