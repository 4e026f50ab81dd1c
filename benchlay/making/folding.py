"""Folds at right angles: how much sheet a bend takes up."""

from __future__ import annotations

from math import log10, pi

from benchlay.named import NamedTuple

# Where the neutral fibre lies in a bend, as a share of the thickness from the inside. Common
# practice: a third for tight bends, the middle for wide ones; between them it goes with the
# logarithm of the ratio. A shop that bends otherwise has its own figure: the sheet states ours.
_TIGHT, _WIDE, _RISE = 0.33, 0.5, 0.25


def k_factor(radius_mm: float, thickness_mm: float) -> float:
    """Return where the neutral fibre lies, as a share of the thickness from the inside.

    Examples
    --------
    >>> k_factor(2.0, 2.0), k_factor(100.0, 2.0)
    (0.33, 0.5)
    """
    ratio = radius_mm / thickness_mm
    return _TIGHT if ratio <= 1.0 else min(_WIDE, _TIGHT + _RISE * log10(ratio))


class Folded(NamedTuple):
    """A flange at a right angle to its sheet.

    Sizes of folded sheet are taken over its outer faces, as a shop measures them.
    """

    flange_mm: float
    sense: str  # in | out
    radius_mm: float  # inner
    thickness_mm: float

    @property
    def k(self) -> float:
        """Where the neutral fibre lies."""
        return k_factor(self.radius_mm, self.thickness_mm)

    @property
    def allowance_mm(self) -> float:
        """The length of the neutral fibre in the bend: angle times its radius."""
        return pi / 2 * (self.radius_mm + self.k * self.thickness_mm)

    @property
    def setback_mm(self) -> float:
        """How far from the outer face the straight part begins, of flange and sheet alike."""
        return self.radius_mm + self.thickness_mm

    @property
    def line_mm(self) -> float:
        """Where the bend's middle lies on the blank, from the flange's free edge."""
        return self.flange_mm - self.setback_mm + self.allowance_mm / 2

    @property
    def zone_end_mm(self) -> float:
        """Where the sheet's straight part begins on the blank, from the flange's free edge."""
        return self.flange_mm - self.setback_mm + self.allowance_mm

    @property
    def shift_mm(self) -> float:
        """How far places on the sheet lie farther from the edge when it is laid flat."""
        return self.zone_end_mm - self.setback_mm
