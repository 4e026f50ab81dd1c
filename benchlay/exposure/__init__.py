"""Laser exposure limits after IEC 60825-1:2014: numbers alone, no layout.

A calculation aid, not a certificate: see the cautions of each result, the standard,
local rules and the laser safety officer.
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
