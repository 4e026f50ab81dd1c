"""No beam reaches an element, in any state.

Why it matters
--------------
Either the element is not needed, or the light that it is there for goes elsewhere.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     T1: {kind: target, after: red, distance: 500}
     M9: {kind: mirror, at: [300, 300], facing: 0, diameter: 25.4, metal: silver}  # <- dark-element
   routes:
     main: [red, T1]

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     T1: {kind: target, after: red, distance: 500}
     M9:
       {kind: mirror, at: [300, 200], facing: 135, diameter: 25.4, metal: silver, out: yes}
   routes:
     main: [red, T1]
   states:
     alignment: {elements.M9.out: no}

What it does not see
--------------------
Screens, tubes, obstacles and dumps, which may stand in the dark, and so may what stands in a
panel's opening, like the glass of a viewing window. Elements behind a break or a closed
shutter: what darkens them is told there. Light below the power floor does not count.

Source
------
Common practice: every optic on a drawing has its beam.
"""

from __future__ import annotations

from collections.abc import Iterator

from benchlay.checks._check import Context
from benchlay.findings import Finding, Severity
from benchlay.geometry.distinct import distinct
from benchlay.tracing.beams import FACE

NAME = "dark-element"

# Nothing is wrong with the light itself, but the drawing says something that is not so.
SEVERITY = Severity.WARN


def check(context: Context, variant: int) -> Iterator[Finding]:
    """Report elements that stand in the dark in every state, in each of them."""
    state = context.state(variant)
    for name in _dark(context):
        item = state.elements[name]
        if item.out:
            continue
        yield Finding(
            check=NAME,
            severity=SEVERITY,
            message=f"no beam reaches {item.element.kind} '{name}', in any state",
            expected="a beam that meets it in one state at least",
            remedy=f"remove '{name}', or bring a beam to it",
            element=name,
            at=item.pose.at,
            span=item.element.span,
        )


def _dark(context: Context) -> tuple[str, ...]:
    """Return the elements dark in every state for which nothing else accounts."""
    lit = _lit(context)
    states = context.trace.placed.states
    behind = frozenset().union(*(context.routes.downstream(v) for v in range(len(states))))
    return tuple(
        name
        for name, item in states[0].elements.items()
        if item.element.record.DARK_MATTERS
        and item.element.stand.in_opening is None
        and name not in lit
        and name not in behind
        and not all(state.elements[name].out for state in states)
    )


def _lit(context: Context) -> set[str]:
    """Return the elements that light reaches in some state, on a face or on what holds it."""
    trace = context.trace
    beams, scene = trace.beams, trace.scene
    faces = distinct(beams.end_row[beams.end_kind == FACE])
    lit = {scene.elements[owner] for owner in scene.faces.owner[faces].tolist()}
    ledger = trace.ledger
    enough = ledger.power >= trace.floor_w[beams.start.wave[ledger.beam]]
    names = distinct(ledger.name[enough & (ledger.name >= 0)])
    return lit | {scene.names[name] for name in names.tolist()}
