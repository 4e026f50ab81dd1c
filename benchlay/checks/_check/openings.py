"""How much of a beam passes an optic's clear region, and how far off it may be met."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np

from benchlay.named import NamedTuple
from benchlay.optics import moments
from benchlay.optics.rays import cross
from benchlay.optics.shares import Shapes, partition
from benchlay.scene.tables import Flags, Floats
from benchlay.tracing import Trace

_STEPS = 41
_ROUNDS = 3  # each narrows the bracket 40-fold: below a micrometre for any optic
_WIDEST = 64.0


class Room(NamedTuple):
    """What a beam needs at an optic.

    `off_mm` is how far from the middle the chief ray meets it, `may_be_off_mm` how far it
    might while losing no more than allowed (None: not even in the middle), `clear_mm` the
    lesser width of the clear region and `needed_mm` the one that would do as it is met.
    """

    off_mm: float
    may_be_off_mm: float | None
    clear_mm: float
    needed_mm: float


def room_at(trace: Trace, beam: int, face: int, off: tuple[float, float], clip: float) -> Room:
    """Return what a beam needs at a face that it meets `off` (left, up) the middle."""
    f = trace.scene.faces
    half = f.clear[face]
    distance = float(np.hypot(*off))
    way = np.array(off) / distance if distance > 0.0 else np.array([1.0, 0.0])

    def lost(offsets: Floats, scales: Floats) -> Floats:
        return 1.0 - _passing(trace, beam, face, offsets[:, None] * way, scales)

    one = np.ones(_STEPS)
    most = float(np.hypot(*half))
    allowed = None
    if lost(np.zeros(1), np.ones(1))[0] <= clip:
        allowed = _edge(lambda x: lost(x, one) <= clip, 0.0, most)
    needed = _edge(lambda x: lost(distance * one, x) > clip, 0.0, _WIDEST, upper=True)
    clear = 2.0 * float(half.min())
    return Room(distance, allowed, clear, clear * needed)


def _edge(
    holds: Callable[[Floats], Flags], low: float, high: float, *, upper: bool = False
) -> float:
    """Return the largest x for which a condition holds up to x (the next step for `upper`)."""
    for _ in range(_ROUNDS):
        steps = np.linspace(low, high, _STEPS)
        bad = np.flatnonzero(~holds(steps))
        last = int(bad[0]) if len(bad) else _STEPS - 1
        low, high = float(steps[max(last - 1, 0)]), float(steps[last])
    return high if upper else low


def _passing(trace: Trace, beam: int, face: int, off: Floats, scale: Floats) -> Floats:
    """Return the share of the uncut beam that passes the clear region, scaled, met `off`."""
    f, beams = trace.scene.faces, trace.beams
    k, e1 = beams.start.direction[beam], beams.start.axis[beam]
    basis = np.stack((e1, cross(k[None], e1[None])[0]))
    r11, r12, r22 = moments.inverse_root(beams.end_moments[:, beam])
    scaled = np.array([[r11, r12], [r12, r22]]) @ basis
    left, up = scaled @ f.left[face], scaled @ f.up[face]
    n = len(off)
    centre = -(off[:, :1] * left + off[:, 1:] * up)
    axes = np.stack((f.clear[face, 0] * left, f.clear[face, 1] * up), axis=1)
    half = scale[:, None, None] * axes
    signs = np.array([[-1.0, -1.0], [1.0, -1.0], [1.0, 1.0], [-1.0, 1.0]])
    if np.linalg.det(axes) < 0.0:
        signs = signs[::-1]
    corners = centre[:, None, :] + np.einsum("vi,nji->nvj", signs, half)
    shapes = Shapes(
        problem=np.arange(n),
        corners=np.full(n, 0 if f.clear_round[face] else 4),
        vertices=corners,
        centre=centre,
        axes=half,
        depth=np.zeros((n, 3)),
        order=np.zeros(n, dtype=np.intp),
        hole_of=np.full(n, -1),
    )
    return partition(shapes, n).share
