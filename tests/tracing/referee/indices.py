"""Refractive indices by their published formulas, written out one by one.

Catalogue glasses and crystals relative to air, water absolute; wavelength in um.
"""

from __future__ import annotations

import numpy as np


def _squared(terms):
    def index(um):
        square = um * um
        return float(np.sqrt(1.0 + sum(b * square / (square - c) for b, c in terms)))

    return index


def _constant(a, terms):
    def index(um):
        square = um * um
        return float(np.sqrt(a + sum(b * square / (square - c) for b, c in terms)))

    return index


INDEX = {
    # Malitson 1965, eq. 3
    "fused-silica": _squared(
        [(0.6961663, 0.0684043**2), (0.4079426, 0.1162414**2), (0.8974794, 9.896161**2)]
    ),
    # Glass catalogue 2017, Sellmeier constants
    "BK7": _squared(
        [(1.03961212, 0.00600069867), (0.231792344, 0.0200179144), (1.01046945, 103.560653)]
    ),
    "SF10": _squared(
        [(1.61625977, 0.0127534559), (0.259229334, 0.0581983954), (1.07762317, 116.60768)]
    ),
    "SF11": _squared(
        [(1.73848403, 0.0136068604), (0.311168974, 0.0615960463), (1.17490871, 121.922711)]
    ),
    # Malitson 1963
    "CaF2": _squared(
        [(0.5675888, 0.050263605**2), (0.4710914, 0.1003909**2), (3.8484723, 34.64904**2)]
    ),
    # Dodge 1984, ordinary
    "MgF2": _squared(
        [(0.48755108, 0.04338408**2), (0.39875031, 0.09461442**2), (2.3120353, 23.793604**2)]
    ),
    # Malitson and Dodge 1972, ordinary
    "sapphire": _squared(
        [(1.4313493, 0.0726631**2), (0.65054713, 0.1193242**2), (5.3414021, 18.028251**2)]
    ),
    # Tatian 1984
    "ZnSe": _squared(
        [(4.45813734, 0.200859853**2), (0.467216334, 0.391371166**2), (2.8956629, 47.1362108**2)]
    ),
    # Ghosh 1999, ordinary
    "quartz": _constant(1.28604141, [(1.07044083, 1.00585997e-2), (1.10202242, 100.0)]),
    "calcite": _constant(1.73358749, [(0.96464345, 1.94325203e-2), (1.82831454, 120.0)]),
}


def water(um):
    """Daimon and Masumura 2007, 20 degrees C, absolute."""
    square = um * um
    terms = (
        (5.684027565e-1, 5.101829712e-3),
        (1.726177391e-1, 1.821153936e-2),
        (2.086189578e-2, 2.620722293e-2),
        (1.130748688e-1, 1.069792721e1),
    )
    return float(np.sqrt(1.0 + sum(a * square / (square - b) for a, b in terms)))


def air(um, celsius=20.0, pascal=101325.0):
    """Dry air with 450 ppm CO2: Ciddor, Appl. Opt. 35, 1566 (1996), written from its appendix."""
    sigma2 = 1.0 / (um * um)
    standard = 1e-8 * (5792105.0 / (238.0185 - sigma2) + 167917.0 / (57.362 - sigma2))
    return 1.0 + standard * _density(celsius, pascal) / _density(15.0, 101325.0)


def _density(celsius, pascal):
    """Density of dry air up to a factor: p / (Z T), with the compressibility of eq. 12."""
    kelvin = celsius + 273.15
    a0, a1, a2, d = 1.58123e-6, -2.9331e-8, 1.1043e-10, 1.83e-11
    ratio = pascal / kelvin
    z = 1.0 - ratio * (a0 + a1 * celsius + a2 * celsius**2) + ratio**2 * d
    return pascal / (z * kelvin)
