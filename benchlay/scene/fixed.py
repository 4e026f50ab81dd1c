"""What the tracer would otherwise work out anew in every generation."""

from __future__ import annotations

import numpy as np

from benchlay.elements._kind import Acts, Inside
from benchlay.scene.tables import Faces, Fixed, Flags, Floats, Ints, Solids

# Beams are met by their distance from a solid's middle, of which rounding takes this much.
_ROUNDING = 1e-9
_SLACK_MM = 1e-3


def fixed_products(faces: Faces, solids: Solids, sides: tuple[Ints, Ints]) -> Fixed:
    """Return products of the scene's own vectors; `sides` are volumes behind and before faces."""
    f, s = faces, solids
    plane_of = _planes_of(s)
    round_of = np.full(len(s.owner), -1)
    round_of[s.axis_solid] = np.arange(len(s.axis_solid))
    offsets = (
        _products(f.origin, f.normal),
        _products(f.origin, f.left) + f.middle[:, 0],
        _products(f.origin, f.up) + f.middle[:, 1],
    )
    pierced = np.zeros(len(s.owner), dtype=np.bool_)
    pierced[s.hole_solid] = True
    own = _own_faces(*sides)
    return Fixed(
        np.ascontiguousarray(np.concatenate((f.normal, f.left, f.up)).T),
        np.concatenate(offsets),
        plane_of,
        s.plane_normal[plane_of],
        s.plane_offset[plane_of],
        round_of,
        np.ascontiguousarray(s.centre.T),
        _products(s.centre, s.centre),
        s.reach * (1.0 + _ROUNDING) + _SLACK_MM,
        own,
        *_own_figures(f, own),
        pierced,
        *_hole_figures(s),
        np.sqrt(np.einsum("hki,hki->h", s.hole_axes, s.hole_axes)),
        1.0 - np.einsum("pki,pi->pk", s.plane_normal[plane_of[s.plane_solid]], s.plane_normal) ** 2,
        f.present & (f.inside != Inside.BOTH),
        f.acts == Acts.LENS,
        f.acts == Acts.PASSES,
    )


def _products(first: Floats, second: Floats) -> Floats:
    product: Floats = np.einsum("ij,ij->i", first, second)
    return product


def _hole_figures(s: Solids) -> tuple[Floats, Floats]:
    first, second = s.hole_axes[:, 0], s.hole_axes[:, 1]
    axes = np.stack(
        (
            s.hole_through,
            first / _products(first, first)[:, None],
            second / _products(second, second)[:, None],
        )
    )
    middles = np.stack((s.hole_centre, s.hole_centre + s.hole_through))
    offsets = np.einsum("phi,ahi->pah", middles, axes)
    return np.ascontiguousarray(axes.reshape(-1, 3).T), offsets


def _own_figures(f: Faces, own: Ints) -> tuple[Floats, Floats, Flags]:
    if not len(f.owner):
        return np.zeros((1, 1, 3, 3)), np.zeros((1, 1, 3)), np.zeros((1, 1), dtype=np.bool_)
    axes = np.stack((f.normal, f.left, f.up), axis=1)
    middle = f.origin + f.middle[:, :1] * f.left + f.middle[:, 1:] * f.up
    return axes[own], middle[own], (f.inside == Inside.BOTH)[own]


def _planes_of(s: Solids) -> Ints:
    count = np.diff(s.plane_start, append=len(s.plane_solid))
    place = np.arange(int(count.max(initial=1)))
    planes: Ints = s.plane_start[:, None] + np.where(place < count[:, None], place, 0)
    return planes


def _own_faces(behind: Ints, before: Ints) -> Ints:
    """Return the faces (E, K) round each volume, which may lie behind them or before."""
    every = np.arange(len(behind))
    volume = np.concatenate((behind, np.where(before == behind, -1, before)))
    face = np.concatenate((every, every))[volume >= 0]
    volume = volume[volume >= 0]
    if not len(volume):
        return np.full((1, 1), -1)
    counts = np.bincount(volume)
    table = np.full((len(counts), int(counts.max())), -1)
    order = np.argsort(volume, kind="stable")
    starts = np.cumsum(counts) - counts
    table[volume[order], np.arange(len(order)) - starts[volume[order]]] = face[order]
    return table
