"""Accessible emission limits of the classes of IEC 60825-1:2014.

The classes' tables are rounded on their own: the limit of Class 1 is not exactly the
eye's exposure limit times its aperture, and must not replace it. All numbers of this
file are from memory (tables 3 to 8; table numbers from memory too) but for these, which
stand in public texts: 5 mW and 1 mW for visible light, 0.5 W and 0.03 J for Class 3B,
0.039 mW for blue light.
"""

# The numbers of the standard are the content of this file.
# ruff: noqa: PLR2004

from __future__ import annotations

import math
from enum import StrEnum
from typing import TYPE_CHECKING

from benchlay.exposure.broadcast import broadcast, broadcast_as
from benchlay.exposure.emission_rows import (
    Emission,
    as_emission,
    class_3b,
    infrared_1,
    infrared_3r,
    ultraviolet_1,
    ultraviolet_3r,
)
from benchlay.exposure.errors import OutOfRange
from benchlay.exposure.factors import (
    ALPHA_MIN_MRAD,
    c3,
    c4,
    c6,
    c7,
    check_alpha,
    check_duration,
    check_wavelength,
    is_retinal,
    is_visible,
    t2_s,
    ti_s,
)
from benchlay.named import NamedTuple

if TYPE_CHECKING:
    from benchlay.exposure.broadcast import Floats, Words


__all__ = ["Emission", "Emissions", "Level", "emission_limit", "thermal_emission_j"]


class Level(StrEnum):
    """The four sets of emission limits (1M and 2M share those of 1 and 2)."""

    ONE = "1"
    TWO = "2"
    THREE_R = "3R"
    THREE_B = "3B"


class Emissions(NamedTuple):
    """Limits of arrays of questions, as arrays; NaN where there is no such class."""

    value: Floats
    unit: Words
    governs: Words
    from_memory: Floats


@broadcast_as(Emissions)
def emission_limit(
    level: Level,
    wavelength_nm: float,
    duration_s: float,
    *,
    alpha_mrad: float = ALPHA_MIN_MRAD,
) -> Emission | None:
    """Limit of one emission or pulse, or None where the class does not exist.

    Class 2 is for visible light alone, and no Class 3R is taken below 302.5 nm.

    Parameters
    ----------
    level : Level
        Which set of limits.
    wavelength_nm : float
        Vacuum wavelength, nm.
    duration_s : float
        Duration of the emission, s.
    alpha_mrad : float, keyword-only
        Angular subtense of the source, mrad; a point source by default.

    Raises
    ------
    OutOfRange
        If no limit exists for these values.

    Examples
    --------
    >>> emission_limit(Level.ONE, 633.0, 100.0)
    Emission(value=0.00039, unit='W', governs='thermal', from_memory=True)
    >>> emission_limit(Level.TWO, 1064.0, 0.25) is None
    True
    """
    wl, t = check_wavelength(wavelength_nm), check_duration(duration_s)
    alpha = check_alpha(alpha_mrad)
    match level:
        case Level.ONE:
            return _class_1(wl, t, alpha)
        case Level.TWO:
            return _class_2(wl, t, alpha)
        case Level.THREE_R:
            return _class_3r(wl, t, alpha)
        case Level.THREE_B:
            return class_3b(wl, t)


@broadcast
def thermal_emission_j(
    level: Level,
    wavelength_nm: float,
    duration_s: float,
    *,
    alpha_mrad: float = ALPHA_MIN_MRAD,
) -> float:
    """Thermal part alone of a class's limit from 400 to 1400 nm, J (for C5).

    Raises
    ------
    OutOfRange
        If there is none: outside the retina's range, or for Class 3B.
    """
    wl, t = check_wavelength(wavelength_nm), check_duration(duration_s)
    if not is_retinal(wl) or level is Level.THREE_B:
        msg = f"class {level} has no thermal limit of the retina at {wl:g} nm"
        raise OutOfRange(msg)
    if level is Level.TWO and t >= 0.25:
        return 1e-3 * c6(alpha_mrad, t) * t
    if level is Level.THREE_R:
        return _retina_3r(wl, t, alpha_mrad).energy_j(t)
    return _retina_1(wl, t, alpha_mrad).energy_j(t)


