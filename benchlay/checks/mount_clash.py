"""Two bodies stand in each other's way, or nearer than the clearance.

Why it matters
--------------
They cannot both be bolted down where the layout puts them, or there is no room to set them.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     box1:
       kind: obstacle
       at: [300, 100]
       facing: 0
       outline: [[0, 0], [50, 0], [50, 50], [0, 50]]
       to_height: 60
     box2:  # <- mount-clash
       kind: obstacle
       at: [352.9, 100]
       facing: 0
       outline: [[0, 0], [50, 0], [50, 50], [0, 50]]
       to_height: 60

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     box1:
       kind: obstacle
       at: [300, 100]
       facing: 0
       outline: [[0, 0], [50, 0], [50, 50], [0, 50]]
       to_height: 60
     box2:
       kind: obstacle
       at: [353.1, 100]
       facing: 0
       outline: [[0, 0], [50, 0], [50, 50], [0, 50]]
       to_height: 60

What it does not see
--------------------
Knobs, screws and cables. Tilted bodies count with the upright box of their outline in plan, so
a few may be reported that would fit. Panels and lids among themselves, and what stands in an
opening against its own panel, are left to the shop drawings.

Source
------
The layout's `limits.clearance`, 3 mm unless it says otherwise (common practice).
"""

from __future__ import annotations

from collections.abc import Iterator

from benchlay.checks._check import (
    Body,
    Context,
    distance_mm,
    length_text,
    middle_between,
    overlap_mm,
    rounded_up,
)
from benchlay.findings import Finding, Severity

NAME = "mount-clash"

# It cannot be built as drawn.
SEVERITY = Severity.FAIL

_SHEETS = ("panel", "lid")
_ROUNDING_MM = 1e-6


def check(context: Context, variant: int) -> Iterator[Finding]:
    """Report each pair of items once, by the parts that come nearest."""
    limit = context.layout(variant).limits.clearance_mm
    rows = context.bodies.rows(variant)
    worst: dict[tuple[str, str], tuple[float, Body, Body]] = {}
    for first, second in context.bodies.near_pairs(rows, limit):
        if _belong_together(context, variant, first, second):
            continue
        a, b = context.bodies.body(first), context.bodies.body(second)
        if (a.part in _SHEETS, a.name) > (b.part in _SHEETS, b.name):
            a, b = b, a
        gap = distance_mm(a, b)
        if gap <= 0.0:
            gap = -overlap_mm(a, b)
        if gap < worst.get((a.name, b.name), (limit - _ROUNDING_MM,))[0]:
            worst[a.name, b.name] = gap, a, b
    for _, found in sorted(worst.items()):
        yield _finding(context, variant, limit, found)


def _belong_together(context: Context, variant: int, first: int, second: int) -> bool:
    (a, part), (b, other_part) = context.bodies.label(first), context.bodies.label(second)
    if part in _SHEETS and other_part in _SHEETS:
        return True
    state = context.state(variant)
    for name, other in ((a, b), (b, a)):
        held = state.elements.get(name)
        source = state.sources.get(name)
        stand = held.element.stand if held else source.source.stand if source else None
        opening = None if stand is None else stand.in_opening
        if opening is not None and opening.panel == other:
            return True
    return False


def _finding(
    context: Context, variant: int, limit: float, found: tuple[float, Body, Body]
) -> Finding:
    gap, a, b = found
    if a.part in _SHEETS or b.part in _SHEETS:
        told, other = (b, a) if a.part in _SHEETS else (a, b)
    else:
        told, other = b, a  # the later name
    there = f"the {other.part} of '{other.name}'"
    if gap > 0.0:
        near = f"stands {length_text(gap)} from {there}"
    else:
        near = f"overlaps {there} by {length_text(-gap)}" if gap < 0.0 else f"touches {there}"
    move = limit - gap
    span = context.span_of(other.name, variant)
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=f"the {told.part} of '{told.name}' {near}",
        expected=f"a clearance of at least {length_text(limit)}",
        remedy=f"move '{told.name}' or '{other.name}' apart by {rounded_up(move, 3):g} mm or more",
        element=told.name,
        at=middle_between(a, b),
        span=context.span_of(told.name, variant),
        value=gap,
        limit=limit,
        unit="mm",
        related=() if span is None else ((span, f"'{other.name}' stands here"),),
        key=(other.name,),
        smaller_is_worse=True,
    )
