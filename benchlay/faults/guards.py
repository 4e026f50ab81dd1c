"""Panels and lids as guards: what they take at worst, and from what, beside what they withstand."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from math import inf
from typing import TypeAlias

import numpy as np

from benchlay.checks import Context
from benchlay.layout.layout import Layout
from benchlay.layout.materials import Withstands
from benchlay.named import NamedTuple
from benchlay.scene.tables import PARTS, SINK
from benchlay.tracing.beams import SOLID

_W_CM2 = 1e-4  # per W/m2
_J_CM2 = 1e-4  # per J/m2


class Load(NamedTuple):
    """What a sheet takes in one case: the worst of each kind, and the beam of the irradiance.

    The irradiance is that on the axis, across the beam: its mean over the pulses. `power_w` is
    that of all beams together, `fluence_j_m2` of one pulse.
    """

    irradiance_w_m2: float
    power_w: float
    fluence_j_m2: float
    source: str
    wavelength_nm: float
    left: str
    exposure_s: float | None  # the time base of its limit
    continuous: bool  # whether any of the light comes without pulses
    hazardous: bool  # whether any of the beams is


Sheet: TypeAlias = tuple[str, str]
"""``panel`` or ``lid``, and its name: a panel and a lid may have the same."""

Loads: TypeAlias = Mapping[Sheet, Load]


def loads_of(context: Context, variant: int) -> Loads:
    """Return what each panel and lid takes in a variant, where chief rays end on it."""
    beams, s = context.trace.beams, context.trace.scene.solids
    rows = context.beams_of(variant)
    rows = rows[beams.end_kind[rows] == SOLID]
    rows = rows[s.sink[beams.end_row[rows]] == SINK["panel"]]
    if not len(rows):
        return {}
    number, part = s.name[beams.end_row[rows]], s.part[beams.end_row[rows]]
    peak, power = context.peak_w_m2(rows), beams.end_core[rows]
    rates = [context.pulse_rate_hz(beam) for beam in rows.tolist()]
    fluence = peak / np.array([rate or inf for rate in rates])
    found: dict[Sheet, Load] = {}
    for kind, name in sorted(set(zip(part.tolist(), number.tolist(), strict=True))):
        mine = np.flatnonzero((number == name) & (part == kind))
        beam = int(rows[mine[np.argmax(peak[mine])]])
        source, nm = context.source_of(beam), context.wavelength_nm(beam)
        line = context.limits.get((variant, source, nm))
        limit = None if line is None else line.limit
        found[PARTS[kind], context.trace.scene.names[name]] = Load(
            float(peak[mine].max()),
            float(power[mine].sum()),
            float(fluence[mine].max()),
            source,
            nm,
            context.left_name(beam),
            None if limit is None else limit.time_base_s,
            any(rates[i] is None for i in mine.tolist()),
            bool(context.hazardous[rows[mine]].any()),
        )
    return found


class Worst(NamedTuple):
    """The worst load of a sheet, in which state, and by which fault (None: as it is)."""

    load: Load
    state: str
    fault: str | None


class Budget(NamedTuple):
    """What a sheet takes beside what it withstands, in `unit`.

    `margin` is how many times more it withstands; None where that is not shown, for the
    `reason`: a sheet without a rating never passes.
    """

    sheet: Sheet
    worst: Worst | None
    value: float | None
    limit: float | None
    unit: str
    rated_s: float | None
    margin: float | None
    reason: str | None


def budgets(layout: Layout, cases: Iterable[tuple[str, str | None, Loads]]) -> list[Budget]:
    """Return the budget of every panel and lid over cases: state, fault (or None) and loads."""
    enclosure = layout.enclosure
    if enclosure is None:
        return []
    told = list(cases)
    found = []
    for kind, sheets in (("panel", enclosure.panels), ("lid", enclosure.lids)):
        for name in sorted(sheets):
            material = enclosure.material_of(sheets[name])
            rating = None if material is None else layout.materials[material].withstands
            found.append(_budget((kind, name), rating, told))
    return found


def _budget(
    sheet: Sheet, rating: Withstands | None, cases: list[tuple[str, str | None, Loads]]
) -> Budget:
    unit, limit = _rated(rating)
    rated_s = None if rating is None else rating.for_s
    mine = [Worst(loads[sheet], state, fault) for state, fault, loads in cases if sheet in loads]
    if not mine:
        return Budget(sheet, None, None, limit, unit, rated_s, None, "no light ends on it")
    # Of equal loads that of a state as it is comes first: it needs no fault.
    worst = max(mine, key=lambda one: (_value(one.load, unit), one.fault is None))
    value = _value(worst.load, unit)
    reason = _not_shown(rating, mine)
    margin = limit / value if reason is None and limit is not None and value > 0.0 else None
    return Budget(sheet, worst, value, limit, unit, rated_s, margin, reason)


def _rated(rating: Withstands | None) -> tuple[str, float | None]:
    """Return the unit in which a rating speaks, and what it allows."""
    if rating is not None and rating.power_w is not None:
        return "W", rating.power_w
    if rating is not None and rating.fluence_j_m2 is not None:
        return "J/cm2", rating.fluence_j_m2 * _J_CM2
    irradiance = None if rating is None else rating.irradiance_w_m2
    return "W/cm2", None if irradiance is None else irradiance * _W_CM2


def _value(load: Load, unit: str) -> float:
    values = {
        "W": load.power_w,
        "J/cm2": load.fluence_j_m2 * _J_CM2,
        "W/cm2": load.irradiance_w_m2 * _W_CM2,
    }
    return values[unit]


def _not_shown(rating: Withstands | None, loads: list[Worst]) -> str | None:
    """Say why nothing shows that a sheet holds; None where its rating speaks of all its loads."""
    if rating is None:
        return "its material states no rating"
    if rating.fluence_j_m2 is not None and any(one.load.continuous for one in loads):
        return "it is rated for pulses, and takes continuous light as well"
    longest = max((one.load.exposure_s or inf for one in loads if one.load.hazardous), default=0.0)
    if rating.for_s is not None and rating.for_s < longest:
        return f"it is rated for {rating.for_s:g} s, and exposed for up to {longest:g} s"
    return None
