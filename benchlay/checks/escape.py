"""A beam above the accessible limit leaves the bench or its enclosure.

Why it matters
--------------
Beyond the line everyone in the room is within reach of the beam, those included who do not
know that it is there.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     M1:  # <- escape
       kind: mirror
       after: red
       distance: 300
       turn: left 90
       pitch: 20
       diameter: 25.4
       metal: silver
   routes:
     main: [red, M1]
   enclosure:
     to_height: 150
     panels:
       south: {from: [0, 0], to: [800, 0]}
       east: {from: [800, 0], to: [800, 400]}
       north: {from: [800, 400], to: [0, 400]}
       west: {from: [0, 400], to: [0, 0]}

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     M1: {kind: mirror, after: red, distance: 300, turn: left 90, diameter: 25.4, metal: silver}
   routes:
     main: [red, M1]
   enclosure:
     to_height: 150
     panels:
       south: {from: [0, 0], to: [800, 0]}
       east: {from: [800, 0], to: [800, 400]}
       north: {from: [800, 400], to: [0, 400]}
       west: {from: [0, 400], to: [0, 0]}

What it does not see
--------------------
Diffuse light, and beams that a fault or a hand could send out: coverage and the review of
faults are for those. A route whose last item is an opening hands its beam over there on
purpose; what becomes of it beyond is for whoever receives it.

Source
------
A beam is compared by the power that passes the limiting aperture of the eye, centred on it,
at the worst place beyond the line: IEC 60825-1:2014 for the limits and apertures.
"""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from benchlay.checks._check import (
    Context,
    Exit,
    Found,
    above,
    exits_of,
    exposure_words,
    length_text,
    place_of,
    power_text,
    rounded_up,
    unjudged,
    way_out,
)
from benchlay.findings import Finding, KeyPart, Severity
from benchlay.optics import moments
from benchlay.zones.enclosure_line import EnclosureLine, enclosure_line

NAME = "escape"

# A beam that can hurt an eye is where people are.
SEVERITY = Severity.FAIL


def check(context: Context, variant: int) -> Iterator[Found]:
    """Report each beam where it first leaves; what it does beyond is not told again."""
    yield from unjudged(context, variant)
    line = enclosure_line(context.layout(variant))
    exits = list(exits_of(context, variant, line))
    if not exits:
        return
    beams = np.array([found.beam for found in exits])
    powers = context.beyond_w(beams, np.array([found.way_mm for found in exits]))
    # Light sent to and fro between two faces leaves as many beams by one way: the strongest of
    # them is told.
    strongest: dict[tuple[KeyPart, ...], tuple[float, Exit]] = {}
    for found, power in zip(exits, powers.tolist(), strict=True):
        if above(power, float(context.limit_w[found.beam])):
            way = _way_out(context, found)
            if way not in strongest or power > strongest[way][0]:
                strongest[way] = power, found
    for way, (power, found) in strongest.items():
        yield _finding(context, variant, line, found, (power, way))


def _way_out(context: Context, found: Exit) -> tuple[KeyPart, ...]:
    """Return what beams that leave alike have in common, the same from run to run."""
    beam = found.beam
    return (
        context.source_of(beam),
        context.wavelength_nm(beam),
        context.left_at(context.astray_since(beam)),
        context.left_at(beam),
        "up" if found.upwards else found.side.panel if found.side is not None else "edge",
    )


def _finding(
    context: Context,
    variant: int,
    line: EnclosureLine,
    found: Exit,
    what: tuple[float, tuple[KeyPart, ...]],
) -> Finding:
    beam, (power, key) = found.beam, what
    at = place_of(context, found)
    name = context.left_name(beam)
    limit = float(context.limit_w[beam])
    how, remedy = _how(context, variant, line, found, at)
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=(
            f"{power_text(power)} of {context.from_words(beam)} {how} at a height of "
            f"{length_text(at[2])}: {exposure_words(context, beam, power)}"
        ),
        expected=f"at most {power_text(limit)} beyond {_limits_of_bench(line)}",
        remedy=remedy,
        element=name,
        beam=int(context.numbers[beam]),
        at=at,
        span=context.span_of(name, variant),
        value=power,
        limit=limit,
        unit="W",
        key=key,
    )


def _limits_of_bench(line: EnclosureLine) -> str:
    return "the enclosure" if line.enclosed else "the edge of the bench"


def _how(
    context: Context,
    variant: int,
    line: EnclosureLine,
    found: Exit,
    at: tuple[float, float, float],
) -> tuple[str, str]:
    """Say how a beam leaves, and what would keep it in."""
    way = way_out(context, variant, line, found, at)
    name, stop = way.panel, "end it on a dump or screen before"
    if way.kind == "over":
        needed = rounded_up(at[2] + 3.0 * _radius(context, found), 3)
        return f"passes over panel '{name}'", f"{stop}, or raise '{name}' to {needed:g} mm"
    if way.kind == "opening":
        hole = f"{name}.{way.opening}"
        return (
            f"leaves through '{hole}'",
            f"{stop}, or name '{hole}' as the last item of its route if it is handed over",
        )
    how, mend = {
        "up": ("leaves upwards", "put a lid over it"),
        "bench": ("leaves the bench", "enclose the bench with panels"),
        "gap": ("leaves where no panel stands", "close that side with a panel"),
        "under": (f"passes under panel '{name}'", f"bring '{name}' down to the bench"),
        "open": (f"passes the open panel '{name}'", f"keep '{name}' shut in this state"),
    }[way.kind]
    return how, f"{stop}, or {mend}"


def _radius(context: Context, found: Exit) -> float:
    """Return the larger 1/e² radius where a beam leaves, mm."""
    start = context.trace.beams.start
    m = start.moments[:, found.beam]
    w1, w2, _ = moments.radii(moments.propagate(m, found.way_mm, start.index[found.beam]))
    return float(np.maximum(w1, w2))
