"""Panels and lids that would close the way by which a beam leaves."""

from __future__ import annotations

from collections.abc import Iterator
from math import ceil

import numpy as np

from benchlay.checks import Context
from benchlay.layout.layout import Layout
from benchlay.optics import moments
from benchlay.remedies.edits import Edit
from benchlay.remedies.trials import Change, unused_name
from benchlay.zones.enclosure_line import EnclosureLine, Side, enclosure_line, leaving

_RADII = 3.0  # of the beam that a panel overtops: all but 1e-7 of its light
_STEP_MM = 10.0  # panels are cut to whole centimetres: common practice


def closings(context: Context, beam: int) -> Iterator[Change]:
    """Give what would close the enclosure where a beam leaves it; nothing without one."""
    start = context.trace.beams.start
    layout = context.layout(int(start.variant[beam]))
    line = enclosure_line(layout)
    if layout.enclosure is None or not line.enclosed:
        return
    x, y, _ = start.position[beam].tolist()
    kx, ky, kz = start.direction[beam].tolist()
    found = leaving(line, (x, y), (kx, ky), float(context.trace.beams.length[beam]))
    if found is None or found.side is None:
        if kz > 0.0:
            yield _lid(layout, line)
        return
    if found.side.panel is None:
        yield _panel(layout, found.side)
    else:
        yield from _taller(context, layout, beam, found.way_mm, found.side.panel)
        if kz > 0.0:
            yield _lid(layout, line)


def _panel(layout: Layout, side: Side) -> Change:
    assert layout.enclosure is not None
    name = unused_name("panel", [*layout.enclosure.panels, *layout.enclosure.lids])
    (ax, ay), (bx, by) = side.start, side.end
    value = f"{{from: [{ax:g}, {ay:g}], to: [{bx:g}, {by:g}]}}"
    words = f"a panel from [{ax:g}, {ay:g}] to [{bx:g}, {by:g}] closes the side that is missing"
    return Change("panel", words, (Edit(("enclosure", "panels"), name, value),))


def _taller(
    context: Context, layout: Layout, beam: int, way_mm: float, name: str
) -> Iterator[Change]:
    """Give a panel that reaches beyond the beam; nothing for one that is open or has a hole."""
    start = context.trace.beams.start
    assert layout.enclosure is not None
    low, high = layout.enclosure.heights_mm(layout.enclosure.panels[name])
    z = float(start.position[beam, 2] + way_mm * start.direction[beam, 2])
    m = moments.propagate(start.moments[:, beam], way_mm, start.index[beam])
    w1, w2, _ = moments.radii(m)
    room = _RADII * float(np.maximum(w1, w2))
    path = ("enclosure", "panels", name)
    if z + room > high:
        top = _STEP_MM * ceil((z + room) / _STEP_MM)
        words = f"panel '{name}' raised from {high:g} to {top:g} mm stands in its way"
        yield Change("panel", words, (Edit(path, "to_height", f"{top:g}"),))
        if layout.enclosure.panels[name].to_height_mm is None:
            # One panel above the others makes a gap of each of theirs.
            words = f"the whole enclosure raised from {high:g} to {top:g} mm stands in its way"
            yield Change("panel", words, (Edit(("enclosure",), "to_height", f"{top:g}"),))
    if z - room < low:
        words = f"panel '{name}' brought down to the bench stands in its way"
        yield Change("panel", words, (Edit(path, "from_height", "0"),))


def _lid(layout: Layout, line: EnclosureLine) -> Change:
    assert layout.enclosure is not None
    name = unused_name("lid", [*layout.enclosure.panels, *layout.enclosure.lids])
    outline = ", ".join(f"[{x:g}, {y:g}]" for x, y in line.corners)
    value = f"{{height: {line.top_mm:g}, outline: [{outline}]}}"
    words = f"a lid over the whole enclosure at {line.top_mm:g} mm stands in its way"
    return Change("lid", words, (Edit(("enclosure", "lids"), name, value),))
