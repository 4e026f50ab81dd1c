"""A working beam meets an optic to one side of where it is meant to.

Why it matters
--------------
Off the middle a lens steers the beam, a curved mirror makes it astigmatic, and the nearer rim
cuts it. Plates before the optic are the usual cause: each shifts the beam to one side.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     W1: {kind: window, after: red, distance: 200, incidence: 45, diameter: 25.4, thickness: 5}
     L1:  # <- off-centre
       {kind: lens, at: [400, 200], facing: 180, diameter: 25.4, focal: 200}
   routes:
     main: [red, W1, L1]

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     W1: {kind: window, after: red, distance: 200, incidence: 45, diameter: 25.4, thickness: 5}
     L1: {kind: lens, after: W1, distance: 200, diameter: 25.4, focal: 200}
   routes:
     main: [red, W1, L1]

What it does not see
--------------------
Beams that no route names. Where a route meets an optic more than once, as in a folded path,
the meetings after the first: they are meant to lie elsewhere.

Source
------
Half a millimetre is what can be seen on a card with a pinhole (common practice); the layout's
`limits.off_centre` holds.
"""

from __future__ import annotations

from collections.abc import Iterator

from benchlay.checks._check import Context, Mark, above, length_text
from benchlay.findings import Finding, Severity

NAME = "off-centre"

# The light still arrives; how much is lost is told by the other checks.
SEVERITY = Severity.WARN


def check(context: Context, variant: int) -> Iterator[Finding]:
    """Report each meeting that is too far to one side."""
    limit = context.layout(variant).limits.off_centre_mm
    for mark in context.meetings.marks(variant, context.beams_of(variant)):
        if above(abs(mark.left_mm), limit):
            yield _finding(context, variant, mark, limit)


def _finding(context: Context, variant: int, mark: Mark, limit: float) -> Finding:
    off = abs(mark.left_mm)
    name = mark.element
    side = "left" if mark.left_mm > 0.0 else "right"
    routes = " and ".join(f"'{route}'" for route in context.routes.routes_of(mark.beam))
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=(
            f"the beam of {routes} meets '{name}' {length_text(off)} beside its mark, "
            f"on the {side} as seen along its front normal"
        ),
        expected=f"at most {length_text(limit)} to either side",
        remedy=(
            f"move '{name}' by {length_text(off)} to that side, or steer the beam before it; "
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
