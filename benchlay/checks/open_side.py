"""The enclosure leaves a gap through which misdirected light would get out.

Why it matters
--------------
Beams do not stay where they are drawn. A mount that is knocked, an optic put in the wrong way
round, a hand with something shiny: whatever the light meets next should be a panel.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red:
       {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     T1: {kind: target, after: red, distance: 300}
   routes:
     main: [red, T1]
   enclosure:
     panels:
       south: {from: [0, 0], to: [788, 0]}  # <- open-side
       east: {from: [800, 0], to: [800, 400]}
       north: {from: [800, 400], to: [0, 400]}
       west: {from: [0, 400], to: [0, 0]}
     lids:
       main: {height: 300, outline: [[0, 0], [800, 0], [800, 400], [0, 400]]}

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red:
       {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     T1: {kind: target, after: red, distance: 300}
   routes:
     main: [red, T1]
   enclosure:
     panels:
       south: {from: [0, 0], to: [800, 0]}
       east: {from: [800, 0], to: [800, 400]}
       north: {from: [800, 400], to: [0, 400]}
       west: {from: [0, 400], to: [0, 0]}
     lids:
       main: {height: 300, outline: [[0, 0], [800, 0], [800, 400], [0, 400]]}

What it does not see
--------------------
Light within the limit: a gap that only such light could reach is listed under `coverage` and
gives no finding. Bodies on the bench, which may be moved, count for nothing here; an opening
that an element fills counts as closed. The walls of the room close a side only where a panel
ends at them. Whether light does get there is for `escape`, `opening-mirror` and the review of
faults; a layout without panels and lids is left to `escape` alone. An element or source that
stands outside of the panels is not enclosed at all.

Source
------
Shadows of panels, lids and bench top, thrown from the reference point of every source, optic and
target; round openings are polygons of 256 sides. Panels drawn nearer to each other than 0.1 mm
are taken to meet (common practice).
"""

from __future__ import annotations

from collections.abc import Iterator
from typing import TYPE_CHECKING

from benchlay.checks._check import (
    Context,
    Found,
    exposure_words,
    length_text,
    power_text,
    unjudged,
    wavelength_text,
)
from benchlay.findings import Finding, Severity

if TYPE_CHECKING:
    from benchlay.coverage.enclosed import Enclosed
    from benchlay.coverage.gaps import Gap
    from benchlay.coverage.places import Astray

NAME = "open-side"

# Nothing is out yet: it takes a mishap, but one alone.
SEVERITY = Severity.WARN


def check(context: Context, variant: int) -> Iterator[Found]:
    """Report each gap with the strongest light that could go there."""
    if context.layout(variant).enclosure is None:
        return
    enclosed, gaps = context.gaps.of(variant)
    if enclosed is None or not gaps:
        return
    yield from unjudged(context, variant)
    # Loaded where there is a gap: a bench without an enclosure, or with a tight one, needs none.
    from benchlay.coverage.places import sees

    places = context.gaps.astray(variant)
    told: set[tuple[str | None, str]] = set()
    for gap in gaps:
        seen_from = (one for one in places if sees(enclosed, gap, one.at))
        if gap.key not in told and (place := next(seen_from, None)) is not None:
            told.add(gap.key)
            yield _finding(context, variant, enclosed, gap, place)


def _finding(
    context: Context, variant: int, enclosed: Enclosed, gap: Gap, place: Astray
) -> Finding:
    from benchlay.checks._check.gaps import closing, said, span_of
    from benchlay.coverage.gaps import LEAST_MM

    element, name = gap.key
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=(
            f"{said(gap)}; {power_text(place.power_w)} of "
            f"{wavelength_text(context.wavelength_nm(place.beam))} from "
            f"'{context.source_of(place.beam)}' could be sent there from '{place.name}': "
            f"{exposure_words(context, place.beam, place.power_w)}"
        ),
        expected=f"no gap wider than {length_text(LEAST_MM)} round hazardous light",
        remedy=closing(gap, enclosed),
        element=element,
        beam=int(context.numbers[place.beam]),
        at=gap.at,
        span=span_of(gap, enclosed),
        value=gap.width_mm,
        limit=LEAST_MM,
        unit="mm",
        weight=place.power_w,
        key=(name,),
    )
