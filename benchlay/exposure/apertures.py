"""Limiting apertures: the circles over which an exposure is averaged.

Table A.6 of IEC 60825-1:2014 (table number from memory; 7 mm is public).
"""

# The numbers of the standard are the content of this file, and the rows give them
# their names.
# ruff: noqa: PLR2004

from __future__ import annotations

import math

from benchlay.exposure.broadcast import broadcast
from benchlay.exposure.factors import check_duration, check_wavelength


@broadcast
def eye_aperture_mm(wavelength_nm: float, duration_s: float) -> float:
    """Diameter of the eye's limiting aperture, in mm.

    Parameters
    ----------
    wavelength_nm : float
        Vacuum wavelength, nm.
    duration_s : float
        Duration of the exposure that the limit belongs to, s; it matters from
        1400 nm to 0.1 mm only.

    Raises
    ------
    OutOfRange
        If no limit exists there.
    """
    wl, t = check_wavelength(wavelength_nm), check_duration(duration_s)
    if wl < 400.0:
        return 1.0
    if wl < 1400.0:
        return 7.0
    if wl >= 1e5:
        return 11.0
    if t <= 0.35:
        return 1.0
    return 1.5 * t**0.375 if t < 10.0 else 3.5


@broadcast
def skin_aperture_mm(wavelength_nm: float) -> float:
    """Diameter of the skin's limiting aperture, in mm."""
    return 3.5 if check_wavelength(wavelength_nm) < 1e5 else 11.0


@broadcast
def circle_area_m2(diameter_mm: float) -> float:
    """Area of a circle, in m2, from its diameter in mm.

    >>> round(circle_area_m2(7.0) * 1e6, 2)
    38.48
    """
    return math.pi / 4.0 * (diameter_mm * 1e-3) ** 2
