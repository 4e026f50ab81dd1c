"""What a check is, and what all checks share: the only room that a check may lean on."""

from __future__ import annotations

from benchlay.checks._check.bodies import (
    Bodies,
    Body,
    distance_mm,
    middle_between,
    overlap_mm,
    overlapping,
)
from benchlay.checks._check.context import Context
from benchlay.checks._check.exits import Exit, WayOut, exits_of, place_of, way_out
from benchlay.checks._check.exposed import against, exposed, exposure_words
from benchlay.checks._check.limits import LineLimit, floors_w, limits_of
from benchlay.checks._check.meetings import Loss, Mark
from benchlay.checks._check.power import accessible_w
from benchlay.checks._check.protocol import Check, Found, Run, Unevaluated
from benchlay.checks._check.routes import Leg
from benchlay.checks._check.without_limit import unjudged
from benchlay.checks._check.words import (
    above,
    angle_text,
    event_words,
    irradiance_text,
    length_text,
    listed,
    place_words,
    power_text,
    rounded_up,
    share_text,
    wavelength_text,
)

__all__ = [
    "Bodies",
    "Body",
    "Check",
    "Context",
    "Exit",
    "Found",
    "Leg",
    "LineLimit",
    "Loss",
    "Mark",
    "Run",
    "Unevaluated",
    "WayOut",
    "above",
    "accessible_w",
    "against",
    "angle_text",
    "distance_mm",
    "event_words",
    "exits_of",
    "exposed",
    "exposure_words",
    "floors_w",
    "irradiance_text",
    "length_text",
    "limits_of",
    "listed",
    "middle_between",
    "overlap_mm",
    "overlapping",
    "place_of",
    "place_words",
    "power_text",
    "rounded_up",
    "share_text",
    "unjudged",
    "wavelength_text",
    "way_out",
]
