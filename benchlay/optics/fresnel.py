r"""Fresnel's coefficients at a bare face between two media.

Time goes as exp(-i w t), so absorbers have n + ik with k > 0. The transverse axes are
s = unit(k x N) and p = k x s, formed anew for each outgoing beam with its own k. With
them

.. math::

    r_s = \frac{n_1 c_1 - n_2 c_2}{n_1 c_1 + n_2 c_2}, \quad
    r_p = \frac{n_2 c_1 - n_1 c_2}{n_2 c_1 + n_1 c_2}, \quad
    t_s = \frac{2 n_1 c_1}{n_1 c_1 + n_2 c_2}, \quad
    t_p = \frac{2 n_1 c_1}{n_2 c_1 + n_1 c_2},

so that r_p = -r_s at normal incidence (Born and Wolf, Principles of Optics, 7th ed.,
sec. 1.5.2; for metals sec. 14.2).

They are evaluated with s1 the sine, q = n2 c2 and D = (n2 - n1)(n2 + n1) as
r_s = -D / (n1 c1 + q)^2 and r_p = D (n2^2 c1^2 - n1^2 s1^2) / (n2^2 c1 + n1 q)^2,
the same quotients after multiplying out. These do not subtract nearly equal numbers
between similar media, and vanish exactly between equal ones.
"""

from __future__ import annotations

from typing import TypeAlias

import numpy as np
from numpy.typing import ArrayLike, NDArray

from benchlay.named import NamedTuple

Floats: TypeAlias = NDArray[np.float64]
Complexes: TypeAlias = NDArray[np.complex128]

# Stands for a cosine of 0, where the quotients are 0/0 between equal media. Its square
# is still a normal number, and the limits come out: r = -1, or t = 1 if n1 = n2.
_GRAZING = 1e-150


class Amplitudes(NamedTuple):
    """Field coefficients of a face.

    Each of the fields has the inputs' common shape. A transmitted power is
    `transmitted_flux` times the squared modulus of ts or tp, as long as the second
    medium does not absorb (it is Re(n2 c2) / (n1 c1), and 0 at total reflection). For
    what enters an absorber use `powers`.
    """

    rs: Complexes
    rp: Complexes
    ts: Complexes
    tp: Complexes
    transmitted_flux: Floats


class Powers(NamedTuple):
    """Shares of the arriving power that a face reflects and lets in, for s and p."""

    rs: Floats
    rp: Floats
    ts: Floats
    tp: Floats


class _Face(NamedTuple):
    """Common terms of all the quotients; the names are those of the module's text."""

    n1c1: Floats
    n1: Floats
    n2: Complexes
    c1: Floats
    q: Complexes
    contrast: Complexes  # D
    below_s: Complexes  # n1 c1 + q
    below_p: Complexes  # n2^2 c1 + n1 q


def _face(n_in: ArrayLike, n_out: ArrayLike, cos_in: ArrayLike) -> _Face:
    n1 = np.asarray(n_in, dtype=np.float64)
    n2 = np.asarray(n_out, dtype=np.complex128)
    c1 = np.maximum(np.abs(np.asarray(cos_in, dtype=np.float64)), _GRAZING)
    n1c1 = n1 * c1
    contrast = (n2 - n1) * (n2 + n1)
    # The real second term also makes an imaginary part of -0.0 positive: on the cut of the
    # root it alone decides between a field that dies away (Im q >= 0) and one that grows.
    q: Complexes = np.sqrt(contrast + n1c1 * n1c1)
    below_s: Complexes = q + n1c1
    return _Face(n1c1, n1, n2, c1, q, contrast, below_s, n2 * n2 * c1 + n1 * q)


def _reflected(f: _Face) -> tuple[Complexes, Complexes]:
    rs = -f.contrast / (f.below_s * f.below_s)
    sine = (1.0 - f.c1) * (1.0 + f.c1)  # its square, sharp at normal incidence
    brewster = f.n2 * f.n2 * (f.c1 * f.c1) - f.n1 * f.n1 * sine
    rp = f.contrast * brewster / (f.below_p * f.below_p)
    return rs, rp


