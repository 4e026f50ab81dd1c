"""Outlines of faces and solids in the scaled coordinates of a beam's cross-section.

A body's outline is seen along the beam's flow lines: a point at transverse place x and depth
z has coordinates W(z)^-1 x. A body that stands across the beam takes W at the depth where
its plane crosses the chief ray, and is seen in the perspective of W there; one that lies
along the beam takes W corner by corner, so that light spreading into it is caught.
"""

from __future__ import annotations

import numpy as np

from benchlay.elements._kind import Acts
from benchlay.geometry.distinct import distinct
from benchlay.optics.rays import cross, dot
from benchlay.scene.tables import PART, Flags, Floats, Ints, Scene, Solids
from benchlay.tracing.clipping import clip_behind, split_at
from benchlay.tracing.frames import (
    Frame,
    frame_of,
    gradient,
    inverse_roots,
    local,
    plane_depth,
    scaled,
    unit_vectors,
)
from benchlay.tracing.front import Front
from benchlay.tracing.hits import FACE, Hits
from benchlay.tracing.outlines import BESIDE, BODY, CORE, HOLE, NO_OUTLINES, OPTIC, Labels, Outlines
from benchlay.tracing.plates import GRAZING, Labelled, Plates, touching
from benchlay.tracing.spreading import growth, perspective

_CLEAR_ORDER, _OUTLINE_ORDER, _SOLID_ORDER = 0, 1, 2
_EDGE_ON = 1e-6


def face_plates(part: Front, scene: Scene, close: Flags, hits: Hits) -> Labelled:
    """Return clear regions and, where they are larger, whole outlines of faces."""
    f = scene.faces
    problem, face = np.nonzero(close)
    own = (hits.kind == FACE)[problem] & (face == hits.row[problem])
    inside = part.within[problem] >= 0
    opaque = f.acts[face] == int(Acts.OPAQUE)
    ring = ~opaque & ~inside & (f.clear.take(face, 0) < f.radii.take(face, 0)).any(axis=1)
    role = np.where(own, CORE, np.where(opaque, BODY, OPTIC))
    both = np.concatenate((np.arange(len(face)), np.flatnonzero(ring)))
    is_ring = np.arange(len(both)) >= len(face)
    face, problem = face[both], problem[both]
    half = np.where(is_ring[:, None], f.radii.take(face, 0), f.clear.take(face, 0))
    left, up = f.left.take(face, 0), f.up.take(face, 0)
    middle = f.middle.take(face, 0)
    centre = f.origin.take(face, 0) + middle[:, :1] * left + middle[:, 1:] * up
    shape = np.where(is_ring, f.round[face], f.clear_round[face])
    plates = Plates(centre, left * half[:, :1], up * half[:, 1:], shape)
    labels = Labels(
        np.where(is_ring, BESIDE, role[both]),
        np.where(is_ring, f.beside[face], f.sink[face]),
        scene.face_owner_name[face],
        face,
        np.full(len(face), -1),
    )
    order = np.where(is_ring, _OUTLINE_ORDER, _CLEAR_ORDER)
    return Labelled(problem, plates, order, labels)


def _solid_labels(s: Solids, problem: Ints, solid: Ints, own: Ints, row: Ints) -> Labels:
    role = np.where(solid == own[problem], CORE, BODY)
    return Labels(role, s.sink[solid], s.name[solid], np.full(len(solid), -1), row)


def disc_plates(part: Front, scene: Scene, close: Flags, own: Ints) -> Labelled:
    """Return the round ends of solids, both of them: together with the sides they make the body."""
    s = scene.solids
    slopes = part.direction @ s.disc_normal.T
    # An end that faces the light is the optic's own face, which is an outline already; ends
    # seen edge-on have no area.
    facing = (slopes < -GRAZING) & (s.part[s.disc_solid] == PART["edge"])
    seen = close.take(s.disc_solid, 1) & ~facing & (np.abs(slopes) > _EDGE_ON)
    problem, disc = np.nonzero(seen)
    plates = Plates(
        s.disc_centre.take(disc, 0),
        s.disc_axes[disc, 0],
        s.disc_axes[disc, 1],
        np.ones(len(disc), dtype=np.bool_),
    )
    labels = _solid_labels(s, problem, s.disc_solid[disc], own, np.full(len(disc), -1))
    order = np.full(len(disc), _SOLID_ORDER)
    return Labelled(problem, plates, order, labels)


