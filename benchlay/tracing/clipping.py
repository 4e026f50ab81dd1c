"""Cuts off what of a flat side lies behind the start of a beam."""

from __future__ import annotations

import numpy as np

from benchlay.scene.tables import Flags, Floats, Ints

_START_MM = 1e-6


def clip_behind(x: Floats, y: Floats, z: Floats) -> tuple[Floats, Floats, Floats, Flags]:
    """Return polygons (K, V) clipped to z > 0, padded by repeating corners.

    Parameters
    ----------
    x, y, z : (K, V) ndarray of float64
        Corners in order, in mm; repeated corners are allowed.

    Returns
    -------
    x, y, z : (K, 2 V) or (K, V) ndarray of float64
        The clipped polygons; the shape is unchanged where nothing was to be cut.
    ahead : (K,) ndarray of bool
        Which polygons have anything left.

    References
    ----------
    .. [1] Sutherland, I. E., Hodgman, G. W. (1974). Reentrant polygon clipping.
       Comm. ACM 17, 32-42: one plane at a time.
    """
    kept = z > _START_MM
    ahead: Flags = kept.any(axis=1)
    if kept[ahead].all():
        return x, y, z, ahead
    after = np.roll(kept, -1, axis=1)
    step = np.roll(z, -1, axis=1) - z
    with np.errstate(divide="ignore", invalid="ignore"):
        share = np.where(kept != after, (_START_MM - z) / step, 0.0)
    cut = [value + share * (np.roll(value, -1, axis=1) - value) for value in (x, y, z)]
    valid = np.stack((kept, kept != after), axis=2).reshape(len(z), -1)
    order = np.argsort(~valid, axis=1, kind="stable")
    last = np.maximum(valid.sum(axis=1) - 1, 0)
    order = np.where(
        np.arange(valid.shape[1]) > last[:, None],
        np.take_along_axis(order, last[:, None], 1),
        order,
    )
    both = [
        np.take_along_axis(np.stack((old, new), axis=2).reshape(len(z), -1), order, 1)
        for old, new in zip((x, y, z), cut, strict=True)
    ]
    return both[0], both[1], both[2], ahead


def split_at(x: Floats, y: Floats, z: Floats, depth: Floats) -> tuple[Floats, Floats, Floats, Ints]:
    """Return polygons (K, V) cut in two at a depth (K,), mm, where they reach to both sides.

    Returns
    -------
    x, y, z : (L, W) ndarray of float64
        First the polygons or their nearer parts, row by row, then the farther parts.
    row : (L,) ndarray of int
        Which polygon each is, or is part of.
    """
    rows = np.arange(len(depth))
    both = np.flatnonzero((z.min(axis=1) < depth - _START_MM) & (z.max(axis=1) > depth + _START_MM))
    if not len(both):
        return x, y, z, rows
    at = depth[both, None]
    near = clip_behind(x[both], y[both], at - z[both])[:3]
    far = clip_behind(x[both], y[both], z[both] - at)[:3]
    near, far = (near[0], near[1], at - near[2]), (far[0], far[1], far[2] + at)
    width = max(near[0].shape[1], far[0].shape[1])
    columns = []
    for whole, nearer, farther in zip((x, y, z), near, far, strict=True):
        first = _padded(whole, width).copy()
        first[both] = _padded(nearer, width)
        columns.append(np.concatenate((first, _padded(farther, width))))
    return columns[0], columns[1], columns[2], np.concatenate((rows, both))


def _padded(values: Floats, width: int) -> Floats:
    missing = width - values.shape[1]
    if missing <= 0:
        return values
    return np.concatenate((values, np.repeat(values[:, -1:], missing, axis=1)), axis=1)
