"""The standard's test probe reaches a hazardous beam through a gap of the enclosure.

Why it matters
--------------
Where a probe 12 mm wide and 80 mm long gets, a finger, a tool or a ring gets too, and what it
reflects goes anywhere.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red:
       {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 350], heading: 0}
   elements:
     T1: {kind: target, after: red, distance: 300}
   routes:
     main: [red, T1]
   enclosure:
     panels:
       south: {from: [0, 0], to: [800, 0]}
       east: {from: [800, 0], to: [800, 400]}
       north:  # <- probe-access
         from: [800, 400]
         to: [0, 400]
         openings: {slot: {along: 500, width: 13, from_height: 50, to_height: 150}}
       west: {from: [0, 400], to: [0, 0]}

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red:
       {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 350], heading: 0}
   elements:
     T1: {kind: target, after: red, distance: 300}
   routes:
     main: [red, T1]
   enclosure:
     panels:
       south: {from: [0, 0], to: [800, 0]}
       east: {from: [800, 0], to: [800, 400]}
       north:
         from: [800, 400]
         to: [0, 400]
         openings: {slot: {along: 500, width: 11, from_height: 50, to_height: 150}}
       west: {from: [0, 400], to: [0, 0]}

What it does not see
--------------------
What stands behind the gap and would stop the probe: only the gap's own mouths and depth count.
A gap in the top, and a lid that stands open, let in more than a probe and are left to
`open-side` and `opening-mirror`. A round opening is taken as the square round it where the
probe leans. How far a leaning probe reaches sideways is taken generously.

Source
------
Access to levels above class 1 is tried with a straight probe of 12 mm diameter and 80 mm length
(IEC 60825-1:2014, cited from memory). The beam is its axis with its 1/e² radius round it.
"""

from __future__ import annotations

from collections.abc import Iterator
from typing import TYPE_CHECKING

import numpy as np

from benchlay.checks._check import (
    Context,
    Found,
    exposure_words,
    length_text,
    power_text,
    rounded_up,
    unjudged,
    wavelength_text,
)
from benchlay.findings import Finding, Severity
from benchlay.optics import moments

if TYPE_CHECKING:
    from benchlay.checks._check.inside import Inside
    from benchlay.coverage.enclosed import Enclosed
    from benchlay.coverage.gaps import Gap

NAME = "probe-access"

# The beam is within reach of a finger.
SEVERITY = Severity.FAIL

_ROUNDING_MM = 1e-6


def check(context: Context, variant: int) -> Iterator[Found]:
    """Report each gap with the strongest beam that the probe reaches through it."""
    if context.layout(variant).enclosure is None:
        return
    enclosed, gaps = context.gaps.of(variant)
    if enclosed is None or not enclosed.line.enclosed or all(gap.roofless for gap in gaps):
        return
    yield from unjudged(context, variant)
    # Loaded where there is a gap: a tight enclosure needs none of it.
    from benchlay.checks._check.inside import hazardous
    from benchlay.coverage.probe import LENGTH_MM, may_reach, mouths_of, probe_mm

    legs = hazardous(context, variant, enclosed)
    for gap in gaps:
        mouths = [] if gap.roofless else mouths_of(enclosed, gap)
        for one in legs:
            if not may_reach(mouths, one.leg):
                continue
            needed = probe_mm(mouths, one.leg, _radius_mm(context, one))
            if needed is not None and needed <= LENGTH_MM + _ROUNDING_MM:
                yield _finding(context, enclosed, gap, one, needed)
                break


def _radius_mm(context: Context, one: Inside) -> float:
    """Return the largest 1/e² radius of a stretch: at an end, since a beam spreads from a waist."""
    start = context.trace.beams.start
    m, index = start.moments[:, [one.beam]], start.index[[one.beam]]
    ways = np.array([[one.leg.from_mm], [one.leg.to_mm]])
    w1, w2, _ = moments.radii(moments.propagate(m[:, None, :], ways, index))
    return float(max(w1.max(), w2.max()))


def _finding(
    context: Context, enclosed: Enclosed, gap: Gap, one: Inside, needed_mm: float
) -> Finding:
    from benchlay.checks._check.gaps import named, span_of
    from benchlay.coverage.probe import DIAMETER_MM, LENGTH_MM

    element, name = gap.key
    beam = one.beam
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=(
            f"a probe of {length_text(DIAMETER_MM)} diameter reaches {power_text(one.power_w)} of "
            f"{wavelength_text(context.wavelength_nm(beam))} from '{context.source_of(beam)}', "
            f"{length_text(needed_mm)} inside {named(gap)}: "
            f"{exposure_words(context, beam, one.power_w)}"
        ),
        expected=(
            f"no hazardous beam within {length_text(LENGTH_MM)} of a gap that admits "
            f"{length_text(DIAMETER_MM)}"
        ),
        remedy=_remedy(enclosed, gap, needed_mm),
        element=element,
        beam=int(context.numbers[beam]),
        at=gap.at,
        span=span_of(gap, enclosed),
        value=needed_mm,
        limit=LENGTH_MM,
        unit="mm",
        key=(name,),
        smaller_is_worse=True,
        weight=one.power_w,
    )


def _remedy(enclosed: Enclosed, gap: Gap, needed_mm: float) -> str:
    from benchlay.checks._check.gaps import closing
    from benchlay.coverage.gaps import OPENING, windows
    from benchlay.coverage.probe import DIAMETER_MM, LENGTH_MM

    tube = "or put the beam in a tube"
    if gap.kind != OPENING:
        return f"{closing(gap, enclosed)}, {tube}"
    (one,) = (one for one in windows(enclosed, gap.sheets[0]) if one.name == gap.through)
    depth = rounded_up(one.depth_mm + LENGTH_MM - needed_mm + 0.1, 3)
    return (
        f"make '{gap.through}' narrower than {length_text(DIAMETER_MM)}, lengthen its passage to "
        f"{length_text(depth)} (`depth`), {tube}"
    )
