"""The rows of the eye's and the skin's limits, one function a part of the spectrum.

Each returns a `Cell`: the number as the table writes it (an irradiance in W/m2 or a
radiant exposure in J/m2), what kind of harm it guards against, and whether the number
was found in a public text or recalled. Callers have checked the ranges already.
Intervals are [low, high); the small steps where rows meet are real and are kept.

References
----------
.. [1] IEC 60825-1:2014, tables A.1, A.2 and A.5 (table numbers from memory).
.. [2] ICNIRP (2013). Health Physics 105(3), 271-295.
"""

# The numbers of the standard are the content of this file, and the rows give them
# their names.
# ruff: noqa: PLR2004

from __future__ import annotations

from typing import Final, Literal

from benchlay.exposure.factors import (
    ALPHA_MIN_MRAD,
    c1_j_m2,
    c2_j_m2,
    c3,
    c4,
    c6,
    c7,
    t1_s,
    t2_s,
    ti_s,
)
from benchlay.named import NamedTuple

Unit = Literal["W/m2", "J/m2"]
IRRADIANCE: Final = "W/m2"
DOSE: Final = "J/m2"


class Cell(NamedTuple):
    """One number of a table."""

    value: float
    unit: Unit
    governs: str
    from_memory: bool

    def dose_j_m2(self, duration_s: float) -> float:
        """Radiant exposure that the cell allows in a duration, J/m2."""
        return self.value if self.unit == DOSE else self.value * duration_s


def ultraviolet(wl: float, t: float) -> Cell:
    """Limit at the cornea and the skin from 180 to 400 nm."""
    if t < 1e-9:
        return Cell(3e10, IRRADIANCE, "thermal", from_memory=False)
    if wl < 315.0:
        return _ultraviolet_short(wl, t)
    if t < 10.0:
        return Cell(c1_j_m2(t), DOSE, "thermal", from_memory=False)
    if t < 1e3:
        return Cell(1e4, DOSE, "photochemical", from_memory=True)
    return Cell(10.0, IRRADIANCE, "photochemical", from_memory=True)


def _ultraviolet_short(wl: float, t: float) -> Cell:
    if wl >= 302.5 and t < 10.0 and t <= t1_s(wl):
        return Cell(c1_j_m2(t), DOSE, "thermal", from_memory=False)
    return Cell(c2_j_m2(wl), DOSE, "photochemical", from_memory=wl >= 302.5)


def infrared(wl: float, t: float) -> Cell:
    """Limit at the cornea from 1400 nm to 1 mm."""
    if t >= 10.0:
        return Cell(1000.0, IRRADIANCE, "thermal", from_memory=True)
    if 1500.0 <= wl < 1800.0:
        shortest, flat, until = 1e13, 1e4, 10.0
    elif wl < 2600.0:
        shortest, flat, until = 1e12, 1e3, 1e-3
    else:
        shortest, flat, until = 1e11, 100.0, 1e-7
    if t < 1e-9:
        return Cell(shortest, IRRADIANCE, "thermal", from_memory=False)
    if t < until:
        return Cell(flat, DOSE, "thermal", from_memory=False)
    return Cell(5600.0 * t**0.25, DOSE, "thermal", from_memory=False)


def retina_thermal(wl: float, t: float, alpha_mrad: float) -> Cell:
    """Thermal limit of the retina from 400 to 1400 nm, taken at the cornea."""
    far = wl >= 1050.0
    if t >= 10.0:
        return _retina_long(wl, t, alpha_mrad)
    # From 1050 nm up C4 is constant and contained in the tabulated numbers.
    factor = c6(alpha_mrad, t) * (c7(wl) if far else c4(wl))
    if t < ti_s(wl):
        dose = (1e-2 if far else 1e-3) * (1.0 if t < 1e-11 else 2.0)
        return Cell(dose * factor, DOSE, "thermal", from_memory=True)
    dose = (90.0 if far else 18.0) * t**0.75
    recalled = (far and c7(wl) != 1.0) or alpha_mrad > ALPHA_MIN_MRAD
    return Cell(dose * factor, DOSE, "thermal", from_memory=recalled)


def _retina_long(wl: float, t: float, alpha_mrad: float) -> Cell:
    factor = c4(wl) * c7(wl)
    if alpha_mrad <= ALPHA_MIN_MRAD:
        return Cell(10.0 * factor, IRRADIANCE, "thermal", from_memory=True)
    factor *= 18.0 * c6(alpha_mrad, t)
    t2 = t2_s(alpha_mrad)
    if t <= t2:
        return Cell(factor * t**0.75, DOSE, "thermal", from_memory=True)
    return Cell(factor * t2**-0.25, IRRADIANCE, "thermal", from_memory=True)


def retina_photochemical(wl: float, t: float, alpha_mrad: float) -> Cell | None:
    """Photochemical limit of the retina, or None where the standard has none."""
    early = wl < 484.0 and ALPHA_MIN_MRAD < alpha_mrad <= 82.0
    if not 400.0 <= wl < 600.0 or t < (1.0 if early else 10.0):
        return None
    if t < 100.0:
        return Cell(100.0 * c3(wl), DOSE, "photochemical", from_memory=True)
    return Cell(c3(wl), IRRADIANCE, "photochemical", from_memory=True)


def skin(wl: float, t: float) -> Cell:
    """Limit of the skin, whole range, for a small exposed area."""
    if wl < 400.0:
        return ultraviolet(wl, t)
    if wl >= 1400.0:
        return infrared(wl, t)
    if t < 1e-9:
        return Cell(2e11 * c4(wl), IRRADIANCE, "skin", from_memory=True)
    if t < 1e-7:
        return Cell(200.0 * c4(wl), DOSE, "skin", from_memory=True)
    if t < 10.0:
        return Cell(1.1e4 * c4(wl) * t**0.25, DOSE, "skin", from_memory=True)
    return Cell(2000.0 * c4(wl), IRRADIANCE, "skin", from_memory=True)
