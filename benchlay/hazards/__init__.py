"""What a reviewer asks of each state: which eyewear, how far off, who may stand where.

Computed from a trace, its limits and its zones. No class is awarded and nothing is approved:
see the cautions of `benchlay.exposure`.
"""

from __future__ import annotations

from collections.abc import Iterable

from benchlay.checks import Context
from benchlay.exposure import EDITION
from benchlay.hazards.accessible import accessible
from benchlay.hazards.assumed import assumptions, holds, unjudged
from benchlay.hazards.distances import distances
from benchlay.hazards.emitted import sources_of
from benchlay.hazards.eyewear import eyewear
from benchlay.hazards.matt import struck_in, viewing
from benchlay.hazards.model import StateHazards
from benchlay.hazards.places import enclosed_area, places_of
from benchlay.hazards.reach import reach_of
from benchlay.hazards.signs import signs_of
from benchlay.zones import LimitTable, Zones, controlled_areas, limits_of

__all__ = ["StateHazards", "hazards_of", "signs_of"]


def hazards_of(
    context: Context, zones: Zones, states: Iterable[str] | None = None
) -> tuple[StateHazards, ...]:
    """Return the hazards of some states, all by default.

    Parameters
    ----------
    context : Context
        The trace with its limits.
    zones : Zones
        Of at least these states.
    states : iterable of str, optional
        In the order wanted.
    """
    limits = limits_of(context.trace)
    variants = context.trace.scene.variants
    wanted = variants if states is None else tuple(states)
    return tuple(_of_state(context, limits, zones, variants.index(name)) for name in wanted)


def _of_state(context: Context, limits: LimitTable, zones: Zones, variant: int) -> StateHazards:
    state = context.state(variant)
    reach = reach_of(context, variant)
    struck = struck_in(context, limits, variant)
    areas = (area for area in controlled_areas(zones) if area.state == state.name)
    places = places_of(state.layout, areas, enclosed_area(state.layout))
    left_out = (words for words in zones.not_computed if f"(state {state.name})" in words)
    return StateHazards(
        state=state.name,
        edition=EDITION,
        time_base_s=state.layout.limits.time_base_s,
        sources=sources_of(context, variant),
        accessible=accessible(context, reach, struck),
        distances=distances(context, variant, reach.in_reach),
        eyewear=eyewear(context, reach, struck),
        diffuse=viewing(struck),
        controlled_area_m2=places.area_m2,
        controlled_area_outside_m2=places.outside_m2,
        people=places.people,
        passages=places.passages,
        holds=holds(context, variant),
        assumptions=assumptions(context, reach),
        not_computed=(*unjudged(context, variant), *left_out),
    )
