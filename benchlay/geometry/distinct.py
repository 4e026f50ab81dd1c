"""Distinct whole numbers of an array.

Like `numpy.unique`, which loads the masked arrays when it is first called: that alone takes
longer than the trace of a small bench.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray


def distinct(values: NDArray[np.int64]) -> NDArray[np.int64]:
    """Return the distinct values of a (N,) array, ascending.

    Examples
    --------
    >>> distinct(np.array([3, 1, 3])).tolist()
    [1, 3]
    """
    ordered = np.sort(values)
    return ordered[_first(ordered)]


def ranked(values: NDArray[np.int64]) -> tuple[NDArray[np.int64], NDArray[np.int64]]:
    """Return the distinct values, ascending, and for each of the (N,) values its place there.

    Examples
    --------
    >>> [part.tolist() for part in ranked(np.array([3, 1, 3]))]
    [[1, 3], [1, 0, 1]]
    """
    order = np.argsort(values, kind="stable")
    ordered = values[order]
    first = _first(ordered)
    place = np.empty(len(values), dtype=np.int64)
    place[order] = np.cumsum(first) - 1
    return ordered[first], place


def _first(ordered: NDArray[np.int64]) -> NDArray[np.bool_]:
    """Tell which values of an ordered array differ from the one before."""
    first = np.ones(len(ordered), dtype=np.bool_)
    first[1:] = ordered[1:] != ordered[:-1]
    return first
