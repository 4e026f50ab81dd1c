"""Figures with their units as people write them: 20 mW, 0.385 mW, 30 000 s."""

from __future__ import annotations

import math

_PREFIXES = {9: "G", 6: "M", 3: "k", 0: "", -3: "m", -6: "µ", -9: "n", -12: "p", -15: "f"}


def with_unit(value: float, unit: str, *, digits: int = 3, decimal: str = ".") -> str:
    """Return a quantity with the prefix that keeps its figure short.

    Examples
    --------
    >>> with_unit(0.02, "W"), with_unit(0.000384845, "W"), with_unit(0.0, "W")
    ('20 mW', '0.385 mW', '0 W')
    """
    if value == 0.0 or not math.isfinite(value):
        return f"{value:g} {unit}"
    rounded = float(f"{value:.{digits - 1}e}")
    # 0.385 mW is how limits are quoted; 385 uW would hide that.
    power = 3 * math.floor((math.log10(abs(rounded)) + 1.0) / 3.0 + 1e-9)
    power = min(max(power, min(_PREFIXES)), max(_PREFIXES))
    return f"{number(rounded / 10.0**power, digits, decimal)} {_PREFIXES[power]}{unit}"


def number(value: float, digits: int = 3, decimal: str = ".") -> str:
    """Return a figure with so many digits that count, never in powers of ten.

    Examples
    --------
    >>> number(0.38485), number(1500.0), number(20.04)
    ('0.385', '1500', '20')
    """
    if value == 0.0 or not math.isfinite(value):
        return f"{value:g}"
    places = max(0, digits - 1 - math.floor(math.log10(abs(value))))
    text = f"{value:.{places}f}"
    if "." in text:
        text = text.rstrip("0").rstrip(".")
    return text.replace(".", decimal)


def above_words(ratio: float, decimal: str = ".") -> str:
    """Say how many times the limit light is, and which eyewear brings it there.

    The density is rounded up to a tenth, so that what is worn is enough.

    Examples
    --------
    >>> above_words(52.0), above_words(math.inf)
    ('52 times the limit: eyewear OD 1.8', 'no limit is known')
    """
    if not math.isfinite(ratio):
        return "no limit is known"
    density = math.ceil(10.0 * math.log10(max(ratio, 1.0)) - 1e-9) / 10.0
    return f"{number(ratio, 3, decimal)} times the limit: eyewear OD {number(density, 3, decimal)}"
