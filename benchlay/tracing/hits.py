"""What each beam's chief ray meets first, and what comes near its envelope on the way.

B beams, F faces, S solids, P planes. All distances in mm along the unit direction.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from benchlay.elements._kind import Acts, Inside
from benchlay.scene.tables import Flags, Floats, Ints, Scene, Solids
from benchlay.tracing.front import OUTSIDE, Front

_SKIN_MM = 1e-7  # an optic is not met again nearer than this to where it was left
_TOUCH_MM = 1e-9
_PARALLEL = 1e-12
_GRAZING = 1e-3  # at flatter incidence a face's footprint test says nothing: spheres decide

NOTHING, FACE, SOLID = 0, 1, 2


class FaceHits(NamedTuple):
    """Where chief rays meet the planes of faces (B, F)."""

    distance: Floats
    slope: Floats  # direction . normal
    along_left: Floats  # from the middle of the outline
    along_up: Floats
    valid: Flags  # met inside the outline, from a side that counts


class SolidHits(NamedTuple):
    """Where chief rays meet solids (B, S), and the figures they come from (B, P)."""

    enter: Floats
    leave: Floats
    slope: Floats  # (B, P) direction . plane normal
    gap: Floats  # (B, P) offset - normal . position
    candidate: Flags  # (B, S) present, and not the beam's own


class Hits(NamedTuple):
    """What is met first: kind, row, distance; for a solid the row of the plane entered."""

    kind: Ints
    row: Ints
    distance: Floats
    plane: Ints
    faces: FaceHits
    solids: SolidHits

    def take(self, rows: Ints) -> Hits:
        """Return the hits of some beams."""
        return Hits(
            self.kind[rows],
            self.row[rows],
            self.distance[rows],
            self.plane[rows],
            FaceHits(*(value[rows] for value in self.faces)),
            SolidHits(*(value[rows] for value in self.solids)),
        )


def face_hits(front: Front, scene: Scene) -> FaceHits:
    """Meet all planes of faces; beams inside glass meet only their own optic's."""
    f = scene.faces
    slope = front.direction @ f.normal.T
    offset = np.einsum("ij,ij->i", f.origin, f.normal)
    gap = offset - front.position @ f.normal.T
    with np.errstate(divide="ignore", invalid="ignore"):
        distance = gap / slope
    left = _along(front, f.origin, f.left, distance) - f.middle[:, 0]
    up = _along(front, f.origin, f.up, distance) - f.middle[:, 1]
    valid = _in_outline(left, up, f.radii, f.round) & np.isfinite(distance)
    inside = front.within != OUTSIDE
    valid &= np.where(
        inside[:, None],
        _from_inside(front, scene, slope, distance),
        _from_outside(front, scene, slope, distance),
    )
    return FaceHits(distance, slope, left, up, valid)


def _along(front: Front, origin: Floats, axis: Floats, distance: Floats) -> Floats:
    start = front.position @ axis.T - np.einsum("ij,ij->i", origin, axis)
    with np.errstate(invalid="ignore"):
        met: Floats = start + distance * (front.direction @ axis.T)
    return met


def _in_outline(left: Floats, up: Floats, radii: Floats, is_round: Flags) -> Flags:
    a, b = np.abs(left) / radii[:, 0], np.abs(up) / radii[:, 1]
    with np.errstate(invalid="ignore", over="ignore"):
        inside: Flags = np.where(is_round, a * a + b * b, np.maximum(a, b)) <= 1.0
    return inside


def _from_inside(front: Front, scene: Scene, slope: Floats, distance: Floats) -> Flags:
    f = scene.faces
    own = scene.bulk_of_face == front.within[:, None]
    leaving = (slope > 0.0) | (f.inside == Inside.BOTH)
    other = np.arange(len(f.owner)) != front.face[:, None]
    met: Flags = own & leaving & other & (distance > -_TOUCH_MM)
    return met


def _from_outside(front: Front, scene: Scene, slope: Floats, distance: Floats) -> Flags:
    f = scene.faces
    entering = (slope < 0.0) | (f.acts == Acts.PASSES)
    same = f.owner == front.owner[:, None]
    ahead = distance > np.where(same, _SKIN_MM, -_SKIN_MM)
    met: Flags = scene.faces.present[front.variant] & entering & (f.inside != Inside.BOTH) & ahead
    return met


