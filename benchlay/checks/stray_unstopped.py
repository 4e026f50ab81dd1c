"""Stray light above the accessible limit ends where nothing is meant to stop it.

Why it matters
--------------
Ghosts of uncoated faces, leaks of mirrors and refused ports of polarizers leave the plan that
everyone has in mind. Nobody wears eyewear against a beam that is on no drawing; a rejected
beam of a polarizer is among the best documented accidents on laser tables.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red:
       {wavelength: 633, power: 50 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     W1:  # <- stray-unstopped
       {kind: window, after: red, distance: 200, incidence: 45, diameter: 25.4, back: 0.01 %}
     T1: {kind: target, after: W1, distance: 100}
   routes:
     main: [red, W1, T1]

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red:
       {wavelength: 633, power: 50 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     W1: {kind: window, after: red, distance: 200, incidence: 45, diameter: 25.4, back: 0.01 %}
     D1: {kind: dump, after: [red, W1.reflected], distance: 100}
     T1: {kind: target, after: [red, W1.transmitted], distance: 100}
   routes:
     main: [red, W1, T1]

What it does not see
--------------------
Diffuse light. What a dump or screen sends back. Strays that are each below the limit, however
many they are (`unaccounted` weighs those below the floor). Light swallowed inside the optic it
entered, and rims that cut working beams, are exempt: `clipped` tells those.

Source
------
Stray beams are to be found and stopped, each one (common practice; ANSI Z136.8 for research
settings, cited from memory). The accessible limit is the eye's exposure limit times its
limiting aperture, IEC 60825-1:2014, for the layout's time base.
"""

from __future__ import annotations

from collections.abc import Iterator
from math import atan2, degrees

import numpy as np

from benchlay.checks._check import (
    Context,
    Found,
    above,
    event_words,
    exposure_words,
    place_words,
    power_text,
    unjudged,
    wavelength_text,
)
from benchlay.findings import Finding, Severity
from benchlay.named import NamedTuple
from benchlay.scene.tables import PARTS, SINK, SINKS, Floats
from benchlay.tracing.beams import SOLID
from benchlay.tracing.front import EVENTS, OUTSIDE, REFLECTED

NAME = "stray-unstopped"

# A beam that can hurt an eye goes where nobody expects it.
SEVERITY = Severity.FAIL

_PROPER = frozenset(
    SINKS.index(name) for name in ("screen", "dump", "panel", "absorbed", "handed-over")
)
_ELSEWHERE_TOLD = frozenset((SINKS.index("below-floor"),))  # `unaccounted`
_ROOM_MM = 15.0  # a small screen beside a beam: common practice
_UPRIGHT = 1e-6  # plan part of a direction below which it has no heading worth telling


class _Group(NamedTuple):
    """All strays of one line that left at one face and end in one place."""

    source: int
    wave: int
    left_at: str
    sink: int
    name: int


class _Landing(NamedTuple):
    beam: int
    since: int  # the first beam off the route
    power_w: float  # what an eye could meet of it


def check(context: Context, variant: int) -> Iterator[Found]:
    """Report each face where light left its route and place where it ends, with the sum."""
    yield from unjudged(context, variant)
    for group, landings in _groups(context, variant).items():
        worst = max(landings, key=lambda landing: (landing.power_w, -landing.beam))
        if above(worst.power_w, float(context.limit_w[worst.beam])):
            yield _finding(context, variant, group, landings, worst)


def _groups(context: Context, variant: int) -> dict[_Group, list[_Landing]]:
    trace = context.trace
    ledger, start = trace.ledger, trace.beams.start
    # Where a state cuts a route short on purpose, what goes on belongs to no route any more.
    cut_short = np.isin(ledger.beam, context.routes.interrupted(variant))
    stray = (start.node[ledger.beam] < 0) | (cut_short & (ledger.sink != SINK["rim"]))
    mine = (start.variant[ledger.beam] == variant) & stray
    mine &= ~np.isin(ledger.sink, list(_PROPER | _ELSEWHERE_TOLD)) & (ledger.power > 0.0)
    mine &= start.within[ledger.beam] == OUTSIDE
    rows = np.flatnonzero(mine)
    beams = ledger.beam[rows]
    power = np.minimum(ledger.power[rows], context.accessible_w[beams])
    with np.errstate(invalid="ignore"):
        over = power > context.limit_w[beams]
    if not over.any():
        return {}
    # Of the rest only what ends where something over the limit ends can belong to its sum.
    places = np.stack((ledger.sink[rows], ledger.name[rows], start.wave[beams]), axis=1)
    told = (places[:, None, :] == np.unique(places[over], axis=0)).all(axis=2).any(axis=1)
    rows, power = rows[told], power[told]
    groups: dict[_Group, list[_Landing]] = {}
    since: dict[int, int] = {}
    columns = (ledger.beam[rows], ledger.sink[rows], ledger.name[rows], power)
    for beam, sink, name, watts in zip(*(c.tolist() for c in columns), strict=True):
        first = since.setdefault(beam, context.astray_since(beam))
        if not _stops(context, variant, first, sink, name):
            source, wave = int(start.source[beam]), int(start.wave[beam])
            group = _Group(source, wave, context.left_at(first), sink, name)
            groups.setdefault(group, []).append(_Landing(beam, first, watts))
    return groups


