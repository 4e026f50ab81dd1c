"""The one place where a float becomes the digits that are printed.

The last bits of a sine differ between machines, so what is printed is rounded well above
them: to 12 significant digits, and a length, an angle or a direction also to a fixed decimal
below which it is noise (a heading of 90° gives a cosine of 6e-17, which means 0).
"""

from __future__ import annotations

import math

SIGNIFICANT = 12
"""Rounding is near 1e-15 of a number; agreement to 1e-9 must survive the printing."""

_SUM_RESOLUTION = 1e-12

_DECIMALS_BY_KEY = {
    "at": 9,
    "start": 9,
    "end": 9,
    "facing": 9,
    "pitch": 9,
    "azimuth": 9,
    "elevation": 9,
    "direction": 12,
    "horizontal": 12,
    "degree": 12,
    "polygon": 6,  # a micrometre of a metre: cut and buffered, not measured
}
_DECIMALS_BY_ENDING = (("_mm", 9), ("_deg", 9))


def decimals_of(key: str) -> int | None:
    """Return the decimals that a number under this JSON key is cut to, if it is.

    >>> decimals_of("optical_path_mm"), decimals_of("power_W")
    (9, None)
    """
    if key in _DECIMALS_BY_KEY:
        return _DECIMALS_BY_KEY[key]
    return next((n for ending, n in _DECIMALS_BY_ENDING if key.endswith(ending)), None)


def rounded(value: float, decimals: int | None = None) -> float | None:
    """Round for printing; what is no number gives None.

    Parameters
    ----------
    value : float
        Any unit.
    decimals : int, optional
        Decimals beyond which this quantity is noise.

    Returns
    -------
    float or None
        To 12 significant digits, never a negative zero. None for NaN and for infinities:
        JSON has neither, and what could not be computed is null.

    Examples
    --------
    >>> rounded(0.1 + 0.2), rounded(-1e-17, 9), rounded(float("nan"))
    (0.3, 0.0, None)
    """
    if not math.isfinite(value):
        return None
    if decimals is not None:
        value = round(value, decimals)
    return float(f"{value:.{SIGNIFICANT}g}") + 0.0


def settled(difference: float, total: float) -> float:
    """Cut the noise of a difference: a sum of doubles is not known to 1 part in 10¹².

    >>> settled(2e-17, 0.15), settled(0.01, 0.15)
    (0.0, 0.01)
    """
    return 0.0 if abs(difference) < _SUM_RESOLUTION * abs(total) else difference


def shown(value: float | None, unit: str = "") -> str:
    """Write a number for people: four significant digits, with its unit.

    >>> shown(0.000385, "W"), shown(1234567.0), shown(None, "W")
    ('0.000385 W', '1.235e+06', '-')
    """
    if value is None or not math.isfinite(value):
        return "-"
    return f"{value + 0.0:.4g} {unit}".rstrip()
