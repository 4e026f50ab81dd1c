"""Closed forms of a Gaussian beam at a round opening."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike, NDArray

from benchlay.optics.shares import Shapes, partition

_ROUND_ENOUGH = 2.0  # ratio of radii up to which the sum over directions is used
_DIRECTIONS = 32  # in a quarter turn: (1/3)^(2 * 32), the first term left out, is below 1e-30


def circle_share(
    w1_mm: ArrayLike,
    w2_mm: ArrayLike,
    radius_mm: ArrayLike,
    offset1_mm: ArrayLike = 0.0,
    offset2_mm: ArrayLike = 0.0,
) -> NDArray[np.float64]:
    r"""Part of an elliptical Gaussian beam that passes a round opening.

    .. math:: P = \frac{2}{\pi w_1 w_2} \int_{(x-o_1)^2 + (y-o_2)^2 < a^2}
              e^{-2 x^2/w_1^2 - 2 y^2/w_2^2} \, dx \, dy

    which is 1 - exp(-2 a^2 / w^2) for a round beam in the middle.

    Parameters
    ----------
    w1_mm, w2_mm : (...) array_like of float
        1/e^2 radii along the principal axes of the beam, in mm, above 0.
    radius_mm : (...) array_like of float
        Radius a of the opening, in mm, 0 or more; may be infinite.
    offset1_mm, offset2_mm : (...) array_like of float, optional
        Centre of the opening from the axis of the beam, along the same axes, in mm.

    Returns
    -------
    (...) ndarray of float64
        Part of the power, 0 to 1. NaN where an input is NaN, a radius of the beam is not
        above 0, or the opening's radius is below 0.

    Notes
    -----
    All arguments broadcast. Relative error below 1e-9 for results above 1e-9; an opening
    wholly beyond 4.6 w gives 0 (true value below 1e-18). Off the middle an opening smaller
    than about 1e-8 w gives 0.

    References
    ----------
    .. [1] ISO 11146-1:2021, clause 3 (the 1/e^2 radius as twice the standard deviation).

    Examples
    --------
    >>> circle_share(1.0, 1.0, [1.0, 0.5]).round(6).tolist()
    [0.864665, 0.393469]
    >>> circle_share(2.0, 1.0, 3.0, 1.0, 0.5).round(6).item()
    0.971261
    """
    given = (w1_mm, w2_mm, radius_mm, offset1_mm, offset2_mm)
    w1, w2, a, o1, o2 = np.broadcast_arrays(*(np.asarray(x, dtype=np.float64) for x in given))
    valid = (w1 > 0.0) & (w2 > 0.0) & (a >= 0.0) & np.isfinite(o1) & np.isfinite(o2)
    result = np.full(valid.shape, np.nan)
    whole = valid & np.isinf(a)
    result[whole] = 1.0
    middle = valid & ~whole & (o1 == 0.0) & (o2 == 0.0)
    middle &= np.maximum(w1, w2) <= _ROUND_ENOUGH * np.minimum(w1, w2)
    if middle.any():
        result[middle] = _centred(w1[middle], w2[middle], a[middle])
    rest = valid & ~middle & ~whole
    if rest.any():
        result[rest] = _general(w1[rest], w2[rest], a[rest], o1[rest], o2[rest])
    return result


def _centred(
    w1: NDArray[np.float64], w2: NDArray[np.float64], a: NDArray[np.float64]
) -> NDArray[np.float64]:
    r"""Integrate over the directions from the axis, along each of which it is closed.

    .. math:: P = \frac{2}{\pi w_1 w_2} \int_0^{\pi/2} \frac{1 - e^{-2 a^2 s}}{s} \, d\phi,
              \quad s = \frac{\cos^2\phi}{w_1^2} + \frac{\sin^2\phi}{w_2^2}

    The integrand is periodic and analytic, so that the sum over equal steps converges as a
    power of (q - 1)/(q + 1), q the ratio of the radii.
    """
    turn = np.pi * (np.arange(_DIRECTIONS) + 0.5) / (2.0 * _DIRECTIONS)
    cos2, sin2 = np.cos(turn) ** 2, np.sin(turn) ** 2
    s = cos2 / w1[:, None] ** 2 + sin2 / w2[:, None] ** 2
    along = -np.expm1(-2.0 * (a * a)[:, None] * s) / s
    share: NDArray[np.float64] = along.mean(axis=1) / (w1 * w2)
    return share


def _general(
    w1: NDArray[np.float64],
    w2: NDArray[np.float64],
    a: NDArray[np.float64],
    o1: NDArray[np.float64],
    o2: NDArray[np.float64],
) -> NDArray[np.float64]:
    """In scaled coordinates the opening is an ellipse: one body in each cross-section."""
    n = len(a)
    axes = np.zeros((n, 2, 2))
    axes[:, 0, 0], axes[:, 1, 1] = a / w1, a / w2
    shapes = Shapes(
        problem=np.arange(n),
        corners=np.zeros(n, dtype=np.intp),
        vertices=np.zeros((n, 3, 2)),
        centre=np.stack((o1 / w1, o2 / w2), axis=1),
        axes=axes,
        depth=np.zeros((n, 3)),
        order=np.zeros(n, dtype=np.intp),
        hole_of=np.full(n, -1),
    )
    return partition(shapes, n).share
