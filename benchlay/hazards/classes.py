"""Within the limit of which class: of a line by itself, and of several that act together.

A class is never awarded; see `benchlay.exposure.classes`.
"""

from __future__ import annotations

from collections.abc import Sequence

from benchlay.exposure import OutOfRange, Pulse
from benchlay.exposure.classes import (
    Beam,
    Classification,
    classify_continuous,
    classify_pulsed,
)

WORST = "4"
_ORDER = ("1", "1M", "2", "2M", "3R", "3B", WORST)


def classify(
    wavelength_nm: float, power_w: float, pulse: Pulse | None, beam: Beam | None = None
) -> Classification | str:
    """Classify a line by its mean power, W, or say why it cannot be done."""
    try:
        if pulse is None:
            return classify_continuous(wavelength_nm, power_w, beam)
        energy_j = power_w / pulse.rate_hz
        return classify_pulsed(wavelength_nm, pulse._replace(energy_j=energy_j), beam)
    except OutOfRange as error:
        return str(error)


def statement(name: str | None) -> str:
    """Say within which limit light stays, and no more than was computed.

    >>> statement("3B"), statement("4")
    ('within the limit of class 3B as modelled', 'above the limit of class 3B as modelled')
    """
    if name is None:
        return "no limit is known for some of it: taken as above the limit of class 3B"
    if name == WORST:
        return "above the limit of class 3B as modelled"
    return f"within the limit of class {name} as modelled"


def name_of(found: Classification | str) -> str | None:
    """Return the class of a result; None where there is no limit."""
    return None if isinstance(found, str) else found.name


def together(found: Sequence[Classification | str]) -> str | None:
    """Return the class within whose limit several lines stay together.

    The ratios of what is collected to the limit are added up over all lines, as if all of it
    met the same tissue: the larger hazard. None where a line has no limit.
    """
    known = [one for one in found if isinstance(one, Classification)]
    if len(known) < len(found):
        return None
    if len(known) == 1:  # some limits are not in the order of the classes
        return known[0].name
    if _sum(known, "3B", wide=True) > 1.0:
        return WORST
    for level in ("1", "2"):
        if _sum(known, level, wide=True) <= 1.0:
            return level
        if _sum(known, level, wide=False) <= 1.0:
            return f"{level}M"
    return "3R" if _sum(known, "3R", wide=True) <= 1.0 else "3B"


def worst(names: Sequence[str | None]) -> str | None:
    """Return the highest of some classes; None, which is unknown, is the highest of all."""
    if None in names:
        return None
    return max((name for name in names if name is not None), key=_ORDER.index, default="1")


def _sum(found: Sequence[Classification], level: str, *, wide: bool) -> float:
    total = 0.0
    for one in found:
        collected = max(one.naked_eye, one.binoculars) if wide else one.naked_eye
        limit = one.limits[level]
        if collected > 0.0:
            total += float("inf") if limit is None else collected / limit
    return total
