"""Hazard zones: the areas in plan in which light exceeds the exposure limit.

The names are loaded when they are asked for: polygons take longer to load than a plain check
takes, and a check that only needs the enclosure's line must not wait for them.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from benchlay.zones.compose import Zone, Zones, zones_of
    from benchlay.zones.controlled import ControlledArea, controlled_areas
    from benchlay.zones.limits import LimitTable, limits_of

__all__ = [
    "ControlledArea",
    "LimitTable",
    "Zone",
    "Zones",
    "controlled_areas",
    "limits_of",
    "zones_of",
]


def __getattr__(name: str) -> Any:  # noqa: ANN401 - whatever the rooms offer
    """Load a name when it is asked for."""
    if name in ("LimitTable", "limits_of"):
        from benchlay.zones import limits

        return getattr(limits, name)
    if name in ("ControlledArea", "controlled_areas"):
        from benchlay.zones import controlled

        return getattr(controlled, name)
    if name in __all__:
        from benchlay.zones import compose

        return getattr(compose, name)
    msg = f"module 'benchlay.zones' has no attribute {name!r}"
    raise AttributeError(msg)
