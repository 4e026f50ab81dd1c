"""Layouts in a few lines, read, placed and traced down to a thousandth of the limit."""

import textwrap

import shapely
from scipy.optimize import brentq
from scipy.stats import ncx2

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


def half_width(w, share, radius=3.5):
    """How far off the axis of a round beam a circle still takes a share: by the noncentral
    chi-squared distribution, with a standard deviation of half the 1/e2 radius."""
    scale = (2.0 / w) ** 2

    def excess(d):
        return ncx2.cdf(radius**2 * scale, 2, d**2 * scale) - share

    return brentq(excess, 1e-6, radius + 5.0 * w, xtol=1e-9)
