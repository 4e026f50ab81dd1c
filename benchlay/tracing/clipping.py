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
    x, y, z : (K, W) ndarray of float64
        The clipped polygons, as wide as the one with the most corners; unchanged where nothing
        was to be cut.
    ahead : (K,) ndarray of bool
        Which polygons have anything left.

    References
    ----------
    .. [1] Sutherland, I. E., Hodgman, G. W. (1974). Reentrant polygon clipping.
       Comm. ACM 17, 32-42: one plane at a time.
    """
    kept = z > _START_MM
    ahead: Flags = np.logical_or.reduce(kept, axis=1)
    if kept[ahead].all():
        return x, y, z, ahead
    crossed = kept != _following(kept)
    corner = np.array((x, y, z))
    step = _following(corner) - corner
    share = np.divide(_START_MM - z, step[2], out=np.zeros_like(z), where=crossed)
    both = np.stack((corner, corner + share * step), axis=3).reshape(3, len(z), -1)
    valid = np.stack((kept, crossed), axis=2).reshape(len(z), -1)
    count = valid.sum(axis=1)
    # A convex polygon gains one corner at most: what is never used is not carried along.
    order = np.argsort(~valid, axis=1, kind="stable")[:, : int(count.max())]
    last = order[np.arange(len(z)), np.maximum(count - 1, 0)]
    order = np.where(np.arange(order.shape[1]) < count[:, None], order, last[:, None])
    clipped = np.take_along_axis(both, order[None], axis=2)
    return clipped[0], clipped[1], clipped[2], ahead


def _following(values: np.ndarray) -> np.ndarray:
    """Return for each corner (..., V) the value of the next."""
    return np.concatenate((values[..., 1:], values[..., :1]), axis=-1)


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
    count, deep = len(both), z[both] - at
    twice = np.concatenate((both, both))
    parts = clip_behind(x[twice], y[twice], np.concatenate((-deep, deep)))[:3]
    near = (parts[0][:count], parts[1][:count], at - parts[2][:count])
    far = (parts[0][count:], parts[1][count:], parts[2][count:] + at)
    width = parts[0].shape[1]
    columns = []
    for whole, nearer, farther in zip((x, y, z), near, far, strict=True):
        first = padded(whole, width).copy()
        first[both] = padded(nearer, width)
        columns.append(np.concatenate((first, padded(farther, width))))
    return columns[0], columns[1], columns[2], np.concatenate((rows, both))


def padded(values: Floats, width: int) -> Floats:
    """Return polygons (K, V, ...) with `width` corners at least, the last one repeated."""
    missing = width - values.shape[1]
    if missing <= 0:
        return values
    return np.concatenate((values, np.repeat(values[:, -1:], missing, axis=1)), axis=1)
