"""Laser exposure limits after IEC 60825-1:2014: numbers alone, no layout.

A calculation aid, not a certificate: see the cautions of each result, the standard,
local rules and the laser safety officer.

What is where: single exposures in `limits`, pulses in `trains`, several wavelengths in
`together`, averages over apertures in `averaging`, beams in the open in `distances` (round)
and `beams` (any), scattering surfaces in `viewing`, classes in `classes`, eyewear in
`eyewear`, and the whole of one beam in `assessment`. Functions of numbers take arrays.
"""

from __future__ import annotations

from benchlay.exposure.accessible import (
    AccessibleLimit,
    Pulse,
    accessible_limit,
    default_time_base_s,
)
from benchlay.exposure.errors import OutOfRange
from benchlay.exposure.limits import EDITION, Limit, eye_limit, skin_limit

__all__ = [
    "EDITION",
    "AccessibleLimit",
    "Limit",
    "OutOfRange",
    "Pulse",
    "accessible_limit",
    "default_time_base_s",
    "eye_limit",
    "skin_limit",
]
