"""Which solids chief rays meet: pairs of a beam and a solid near its line.

Most solids stand far from most beams, so a sphere round each is tried first and the
bounding planes are looked at for the pairs that are left. N pairs, B beams, S solids, K
planes a solid (the last ones repeated where it has fewer). Distances in mm along the unit
direction.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from benchlay.optics.rays import dot
from benchlay.scene.tables import Flags, Floats, Ints, Scene
from benchlay.tracing.front import Front

PARALLEL = 1e-12  # cosine below which a ray runs along a plane
_STEEP = -1e-30  # stands for such a cosine: the plane is crossed before everything or never


class Passing(NamedTuple):
    """How chief rays (B,) pass the spheres round all solids (S,)."""

    along: Floats  # (B, S) mm from the start to the foot of the sphere's middle on the ray
    apart2: Floats  # (B, S) squared distance of the middle from the line, mm²
    candidate: Flags  # (B, S) present, and not the beam's own


class Pairs(NamedTuple):
    """Rays beside solids: where each pair's ray enters and leaves."""

    beam: Ints  # (N,)
    solid: Ints  # (N,)
    enter: Floats  # (N,)
    leave: Floats  # (N,)


def passing(front: Front, scene: Scene, aimed: Flags) -> Passing:
    """Return how beams pass the solids; `aimed` (B, owners) tells whose optics they go to.

    Light that leaves an optic, or meets its face inside the outline, passes the box that
    holds it; what falls beside the outline is booked by the partition of the cross-section.
    """
    s, fixed = scene.solids, scene.fixed
    position, direction = front.position, front.direction
    along = direction @ fixed.centres
    along -= dot(position, direction)[:, None]
    apart2 = position @ fixed.centres
    apart2 *= -2.0
    apart2 += fixed.centre_square
    apart2 += dot(position, position)[:, None]
    apart2 -= along * along
    aimed[np.arange(len(aimed)), front.owner] = True
    candidate = s.present[front.variant] & ~(aimed[:, s.owner] & scene.close)
    left = (front.body >= 0).nonzero()[0]
    candidate[left, front.body[left]] = False
    return Passing(along, apart2, candidate)


def pairs(
    front: Front,
    scene: Scene,
    passed: Passing,
    limit: Floats | None = None,
    margin: Floats | None = None,
) -> Pairs:
    """Return the pairs whose ray may cross the solid, grown by a margin (B,) in mm.

    A solid grows by its planes moving outwards; that is never less than what lies within the
    margin. Solids behind the start or beyond `limit` (B,) are left out.
    """
    size = scene.fixed.sphere
    if margin is not None:
        size = size + margin[:, None]
    close = (passed.apart2 < size * size) & (passed.along > -size) & passed.candidate
    if limit is not None:
        close &= passed.along - size < limit[:, None]
    beam, solid = close.nonzero()
    return crossed(front, scene, beam, solid, None if margin is None else margin[beam])


def planes_met(front: Front, scene: Scene, beam: Ints, solid: Ints) -> tuple[Floats, Floats]:
    """Return (N, K) direction . normal and offset - normal . position of solids' planes."""
    normal = scene.fixed.plane_normals[solid]
    slope = dot(normal, front.direction[beam][:, None])
    gap = scene.fixed.plane_offsets[solid] - dot(normal, front.position[beam][:, None])
    return slope, gap


def crossed(front: Front, scene: Scene, beam: Ints, solid: Ints, margin: Floats | None) -> Pairs:
    """Return where the rays of pairs (N,) enter and leave solids grown by a margin (N,) in mm."""
    if not len(beam):
        none = np.zeros(0)
        return Pairs(beam, solid, none, none)
    slope, gap = planes_met(front, scene, beam, solid)
    if margin is not None:
        gap += margin[:, None]
    slope[np.abs(slope) < PARALLEL] = _STEEP
    distance = gap / slope
    inward = slope < 0.0
    enter = np.where(inward, distance, -np.inf).max(axis=1)
    leave = np.where(inward, np.inf, distance).min(axis=1)
    axis = scene.fixed.round_of[solid]
    rows = (axis >= 0).nonzero()[0]
    if len(rows):
        grown = 0.0 if margin is None else margin[rows]
        first, last = _through_round(front, scene, beam[rows], axis[rows], grown)
        enter[rows] = np.maximum(enter[rows], first)
        leave[rows] = np.minimum(leave[rows], last)
    return Pairs(beam, solid, enter, leave)


def _through_round(
    front: Front, scene: Scene, beam: Ints, number: Ints, margin: Floats | float
) -> tuple[Floats, Floats]:
    """Return where rays enter and leave endless cylinders; a missed one is left before entered."""
    s = scene.solids
    direction, axis = front.direction[beam], s.axis[number]
    away = front.position[beam] - s.axis_point[number]
    lean, mixed = dot(direction, axis), dot(away, axis)
    a = 1.0 - lean * lean
    b = dot(away, direction) - mixed * lean
    radius = s.axis_radius[number] + margin
    c = dot(away, away) - mixed * mixed - radius * radius
    square = b * b - a * c
    axial = a < PARALLEL
    missed = np.where(axial, c > 0.0, square < 0.0)
    root = np.sqrt(np.maximum(square, 0.0))
    scale = 1.0 / np.where(axial, 1.0, a)
    first = np.where(axial, -np.inf, (-b - root) * scale)
    last = np.where(axial, np.inf, (root - b) * scale)
    return np.where(missed, np.inf, first), np.where(missed, -np.inf, last)


def through_holes(front: Front, scene: Scene) -> Flags:
    """Tell which solids (B, S) a ray passes through one of their openings."""
    s = scene.solids
    passed = np.zeros((len(front), len(s.owner)), dtype=np.bool_)
    through = in_holes(front, scene, s.hole_centre)
    through &= in_holes(front, scene, s.hole_centre + s.hole_through)
    for hole in np.flatnonzero(through.any(axis=0)):
        passed[:, s.hole_solid[hole]] |= through[:, hole]
    return passed


def in_holes(front: Front, scene: Scene, centre: Floats) -> Flags:
    """Tell which holes (B, H) rays pass inside the outline in the planes of points (H, 3)."""
    s = scene.solids
    slope = front.direction @ s.hole_through.T
    flat = np.abs(slope) < PARALLEL
    gap = dot(centre, s.hole_through) - front.position @ s.hole_through.T
    distance = np.where(flat, 0.0, gap) / np.where(flat, 1.0, slope)
    places = []
    for k in (0, 1):
        axis = s.hole_axes[:, k]
        start = front.position @ axis.T - dot(centre, axis)
        along = start + distance * (front.direction @ axis.T)
        places.append(np.abs(along) / dot(axis, axis))
    a, b = places
    inside: Flags = ~flat & (np.where(s.hole_round, a * a + b * b, np.maximum(a, b)) <= 1.0)
    return inside
