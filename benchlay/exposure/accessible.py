"""What tracer and checks compare beams with: the accessible limit.

The eye's exposure limit for a point source, times the area of its limiting aperture.
Light is compared by mean power, so the limit of a pulse is turned into the mean power
of a train of such pulses; the energy of one pulse is given beside it.
"""

from __future__ import annotations

import math
from typing import TYPE_CHECKING

from benchlay.exposure.apertures import circle_area_m2
from benchlay.exposure.errors import OutOfRange
from benchlay.exposure.factors import (
    RETINA_NM,
    check_duration,
    check_wavelength,
    is_visible,
)
from benchlay.exposure.limits import EDITION, Limit, eye_limit
from benchlay.named import NamedTuple

if TYPE_CHECKING:
    from benchlay.exposure.trains import Train

_LONG_VISIBLE_S = 100.0
_LONG_ULTRAVIOLET_S = 3e4
# Below this an invisible beam gets its default: nothing makes anyone look away from it.
_SHORTEST_INVISIBLE_S = 10.0


class Pulse(NamedTuple):
    """Pulses of a source; a rate of zero is one single pulse.

    Attributes
    ----------
    energy_j : float
        Energy of one pulse, J; the limit does not depend on it.
    duration_s : float
        Full width at half maximum, s.
    rate_hz : float
        Repetition rate, Hz.
    """

    energy_j: float
    duration_s: float
    rate_hz: float

    def mean_power_w(self, time_base_s: float) -> float:
        """Mean power that is compared with `AccessibleLimit.accessible_w`, W.

        A single pulse is spread over the time base, as the limit is.
        """
        return self.energy_j * (self.rate_hz or 1.0 / time_base_s)


class AccessibleLimit(NamedTuple):
    """The eye's limit through its aperture.

    Attributes
    ----------
    wavelength_nm : float
        Vacuum wavelength, nm.
    time_base_s : float
        The time base used; longer than the one asked for where the assumptions say so.
    mpe_w_m2 : float
        Limit as mean irradiance, W/m2.
    aperture_mm : float
        Diameter of the limiting aperture, mm.
    accessible_w : float
        `mpe_w_m2` times the aperture's area: mean power, W.
    accessible_j : float or None
        Energy of one pulse through the aperture, J; None for continuous light.
    governs : str
        The rule and the kind of harm that set the limit.
    edition : str
        Edition of the standard.
    source : str
        Edition, table, and what was recalled.
    assumptions : tuple of str
        What must hold for the number to apply.
    """

    wavelength_nm: float
    time_base_s: float
    mpe_w_m2: float
    aperture_mm: float
    accessible_w: float
    accessible_j: float | None
    governs: str
    edition: str
    source: str
    assumptions: tuple[str, ...]


def default_time_base_s(wavelength_nm: float) -> float:
    """Time base when none is written: 100 s from 400 nm up, 30000 s below.

    Raises
    ------
    OutOfRange
        If no limit exists at this wavelength.
    """
    return (
        _LONG_ULTRAVIOLET_S if check_wavelength(wavelength_nm) < RETINA_NM[0] else _LONG_VISIBLE_S
    )


def accessible_limit(
    wavelength_nm: float, time_base_s: float | None = None, pulse: Pulse | None = None
) -> AccessibleLimit:
    """Limit for the power of a beam that an eye could meet.

    Parameters
    ----------
    wavelength_nm : float
        Vacuum wavelength, nm.
    time_base_s : float, optional
        Duration of the exposure, s; `default_time_base_s` if not given. Less than
        10 s holds for visible light alone (400 to 700 nm): other light is judged by
        its default, and the assumptions say so.
    pulse : Pulse, optional
        The source's pulses; None for continuous light.

    Raises
    ------
    OutOfRange
        If no limit exists for these values.

    Notes
    -----
    Where the rules for pulses have apertures of different sizes (from 1400 nm up) the
    one that allows the least energy through its own aperture is reported, which is the
    stricter for a narrow beam.

    Examples
    --------
    >>> limit = accessible_limit(532.0)
    >>> limit.mpe_w_m2, limit.aperture_mm, round(limit.accessible_w * 1e3, 3)
    (10.0, 7.0, 0.385)
    """
    wl = check_wavelength(wavelength_nm)
    exposure_s, notes = _time_base(wl, time_base_s)
    if pulse is None:
        limit = eye_limit(wl, exposure_s)
        return _continuous(limit, exposure_s, notes)
    return _pulsed(wl, exposure_s, pulse, notes)


def _time_base(wl: float, wanted_s: float | None) -> tuple[float, tuple[str, ...]]:
    default_s = default_time_base_s(wl)
    if wanted_s is None:
        return default_s, ()
    wanted_s = check_duration(wanted_s)
    if wanted_s >= _SHORTEST_INVISIBLE_S:
        return wanted_s, ()
    if is_visible(wl):
        note = (
            f"a time base of {wanted_s:g} s holds only for accidental viewing "
            "of visible light; the aversion response is not reliable"
        )
        return wanted_s, (note,)
    note = (
        f"a time base of {wanted_s:g} s was asked for, but only visible "
        f"light makes an eye turn away: {default_s:g} s was used"
    )
    return default_s, (note,)


def _continuous(limit: Limit, exposure_s: float, notes: tuple[str, ...]) -> AccessibleLimit:
    mpe = limit.irradiance_w_m2
    return AccessibleLimit(
        wavelength_nm=limit.wavelength_nm,
        time_base_s=exposure_s,
        mpe_w_m2=mpe,
        aperture_mm=limit.aperture_mm,
        accessible_w=mpe * circle_area_m2(limit.aperture_mm),
        accessible_j=None,
        governs=limit.governs,
        edition=EDITION,
        source=limit.source,
        assumptions=limit.assumptions + notes,
    )


def _pulsed(wl: float, exposure_s: float, pulse: Pulse, notes: tuple[str, ...]) -> AccessibleLimit:
    if not 0.0 <= pulse.energy_j < math.inf:
        msg = f"a pulse's energy must be 0 J or more, got {pulse.energy_j:g} J"
        raise OutOfRange(msg)
    from benchlay.exposure.trains import Train

    train = Train(pulse.duration_s, pulse.rate_hz)
    if pulse.duration_s >= exposure_s:
        limit = eye_limit(wl, exposure_s)
        dose = limit.irradiance_w_m2 * pulse.duration_s
        notes += ("a pulse outlasts the time base: its power is judged as continuous light",)
    else:
        limit = _strictest(wl, exposure_s, train)
        dose = limit.value
    # A single pulse is spread over the time base; see `Pulse.mean_power_w`.
    rate_hz = pulse.rate_hz or 1.0 / exposure_s
    area = circle_area_m2(limit.aperture_mm)
    return AccessibleLimit(
        wavelength_nm=wl,
        time_base_s=exposure_s,
        mpe_w_m2=dose * rate_hz,
        aperture_mm=limit.aperture_mm,
        accessible_w=dose * rate_hz * area,
        accessible_j=dose * area,
        governs=limit.governs,
        edition=EDITION,
        source=limit.source,
        assumptions=limit.assumptions + notes,
    )


def _strictest(wl: float, exposure_s: float, train: Train) -> Limit:
    from benchlay.exposure.trains import as_limit, eye_rules

    limits = [
        as_limit(eye_limit(wl, rule.duration_s), rule) for rule in eye_rules(wl, exposure_s, train)
    ]
    return min(limits, key=lambda a: a.value * circle_area_m2(a.aperture_mm))
