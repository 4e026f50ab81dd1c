"""Which solids chief rays meet: pairs of a beam and a solid near its line.

Most solids stand far from most beams, so a sphere round each is tried first and the
bounding planes are looked at for the pairs that are left. N pairs, B beams, S solids, K
planes a solid (the last ones repeated where it has fewer). Distances in mm along the unit
direction.
"""

from __future__ import annotations

import numpy as np

from benchlay.named import NamedTuple
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
    slope: Floats  # (N, K) direction . normal of the solid's planes
    gap: Floats  # (N, K) offset - normal . position, grown by the margin, mm


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
    candidate = s.present.take(front.variant, 0) & ~(aimed.take(s.owner, 1) & scene.close)
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
    normal = scene.fixed.plane_normals.take(solid, 0)
    slope = dot(normal, front.direction.take(beam, 0)[:, None])
    gap = scene.fixed.plane_offsets.take(solid, 0) - dot(
        normal, front.position.take(beam, 0)[:, None]
    )
    return slope, gap


def crossed(front: Front, scene: Scene, beam: Ints, solid: Ints, margin: Floats | None) -> Pairs:
    """Return where the rays of pairs (N,) enter and leave solids grown by a margin (N,) in mm."""
    if not len(beam):
        none = np.zeros(0)
        return Pairs(beam, solid, none, none, *np.zeros((2, 0, 1)))
    slope, gap = planes_met(front, scene, beam, solid)
    if margin is not None:
        gap += margin[:, None]
    np.copyto(slope, _STEEP, where=np.abs(slope) < PARALLEL)
    distance = gap / slope
    inward = slope < 0.0
    enter = np.maximum.reduce(np.where(inward, distance, -np.inf), axis=1)
    leave = np.minimum.reduce(np.where(inward, np.inf, distance), axis=1)
    axis = scene.fixed.round_of.take(solid)
    # Most posts stand below the light: their ends tell, and their sides need no look.
    rows = ((axis >= 0) & (enter <= leave)).nonzero()[0]
    if len(rows):
        grown = 0.0 if margin is None else margin[rows]
        first, last = _through_round(front, scene, beam[rows], axis[rows], grown)
        enter[rows] = np.maximum(enter[rows], first)
        leave[rows] = np.minimum(leave[rows], last)
    return Pairs(beam, solid, enter, leave, slope, gap)


def _through_round(
    front: Front, scene: Scene, beam: Ints, number: Ints, margin: Floats | float
) -> tuple[Floats, Floats]:
    """Return where rays enter and leave endless cylinders; a missed one is left before entered."""
    s = scene.solids
    direction, axis = front.direction.take(beam, 0), s.axis.take(number, 0)
    away = front.position.take(beam, 0) - s.axis_point.take(number, 0)
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


def through_holes(front: Front, scene: Scene, beam: Ints, solid: Ints) -> Flags:
    """Tell for pairs (N,) whether the ray passes the solid through one of its openings."""
    through = in_holes(front, scene).take(beam, 0)
    through &= scene.solids.hole_solid == solid[:, None]
    passed: Flags = np.logical_or.reduce(through, axis=1)
    return passed


def in_holes(front: Front, scene: Scene) -> Flags:
    """Tell which holes (B, H) rays pass inside the outline, in the near plane and in the far."""
    s, fixed = scene.solids, scene.fixed
    shape = (len(front), 3, len(s.hole_solid))
    onward = (front.direction @ fixed.hole_axes).reshape(shape)
    start = fixed.hole_offsets[:, None] - (front.position @ fixed.hole_axes).reshape(shape)
    slope = onward[:, 0]
    flat = np.abs(slope) < PARALLEL
    distance = start[:, :, 0] / np.where(flat, 1.0, slope)
    place = np.abs(distance[:, :, None] * onward[:, 1:] - start[:, :, 1:])
    a, b = place[:, :, 0], place[:, :, 1]
    within = np.where(s.hole_round, a * a + b * b, np.maximum(a, b)) <= 1.0
    inside: Flags = np.logical_and.reduce(within, axis=0) & ~flat
    return inside
