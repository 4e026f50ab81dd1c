r"""Polarization and power of beams as the coherency matrix, J_ij = <E_i E_j*>, in W.

An array of shape (4, ...) holds it: rows J11, J22, Re J12, Im J12, the beams in the
other axes. The field's components are along e1 and e2 of the beam, a right-handed pair
with k; angles run from e1 towards e2. J11 + J22 is the power, so unpolarized and partly
polarized light need no case of their own. With time as exp(-i w t), Im J12 > 0 is right
circular: clockwise to a viewer whom the beam approaches (Born and Wolf, Principles of
Optics, 7th ed., sec. 1.4.2 and 10.9).

All functions return new arrays and leave their arguments alone.
"""

from __future__ import annotations

from typing import TypeAlias

import numpy as np
from numpy.typing import ArrayLike, NDArray

from benchlay.named import NamedTuple

Floats: TypeAlias = NDArray[np.float64]

# Parts of the Stokes vector below this share of the power are rounding; they may not
# choose an angle, or two machines would print different ones.
_ROUNDING = 1e-12


class Polarization(NamedTuple):
    """What a polarization is called on a sheet; each field has one value a beam."""

    degree: Floats  # 0 to 1, polarized share of the power
    angle_rad: Floats  # of the ellipse's long axis from e1 towards e2, in [0, pi)
    ellipticity_rad: Floats  # atan(short/long axis), in [-pi/4, pi/4], right positive


def _rows(j11: ArrayLike, j22: ArrayLike, re: ArrayLike, im: ArrayLike) -> Floats:
    parts = np.broadcast_arrays(j11, j22, re, im)
    return np.array(parts, dtype=np.float64)


def power(j: Floats) -> Floats:
    """Power of beams, W, shape (...,), from their coherency (4, ...)."""
    total: Floats = j[0] + j[1]
    return total


def from_stokes(s0: ArrayLike, s1: ArrayLike, s2: ArrayLike, s3: ArrayLike) -> Floats:
    """Coherency from the Stokes parameters, each (...,) in W.

    Examples
    --------
    >>> from_stokes(2.0, 0.0, 0.0, 2.0).tolist()
    [1.0, 1.0, 0.0, 1.0]
    """
    a, b = np.asarray(s0, dtype=np.float64), np.asarray(s1, dtype=np.float64)
    return 0.5 * _rows(a + b, a - b, s2, s3)


def stokes(j: Floats) -> Floats:
    """Stokes parameters S0 to S3 in W, shape (4, ...), of coherency (4, ...)."""
    s = np.empty_like(j)
    s[0] = j[0] + j[1]
    s[1] = j[0] - j[1]
    s[2:] = 2.0 * j[2:]
    return s


def linear(angle_rad: ArrayLike, power: ArrayLike) -> Floats:
    """Linearly polarized light.

    Parameters
    ----------
    angle_rad : (...,) array_like of float
        Of the field, from e1 towards e2, rad.
    power : (...,) array_like of float
        W.

    Returns
    -------
    (4, ...) ndarray of float64

    Examples
    --------
    >>> linear(0.0, 2.0).tolist()
    [2.0, 0.0, 0.0, 0.0]
    """
    c, s = np.cos(angle_rad), np.sin(angle_rad)
    watts = np.asarray(power, dtype=np.float64)
    return _rows(watts * c * c, watts * s * s, watts * c * s, 0.0)


def circular(right: bool, power: ArrayLike) -> Floats:
    """Circularly polarized light of `power` W, shape (...,) giving (4, ...).

    `right` turns clockwise to a viewer whom the beam approaches.
    """
    half = 0.5 * np.asarray(power, dtype=np.float64)
    return _rows(half, half, 0.0, half if right else -half)


def unpolarized(power: ArrayLike) -> Floats:
    """Unpolarized light of `power` W, shape (...,) giving (4, ...)."""
    half = 0.5 * np.asarray(power, dtype=np.float64)
    return _rows(half, half, 0.0, 0.0)


def rotate(j: Floats, cos: ArrayLike, sin: ArrayLike) -> Floats:
    """Express the same light in a basis turned from e1 towards e2.

    Parameters
    ----------
    j : (4, ...) ndarray of float64
        Coherency, W.
    cos, sin : (...,) array_like of float
        Of the angle the basis turns by. A field at that angle lies along the new e1.

    Returns
    -------
    (4, ...) ndarray of float64
    """
    c, s = np.asarray(cos), np.asarray(sin)
    cc, ss, cs = c * c, s * s, c * s
    mixed = 2.0 * cs * j[2]
    turned = np.empty((4, *np.broadcast_shapes(mixed.shape)))
    turned[0] = cc * j[0] + ss * j[1] + mixed
    turned[1] = ss * j[0] + cc * j[1] - mixed
    turned[2] = (cc - ss) * j[2] + cs * (j[1] - j[0])
    turned[3] = (cc + ss) * j[3]
    return turned


