"""Optical density and the scale numbers of protective eyewear.

Scale numbers follow the table of EN 207:2017 as public copies print it. That table
rests on older exposure limits, so the density must be checked against the limit of
today as well: both results are needed, and eyewear comes last among the measures.

References
----------
.. [1] EN 207:2017, Personal eye-protection equipment: filters and eye-protectors
   against laser radiation, table of scale numbers (public copies).
.. [2] DGUV Information 203-042, Selection and use of laser eyewear.
"""

from __future__ import annotations

import math
from enum import StrEnum
from typing import Literal

from benchlay.exposure.apertures import circle_area_m2
from benchlay.exposure.broadcast import broadcast
from benchlay.exposure.errors import OutOfRange
from benchlay.exposure.factors import check_wavelength
from benchlay.named import NamedTuple

HIGHEST_LEVEL = 10
_TRAIN_S = 5.0  # pulses are counted over 5 s (10 s before 2017)
_FACTOR_PLATEAU_MM = 15.0
_FACTOR_PLATEAU = 100.0
_FACTOR_POWER_W = 10.0
_FACTOR_IRRADIANCE_W_M2 = 1e5


class Mode(StrEnum):
    """Kinds of laser as eyewear tells them apart, by the duration of a pulse."""

    D = "D"
    I = "I"  # noqa: E741 - the letter of the standard
    R = "R"
    M = "M"


class _Row(NamedTuple):
    below_nm: float
    continuous: tuple[float, int]
    pulsed: tuple[float, int]
    shortest: tuple[float, int]
    shortest_unit: Literal["W/m2", "J/m2"]


# A limit is coefficient x 10^(n + exponent), n the scale number.
_ROWS = (
    _Row(315.0, (1.0, -3), (3.0, 1), (3.0, 10), "W/m2"),
    _Row(1400.0, (1.0, 1), (5.0, -3), (1.5, -4), "J/m2"),
    _Row(math.inf, (1.0, 3), (1.0, 2), (1.0, 11), "W/m2"),
)


class ScaleLimit(NamedTuple):
    """What a filter of a scale number must withstand and weaken."""

    value: float
    unit: Literal["W/m2", "J/m2"]


def mode_for(duration_s: float) -> Mode:
    """Mode of a pulse by its duration; light of more than 0.25 s is continuous.

    Raises
    ------
    OutOfRange
        If the duration is not positive.
    """
    if not duration_s > 0.0:
        msg = f"the duration must be positive, got {duration_s:g} s"
        raise OutOfRange(msg)
    for below_s, mode in ((1e-9, Mode.M), (1e-6, Mode.R)):
        if duration_s < below_s:
            return mode
    return Mode.I if duration_s <= 0.25 else Mode.D  # noqa: PLR2004 - the standard's


@broadcast
def optical_density(exposure: float, limit: float) -> float:
    """Density that weakens an exposure to the limit; 0 if it is already below.

    Parameters
    ----------
    exposure, limit : float
        In one unit, W/m2 or J/m2; the exposure averaged over the limiting aperture.

    Raises
    ------
    OutOfRange
        If either is not a finite number, the exposure negative, or the limit not
        positive.

    Examples
    --------
    >>> round(optical_density(3.8e4, 25.5), 2)
    3.17
    """
    if not (0.0 <= exposure < math.inf and 0.0 < limit < math.inf):
        msg = f"no density follows from an exposure of {exposure:g} and a limit of {limit:g}"
        raise OutOfRange(msg)
    return max(0.0, math.log10(exposure / limit)) if exposure > 0.0 else 0.0


def scale_limit(wavelength_nm: float, mode: Mode, level: int) -> ScaleLimit:
    """Limit of a scale number LB1 to LB10.

    Raises
    ------
    OutOfRange
        If there is no such number or wavelength.

    Examples
    --------
    >>> scale_limit(532.0, Mode.D, 6)
    ScaleLimit(value=10000000.0, unit='W/m2')
    """
    if not 1 <= level <= HIGHEST_LEVEL:
        msg = f"scale numbers go from LB1 to LB{HIGHEST_LEVEL}, got {level}"
        raise OutOfRange(msg)
    wl = check_wavelength(wavelength_nm)
    row = next(r for r in _ROWS if wl < r.below_nm)
    if mode is Mode.M:
        (coefficient, exponent), unit = row.shortest, row.shortest_unit
    elif mode is Mode.D:
        (coefficient, exponent), unit = row.continuous, "W/m2"
    else:
        (coefficient, exponent), unit = row.pulsed, "J/m2"
    # float() of a written power is exact to the last bit; 10**n by product is not.
    return ScaleLimit(float(f"{coefficient:g}e{level + exponent}"), unit)


