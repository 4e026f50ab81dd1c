"""What a review says of hazards: per state, and the schedule of labels and signs."""

from __future__ import annotations

from collections.abc import Sequence

from benchlay.checks import Context
from benchlay.hazards import hazards_of, signs_of
from benchlay.report.model import Review
from benchlay.zones import Zones


def with_hazards(review: Review, context: Context, states: Sequence[str], zones: Zones) -> Review:
    """Return a review with the hazards of some states."""
    found = hazards_of(context, zones, states)
    return review._replace(hazards=found, signs=signs_of(context.trace.placed.base.layout, found))
