"""What distances, faces and lenses do to second moments; see `moments`."""

from __future__ import annotations

from typing import TypeAlias

import numpy as np
from numpy.typing import ArrayLike, NDArray

Floats: TypeAlias = NDArray[np.float64]

XX, XY, YY, XU, XV, YU, YV, UU, UV, VV = range(10)

MM_PER_NM = 1e-6


def propagate(m: Floats, length_mm: ArrayLike, index: ArrayLike) -> Floats:
    """Moments after a way through a medium.

    Parameters
    ----------
    m : (10, ...) ndarray of float64
        Moments before.
    length_mm : (...,) array_like of float
        Geometrical length; negative goes back.
    index : (...,) array_like of float
        Absolute index of the medium.

    Returns
    -------
    (10, ...) ndarray of float64
    """
    way = np.asarray(length_mm, dtype=np.float64) / np.asarray(index, dtype=np.float64)
    spread = way * m[UU:]  # of uu, uv, vv
    out = np.empty((10, *spread.shape[1:]))
    out[UU:] = m[UU:]
    out[XU] = m[XU] + spread[0]
    out[XV] = m[XV] + spread[1]
    out[YU] = m[YU] + spread[1]
    out[YV] = m[YV] + spread[2]
    out[XX] = m[XX] + way * (m[XU] + out[XU])
    out[XY] = m[XY] + way * (m[YU] + out[XV])
    out[YY] = m[YY] + way * (m[YV] + out[YV])
    return out


def rotate(m: Floats, cos: ArrayLike, sin: ArrayLike) -> Floats:
    """Express the same beams in a basis turned from e1 towards e2.

    Parameters
    ----------
    m : (10, ...) ndarray of float64
        Moments.
    cos, sin : (...,) array_like of float
        Of the angle by which the basis turns.

    Returns
    -------
    (10, ...) ndarray of float64
    """
    c, s = np.asarray(cos), np.asarray(sin)
    cc, ss, cs = c * c, s * s, c * s
    xy2, uv2 = 2.0 * cs * m[XY], 2.0 * cs * m[UV]
    even, odd = cs * (m[XV] + m[YU]), cs * (m[YV] - m[XU])
    out = np.empty((10, *xy2.shape))
    out[XX] = cc * m[XX] + ss * m[YY] + xy2
    out[XY] = (cc - ss) * m[XY] + cs * (m[YY] - m[XX])
    out[YY] = ss * m[XX] + cc * m[YY] - xy2
    out[XU] = cc * m[XU] + ss * m[YV] + even
    out[XV] = cc * m[XV] - ss * m[YU] + odd
    out[YU] = cc * m[YU] - ss * m[XV] + odd
    out[YV] = ss * m[XU] + cc * m[YV] - even
    out[UU] = cc * m[UU] + ss * m[VV] + uv2
    out[UV] = (cc - ss) * m[UV] + cs * (m[VV] - m[UU])
    out[VV] = ss * m[UU] + cc * m[VV] - uv2
    return out


def scale_second(m: Floats, factor: ArrayLike) -> Floats:
    """Moments after y became y times `factor`, and v was divided by it.

    Parameters
    ----------
    m : (10, ...) ndarray of float64
        Moments with e2 in the plane of incidence.
    factor : (...,) array_like of float
        cos_out/cos_in for refraction at a plane; -1 for reflection at one.

    Returns
    -------
    (10, ...) ndarray of float64
    """
    f = np.asarray(factor, dtype=np.float64)
    inverse, none = 1.0 / f, np.ones(f.shape)
    rows = [none, f, f * f, none, inverse, f, none, none, inverse, inverse * inverse]
    scaled: Floats = m * np.array(rows).reshape(10, *(1,) * (m.ndim - 1 - f.ndim), *f.shape)
    return scaled


def kick(m: Floats, c11: ArrayLike, c12: ArrayLike, c22: ArrayLike) -> Floats:
    """Moments after u -= c11 x + c12 y and v -= c12 x + c22 y.

    Parameters
    ----------
    m : (10, ...) ndarray of float64
        Moments.
    c11, c12, c22 : (...,) array_like of float
        Symmetric focusing power, 1/mm; 1/f for a thin lens in vacuum.

    Returns
    -------
    (10, ...) ndarray of float64
    """
    a, b, c = np.asarray(c11), np.asarray(c12), np.asarray(c22)
    xu = m[XU] - a * m[XX] - b * m[XY]
    out = np.empty((10, *np.broadcast_shapes(xu.shape, c.shape)))
    out[XX], out[XY], out[YY], out[XU] = m[XX], m[XY], m[YY], xu
    out[XV] = m[XV] - b * m[XX] - c * m[XY]
    out[YU] = m[YU] - a * m[XY] - b * m[YY]
    out[YV] = m[YV] - b * m[XY] - c * m[YY]
    out[UU] = m[UU] - a * (m[XU] + xu) - b * (m[YU] + out[YU])
    out[UV] = m[UV] - b * m[XU] - c * m[YU] - a * out[XV] - b * out[YV]
    out[VV] = m[VV] - b * (m[XV] + out[XV]) - c * (m[YV] + out[YV])
    return out
