"""Hazard zones: the areas in plan in which light exceeds the exposure limit."""

from __future__ import annotations

from benchlay.zones.compose import Zone, Zones, zones_of
from benchlay.zones.limits import LimitTable, limits_of

__all__ = ["LimitTable", "Zone", "Zones", "limits_of", "zones_of"]
