"""From the typed layout to poses: every element and source on its nominal chief ray."""

from __future__ import annotations

from benchlay.placing.placed import Placed, PlacedState
from benchlay.placing.solve import place

__all__ = ["Placed", "PlacedState", "place"]
