"""Normals of what beams meet and leave."""

from __future__ import annotations

import numpy as np

from benchlay.scene.tables import Floats
from benchlay.tracing.beams import FACE, SOLID
from benchlay.tracing.trace import Trace

_ON_PLANE_MM = 1e-3


def normal_met(trace: Trace, beam: int) -> Floats | None:
    """Return the unit normal, (3,), to the side a beam comes from, of what its chief ray meets.

    None where it meets nothing, or is handed over.
    """
    b, scene = trace.beams, trace.scene
    kind, row = int(b.end_kind[beam]), int(b.end_row[beam])
    towards = b.start.direction[beam]
    if kind == FACE:
        normal = scene.faces.normal[row]
    elif kind == SOLID:
        normal = _side(trace, row, b.end[beam], towards)
    else:
        return None
    facing: Floats = -normal if float(normal @ towards) > 0.0 else normal
    return facing


def normal_left(trace: Trace, beam: int) -> Floats | None:
    """Return the unit normal, (3,), to the side a beam goes to, of the face it left, if any."""
    s = trace.beams.start
    if int(s.face[beam]) < 0:
        return None
    normal = trace.scene.faces.normal[int(s.face[beam])]
    facing: Floats = -normal if float(normal @ s.direction[beam]) < 0.0 else normal
    return facing


def _side(trace: Trace, row: int, point: Floats, towards: Floats) -> Floats:
    """Return the outward normal of a solid's side at a point; back along the beam if round."""
    s = trace.scene.solids
    planes = np.flatnonzero(s.plane_solid == row)
    gaps = np.abs(s.plane_normal[planes] @ point - s.plane_offset[planes])
    if not len(planes) or gaps.min() > _ON_PLANE_MM:
        return -towards
    normal: Floats = s.plane_normal[planes[int(np.argmin(gaps))]]
    return normal
