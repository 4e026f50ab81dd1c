"""What would clear an escape or a stray, as YAML to paste, tried out before it is offered.

Candidates come from where the light runs (`stops.py`, `closing.py`) and from where it began
(`ghosts.py`). Each is written into the layout's own text (`edits.py`), which is then read,
placed, traced and checked again (`trials.py`): only what clears its finding and raises no
other is offered. Light that only single faults send out is dealt with in `of_faults.py`.
"""

from __future__ import annotations

from benchlay.remedies.of_faults import FaultOffers, fault_offers
from benchlay.remedies.offers import offers
from benchlay.remedies.trials import Judged, Judgement

__all__ = ["FaultOffers", "Judged", "Judgement", "fault_offers", "offers"]
