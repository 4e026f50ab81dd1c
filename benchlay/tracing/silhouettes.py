"""Outlines of faces and solids in the scaled coordinates of a beam's cross-section.

A body's outline is seen along the beam's flow lines: a point at transverse place x and depth
z has coordinates W(z)^-1 x. A body that stands across the beam takes W at the depth where
its plane crosses the chief ray, and is seen in the perspective of W there; one that lies
along the beam takes W corner by corner, so that light spreading into it is caught.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from benchlay.elements._kind import Acts
from benchlay.geometry.distinct import distinct
from benchlay.optics.rays import cross, dot
from benchlay.optics.shares import Shapes
from benchlay.scene.tables import PART, Flags, Floats, Ints, Scene, Solids
from benchlay.tracing.clipping import clip_behind, split_at
from benchlay.tracing.front import Front
from benchlay.tracing.spreading import growth, perspective, perspective_plate

CORE, BESIDE, OPTIC, BODY, HOLE = range(5)
_GRAZING = 0.2  # sine of the angle between beam and plane below which it counts as lying along
_CLEAR_ORDER, _OUTLINE_ORDER, _SOLID_ORDER = 0, 1, 2
_FLAT = 1e-12
_TOUCH_MM = 1e-6  # the two faces of a thin optic stand in one place, give or take rounding
_EDGE_ON = 1e-6


class Outlines(NamedTuple):
    """Outlines in cross-sections: a row a shape, with what light that lands there means."""

    problem: Ints  # (S,)
    corners: Ints  # (S,)
    vertices: Floats  # (S, V, 2)
    centre: Floats  # (S, 2)
    axes: Floats  # (S, 2, 2)
    depth: Floats  # (S, 3)
    order: Ints  # (S,)
    hole_of: Ints  # (S,) row of the outline it is a hole in, -1 for none
    role: Ints  # (S,)
    sink: Ints  # (S,)
    name: Ints  # (S,)
    face: Ints  # (S,) for optics
    row: Ints  # (S,) patch row, for holes to find their host
    inside_name: Ints  # (problems,) name of the optic the chief ray is inside of

    def shapes(self) -> Shapes:
        """Return what is needed to divide the cross-sections."""
        return Shapes(*self[:8])

    def take(self, kept: Flags) -> Outlines:
        """Return some of the outlines; the hosts of all holes must be among them."""
        if kept.all():
            return self
        place = np.cumsum(kept) - 1
        columns = [column[kept] for column in self[:-1]]
        columns[7] = np.where(columns[7] >= 0, place[columns[7]], -1)
        return Outlines(*columns, self.inside_name)

    @staticmethod
    def joined(pieces: list[Outlines], hosts: int, scene: Scene, part: Front) -> Outlines:
        """Return pieces together, sorted by problem; piece number `hosts` has all holes in it."""
        widest = max((piece.vertices.shape[1] for piece in pieces), default=3)
        shift = sum(len(piece.problem) for piece in pieces[:hosts])
        columns: list[np.ndarray] = []
        for number, field in enumerate(Outlines._fields[:-1]):
            values = [piece[number] for piece in pieces]
            if field == "vertices":
                values = [_padded(value, widest) for value in values]
            if field == "hole_of":
                values = [np.where(value >= 0, value + shift, -1) for value in values]
            columns.append(np.concatenate(values))
        order = np.argsort(columns[0], kind="stable")
        place = np.empty(len(order), dtype=np.int64)
        place[order] = np.arange(len(order))
        columns = [column[order] for column in columns]
        columns[7] = np.where(columns[7] >= 0, place[columns[7]], -1)
        inside = np.full(len(part.within), -1)
        within = np.flatnonzero(part.within >= 0)
        inside[within] = scene.face_owner_name[part.face[within]]
        return Outlines(*columns, inside)


_NO_INTS = np.zeros(0, dtype=np.int64)
_EMPTY: tuple[np.ndarray, ...] = (
    _NO_INTS,
    _NO_INTS,
    np.zeros((0, 3, 2)),
    np.zeros((0, 2)),
    np.zeros((0, 2, 2)),
    np.zeros((0, 3)),
    *(_NO_INTS for _ in range(7)),
)


def _padded(vertices: Floats, count: int) -> Floats:
    missing = count - vertices.shape[1]
    if not missing:
        return vertices
    return np.concatenate((vertices, np.repeat(vertices[:, -1:], missing, axis=1)), axis=1)


class Frame(NamedTuple):
    """For each outline, the beam it is seen along."""

    problem: Ints
    position: Floats
    direction: Floats
    first: Floats
    second: Floats
    moments: Floats
    index: Floats


def frame_of(part: Front, problem: Ints) -> Frame:
    """Return the frames of the beams of some outlines."""
    direction, first = part.direction[problem], part.axis[problem]
    return Frame(
        problem,
        part.position[problem],
        direction,
        first,
        cross(direction, first),
        part.moments[:, problem],
        part.index[problem],
    )


def _local(frame: Frame, vector: Floats, *, point: bool) -> tuple[Floats, Floats, Floats]:
    """Return components along first, second and direction of (K, 3) or (K, V, 3) vectors."""
    many = vector.ndim == 3  # noqa: PLR2004 (K outlines of V corners)
    away = vector
    if point:
        away = vector - (frame.position[:, None, :] if many else frame.position)
    axes = (frame.first, frame.second, frame.direction)
    if many:
        x, y, z = (np.einsum("kvi,ki->kv", away, axis) for axis in axes)
    else:
        x, y, z = (dot(away, axis) for axis in axes)
    return x, y, z


def inverse_roots(frame: Frame, z: Floats) -> tuple[Floats, Floats, Floats]:
    """Return the components of W(z)^-1 (11, 12, 22), 1/mm, at depths z (K,) or (K, V)."""
    m, d = frame.moments, frame.index
    if z.ndim == 2:  # noqa: PLR2004 (K outlines of V corners)
        m, d = m[:, :, None], d[:, None]
    reduced = z / d
    a = 4.0 * (m[0] + reduced * (2.0 * m[3] + reduced * m[7]))
    b = 4.0 * (m[1] + reduced * (m[4] + m[5] + reduced * m[8]))
    c = 4.0 * (m[2] + reduced * (2.0 * m[6] + reduced * m[9]))
    s = np.sqrt(np.maximum(a * c - b * b, 0.0))
    t = s * np.sqrt(a + c + 2.0 * s)
    return (c + s) / t, -b / t, (a + s) / t


def _gradient(
    frame: Frame, normal: Floats, slope: Floats, root: tuple[Floats, Floats, Floats]
) -> Floats:
    """Return (K, 2): how the depth of a plane grows along the scaled coordinates."""
    gx, gy = -dot(normal, frame.first) / slope, -dot(normal, frame.second) / slope
    i11, i12, i22 = root
    det = i11 * i22 - i12 * i12
    return np.stack(((gx * i22 - gy * i12) / det, (gy * i11 - gx * i12) / det), axis=1)


def _plane_depth(frame: Frame, point: Floats, normal: Floats) -> tuple[Floats, Floats]:
    """Return where planes cross the chief rays, and direction . normal."""
    slope = dot(frame.direction, normal)
    safe = np.where(np.abs(slope) < _FLAT, _FLAT, slope)
    return dot(point - frame.position, normal) / safe, safe


class Plates(NamedTuple):
    """Flat regions in space: centre and two half axes (mm), round or rectangular."""

    centre: Floats  # (K, 3)
    first: Floats  # (K, 3)
    second: Floats  # (K, 3)
    round: Flags  # (K,)


def _plate_shapes(
    frame: Frame, plates: Plates
) -> tuple[Floats, Floats, Floats, Ints, Floats, Flags]:
    """Return vertices, centre, axes, corners, depth, and which lie ahead of the beam's start."""
    normal = _unit(cross(plates.first, plates.second))
    x, y, z = _local(frame, plates.centre, point=True)
    ax, ay, az = _local(frame, plates.first, point=False)
    bx, by, bz = _local(frame, plates.second, point=False)
    crossing, slope = _plane_depth(frame, plates.centre, normal)
    reach = np.where(plates.round, np.hypot(az, bz), np.abs(az) + np.abs(bz))
    depth = np.maximum(np.clip(crossing, z - reach, z + reach), 0.0)
    root = inverse_roots(frame, depth)
    rate = growth(frame.moments, frame.index, depth)
    vertices, centre, first, second = perspective_plate(
        _scaled(root, x, y),
        _scaled(root, ax, ay),
        _scaled(root, bx, by),
        (rate * (z - depth), rate * az, rate * bz),
    )
    clockwise = first[:, 0] * second[:, 1] - first[:, 1] * second[:, 0] < 0.0
    vertices[clockwise] = vertices[clockwise, ::-1]
    gradient = _gradient(frame, normal, slope, root)
    flat = np.abs(slope) < _GRAZING
    gradient[flat] = 0.0
    plane = np.concatenate((np.where(flat, z, crossing)[:, None], gradient), axis=1)
    corners = np.where(plates.round, 0, 4)
    return (
        vertices,
        centre,
        np.stack((first, second), axis=2),
        corners,
        plane,
        z + reach > -_TOUCH_MM,
    )