def cylinder_sides(part: Front, scene: Scene, close: Flags, own: Ints) -> Labelled:
    """Return the sides of round solids as the rectangles in which the beam sees them."""
    s = scene.solids
    problem, number = np.nonzero(close.take(s.axis_solid, 1))
    direction, axis = part.direction.take(problem, 0), s.axis.take(number, 0)
    across = cross(direction, axis)
    seen = dot(across, across) > _EDGE_ON**2
    problem, number, axis, across = problem[seen], number[seen], axis[seen], across[seen]
    half = 0.5 * s.axis_length[number]
    plates = Plates(
        s.axis_point.take(number, 0) + half[:, None] * axis,
        half[:, None] * axis,
        s.axis_radius[number][:, None] * unit_vectors(across),
        np.zeros(len(number), dtype=np.bool_),
    )
    labels = _solid_labels(s, problem, s.axis_solid[number], own, np.full(len(number), -1))
    order = np.full(len(number), _SOLID_ORDER)
    return Labelled(problem, plates, order, labels)


def patch_outlines(
    part: Front,
    scene: Scene,
    close: Flags,
    ringed: Flags,
    own: Ints,
    *,
    reach: Floats,
    stop_mm: Floats,
) -> Outlines:
    """Return the flat sides of solids that the beam sees.

    Sides that lie along the beam are cut in two where the chief ray ends (`stop_mm`), since
    they reach before and behind what stands there.
    """
    s = scene.solids
    slopes = part.direction @ s.patch_normal.T
    seen = close.take(s.patch_solid, 1) & (slopes < GRAZING)
    first = np.zeros(len(s.patch_solid), dtype=np.bool_)
    first[np.searchsorted(s.patch_solid, distinct(s.patch_solid))] = True
    only_front = ringed.take(s.patch_solid, 1)
    seen = np.where(only_front, close.take(s.patch_solid, 1) & first, seen)
    problem, patch = np.nonzero(seen)
    points = s.patch_points.take(patch, 0)
    frame = frame_of(part, problem)
    x, y, z = local(frame, points, point=True)
    x, y, z, ahead = clip_behind(x, y, z)
    x, y, z, patch, problem = x[ahead], y[ahead], z[ahead], patch[ahead], problem[ahead]
    along = np.abs(slopes[problem, patch]) < GRAZING
    x, y, z, row = split_at(x, y, z, np.where(along, stop_mm[problem], np.inf))
    patch, problem = patch[row], problem[row]
    frame = frame_of(part, problem)
    vertices, depth = _flat_sides(
        frame, (x, y, z), s.patch_points[patch, 0], s.patch_normal.take(patch, 0)
    )
    near = touching(vertices, reach[frame.problem])
    count = len(near)
    labels = _solid_labels(s, frame.problem, s.patch_solid[patch], own, patch)
    return Outlines(
        frame.problem,
        np.full(count, vertices.shape[1]),
        vertices,
        np.zeros((count, 2)),
        np.zeros((count, 2, 2)),
        depth,
        np.full(count, _SOLID_ORDER),
        np.full(count, -1),
        *labels,
        inside_name=NO_OUTLINES.inside_name,
    ).take(near)


def _flat_sides(
    frame: Frame, local: tuple[Floats, Floats, Floats], point: Floats, normal: Floats
) -> tuple[Floats, Floats]:
    x, y, z = local
    crossing, slope = plane_depth(frame, point, normal)
    along = np.abs(slope) < GRAZING
    least, most = z.min(axis=1), z.max(axis=1)
    depth = np.clip(crossing, least, most)
    vertices = scaled(inverse_roots(frame, np.where(along[:, None], z, depth[:, None])), x, y)
    rate = growth(frame.moments, frame.medium, depth)
    vertices = perspective(vertices, np.where(along, 0.0, rate)[:, None] * (z - depth[:, None]))
    area = np.concatenate((vertices[:, 1:], vertices[:, :1]), axis=1)
    twice = (vertices[..., 0] * area[..., 1] - vertices[..., 1] * area[..., 0]).sum(axis=1)
    vertices[twice < 0.0] = vertices[twice < 0.0, ::-1]
    # As for plates: an optic's front and its mount's lie in one plane, so at one depth.
    rise = gradient(frame, normal, slope, inverse_roots(frame, np.maximum(crossing, 0.0)))
    plane = np.concatenate((crossing[:, None], rise), axis=1)
    # Halfway, not the mean of the corners: some are repeated to fill the row.
    plane[along] = 0.0
    plane[along, 0] = 0.5 * (least + most)[along]
    return vertices, plane


def hole_plates(scene: Scene, patches: Outlines) -> Labelled:
    """Return the openings of panels as holes in the sides that are seen."""
    s = scene.solids
    through = unit_vectors(s.hole_through)
    facing = np.abs(s.patch_normal[patches.row] @ through.T) > 1.0 - GRAZING
    same = s.patch_solid[patches.row][:, None] == s.hole_solid
    host, hole = np.nonzero(same & facing)
    problem = patches.problem[host]
    plates = Plates(
        s.hole_centre[hole], s.hole_axes[hole, 0], s.hole_axes[hole, 1], s.hole_round[hole]
    )
    none = np.full(len(hole), -1)
    labels = Labels(np.full(len(hole), HOLE), none, none, none, host)
    return Labelled(problem, plates, none, labels)
