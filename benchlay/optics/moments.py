r"""Second moments of beams: width, divergence and what couples them, in two axes.

An array of shape (10, ...) has the beams in its last axes and the rows

    xx  xy  yy  xu  xv  yu  yv  uu  uv  vv

with x, y the position along e1 and e2 in mm, and u, v the angles to the chief ray along
them, times the index of the medium, in rad. Being n times the angle, u and v do not
change at a flat face met squarely. The 1/e^2 radius is twice the root of a variance of
position (ISO 11146-1:2021 for the moments, 11146-2 for general astigmatism).

Every optic acts on x, y, u, v by a linear map, so on these rows by a quadratic one, and
nothing is singular at a focus. At a face with cosines c1 and c2, in the axes s, p of the
plane of incidence, the map is: `scale_second` by 1/c1 (onto the face), `kick` by
(n2 c2 - n1 c1) C with C the surface's curvature matrix on its forward normal, then
`scale_second` by c2 (off the face). For a mirror c2 = -c1 and n2 = n1. A thin lens is a
`kick` by 1/f times the index around it. For M^2 = 1 all this is the propagation of the
complex curvature tensor (Arnaud, J. A. and Kogelnik, H., Appl. Opt. 8, 1687 (1969)).

Functions return new arrays and leave their arguments alone.
"""

from __future__ import annotations

from typing import TypeAlias

import numpy as np
from numpy.typing import ArrayLike, NDArray

Floats: TypeAlias = NDArray[np.float64]

XX, XY, YY, XU, XV, YU, YV, UU, UV, VV = range(10)

_MM_PER_NM = 1e-6

# Axes whose variances differ by less than this share of their mean are called equal:
# rounding after a dozen faces stays below it, and a radius is then wrong by 5e-10.
_ROUND = 1e-9


def _waist_at(radius_mm: Floats, divergence: Floats, way: Floats) -> tuple[Floats, ...]:
    """Moments xx, xu, uu of one axis, `way` = length/index in front of its waist."""
    uu = 0.25 * divergence * divergence
    return 0.25 * radius_mm * radius_mm + way * way * uu, -way * uu, uu


def from_waists(  # noqa: PLR0913, PLR0917 (two axes, three figures each)
    wavelength_nm: ArrayLike,
    index: ArrayLike,
    waist1_mm: ArrayLike,
    waist2_mm: ArrayLike,
    ahead1_mm: ArrayLike,
    ahead2_mm: ArrayLike,
    m2_1: ArrayLike,
    m2_2: ArrayLike,
) -> Floats:
    r"""Moments of beams with principal axes e1 and e2, from their waists.

    .. math:: \langle xx \rangle = w_0^2 / 4 \text{ at the waist}, \quad
              \langle uu \rangle = \left(\frac{M^2 \lambda}{2 \pi w_0}\right)^2

    Parameters
    ----------
    wavelength_nm : (...,) array_like of float
        In vacuum.
    index : (...,) array_like of float
        Absolute index of the medium the beam is in.
    waist1_mm, waist2_mm : (...,) array_like of float
        1/e^2 radii at the waists, along e1 and e2; positive.
    ahead1_mm, ahead2_mm : (...,) array_like of float
        How far in front of the present point the waists lie, in that medium; negative
        if they are passed.
    m2_1, m2_2 : (...,) array_like of float
        Beam quality factors M^2, at least 1 for a real beam (not tested here).

    Returns
    -------
    (10, ...) ndarray of float64
    """
    wavelength_mm = np.asarray(wavelength_nm, dtype=np.float64) * _MM_PER_NM
    n = np.asarray(index, dtype=np.float64)
    w1, w2 = (
        np.asarray(waist1_mm, dtype=np.float64),
        np.asarray(waist2_mm, dtype=np.float64),
    )
    first = _waist_at(
        w1, np.asarray(m2_1) * wavelength_mm / (np.pi * w1), np.asarray(ahead1_mm) / n
    )
    second = _waist_at(
        w2, np.asarray(m2_2) * wavelength_mm / (np.pi * w2), np.asarray(ahead2_mm) / n
    )
    return _uncoupled(first, second)


