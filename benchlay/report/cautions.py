"""What every result must be read with, in every form of output."""

from __future__ import annotations

CAUTIONS = (
    "This is a model of the layout as written. What stands on the bench may differ: survey "
    "stray light there, at low power, before anyone works with it.",
    "Findings hold for the rules, states and sources listed, and for these only. That "
    "nothing was found does not show that nothing is there.",
    "What is not computed: interference, multiply scattered light, heat and damage of optics; "
    "beside a chief ray, the walls of openings in panels, bodies that the beam starts inside "
    "of, and mirror reflections from the bodies that take a part of it.",
    "Exposure limits are evaluated as in the edition named beside them and take each beam "
    "alone, unless said otherwise. The standard, local rules and the laser safety officer "
    "decide; this program awards no class and no approval.",
)
