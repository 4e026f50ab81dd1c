"""What every result must be read with, in every form of output."""

from __future__ import annotations

from benchlay.exposure.cautions import CAUTIONS as OF_EXPOSURE
from benchlay.exposure.cautions import DECIDING

_OF_LAYOUTS = (
    "This is a model of the layout as written. What stands on the bench may differ: survey "
    "stray light there, at low power, before anyone works with it.",
    "Findings hold for the rules, states and sources listed, and for these only. That "
    "nothing was found does not show that nothing is there.",
    "What is not computed: interference, multiply scattered light, heat and damage of optics; "
    "beside a chief ray, the walls of openings in panels, bodies that the beam starts inside "
    "of, and mirror reflections from the bodies that take a part of it.",
)

CAUTIONS: tuple[str, ...] = (*_OF_LAYOUTS, *DECIDING)
"""What goes with every result about a layout."""

IN_FULL: tuple[str, ...] = (*_OF_LAYOUTS, *OF_EXPOSURE)
"""The same where classes, distances or eyewear are stated besides; nothing stands in it twice."""
