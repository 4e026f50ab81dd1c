"""Correction factors and time breakpoints of IEC 60825-1:2014.

Every interval is [low, high): a value at a boundary belongs to the row that begins there.
Wavelengths are vacuum wavelengths in nm, durations in s, angles in mrad. The factors take
arrays as well, which broadcast (`benchlay.exposure.broadcast`).
Factors marked "from memory" were recalled from table 9 and clause 4.3 of the 2014
edition; the others stand in public texts as well.

References
----------
.. [1] IEC 60825-1:2014, Safety of laser products, part 1 (edition 3), table 9.
.. [2] ICNIRP (2013). Guidelines on limits of exposure to laser radiation of
   wavelengths between 180 nm and 1000 um. Health Physics 105(3), 271-295.
"""

# The numbers of the standard are the content of this file, and the rows give them
# their names.
# ruff: noqa: PLR2004

from __future__ import annotations

import math

from benchlay.exposure.broadcast import broadcast
from benchlay.exposure.errors import OutOfRange

SHORTEST_NM = 180.0
LONGEST_NM = 1e6
SHORTEST_S = 1e-13
LONGEST_S = 3e4
RETINA_NM = (400.0, 1400.0)
VISIBLE_NM = (400.0, 700.0)
ALPHA_MIN_MRAD = 1.5
_ALPHA_LARGEST_MRAD = 100.0
_SLACK = 1e-12
# Wavelength below which a row holds, nm, and Ti, s.
_TI_ROWS = (
    (1050.0, 5e-6),
    (1400.0, 13e-6),
    (1500.0, 1e-3),
    (1800.0, 10.0),
    (2600.0, 1e-3),
)


def _within(value: float, low: float, high: float) -> float | None:
    # 100 fs or 1 mm, converted by a product, may miss the end by its last bit.
    if not low * (1.0 - _SLACK) <= value <= high * (1.0 + _SLACK):
        return None
    return min(max(float(value), low), high)


def check_wavelength(wavelength_nm: float) -> float:
    """Return the wavelength if limits exist for it, 180 nm to 1 mm inclusive.

    Raises
    ------
    OutOfRange
        If it lies outside, or is not a number.
    """
    kept = _within(wavelength_nm, SHORTEST_NM, LONGEST_NM)
    if kept is None:
        msg = (
            f"no exposure limit exists at {wavelength_nm:g} nm: the standard covers 180 nm to 1 mm"
        )
        raise OutOfRange(msg)
    return kept


def check_duration(duration_s: float) -> float:
    """Return the duration if limits exist for it, 1e-13 s to 30000 s inclusive.

    Raises
    ------
    OutOfRange
        If it lies outside, or is not a number.
    """
    kept = _within(duration_s, SHORTEST_S, LONGEST_S)
    if kept is None:
        msg = (
            f"no exposure limit is given for a duration of {duration_s:g} s: "
            "the limits cover 1e-13 s to 30000 s"
        )
        raise OutOfRange(msg)
    return kept


def check_alpha(alpha_mrad: float) -> float:
    """Return the angle if it can be one: finite, zero or more.

    Raises
    ------
    OutOfRange
        If it is negative, infinite or not a number.
    """
    if not 0.0 <= alpha_mrad < math.inf:
        msg = f"the angular subtense must be 0 mrad or more, got {alpha_mrad:g} mrad"
        raise OutOfRange(msg)
    return float(alpha_mrad)


def _inside(wavelength_nm: float, low: float, high: float, name: str) -> None:
    if not low <= wavelength_nm < high:
        msg = f"{name} is defined from {low:g} nm to {high:g} nm, got {wavelength_nm:g} nm"
        raise OutOfRange(msg)


def is_retinal(wavelength_nm: float) -> bool:
    """Tell whether light of this wavelength reaches the retina: 400 to 1400 nm."""
    return RETINA_NM[0] <= wavelength_nm < RETINA_NM[1]


def is_visible(wavelength_nm: float) -> bool:
    """Tell whether the wavelength counts as visible: 400 to 700 nm."""
    return VISIBLE_NM[0] <= wavelength_nm < VISIBLE_NM[1]


@broadcast
def c1_j_m2(duration_s: float) -> float:
    """Thermal dose of the ultraviolet, C1 = 5600 t^(1/4), in J/m2."""
    return 5.6e3 * math.pow(duration_s, 0.25)


@broadcast
def c2_j_m2(wavelength_nm: float) -> float:
    """Photochemical dose C2 from 180 to 315 nm, in J/m2 (from memory)."""
    _inside(wavelength_nm, 180.0, 315.0, "C2")
    return 30.0 if wavelength_nm < 302.5 else math.pow(10.0, 0.2 * (wavelength_nm - 295.0))


@broadcast
def t1_s(wavelength_nm: float) -> float:
    """Time at which C1 reaches C2, 302.5 to 315 nm, in s (from memory)."""
    _inside(wavelength_nm, 302.5, 315.0, "T1")
    return 1e-15 * math.pow(10.0, 0.8 * (wavelength_nm - 295.0))


