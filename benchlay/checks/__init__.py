"""Checks: one file a check, in the order in which the tables list them."""

from __future__ import annotations

from benchlay.checks import (
    as_modelled,
    at_door,
    beam_blocked,
    clipped,
    coating_unstated,
    dark_element,
    dump_overload,
    escape,
    eye_level,
    fit_for_making,
    hole_miss,
    into_source,
    mount_clash,
    needs_unmet,
    no_interlock,
    not_yet,
    off_bench,
    off_brewster,
    off_centre,
    off_height,
    open_side,
    opening_mirror,
    panel_overload,
    polarization_lost,
    probe_access,
    route_broken,
    stray_unstopped,
    tight_access,
    unaccounted,
)
from benchlay.checks._check import (
    Check,
    Context,
    Exit,
    LineLimit,
    Run,
    accessible_w,
    exits_of,
    floors_w,
    limits_of,
    place_of,
    way_out,
)
from benchlay.checks._run import run_checks as _run
from benchlay.findings import Finding

CHECKS: tuple[Check, ...] = (
    clipped,
    off_height,
    off_centre,
    route_broken,
    beam_blocked,
    stray_unstopped,
    escape,
    open_side,
    opening_mirror,
    probe_access,
    panel_overload,
    dump_overload,
    no_interlock,
    into_source,
    mount_clash,
    off_bench,
    hole_miss,
    tight_access,
    fit_for_making,
    off_brewster,
    coating_unstated,
    polarization_lost,
    needs_unmet,
    eye_level,
    at_door,
    dark_element,
    unaccounted,
    as_modelled,
    not_yet,
)
"""Every check."""


def run_checks(context: Context) -> tuple[list[Finding], list[Run]]:
    """Run every check in every state; see `Run` for what could be evaluated."""
    return _run(context, CHECKS)


__all__ = [
    "CHECKS",
    "Check",
    "Context",
    "Exit",
    "LineLimit",
    "Run",
    "accessible_w",
    "exits_of",
    "floors_w",
    "limits_of",
    "place_of",
    "run_checks",
    "way_out",
]
