"""How far a sheet before an opening must overlap it, so that no beam inside sees through."""

from __future__ import annotations

from collections.abc import Sequence
from math import ceil

from benchlay.coverage.enclosed import Enclosed
from benchlay.coverage.gaps import OPENING, Gap, windows
from benchlay.coverage.mirrors import Leg

SPACING_MM = 10.0  # of the sheet from the panel: room for a cable (common practice)
_SHEET_MM = 5.0  # a beam nearer than that behind the sheet would run in it


def overlap_mm(enclosed: Enclosed, gap: Gap, legs: Sequence[Leg]) -> float | None:
    """Return the overlap of a sheet `SPACING_MM` inside, in whole mm; None where none would do.

    A ray that passes the sheet's edge, o beyond the opening's own, and enters the opening has a
    slope of at least o over the spacing. From a point s beyond the opening's edge and D inside
    the panel no ray has more than s / D; along a straight beam s / D is greatest at an end.
    """
    if gap.kind != OPENING:
        return None
    name = gap.sheets[0]
    (window,) = (one for one in windows(enclosed, name) if one.name == gap.through)
    start, end, low, high = window.box
    (x, y), (c, s) = window.origin, window.along
    steepest = 0.0
    for leg in legs:
        for way in (leg.from_mm, leg.to_mm):
            px, py, pz = leg.at(way)
            along = (px - x) * c + (py - y) * s
            depth = (py - y) * c - (px - x) * s
            if depth <= SPACING_MM + _SHEET_MM:
                return None
            beside = max(start - along, along - end, low - pz, pz - high, 0.0)
            steepest = max(steepest, beside / depth)
    return float(ceil(steepest * SPACING_MM) + 1)