@broadcast
def c3(wavelength_nm: float) -> float:
    """Photochemical factor C3 from 400 to 600 nm."""
    _inside(wavelength_nm, 400.0, 600.0, "C3")
    return 1.0 if wavelength_nm < 450.0 else math.pow(10.0, 0.02 * (wavelength_nm - 450.0))


@broadcast
def c4(wavelength_nm: float) -> float:
    """Absorption factor C4 from 400 to 1400 nm."""
    _inside(wavelength_nm, *RETINA_NM, "C4")
    if wavelength_nm < 700.0:
        return 1.0
    return math.pow(10.0, 0.002 * (wavelength_nm - 700.0)) if wavelength_nm < 1050.0 else 5.0


@broadcast
def c7(wavelength_nm: float) -> float:
    """Factor C7 for absorption before the retina, 400 to 1400 nm (from memory)."""
    _inside(wavelength_nm, *RETINA_NM, "C7")
    if wavelength_nm < 1150.0:
        return 1.0
    if wavelength_nm < 1200.0:
        return math.pow(10.0, 0.018 * (wavelength_nm - 1150.0))
    return 8.0 + math.pow(10.0, 0.04 * (wavelength_nm - 1250.0))


@broadcast
def alpha_max_mrad(duration_s: float) -> float:
    """Angle beyond which a larger source brings no relief, in mrad (from memory)."""
    if duration_s < 625e-6:
        return 5.0
    return 200.0 * math.sqrt(duration_s) if duration_s < 0.25 else _ALPHA_LARGEST_MRAD


@broadcast
def c6(alpha_mrad: float, duration_s: float) -> float:
    """Extended-source factor C6; 1 for a source of 1.5 mrad or less.

    Parameters
    ----------
    alpha_mrad : float
        Angle the source (not the beam) subtends at the eye, mrad.
    duration_s : float
        Exposure duration, s.
    """
    if alpha_mrad <= ALPHA_MIN_MRAD:
        return 1.0
    return min(alpha_mrad, alpha_max_mrad(duration_s)) / ALPHA_MIN_MRAD


@broadcast
def t2_s(alpha_mrad: float) -> float:
    """Time T2 from which eye movements keep the thermal limit constant, in s."""
    if alpha_mrad <= ALPHA_MIN_MRAD:
        return 10.0
    if alpha_mrad > _ALPHA_LARGEST_MRAD:
        return 100.0
    return 10.0 * math.pow(10.0, (alpha_mrad - ALPHA_MIN_MRAD) / 98.5)


@broadcast
def gamma_ph_mrad(duration_s: float) -> float:
    """Return the acceptance angle of the photochemical limit, in mrad."""
    if duration_s < 100.0:
        return 11.0
    return 1.1 * math.sqrt(duration_s) if duration_s < 1e4 else 110.0


@broadcast
def ti_s(wavelength_nm: float) -> float:
    """Time Ti within which pulses act as one, 400 nm to 1 mm, in s (from memory)."""
    if not RETINA_NM[0] <= wavelength_nm <= LONGEST_NM:
        msg = f"Ti is defined from 400 nm to 1 mm, got {wavelength_nm:g} nm"
        raise OutOfRange(msg)
    for below_nm, value_s in _TI_ROWS:
        if wavelength_nm < below_nm:
            return value_s
    return 1e-7


@broadcast
def c5(
    pulses: float,
    pulse_s: float,
    wavelength_nm: float,
    exposure_s: float,
    *,
    alpha_mrad: float = ALPHA_MIN_MRAD,
) -> float:
    """Factor C5 that lowers the thermal limit of a pulse in a train (from memory).

    Parameters
    ----------
    pulses : float
        Number of pulses within the smaller of the exposure and T2.
    pulse_s, exposure_s : float
        Duration of one pulse and of the whole exposure, s.
    wavelength_nm : float
        400 to 1400 nm.
    alpha_mrad : float
        Angular subtense of the source, mrad.

    Notes
    -----
    Clause 4.3 f of the 2014 edition. Older editions used N^(-1/4) without a floor; the
    two sets must never be mixed.
    """
    _inside(wavelength_nm, *RETINA_NM, "C5")
    if alpha_mrad > _ALPHA_LARGEST_MRAD:
        return 1.0
    if pulse_s <= ti_s(wavelength_nm):
        if exposure_s <= 0.25 or pulses <= 600.0:
            return 1.0
        # Between 600 and 625 pulses the formula exceeds one; it never raises a limit.
        return min(1.0, max(0.4, 5.0 * math.pow(pulses, -0.25)))
    if alpha_mrad <= 5.0 or pulses <= 1.0:
        return 1.0
    floor = 0.4 if alpha_mrad <= alpha_max_mrad(pulse_s) else 0.2
    return max(floor, math.pow(pulses, -0.25))
