"""Panels, lids and covers that would close the way by which a beam leaves."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from math import ceil

from benchlay.coverage.blockers import Place, Window
from benchlay.coverage.enclosed import windows_of
from benchlay.coverage.labyrinth import SPACING_MM
from benchlay.layout.layout import Layout
from benchlay.remedies.edits import Edit
from benchlay.remedies.trials import Change, unused_name
from benchlay.remedies.ways import Way
from benchlay.scene.surroundings import material_of
from benchlay.zones.enclosure_line import EnclosureLine, Side, enclosure_line, leaving

_RADII = 3.0  # of the beam that a panel overtops: all but 1e-7 of its light
_OVERLAPS_MM = (30.0, 100.0)  # of a sheet before an opening: against light that comes aslant
_STEP_MM = 10.0  # panels are cut to whole centimetres: common practice


def closings(way: Way, taken: Sequence[str] = ()) -> Iterator[Change]:
    """Give what would close the enclosure where a beam leaves it; nothing without one.

    `taken` are names that other offers use already: all can be pasted side by side.
    """
    layout = way.layout
    line = enclosure_line(layout)
    if layout.enclosure is None or not line.enclosed:
        return
    x, y, z = way.origin.tolist()
    kx, ky, kz = way.direction.tolist()
    found = leaving(line, (x, y), (kx, ky), way.length_mm)
    if found is None or found.side is None:
        if kz > 0.0:
            yield _lid(layout, line, taken)
        return
    if found.side.panel is None:
        yield _panel(layout, found.side, taken)
    else:
        at = (x + found.way_mm * kx, y + found.way_mm * ky, z + found.way_mm * kz)
        yield from _taller(layout, found.side.panel, at[2], _RADII * way.radius_mm(found.way_mm))
        yield from _covers(layout, found.side.panel, at, taken)
        if kz > 0.0:
            yield _lid(layout, line, taken)


def _panel(layout: Layout, side: Side, taken: Sequence[str]) -> Change:
    assert layout.enclosure is not None
    name = unused_name("panel", [*layout.enclosure.panels, *layout.enclosure.lids, *taken])
    (ax, ay), (bx, by) = side.start, side.end
    value = f"{{from: [{ax:g}, {ay:g}], to: [{bx:g}, {by:g}]}}"
    words = f"a panel from [{ax:g}, {ay:g}] to [{bx:g}, {by:g}] closes the side that is missing"
    return Change("panel", words, (Edit(("enclosure", "panels"), name, value),))


def _taller(layout: Layout, name: str, z: float, room: float) -> Iterator[Change]:
    """Give a panel that reaches beyond the beam; nothing for one that is open or has a hole."""
    assert layout.enclosure is not None
    low, high = layout.enclosure.heights_mm(layout.enclosure.panels[name])
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


def _covers(layout: Layout, name: str, at: Place, taken: Sequence[str]) -> Iterator[Change]:
    """Give sheets before the opening that a beam leaves by: room for a cable, not for light."""
    assert layout.enclosure is not None
    panel = layout.enclosure.panels[name]
    if panel.open:
        return
    for window in windows_of(layout.enclosure, layout, name, panel):
        (ox, oy), (c, s) = window.origin, window.along
        along = (at[0] - ox) * c + (at[1] - oy) * s
        start, end, low, high = window.box
        if start <= along <= end and low <= at[2] <= high:
            for overlap in _OVERLAPS_MM:
                yield _cover(layout, window, overlap, taken)


def _cover(layout: Layout, window: Window, overlap_mm: float, taken: Sequence[str]) -> Change:
    """Return a sheet inside of an opening, as far from it as a labyrinth's is."""
    assert layout.enclosure is not None
    panel = layout.enclosure.panels[window.name.partition(".")[0]]
    low, high = layout.enclosure.heights_mm(panel)
    thickness = material_of(layout, layout.enclosure.material_of(panel)).thickness_mm
    start = max(window.box[0] - overlap_mm, 0.0)
    end = min(window.box[1] + overlap_mm, panel.length_mm)
    top = min(high, _STEP_MM * ceil((window.box[3] + overlap_mm) / _STEP_MM))
    away = -(SPACING_MM + thickness)  # `place` counts outwards
    (ax, ay, _), (bx, by, _) = (window.place((along, 0.0), away) for along in (start, end))
    cover = unused_name("cover", [*layout.enclosure.panels, *layout.enclosure.lids, *taken])
    heights = f"from_height: {low:g}, to_height: {top:g}"
    value = f"{{from: [{ax:g}, {ay:g}], to: [{bx:g}, {by:g}], {heights}}}"
    words = (
        f"a sheet {SPACING_MM:g} mm inside of '{window.name}' that overlaps it by "
        f"{overlap_mm:g} mm stands in its way"
    )
    return Change("panel", words, (Edit(("enclosure", "panels"), cover, value),))


def _lid(layout: Layout, line: EnclosureLine, taken: Sequence[str]) -> Change:
    assert layout.enclosure is not None
    name = unused_name("lid", [*layout.enclosure.panels, *layout.enclosure.lids, *taken])
    outline = ", ".join(f"[{x:g}, {y:g}]" for x, y in line.corners)
    value = f"{{height: {line.top_mm:g}, outline: [{outline}]}}"
    words = f"a lid over the whole enclosure at {line.top_mm:g} mm stands in its way"
    return Change("lid", words, (Edit(("enclosure", "lids"), name, value),))
