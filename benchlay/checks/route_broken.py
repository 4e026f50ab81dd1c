"""The beam does not do what its route says.

Why it matters
--------------
Everything behind the broken leg is dark, and the light is somewhere else: where nobody has
planned for it.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     M1: {kind: mirror, at: [400, 200], facing: 120, diameter: 25.4, reflectance: 99 %}
     T1: {kind: target, at: [400, 300], facing: 270}
   routes:
     main: [red, M1, T1]  # <- route-broken

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     M1: {kind: mirror, at: [400, 200], facing: 135, diameter: 25.4, reflectance: 99 %}
     T1: {kind: target, at: [400, 300], facing: 270}
   routes:
     main: [red, M1, T1]

What it does not see
--------------------
Legs that an opaque body or a rim explains (`beam-blocked`, `clipped`), and what a state does
on purpose: an element of the route that it moves, closes or takes out, or one that another
state moves out of the way.

Source
------
Common practice: a route is walked through card in hand, leg by leg.
"""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from benchlay.checks._check import Context, Leg, Loss, above, power_text
from benchlay.findings import Finding, Severity
from benchlay.tracing.beams import FACE, NOTHING
from benchlay.tracing.front import SCATTERED

NAME = "route-broken"

# The bench does not do what it was drawn for.
SEVERITY = Severity.FAIL

_ALL = 1.0 - 1e-9  # a share that is the whole beam but for rounding


def check(context: Context, variant: int) -> Iterator[Finding]:
    """Report each beam with which routes end too early, once for all of them."""
    explained = _explained(context, variant)
    broken: dict[tuple[int, str], list[Leg]] = {}
    for leg in context.routes.of_state(variant):
        route = context.trace.ways.routes[leg.route]
        if not leg.broken or leg.beam is None or leg.beam in explained:
            continue
        wanted = route.items[leg.reached + 1]
        broken.setdefault((leg.beam, wanted.name), []).append(leg)
    for legs in broken.values():
        yield _finding(context, legs)
    yield from _seen_from_behind(context, variant)


def _seen_from_behind(context: Context, variant: int) -> Iterator[Finding]:
    """Report scattered light that a route takes from behind the face that scatters it."""
    start, f = context.trace.beams.start, context.trace.scene.faces
    rows = context.beams_of(variant)
    rows = rows[context.routes.working[rows] & (start.event[rows] == SCATTERED)]
    over = context.layout(variant).overridden
    for beam in rows.tolist():
        face, name = int(start.face[beam]), context.left_name(beam)
        wanted = context.routes.wanted(beam)
        turned = any(over.get(f"elements.{item}") for item in (name, *wanted))
        if float(start.direction[beam] @ f.normal[face]) > 0.0 or turned or not wanted:
            continue
        route = context.layout(variant).routes[context.routes.routes_of(beam)[0]]
        yield Finding(
            check=NAME,
            severity=SEVERITY,
            message=(
                f"route '{route.name}' breaks between '{name}' and '{wanted[0]}': "
                f"'{wanted[0]}' stands behind the face of '{name}' that scatters the light"
            ),
            expected=f"'{wanted[0]}' before that face",
            remedy=f"move '{wanted[0]}' to the side of '{name}' that is lit, or turn '{name}'",
            element=wanted[0],
            beam=int(context.numbers[beam]),
            at=context.point(start.position[beam]),
            span=route.span,
            key=(*context.chain(beam), wanted[0]),
        )


def _explained(context: Context, variant: int) -> set[int]:
    """Return the beams whose loss `clipped` or `beam-blocked` tells."""
    clip = context.layout(variant).limits.clip
    return {
        loss.beam
        for loss in context.meetings.losses(context.beams_of(variant))
        if (loss.whole or _all_taken(context, loss))
        and above(loss.share, clip)
        and (loss.own or context.meetings.aimed(loss.beam))
    }


def _all_taken(context: Context, loss: Loss) -> bool:
    """Whether a barrel takes all of a beam, so that no chief ray comes to an end."""
    nowhere = context.trace.beams.end_kind[loss.beam] == NOTHING
    return bool(nowhere and loss.share >= _ALL)


def _finding(context: Context, legs: list[Leg]) -> Finding:
    first = legs[0]
    assert first.beam is not None
    routes = [context.trace.ways.routes[leg.route] for leg in legs]
    here, wanted = routes[0].items[first.reached], routes[0].items[first.reached + 1]
    parts = dict.fromkeys(route.items[first.reached + 1].part for route in routes)
    targets = [f"{wanted.name}.{part}" if part else wanted.name for part in parts]
    target = targets[0] if len(targets) == 1 else wanted.name
    beam = first.beam
    scattered = bool(context.trace.diffuse()[beam])  # its power is not followed
    power = "" if scattered else f" ({power_text(float(context.trace.beams.start.power[beam]))})"
    names = " and ".join(f"'{route.name}'" for route in routes)
    breaks = f"route {names} breaks" if len(routes) == 1 else f"routes {names} break"
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=(
            f"{breaks} between '{here.name}' and '{target}': the beam"
            f"{power} {_instead(context, beam, wanted.name, len(routes))}"
        ),
        expected=f"the beam that leaves '{here.name}' meets '{target}' and goes on as named",
        remedy=_remedy(context, legs, target),
        element=wanted.name,
        beam=int(context.numbers[beam]),
        at=context.end_at(beam),
        span=wanted.span,
        related=tuple((route.span, f"route '{route.name}'") for route in routes),
        key=(*context.chain(beam), targets[0]),
    )


def _instead(context: Context, beam: int, wanted: str, routes: int) -> str:
    """Say where the light goes instead."""
    if context.trace.beams.end_kind[beam] == NOTHING:
        return "leaves the bench and meets nothing"
    if context.routes.met(beam) != wanted:
        return f"goes to {context.end_words(beam)} instead"
    if not _goes_on(context, beam):
        return f"ends at {context.end_words(beam)}"
    say = "route says" if routes == 1 else "routes say"
    return f"meets {context.end_words(beam)} but does not leave it as the {say}"


def _goes_on(context: Context, beam: int) -> bool:
    return bool(np.any(context.trace.beams.start.parent == beam))


def _remedy(context: Context, legs: list[Leg], target: str) -> str:
    leg = legs[0]
    assert leg.beam is not None
    met = context.routes.met(leg.beam)
    if met is None or context.trace.beams.end_kind[leg.beam] != FACE:
        return f"turn '{_steering(context, leg)}' so that the beam meets '{target}', or move " + (
            f"'{target}' there"
        )
    where = "the route" if len(legs) == 1 else "these routes"
    if met == target.partition(".")[0]:
        return f"turn '{met}' the other way round, or name the branch that is meant in {where}"
    return f"take '{met}' out of the way, or name it in {where} before '{target}'"


def _steering(context: Context, leg: Leg) -> str:
    """Return the last item before a break that sends the beam elsewhere when it is turned."""
    elements = context.layout(leg.variant).elements
    items = context.trace.ways.routes[leg.route].items
    for item in reversed(items[1 : leg.reached + 1]):
        record = elements[item.name].record
        if record.STEERS and (item.branch or record.DEFAULT_BRANCH) != "transmitted":
            return item.name
    return items[0].name
