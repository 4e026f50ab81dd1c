r"""Second moments of beams: width, divergence and what couples them, in two axes.

An array of shape (10, ...) has the beams in its last axes and the rows

    xx  xy  yy  xu  xv  yu  yv  uu  uv  vv

with x, y the position along e1 and e2 in mm, and u, v the angles to the chief ray along
them, times the index of the medium, in rad. Being n times the angle, u and v do not
change at a flat face met squarely. The 1/e^2 radius is twice the root of a variance of
position (ISO 11146-1:2021 for the moments, 11146-2 for general astigmatism).

Every optic acts on x, y, u, v by a linear map, so on these rows by a quadratic one, and
nothing is singular at a focus. At a face with cosines c1 and c2, in the axes s, p of
the plane of incidence, the map is: `scale_second` by 1/c1 (onto the face), `kick` by
(n2 c2 - n1 c1) C with C the surface's curvature matrix on its forward normal, then
`scale_second` by c2 (off the face). For a mirror c2 = -c1 and n2 = n1. A thin lens is a
`kick` by 1/f times the index around it. For M^2 = 1 all this is the propagation of the
complex curvature tensor (Arnaud, J. A. and Kogelnik, H., Appl. Opt. 8, 1687 (1969)).

Functions return new arrays and leave their arguments alone.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from benchlay.optics._moments_maps import (
    MM_PER_NM,
    UU,
    UV,
    VV,
    XU,
    XV,
    XX,
    XY,
    YU,
    YV,
    YY,
    Floats,
    kick,
    propagate,
    rotate,
    scale_second,
)
from benchlay.optics._moments_shape import (
    inverse_root,
    m2,
    radii,
    root,
    waist_distance,
)

__all__ = [
    "UU",
    "UV",
    "VV",
    "XU",
    "XV",
    "XX",
    "XY",
    "YU",
    "YV",
    "YY",
    "from_diameter_divergence",
    "from_waists",
    "inverse_root",
    "kick",
    "m2",
    "propagate",
    "radii",
    "root",
    "rotate",
    "scale_second",
    "waist_distance",
]


def _waist_at(radius_mm: Floats, divergence: Floats, way: Floats) -> tuple[Floats, ...]:
    """Moments xx, xu, uu of one axis, `way` = length/index in front of its waist."""
    uu = 0.25 * divergence * divergence
    return 0.25 * radius_mm * radius_mm + way * way * uu, -way * uu, uu


def from_waists(  # noqa: PLR0917 (two axes of three figures each)
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
    wavelength_mm = np.asarray(wavelength_nm, dtype=np.float64) * MM_PER_NM
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
    The two figures fix :math:`M^2 = \pi n D \Theta / (4 \lambda)`, which `m2` returns;
    a value below 1 means that no beam can have both.
    """
    n = np.asarray(index, dtype=np.float64)
    here = np.zeros(())
    first = _waist_at(0.5 * np.asarray(diameter1_mm), 0.5 * n * np.asarray(divergence1_rad), here)
    second = _waist_at(0.5 * np.asarray(diameter2_mm), 0.5 * n * np.asarray(divergence2_rad), here)
    return _uncoupled(first, second)


def _uncoupled(first: tuple[Floats, ...], second: tuple[Floats, ...]) -> Floats:
    xx, xu, uu, yy, yv, vv = np.broadcast_arrays(*first, *second)
    zero = np.zeros(xx.shape)
    return np.array([xx, zero, yy, xu, zero, zero, yv, uu, zero, vv], dtype=np.float64)
