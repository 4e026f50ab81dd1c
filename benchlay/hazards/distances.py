"""How far the beams that people can reach exceed the limit, each from where it can be reached."""

from __future__ import annotations

import math

import numpy as np

from benchlay.checks import Context
from benchlay.hazards.emitted import span_of
from benchlay.hazards.model import Distance, Span
from benchlay.hazards.reach import Way, taken_w

_MM_PER_M = 1e3


def distances(context: Context, variant: int, way: Way) -> tuple[Distance, ...]:
    """Return the hazardous stretches of beams that can be reached in a state.

    Beams of one line that leave by the same face go one behind the other between the same
    things: the one of which an aperture takes most is told, and how many there are besides.

    Parameters
    ----------
    context : Context
    variant : int
        Number of the state.
    way : Way
        The beams, and from where they can be reached.
    """
    groups: dict[tuple[str, float, str], list[tuple[float, int, float]]] = {}
    for beam, from_mm, taken in _over(context, way):
        key = context.source_of(beam), context.wavelength_nm(beam), context.left_at(beam)
        groups.setdefault(key, []).append((taken, beam, from_mm))
    found = []
    for members in groups.values():
        _, beam, from_mm = max(members, key=lambda member: (member[0], -member[1]))
        row = _distance(context, variant, beam, from_mm, len(members) - 1)
        if row is not None:
            found.append(row)
    return tuple(
        sorted(found, key=lambda d: (-d.power_W / d.limit_W, d.source, d.wavelength_nm, d.from_))
    )


def _over(context: Context, way: Way) -> list[tuple[int, float, float]]:
    """Return the beams that exceed their limit in reach: number, from where, how much, W."""
    limits = context.limit_w[way.beams]
    some = way.take(np.flatnonzero(context.trace.beams.start.power[way.beams] > limits))
    out = []
    for aperture in sorted(set(context.aperture_mm[some.beams].tolist())):
        own = some.take(np.flatnonzero(context.aperture_mm[some.beams] == aperture))
        taken = taken_w(context, own, aperture)
        over = np.flatnonzero(taken > context.limit_w[own.beams] * (1.0 + 1e-9))
        out += [(int(own.beams[i]), float(own.from_mm[i]), float(taken[i])) for i in over.tolist()]
    return out


def _distance(
    context: Context, variant: int, beam: int, from_mm: float, alike: int
) -> Distance | None:
    start = context.trace.beams.start
    source, nm = context.source_of(beam), context.wavelength_nm(beam)
    limit = context.limits[variant, source, nm].limit
    if limit is None:
        return None
    # None where it exceeds the limit by rounding alone.
    span = span_of(context, beam, limit, from_mm) or Span(0.0, 0.0, 0.0)
    length = float(context.trace.beams.length[beam])
    return Distance(
        source,
        nm,
        int(context.numbers[beam]),
        context.left_at(beam),
        context.point(start.position[beam] + from_mm * start.direction[beam]),
        float(start.power[beam]),
        limit.accessible_w,
        span.from_m,
        span.to_m,
        span.far_field_m,
        max(0.0, length - from_mm) / _MM_PER_M if math.isfinite(length) else math.inf,
        context.end_words(beam),
        alike,
    )
