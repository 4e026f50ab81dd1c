"""Bench, holes, panels and lids of a layout as a plan shows them."""

from __future__ import annotations

import math

from benchlay.layout.enclosure import Enclosure, Panel
from benchlay.layout.layout import Layout
from benchlay.layout.materials import SHEET
from benchlay.sheets.contents import Holes, LidOutline, Opening, PanelLine

_ON_EDGE = 1e-9  # of a pitch: a hole on the edge of the bench is none


def holes_of(layout: Layout) -> Holes | None:
    """Return the grid of holes: as many as lie within the bench's extent."""
    grid = layout.bench.holes
    if grid is None:
        return None
    xs, ys = zip(*layout.bench.outline, strict=True)
    columns, rows = (
        max(1, math.ceil((max(values) - first) / grid.pitch_mm - _ON_EDGE))
        for values, first in ((xs, grid.first_mm[0]), (ys, grid.first_mm[1]))
    )
    return Holes(grid.first_mm, grid.pitch_mm, columns, rows, grid.thread)


def panels_of(layout: Layout) -> tuple[PanelLine, ...]:
    """Return all panels in name order."""
    enclosure = layout.enclosure
    if enclosure is None:
        return ()
    return tuple(
        _panel(name, enclosure.panels[name], enclosure, layout) for name in sorted(enclosure.panels)
    )


def _panel(name: str, panel: Panel, enclosure: Enclosure, layout: Layout) -> PanelLine:
    material = enclosure.material_of(panel)
    sheet = SHEET if material is None else layout.materials[material]
    openings = tuple(
        Opening(key, *opening.box_mm()[:2]) for key, opening in sorted(panel.openings.items())
    )
    return PanelLine(
        name,
        panel.from_mm,
        panel.to_mm,
        sheet.thickness_mm,
        openings,
        panel.open,
        panel.access,
    )


def lids_of(layout: Layout) -> tuple[LidOutline, ...]:
    """Return all lids in name order."""
    enclosure = layout.enclosure
    if enclosure is None:
        return ()
    return tuple(
        LidOutline(name, tuple(lid.outline), lid.height_mm, lid.open, lid.access)
        for name, lid in sorted(enclosure.lids.items())
    )
