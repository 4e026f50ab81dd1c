"""What each beam's chief ray meets first.

B beams, F faces. All distances in mm along the unit direction. Beams inside glass meet only
the faces of their own optic; all others meet everything.
"""

from __future__ import annotations

import numpy as np

from benchlay.named import NamedTuple
from benchlay.optics.rays import dot
from benchlay.scene.tables import Flags, Floats, Ints, Scene
from benchlay.tracing.bodies import PARALLEL, Pairs, Passing, pairs, passing, through_holes
from benchlay.tracing.front import Front
from benchlay.tracing.packed import FloatColumn, IntColumn, Packed

SKIN_MM = 1e-7  # an optic is not met again nearer than this to where it was left
_TOUCH_MM = 1e-9

NOTHING, FACE, SOLID = 0, 1, 2
HANDED = 3  # no thing: the opening in which a route ends


class Hits(Packed):
    """What is met first by each of B beams."""

    __slots__ = ()

    kind = IntColumn(0)  # `NOTHING`, `FACE`, `SOLID` or `HANDED`
    row = IntColumn(1)  # of the face, solid or opening
    plane = IntColumn(2)  # by which a solid is entered; -1 where it is round, or not one
    distance = FloatColumn(0)  # mm
    slope = FloatColumn(1)  # direction . face normal
    left = FloatColumn(2)  # on the face, from the middle of the outline, mm
    up = FloatColumn(3)

    def owner(self, scene: Scene) -> Ints:
        """Return the elements (B,) whose faces are met, -2 where none is."""
        owner = np.full(len(self.kind), -2)
        on_face = self.kind == FACE
        owner[on_face] = scene.faces.owner[self.row[on_face]]
        return owner


class SolidsMet(NamedTuple):
    """The solids that chief rays (B,) meet first."""

    solid: Ints  # (B,)
    distance: Floats  # (B,) mm; infinite where none is met
    pair: Ints  # (B,) row in `pairs`
    pairs: Pairs


class FacesMet(NamedTuple):
    """Where chief rays meet the planes of all faces (B, F)."""

    distance: Floats
    slope: Floats
    place: Floats  # (B, 2, F) left and up, from the middles of the outlines
    valid: Flags  # inside the outline, from a side that counts


def inside_hits(front: Front, scene: Scene) -> Hits:
    """Return which face of its own optic each beam inside glass meets."""
    f, fixed = scene.faces, scene.fixed
    rows = fixed.own_faces.take(front.within, 0)  # (B, K)
    axes = fixed.own_axes.take(front.within, 0)
    away = fixed.own_middles.take(front.within, 0) - front.position[:, None, :]
    onward = dot(axes, front.direction[:, None, None])
    start = dot(axes, away[:, :, None])
    slope, gap = onward[..., 0], start[..., 0]
    leaving = (slope > PARALLEL) | (
        fixed.own_both.take(front.within, 0) & (np.abs(slope) > PARALLEL)
    )
    distance = np.where(leaving, gap, np.inf) / np.where(leaving, slope, 1.0)
    along = np.where(leaving, distance, 0.0)
    left = along * onward[..., 1] - start[..., 1]
    up = along * onward[..., 2] - start[..., 2]
    valid = leaving & (rows >= 0) & (rows != front.face[:, None]) & (distance > -_TOUCH_MM)
    held = in_outline(left, up, f.radii.take(rows, 0), f.round.take(rows))
    if front.lump.any():
        held |= front.lump[:, None] & _may_come_out(front, scene, rows, np.hypot(left, up))
    valid &= held
    lens = fixed.lens.take(rows)
    if np.count_nonzero(lens):
        # Between the faces of an ideal lens, which stand in one place, light beyond the
        # critical angle would go to and fro for ever: it ends on the barrel.
        tangential = front.index[:, None] ** 2 * (1.0 - slope * slope)
        valid &= ~(lens & (tangential >= scene.index_outside[front.wave][:, None] ** 2))
    distance = np.where(valid, distance, np.inf)
    best = distance.argmin(axis=1)
    at = (np.arange(len(best)), best)
    met = np.isfinite(distance[at])
    return Hits(
        np.array((np.where(met, FACE, NOTHING), rows[at], np.full(len(best), -1))),
        np.array((np.where(met, distance[at], 0.0), slope[at], left[at], up[at])),
    )


def _may_come_out(front: Front, scene: Scene, rows: Ints, off: Floats) -> Flags:
    """Tell by which of its optic's faces (B, K) a spilled lump may leave it.

    A lump runs on the chief ray's line, which no outline holds: its light entered beside that
    line, by no more than the line's own distance and the outline's size, and it leaves beside
    it by no more than that. Where the line leaves farther away (a tube met aslant, kilometres
    off) the light ended on the barrel.
    """
    f = scene.faces
    entered = np.maximum(front.face, 0)
    away = front.position - f.origin[entered]
    beside = np.sqrt(dot(away, away)) + np.hypot(f.radii[entered, 0], f.radii[entered, 1])
    room = np.hypot(*np.moveaxis(f.radii.take(rows, 0), -1, 0))
    may: Flags = off <= beside[:, None] + room
    return may


