"""Repeated pulses: the rules of IEC 60825-1:2014, clause 4.3 f.

Every pulse must satisfy all of: the limit of a single pulse; the limit of the whole
exposure shared among its pulses (the average limit); and, on the retina and for pulses
of 0.25 s or less, the thermal limit of a pulse lowered by C5. The rules are the same
for exposures (J/m2) and for emissions (J), so the caller hands over the limit as a
function of duration.
"""

from __future__ import annotations

import math
from collections.abc import Callable, Iterator
from dataclasses import dataclass

from benchlay.exposure.broadcast import broadcast
from benchlay.exposure.errors import OutOfRange
from benchlay.exposure.factors import ALPHA_MIN_MRAD, c5, is_retinal, t2_s, ti_s
from benchlay.exposure.limits import (
    Limit,
    eye_limit,
    eye_thermal_limit_j_m2,
    skin_limit,
)
from benchlay.named import NamedTuple

DoseOf = Callable[[float], float]

_LONGEST_PULSE_FOR_C5_S = 0.25
_GROUPS_FROM_MRAD = 5.0  # the least alpha_max
# A pulse count a hair above a whole number is rounding, not one more pulse.
_COUNT_SLACK = 1e-9
_OVERLAP_SLACK = 1e-9


@dataclass(frozen=True, slots=True)
class Train:
    """A regular train of equal pulses; a rate of zero is one single pulse.

    Attributes
    ----------
    pulse_s : float
        Duration of one pulse (full width at half maximum), s.
    rate_hz : float
        Repetition rate, Hz; 0 for a single pulse.
    """

    pulse_s: float
    rate_hz: float

    def __post_init__(self) -> None:
        """Refuse what is no train of separate pulses."""
        if not (0.0 < self.pulse_s < math.inf and 0.0 <= self.rate_hz < math.inf):
            msg = (
                "a pulse needs a positive duration and a rate of 0 Hz or more, "
                f"got {self.pulse_s:g} s and {self.rate_hz:g} Hz"
            )
            raise OutOfRange(msg)
        if self.pulse_s * self.rate_hz >= 1.0 - _OVERLAP_SLACK:
            msg = (
                f"pulses of {self.pulse_s:g} s at {self.rate_hz:g} Hz overlap: "
                "describe this light as continuous"
            )
            raise OutOfRange(msg)

    def count(self, exposure_s: float) -> float:
        """Most pulses that can begin within an exposure, at least one.

        Rounded up to whole pulses, because a slow train can show one more than rate
        times time says, and the larger count is the larger hazard.
        """
        return max(1.0, float(math.ceil(self.rate_hz * exposure_s * (1.0 - _COUNT_SLACK))))


class Rule(NamedTuple):
    """The most that one pulse may carry by one rule.

    `per_pulse` is in the unit of the dose handed over; `duration_s` is the exposure
    that the limit was looked up for (it decides the aperture); `pulses` the number of
    pulses that share it.
    """

    name: str
    per_pulse: float
    duration_s: float
    pulses: float
    c5: float = 1.0


def rules(
    train: Train,
    exposure_s: float,
    dose_of: DoseOf,
    *,
    wavelength_nm: float,
    thermal_of: DoseOf | None = None,
    alpha_mrad: float = ALPHA_MIN_MRAD,
) -> tuple[Rule, ...]:
    """Every rule that one pulse of the train must satisfy.

    Parameters
    ----------
    train : Train
        The pulses; each shorter than the exposure.
    exposure_s : float
        Duration of the whole exposure, s.
    dose_of : callable
        Limit of a single exposure of a given duration, as a dose.
    wavelength_nm : float
        Vacuum wavelength, nm.
    thermal_of : callable, optional
        The same for the thermal limit of the retina alone; None where C5 does not
        apply (skin, wavelengths outside 400 to 1400 nm, the limits of Class 3B).
    alpha_mrad : float
        Angular subtense of the source, mrad.
    """
    found = [Rule("single pulse", dose_of(train.pulse_s), train.pulse_s, 1.0)]
    if train.rate_hz > 0.0:
        pulses = train.count(exposure_s)
        found.append(Rule("average", dose_of(exposure_s) / pulses, exposure_s, pulses))
        if thermal_of is not None and is_retinal(wavelength_nm):
            found.extend(_thermal_train(train, exposure_s, thermal_of, wavelength_nm, alpha_mrad))
            if alpha_mrad > _GROUPS_FROM_MRAD:
                # There the limit's irradiance rises from 625 us to 0.25 s, so a
                # shorter group of pulses can be judged more strictly than the whole.
                found.extend(_shorter_groups(train, exposure_s, dose_of, wavelength_nm, alpha_mrad))
    return tuple(found)


def _thermal_train(
    train: Train,
    exposure_s: float,
    thermal_of: DoseOf,
    wavelength_nm: float,
    alpha_mrad: float,
) -> Iterator[Rule]:
    if train.pulse_s > _LONGEST_PULSE_FOR_C5_S:
        return
    counted_s = min(exposure_s, t2_s(alpha_mrad))
    ti = ti_s(wavelength_nm)
    together = train.rate_hz * ti
    if together > 1.0 and exposure_s > ti:
        pulses, pulse_s = max(1.0, counted_s / ti), ti
        name = "thermal, pulses within Ti as one"
    else:
        together, pulses, pulse_s = 1.0, train.count(counted_s), train.pulse_s
        name = "thermal, repeated"
    factor = c5(pulses, pulse_s, wavelength_nm, exposure_s, alpha_mrad=alpha_mrad)
    yield Rule(name, thermal_of(pulse_s) * factor / together, pulse_s, pulses, factor)


