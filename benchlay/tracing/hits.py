"""What each beam's chief ray meets first.

B beams, F faces, S solids, P planes. All distances in mm along the unit direction. Beams
inside glass meet only the faces of their own optic; all others meet everything.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from benchlay.elements._kind import Acts, Inside
from benchlay.scene.tables import Flags, Floats, Ints, Scene, Solids
from benchlay.tracing.front import Front

SKIN_MM = 1e-7  # an optic is not met again nearer than this to where it was left
_TOUCH_MM = 1e-9
_PARALLEL = 1e-12

NOTHING, FACE, SOLID = 0, 1, 2


class Hits(NamedTuple):
    """What is met first by each beam (B,).

    `plane` is the bounding plane by which a solid is entered, -1 where it is round there or
    nothing of the kind was met; the last three say how a face is met.
    """

    kind: Ints
    row: Ints  # of the face or solid
    distance: Floats
    plane: Ints
    slope: Floats  # direction . face normal
    left: Floats  # mm from the middle of the outline
    up: Floats

    def take(self, rows: Ints) -> Hits:
        """Return the hits of some beams."""
        return Hits(*(value[rows] for value in self))


class FacesMet(NamedTuple):
    """Where chief rays meet the planes of all faces (B, F)."""

    distance: Floats
    slope: Floats
    left: Floats
    up: Floats
    valid: Flags  # inside the outline, from a side that counts

    def take(self, rows: Ints) -> FacesMet:
        """Return those of some beams."""
        return FacesMet(*(value[rows] for value in self))


class SolidsMet(NamedTuple):
    """Where chief rays meet solids, and the figures they come from."""

    slope: Floats  # (B, P) direction . plane normal
    gap: Floats  # (B, P) offset - normal . position
    round: RoundsMet
    candidate: Flags  # (B, S) present, and not the beam's own

    def take(self, rows: Ints) -> SolidsMet:
        """Return those of some beams."""
        return SolidsMet(
            self.slope[rows],
            self.gap[rows],
            RoundsMet(*(v[rows] for v in self.round)),
            self.candidate[rows],
        )


class RoundsMet(NamedTuple):
    """Coefficients of chief rays against cylinders (B, C): a t² + 2 b t + c0 = radius²."""

    a: Floats
    b: Floats
    c0: Floats


def inside_hits(front: Front, scene: Scene) -> Hits:
    """Return which face of its own optic each beam inside glass meets."""
    f = scene.faces
    rows = scene.fixed.own_faces[front.within]  # (B, K)
    normal, away = f.normal[rows], f.origin[rows] - front.position[:, None, :]
    slope = np.einsum("bki,bi->bk", normal, front.direction)
    gap = np.einsum("bki,bki->bk", normal, away)
    leaving = (slope > _PARALLEL) | ((f.inside[rows] == Inside.BOTH) & (np.abs(slope) > _PARALLEL))
    distance = np.where(leaving, gap, np.inf) / np.where(leaving, slope, 1.0)
    to_face = front.direction[:, None, :] * np.where(leaving, distance, 0.0)[..., None] - away
    left = np.einsum("bki,bki->bk", f.left[rows], to_face) - f.middle[rows, 0]
    up = np.einsum("bki,bki->bk", f.up[rows], to_face) - f.middle[rows, 1]
    valid = leaving & (rows >= 0) & (rows != front.face[:, None]) & (distance > -_TOUCH_MM)
    # A spilled lump runs on the chief ray's line wherever that is: no outline holds it.
    valid &= in_outline(left, up, f.radii[rows], f.round[rows]) | front.lump[:, None]
    # Between the faces of an ideal lens, which stand in one place, light beyond the critical
    # angle would go to and fro for ever: it is on its way to the edge and ends on the barrel.
    tangential = front.index[:, None] ** 2 * (1.0 - slope * slope)
    total = tangential >= scene.index_outside[front.wave][:, None] ** 2
    valid &= ~((f.acts[rows] == Acts.LENS) & total)
    distance = np.where(valid, distance, np.inf)
    best = distance.argmin(axis=1)
    at = (np.arange(len(best)), best)
    met = np.isfinite(distance[at])
    return Hits(
        np.where(met, FACE, NOTHING),
        rows[at],
        np.where(met, distance[at], 0.0),
        np.full(len(best), -1),
        slope[at],
        left[at],
        up[at],
    )


def in_outline(left: Floats, up: Floats, radii: Floats, is_round: Flags) -> Flags:
    """Tell which points lie inside outlines with half sizes `radii`."""
    a, b = np.abs(left) / radii[..., 0], np.abs(up) / radii[..., 1]
    inside: Flags = np.where(is_round, a * a + b * b, np.maximum(a, b)) <= 1.0
    return inside


def faces_met(front: Front, scene: Scene) -> FacesMet:
    """Meet the planes of all faces from outside."""
    f, count = scene.faces, len(scene.faces.owner)
    onward = front.direction @ scene.fixed.face_axes
    start = scene.fixed.face_offsets - front.position @ scene.fixed.face_axes
    slope = onward[:, :count]
    flat = np.abs(slope) < _PARALLEL
    distance = np.where(flat, np.inf, start[:, :count]) / np.where(flat, 1.0, slope)
    along = np.where(flat, 0.0, distance)
    left = along * onward[:, count : 2 * count] - start[:, count : 2 * count]
    up = along * onward[:, 2 * count :] - start[:, 2 * count :]
    entering = (slope < 0.0) | (f.acts == Acts.PASSES)
    same = f.owner == front.owner[:, None]
    ahead = distance > np.where(same, SKIN_MM, -SKIN_MM)
    valid = f.present[front.variant] & entering & (f.inside != Inside.BOTH) & ahead & ~flat
    valid &= in_outline(left, up, f.radii, f.round)
    return FacesMet(distance, slope, left, up, valid)


def solids_met(front: Front, scene: Scene, faces: FacesMet) -> SolidsMet:
    """Meet all solids from outside."""
    s, planes = scene.solids, len(scene.solids.plane_solid)
    onward = front.direction @ scene.fixed.plane_axes
    start = front.position @ scene.fixed.plane_axes
    along, mixed = onward[:, planes:], start[:, planes:] - scene.fixed.axis_offset
    square = np.einsum("ij,ij->i", front.position, front.position)[:, None]
    apart2 = square + scene.fixed.axis_square - 2.0 * (front.position @ s.axis_point.T)
    dotted = np.einsum("ij,ij->i", front.position, front.direction)[:, None]
    rounds = RoundsMet(
        1.0 - along * along,
        dotted - front.direction @ s.axis_point.T - mixed * along,
        apart2 - mixed * mixed,
    )
    candidate = s.present[front.variant] & ~_own(front, scene, faces)
    left = np.flatnonzero(front.body >= 0)
    candidate[left, front.body[left]] = False
    return SolidsMet(onward[:, :planes], s.plane_offset - start[:, :planes], rounds, candidate)


def _own(front: Front, scene: Scene, faces: FacesMet) -> Flags:
    """Tell which solids hold the optic that a beam comes from, or that it goes to.

    Light that leaves an optic, or meets its face inside the outline, passes the box that
    holds it; what falls beside the outline is booked by the partition of the cross-section.
    """
    s = scene.solids
    met = (faces.valid.astype(np.float32) @ scene.owner_of_face) > 0.0
    others = np.zeros((len(met), len(scene.sources) + 1), dtype=np.bool_)
    by_owner = np.concatenate((met, others), axis=1)
    own: Flags = scene.close & (by_owner[:, s.owner] | (front.owner[:, None] == s.owner))
    return own


def crossings(s: Solids, met: SolidsMet, margin: Floats | None = None) -> tuple[Floats, Floats]:
    """Return where rays enter and leave each solid (B, S), grown by a margin (B,) in mm."""
    gap = met.gap if margin is None else met.gap + margin[:, None]
    flat = np.abs(met.slope) < _PARALLEL
    distance = gap / np.where(flat, 1.0, met.slope)
    enter = np.where(met.slope < 0.0, distance, -np.inf)
    leave = np.where(met.slope > 0.0, distance, np.inf)
    if flat.any():
        enter[flat] = np.where(gap[flat] < 0.0, np.inf, -np.inf)
        leave[flat] = np.inf
    first = np.maximum.reduceat(enter, s.plane_start, axis=1)
    last = np.minimum.reduceat(leave, s.plane_start, axis=1)
    if len(s.axis_solid):
        _narrow_to_rounds(s, met.round, margin, first, last)
    return first, last


def _narrow_to_rounds(
    s: Solids, met: RoundsMet, margin: Floats | None, enter: Floats, leave: Floats
) -> None:
    radius = s.axis_radius if margin is None else s.axis_radius + margin[:, None]
    c = met.c0 - radius * radius
    square = met.b * met.b - met.a * c
    axial = met.a < _PARALLEL
    root = np.sqrt(np.maximum(square, 0.0))
    scale = 1.0 / np.where(axial, 1.0, met.a)
    missed = np.where(axial, c > 0.0, square < 0.0)
    first = np.where(axial, -np.inf, (-met.b - root) * scale)
    last = np.where(axial, np.inf, (-met.b + root) * scale)
    enter[:, s.axis_solid] = np.maximum(enter[:, s.axis_solid], np.where(missed, np.inf, first))
    leave[:, s.axis_solid] = np.minimum(leave[:, s.axis_solid], np.where(missed, -np.inf, last))


def nearest(front: Front, scene: Scene) -> tuple[Hits, FacesMet, SolidsMet]:
    """Return what each beam outside glass meets first: a face, a solid, or nothing."""
    s = scene.solids
    faces = faces_met(front, scene)
    solids = solids_met(front, scene, faces)
    beams = np.arange(len(front.variant))
    face, to_face = _first(np.where(faces.valid, faces.distance, np.inf), beams)
    enter, leave = crossings(s, solids)
    blocked = solids.candidate & (enter <= leave) & (leave > SKIN_MM)
    if len(scene.fixed.pierced) and blocked[:, scene.fixed.pierced].any():
        blocked &= ~_through_hole(front, s)
    solid, to_solid = _first(np.where(blocked, np.maximum(enter, 0.0), np.inf), beams)
    at_face = to_face <= to_solid + SKIN_MM
    distance = np.where(at_face, to_face, to_solid)
    kind = np.where(np.isfinite(distance), np.where(at_face, FACE, SOLID), NOTHING)
    plane = np.full(len(beams), -1)
    rows = np.flatnonzero(kind == SOLID)
    if len(rows):
        plane[rows] = _plane_entered(s, solids, solid[rows], rows, enter[rows, solid[rows]])
    at = (beams, face)
    there = len(scene.faces.owner) > 0
    nothing = np.zeros(len(beams))
    hits = Hits(
        kind,
        np.where(kind == FACE, face, solid),
        np.where(kind == NOTHING, scene.reach_mm, distance),
        plane,
        faces.slope[at] if there else nothing,
        faces.left[at] if there else nothing,
        faces.up[at] if there else nothing,
    )
    return hits, faces, solids


def _first(distance: Floats, beams: Ints) -> tuple[Ints, Floats]:
    if not distance.shape[1]:
        return np.zeros(len(beams), dtype=np.int64), np.full(len(beams), np.inf)
    row = distance.argmin(axis=1)
    return row, distance[beams, row]


def _plane_entered(s: Solids, met: SolidsMet, solid: Ints, rows: Ints, enter: Floats) -> Ints:
    """Return the plane by which each beam enters its solid; -1 where it is round there."""
    slope = met.slope[rows]
    own = (s.plane_solid == solid[:, None]) & (slope < -_PARALLEL)
    distance = np.where(own, met.gap[rows], -np.inf) / np.where(own, slope, 1.0)
    distance = np.where(own, distance, -np.inf)
    plane: Ints = distance.argmax(axis=1)
    flat = np.abs(distance[np.arange(len(rows)), plane] - enter) <= SKIN_MM
    return np.where(flat, plane, -1)


def _through_hole(front: Front, s: Solids) -> Flags:
    """Tell which solids (B, S) a ray passes through one of their openings."""
    passed = np.zeros((len(front.variant), len(s.owner)), dtype=np.bool_)
    through = _in_hole(front, s, s.hole_centre) & _in_hole(front, s, s.hole_centre + s.hole_through)
    for hole in np.flatnonzero(through.any(axis=0)):
        passed[:, s.hole_solid[hole]] |= through[:, hole]
    return passed


def _in_hole(front: Front, s: Solids, centre: Floats) -> Flags:
    slope = front.direction @ s.hole_through.T
    flat = np.abs(slope) < _PARALLEL
    gap = np.einsum("ij,ij->i", centre, s.hole_through) - front.position @ s.hole_through.T
    distance = np.where(flat, 0.0, gap) / np.where(flat, 1.0, slope)
    places = []
    for k in (0, 1):
        axis = s.hole_axes[:, k]
        start = front.position @ axis.T - np.einsum("ij,ij->i", centre, axis)
        along = start + distance * (front.direction @ axis.T)
        places.append(np.abs(along) / np.einsum("ij,ij->i", axis, axis))
    a, b = places
    inside: Flags = ~flat & (np.where(s.hole_round, a * a + b * b, np.maximum(a, b)) <= 1.0)
    return inside
