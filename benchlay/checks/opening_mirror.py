"""One flat mirror in an enclosed beam of class 3B or 4 could throw it out through a gap.

Why it matters
--------------
An enclosure counts as closed only if no hand with something flat and shiny (a tool, a ring, a
loose mirror), anywhere in the beam path inside, could send the light to people through what is
left open. Whether the beam as drawn points there does not matter.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red:
       {wavelength: 633, power: 50 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     T1: {kind: target, after: red, distance: 300}
   routes:
     main: [red, T1]
   enclosure:
     panels:
       south: {from: [0, 0], to: [800, 0]}
       east: {from: [800, 0], to: [800, 400]}
       north:  # <- opening-mirror
         from: [800, 400]
         to: [0, 400]
         openings: {slot: {along: 500, width: 10, from_height: 50, to_height: 150}}
       west: {from: [0, 400], to: [0, 0]}
     lids:
       main: {height: 300, outline: [[0, 0], [800, 0], [800, 400], [0, 400]]}

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red:
       {wavelength: 633, power: 50 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
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
         openings: {slot: {along: 500, width: 10, from_height: 50, to_height: 150}}
       cover: {from: [360, 388], to: [230, 388], to_height: 170}
       west: {from: [0, 400], to: [0, 0]}
     lids:
       main: {height: 300, outline: [[0, 0], [800, 0], [800, 400], [0, 400]]}

What it does not see
--------------------
Two mirrors, and curved ones. A mirror held in a stray below the class: only beams of class 3B or
4 by themselves are followed, each with all of its power, and what a tube holds is left out. That
a beam has spread so far beyond the gap that it is within the limit is not credited. Optics that
pass light, tubes and what has a hole count as holding back nothing. An opening that glass fills
counts for what the glass lets through of a beam met squarely, its faces passing all; an aperture or
tube that fills one counts as closing it. A panel or lid that stands
open in the state counts as a gap, one that could be opened does not. On an enclosure without a
lid only its sides are looked at: `open-side` tells of the top.

Source
------
Human access to enclosed beams of class 3B and 4 includes what one flat mirror brought into the
interior could reflect out of an opening or gap (IEC 60825-1:2014, cited from memory). Lines of
sight are exact, from the shadows of panels, ducts, lids, bench and opaque bodies.
"""

from __future__ import annotations

from collections.abc import Iterator
from typing import TYPE_CHECKING

from benchlay.checks._check import (
    Context,
    Found,
    exposure_words,
    power_text,
    unjudged,
    wavelength_text,
)
from benchlay.findings import Finding, Severity

if TYPE_CHECKING:
    from benchlay.checks._check.gaps import Thrown
    from benchlay.checks._check.inside import Inside
    from benchlay.coverage.enclosed import Enclosed
    from benchlay.coverage.gaps import Gap

NAME = "opening-mirror"

# By the standard the light is then within reach of people.
SEVERITY = Severity.FAIL


def check(context: Context, variant: int) -> Iterator[Found]:
    """Report each gap with the strongest beam that a mirror could throw through it."""
    if context.layout(variant).enclosure is None:
        return
    enclosed, gaps = context.gaps.of(variant)
    if enclosed is None or not (gaps or enclosed.closed):
        return
    yield from unjudged(context, variant)
    # Loaded where there is a gap: a tight enclosure needs none of it.
    from benchlay.coverage.mirrors import guilty

    thrown = context.gaps.thrown(variant)
    if not thrown:
        return
    among = context.gaps.among_bodies(variant)
    for one in thrown:
        leg = next((leg for leg in one.legs if guilty(among, one.gap, leg.leg)), None)
        if leg is not None:
            yield _finding(context, variant, among, one, leg)


def _finding(
    context: Context,
    variant: int,
    enclosed: Enclosed,
    thrown: Thrown,
    one: Inside,
) -> Finding:
    from benchlay.checks._check.gaps import named, span_of
    from benchlay.checks._check.inside import class_limit_w

    gap = thrown.gap
    where = named(gap) + (f" and '{thrown.glass}' in it" if thrown.glass else "")
    limit = (
        float(context.limit_w[one.beam])
        if thrown.glass
        else class_limit_w(context, variant, one.beam)
    )
    element, name = gap.key
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=(
            f"one flat mirror between '{context.left_name(one.beam)}' and "
            f"{context.end_words(one.beam)} could throw {power_text(one.power_w)} of "
            f"{wavelength_text(context.wavelength_nm(one.beam))} from "
            f"'{context.source_of(one.beam)}' out through {where}: "
            f"{exposure_words(context, one.beam, one.power_w)}"
        ),
        expected=(
            f"no more than {power_text(limit)} through '{thrown.glass}'"
            if thrown.glass
            else f"no line of sight from a beam above {power_text(limit)} (class 3B or 4) to a "
            "gap, but where a tube holds it"
        ),
        remedy=_remedy(gap, enclosed, thrown.legs)
        + (f", or make '{thrown.glass}' denser at this wavelength" if thrown.glass else ""),
        element=element,
        beam=int(context.numbers[one.beam]),
        at=gap.at,
        span=span_of(gap, enclosed),
        value=one.power_w,
        limit=limit,
        unit="W",
        key=(name,),
    )


def _remedy(gap: Gap, enclosed: Enclosed, legs: list[Inside]) -> str:
    from benchlay.checks._check.gaps import closing
    from benchlay.coverage.labyrinth import SPACING_MM, overlap_mm

    overlap = overlap_mm(enclosed, gap, [one.leg for one in legs])
    if overlap is None:
        return f"{closing(gap, enclosed)}; or put the beam in tubes"
    return (
        f"close '{gap.through}', put the beam in tubes, or cover '{gap.through}' on the inside "
        f"by a labyrinth: a sheet {SPACING_MM:g} mm from '{gap.sheets[0]}' that overlaps it by "
        f"{overlap:g} mm on every side"
    )
