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
    length_text,
    power_text,
    rounded_up,
    unjudged,
)
from benchlay.findings import Finding, KeyPart, Severity
from benchlay.layout.enclosure import Opening
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
    beams = context.trace.beams
    at = context.point(beams.start.position[beam] + found.way_mm * beams.start.direction[beam])
    name = context.left_name(beam)
    limit = float(context.limit_w[beam])
    how, remedy = _how(context, variant, line, found, at)
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=(
            f"{power_text(power)} of {context.from_words(beam)} {how} at a height of "
            f"{length_text(at[2])}"
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
    stop = "end it on a dump or screen before"
    if found.upwards:
        return "leaves upwards", f"{stop}, or put a lid over it"
    if not line.enclosed or found.side is None:
        return "leaves the bench", f"{stop}, or enclose the bench with panels"
    name = found.side.panel
    if name is None:
        return "leaves where no panel stands", f"{stop}, or close that side with a panel"
    return _past_panel(context, variant, found, at)


def _past_panel(
    context: Context, variant: int, found: Exit, at: tuple[float, float, float]
) -> tuple[str, str]:
    """Say how a beam gets past the panel that stands on its side of the line."""
    enclosure = context.layout(variant).enclosure
    assert enclosure is not None
    assert found.side is not None
    name = found.side.panel or ""
    stop = "end it on a dump or screen before"
    panel = enclosure.panels[name]
    low, high = enclosure.heights_mm(panel)
    if at[2] >= high:
        needed = rounded_up(at[2] + 3.0 * _radius(context, found), 3)
        return f"passes over panel '{name}'", f"{stop}, or raise '{name}' to {needed:g} mm"
    if at[2] <= low:
        return f"passes under panel '{name}'", f"{stop}, or bring '{name}' down to the bench"
    along = float(np.hypot(at[0] - panel.from_mm[0], at[1] - panel.from_mm[1]))
    openings = sorted(panel.openings.items())
    opening = next((key for key, hole in openings if _is_in(hole, along, at[2])), "")
    if panel.open or not opening:
        return f"passes the open panel '{name}'", f"{stop}, or keep '{name}' shut in this state"
    return (
        f"leaves through '{name}.{opening}'",
        f"{stop}, or name '{name}.{opening}' as the last item of its route if it is handed over",
    )


def _radius(context: Context, found: Exit) -> float:
    """Return the larger 1/e² radius where a beam leaves, mm."""
    start = context.trace.beams.start
    m = start.moments[:, found.beam]
    w1, w2, _ = moments.radii(moments.propagate(m, found.way_mm, start.index[found.beam]))
    return float(np.maximum(w1, w2))


def _is_in(opening: Opening, along: float, height: float) -> bool:
    start, end, low, high = opening.box_mm()
    return start <= along <= end and low <= height <= high
