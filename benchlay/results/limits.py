"""The exposure limits that findings were held against."""

from __future__ import annotations

from collections.abc import Collection, Iterator, Mapping
from typing import TypeAlias

from benchlay.checks import LineLimit
from benchlay.exposure import AccessibleLimit
from benchlay.geometry.distinct import distinct
from benchlay.report.model import LimitUsed
from benchlay.tracing import Trace
from benchlay.tracing.front import CONVERTED

Limits: TypeAlias = Mapping[tuple[int, str, float], LineLimit]
"""By state (number), source (name) and wavelength in nm, as `checks.limits_of` gives them."""


def limits_used(trace: Trace, limits: Limits, states: Collection[str]) -> tuple[LimitUsed, ...]:
    """Return the limits of the light that there is in some states, each once, by wavelength.

    That is what sources emit, and what converters make of it.

    Pulses of different sources have limits of their own, so a wavelength may be there more
    than once; the stricter one comes first.
    """
    used = {
        _used(limit, overridden=state.layout.limits.time_base_s is not None)
        for variant, state in enumerate(trace.placed.states)
        if state.name in states
        for name, nm in (*_emitted(trace, variant), *_made(trace, variant))
        if (limit := limits[variant, name, nm].limit) is not None
    }
    return tuple(sorted(used, key=lambda u: (u.wavelength_nm, u.time_base_s, u.accessible_W)))


def _emitted(trace: Trace, variant: int) -> Iterator[tuple[str, float]]:
    for name, item in trace.placed.states[variant].sources.items():
        if not item.source.stand.out:
            yield from ((name, line.wavelength_nm) for line in item.source.lines)


def _made(trace: Trace, variant: int) -> Iterator[tuple[str, float]]:
    """Yield of which source's light something was made, and at which wavelength."""
    start, scene = trace.beams.start, trace.scene
    rows = trace.of_variant(variant)
    rows = rows[start.event[rows] == CONVERTED]
    waves = len(scene.wavelengths_nm)
    for pair in distinct(start.source[rows] * waves + start.wave[rows]).tolist():
        yield scene.sources[pair // waves], float(scene.wavelengths_nm[pair % waves])


def _used(limit: AccessibleLimit, *, overridden: bool) -> LimitUsed:
    return LimitUsed(
        limit.wavelength_nm,
        limit.time_base_s,
        limit.mpe_w_m2,
        limit.aperture_mm,
        limit.accessible_w,
        limit.edition,
        overridden,
        limit.accessible_j,
    )
