"""The leg of a beam that is to be ended, whether it was traced at rest or with a fault."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np

from benchlay.checks import Context
from benchlay.faults import Light
from benchlay.layout.layout import Layout
from benchlay.named import NamedTuple
from benchlay.optics import moments
from benchlay.scene.tables import Floats


class Way(NamedTuple):
    """A straight leg in a layout; `radius_mm` gives the larger 1/e² radius some way along it.

    `beam` is its row in the trace at rest; none is there where it takes a fault.
    """

    layout: Layout
    origin: Floats
    direction: Floats
    length_mm: float
    power_w: float
    left: str
    radius_mm: Callable[[float], float]
    beam: int | None = None


def way_of_beam(context: Context, beam: int) -> Way:
    """Return the leg of a beam of the trace."""
    start = context.trace.beams.start

    def radius(way_mm: float) -> float:
        m = moments.propagate(start.moments[:, beam], way_mm, start.index[beam])
        w1, w2, _ = moments.radii(m)
        return float(np.maximum(w1, w2))

    return Way(
        context.layout(int(start.variant[beam])),
        start.position[beam],
        start.direction[beam],
        float(context.trace.beams.length[beam]),
        float(start.power[beam]),
        context.left_at(beam),
        radius,
        beam,
    )


def way_of_light(layout: Layout, light: Light) -> Way:
    """Return the leg of light that a fault sends out; it takes as much room as a thin beam."""
    origin, end = np.array(light.origin), np.array(light.end)
    return Way(
        layout,
        origin,
        np.array(light.direction),
        float(np.linalg.norm(end - origin)),
        light.power_w,
        light.left,
        lambda _: 1.0,
    )