def amplitudes(n_in: ArrayLike, n_out: ArrayLike, cos_in: ArrayLike) -> Amplitudes:
    """Field coefficients for s and p at faces, dielectric, metallic or total.

    Parameters
    ----------
    n_in : (...,) array_like of float
        Index of the medium the light is in, real and positive.
    n_out : (...,) array_like of float or complex
        Index beyond the face; n + ik with k >= 0 for an absorber.
    cos_in : (...,) array_like of float
        Cosine of the angle of incidence; its sign is ignored.

    Returns
    -------
    Amplitudes
        Complex arrays of the inputs' common shape, in the axes of the module's text.
        NaN where an input is.

    Notes
    -----
    At total reflection q = n2 c2 is on the positive imaginary axis, so |rs| = |rp| = 1
    and the field beyond dies away; ts and tp then are that field, and carry no power.

    Examples
    --------
    >>> face = amplitudes(1.0, 1.5, 1.0)
    >>> complex(face.rs).real.__round__(12), complex(face.rp).real.__round__(12)
    (-0.2, 0.2)
    """
    with np.errstate(invalid="ignore"):  # a NaN row is an answer, not an accident
        f = _face(n_in, n_out, cos_in)
        rs, rp = _reflected(f)
        twice = 2.0 * f.n1c1
        ts, tp = twice / f.below_s, twice * f.n2 / f.below_p
    return Amplitudes(rs, rp, ts, tp, f.q.real / f.n1c1)


def dielectric(n_in: Floats, n_out: Floats, cos_in: Floats) -> tuple[Floats, ...]:
    """Field coefficients of faces between clear media below the critical angle.

    Parameters
    ----------
    n_in, n_out : (N,) ndarray of float64
        Real indices on both sides.
    cos_in : (N,) ndarray of float64
        Cosine of the angle of incidence, at which light is refracted on every row.

    Returns
    -------
    rs, rp, ts, tp : (N,) ndarray of float64
        As `amplitudes` gives them, in real numbers, and with ts and tp in units of power:
        their squares are the transmitted shares.
    """
    c1 = np.maximum(cos_in, _GRAZING)
    n1c1 = n_in * c1
    contrast = (n_out - n_in) * (n_out + n_in)
    q = np.sqrt(np.maximum(contrast + n1c1 * n1c1, 0.0))
    n2n2, n1n1 = n_out * n_out, n_in * n_in
    below_s, below_p = q + n1c1, n2n2 * c1 + n_in * q
    brewster = n2n2 * (c1 * c1) - n1n1 * ((1.0 - c1) * (1.0 + c1))
    across = 2.0 * np.sqrt(n1c1 * q)
    return (
        -contrast / (below_s * below_s),
        contrast * brewster / (below_p * below_p),
        across / below_s,
        across * n_out / below_p,
    )


def powers(n_in: ArrayLike, n_out: ArrayLike, cos_in: ArrayLike) -> Powers:
    r"""Shares of power reflected at and transmitted into the second medium.

    .. math::

        T_s = \frac{\Re(n_2 c_2)}{n_1 c_1} |t_s|^2, \quad
        T_p = \frac{\Re(n_2 c_2^*)}{n_1 c_1} |t_p|^2

    Parameters
    ----------
    n_in, n_out, cos_in : (...,) array_like
        As for `amplitudes`.

    Returns
    -------
    Powers
        Real arrays of the inputs' common shape; rs + ts = rp + tp = 1 to rounding.

    Notes
    -----
    For a metal the transmitted share is what it absorbs. The reflected and the
    transmitted share are worked out apart, so that their sum can be tested.

    Examples
    --------
    >>> face = powers(1.0, 1.5, 1.0)
    >>> round(float(face.rs), 12), round(float(face.ts), 12)
    (0.04, 0.96)
    """
    with np.errstate(invalid="ignore"):  # a NaN row is an answer, not an accident
        f = _face(n_in, n_out, cos_in)
        rs, rp = _reflected(f)
        four = 4.0 * f.n1c1
        ts = four * f.q.real / _squared(f.below_s)
        tp = four * (f.n2 * f.n2 * f.q.conj()).real / _squared(f.below_p)
    return Powers(_squared(rs), _squared(rp), ts, tp)


def _squared(value: Complexes) -> Floats:
    """Squared modulus, without the square root that `abs` would take first."""
    squared: Floats = value.real * value.real + value.imag * value.imag
    return squared


def brewster_angle_rad(n_in: ArrayLike, n_out: ArrayLike) -> Floats:
    """Angle of incidence at which p is not reflected: tan(angle) = n_out / n_in.

    Parameters
    ----------
    n_in, n_out : (...,) array_like of float
        Real, positive indices.

    Returns
    -------
    (...,) ndarray of float64
        rad, in (0, pi/2).

    Examples
    --------
    >>> round(float(np.degrees(brewster_angle_rad(1.0, 1.5168))), 4)
    56.6038
    """
    angle: Floats = np.arctan2(
        np.asarray(n_out, dtype=np.float64), np.asarray(n_in, dtype=np.float64)
    )
    return angle