def _class_1(wl: float, t: float, alpha: float) -> Emission:
    if wl < 400.0:
        return ultraviolet_1(wl, t)
    if wl >= 1400.0:
        return infrared_1(wl, t)
    candidates = [_retina_1(wl, t, alpha)]
    early = wl < 484.0 and ALPHA_MIN_MRAD < alpha <= 82.0
    if wl < 600.0 and t >= (1.0 if early else 10.0):
        blue = (3.9e-3, "J") if t < 100.0 else (3.9e-5, "W")
        # What a public text gives is the long one of 400 to 450 nm.
        recalled = t < 100.0 or c3(wl) != 1.0
        blue_limit = as_emission(blue[0] * c3(wl), blue[1], "photochemical")
        candidates.append(blue_limit._replace(from_memory=recalled))
    if wl >= 1250.0:
        candidates.append(class_3b(wl, t)._replace(governs="anterior"))
    return min(candidates, key=lambda e: e.energy_j(t))


def _class_2(wl: float, t: float, alpha: float) -> Emission | None:
    if not is_visible(wl):
        return None
    if t < 0.25:
        return _class_1(wl, t, alpha)
    return Emission(1e-3 * c6(alpha, t), "W", from_memory=alpha > ALPHA_MIN_MRAD)


def _class_3r(wl: float, t: float, alpha: float) -> Emission | None:
    if wl < 302.5:
        return None
    if wl < 400.0:
        return ultraviolet_3r(wl, t)
    if wl >= 1400.0:
        return infrared_3r(wl, t)
    found = _retina_3r(wl, t, alpha)
    if wl < 1250.0:
        return found
    cap = class_3b(wl, t)._replace(governs="anterior")
    return min((found, cap), key=lambda e: e.energy_j(t))


def _retina_1(wl: float, t: float, alpha: float) -> Emission:
    return _retina(wl, t, alpha, _CLASS_1)


def _retina_3r(wl: float, t: float, alpha: float) -> Emission:
    if is_visible(wl) and t >= 0.25:
        return Emission(5e-3 * c6(alpha, t), "W", from_memory=alpha > ALPHA_MIN_MRAD)
    return _retina(wl, t, alpha, _CLASS_3R)


class _RetinaRow(NamedTuple):
    """Energies up to 10 ps, up to Ti, and per t^0.75, J; power from 10 s up, W.

    The second three are those from 1050 nm up, where C4 is contained in them.
    """

    near: tuple[float, float, float]
    far: tuple[float, float, float]
    long_w: float


_CLASS_1 = _RetinaRow((3.8e-8, 7.7e-8, 7e-4), (3.8e-7, 7.7e-7, 3.5e-3), 3.9e-4)
_CLASS_3R = _RetinaRow((1.9e-7, 3.8e-7, 3.5e-3), (1.9e-6, 3.8e-6, 1.8e-2), 2e-3)


def _retina(wl: float, t: float, alpha: float, row: _RetinaRow) -> Emission:
    if t >= 10.0:
        return _retina_long(wl, t, alpha, row)
    shortest, flat, slope = row.far if wl >= 1050.0 else row.near
    factor = c6(alpha, t) * (c7(wl) if wl >= 1050.0 else c4(wl))
    if t < 1e-11:
        return Emission(shortest * factor, "J")
    if t < ti_s(wl):
        return Emission(flat * factor, "J")
    return Emission(slope * factor * math.pow(t, 0.75), "J")


def _retina_long(wl: float, t: float, alpha: float, row: _RetinaRow) -> Emission:
    factor = c4(wl) * c7(wl)
    if alpha <= ALPHA_MIN_MRAD:
        return Emission(row.long_w * factor, "W")
    factor *= row.near[2] * c6(alpha, t)
    t2 = t2_s(alpha)
    if t <= t2:
        return Emission(factor * math.pow(t, 0.75), "J")
    return Emission(factor * math.pow(t2, -0.25), "W")
