"""The stretches of strong beams within an enclosure, where a hand could hold something in them."""

from __future__ import annotations

from typing import TYPE_CHECKING

import numpy as np

from benchlay.coverage.mirrors import Leg, within
from benchlay.exposure import OutOfRange, Pulse
from benchlay.exposure.accessible import default_time_base_s
from benchlay.exposure.emission import Level, emission_limit
from benchlay.exposure.factors import is_visible
from benchlay.named import NamedTuple

if TYPE_CHECKING:
    from benchlay.checks._check.context import Context
    from benchlay.coverage.enclosed import Enclosed
    from benchlay.scene.tables import Ints

# The class below 3B: not every one exists at every wavelength.
_BELOW = (Level.THREE_R, Level.TWO, Level.ONE)
_GLANCE_S = 0.25  # time base of classes 2 and 3R in the visible (IEC 60825-1:2014)


class Inside(NamedTuple):
    """A part of a beam within the enclosure."""

    beam: int
    power_w: float
    leg: Leg


def class_limit_w(context: Context, variant: int, beam: int) -> float:
    """Return the power above which a beam is of class 3B or 4 by itself, W.

    The class below 3B sets it (3R, or 2 or 1 where there is no 3R), all light taken through the
    apertures. Zero where there is no limit: in doubt the beam counts.
    """
    nm, source = context.wavelength_nm(beam), context.source_of(beam)
    lines = context.state(variant).lines(source)
    own = [line for line in lines if line.wavelength_nm == nm] or list(lines)
    pulse = next((line.pulse for line in own if line.pulse is not None), None)
    try:
        if pulse is None:
            limits = (_continuous_w(nm, level) for level in _BELOW)
        else:
            # Loaded for pulses only: the rules for trains are long.
            from benchlay.exposure.classes import classify_pulsed

            train = Pulse(pulse.energy_j, pulse.duration_s, pulse.rate_hz)
            energies = classify_pulsed(nm, train).limits
            limits = (_times(energies[str(level)], pulse.rate_hz) for level in _BELOW)
        return next((limit for limit in limits if limit is not None), 0.0)
    except OutOfRange:
        return 0.0


def _continuous_w(nm: float, level: Level) -> float | None:
    glance = level is not Level.ONE and is_visible(nm)
    base_s = _GLANCE_S if glance else default_time_base_s(nm)
    limit = emission_limit(level, nm, base_s)
    return None if limit is None else limit.power_w(base_s)


def _times(energy_j: float | None, rate_hz: float) -> float | None:
    return None if energy_j is None else energy_j * rate_hz


def strong(context: Context, variant: int, enclosed: Enclosed) -> list[Inside]:
    """Return what of the beams of class 3B and 4 runs inside and in no tube, strongest first."""
    start = context.trace.beams.start
    rows = context.beams_of(variant)
    unlimited = context.outside & np.isnan(context.limit_w)
    rows = rows[(context.hazardous | unlimited)[rows]]
    limits: dict[tuple[int, int], float] = {}
    found = []
    for beam in rows.tolist():
        line = int(start.source[beam]), int(start.wave[beam])
        if line not in limits:
            limits[line] = class_limit_w(context, variant, beam)
        if float(start.power[beam]) > limits[line]:
            found.append(beam)
    return legs_inside(context, enclosed, found)


def hazardous(context: Context, variant: int, enclosed: Enclosed) -> list[Inside]:
    """Return what of the hazardous beams runs inside and in no tube, strongest first."""
    rows: Ints = context.beams_of(variant)
    return legs_inside(context, enclosed, rows[context.hazardous[rows]].tolist())


def legs_inside(context: Context, enclosed: Enclosed, rows: list[int]) -> list[Inside]:
    """Return the parts of beams within the enclosure, the strongest first."""
    beams = context.trace.beams
    found = [
        Inside(beam, float(beams.start.power[beam]), leg)
        for beam in rows
        for leg in within(
            enclosed,
            context.point(beams.start.position[beam]),
            context.point(beams.start.direction[beam]),
            float(beams.length[beam]),
        )
    ]
    return sorted(found, key=lambda one: (-one.power_w, one.beam))
