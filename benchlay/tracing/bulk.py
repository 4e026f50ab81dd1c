"""What happens to beams inside optics, between one face and the next."""

from __future__ import annotations

import numpy as np

from benchlay.optics import coherency
from benchlay.optics.rays import cross, dot
from benchlay.scene.tables import BULKS, Floats, Scene
from benchlay.tracing.front import Front

_CLEAR, _ABSORBER, _POLARIZER, _RETARDER, _ROTATOR, _CONVERTER = range(len(BULKS))


def passage(front: Front, scene: Scene, length_mm: Floats) -> tuple[Floats, Floats]:
    """Return coherency (4, N) at the end of legs inside an optic, and what was absorbed (N,).

    Parameters
    ----------
    front : Front
        Beams inside optics.
    scene : Scene
        Says what each optic does inside.
    length_mm : (N,) ndarray of float64
        Length of the leg, in mm.
    """
    b = scene.bulks
    kind = b.kind[front.within]
    j = front.coherency
    lost = np.zeros(len(kind))
    absorber = kind == _ABSORBER
    if absorber.any():
        share = b.passes[front.within, front.wave]
        thickness = b.thickness[front.within]
        # A filter without thickness weakens every passage alike, whatever the angle.
        grows = absorber & (thickness > 0.0)
        paths = np.where(grows, length_mm, 1.0) / np.where(grows, thickness, 1.0)
        passed = np.where(absorber, share**paths, 1.0)
        lost = front.power * (1.0 - passed)
        j = j * passed
    acting = (kind == _POLARIZER) | (kind == _RETARDER)
    if acting.any():
        angle = _axis_angle(front, scene)
        passes, refused = b.passes[front.within, front.wave], b.refused[front.within, front.wave]
        polarized = coherency.polarizer(j, angle, passes, refused)
        swallowed = coherency.polarizer(j, angle, 1.0 - passes, 1.0 - refused)
        lost = lost + np.where(kind == _POLARIZER, swallowed[0] + swallowed[1], 0.0)
        retarded = coherency.retarder(j, angle, b.phase[front.within, front.wave])
        j = np.where(kind == _POLARIZER, polarized, np.where(kind == _RETARDER, retarded, j))
    turning = kind == _ROTATOR
    if turning.any():
        # The same sense in space both ways. The path grows and the field along it shrinks by
        # the same cosine, so the angle is that of normal incidence.
        way = np.sign(dot(front.direction, b.axis[front.within]))
        angle = np.where(turning, way * b.phase[front.within, front.wave], 0.0)
        j = coherency.rotator(j, angle)
    return j, lost


def _axis_angle(front: Front, scene: Scene) -> Floats:
    """Return the angle from each beam's axis e1 towards e2 of the element's axis."""
    axis = scene.bulks.axis[front.within]
    second = cross(front.direction, front.axis)
    angle: Floats = np.arctan2(dot(axis, second), dot(axis, front.axis))
    return angle
