"""What became of each route in each state."""

from __future__ import annotations

from math import nan

import numpy as np

from benchlay.optics import coherency
from benchlay.optics.rays import cross, dot
from benchlay.report.details import RouteResult
from benchlay.results.beam_rows import polarizations
from benchlay.results.frames import horizontals
from benchlay.scene.tables import Flags, Ints
from benchlay.tracing import Trace
from benchlay.tracing.beams import FACE, HANDED


def route_results(trace: Trace, variant: int) -> tuple[RouteResult, ...]:
    """Return one entry a route, in name order.

    A route arrives where a beam that follows it meets its last item with any power, or
    scattered light does, of which no power is known. Several beams may (lines of a source,
    two ways through an element): their powers are added, and lengths and polarization are
    those of the strongest. The transmission is what arrives of what the source emits in the
    route's lines. Where nothing arrives, lengths are not known and polarization is null.
    """
    return tuple(
        _result(trace, variant, route, last_legs(trace, variant, route))
        for route in range(len(trace.ways.names))
    )


def last_legs(trace: Trace, variant: int, route: int) -> Ints:
    """Return the beams of a variant on the last leg of a route."""
    wanted = len(trace.ways.routes[route].items) - 2
    nodes = [
        node
        for node, place in enumerate(trace.ways.places)
        if not place.inside and dict(place.routes).get(route) == wanted
    ]
    rows = trace.of_variant(variant)
    found: Ints = rows[np.isin(trace.beams.start.node[rows], nodes)]
    return found


def _result(trace: Trace, variant: int, route: int, legs: Ints) -> RouteResult:
    name, state = trace.ways.names[route], trace.scene.variants[variant]
    beams = trace.beams
    arriving = legs[_arrives(trace, route, legs)]
    if not len(arriving):
        return RouteResult(name, state, False, 0.0, 0.0, nan, nan, None)
    power = beams.end_core[arriving]
    best = int(arriving[power.argmax()])
    chain = ancestry(beams.start.parent, best)
    level = horizontals(beams.start.direction[chain], np.arange(len(chain)) - 1)[-1:]
    last = np.array([best])
    axis, direction = beams.start.axis[last], beams.start.direction[last]
    cos, sin = dot(axis, level), dot(cross(direction, axis), level)
    j = coherency.rotate(beams.end_coherency[:, last], cos, sin)
    emitted = _emitted_w(trace, variant, route)
    total = nan if trace.diffuse()[best] else float(power.sum())
    return RouteResult(
        name,
        state,
        True,
        total,
        total / emitted if emitted > 0.0 else 0.0,
        float(beams.length[chain].sum()),
        float(beams.start.optical_path[best] + beams.start.index[best] * beams.length[best]),
        polarizations(j, level)[0],
    )


def _arrives(trace: Trace, route: int, legs: Ints) -> Flags:
    """Tell which beams meet the route's last item, an element or a panel's opening."""
    beams, last = trace.beams, trace.ways.routes[route].items[-1]
    some = (beams.end_core[legs] > 0.0) | trace.diffuse()[legs]
    if last.opening is not None:
        return some & handed_at(trace, legs, ".".join(last.opening))
    on_face = beams.end_kind[legs] == FACE
    owner = trace.scene.faces.owner[np.where(on_face, beams.end_row[legs], 0)]
    met: Flags = some & on_face & (owner == trace.ways.elements[last.name])
    return met


def ancestry(parent: Ints, beam: int) -> Ints:
    """Return a beam with all beams it came from, the first first."""
    chain = [beam]
    while (before := int(parent[chain[-1]])) >= 0:
        chain.append(before)
    return np.array(chain[::-1])


def _emitted_w(trace: Trace, variant: int, route: int) -> float:
    first = trace.ways.routes[route].items[0]
    source = trace.placed.states[variant].sources[first.name].source
    if source.fed() is not None:
        return trace.emitted_w(variant).get(first.name, 0.0)
    lines = source.lines
    return sum(line.power_w for line in lines if first.wavelength_nm in (None, line.wavelength_nm))


def handed_at(trace: Trace, legs: Ints, opening: str) -> Flags:
    """Tell which beams are handed over at an opening, whether its panel stands or is open."""
    beams = trace.beams
    there = [name == opening for name in _hole_names(trace)]
    handed = beams.end_kind[legs] == HANDED
    found: Flags = handed & np.array([*there, False])[np.where(handed, beams.end_row[legs], -1)]
    return found


def _hole_names(trace: Trace) -> list[str]:
    return [trace.scene.names[number] for number in trace.scene.solids.hole_name.tolist()]