def solid_hits(front: Front, scene: Scene, faces: FaceHits) -> SolidHits:
    """Meet all solids that a beam outside glass may meet."""
    s = scene.solids
    slope = front.direction @ s.plane_normal.T
    gap = s.plane_offset - front.position @ s.plane_normal.T
    enter, leave = _slabs(s, slope, gap, None)
    _round_solids(front, s, None, enter, leave)
    candidate = s.present[front.variant] & (front.within == OUTSIDE)[:, None]
    candidate &= ~_own(front, scene, faces)
    left = np.flatnonzero(front.body >= 0)
    candidate[left, front.body[left]] = False
    return SolidHits(enter, leave, slope, gap, candidate)


def _own(front: Front, scene: Scene, faces: FaceHits) -> Flags:
    """Tell which solids hold the optic that a beam comes from, or that it goes to.

    Light that leaves an optic, or meets its face inside the outline, passes the box that
    holds it; what falls beside the outline is booked by the partition of the cross-section.
    """
    s = scene.solids
    met = (faces.valid.astype(np.float32) @ scene.owner_of_face) > 0.0
    pad = np.zeros((len(met), 1), dtype=np.bool_)
    by_owner = np.concatenate(
        (met, np.zeros((len(met), len(scene.sources)), dtype=np.bool_), pad), axis=1
    )
    own: Flags = scene.close & (by_owner[:, s.owner] | (front.owner[:, None] == s.owner))
    return own


def _slabs(s: Solids, slope: Floats, gap: Floats, margin: Floats | None) -> tuple[Floats, Floats]:
    """Return where rays enter and leave each convex solid, its planes moved out by a margin."""
    if margin is not None:
        gap = gap + margin[:, None]
    with np.errstate(divide="ignore", invalid="ignore"):
        distance = gap / slope
    flat = np.abs(slope) < _PARALLEL
    apart = flat & (gap < 0.0)
    enter = np.where(slope < 0.0, distance, -np.inf)
    leave = np.where(slope > 0.0, distance, np.inf)
    if flat.any():
        enter[flat], leave[flat] = -np.inf, np.inf
        enter[apart] = np.inf
    return (
        np.maximum.reduceat(enter, s.plane_start, axis=1),
        np.minimum.reduceat(leave, s.plane_start, axis=1),
    )


def _round_solids(
    front: Front, s: Solids, margin: Floats | None, enter: Floats, leave: Floats
) -> None:
    """Narrow entry and exit of round solids to their cylinders, in place."""
    if not len(s.axis_solid):
        return
    along = front.direction @ s.axis.T
    start = front.position @ s.axis.T - np.einsum("ij,ij->i", s.axis_point, s.axis)
    apart2 = _squared_apart(front.position, s.axis_point)
    mixed = (
        np.einsum("ij,ij->i", front.position, front.direction)[:, None]
        - front.direction @ s.axis_point.T
    )
    radius = s.axis_radius if margin is None else s.axis_radius + margin[:, None]
    a = 1.0 - along * along
    b = mixed - start * along
    c = apart2 - start * start - radius * radius
    square = b * b - a * c
    with np.errstate(divide="ignore", invalid="ignore"):
        root = np.sqrt(np.maximum(square, 0.0))
        first, last = (-b - root) / a, (-b + root) / a
    axial = a < _PARALLEL
    missed = np.where(axial, c > 0.0, square < 0.0)
    first = np.where(missed, np.inf, np.where(axial, -np.inf, first))
    last = np.where(missed, -np.inf, np.where(axial, np.inf, last))
    enter[:, s.axis_solid] = np.maximum(enter[:, s.axis_solid], first)
    leave[:, s.axis_solid] = np.minimum(leave[:, s.axis_solid], last)


def _squared_apart(position: Floats, point: Floats) -> Floats:
    apart: Floats = (
        np.einsum("ij,ij->i", position, position)[:, None]
        + np.einsum("ij,ij->i", point, point)
        - 2.0 * (position @ point.T)
    )
    return apart


def nearest(front: Front, scene: Scene) -> Hits:
    """Return what each beam meets first: a face, a solid, or nothing within reach."""
    faces = face_hits(front, scene)
    solids = solid_hits(front, scene, faces)
    beams = np.arange(len(front.variant))
    at_face = np.where(faces.valid, faces.distance, np.inf)
    face = at_face.argmin(axis=1) if at_face.shape[1] else np.zeros(len(beams), dtype=np.int64)
    to_face = at_face[beams, face] if at_face.shape[1] else np.full(len(beams), np.inf)
    blocked = solids.candidate & (solids.enter <= solids.leave) & (solids.leave > _SKIN_MM)
    blocked &= ~_through_hole(front, scene.solids, solids)
    at_solid = np.where(blocked, np.maximum(solids.enter, 0.0), np.inf)
    solid = at_solid.argmin(axis=1)
    to_solid = at_solid[beams, solid]
    kind = np.where(to_face <= to_solid + _SKIN_MM, FACE, SOLID)
    distance = np.where(kind == FACE, to_face, to_solid)
    kind[~np.isfinite(distance)] = NOTHING
    row = np.where(kind == FACE, face, solid)
    plane = _plane_entered(scene.solids, solids, solid, beams)
    return Hits(kind, row, distance, plane, faces, solids)


