"""Directions of chief rays: mirrors, faces, planes, and a beam's own two axes.

Plan frame: x right, y away, z up. Vectors are held with their three components in the
last axis; every other axis broadcasts. Inputs taken to be unit vectors are not
renormalised: drift is a caller's error, and hiding it here would hide it everywhere.
"""

from __future__ import annotations

from typing import TypeAlias

import numpy as np
from numpy.typing import ArrayLike, NDArray

Floats: TypeAlias = NDArray[np.float64]
Flags: TypeAlias = NDArray[np.bool_]

# Below this horizontal part a beam counts as vertical. A beam turned up by mirrors
# carries some 1e-16 of rounding, which must not choose its basis; a beam that is meant
# to lean does so by far more than a thousandth of a microradian.
_VERTICAL = 1e-9


def _vectors(name: str, value: ArrayLike) -> Floats:
    array = np.asarray(value, dtype=np.float64)
    if array.ndim == 0 or array.shape[-1] != 3:  # noqa: PLR2004 (three components)
        msg = f"{name} must have shape (..., 3), got {array.shape}"
        raise ValueError(msg)
    return array


def dot(first: Floats, second: Floats) -> Floats:
    """Scalar product over the last axis.

    Parameters
    ----------
    first, second : (..., 3) ndarray of float64
        Any vectors.

    Returns
    -------
    (...,) ndarray of float64
    """
    product: Floats = np.vecdot(first, second)
    return product


def cross(first: Floats, second: Floats) -> Floats:
    """Vector product over the last axis (several times quicker than `numpy.cross`).

    Parameters
    ----------
    first, second : (..., 3) ndarray of float64
        Any vectors.

    Returns
    -------
    (..., 3) ndarray of float64
    """
    a0, a1, a2 = first[..., 0], first[..., 1], first[..., 2]
    b0, b1, b2 = second[..., 0], second[..., 1], second[..., 2]
    x = a1 * b2 - a2 * b1
    product = np.empty((*x.shape, 3))
    product[..., 0] = x
    product[..., 1] = a2 * b0 - a0 * b2
    product[..., 2] = a0 * b1 - a1 * b0
    return product


def reflect(direction: ArrayLike, normal: ArrayLike) -> Floats:
    r"""Directions after plane mirrors: :math:`k' = k - 2 (k \cdot N) N`.

    Parameters
    ----------
    direction : (..., 3) array_like of float
        Unit vectors k.
    normal : (..., 3) array_like of float
        Unit normals N of the mirrors, on either side; broadcasts against `direction`.

    Returns
    -------
    (..., 3) ndarray of float64
        Unit vectors; NaN where an input is.

    Raises
    ------
    ValueError
        If the last axis of an input is not 3 long.

    Examples
    --------
    >>> reflect([1.0, 0.0, 0.0], [-0.6, 0.8, 0.0]).round(12).tolist()
    [0.28, 0.96, 0.0]
    """
    k = _vectors("direction", direction)
    n = _vectors("normal", normal)
    reflected: Floats = k - (2.0 * dot(k, n))[..., None] * n
    return reflected


def refract(
    direction: ArrayLike, normal: ArrayLike, n_in: ArrayLike, n_out: ArrayLike
) -> tuple[Floats, Flags]:
    r"""Directions after faces between two media, by Snell's law for vectors.

    .. math:: k_2 = m k + (\sqrt{1 - m^2 (1 - c^2)} - m c) N, \quad
              m = n_1/n_2, \quad c = k \cdot N

    Parameters
    ----------
    direction : (..., 3) array_like of float
        Unit vectors k of the incoming rays.
    normal : (..., 3) array_like of float
        Unit normals N on either side of the face.
    n_in, n_out : (...,) array_like of float
        Real, positive indices of the medium the ray is in and of the one beyond.

    Returns
    -------
    refracted : (..., 3) ndarray of float64
        Unit vectors; NaN on rows that are totally reflected or have a NaN input.
    total : (...,) ndarray of bool
        True where the face reflects totally.

    Raises
    ------
    ValueError
        If the last axis of `direction` or `normal` is not 3 long.

    Notes
    -----
    The cosine behind the face is taken from (1 - m)(1 + m) + m^2 c^2, which keeps its
    digits at grazing incidence and returns c itself between equal media.

    References
    ----------
    .. [1] Born, M. and Wolf, E. Principles of Optics, 7th ed. (1999), sec. 3.2.2.

    Examples
    --------
    >>> refracted, total = refract([0.6, 0.0, -0.8], [0.0, 0.0, 1.0], 1.0, 1.5)
    >>> refracted.round(6).tolist(), bool(total)
    ([0.4, 0.0, -0.916515], False)
    """
    k = _vectors("direction", direction)
    n = _vectors("normal", normal)
    m = np.asarray(n_in, dtype=np.float64) / np.asarray(n_out, dtype=np.float64)
    c = dot(k, n)
    squared = (1.0 - m) * (1.0 + m) + (m * c) ** 2
    total = squared < 0.0
    cos_out = np.sqrt(np.where(total, np.nan, squared))
    # The sign of c tells the side the ray comes from, so N needs no turning about.
    along = np.copysign(cos_out, c) - m * c
    refracted: Floats = m[..., None] * k + along[..., None] * n
    return refracted, total


