"""What guards take in every state and every case of every fault, and what they give access to."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

import numpy as np

from benchlay.checks import Context
from benchlay.faults.batches import Tracer
from benchlay.faults.families import Family
from benchlay.faults.guards import Loads, Sheet, loads_of
from benchlay.faults.panes import Arriving, arriving_w, in_openings
from benchlay.faults.sweeps import Swept
from benchlay.faults.verdicts import Light
from benchlay.named import NamedTuple


class Opened(NamedTuple):
    """What an access panel or lid gives access to while it is open in a state.

    `leaves` is the gravest light that gets out by it (None: none above the limit); `inside_w`
    and `inside_limit_w` are of the strongest beam within, which hands can reach then.
    """

    sheet: Sheet
    state: str
    access: str
    leaves: Light | None
    inside_w: float | None
    inside_limit_w: float | None


def loads_in(
    tracer: Tracer, numbers: Sequence[int], swept: Sequence[Swept]
) -> Iterator[tuple[str, str | None, Loads]]:
    """Yield what sheets take in every state, and in every case of every fault."""
    names = tracer.rest.trace.scene.variants
    at_rest = {number: loads_of(tracer.rest, number) for number in numbers}
    for number, loads in at_rest.items():
        yield names[number], None, loads
    for one in swept:
        own = at_rest[one.family.state]
        for case in one.cases:
            name = one.family.name(case.setting_rad)
            yield names[one.family.state], name, _with_rest(case.loads, own)


def _with_rest(loads: Loads, rest: Loads) -> Loads:
    """Return loads with the power at rest on top: what a fault leaves alone is not traced anew."""
    return {
        sheet: load._replace(power_w=load.power_w + (rest[sheet].power_w if sheet in rest else 0.0))
        for sheet, load in loads.items()
    }


def arriving_in(
    tracer: Tracer, numbers: Sequence[int], swept: Sequence[Swept]
) -> Iterator[tuple[str, str | None, Arriving]]:
    """Yield what comes to windows in every state, and in every case of every fault."""
    names = tracer.rest.trace.scene.variants
    panes = in_openings(tracer.placed)
    for number in numbers:
        yield names[number], None, arriving_w(tracer.rest, number, panes)
    for one in swept:
        for case in one.cases:
            name = one.family.name(case.setting_rad)
            yield names[one.family.state], name, case.arriving


def _inside_w(context: Context, variant: int) -> tuple[float, float] | None:
    """Return the strongest hazardous beam of a state outside optics, W, and its limit."""
    rows = context.beams_of(variant)
    rows = rows[context.hazardous[rows]]
    if not len(rows):
        return None
    times = context.accessible_w[rows] / context.limit_w[rows]
    beam = int(rows[np.argmax(times)])
    return float(context.accessible_w[beam]), float(context.limit_w[beam])


def opened(tracer: Tracer, faults: Sequence[tuple[Family, Light | None]]) -> Iterator[Opened]:
    """Yield what access panels and lids give access to; faults come with the light they let out."""
    sheets = [(f, f.sheet, leaves) for f, leaves in faults if f.sheet is not None]
    for family, sheet, leaves in sorted(sheets, key=lambda one: (one[0].state, one[1])):
        state = tracer.placed.states[family.state]
        enclosure = state.layout.enclosure
        assert enclosure is not None
        kind, name = sheet
        access = (enclosure.panels if kind == "panel" else enclosure.lids)[name].access
        inside = _inside_w(tracer.rest, family.state) or (None, None)
        yield Opened(sheet, state.name, access, leaves, *inside)
