"""Coherency and moments of beams turned into another basis together.

Turning is linear in cos², sin² and sin cos of the angle, so that one product with a fixed
matrix gives the three parts of all fourteen quantities at once. For the few beams of a batch
the number of array operations is what counts, and this takes a tenth of them.
"""

from __future__ import annotations

from typing import TypeAlias

import numpy as np
from numpy.typing import NDArray

from benchlay.optics import coherency, moments

Floats: TypeAlias = NDArray[np.float64]

ROWS = 14  # of coherency (4) and moments (10), one below the other


def _turned(cos: float, sin: float) -> Floats:
    """Return the matrix (14, 14) of a turn, from what the two modules do to unit columns."""
    matrix = np.zeros((ROWS, ROWS))
    matrix[:4, :4] = coherency.rotate(np.eye(4), cos, sin)
    matrix[4:, 4:] = moments.rotate(np.eye(10), cos, sin)
    return matrix


_OF_COS2, _OF_SIN2 = _turned(1.0, 0.0), _turned(0.0, 1.0)
_PARTS = np.concatenate((_OF_COS2, _OF_SIN2, _turned(1.0, 1.0) - _OF_COS2 - _OF_SIN2))


def turn(light: Floats, cos: Floats, sin: Floats) -> Floats:
    """Express light in bases turned from e1 towards e2.

    Parameters
    ----------
    light : (14, N) ndarray of float64
        Coherency (4, N), W, above moments (10, N).
    cos, sin : (N,) ndarray of float64
        Of the angles by which the bases turn; scaled by k, they scale the result by k².

    Returns
    -------
    (14, N) ndarray of float64
        As `coherency.rotate` and `moments.rotate` give it.
    """
    parts = (_PARTS @ light).reshape(3, ROWS, -1)
    turned: Floats = parts[0] * (cos * cos)
    turned += parts[1] * (sin * sin)
    turned += parts[2] * (cos * sin)
    return turned
