"""Rows of fixing holes."""

from __future__ import annotations

from math import floor

_ROUNDING = 1e-9  # of a pitch: lengths that are whole pitches long are so but for rounding


def row(start_mm: float, end_mm: float, pitch_mm: float, inset_mm: float) -> list[float]:
    """Return the places of a row: spaced by the pitch, in the middle, clear of the ends.

    Parameters
    ----------
    start_mm, end_mm : float
        The edge that the row runs along.
    pitch_mm, inset_mm : float
        Distance from hole to hole, and the least distance from the ends.

    Examples
    --------
    >>> row(0.0, 500.0, 150.0, 12.5)
    [25.0, 175.0, 325.0, 475.0]
    >>> row(0.0, 20.0, 150.0, 12.5)
    []
    """
    room = end_mm - start_mm - 2 * inset_mm
    if room < 0.0:
        return []
    count = floor(room / pitch_mm + _ROUNDING) + 1
    first = (start_mm + end_mm) / 2 - (count - 1) * pitch_mm / 2
    return [first + n * pitch_mm for n in range(count)]
