"""Widths of beams, and shares of a Gaussian cross-section, by closed forms and quadrature.

w is the 1/e^2 radius: irradiance exp(-2 r^2 / w^2). Siegman, Lasers, ch. 17.
"""

from __future__ import annotations

from itertools import pairwise

import numpy as np
from scipy.integrate import quad
from scipy.special import erfc
from scipy.stats import ncx2


def rayleigh(w0, nm, m2=1.0, index=1.0):
    """Rayleigh length in mm."""
    return np.pi * w0 * w0 * index / (m2 * nm * 1e-6)


def radius(w0, z, nm, m2=1.0, index=1.0):
    """Radius at z from the waist."""
    return w0 * np.hypot(1.0, z / rayleigh(w0, nm, m2, index))


def imaged_waist(w0, before, focal, nm, m2=1.0):
    """(radius, distance behind the lens) of the waist that a thin lens makes."""
    zr = rayleigh(w0, nm, m2)
    d = before - focal
    scale = focal * focal / (d * d + zr * zr)
    return w0 * np.sqrt(scale), focal + d * scale


def beyond(edge, w):
    """Share on the far side of a straight edge at a signed distance from the axis."""
    return 0.5 * erfc(np.sqrt(2.0) * edge / w)


def in_circle(a, w, d=0.0):
    """Share of a round beam inside a circle of radius a whose middle is d away."""
    return float(ncx2.cdf((2 * a / w) ** 2, 2, (2 * d / w) ** 2))


def outside_circle(a, w, d=0.0):
    return float(ncx2.sf((2 * a / w) ** 2, 2, (2 * d / w) ** 2))


def between(low, high, w):
    """Share between two straight edges."""
    return beyond(low, w) - beyond(high, w)


def strips(intervals, w_x, w_y, breaks=(), reach=6.5):
    """Share of a region given by its intervals of x at each y, in mm.

    `intervals(y)` returns a list of (low, high); `breaks` are where it is not smooth.
    """

    def column(y):
        weight = np.sqrt(2 / np.pi) / w_y * np.exp(-2 * (y / w_y) ** 2)
        return weight * sum(between(a, b, w_x) for a, b in intervals(y) if b > a)

    stops = sorted({-reach * w_y, reach * w_y, *(b for b in breaks if abs(b) < reach * w_y)})
    parts = [
        quad(column, a, b, epsabs=1e-14, epsrel=1e-11, limit=400)[0] for a, b in pairwise(stops)
    ]
    return float(sum(parts))


def ellipse_at(y, a, b, x0=0.0, y0=0.0):
    """The interval of x inside an ellipse with upright half axes."""
    square = 1.0 - ((y - y0) / b) ** 2
    if square <= 0.0:
        return []
    half = a * np.sqrt(square)
    return [(x0 - half, x0 + half)]


def box_at(y, x0, x1, y0, y1):
    """The interval of x inside a rectangle."""
    return [(x0, x1)] if y0 < y < y1 else []


def cut_out(outer, inner):
    """Intervals of `outer` without those of `inner`."""
    left = list(outer)
    for a, b in inner:
        left = [
            piece
            for low, high in left
            for piece in ((low, min(high, a)), (max(low, b), high))
            if piece[1] > piece[0]
        ]
    return left
