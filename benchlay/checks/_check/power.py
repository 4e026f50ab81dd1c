"""How much of a beam an eye could meet: the power through the limiting aperture."""

from __future__ import annotations

import numpy as np

from benchlay.optics import moments
from benchlay.optics.special import circle_share
from benchlay.scene.tables import Floats, Ints
from benchlay.tracing.beams import Beams

# An opening this many 1/e² radii wide passes all but 4e-19 of the beam.
_WHOLE = 4.6
# Between the two waists of an astigmatic beam the worst place is looked for in these steps.
_BETWEEN = np.linspace(0.0, 1.0, 9)


def accessible_w(beams: Beams, rows: Ints, aperture_mm: Floats, start_mm: Floats) -> Floats:
    """Return the power through an aperture centred on each beam, at the worst place of its leg.

    Parameters
    ----------
    beams : Beams
        All beams of a trace.
    rows : (K,) ndarray of int
        Which of them.
    aperture_mm : (K,) ndarray of float64
        Diameter of the aperture.
    start_mm : (K,) ndarray of float64
        How far along the leg the part that counts begins.

    Returns
    -------
    (K,) ndarray of float64
        In W. A beam that was cut keeps the shape of its uncut self, of which the aperture
        passes its share, but never more than is left.
    """
    start = beams.start
    index = start.index[rows]
    m = start.moments[:, rows]
    low, high = start_mm, np.maximum(beams.length[rows], start_mm)
    waists = np.clip(moments.waist_distance(m, index), low, high)
    between = waists[0] + (waists[1] - waists[0]) * _BETWEEN[:, None]
    depths = np.concatenate((low[None], high[None], between))
    spread = moments.propagate(m[:, None, :], depths, index)
    w1, w2, _ = moments.radii(spread)
    share = _through(w1, w2, 0.5 * aperture_mm).max(axis=0)
    power = start.power[rows]
    passed: Floats = np.minimum(power / start.kept[rows] * share, power)
    return passed


def _through(w1: Floats, w2: Floats, radius_mm: Floats) -> Floats:
    """Return the share of beams within a circle; the exact integral only where it matters."""
    radius = np.broadcast_to(radius_mm, w1.shape)
    share = np.ones(w1.shape)
    cut = radius < _WHOLE * np.maximum(w1, w2)
    share[cut] = circle_share(w1[cut], w2[cut], radius[cut])
    return share


def peak_irradiance_w_m2(beams: Beams, rows: Ints) -> Floats:
    """Return the irradiance on the axis at the end of legs, of the uncut beam, across the beam."""
    w1, w2, _ = moments.radii(beams.end_moments[:, rows])
    power = (beams.end_coherency[0] + beams.end_coherency[1])[rows] / beams.start.kept[rows]
    with np.errstate(divide="ignore"):
        peak: Floats = 2.0 * power / (np.pi * w1 * w2) * 1e6
    return peak
