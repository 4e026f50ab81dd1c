"""From collected solids to arrays: planes, patches, discs, holes, bounding spheres."""

from __future__ import annotations

import numpy as np

from benchlay.optics.rays import cross
from benchlay.scene.rows import Frames, SolidRows
from benchlay.scene.tables import Flags, Floats, Ints, Solids

_NO_POINTS = np.zeros((0, 3))


def solids_table(rows: SolidRows, frames: Frames, hole_names: list[int], present: Flags) -> Solids:
    """Return the table of all solids; `hole_names` are the names of all holes in order."""
    points, start = rows.points(frames)
    labels = np.array(rows.labels, dtype=np.float64).reshape(-1, 5)
    owner, name, part, sink = labels[:, :4].astype(np.int64).T.copy()
    patch_solid, patch_points, patch_corners = _patches(rows, points, start)
    disc_solid, disc_centre, disc_axes = _discs(rows, points, start)
    patch_normal = _unit(
        cross(patch_points[:, 1] - patch_points[:, 0], patch_points[:, 2] - patch_points[:, 1])
    )
    disc_normal = _unit(cross(disc_axes[:, 0], disc_axes[:, 1]))
    plane_normal, plane_offset, plane_start, plane_solid = _planes(
        np.concatenate((patch_solid, disc_solid)),
        np.concatenate((patch_normal, disc_normal)),
        np.concatenate((patch_points[:, 0], disc_centre)),
        len(rows.solids),
    )
    axis_point, axis, axis_radius, axis_length, axis_solid = _axes(rows, points, start)
    centre, reach = _spheres(rows, points, start)
    hole_solid, hole_round, hole_centre, hole_axes, hole_through = _holes(rows, frames)
    return Solids(
        owner=owner,
        name=name,
        part=part,
        sink=sink,
        specular=labels[:, 4].copy(),
        plane_normal=plane_normal,
        plane_offset=plane_offset,
        plane_start=plane_start,
        plane_solid=plane_solid,
        axis_point=axis_point,
        axis=axis,
        axis_radius=axis_radius,
        axis_length=axis_length,
        axis_solid=axis_solid,
        centre=centre,
        reach=reach,
        patch_solid=patch_solid,
        patch_points=patch_points,
        patch_corners=patch_corners,
        patch_normal=patch_normal,
        disc_solid=disc_solid,
        disc_centre=disc_centre,
        disc_axes=disc_axes,
        disc_normal=disc_normal,
        hole_solid=hole_solid,
        hole_name=np.array(hole_names, dtype=np.int64),
        hole_round=hole_round,
        hole_centre=hole_centre,
        hole_axes=hole_axes,
        hole_through=hole_through,
        present=present,
    )


def _unit(vectors: Floats) -> Floats:
    length = np.sqrt(np.einsum("ij,ij->i", vectors, vectors))
    unit: Floats = vectors / length[:, None]
    return unit


def _patches(rows: SolidRows, points: Floats, start: Ints) -> tuple[Ints, Floats, Ints]:
    widest = max((len(patch) for solid in rows.solids for patch in solid.patches), default=3)
    patches = [patch for solid in rows.solids for patch in solid.patches]
    if not patches:
        return np.zeros(0, dtype=np.int64), np.zeros((0, 3, 3)), np.zeros(0, dtype=np.int64)
    counts = [len(solid.patches) for solid in rows.solids]
    owners = np.repeat(np.arange(len(counts)), counts)
    index = np.array([patch + (patch[-1],) * (widest - len(patch)) for patch in patches])
    index += start[owners, None]
    return owners, points[index], np.array([len(patch) for patch in patches])


def _discs(rows: SolidRows, points: Floats, start: Ints) -> tuple[Ints, Floats, Floats]:
    found = [
        (number, *(int(start[number]) + i for i in disc))
        for number, solid in enumerate(rows.solids)
        for disc in solid.discs
    ]
    table = np.array(found, dtype=np.int64).reshape(-1, 4)
    centre = points[table[:, 1]]
    axes = np.stack((points[table[:, 2]] - centre, points[table[:, 3]] - centre), axis=1)
    return table[:, 0], centre, axes


def _planes(
    owner: Ints, normal: Floats, point: Floats, count: int
) -> tuple[Floats, Floats, Ints, Ints]:
    order = np.argsort(owner, kind="stable")
    owner, normal, point = owner[order], normal[order], point[order]
    start = np.searchsorted(owner, np.arange(count))
    return normal, np.einsum("ij,ij->i", normal, point), start, owner


def _axes(
    rows: SolidRows, points: Floats, start: Ints
) -> tuple[Floats, Floats, Floats, Floats, Ints]:
    found = [
        (number, int(start[number]) + solid.cylinder[0], int(start[number]) + solid.cylinder[1])
        for number, solid in enumerate(rows.solids)
        if solid.cylinder is not None
    ]
    radii = np.array(
        [s.cylinder[2] for s in rows.solids if s.cylinder is not None], dtype=np.float64
    )
    table = np.array(found, dtype=np.int64).reshape(-1, 3)
    point = points[table[:, 1]] if len(table) else _NO_POINTS
    other = points[table[:, 2]] if len(table) else _NO_POINTS
    length = np.sqrt(np.einsum("ij,ij->i", other - point, other - point))
    return point, _unit(other - point), radii, length, table[:, 0]


def _spheres(rows: SolidRows, points: Floats, start: Ints) -> tuple[Floats, Floats]:
    """Return spheres round the corner points; a disc's rim lies within its half axes' box."""
    if not rows.solids:
        return _NO_POINTS, np.zeros(0)
    low, high = np.minimum.reduceat(points, start), np.maximum.reduceat(points, start)
    centre = (low + high) / 2
    owner = np.repeat(np.arange(len(start)), np.diff(np.append(start, len(points))))
    away = points - centre[owner]
    reach = np.sqrt(np.maximum.reduceat(np.einsum("ij,ij->i", away, away), start))
    radius = np.array([s.cylinder[2] if s.cylinder else 0.0 for s in rows.solids])
    return centre, reach + radius


def _holes(rows: SolidRows, frames: Frames) -> tuple[Ints, Flags, Floats, Floats, Floats]:
    found = [
        (number, frame, hole)
        for number, (solid, frame) in enumerate(zip(rows.solids, rows.frames, strict=True))
        for hole in solid.holes
    ]
    frame_of = [frame for _, frame, _ in found]
    centre = frames.place([hole.centre for _, _, hole in found], frame_of)
    first = frames.turn([hole.half_axes[0] for _, _, hole in found], frame_of)
    second = frames.turn([hole.half_axes[1] for _, _, hole in found], frame_of)
    return (
        np.array([number for number, _, _ in found], dtype=np.int64),
        np.array([hole.round for _, _, hole in found], dtype=np.bool_),
        centre,
        np.stack((first, second), axis=1),
        frames.turn([hole.through for _, _, hole in found], frame_of),
    )
