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
from typing import Literal

from benchlay.exposure.apertures import circle_area_m2, eye_aperture_mm
from benchlay.exposure.errors import OutOfRange
from benchlay.exposure.factors import (
    ALPHA_MIN_MRAD,
    c1_j_m2,
    c2_j_m2,
    c3,
    c4,
    c6,
    c7,
    check_alpha,
    check_duration,
    check_wavelength,
    is_retinal,
    is_visible,
    t1_s,
    t2_s,
    ti_s,
)
from benchlay.exposure.tables import infrared
from benchlay.named import NamedTuple


class Level(StrEnum):
    """The four sets of emission limits (1M and 2M share those of 1 and 2)."""

    ONE = "1"
    TWO = "2"
    THREE_R = "3R"
    THREE_B = "3B"


class Emission(NamedTuple):
    """A limit of emission: a power in W or an energy in J, as the table writes it."""

    value: float
    unit: Literal["W", "J"]
    governs: str = "thermal"

    def energy_j(self, duration_s: float) -> float:
        """Energy that the limit allows in a duration, J."""
        return self.value if self.unit == "J" else self.value * duration_s

    def power_w(self, duration_s: float) -> float:
        """Power that the limit allows, even over a duration, W."""
        return self.value if self.unit == "W" else self.value / duration_s


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
    Emission(value=0.00039, unit='W', governs='thermal')
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
            return _class_3b(wl, t)


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
        return _ultraviolet_1(wl, t)
    if wl >= 1400.0:
        return _infrared(wl, t)
    candidates = [_retina_1(wl, t, alpha)]
    early = wl < 484.0 and ALPHA_MIN_MRAD < alpha <= 82.0
    if wl < 600.0 and t >= (1.0 if early else 10.0):
        blue = (3.9e-3, "J") if t < 100.0 else (3.9e-5, "W")
        candidates.append(_emission(blue[0] * c3(wl), blue[1], "photochemical"))
    if wl >= 1250.0:
        candidates.append(_class_3b(wl, t)._replace(governs="anterior"))
    return min(candidates, key=lambda e: e.energy_j(t))


def _emission(value: float, unit: str, governs: str = "thermal") -> Emission:
    return Emission(value, "J" if unit == "J" else "W", governs)


def _class_2(wl: float, t: float, alpha: float) -> Emission | None:
    if not is_visible(wl):
        return None
    if t < 0.25:
        return _class_1(wl, t, alpha)
    return Emission(1e-3 * c6(alpha, t), "W")


def _class_3r(wl: float, t: float, alpha: float) -> Emission | None:
    if wl < 302.5:
        return None
    if wl < 400.0:
        return _ultraviolet_3r(wl, t)
    if wl >= 1400.0:
        return _infrared_3r(wl, t)
    found = _retina_3r(wl, t, alpha)
    if wl < 1250.0:
        return found
    cap = _class_3b(wl, t)._replace(governs="anterior")
    return min((found, cap), key=lambda e: e.energy_j(t))


def _ultraviolet_1(wl: float, t: float) -> Emission:
    if t < 1e-9:
        return Emission(2.4e4, "W")
    if wl < 302.5:
        return Emission(2.4e-5, "J", "photochemical")
    if wl < 315.0:
        dose = _dose_302(wl, t)
        return Emission(7.9e-7 * dose, "J", "thermal or photochemical")
    if t < 10.0:
        return Emission(7.9e-7 * c1_j_m2(t), "J")
    long = (7.9e-3, "J") if t < 1e3 else (7.9e-6, "W")
    return _emission(*long, governs="photochemical")


def _ultraviolet_3r(wl: float, t: float) -> Emission:
    if t < 1e-9:
        return Emission(1.2e5, "W")
    if wl < 315.0:
        return Emission(4e-6 * _dose_302(wl, t), "J", "thermal or photochemical")
    if t < 10.0:
        return Emission(4e-6 * c1_j_m2(t), "J")
    long = (4e-2, "J") if t < 1e3 else (4e-5, "W")
    return _emission(*long, governs="photochemical")


def _dose_302(wl: float, t: float) -> float:
    return c1_j_m2(t) if t < 10.0 and t <= t1_s(wl) else c2_j_m2(wl)


def _retina_1(wl: float, t: float, alpha: float) -> Emission:
    return _retina(wl, t, alpha, _CLASS_1)


def _retina_3r(wl: float, t: float, alpha: float) -> Emission:
    if is_visible(wl) and t >= 0.25:
        return Emission(5e-3 * c6(alpha, t), "W")
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


class _InfraredRow(NamedTuple):
    """Power below 1 ns, W; energy until a time, J and s; then slope t^power, J."""

    shortest_w: float
    flat_j: float
    until_s: float
    slope: float
    power: float


def _infrared_row(wl: float) -> _InfraredRow:
    if 1500.0 <= wl < 1800.0:
        return _InfraredRow(8e6, 8e-3, 0.35, 1.8e-2, 0.75)
    if wl < 2600.0:
        return _InfraredRow(8e5, 8e-4, 1e-3, 4.4e-3, 0.25)
    return _InfraredRow(8e4, 8e-5, 1e-7, 4.4e-3, 0.25)


def _infrared(wl: float, t: float) -> Emission:
    if wl >= 4000.0:
        # Here the standard gives the exposure limit itself.
        cell = infrared(wl, t)
        area = circle_area_m2(eye_aperture_mm(wl, t))
        return _emission(cell.value * area, cell.unit[0])
    if t >= 10.0:
        return Emission(1e-2, "W")
    row = _infrared_row(wl)
    if t < 1e-9:
        return Emission(row.shortest_w, "W")
    if t < row.until_s:
        return Emission(row.flat_j, "J")
    if t >= 0.35 and not 1500.0 <= wl < 1800.0:
        return Emission(1e-2 * t, "J")
    return Emission(row.slope * math.pow(t, row.power), "J")


def _infrared_3r(wl: float, t: float) -> Emission:
    base = _infrared(wl, t)
    return base._replace(value=5.0 * base.value)


def _class_3b(wl: float, t: float) -> Emission:
    if wl < 302.5:
        rows = (3.8e5, 3.8e-4, 1.5e-3)
    elif wl < 315.0:
        rows = (1.25e4 * c2_j_m2(wl), 1.25e-5 * c2_j_m2(wl), 5e-5 * c2_j_m2(wl))
    elif wl < 400.0 or wl >= 1400.0:
        rows = (1.25e8, 0.125, 0.5)
    elif wl < 1050.0:
        rows = (3e7 * c4(wl), 0.03 * c4(wl), 0.5)
    else:
        rows = (1.5e8, 0.15, 0.5)
    until_s = 0.06 * c4(wl) if 400.0 <= wl < 1050.0 else 0.25
    if t < 1e-9:
        return Emission(rows[0], "W", "class 3B")
    return Emission(rows[1], "J", "class 3B") if t < until_s else Emission(rows[2], "W", "class 3B")
