"""What the tracer would otherwise work out anew in every generation."""

from __future__ import annotations

import numpy as np

from benchlay.geometry.distinct import distinct
from benchlay.scene.tables import Faces, Fixed, Floats, Ints, Solids


def fixed_products(faces: Faces, solids: Solids, item_of_face: Ints) -> Fixed:
    """Return products of the scene's own vectors."""
    f, s = faces, solids
    offsets = (
        _products(f.origin, f.normal),
        _products(f.origin, f.left) + f.middle[:, 0],
        _products(f.origin, f.up) + f.middle[:, 1],
    )
    return Fixed(
        np.ascontiguousarray(np.concatenate((f.normal, f.left, f.up)).T),
        np.concatenate(offsets),
        np.ascontiguousarray(np.concatenate((s.plane_normal, s.axis)).T),
        _products(s.axis_point, s.axis),
        _products(s.axis_point, s.axis_point),
        _own_faces(item_of_face),
        distinct(s.hole_solid),
    )


def _products(first: Floats, second: Floats) -> Floats:
    product: Floats = np.einsum("ij,ij->i", first, second)
    return product


def _own_faces(item_of_face: Ints) -> Ints:
    if not len(item_of_face):
        return np.full((1, 1), -1)
    counts = np.bincount(item_of_face)
    table = np.full((len(counts), int(counts.max())), -1)
    order = np.argsort(item_of_face, kind="stable")
    starts = np.cumsum(counts) - counts
    table[item_of_face[order], np.arange(len(order)) - starts[item_of_face[order]]] = order
    return table
