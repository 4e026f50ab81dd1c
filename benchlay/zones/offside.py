r"""How far beside a beam's axis the limiting aperture may still take too much.

An aperture of radius a whose centre is d beside the axis takes, of a Gaussian beam,

.. math:: P(d) = P \sqrt{\frac{2}{\pi}} \frac{1}{w} \int_{-a}^{a} e^{-2 (d + x)^2 / w^2}
          \operatorname{erf}\!\left(\frac{\sqrt{2 (a^2 - x^2)}}{v}\right) dx ,

w and v being the 1/e^2 radii across and upright; this falls with d, and is solved for the limit.
Where the beam is narrow beside the aperture, the half plane beyond d - a takes its place, which
holds no less.
"""

from __future__ import annotations

import math

import numpy as np

from benchlay.scene.tables import Floats

_NODES = 96
# Below this share of the aperture's radius the nodes are too far apart for a beam, and the
# half plane is larger by less than 0.2 % of the width.
_NARROW = 0.1
_HALVINGS = 34  # of some metres: to less than a micrometre
_ANGLES, _WEIGHTS = np.polynomial.legendre.leggauss(_NODES)


def half_plane(share: float) -> float:
    """Return how far from the axis, in 1/e^2 radii, a half plane holds a share of a beam."""
    low, high = -4.0, 4.0
    for _ in range(60):
        middle = 0.5 * (low + high)
        if 0.5 * math.erfc(math.sqrt(2.0) * middle) > share:
            low = middle
        else:
            high = middle
    return high


def farthest_mm(across: Floats, upright: Floats, aperture_mm: float, share: float) -> Floats:
    """Return how far beside the axis an aperture may take more than a share of a beam, mm.

    Parameters
    ----------
    across, upright : (K,) ndarray of float64
        1/e^2 radii along the way aside and at right angles to it, principal axes, mm.
    aperture_mm : float
        Diameter.
    share : float
        Of the whole beam, above 0.

    Returns
    -------
    (K,) ndarray of float64
        0 where the aperture takes less even on the axis.
    """
    a = 0.5 * aperture_mm
    far: Floats = np.maximum(a + across * half_plane(share), 0.0)
    wide = np.flatnonzero((across > _NARROW * a) & (upright > _NARROW * a))
    if not len(wide):
        return far
    theta = 0.5 * np.pi * _ANGLES
    x, chord = a * np.sin(theta), a * np.cos(theta)
    erf = [math.erf(math.sqrt(2.0) * c / v) for v in upright[wide].tolist() for c in chord.tolist()]
    factor = np.array(erf).reshape(len(wide), _NODES)
    w = across[wide, None]
    factor *= math.sqrt(2.0 / math.pi) / w * chord * _WEIGHTS * 0.5 * np.pi
    low, high = np.zeros(len(wide)), far[wide]
    for _ in range(_HALVINGS):
        middle = 0.5 * (low + high)
        taken = (factor * np.exp(-2.0 * ((middle[:, None] + x) / w) ** 2)).sum(axis=1)
        low, high = np.where(taken > share, middle, low), np.where(taken > share, high, middle)
    far[wide] = np.where(low > 0.0, high, 0.0)
    return far
