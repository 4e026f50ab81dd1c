"""What each source emits, line by line: within the limit of which class, and how far it reaches."""

from __future__ import annotations

from benchlay.checks import Context
from benchlay.exposure import AccessibleLimit, Pulse
from benchlay.exposure.beams import OpenBeam, far_field_m, from_moments, hazardous_stretch
from benchlay.hazards.classes import classify, name_of, statement
from benchlay.hazards.model import Pulses, SourceHazard, Span
from benchlay.optics import moments
from benchlay.tracing.front import EMITTED

# Distances are written to a micrometre: far above rounding, far below any survey.
_DECIMALS = 6


def sources_of(context: Context, variant: int) -> tuple[SourceHazard, ...]:
    """Return what sources emit in a state, rear leaks too, by name, wavelength and power."""
    start = context.trace.beams.start
    rows = context.beams_of(variant)
    emitted = rows[(start.event[rows] == EMITTED) & (start.power[rows] > 0.0)]
    found = [_emitted(context, variant, beam) for beam in emitted.tolist()]
    return tuple(sorted(found, key=lambda s: (s.source, s.wavelength_nm, -s.power_W)))


def open_beam(context: Context, beam: int, from_mm: float = 0.0) -> OpenBeam:
    """Return a beam from some way along its leg, as it would go on in the open."""
    s = context.trace.beams.start
    index = float(s.index[beam])
    m = moments.propagate(s.moments[:, beam], from_mm, index).tolist()
    xx, xy, yy, xu, xv, yu, yv, uu, uv, vv = m
    return from_moments((xx, xy, yy), (xu, xv, yu, yv), (uu, uv, vv), index=index)


def span_of(
    context: Context, beam: int, limit: AccessibleLimit, from_mm: float = 0.0
) -> Span | None:
    """Return where a beam going on in the open exceeds its limit, m; None if nowhere.

    A beam that was cut keeps the shape of its uncut self, of which an aperture takes its share.
    """
    s = context.trace.beams.start
    power_w = float(s.power[beam])
    if not power_w > limit.accessible_w:
        return None
    uncut_w = power_w / float(s.kept[beam])
    free = open_beam(context, beam, from_mm)
    found = hazardous_stretch(free, uncut_w, limit.mpe_w_m2, limit.aperture_mm)
    if found is None:
        return None
    formula = far_field_m(free, uncut_w, limit.mpe_w_m2)
    return Span(*(round(value, _DECIMALS) for value in (*found, formula)))


def pulses_of(pulse: Pulse | None, power_w: float) -> Pulses | None:
    """Return the pulses of so much mean power."""
    if pulse is None:
        return None
    return Pulses(power_w / pulse.rate_hz, pulse.duration_s, pulse.rate_hz)


def _emitted(context: Context, variant: int, beam: int) -> SourceHazard:
    source, nm = context.source_of(beam), context.wavelength_nm(beam)
    power_w = float(context.trace.beams.start.power[beam])
    told = context.limits[variant, source, nm]
    found = classify(nm, power_w, told.pulse, open_beam(context, beam))
    span = None if told.limit is None else span_of(context, beam, told.limit)
    known = None if isinstance(found, str) else found
    return SourceHazard(
        source=source,
        wavelength_nm=nm,
        power_W=power_w,
        pulses=pulses_of(told.pulse, power_w),
        class_as_modelled=name_of(found),
        statement=statement(name_of(found)) if known else f"{statement(None)} ({found})",
        unit=known.unit if known else "W",
        limits=dict(known.limits) if known else {},
        naked_eye=known.naked_eye if known else power_w,
        binoculars=known.binoculars if known else power_w,
        mpe_W_m2=None if told.limit is None else told.limit.mpe_w_m2,
        time_base_s=None if told.limit is None else told.limit.time_base_s,
        span=span,
    )
