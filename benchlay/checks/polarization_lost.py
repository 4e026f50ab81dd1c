"""Light arrives in another state of polarization than its route needs.

Why it matters
--------------
Fringes fade, polarizers refuse, Brewster windows reflect. Folds out of the plane, metal mirrors
and waveplates turn the state without anyone meaning it.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red:
       wavelength: 633
       power: 5 mW
       beam: {waist_radius: 0.5}
       polarization: vertical
       at: [100, 200]
       heading: 0
   elements:
     H1:
       {kind: waveplate, after: red, distance: 200, diameter: 25.4, retardance: half, axis: 60}
     T1: {kind: target, after: H1, distance: 100}
   routes:
     main:  # <- polarization-lost
       path: [red, H1, T1]
       needs: {polarization: vertical}

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red:
       wavelength: 633
       power: 5 mW
       beam: {waist_radius: 0.5}
       polarization: vertical
       at: [100, 200]
       heading: 0
   elements:
     H1:
       {kind: waveplate, after: red, distance: 200, diameter: 25.4, retardance: half, axis: 45}
     T1: {kind: target, after: H1, distance: 100}
   routes:
     main:
       path: [red, H1, T1]
       needs: {polarization: {angle: 0, within: 2}}

What it does not see
--------------------
Stress in windows and lenses. Routes that break are told by other checks.

Source
------
Where a route names no tolerance, at least 99 % of the power must be in the wanted state: two
linear states 5.7 degrees apart share that much (law of Malus, cos squared). Where it names an
angle, as much must be linear at all.
"""

from __future__ import annotations

from collections.abc import Iterator
from math import degrees, pi

import numpy as np

from benchlay.checks._check import Context, Found, Unevaluated, above, angle_text, share_text
from benchlay.findings import Finding, Severity
from benchlay.layout.light import Polarization
from benchlay.layout.routes import Route
from benchlay.optics import coherency
from benchlay.optics.rays import bench_basis, dot
from benchlay.scene.tables import Floats

NAME = "polarization-lost"

# The bench does not do what it was drawn for.
SEVERITY = Severity.FAIL

_SHARE = 0.99
_MOST_UNPOLARIZED = 0.1  # degree of polarization that still passes for `none`: 55 to 45


def check(context: Context, variant: int) -> Iterator[Found]:
    """Report each route that arrives in another state than it needs."""
    for leg in context.routes.of_state(variant):
        route = context.trace.ways.routes[leg.route]
        wanted = None if route.needs is None else route.needs.polarization
        if not leg.arrives or leg.beam is None or wanted is None:
            continue
        if bool(context.trace.diffuse()[leg.beam]):
            yield Unevaluated(
                f"route '{route.name}' goes by scattered light, whose polarization is not followed",
                "need no polarization of it, or measure it",
                element=route.items[-1].name,
                span=route.span,
            )
            continue
        j = _arriving(context, leg.beam)
        if isinstance(wanted, Polarization):
            yield from _by_share(context, route, leg.beam, j, wanted)
        else:
            yield from _by_angle(context, route, leg.beam, j, (wanted.angle_rad, wanted.within_rad))


def _arriving(context: Context, beam: int) -> Floats:
    """Return the coherency at the end in the beam's horizontal and vertical, to unit power."""
    beams = context.trace.beams
    k, e1 = beams.start.direction[[beam]], beams.start.axis[[beam]]
    level, up = bench_basis(k)
    j = coherency.rotate(beams.end_coherency[:, [beam]], dot(level, e1), -dot(up, e1))[:, 0]
    unit: Floats = j / (j[0] + j[1])
    return unit


def _stokes(j: Floats) -> tuple[float, float, float]:
    _, s1, s2, s3 = coherency.stokes(j).tolist()
    return s1, s2, s3


def _by_angle(
    context: Context, route: Route, beam: int, j: Floats, wanted: tuple[float, float]
) -> Iterator[Finding]:
    s1, s2, s3 = _stokes(j)
    linear = 0.5 * (1.0 + float(np.hypot(s1, s2)))
    if above(_SHARE, linear):  # light that is round or unpolarized has no angle to speak of
        yield _finding(
            context,
            route,
            beam,
            f"arrives with {share_text(linear)} of its power linear ({_ellipse(s1, s2, s3)})",
            f"at least {share_text(_SHARE)} of it linear, at {angle_text(wanted[0] % pi)}",
        )._replace(value=linear, limit=_SHARE, smaller_is_worse=True)
        return
    angle = 0.5 * float(np.arctan2(s2, s1)) % pi
    off = abs((angle - wanted[0] + pi / 2) % pi - pi / 2)
    if above(off, wanted[1]):
        yield _finding(
            context,
            route,
            beam,
            f"arrives polarized at {angle_text(angle)} ({_ellipse(s1, s2, s3)})",
            f"{angle_text(wanted[0] % pi)} within {angle_text(wanted[1])}",
        )._replace(value=degrees(off), limit=degrees(wanted[1]), unit="deg")


def _by_share(
    context: Context, route: Route, beam: int, j: Floats, wanted: Polarization
) -> Iterator[Finding]:
    s1, s2, s3 = _stokes(j)
    if wanted.kind == "none":
        degree = float(np.sqrt(s1 * s1 + s2 * s2 + s3 * s3))
        if above(degree, _MOST_UNPOLARIZED):
            yield _finding(
                context,
                route,
                beam,
                f"arrives polarized to {share_text(degree)}",
                f"unpolarized light (to {share_text(_MOST_UNPOLARIZED)})",
            )._replace(value=degree, limit=_MOST_UNPOLARIZED)
        return
    if wanted.kind == "circular":
        hand = 1.0 if wanted.hand == "right" else -1.0
        share, name = 0.5 * (1.0 + hand * s3), f"circular {wanted.hand}"
    else:
        c, s = np.cos(2.0 * wanted.angle_rad), np.sin(2.0 * wanted.angle_rad)
        share, name = (
            0.5 * float(1.0 + c * s1 + s * s2),
            f"linear at {angle_text(wanted.angle_rad)}",
        )
    if above(_SHARE, share):
        yield _finding(
            context,
            route,
            beam,
            f"arrives with {share_text(share)} of its power {name} ({_ellipse(s1, s2, s3)})",
            f"at least {share_text(_SHARE)} of it {name}",
        )._replace(value=share, limit=_SHARE, smaller_is_worse=True)


def _ellipse(s1: float, s2: float, s3: float) -> str:
    """Say what the state is: its main direction and how far from linear it is."""
    angle = 0.5 * float(np.arctan2(s2, s1)) % pi
    total = float(np.sqrt(s1 * s1 + s2 * s2 + s3 * s3))
    ellipticity = 0.5 * float(np.arcsin(np.clip(s3 / max(total, 1e-12), -1.0, 1.0)))
    return (
        f"main direction {angle_text(angle)}, ellipticity {angle_text(ellipticity)}, "
        f"degree {share_text(total)}"
    )


def _finding(context: Context, route: Route, beam: int, what: str, expected: str) -> Finding:
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=f"the beam of route '{route.name}' {what}",
        expected=expected,
        remedy="set a waveplate before its end, or look for the fold that turns the state",
        element=route.items[-1].name,
        beam=int(context.numbers[beam]),
        at=context.end_at(beam),
        span=route.span,
        key=context.chain(beam),
    )
