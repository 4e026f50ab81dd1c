"""Rows of the tables of emission limits outside 400 to 1400 nm, and those of Class 3B.

Tables 3 to 8 of IEC 60825-1:2014. All numbers are from memory but the 0.5 W and 0.03 J of
Class 3B, which stand in public texts. Callers have checked the ranges.
"""

# The numbers of the standard are the content of this file.
# ruff: noqa: PLR2004

from __future__ import annotations

import math
from typing import Literal

from benchlay.exposure.apertures import circle_area_m2, eye_aperture_mm
from benchlay.exposure.factors import c1_j_m2, c2_j_m2, c4, t1_s
from benchlay.exposure.tables import infrared
from benchlay.named import NamedTuple


class Emission(NamedTuple):
    """A limit of emission: a power in W or an energy in J, as the table writes it.

    `from_memory` is False where the number stands in a public text too.
    """

    value: float
    unit: Literal["W", "J"]
    governs: str = "thermal"
    from_memory: bool = True

    def energy_j(self, duration_s: float) -> float:
        """Energy that the limit allows in a duration, J."""
        return self.value if self.unit == "J" else self.value * duration_s

    def power_w(self, duration_s: float) -> float:
        """Power that the limit allows, even over a duration, W."""
        return self.value if self.unit == "W" else self.value / duration_s


def as_emission(value: float, unit: str, governs: str = "thermal") -> Emission:
    """Make a limit of a number and a unit that begins with W or J."""
    return Emission(value, "J" if unit == "J" else "W", governs)


def ultraviolet_1(wl: float, t: float) -> Emission:
    """Class 1 below 400 nm."""
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
    return as_emission(*long, governs="photochemical")


def ultraviolet_3r(wl: float, t: float) -> Emission:
    """Class 3R from 302.5 to 400 nm."""
    if t < 1e-9:
        return Emission(1.2e5, "W")
    if wl < 315.0:
        return Emission(4e-6 * _dose_302(wl, t), "J", "thermal or photochemical")
    if t < 10.0:
        return Emission(4e-6 * c1_j_m2(t), "J")
    long = (4e-2, "J") if t < 1e3 else (4e-5, "W")
    return as_emission(*long, governs="photochemical")


def _dose_302(wl: float, t: float) -> float:
    return c1_j_m2(t) if t < 10.0 and t <= t1_s(wl) else c2_j_m2(wl)


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


def infrared_1(wl: float, t: float) -> Emission:
    """Class 1 from 1400 nm up."""
    if wl >= 4000.0:
        # Here the standard gives the exposure limit itself.
        cell = infrared(wl, t)
        area = circle_area_m2(eye_aperture_mm(wl, t))
        return as_emission(cell.value * area, cell.unit[0])
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


def infrared_3r(wl: float, t: float) -> Emission:
    """Class 3R from 1400 nm up."""
    base = infrared_1(wl, t)
    return base._replace(value=5.0 * base.value)


def class_3b(wl: float, t: float) -> Emission:
    """Class 3B, the whole range."""
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
    if t < until_s:
        return Emission(rows[1], "J", "class 3B", from_memory=rows[1] != 0.03)
    return Emission(rows[2], "W", "class 3B", from_memory=rows[2] != 0.5)
