"""The ways through a plate that is met from either side."""

from __future__ import annotations

from benchlay.elements._kind import Branches

TRANSMITTED = (
    (("front", "transmitted"), ("back", "transmitted")),
    (("back", "transmitted"), ("front", "transmitted")),
)
REFLECTED = (
    (("front", "reflected"),),
    (("back", "transmitted"), ("front", "reflected"), ("back", "transmitted")),
)
OUTER_REFLECTED = ((("front", "reflected"),), (("back", "reflected"),))

PASSING_PLATE: Branches = {"transmitted": TRANSMITTED, "reflected": OUTER_REFLECTED}
DIVIDING_PLATE: Branches = {"transmitted": TRANSMITTED, "reflected": REFLECTED}
OPENING: Branches = {"transmitted": ((("front", "transmitted"),),)}
