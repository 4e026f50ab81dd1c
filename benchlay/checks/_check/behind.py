"""What stands behind the end of a beam: light that lands there has passed the end already."""

from __future__ import annotations

import numpy as np

from benchlay.optics import moments
from benchlay.optics.rays import cross, dot
from benchlay.scene.tables import Floats, Ints
from benchlay.tracing import Trace
from benchlay.tracing.bodies import crossed

_OUT_TO = 2.0  # in w: outside of it are 3 parts in 10 000 of a beam
_STEP = 0.125  # in w, between neighbouring lines
_ROUNDING_MM = 1e-6


def met_before_end(trace: Trace, beam: int, solids: Ints) -> bool:
    """Whether any of some solids stands in a beam's envelope before its chief ray ends.

    Lines of flow are followed from the beam's start to its end, a grid of them in the scaled
    cross-section; a body between two neighbours counts as met.
    """
    start, end, width = _flow_lines(trace, beam)
    way = end - start
    length = np.sqrt(dot(way, way))
    lines = trace.beams.start.take(np.full(len(length), beam)).changed(
        position=start, direction=way / length[:, None]
    )
    line, solid = (grid.ravel() for grid in np.meshgrid(np.arange(len(length)), solids))
    met = crossed(lines, trace.scene, line, solid, np.full(len(line), _STEP * width))
    before = (met.enter <= met.leave) & (met.leave > 0.0)
    before &= met.enter < length[met.beam] - _ROUNDING_MM
    return bool(before.any())


def _flow_lines(trace: Trace, beam: int) -> tuple[Floats, Floats, float]:
    """Return where lines of flow start and end (n, 3), mm, and the larger w on the way."""
    beams = trace.beams
    ticks = np.arange(-_OUT_TO, _OUT_TO + _STEP / 2, _STEP)
    grid = np.stack(np.meshgrid(ticks, ticks), axis=-1).reshape(-1, 2)
    grid = grid[dot(grid, grid) <= _OUT_TO**2]
    direction, first = beams.start.direction[beam], beams.start.axis[beam]
    axes = np.stack((first, cross(direction[None], first[None])[0]))
    ends = ((beams.start.position, beams.start.moments), (beams.end, beams.end_moments))
    points, widest = [], 0.0
    for at, m in ends:
        w11, w12, w22 = moments.root(m[:, beam])
        points.append(at[beam] + grid @ np.array([[w11, w12], [w12, w22]]) @ axes)
        widest = max(widest, *(float(w) for w in moments.radii(m[:, beam])[:2]))
    return points[0], points[1], widest
