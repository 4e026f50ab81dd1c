"""How a spreading beam sees outlines that are not square to it.

Flow lines of a beam run on in proportion to its radius W(z). To first order in depth they
come from one point, where the tangent to W(z) meets the axis, so that what stands aslant is
seen in perspective: straight edges stay straight, ellipses stay ellipses.
"""

from __future__ import annotations

import numpy as np

from benchlay.scene.tables import Flags, Floats

_MOST = 0.5  # of a change of radius across an outline: beyond it the tangent says nothing


def growth(moments: Floats, index: Floats, depth: Floats) -> Floats:
    """Return how fast beams widen at a depth, relative to their radius, 1/mm.

    The mean over the two axes of W, from d(log det W)/dz.

    Parameters
    ----------
    moments : (10, K) ndarray of float64
        At depth 0.
    index : (K,) ndarray of float64
        Absolute index of the medium.
    depth : (K,) ndarray of float64
        Along the beam, mm.
    """
    m, z = moments, depth / index
    a = m[0] + z * (2.0 * m[3] + z * m[7])
    b = m[1] + z * (m[4] + m[5] + z * m[8])
    c = m[2] + z * (2.0 * m[6] + z * m[9])
    da, dc = 2.0 * (m[3] + z * m[7]), 2.0 * (m[6] + z * m[9])
    db = m[4] + m[5] + 2.0 * z * m[8]
    square = a * c - b * b
    rise = (da * c + a * dc - 2.0 * b * db) / index
    rate: Floats = 0.25 * rise / np.where(square > 0.0, square, 1.0)
    return rate


def perspective(vertices: Floats, widening: Floats) -> Floats:
    """Return corners (K, V, 2) as they are seen, `widening` (K, V) being growth times depth.

    Both are taken from the depth at which the corners were scaled.
    """
    usable: Flags = np.abs(widening).max(axis=1) < _MOST
    scale = np.where(usable[:, None], 1.0 + widening, 1.0)
    seen: Floats = vertices / scale[..., None]
    return seen


def perspective_plate(
    centre: Floats, first: Floats, second: Floats, widening: tuple[Floats, Floats, Floats]
) -> tuple[Floats, Floats, Floats, Floats]:
    """Return corners (K, 4, 2) of a plate as it is seen, and centre and half axes of its ellipse.

    Parameters
    ----------
    centre, first, second : (K, 2) ndarray of float64
        Middle and half axes, scaled at one depth.
    widening : tuple of (K,) ndarray of float64
        Growth times the depth of the middle (from that depth), of the first and of the second
        half axis.

    Notes
    -----
    (c + a cos t + b sin t) / (r + p cos t + q sin t) is an ellipse for r > hypot(p, q): with
    the parameter counted from where the denominator is largest, e = hypot(p, q) / r and
    cos u = (cos t + e) / (1 + e cos t) it becomes linear in cos u and sin u.
    """
    of_centre, p, q = widening
    usable = np.abs(of_centre) + np.abs(p) + np.abs(q) < _MOST
    r = np.where(usable, 1.0 + of_centre, 1.0)
    p, q = np.where(usable, p, 0.0), np.where(usable, q, 0.0)
    signs = ((-1, -1), (1, -1), (1, 1), (-1, 1))
    corners = np.stack(
        [(centre + i * first + j * second) / (r + i * p + j * q)[:, None] for i, j in signs],
        axis=1,
    )
    lean = np.hypot(p, q)
    level = lean == 0.0
    cos = np.where(level, 1.0, p / np.where(level, 1.0, lean))[:, None]
    sin = np.where(level, 0.0, q / np.where(level, 1.0, lean))[:, None]
    along, across = cos * first + sin * second, cos * second - sin * first
    e = (lean / r)[:, None]
    rest = r[:, None] * (1.0 - e * e)
    return (
        corners,
        (centre - e * along) / rest,
        (along - e * centre) / rest,
        across / (r[:, None] * np.sqrt(1.0 - e * e)),
    )