def _unit(vectors: Floats) -> Floats:
    length = np.sqrt(dot(vectors, vectors))
    unit: Floats = vectors / np.where(length < _FLAT, 1.0, length)[:, None]
    return unit


def _scaled(root: tuple[Floats, Floats, Floats], x: Floats, y: Floats) -> Floats:
    return np.stack((root[0] * x + root[1] * y, root[1] * x + root[2] * y), axis=-1)


def _pieces(
    frame: Frame,
    plates: Plates,
    order: Ints,
    labels: tuple[Ints, Ints, Ints, Ints, Ints],
    reach: Floats,
) -> Outlines:
    """Return outlines of plates; labels are role, sink, name, face, row (of a host, for holes)."""
    vertices, centre, axes, corners, depth, ahead = _plate_shapes(frame, plates)
    ahead &= _touches(vertices, reach[frame.problem])
    none = np.full(len(corners), -1)
    columns = (frame.problem, corners, vertices, centre, axes, depth, order, none, *labels)
    return Outlines(*(column[ahead] for column in columns), _NO_INTS)


def face_outlines(
    part: Front, scene: Scene, close: Flags, met: Flags, row: Ints, reach: Floats
) -> Outlines:
    """Return clear regions and, where they are larger, whole outlines of faces."""
    f = scene.faces
    problem, face = np.nonzero(close)
    own = met[problem] & (face == row[problem])
    inside = part.within[problem] >= 0
    opaque = f.acts[face] == Acts.OPAQUE
    ring = ~opaque & ~inside & (f.clear[face] < f.radii[face]).any(axis=1)
    role = np.where(own, CORE, np.where(opaque, BODY, OPTIC))
    both = np.concatenate((np.arange(len(face)), np.flatnonzero(ring)))
    is_ring = np.arange(len(both)) >= len(face)
    face, problem = face[both], problem[both]
    half = np.where(is_ring[:, None], f.radii[face], f.clear[face])
    left, up = f.left[face], f.up[face]
    centre = f.origin[face] + f.middle[face, :1] * left + f.middle[face, 1:] * up
    shape = np.where(is_ring, f.round[face], f.clear_round[face])
    plates = Plates(centre, left * half[:, :1], up * half[:, 1:], shape)
    labels = (
        np.where(is_ring, BESIDE, role[both]),
        np.where(is_ring, f.beside[face], f.sink[face]),
        scene.face_owner_name[face],
        face,
        np.full(len(face), -1),
    )
    order = np.where(is_ring, _OUTLINE_ORDER, _CLEAR_ORDER)
    return _pieces(frame_of(part, problem), plates, order, labels, reach)


