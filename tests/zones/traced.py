"""Layouts in a few lines, read, placed and traced down to a thousandth of the limit."""

import textwrap

import shapely

from benchlay.document.problems import Problems
from benchlay.layout import read_layout
from benchlay.placing import place
from benchlay.tracing import trace


def traced(text, floor=1e-9):
    layouts, problems = read_layout(textwrap.dedent(text), "bench.yaml")
    assert layouts is not None, [str(p) for p in problems.sorted()]
    problems = Problems()
    placed = place(layouts, problems)
    assert placed is not None, [str(p) for p in problems.sorted()]
    lines = [line for s in layouts.as_drawn.sources.values() for line in s.lines]
    return trace(placed, {line.wavelength_nm: floor for line in lines})


def area_of(zones, kind=None):
    """All zones (of a kind) as one area."""
    return shapely.union_all(
        [
            shapely.Polygon(zone.polygon[0], zone.polygon[1:])
            for zone in zones.zones
            if kind in (None, zone.kind)
        ]
    )
