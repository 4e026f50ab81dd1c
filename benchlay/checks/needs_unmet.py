"""What arrives at the end of a route is less, or longer on its way, than the route needs.

Why it matters
--------------
The work that the light is for cannot be done, though the beam gets there.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     F1: {kind: filter, after: red, distance: 200, diameter: 25.4, density: 1}
     T1: {kind: target, after: F1, distance: 100}
   routes:
     main:  # <- needs-unmet
       path: [red, F1, T1]
       needs: {power: 1 mW}

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     F1: {kind: filter, after: red, distance: 200, diameter: 25.4, density: 0.3}
     T1: {kind: target, after: F1, distance: 100}
   routes:
     main:
       path: [red, F1, T1]
       needs: {power: 1 mW, transmits: 40 %, path: {is: 302, within: 2}}

What it does not see
--------------------
Routes that break: `route-broken`, `clipped` and `beam-blocked` tell those. Light that arrives
by ghosts is not counted.

Source
------
The layout's own `needs`.
"""

from __future__ import annotations

from collections.abc import Iterator

from benchlay.checks._check import (
    Context,
    Found,
    Unevaluated,
    above,
    length_text,
    power_text,
    share_text,
)
from benchlay.findings import Finding, Severity
from benchlay.layout.routes import Route

NAME = "needs-unmet"

# The bench does not do what it was drawn for.
SEVERITY = Severity.FAIL


def check(context: Context, variant: int) -> Iterator[Found]:
    """Report each need of each route that arrives."""
    for leg in context.routes.of_state(variant):
        route = context.trace.ways.routes[leg.route]
        if leg.arrives and leg.beam is not None and route.needs is not None:
            if bool(context.trace.diffuse()[leg.beam]):
                yield from _unknown_power(route)
            else:
                yield from _power(context, route, leg.beam)
            yield from _path(context, route, leg.beam)


def _unknown_power(route: Route) -> Iterator[Unevaluated]:
    """Say that the power of light that a target scatters is not followed."""
    needs = route.needs
    assert needs is not None
    if needs.power_w is not None or needs.transmits is not None:
        yield Unevaluated(
            f"route '{route.name}' goes by scattered light, whose power is not followed",
            "need a path only, and measure the power",
            element=route.items[-1].name,
            span=route.span,
        )


def _power(context: Context, route: Route, beam: int) -> Iterator[Finding]:
    needs = route.needs
    assert needs is not None
    arriving = float(context.trace.beams.end_core[beam])
    if needs.power_w is not None and above(needs.power_w, arriving):
        yield _finding(
            context,
            route,
            beam,
            (
                f"{power_text(arriving)} arrive by route '{route.name}'",
                f"at least {power_text(needs.power_w)}",
                "raise the power of the source, or lose less on the way",
            ),
        )._replace(
            value=arriving, limit=needs.power_w, unit="W", key=(*context.chain(beam), "power")
        )
    emitted = float(context.trace.beams.start.power[context.ancestors(beam)[-1]])
    share = arriving / emitted if emitted > 0.0 else 0.0
    if needs.transmits is not None and above(needs.transmits, share):
        yield _finding(
            context,
            route,
            beam,
            (
                f"{share_text(share)} of what is emitted arrives by route '{route.name}'",
                f"at least {share_text(needs.transmits)}",
                "look where the route loses most: coatings, filters, apertures",
            ),
        )._replace(value=share, limit=needs.transmits, key=(*context.chain(beam), "transmits"))


def _path(context: Context, route: Route, beam: int) -> Iterator[Finding]:
    path = None if route.needs is None else route.needs.path
    if path is None:
        return
    beams = context.trace.beams
    length = float(beams.start.optical_path[beam] + beams.start.index[beam] * beams.length[beam])
    off = length - path.is_mm
    if above(abs(off), path.within_mm):
        yield _finding(
            context,
            route,
            beam,
            (
                f"the optical path of route '{route.name}' is {length_text(length)}, "
                f"{length_text(abs(off))} too {'long' if off > 0.0 else 'short'}",
                f"{length_text(path.is_mm)} within {length_text(path.within_mm)}",
                f"{'shorten' if off > 0.0 else 'lengthen'} the way by {length_text(abs(off))}",
            ),
        )._replace(
            value=abs(off), limit=path.within_mm, unit="mm", key=(*context.chain(beam), "path")
        )


def _finding(context: Context, route: Route, beam: int, words: tuple[str, str, str]) -> Finding:
    message, expected, remedy = words
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=message,
        expected=expected,
        remedy=remedy,
        element=route.items[-1].name,
        beam=int(context.numbers[beam]),
        at=context.end_at(beam),
        span=route.span,
        smaller_is_worse=expected.startswith("at least"),
    )
