"""What second moments say about a beam: radii, quality, waists; see `moments`."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from benchlay.optics._moments_maps import (
    MM_PER_NM,
    UU,
    UV,
    VV,
    XU,
    XX,
    XY,
    YV,
    YY,
    Floats,
    rotate,
)

# Axes whose variances differ by less than this share of their mean are called equal:
# rounding after a dozen faces stays below it, and a radius is then wrong by 5e-10.
_ROUND = 1e-9


class _Axes:
    """Principal axes of a symmetric 2x2 matrix, the first within 45 degrees of e1."""

    __slots__ = ("angle", "first", "second")

    def __init__(self, a: Floats, b: Floats, c: Floats) -> None:
        mean, half = 0.5 * (a + c), 0.5 * (a - c)
        spread = np.hypot(half, b)
        major = mean + spread
        # The product keeps the digits of a minor axis far smaller than the major one.
        minor = np.divide(a * c - b * b, major, out=np.zeros_like(major), where=major != 0)
        along = (half > 0.0) | ((half == 0.0) & (b >= 0.0))  # the first axis is the major
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
        Radii along the principal axis within 45 degrees of e1, and across it; either
        may be the larger.
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
    .. [1] Serafini, A., Illuminati, F. and De Siena, S. J. Phys. B 37, L21 (2004)
       (symplectic eigenvalues of two modes; cited from memory).
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
    root = np.sqrt(np.maximum(differ * differ + 4.0 * gamma * total + 4.0 * coupling, 0.0))
    middle = total + 2.0 * gamma
    signed = np.where(differ < 0.0, -root, root)
    squares = 0.5 * np.stack([middle + signed, middle - signed])
    wavelength_mm = np.asarray(wavelength_nm, dtype=np.float64) * MM_PER_NM
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
    way = np.divide(-product, spread, out=np.zeros_like(product), where=spread != 0.0)
    ways: Floats = way * np.asarray(index, dtype=np.float64) + 0.0
    return ways