def _stops(context: Context, variant: int, first: int, sink: int, name: int) -> bool:
    """Whether a place stops strays: a target those of its own routes, a tube by its body."""
    scene = context.trace.scene
    if SINKS[sink] == "target":
        return scene.names[name] in _items_of_routes_left(context, first)
    if SINKS[sink] != "body" or name < 0:
        return False
    item = context.state(variant).elements.get(scene.names[name])
    if item is None or not item.element.record.BLOCKS:
        return False
    # Of what stops strays only a tube has no face made for it: its body is what stops them.
    return item.geometry.barrel == "body"


def _items_of_routes_left(context: Context, first: int) -> set[str]:
    parent = int(context.trace.beams.start.parent[first])
    if parent < 0 or context.trace.beams.start.node[parent] < 0:
        return set()
    routes = context.trace.ways.places[int(context.trace.beams.start.node[parent])].routes
    return {item.name for number, _ in routes for item in context.trace.ways.routes[number].items}


def _finding(
    context: Context, variant: int, group: _Group, landings: list[_Landing], worst: _Landing
) -> Finding:
    scene = context.trace.scene
    nm, source = float(scene.wavelengths_nm[group.wave]), scene.sources[group.source]
    element = context.left_name(worst.since)
    total = float(sum(landing.power_w for landing in landings))
    limit = float(context.limit_w[worst.beam])
    name = scene.names[group.name] if group.name >= 0 else None
    where = _where(context, group, worst.beam, name)
    most = f", {power_text(worst.power_w)} of it in one beam" if len(landings) > 1 else ""
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=(
            f"{power_text(total)} of stray {wavelength_text(nm)} light from '{source}', "
            f"{_left(context, worst.since)}, {where}{most}: "
            f"{exposure_words(context, worst.beam, worst.power_w)}"
        ),
        expected=(
            f"at most {power_text(limit)} that ends elsewhere than on a dump, screen, closed "
            "shutter, panel, lid or tube"
        ),
        remedy=_remedy(context, worst),
        element=element,
        beam=int(context.numbers[worst.beam]),
        at=context.end_at(worst.beam),
        span=context.span_of(element, variant),
        value=total,
        limit=limit,
        unit="W",
        key=(source, nm, group.left_at, SINKS[group.sink], name),
    )


def _left(context: Context, first: int) -> str:
    """Say how the light left its route."""
    event = EVENTS[context.trace.beams.start.event[first]]
    if event == "emitted":
        return "which no route names"
    return f"{event_words(event)} '{context.left_at(first)}'"


def _where(context: Context, group: _Group, beam: int, name: str | None) -> str:
    """Say where it ends."""
    beams, s = context.trace.beams, context.trace.scene.solids
    sink = SINKS[group.sink]
    if sink == "escaped":
        return "leaves the bench and meets nothing"
    part = None
    row = int(beams.end_row[beam])
    if beams.end_kind[beam] == SOLID and s.name[row] == group.name:
        part = PARTS[s.part[row]]
    other = " of another route" if sink == "target" else ""
    return f"ends on {place_words(sink, name, part)}{other}"


def _remedy(context: Context, worst: _Landing) -> str:
    """Say how to stop it, and where on its last leg there is room for that."""
    beams, beam = context.trace.beams, worst.beam
    spot = _free_spot(context, beam)
    if spot is None:
        return _out_of_the_way(context, worst)
    k = beams.start.direction[beam]
    x, y, z = context.point(spot)
    place = f"stop it with a dump or screen, for instance at [{x:.0f}, {y:.0f}, {z:.0f}]"
    if float(np.hypot(k[0], k[1])) < _UPRIGHT:
        return f"{place}, {'above' if k[2] > 0.0 else 'below'} '{context.left_name(beam)}'"
    return f"{place} with `facing: {round(degrees(atan2(-k[1], -k[0]))) % 360}`"


def _out_of_the_way(context: Context, worst: _Landing) -> str:
    """Say what to do where a stop would stand in a working beam all along the leg."""
    start, first = context.trace.beams.start, worst.since
    back = context.left_name(first)
    turn = f"turn '{back}' so that the light leaves the way of the beams, and stop it there"
    face = int(start.face[first])
    ghost = face >= 0 and start.event[first] == REFLECTED
    if not ghost or context.trace.ways.main[face, 0]:
        return turn
    side = context.trace.scene.face_names[context.trace.scene.faces.name[face]]
    nm = wavelength_text(context.wavelength_nm(first))
    return f"give the {side} of '{back}' a coating that reflects less at {nm}, or {turn}"


def _free_spot(context: Context, beam: int) -> Floats | None:
    """Return a place on a leg with room for a stop beside the working beams of all states."""
    start, length = context.trace.beams.start, float(context.trace.beams.length[beam])
    near = min(length, _near_enough(context))
    for way in (0.5 * near, 0.75 * near, 0.9 * near, 0.25 * near):
        spot: Floats = start.position[beam] + way * start.direction[beam]
        if context.routes.apart(spot, beam) >= _ROOM_MM:
            return spot
    return None


def _near_enough(context: Context) -> float:
    """Return a length within which a stop is likely to stand on the bench."""
    xs, ys = zip(*context.layout(0).bench.outline, strict=True)
    return 0.25 * float(max(max(xs) - min(xs), max(ys) - min(ys)))
