"""Beams that leave through a port on purpose: the last item of a route is an opening."""

from __future__ import annotations

import numpy as np

from benchlay.optics import moments
from benchlay.optics.rays import bench_basis, cross, dot
from benchlay.report.details import Axis, HandedOver
from benchlay.results.routes import handed_at, last_legs
from benchlay.tracing import Trace


def handed_over(trace: Trace, variant: int) -> tuple[HandedOver, ...]:
    """Return the beams that routes hand over in a variant, by opening and beam.

    The axis is given where it ends, in the plane of the opening's inner side, and the radii
    (the one nearer to horizontal first) there too.
    """
    found = []
    for route, what in enumerate(trace.ways.routes):
        opening = what.items[-1].opening
        if opening is None:
            continue
        legs = last_legs(trace, variant, route)
        name = ".".join(opening)
        found += [(name, beam) for beam in legs[handed_at(trace, legs, name)].tolist()]
    return tuple(_row(trace, name, beam) for name, beam in sorted(set(found)))


def _row(trace: Trace, name: str, beam: int) -> HandedOver:
    beams = trace.beams
    rows, m = np.array([beam]), beams.end_moments[:, [beam]]
    direction, axis = beams.start.direction[rows], beams.start.axis[rows]
    level, second = bench_basis(direction)[0], cross(direction, axis)
    w1, w2, _ = moments.radii(moments.rotate(m, dot(axis, level), dot(second, level)))
    x, y, z = beams.end[beam].tolist()
    dx, dy, dz = direction[0].tolist()
    return HandedOver(
        name,
        Axis((x, y, z), (dx, dy, dz)),
        (float(w1[0]), float(w2[0])),
        float(beams.end_core[beam]),
        trace.scene.variants[int(beams.start.variant[beam])],
    )
