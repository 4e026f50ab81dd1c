"""A working beam meets an optic above or below where it is meant to.

Why it matters
--------------
A beam that is not level from optic to optic is steered out of its plane by the next one, clips
rims, and in the end leaves over a panel. Heights are set with spacers before anything else.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400], beam_height: 100}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     M1:  # <- off-height
       kind: mirror
       after: red
       distance: 300
       turn: left 90
       height: 101
       diameter: 25.4
       reflectance: 99 %
     T1: {kind: target, after: M1, distance: 100}
   routes:
     main: [red, M1, T1]

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400], beam_height: 100}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     M1:
       kind: mirror
       after: red
       distance: 300
       turn: left 90
       height: 100.4
       diameter: 25.4
       reflectance: 99 %
     T1: {kind: target, after: M1, distance: 100}
   routes:
     main: [red, M1, T1]

What it does not see
--------------------
Beams that no route names. Where a route meets an optic more than once, as in a folded path,
the meetings after the first: they are meant to lie elsewhere. On a tilted face the distance is
measured up the face, not upright.

Source
------
Heights off by more than 0.5 mm are taken up by spacers (common practice); the layout's
`limits.off_height` holds.
"""

from __future__ import annotations

from collections.abc import Iterator

from benchlay.checks._check import Context, Mark, above, length_text
from benchlay.findings import Finding, Severity

NAME = "off-height"

# The light still arrives; how much is lost is told by the other checks.
SEVERITY = Severity.WARN


def check(context: Context, variant: int) -> Iterator[Finding]:
    """Report each meeting that is too far up or down."""
    limit = context.layout(variant).limits.off_height_mm
    for mark in context.meetings.marks(variant, context.beams_of(variant)):
        if above(abs(mark.up_mm), limit):
            yield _finding(context, variant, mark, limit)


def _finding(context: Context, variant: int, mark: Mark, limit: float) -> Finding:
    off = abs(mark.up_mm)
    name = mark.element
    side, way = ("above", "raise") if mark.up_mm > 0.0 else ("below", "lower")
    routes = " and ".join(f"'{route}'" for route in context.routes.routes_of(mark.beam))
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=f"the beam of {routes} meets '{name}' {length_text(off)} {side} its mark",
        expected=f"at most {length_text(limit)} above or below it",
        remedy=(
            f"{way} '{name}' by {length_text(off)}, or level the beam before it; "
            "if it is meant to be met there, say so with `beam_at`"
        ),
        element=name,
        beam=int(context.numbers[mark.beam]),
        at=context.end_at(mark.beam),
        span=context.span_of(name, variant),
        value=off,
        limit=limit,
        unit="mm",
        key=(*context.chain(mark.beam), context.face_text(mark.face)),
    )