def from_diameter_divergence(
    index: ArrayLike,
    diameter1_mm: ArrayLike,
    diameter2_mm: ArrayLike,
    divergence1_rad: ArrayLike,
    divergence2_rad: ArrayLike,
) -> Floats:
    r"""Moments of beams with their waists here, from diameters and divergences.

    Parameters
    ----------
    index : (...,) array_like of float
        Absolute index of the medium in which the divergence was measured.
    diameter1_mm, diameter2_mm : (...,) array_like of float
        1/e^2 diameters 2w along e1 and e2.
    divergence1_rad, divergence2_rad : (...,) array_like of float
        Full angles at 1/e^2 in that medium.

    Returns
    -------
    (10, ...) ndarray of float64

    Notes
    -----
    The two figures fix :math:`M^2 = \pi n D \Theta / (4 \lambda)`, which `m2` returns; a
    value below 1 means that no beam can have both.
    """
    n = np.asarray(index, dtype=np.float64)
    here = np.zeros(())
    first = _waist_at(
        0.5 * np.asarray(diameter1_mm), 0.5 * n * np.asarray(divergence1_rad), here
    )
    second = _waist_at(
        0.5 * np.asarray(diameter2_mm), 0.5 * n * np.asarray(divergence2_rad), here
    )
    return _uncoupled(first, second)


