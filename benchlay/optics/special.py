"""Closed forms of a Gaussian beam at a round opening."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike, NDArray

from benchlay.optics.shares import Shapes, partition


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
    middle = valid & (w1 == w2) & (o1 == 0.0) & (o2 == 0.0)
    result[middle] = -np.expm1(-2.0 * (a[middle] / w1[middle]) ** 2)
    whole = valid & np.isinf(a)
    result[whole] = 1.0
    rest = valid & ~middle & ~whole
    if rest.any():
        result[rest] = _general(w1[rest], w2[rest], a[rest], o1[rest], o2[rest])
    return result


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