def distance_to_plane(
    position: ArrayLike, direction: ArrayLike, point: ArrayLike, normal: ArrayLike
) -> Floats:
    """Signed way along rays to planes; infinite for a ray that runs parallel.

    Parameters
    ----------
    position : (..., 3) array_like of float
        Points on the rays, mm.
    direction : (..., 3) array_like of float
        Unit vectors.
    point : (..., 3) array_like of float
        A point of each plane, mm.
    normal : (..., 3) array_like of float
        Normals of the planes, either side, any length.

    Returns
    -------
    (...,) ndarray of float64
        Length in mm, negative behind the ray's point; +inf where the ray is parallel to
        the plane (also within it); NaN where an input is.

    Raises
    ------
    ValueError
        If the last axis of an input is not 3 long.

    Examples
    --------
    >>> k = [[1.0, 0.0, 0.0], [0.0, 1.0, 0.0]]
    >>> distance_to_plane([0.0, 0.0, 0.0], k, [5.0, 1.0, 0.0], [1.0, 0.0, 0.0]).tolist()
    [5.0, inf]
    """
    r = _vectors("position", position)
    k = _vectors("direction", direction)
    n = _vectors("normal", normal)
    height = dot(_vectors("point", point) - r, n)
    slope = dot(k, n)
    length = np.full(np.broadcast_shapes(height.shape, slope.shape), np.inf)
    np.divide(height, slope, out=length, where=slope != 0.0)
    return length


def direction_from_angles(heading_rad: ArrayLike, pitch_rad: ArrayLike) -> Floats:
    """Make unit vectors with a heading in plan and a pitch above the horizontal.

    Parameters
    ----------
    heading_rad : (...,) array_like of float
        Anticlockwise from +x seen from above, rad.
    pitch_rad : (...,) array_like of float
        Upwards from horizontal, rad, in [-pi/2, pi/2].

    Returns
    -------
    (..., 3) ndarray of float64

    Examples
    --------
    >>> direction_from_angles(0.0, 0.0).tolist()
    [1.0, 0.0, 0.0]
    """
    heading = np.asarray(heading_rad, dtype=np.float64)
    pitch = np.asarray(pitch_rad, dtype=np.float64)
    level = np.cos(pitch)
    x = level * np.cos(heading)
    direction = np.empty((*x.shape, 3))
    direction[..., 0] = x
    direction[..., 1] = level * np.sin(heading)
    direction[..., 2] = np.sin(pitch)
    return direction


def angles_from_direction(direction: ArrayLike) -> tuple[Floats, Floats]:
    """Heading and pitch of unit vectors; a vertical one is given heading 0.

    Parameters
    ----------
    direction : (..., 3) array_like of float
        Unit vectors.

    Returns
    -------
    heading_rad : (...,) ndarray of float64
        In (-pi, pi]; 0 where the horizontal part is below 1e-9.
    pitch_rad : (...,) ndarray of float64
        In [-pi/2, pi/2].

    Raises
    ------
    ValueError
        If the last axis is not 3 long.

    Examples
    --------
    >>> heading, pitch = angles_from_direction([0.0, -1.0, 0.0])
    >>> float(heading), float(pitch)
    (-1.5707963267948966, 0.0)
    """
    k = _vectors("direction", direction)
    level = np.hypot(k[..., 0], k[..., 1])
    # Adding zero turns -0.0 into 0.0: without it (-1, -0.0) would head for -pi.
    heading = np.arctan2(k[..., 1] + 0.0, k[..., 0])
    pitch = np.arctan2(k[..., 2] + 0.0, level)
    return np.where(level < _VERTICAL, 0.0, heading), pitch


def bench_basis(direction: ArrayLike) -> tuple[Floats, Floats]:
    r"""Two transverse axes of beams: e1 level and to the left, e2 up.

    .. math:: e_1 = z \times k / |z \times k|, \quad e_2 = k \times e_1

    so that e1 x e2 = k.

    Parameters
    ----------
    direction : (..., 3) array_like of float
        Unit vectors k.

    Returns
    -------
    e1, e2 : (..., 3) ndarray of float64
        Unit vectors.

    Raises
    ------
    ValueError
        If the last axis is not 3 long.

    Notes
    -----
    No choice is continuous at both poles. A vertical beam (horizontal part below 1e-9)
    is taken for one that was turned up or down out of heading 0, as in
    `angles_from_direction`: its e1 is +y, made perpendicular to k. This joins on to the
    beams of heading 0 at any pitch, and rounding of the direction cannot change it.

    Examples
    --------
    >>> e1, e2 = bench_basis([[1.0, 0.0, 0.0], [0.0, 0.0, 1.0]])
    >>> bool((e1 == [0.0, 1.0, 0.0]).all()), e2[1].tolist()
    (True, [-1.0, 0.0, 0.0])
    """
    k = _vectors("direction", direction)
    level = np.hypot(k[..., 0], k[..., 1])
    vertical = level < _VERTICAL
    e1 = np.zeros(k.shape)
    np.divide(-k[..., 1], level, out=e1[..., 0], where=~vertical)
    np.divide(k[..., 0], level, out=e1[..., 1], where=~vertical)
    if vertical.any():
        up = k[vertical]
        left = np.array([0.0, 1.0, 0.0]) - up[..., 1:2] * up
        e1[vertical] = left / np.sqrt(dot(left, left))[..., None]
    return e1, cross(k, e1)