def _shorter_groups(
    train: Train,
    exposure_s: float,
    dose_of: DoseOf,
    wavelength_nm: float,
    alpha_mrad: float,
) -> Iterator[Rule]:
    """Yield groups of n pulses that last T_n = (n - 1)/rate + pulse.

    Between two breakpoints the limit is c t^p, so the share of a pulse has no minimum
    inside (for p < 1 it rises then falls, for p >= 1 it rises): the ends suffice. The
    end of the exposure is one: its last pulse may end sooner than it does.
    """
    breaks_s = (ti_s(wavelength_nm), 625e-6, 0.25, 1.0, 10.0, t2_s(alpha_mrad), 100.0)
    for end_s in (*breaks_s, exposure_s):
        if not train.pulse_s < end_s <= exposure_s:
            continue
        below = max(1.0, math.ceil((end_s - train.pulse_s) * train.rate_hz))
        for pulses in (below, below + 1.0):
            lasts_s = (pulses - 1.0) / train.rate_hz + train.pulse_s
            if lasts_s <= exposure_s:
                yield Rule("shorter group", dose_of(lasts_s) / pulses, lasts_s, pulses)


def eye_rules(
    wavelength_nm: float,
    exposure_s: float,
    train: Train,
    *,
    alpha_mrad: float = ALPHA_MIN_MRAD,
) -> tuple[Rule, ...]:
    """Rules for the eye, doses in J/m2 at the cornea.

    Raises
    ------
    OutOfRange
        If no limit exists, or a pulse lasts as long as the exposure.
    """
    _shorter_than(train, exposure_s)
    return rules(
        train,
        exposure_s,
        lambda t: eye_limit(wavelength_nm, t, alpha_mrad=alpha_mrad).dose_j_m2,
        wavelength_nm=wavelength_nm,
        thermal_of=lambda t: eye_thermal_limit_j_m2(wavelength_nm, t, alpha_mrad=alpha_mrad),
        alpha_mrad=alpha_mrad,
    )


def skin_rules(wavelength_nm: float, exposure_s: float, train: Train) -> tuple[Rule, ...]:
    """Rules for the skin, doses in J/m2: the single pulse and the average alone.

    Raises
    ------
    OutOfRange
        If no limit exists, or a pulse lasts as long as the exposure.
    """
    _shorter_than(train, exposure_s)
    return rules(
        train,
        exposure_s,
        lambda t: skin_limit(wavelength_nm, t).dose_j_m2,
        wavelength_nm=wavelength_nm,
    )


def _shorter_than(train: Train, exposure_s: float) -> None:
    if train.pulse_s >= exposure_s:
        msg = (
            f"a pulse of {train.pulse_s:g} s fills the whole exposure of "
            f"{exposure_s:g} s: judge it as continuous light"
        )
        raise OutOfRange(msg)


def pulse_limit(
    wavelength_nm: float,
    exposure_s: float,
    train: Train,
    *,
    alpha_mrad: float = ALPHA_MIN_MRAD,
) -> tuple[Limit, Rule]:
    """Eye's limit for one pulse of a train, J/m2, and the rule that governs.

    The `Limit` carries the aperture and the kind of harm of the governing rule.

    Examples
    --------
    >>> limit, rule = pulse_limit(1064.0, 10.0, Train(pulse_s=1e-8, rate_hz=1000.0))
    >>> round(limit.value, 6), rule.name, round(rule.c5, 6)
    (0.01, 'thermal, repeated', 0.5)
    """
    rule = min(
        eye_rules(wavelength_nm, exposure_s, train, alpha_mrad=alpha_mrad),
        key=lambda r: r.per_pulse,
    )
    base = eye_limit(wavelength_nm, rule.duration_s, alpha_mrad=alpha_mrad)
    return as_limit(base, rule), rule


@broadcast
def eye_pulse_limit_j_m2(
    wavelength_nm: float,
    exposure_s: float,
    pulse_s: float,
    rate_hz: float,
    *,
    alpha_mrad: float = ALPHA_MIN_MRAD,
) -> float:
    """Eye's limit for one pulse of a train, J/m2; all arguments may be arrays.

    Parameters are those of `pulse_limit`, the train by its pulse, s, and rate, Hz.

    Examples
    --------
    >>> eye_pulse_limit_j_m2(1064.0, 10.0, 1e-8, [0.0, 1000.0]).round(6).tolist()
    [0.02, 0.01]
    """
    train = Train(pulse_s, rate_hz)
    found = eye_rules(wavelength_nm, exposure_s, train, alpha_mrad=alpha_mrad)
    return min(rule.per_pulse for rule in found)


@broadcast
def skin_pulse_limit_j_m2(
    wavelength_nm: float, exposure_s: float, pulse_s: float, rate_hz: float
) -> float:
    """Skin's limit for one pulse of a train, J/m2. Parameters as of `eye_pulse_limit_j_m2`."""
    found = skin_rules(wavelength_nm, exposure_s, Train(pulse_s, rate_hz))
    return min(rule.per_pulse for rule in found)


def as_limit(base: Limit, rule: Rule) -> Limit:
    """Turn a rule and the single-exposure limit behind it into a limit per pulse."""
    shared = () if rule.pulses == 1.0 else (f"a regular train: {rule.pulses:g} pulses counted",)
    notes = tuple(n for n in base.assumptions if n != "a single exposure")
    kind = "thermal" if rule.name.startswith("thermal") else f"{rule.name} ({base.governs})"
    return Limit(
        value=rule.per_pulse,
        unit="J/m2",
        governs=rule.name if kind == "thermal" else kind,
        wavelength_nm=base.wavelength_nm,
        duration_s=rule.duration_s,
        aperture_mm=base.aperture_mm,
        source=f"{base.source}; clause 4.3 f (from memory)",
        assumptions=notes + shared,
    )