def _uncoupled(first: tuple[Floats, ...], second: tuple[Floats, ...]) -> Floats:
    xx, xu, uu, yy, yv, vv = np.broadcast_arrays(*first, *second)
    zero = np.zeros(xx.shape)
    return np.array([xx, zero, yy, xu, zero, zero, yv, uu, zero, vv], dtype=np.float64)


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
    """The same beams in a basis turned from e1 towards e2.

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
    inverse = 1.0 / f
    out = np.empty((10, *np.broadcast_shapes(f.shape, m.shape[1:])))
    out[XX], out[XU], out[YV], out[UU] = m[XX], m[XU], m[YV], m[UU]
    out[XY] = m[XY] * f
    out[YY] = m[YY] * (f * f)
    out[XV] = m[XV] * inverse
    out[YU] = m[YU] * f
    out[UV] = m[UV] * inverse
    out[VV] = m[VV] * (inverse * inverse)
    return out


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


class _Axes:
    """Principal axes of a symmetric 2x2 matrix, the first within 45 degrees of e1."""

    __slots__ = ("angle", "first", "second")

    def __init__(self, a: Floats, b: Floats, c: Floats) -> None:
        mean, half = 0.5 * (a + c), 0.5 * (a - c)
        spread = np.hypot(half, b)
        major = mean + spread
        # The product keeps the digits of a minor axis far smaller than the major one.
        minor = np.divide(
            a * c - b * b, major, out=np.zeros_like(major), where=major > 0
        )
        along = (half > 0.0) | (
            (half == 0.0) & (b >= 0.0)
        )  # the first axis is the major
        round_ = spread <= _ROUND * mean
        folded = np.where(along, b, -b) + 0.0
        self.angle = np.where(round_, 0.0, 0.5 * np.arctan2(folded, np.abs(half))) + 0.0
        self.first = np.where(round_, a, np.where(along, major, minor))
        self.second = np.where(round_, c, np.where(along, minor, major))


def _root_of_variance(variance: Floats) -> Floats:
    # A variance at a sharp focus may come out a rounding below zero.
    return np.sqrt(np.maximum(variance, 0.0))


def radii(m: Floats) -> tuple[Floats, Floats, Floats]:
    """Principal 1/e^2 radii of beams, and how their axes lie.

    Parameters
    ----------
    m : (10, ...) ndarray of float64
        Moments.

    Returns
    -------
    w1_mm, w2_mm : (...,) ndarray of float64
        Radii along the principal axis within 45 degrees of e1, and across it; either may
        be the larger.
    angle_rad : (...,) ndarray of float64
        Of the axis of w1 from e1 towards e2, in (-pi/4, pi/4]; 0 for a round beam.
    """
    axes = _Axes(m[XX], m[XY], m[YY])
    return (
        2.0 * _root_of_variance(axes.first),
        2.0 * _root_of_variance(axes.second),
        axes.angle,
    )


def m2(m: Floats, wavelength_nm: ArrayLike) -> Floats:
    r"""Beam quality factors M^2 of beams, one for each principal axis.

    Parameters
    ----------
    m : (10, ...) ndarray of float64
        Moments.
    wavelength_nm : (...,) array_like of float
        In vacuum.

    Returns
    -------
    (2, ...) ndarray of float64
        First for the axis within 45 degrees of e1 as in `radii` (of the divergence,
        where the beam is round), then for the other.

    Notes
    -----
    The factors are 4 pi/lambda times the symplectic eigenvalues of the 4x4 matrix of
    moments, which no lens, mirror, face or distance changes:

    .. math:: \varepsilon^2 = \tfrac12 (\Delta \pm \sqrt{(\det\alpha - \det\beta)^2
              + 4 \det\gamma (\det\alpha + \det\beta) + 4 T}), \quad
              \Delta = \det\alpha + \det\beta + 2\det\gamma

    with alpha, beta the blocks (x, u) and (y, v), gamma the one between them and T the
    trace of alpha J gamma J beta J gamma^T J. Written so, a beam of simple astigmatism
    (gamma = 0) keeps its digits. The larger eigenvalue goes to the axis with the larger
    determinant. Where general astigmatism couples two equal factors, the root limits
    them to some 1e-8.

    References
    ----------
    .. [1] Serafini, A., Illuminati, F. and De Siena, S. J. Phys. B 37, L21 (2004), eq. 7
       (two-mode symplectic eigenvalues; cited from memory).
    .. [2] ISO/TR 11146-3:2004 (intrinsic beam properties).
    """
    position = _Axes(m[XX], m[XY], m[YY])
    is_round = np.abs(position.first - position.second) <= _ROUND * position.first
    angle = position.angle
    if np.any(is_round):
        angle = np.where(is_round, _Axes(m[UU], m[UV], m[VV]).angle, angle)
    t = rotate(m, np.cos(angle), np.sin(angle))
    xx, xy, yy, xu, xv, yu, yv, uu, uv, vv = t
    alpha, beta, gamma = xx * uu - xu * xu, yy * vv - yv * yv, xy * uv - xv * yu
    total, differ = alpha + beta, alpha - beta
    # J gamma J beta J gamma^T J = G with G11, G12, G22 for beta carried into x, u.
    g11 = uv * uv * yy - 2.0 * yu * uv * yv + yu * yu * vv
    g12 = -(xv * uv * yy - (xy * uv + xv * yu) * yv + xy * yu * vv)
    g22 = xv * xv * yy - 2.0 * xy * xv * yv + xy * xy * vv
    coupling = xx * g11 + 2.0 * xu * g12 + uu * g22
    root = np.sqrt(
        np.maximum(differ * differ + 4.0 * gamma * total + 4.0 * coupling, 0.0)
    )
    middle = total + 2.0 * gamma
    signed = np.where(differ < 0.0, -root, root)
    squares = 0.5 * np.stack([middle + signed, middle - signed])
    wavelength_mm = np.asarray(wavelength_nm, dtype=np.float64) * _MM_PER_NM
    factors: Floats = (4.0 * np.pi / wavelength_mm) * _root_of_variance(squares)
    return factors


def root(m: Floats) -> Floats:
    r"""Symmetric root W of four times the matrix of positions.

    .. math:: W = 2\,\frac{A + \sqrt{\det A}\,I}{\sqrt{\mathrm{tr} A + 2\sqrt{\det A}}}

    Parameters
    ----------
    m : (10, ...) ndarray of float64
        Moments.

    Returns
    -------
    (3, ...) ndarray of float64
        W11, W12, W22 in mm; the irradiance goes as exp(-2 |W^-1 x|^2).

    Notes
    -----
    The closed form for 2x2 matrices follows from Cayley and Hamilton's theorem.
    """
    s = _root_of_variance(m[XX] * m[YY] - m[XY] * m[XY])
    scale = 2.0 / np.sqrt(m[XX] + m[YY] + 2.0 * s)
    return np.stack([scale * (m[XX] + s), scale * m[XY], scale * (m[YY] + s)])


def inverse_root(m: Floats) -> Floats:
    """Inverse of the root W of `root`: rows 11, 12, 22, in 1/mm.

    Parameters
    ----------
    m : (10, ...) ndarray of float64
        Moments with a positive width in both axes.

    Returns
    -------
    (3, ...) ndarray of float64
    """
    s = _root_of_variance(m[XX] * m[YY] - m[XY] * m[XY])
    scale = 0.5 / (s * np.sqrt(m[XX] + m[YY] + 2.0 * s))
    return np.stack([scale * (m[YY] + s), -scale * m[XY], scale * (m[XX] + s)])


def waist_distance(m: Floats, index: ArrayLike) -> Floats:
    """Ways to the waists along the principal axes of `radii`.

    Parameters
    ----------
    m : (10, ...) ndarray of float64
        Moments.
    index : (...,) array_like of float
        Absolute index of the medium the beam is in.

    Returns
    -------
    (2, ...) ndarray of float64
        mm, positive ahead; 0 for an axis that does not diverge at all.

    Notes
    -----
    Exact where the principal axes do not turn with distance. With general astigmatism
    each value is where the variance along the present axis is least.
    """
    _, _, angle = radii(m)
    t = rotate(m, np.cos(angle), np.sin(angle))
    product, spread = t[[XU, YV]], t[[UU, VV]]
    way = np.divide(-product, spread, out=np.zeros_like(product), where=spread > 0.0)
    ways: Floats = way * np.asarray(index, dtype=np.float64) + 0.0
    return ways
