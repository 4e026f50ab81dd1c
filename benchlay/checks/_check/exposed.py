"""How far light is above the limit, in the words that every finding of exposure ends with."""

from __future__ import annotations

import re
from math import pi

from benchlay.checks._check.context import Context
from benchlay.checks._check.words import prefixed
from benchlay.exposure import AccessibleLimit

# What was recalled is said with the limits themselves, not in every sentence.
_PROVENANCE = re.compile(r"\s*\([^()]*\)")
_WHOLE = 100.0  # ratios from here on are told without decimals
_M2_PER_MM2 = 1e-6


def exposure_words(context: Context, beam: int, power_w: float) -> str:
    """Say irradiance, ratio, limit, time base and clause of what an eye could meet of a beam.

    As in "129 W/m2 over 7 mm, 12.9 times the limit of 10 W/m2 for 100 s (IEC 60825-1:2014,
    table A.1; thermal)". Of pulses all are means over time; `power_w` is what passes the
    limiting aperture.
    """
    variant = int(context.trace.beams.start.variant[beam])
    key = variant, context.source_of(beam), context.wavelength_nm(beam)
    told = context.limits.get(key)
    if told is None or told.limit is None:
        return "no limit is known for it"
    return exposed(told.limit, power_w)


def exposed(limit: AccessibleLimit, power_w: float) -> str:
    """Say the same of a limit and the power through its aperture."""
    area_m2 = pi * (limit.aperture_mm / 2.0) ** 2 * _M2_PER_MM2
    return against(limit, power_w / area_m2, f" over {limit.aperture_mm:.3g} mm")


def against(limit: AccessibleLimit, irradiance_w_m2: float, over: str = "") -> str:
    """Say how an irradiance stands to a limit."""
    mean = "" if limit.accessible_j is None else "a mean of "
    ratio = irradiance_w_m2 / limit.mpe_w_m2
    times = f"{float(f'{ratio:.3g}'):.0f}" if ratio >= _WHOLE else f"{ratio:.3g}"
    return (
        f"{mean}{prefixed(irradiance_w_m2, 'W/m2')}{over}, {times} times the limit of "
        f"{prefixed(limit.mpe_w_m2, 'W/m2')} for {limit.time_base_s:.6g} s "
        f"({clause(limit)}; {limit.governs})"
    )


def clause(limit: AccessibleLimit) -> str:
    """Return edition, table and clause of a limit.

    >>> from benchlay.exposure import accessible_limit
    >>> clause(accessible_limit(633.0))
    'IEC 60825-1:2014, table A.1'
    """
    return _PROVENANCE.sub("", limit.source)
