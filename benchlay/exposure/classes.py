"""A first classification of one beam after IEC 60825-1:2014.

What it takes for granted is listed in every result: one wavelength, a point source, a
centred Gaussian beam, lossless optics, a regular train, no fault analysis. A class is
never awarded here: the result says within which limit the beam stays *as modelled*.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from types import MappingProxyType
from typing import Protocol

from benchlay.exposure.accessible import Pulse, default_time_base_s
from benchlay.exposure.apertures import eye_aperture_mm
from benchlay.exposure.cautions import CAUTIONS
from benchlay.exposure.distances import gaussian_fraction
from benchlay.exposure.emission import (
    Emission,
    Level,
    emission_limit,
    thermal_emission_j,
)
from benchlay.exposure.errors import OutOfRange
from benchlay.exposure.factors import check_wavelength, is_retinal, is_visible
from benchlay.exposure.limits import EDITION
from benchlay.exposure.trains import Train, rules
from benchlay.named import NamedTuple

_GLANCE_S = 0.25
# Where the standard's two conditions of measurement apply, nm (from memory).
_AT_DISTANCE_NM = (302.5, 4000.0)
_BINOCULARS_AT_M = 2.0
_NAKED_EYE_AT_M = 0.1
_ASSUMPTIONS: tuple[str, ...] = (
    "one wavelength, a point source, a regular train if pulsed, no fault analysis",
    "C5 is not applied to the limit of class 3B",
)


@dataclass(frozen=True, slots=True)
class GaussianExit:
    """A Gaussian beam as it leaves its source.

    Attributes
    ----------
    waist_w_mm : float
        1/e^2 radius of the waist, mm.
    half_angle_86_rad : float
        1/e^2 half angle of divergence, rad.
    waist_at_m : float
        Where the waist lies, m from the exit.
    """

    waist_w_mm: float
    half_angle_86_rad: float
    waist_at_m: float = 0.0

    def share(self, aperture_mm: float, distance_m: float) -> float:
        """Share of the power through a centred circle at a distance."""
        spread_mm = self.half_angle_86_rad * (distance_m - self.waist_at_m) * 1e3
        w_mm = (self.waist_w_mm**2 + spread_mm**2) ** 0.5
        return gaussian_fraction(aperture_mm / 2.0, w_mm)


@dataclass(frozen=True, slots=True)
class Classification:
    """A class, the limits it was found from, and what both rest on.

    Attributes
    ----------
    name : str
        ``1 1M 2 2M 3R 3B 4``.
    unit : {"W", "J"}
        W for continuous light, J (one pulse) for pulses.
    limits : mapping of str to float or None
        Limit of the classes 1, 2, 3R and 3B in `unit`; None where there is no such
        class at this wavelength.
    naked_eye, binoculars : float
        What conditions 3 and 1 of the standard collect, in `unit`.
    source : str
        Edition, tables, and which limits were recalled.
    assumptions, cautions : tuple of str
        To be printed with the result.
    """

    name: str
    unit: str
    limits: Mapping[str, float | None]
    naked_eye: float
    binoculars: float
    source: str
    assumptions: tuple[str, ...]
    cautions: tuple[str, ...] = CAUTIONS

    @property
    def statement(self) -> str:
        """The result as a sentence that promises no more than was computed."""
        if self.name == "4":
            return "above the limit of class 3B as modelled"
        return f"within the limit of class {self.name} as modelled"


class Beam(Protocol):
    """What a classification asks of a beam: any form of beam that can answer will do."""

    def share(self, aperture_mm: float, distance_m: float) -> float:
        """Share of the power through a circle at its worst place, at a distance from the exit."""


def classify_continuous(
    wavelength_nm: float, power_w: float, beam: Beam | None = None
) -> Classification:
    """Classify continuous light.

    Parameters
    ----------
    wavelength_nm, power_w : float
        Vacuum wavelength, nm, and power, W.
    beam : Beam, optional
        Such as `GaussianExit`. Without it all power is taken through the apertures.

    Raises
    ------
    OutOfRange
        If no limit exists, or the power is negative or not a number.

    Examples
    --------
    >>> classify_continuous(532.0, 4e-3).name
    '3R'
    """
    limits = {level: _continuous_limit(level, wavelength_nm) for level in Level}
    return _classified(wavelength_nm, power_w, "W", limits, beam)


def classify_pulsed(wavelength_nm: float, pulse: Pulse, beam: Beam | None = None) -> Classification:
    """Classify pulses: a train, or one single pulse at a rate of zero.

    Parameters are those of `classify_continuous`, with the pulses for the power.

    Raises
    ------
    OutOfRange
        If no limit exists, or the pulses overlap.
    """
    limits = {level: _pulsed_limit(level, wavelength_nm, pulse) for level in Level}
    return _classified(wavelength_nm, pulse.energy_j, "J", limits, beam)


def time_base_s(level: Level, wavelength_nm: float) -> float:
    """Time base of a class: 0.25 s for class 2 and visible 3R, else the long one."""
    glance = level is Level.TWO or level is Level.THREE_R
    if glance and is_visible(wavelength_nm):
        return _GLANCE_S
    return default_time_base_s(wavelength_nm)


class _Found(NamedTuple):
    value: float
    from_memory: bool


def _continuous_limit(level: Level, wavelength_nm: float) -> _Found | None:
    base_s = time_base_s(level, wavelength_nm)
    limit = emission_limit(level, wavelength_nm, base_s)
    return None if limit is None else _Found(limit.power_w(base_s), limit.from_memory)


def _pulsed_limit(level: Level, wavelength_nm: float, pulse: Pulse) -> _Found | None:
    base_s = time_base_s(level, wavelength_nm)
    train = Train(pulse.duration_s, pulse.rate_hz)
    whole = emission_limit(level, wavelength_nm, base_s)
    if whole is None:
        return None
    if train.pulse_s >= base_s:
        return _Found(whole.power_w(base_s) * train.pulse_s, whole.from_memory)

    def limit(duration_s: float) -> Emission:
        return _present(emission_limit(level, wavelength_nm, duration_s))

    def thermal_j(duration_s: float) -> float:
        return thermal_emission_j(level, wavelength_nm, duration_s)

    lowered = level is not Level.THREE_B and is_retinal(wavelength_nm)
    found = rules(
        train,
        base_s,
        lambda t: limit(t).energy_j(t),
        wavelength_nm=wavelength_nm,
        thermal_of=thermal_j if lowered else None,
    )
    least = min(found, key=lambda rule: rule.per_pulse)
    return _Found(least.per_pulse, least.c5 != 1.0 or limit(least.duration_s).from_memory)


def _present(limit: Emission | None) -> Emission:
    if limit is None:  # whether a class exists depends on the wavelength alone
        msg = "a class exists for one duration and not for another"
        raise AssertionError(msg)
    return limit


def _classified(
    wavelength_nm: float,
    emitted: float,
    unit: str,
    found: dict[Level, _Found | None],
    beam: Beam | None,
) -> Classification:
    if not 0.0 <= emitted < float("inf"):
        msg = f"what is emitted must be finite and not negative, got {emitted:g} {unit}"
        raise OutOfRange(msg)
    limits = {str(k): None if one is None else one.value for k, one in found.items()}
    recalled = [str(k) for k, one in found.items() if one is not None and one.from_memory]
    notes = _ASSUMPTIONS
    naked = binoculars = emitted
    if beam is None:
        notes += ("no beam size given: all light is taken through the apertures",)
    else:
        notes += ("a centred Gaussian beam, lossless optics",)
        naked_share, binoculars_share = _shares(wavelength_nm, beam)
        naked, binoculars = emitted * naked_share, emitted * binoculars_share
    return Classification(
        name=_name(naked, max(naked, binoculars), limits),
        unit=unit,
        limits=MappingProxyType(limits),
        naked_eye=naked,
        binoculars=binoculars,
        source=f"{EDITION}, tables 3 to 8 (numbers of tables from memory{_told(recalled)})",
        assumptions=notes,
    )


def _told(recalled: list[str]) -> str:
    return f"; limits of class {', '.join(recalled)} from memory" if recalled else ""


def _shares(wavelength_nm: float, beam: Beam) -> tuple[float, float]:
    """Share that conditions 3 and 1 collect; without a condition 1, that of 3 twice."""
    wl = check_wavelength(wavelength_nm)
    # The aperture of the longest exposure is the largest, so it never collects less
    # than the aperture that belongs to a shorter rule.
    aperture_mm = eye_aperture_mm(wl, default_time_base_s(wl))
    low, high = _AT_DISTANCE_NM
    if not low <= wl < high:
        share = beam.share(aperture_mm, 0.0)
        return share, share
    widened_mm = 50.0 if is_retinal(wl) else 7.0 * aperture_mm
    return (
        beam.share(aperture_mm, _NAKED_EYE_AT_M),
        beam.share(widened_mm, _BINOCULARS_AT_M),
    )


def _name(naked: float, widest: float, limits: Mapping[str, float | None]) -> str:
    def within(value: float, level: str) -> bool:
        limit = limits[level]
        return limit is not None and value <= limit

    # The larger hazard first: the tables let class 1 exceed 3B above 0.1 mm.
    if not within(widest, "3B"):
        return "4"
    for level in ("1", "2"):
        if within(widest, level):
            return level
        if within(naked, level):
            return f"{level}M"
    for level in ("3R", "3B"):
        if within(widest, level):
            return level
    return "4"