def _solid_labels(
    s: Solids, problem: Ints, solid: Ints, own: Ints, row: Ints
) -> tuple[Ints, Ints, Ints, Ints, Ints]:
    role = np.where(solid == own[problem], CORE, BODY)
    return role, s.sink[solid], s.name[solid], np.full(len(solid), -1), row


def disc_outlines(part: Front, scene: Scene, close: Flags, own: Ints, reach: Floats) -> Outlines:
    """Return the round ends of solids, both of them: together with the sides they make the body."""
    s = scene.solids
    slopes = part.direction @ s.disc_normal.T
    # An end that faces the light is the optic's own face, which is an outline already; ends
    # seen edge-on have no area.
    facing = (slopes < -_GRAZING) & (s.part[s.disc_solid] == PART["edge"])
    seen = close[:, s.disc_solid] & ~facing & (np.abs(slopes) > _EDGE_ON)
    problem, disc = np.nonzero(seen)
    plates = Plates(
        s.disc_centre[disc],
        s.disc_axes[disc, 0],
        s.disc_axes[disc, 1],
        np.ones(len(disc), dtype=np.bool_),
    )
    labels = _solid_labels(s, problem, s.disc_solid[disc], own, np.full(len(disc), -1))
    return _pieces(frame_of(part, problem), plates, np.full(len(disc), _SOLID_ORDER), labels, reach)