def diagonal(j: Floats, a: ArrayLike, b: ArrayLike) -> Floats:
    """Coherency after E1 was multiplied by `a` and E2 by `b`.

    Parameters
    ----------
    j : (4, ...) ndarray of float64
        Coherency, W.
    a, b : (...,) array_like of complex or float
        Field factors along e1 and e2.

    Returns
    -------
    (4, ...) ndarray of float64
    """
    along, across = np.asarray(a), np.asarray(b)
    if "c" not in (along.dtype.kind, across.dtype.kind):
        mixed = along * across
        scaled: Floats = j * np.array((along * along, across * across, mixed, mixed))
        return scaled
    first, second = along.astype(np.complex128), across.astype(np.complex128)
    j12 = (first * second.conj()) * (j[2] + 1j * j[3])
    out = np.empty((4, *j12.shape))
    out[0] = _squared(first) * j[0]
    out[1] = _squared(second) * j[1]
    out[2] = j12.real
    out[3] = j12.imag
    return out


def _squared(value: NDArray[np.complex128]) -> Floats:
    squared: Floats = value.real * value.real + value.imag * value.imag
    return squared


def retarder(j: Floats, axis_rad: ArrayLike, phase_rad: ArrayLike) -> Floats:
    """Coherency after a plate that delays one linear component.

    Parameters
    ----------
    j : (4, ...) ndarray of float64
        Coherency, W.
    axis_rad : (...,) array_like of float
        Of the fast axis, from e1 towards e2, rad.
    phase_rad : (...,) array_like of float
        By which the slow component lags, rad; pi/2 is a quarter wave.

    Returns
    -------
    (4, ...) ndarray of float64

    Notes
    -----
    With exp(-i w t) a lag is a factor exp(+i phase). So a quarter wave with its fast
    axis at +45 degrees makes right circular light of a field along e1.
    """
    c, s = np.cos(axis_rad), np.sin(axis_rad)
    along = rotate(j, c, s)
    delayed = diagonal(along, 1.0, np.exp(1j * np.asarray(phase_rad, dtype=np.float64)))
    return rotate(delayed, c, -s)


def polarizer(
    j: Floats, axis_rad: ArrayLike, pass_power: ArrayLike, refused_power: ArrayLike
) -> Floats:
    """Coherency after a linear polarizer.

    Parameters
    ----------
    j : (4, ...) ndarray of float64
        Coherency, W.
    axis_rad : (...,) array_like of float
        Of the passed field, from e1 towards e2, rad.
    pass_power, refused_power : (...,) array_like of float
        Transmittances of power along and across the axis, 0 to 1.

    Returns
    -------
    (4, ...) ndarray of float64

    Notes
    -----
    Fields go by the roots of the transmittances, both in phase.
    """
    c, s = np.cos(axis_rad), np.sin(axis_rad)
    passed = np.asarray(pass_power, dtype=np.float64)
    refused = np.asarray(refused_power, dtype=np.float64)
    out = rotate(j, c, s)
    out[0] *= passed
    out[1] *= refused
    out[2:] *= np.sqrt(passed * refused)
    return rotate(out, c, -s)


def rotator(j: Floats, angle_rad: ArrayLike) -> Floats:
    """Coherency after the field was turned by an angle from e1 towards e2.

    Parameters
    ----------
    j : (4, ...) ndarray of float64
        Coherency, W.
    angle_rad : (...,) array_like of float
        rad.

    Returns
    -------
    (4, ...) ndarray of float64
    """
    return rotate(j, np.cos(angle_rad), -np.sin(angle_rad))


def describe(j: Floats) -> Polarization:
    """Degree of polarization, azimuth and ellipticity of beams.

    Parameters
    ----------
    j : (4, ...) ndarray of float64
        Coherency, W.

    Returns
    -------
    Polarization
        Arrays of shape (...,). Circular and unpolarized light have angle 0, unpolarized
        light ellipticity 0, and a beam without power degree 0. There is no -0.0.

    References
    ----------
    .. [1] Born, M. and Wolf, E. Principles of Optics, 7th ed. (1999), sec. 1.4.2,
       eqs. (45) and 10.9.3 eq. (66).

    Examples
    --------
    >>> describe(linear(np.radians(30.0), 2.0)).angle_rad.round(6).item()
    0.523599
    """
    s0, s1, s2, s3 = stokes(j)
    flat = np.hypot(s1, s2)
    full = np.hypot(flat, s3)
    least = _ROUNDING * s0
    degree = np.divide(full, s0, out=np.zeros_like(full), where=s0 != 0.0)
    angle = np.mod(0.5 * np.arctan2(s2, s1), np.pi)
    # An azimuth a rounding below 0 would be written as 180 degrees.
    plain = (flat <= least) | (np.pi - angle < _ROUNDING)
    ellipticity = np.where(full <= least, 0.0, 0.5 * np.arctan2(s3, flat))
    return Polarization(
        np.minimum(degree, 1.0), np.where(plain, 0.0, angle) + 0.0, ellipticity + 0.0
    )
