"""Which beams must be cut: what they meet does not cover them, or a body comes near."""

from __future__ import annotations

import numpy as np

from benchlay.optics.rays import dot
from benchlay.scene.tables import Flags, Floats, Ints, Scene
from benchlay.tracing.bodies import Passing, pairs
from benchlay.tracing.front import Front
from benchlay.tracing.hits import FACE, SKIN_MM, SOLID, FacesMet, Hits, SolidsMet

# Bodies are looked for out to where what lies beyond is this share of the power floor.
_TAIL = 0.01
_LEAST_SHARE = 1e-18
_LEAST_REACH = 0.5
_PARALLEL = 1e-9  # squared sine below which two planes count as parallel
_GRAZING = 1e-3  # at flatter incidence a face's footprint test says nothing


def reach_of(front: Front, floor_w: Floats) -> Floats:
    """Return how far out, in w, a body may take a share that counts (B,).

    Of a beam of which the share k is left a body takes at most its own share of the unclipped
    beam times the smaller of 1/k and 1/(1 - k).
    """
    tail = _TAIL * floor_w[front.wave]
    whole = front.power / np.maximum(front.kept, 1.0 - front.kept)
    share = np.minimum(np.maximum(tail / np.maximum(whole, tail), _LEAST_SHARE), 1.0)
    reach: Floats = np.maximum(np.sqrt(-0.5 * np.log(share)), _LEAST_REACH)
    return reach


def unclipped_core(kept: Floats) -> Floats:
    """Return the radius, in w, within which an unclipped beam has the share that is left (B,).

    What takes at least that much out to there takes all that is left of a cut beam.
    """
    left = np.minimum(kept, 1.0 - 1e-15)
    radius: Floats = np.where(kept < 1.0, np.sqrt(-0.5 * np.log1p(-left)), np.inf)
    return radius


def radius_of(m: Floats) -> Floats:
    """Return the larger principal 1/e² radius, mm."""
    half, differ = 0.5 * (m[0] + m[2]), 0.5 * (m[0] - m[2])
    radius: Floats = 2.0 * np.sqrt(half + np.sqrt(differ * differ + m[1] * m[1]))
    return radius


def face_covers(scene: Scene, hits: Hits, radius: Floats) -> Flags:
    """Tell which faces' clear regions take the whole beam out to a radius (mm) of chief hits."""
    f = scene.faces
    if not len(f.owner):
        return np.ones(len(radius), dtype=np.bool_)
    face = np.where(hits.kind == FACE, hits.row, 0)
    spread = radius / np.maximum(np.abs(hits.slope), SKIN_MM)
    left, up = np.abs(hits.left), np.abs(hits.up)
    a, b = f.clear.take(face, 0).T
    as_round = np.hypot(left, up) + spread <= np.minimum(a, b)
    as_box = (left + spread <= a) & (up + spread <= b)
    covers: Flags = np.where(f.clear_round[face], as_round, as_box)
    return covers


def covered(front: Front, scene: Scene, hits: Hits, met: SolidsMet, radius: Floats) -> Flags:
    """Tell which chief hits take the whole beam out to a radius (mm), if they are of solids."""
    whole = np.ones(len(radius), dtype=np.bool_)
    rows = (hits.kind == SOLID).nonzero()[0]
    if len(rows):
        pair = met.pair.take(rows)
        planes = met.pairs.slope.take(pair, 0), met.pairs.gap.take(pair, 0)
        whole[rows] = _solid_covers(
            front.take(rows), scene, hits.take(rows), planes=planes, radius=radius.take(rows)
        )
    return whole


def _solid_covers(
    front: Front, scene: Scene, hits: Hits, *, planes: tuple[Floats, Floats], radius: Floats
) -> Flags:
    """Tell which beams land wholly on the flat side of the solid that their chief ray meets.

    On that side the distance to another bounding plane is the gap to it over the sine of the
    angle between the two; planes parallel to the side bound nothing of it.
    """
    s = scene.solids
    solid, plane = hits.row, np.maximum(hits.plane, 0)
    sine2 = scene.fixed.plane_sines2.take(plane, 0)
    slope, gap = planes
    gap = gap - hits.distance[:, None] * slope
    bounds = sine2 > _PARALLEL
    room2 = np.where(bounds, gap * np.abs(gap), np.inf) / np.where(bounds, sine2, 1.0)
    steep = np.abs(dot(front.direction, s.plane_normal.take(plane, 0)))
    spread = radius / np.maximum(steep, SKIN_MM)
    covers: Flags = (hits.plane >= 0) & (room2.min(axis=1) >= spread * spread)
    covers &= scene.fixed.round_of[solid] < 0
    pierced = scene.fixed.pierced[solid].nonzero()[0]
    if len(pierced):
        solid = solid[pierced]
        point = (front.position + hits.distance[:, None] * front.direction)[pierced]
        sides = _apart(point, s.hole_centre), _apart(point, s.hole_centre + s.hole_through)
        touched = np.minimum(*sides) < scene.fixed.hole_sizes + spread[pierced, None]
        covers[pierced] &= ~(touched & (s.hole_solid == solid[:, None])).any(axis=1)
    return covers


def _apart(point: Floats, centre: Floats) -> Floats:
    away = point[:, None, :] - centre
    apart: Floats = np.sqrt(dot(away, away))
    return apart


def near(
    front: Front, scene: Scene, hits: Hits, faces: FacesMet, passed: Passing, *, radius: Floats
) -> Flags:
    """Tell beside which chief rays (B,) a body comes within a radius (mm) on their way.

    A body counts where its planes, moved outwards by the radius, are crossed; that is never
    less than what lies within the radius.
    """
    s = scene.solids
    target = hits.owner(scene)
    beam, solid, enter, leave = pairs(front, scene, passed, hits.distance, radius)[:4]
    close = (enter <= np.minimum(leave, hits.distance[beam])) & (leave > 0.0)
    close &= (hits.kind[beam] != SOLID) | (hits.row[beam] != solid)
    close &= ~(scene.close[solid] & (s.owner[solid] == target[beam]))
    result = np.zeros(len(radius), dtype=np.bool_)
    result[beam[close]] = True
    if len(scene.faces.owner):
        result |= _near_faces(front, scene, faces, hits, target=target, radius=radius)
    return result


def _near_faces(
    front: Front, scene: Scene, met: FacesMet, hits: Hits, *, target: Ints, radius: Floats
) -> Flags:
    """Tell which beams pass the planes of others' faces within a radius of their outlines."""
    f = scene.faces
    steep = np.abs(met.slope)
    spread = radius[:, None] / np.maximum(steep, _GRAZING)
    touched = np.abs(met.place) - f.radii.T < spread[:, None]
    counts = touched[:, 0] & touched[:, 1] & (steep > _GRAZING)
    counts &= (met.distance > -SKIN_MM) & (met.distance < hits.distance[:, None])
    counts &= (f.owner != front.owner[:, None]) & (f.owner != target[:, None])
    counts &= scene.fixed.enterable.take(front.variant, 0)
    result: Flags = np.logical_or.reduce(counts, axis=1)
    return result
