"""The exposure limits that findings were held against."""

from __future__ import annotations

from collections.abc import Collection, Mapping
from typing import TypeAlias

from benchlay.checks import LineLimit
from benchlay.exposure import AccessibleLimit
from benchlay.placing.placed import Placed
from benchlay.report.model import LimitUsed

Limits: TypeAlias = Mapping[tuple[int, str, float], LineLimit]
"""By state (number), source (name) and wavelength in nm, as `checks.limits_of` gives them."""


def limits_used(placed: Placed, limits: Limits, states: Collection[str]) -> tuple[LimitUsed, ...]:
    """Return the limits of the lines emitted in some states, each once, by wavelength.

    Pulses of different sources have limits of their own, so a wavelength may be there more
    than once; the stricter one comes first.
    """
    used = {
        _used(limit, overridden=state.layout.limits.time_base_s is not None)
        for variant, state in enumerate(placed.states)
        if state.name in states
        for name, item in state.sources.items()
        if not item.source.stand.out
        for line in state.lines(name)
        if (limit := limits[variant, name, line.wavelength_nm].limit) is not None
    }
    return tuple(sorted(used, key=lambda u: (u.wavelength_nm, u.time_base_s, u.accessible_W)))


def _used(limit: AccessibleLimit, *, overridden: bool) -> LimitUsed:
    return LimitUsed(
        limit.wavelength_nm,
        limit.time_base_s,
        limit.mpe_w_m2,
        limit.aperture_mm,
        limit.accessible_w,
        limit.edition,
        overridden,
    )
