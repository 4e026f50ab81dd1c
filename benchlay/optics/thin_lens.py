"""The ideal thin lens: what its two faces, which stand in one place, do to chief rays."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike, NDArray


def bend(
    slope: ArrayLike,
    offset_mm: ArrayLike,
    power_per_mm: ArrayLike,
    n_in: ArrayLike,
    n_out: ArrayLike,
) -> NDArray[np.float64]:
    r"""Slopes after one face of a thin lens: :math:`n' m' = n m - \phi x`.

    Parameters
    ----------
    slope : (..., 2) array_like of float
        Tangents of the ray's angle to the axis along two directions of the lens plane.
    offset_mm : (..., 2) array_like of float
        Where the ray meets the lens, from its centre, along the same directions.
    power_per_mm : (...,) array_like of float
        Power of the face, positive where it gathers; half of n/f for each of the two.
    n_in, n_out : (...,) array_like of float
        Indices before and behind the face.

    Returns
    -------
    (..., 2) ndarray of float64
        Slopes behind the face. Through both faces ``m' = m - x/f`` holds exactly.

    References
    ----------
    .. [1] Born, M., Wolf, E. Principles of Optics, ch. 4.4 (Gaussian optics): refraction at
       one surface in the reduced variables of paraxial optics.
    """
    before = np.asarray(n_in, dtype=np.float64)[..., None]
    behind = np.asarray(n_out, dtype=np.float64)[..., None]
    power = np.asarray(power_per_mm, dtype=np.float64)[..., None]
    bent: NDArray[np.float64] = (
        before * np.asarray(slope, dtype=np.float64)
        - power * np.asarray(offset_mm, dtype=np.float64)
    ) / behind
    return bent


def throw_back(
    slope: ArrayLike, offset_mm: ArrayLike, curvature_per_mm: ArrayLike
) -> NDArray[np.float64]:
    r"""Slopes after reflection at one face: :math:`m' = m + 2 C x`.

    Parameters
    ----------
    slope, offset_mm : (..., 2) array_like of float
        As in `bend`; slopes are counted along the direction of travel on both sides.
    curvature_per_mm : (...,) array_like of float
        Positive where the face bulges towards the light that arrives.

    Returns
    -------
    (..., 2) ndarray of float64
    """
    curvature = np.asarray(curvature_per_mm, dtype=np.float64)[..., None]
    thrown: NDArray[np.float64] = np.asarray(
        slope, dtype=np.float64
    ) + 2.0 * curvature * np.asarray(offset_mm, dtype=np.float64)
    return thrown