def scale_level(wavelength_nm: float, mode: Mode, load: float) -> int | None:
    """Smallest scale number whose limit is not below the load; None above LB10.

    Parameters
    ----------
    wavelength_nm : float
        Vacuum wavelength, nm.
    mode : Mode
        Kind of laser.
    load : float
        Irradiance or radiant exposure, in the unit of `scale_limit`, W/m2 or J/m2,
        with the factors for pulses and diameter already applied.

    Raises
    ------
    OutOfRange
        If the load is negative or not a number, or no limit exists.
    """
    if not load >= 0.0:
        msg = f"the load must not be negative, got {load:g}"
        raise OutOfRange(msg)
    for level in range(1, HIGHEST_LEVEL + 1):
        if load <= scale_limit(wavelength_nm, mode, level).value:
            return level
    return None


@broadcast
def diameter_factor(d63_mm: float) -> float:
    """Factor F = d^1.7 for what a filter bears over a large spot (from memory).

    1 up to a diameter of 1 mm, d^1.7 to 15 mm, 100 above (that plateau is confirmed by
    published examples). The diameter holds 63 % of the power.

    Raises
    ------
    OutOfRange
        If the diameter is not positive.
    """
    if not d63_mm > 0.0:
        msg = f"the diameter must be positive, got {d63_mm:g} mm"
        raise OutOfRange(msg)
    if d63_mm > _FACTOR_PLATEAU_MM:
        return _FACTOR_PLATEAU
    return math.pow(d63_mm, 1.7) if d63_mm > 1.0 else 1.0


@broadcast
def continuous_load_w_m2(power_w: float, d63_mm: float) -> float:
    """Irradiance to look up for continuous light, the diameter's factor applied, W/m2.

    The factor applies above 10 W or 1e5 W/m2.

    Raises
    ------
    OutOfRange
        If the diameter is not positive.
    """
    factor = diameter_factor(d63_mm) if diameter_factor_applies(power_w, d63_mm) else 1.0
    return power_w / circle_area_m2(d63_mm) * factor


def diameter_factor_applies(power_w: float, d63_mm: float) -> bool:
    """Tell whether the factor for wide beams raises the load of continuous light.

    Raises
    ------
    OutOfRange
        If the diameter is not positive.
    """
    if diameter_factor(d63_mm) == 1.0:
        return False
    irradiance = power_w / circle_area_m2(d63_mm)
    return power_w > _FACTOR_POWER_W or irradiance > _FACTOR_IRRADIANCE_W_M2


class Scale(NamedTuple):
    """Scale numbers that eyewear must bear, one for every mode that is asked of it.

    A level is None where nothing up to LB10 suffices. `d63_mm` is the diameter that they
    were found for.
    """

    levels: tuple[tuple[Mode, int | None], ...]
    d63_mm: float

    @property
    def text(self) -> str | None:
        """As it is marked, such as ``D LB2 + R LB6``; None where no marking suffices."""
        if any(level is None for _, level in self.levels):
            return None
        return " + ".join(f"{mode} LB{level}" for mode, level in self.levels)


def continuous_scale(wavelength_nm: float, power_w: float, d63_mm: float) -> Scale:
    """Scale number for continuous light.

    Parameters
    ----------
    wavelength_nm, power_w : float
        Vacuum wavelength, nm, and power, W.
    d63_mm : float
        Diameter that holds 63 % of the power, mm.

    Examples
    --------
    >>> continuous_scale(532.0, 1.0, 2.0).text
    'D LB6'
    """
    load = continuous_load_w_m2(power_w, d63_mm)
    return Scale(((Mode.D, scale_level(wavelength_nm, Mode.D, load)),), d63_mm)


def pulsed_scale(
    wavelength_nm: float, energy_j: float, pulse_s: float, rate_hz: float, d63_mm: float
) -> Scale:
    """Scale numbers for pulses: one for the pulse, and one for the average power.

    Parameters
    ----------
    wavelength_nm : float
        Vacuum wavelength, nm.
    energy_j, pulse_s, rate_hz : float
        Energy of a pulse, J, its duration, s, and the rate, Hz; 0 for a single pulse.
    d63_mm : float
        Diameter that holds 63 % of the energy, mm.

    Notes
    -----
    The pulse's load is multiplied by N^(1/4), N its number in 5 s. A pulse of more than
    0.25 s is continuous light of its own power.

    Examples
    --------
    >>> pulsed_scale(1064.0, 1e-3, 1e-8, 10.0, 2.0).text
    'D LB3 + R LB6'
    """
    mode = mode_for(pulse_s)
    if mode is Mode.D:
        return continuous_scale(wavelength_nm, energy_j / pulse_s, d63_mm)
    mean = continuous_scale(wavelength_nm, energy_j * rate_hz, d63_mm)
    load = energy_j / circle_area_m2(d63_mm) * train_factor(rate_hz)
    if scale_limit(wavelength_nm, mode, 1).unit == "W/m2":
        load /= pulse_s
    return Scale((*mean.levels, (mode, scale_level(wavelength_nm, mode, load))), d63_mm)


@broadcast
def train_factor(rate_hz: float) -> float:
    """Factor N^(1/4) for repeated pulses, N counted over 5 s, at least 1."""
    return math.pow(max(1.0, rate_hz * _TRAIN_S), 0.25)