def cylinder_sides(part: Front, scene: Scene, close: Flags, own: Ints, reach: Floats) -> Outlines:
    """Return the sides of round solids as the rectangles in which the beam sees them."""
    s = scene.solids
    problem, number = np.nonzero(close[:, s.axis_solid])
    direction, axis = part.direction[problem], s.axis[number]
    across = cross(direction, axis)
    seen = dot(across, across) > _EDGE_ON**2
    problem, number, axis, across = problem[seen], number[seen], axis[seen], across[seen]
    half = 0.5 * s.axis_length[number]
    plates = Plates(
        s.axis_point[number] + half[:, None] * axis,
        half[:, None] * axis,
        s.axis_radius[number][:, None] * _unit(across),
        np.zeros(len(number), dtype=np.bool_),
    )
    labels = _solid_labels(s, problem, s.axis_solid[number], own, np.full(len(number), -1))
    order = np.full(len(number), _SOLID_ORDER)
    return _pieces(frame_of(part, problem), plates, order, labels, reach)


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
    seen = close[:, s.patch_solid] & (slopes < _GRAZING)
    first = np.zeros(len(s.patch_solid), dtype=np.bool_)
    first[np.searchsorted(s.patch_solid, distinct(s.patch_solid))] = True
    only_front = ringed[:, s.patch_solid]
    seen = np.where(only_front, close[:, s.patch_solid] & first, seen)
    problem, patch = np.nonzero(seen)
    points = s.patch_points[patch]
    frame = frame_of(part, problem)
    x, y, z = _local(frame, points, point=True)
    x, y, z, ahead = clip_behind(x, y, z)
    x, y, z, patch, problem = x[ahead], y[ahead], z[ahead], patch[ahead], problem[ahead]
    along = np.abs(slopes[problem, patch]) < _GRAZING
    x, y, z, row = split_at(x, y, z, np.where(along, stop_mm[problem], np.inf))
    patch, problem = patch[row], problem[row]
    frame = frame_of(part, problem)
    vertices, depth = _flat_sides(frame, (x, y, z), s.patch_points[patch, 0], s.patch_normal[patch])
    near = _touches(vertices, reach[frame.problem])
    count = len(near)
    labels = _solid_labels(s, frame.problem, s.patch_solid[patch], own, patch)
    columns = (
        frame.problem,
        np.full(count, vertices.shape[1]),
        vertices,
        np.zeros((count, 2)),
        np.zeros((count, 2, 2)),
        depth,
        np.full(count, _SOLID_ORDER),
        np.full(count, -1),
        *labels,
    )
    return Outlines(*(column[near] for column in columns), _NO_INTS)


def _touches(vertices: Floats, reach: Floats) -> Flags:
    """Tell which outlines' boxes come within the reach of the axis."""
    low, high = vertices.min(axis=1), vertices.max(axis=1)
    touches: Flags = ((low < reach[:, None]) & (high > -reach[:, None])).all(axis=1)
    return touches


def _flat_sides(
    frame: Frame, local: tuple[Floats, Floats, Floats], point: Floats, normal: Floats
) -> tuple[Floats, Floats]:
    x, y, z = local
    crossing, slope = _plane_depth(frame, point, normal)
    along = np.abs(slope) < _GRAZING
    least, most = z.min(axis=1), z.max(axis=1)
    depth = np.clip(crossing, least, most)
    vertices = _scaled(inverse_roots(frame, np.where(along[:, None], z, depth[:, None])), x, y)
    rate = growth(frame.moments, frame.index, depth)
    vertices = perspective(vertices, np.where(along, 0.0, rate)[:, None] * (z - depth[:, None]))
    area = np.roll(vertices, -1, axis=1)
    twice = (vertices[..., 0] * area[..., 1] - vertices[..., 1] * area[..., 0]).sum(axis=1)
    vertices[twice < 0.0] = vertices[twice < 0.0, ::-1]
    gradient = _gradient(frame, normal, slope, inverse_roots(frame, depth))
    plane = np.concatenate((crossing[:, None], gradient), axis=1)
    # Halfway, not the mean of the corners: some are repeated to fill the row.
    plane[along] = 0.0
    plane[along, 0] = 0.5 * (least + most)[along]
    return vertices, plane


def hole_outlines(part: Front, scene: Scene, patches: Outlines, reach: Floats) -> Outlines:
    """Return the openings of panels as holes in the sides that are seen."""
    s = scene.solids
    if not len(s.hole_solid) or not len(patches.row):
        return Outlines(*_EMPTY, _NO_INTS)
    through = _unit(s.hole_through)
    facing = np.abs(s.patch_normal[patches.row] @ through.T) > 1.0 - _GRAZING
    same = s.patch_solid[patches.row][:, None] == s.hole_solid
    host, hole = np.nonzero(same & facing)
    problem = patches.problem[host]
    plates = Plates(
        s.hole_centre[hole], s.hole_axes[hole, 0], s.hole_axes[hole, 1], s.hole_round[hole]
    )
    none = np.full(len(hole), -1)
    labels = (np.full(len(hole), HOLE), none, none, none, host)
    found = _pieces(frame_of(part, problem), plates, none, labels, reach)
    return found._replace(hole_of=found.row)