def _plane_entered(s: Solids, hits: SolidHits, solid: Ints, beams: Ints) -> Ints:
    """Return the plane by which each beam enters its solid; -1 where it is round there."""
    own = s.plane_solid == solid[:, None]
    with np.errstate(divide="ignore", invalid="ignore"):
        distance = np.where(own & (hits.slope < 0.0), hits.gap / hits.slope, -np.inf)
    plane: Ints = distance.argmax(axis=1)
    enter = hits.enter[beams, solid]
    flat = np.abs(distance[beams, plane] - enter) <= _SKIN_MM
    return np.where(flat, plane, -1)


def _through_hole(front: Front, s: Solids, hits: SolidHits) -> Flags:
    """Tell which solids a ray passes through one of their openings."""
    passed = np.zeros(hits.enter.shape, dtype=np.bool_)
    if not len(s.hole_solid):
        return passed
    first = _in_hole(front, s, s.hole_centre)
    second = _in_hole(front, s, s.hole_centre + s.hole_through)
    through = first & second
    for hole in np.flatnonzero(through.any(axis=0)):
        passed[:, s.hole_solid[hole]] |= through[:, hole]
    return passed


def _in_hole(front: Front, s: Solids, centre: Floats) -> Flags:
    length = np.sqrt(np.einsum("ij,ij->i", s.hole_through, s.hole_through))
    normal = s.hole_through / length[:, None]
    slope = front.direction @ normal.T
    gap = np.einsum("ij,ij->i", centre, normal) - front.position @ normal.T
    with np.errstate(divide="ignore", invalid="ignore"):
        distance = gap / slope
    coordinates = []
    for k in (0, 1):
        axis = s.hole_axes[:, k]
        scale = np.einsum("ij,ij->i", axis, axis)
        coordinates.append(_along(front, centre, axis, distance) / scale)
    a, b = np.abs(coordinates[0]), np.abs(coordinates[1])
    with np.errstate(invalid="ignore", over="ignore"):
        inside = np.where(s.hole_round, a * a + b * b, np.maximum(a, b)) <= 1.0
    met: Flags = inside & np.isfinite(distance)
    return met


def near(front: Front, scene: Scene, hits: Hits, reach_mm: Floats) -> Flags:
    """Tell beside which chief rays (B,) a body comes within `reach_mm` before what they meet.

    A body counts where its planes, moved outwards by the reach, are crossed; that is never
    less than what lies within the reach.
    """
    s = scene.solids
    enter, leave = _slabs(s, hits.solids.slope, hits.solids.gap, reach_mm)
    _round_solids(front, s, reach_mm, enter, leave)
    limit = np.where(hits.kind == NOTHING, scene.reach_mm, hits.distance)[:, None]
    close = hits.solids.candidate & (enter <= np.minimum(leave, limit)) & (leave > 0.0)
    beams = np.arange(len(limit))
    is_solid = hits.kind == SOLID
    close[beams[is_solid], hits.row[is_solid]] = False
    met_owner = np.where(
        hits.kind == FACE, scene.faces.owner[np.where(hits.kind == FACE, hits.row, 0)], -2
    )
    close &= ~(scene.close & (s.owner == met_owner[:, None]))
    result: Flags = close.any(axis=1) | _near_faces(front, scene, hits, reach_mm, limit, met_owner)
    return result & (front.within == OUTSIDE)


def _near_faces(
    front: Front, scene: Scene, hits: Hits, reach_mm: Floats, limit: Floats, met_owner: Ints
) -> Flags:
    f = scene.faces
    h = hits.faces
    with np.errstate(divide="ignore", invalid="ignore"):
        spread = reach_mm[:, None] / np.abs(h.slope)
        a = np.abs(h.along_left) - f.radii[:, 0] - spread
        b = np.abs(h.along_up) - f.radii[:, 1] - spread
    touched = (a < 0.0) & (b < 0.0) & (np.abs(h.slope) > _GRAZING)
    between = (h.distance > -_SKIN_MM) & (h.distance < limit)
    strange = (f.owner != front.owner[:, None]) & (f.owner != met_owner[:, None])
    counts = f.present[front.variant] & (f.inside != Inside.BOTH)
    result: Flags = (touched & between & strange & counts).any(axis=1)
    return result
