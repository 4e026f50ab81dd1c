"""Beams that leave through a port on purpose: the last item of a route is an opening."""

from __future__ import annotations

import numpy as np

from benchlay.optics import moments
from benchlay.optics.rays import bench_basis, cross, dot
from benchlay.report.details import Axis, HandedOver
from benchlay.results.routes import last_legs, through_opening
from benchlay.tracing import Trace


def handed_over(trace: Trace, variant: int) -> tuple[HandedOver, ...]:
    """Return the beams that routes hand over in a variant, by opening and beam.

    The axis is given where it crosses the plane of the opening's inner side, and the radii
    (the one nearer to horizontal first) there too.
    """
    found = []
    for route, what in enumerate(trace.ways.routes):
        opening = what.items[-1].opening
        if opening is None:
            continue
        legs = last_legs(trace, variant, route)
        for beam in legs[through_opening(trace, legs, opening)].tolist():
            found.append((".".join(opening), beam))
    return tuple(_row(trace, name, beam) for name, beam in sorted(set(found)))


def _row(trace: Trace, name: str, beam: int) -> HandedOver:
    s, start = trace.scene.solids, trace.beams.start
    hole = next(h for h, n in enumerate(s.hole_name.tolist()) if trace.scene.names[n] == name)
    direction, position = start.direction[beam], start.position[beam]
    through = s.hole_through[hole]
    distance = float((s.hole_centre[hole] - position) @ through / (direction @ through))
    at = position + distance * direction
    rows = np.array([beam])
    m = moments.propagate(start.moments[:, rows], np.array([distance]), start.index[rows])
    level = bench_basis(direction[None])[0]
    axis = start.axis[rows]
    second = cross(direction[None], axis)
    w1, w2, _ = moments.radii(moments.rotate(m, dot(axis, level), dot(second, level)))
    x, y, z = at.tolist()
    dx, dy, dz = direction.tolist()
    return HandedOver(
        name,
        Axis((x, y, z), (dx, dy, dz)),
        (float(w1[0]), float(w2[0])),
        float(trace.beams.end_core[beam]),
    )