def in_outline(left: Floats, up: Floats, radii: Floats, is_round: Flags) -> Flags:
    """Tell which points lie inside outlines with half sizes `radii`."""
    a, b = np.abs(left) / radii[..., 0], np.abs(up) / radii[..., 1]
    inside: Flags = np.where(is_round, a * a + b * b, np.maximum(a, b)) <= 1.0
    return inside


def faces_met(front: Front, scene: Scene) -> FacesMet:
    """Meet the planes of all faces from outside."""
    f, fixed = scene.faces, scene.fixed
    shape = (len(front), 3, len(f.owner))
    onward = (front.direction @ fixed.face_axes).reshape(shape)
    start = (fixed.face_offsets - front.position @ fixed.face_axes).reshape(shape)
    slope = onward[:, 0]
    flat = np.abs(slope) < PARALLEL
    distance = start[:, 0] / np.where(flat, 1.0, slope)
    place = distance[:, None] * onward[:, 1:] - start[:, 1:]
    same = f.owner == front.owner[:, None]
    valid = distance > np.where(same, SKIN_MM, -SKIN_MM)
    valid &= ((slope < 0.0) | fixed.passes) & ~flat & fixed.enterable.take(front.variant, 0)
    size = np.abs(place) / f.radii.T
    a, b = size[:, 0], size[:, 1]
    valid &= np.where(f.round, a * a + b * b, np.maximum(a, b)) <= 1.0
    return FacesMet(distance, slope, place, valid)


def nearest(front: Front, scene: Scene) -> tuple[Hits, FacesMet, Passing, SolidsMet]:
    """Return what each beam outside glass meets first: a face, a solid, or nothing."""
    faces = faces_met(front, scene)
    beams = np.arange(len(front))
    face, to_face = _first(np.where(faces.valid, faces.distance, np.inf), beams)
    passed = passing(front, scene, _aimed(faces, scene))
    solids = _first_solid(front, scene, passed, beams)
    solid, to_solid = solids.solid, solids.distance
    at_face = to_face <= to_solid + SKIN_MM
    distance = np.where(at_face, to_face, to_solid)
    kind = np.where(np.isfinite(distance), np.where(at_face, FACE, SOLID), NOTHING)
    plane = np.full(len(beams), -1)
    rows = (kind == SOLID).nonzero()[0]
    if len(rows):
        plane[rows] = _plane_entered(scene, solids, rows)
    at = (beams, face)
    nothing = np.zeros(len(beams))
    there = len(scene.faces.owner) > 0
    on_face = (faces.slope[at], *faces.place[beams, :, face].T) if there else (nothing,) * 3
    hits = Hits(
        np.array((kind, np.where(kind == FACE, face, solid), plane)),
        np.array((np.where(kind == NOTHING, scene.reach_mm, distance), *on_face)),
    )
    return hits, faces, passed, solids


def _aimed(faces: FacesMet, scene: Scene) -> Flags:
    """Tell which owners' optics (B, owners) lie on the way, wherever and however far."""
    count = len(scene.elements) + len(scene.sources) + 1
    aimed = np.zeros((len(faces.valid), count), dtype=np.bool_)
    beam, face = faces.valid.nonzero()
    aimed[beam, scene.faces.owner[face]] = True
    return aimed


def _first(distance: Floats, beams: Ints) -> tuple[Ints, Floats]:
    if not distance.shape[1]:
        return np.zeros(len(beams), dtype=np.int64), np.full(len(beams), np.inf)
    row = distance.argmin(axis=1)
    return row, distance[beams, row]


def _first_solid(front: Front, scene: Scene, passed: Passing, beams: Ints) -> SolidsMet:
    """Return the solid that each ray meets first, how far away, and what it would enter by."""
    found = pairs(front, scene, passed)
    beam, solid, enter, leave = found[:4]
    blocked = (enter <= leave) & (leave > SKIN_MM)
    at = (blocked & scene.fixed.pierced[solid]).nonzero()[0]
    if len(at):
        blocked[at] = ~through_holes(front, scene, beam[at], solid[at])
    count = len(scene.solids.owner)
    some = blocked.nonzero()[0]
    place = beam[some] * count + solid[some]
    table = np.full((len(beams), count), np.inf)
    table.ravel()[place] = np.maximum(enter[some], 0.0)
    first, distance = _first(table, beams)
    number = np.zeros(table.size, dtype=np.int64)
    number[place] = some
    pair = number[beams * count + first] if count else first
    return SolidsMet(first, distance, pair, found)


def _plane_entered(scene: Scene, met: SolidsMet, rows: Ints) -> Ints:
    """Return the plane by which each beam enters its solid; -1 where it is round there."""
    pair, solid = met.pair[rows], met.solid[rows]
    slope, gap, enter = met.pairs.slope.take(pair, 0), met.pairs.gap.take(pair, 0), met.pairs.enter
    inward = slope < -PARALLEL
    distance = np.where(inward, gap, -np.inf) / np.where(inward, slope, 1.0)
    distance[~inward] = -np.inf
    place = distance.argmax(axis=1)
    every = np.arange(len(rows))
    flat = np.abs(distance[every, place] - enter[pair]) <= SKIN_MM
    return np.where(flat, scene.fixed.plane_of[solid, place], -1)
