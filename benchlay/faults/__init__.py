"""Single faults: what could credibly go wrong by itself, and what light would then do."""

from __future__ import annotations

from benchlay.faults.families import KINDS, Family, families
from benchlay.faults.fans import Fan, fans_of
from benchlay.faults.guarding import Opened
from benchlay.faults.panes import Window
from benchlay.faults.review import OUTCOMES, Fault, Range, Review, review_faults
from benchlay.faults.verdicts import Light

__all__ = [
    "KINDS",
    "OUTCOMES",
    "Family",
    "Fan",
    "Fault",
    "Light",
    "Opened",
    "Range",
    "Review",
    "Window",
    "families",
    "fans_of",
    "review_faults",
]
