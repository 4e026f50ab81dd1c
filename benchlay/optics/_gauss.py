"""Gauss-Legendre rules on -1 .. 1, as numbers.

The standard library of arrays works them out too, but loading that part of it takes longer
than all the integrals of a small bench. A test compares the two.

References
----------
.. [1] Abramowitz, M., Stegun, I. A. (1964). Handbook of Mathematical Functions, table 25.4.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

_POSITIVE = {
    8: (
        (0.18343464249564978, 0.36268378337836166),
        (0.525532409916329, 0.3137066458778869),
        (0.7966664774136267, 0.22238103445337443),
        (0.9602898564975362, 0.10122853629037706),
    ),
    16: (
        (0.09501250983763744, 0.18945061045506864),
        (0.2816035507792589, 0.18260341504492364),
        (0.45801677765722737, 0.16915651939500265),
        (0.6178762444026438, 0.1495959888165767),
        (0.755404408355003, 0.12462897125553407),
        (0.8656312023878318, 0.0951585116824926),
        (0.9445750230732326, 0.062253523938647456),
        (0.9894009349916499, 0.027152459411754176),
    ),
}
"""The upper half of the nodes, each with its weight, by the number of nodes."""


def rule(nodes: int) -> tuple[NDArray[np.float64], NDArray[np.float64]]:
    """Return the nodes and weights, each (n,), of the rule of 8 or 16 nodes.

    Examples
    --------
    >>> x, weight = rule(8)
    >>> round(float(weight @ x**14), 12) == round(2 / 15, 12)
    True
    """
    x, weight = np.array(_POSITIVE[nodes]).T
    return np.concatenate((-x[::-1], x)), np.concatenate((weight[::-1], weight))
