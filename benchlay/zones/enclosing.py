"""The enclosure's line, and what passes over it."""

from __future__ import annotations

from typing import NamedTuple

import shapely
from shapely.geometry.base import BaseGeometry

from benchlay.layout.layout import Layout

_FEWEST = 2  # panels that make an enclosure
_CORNERS = 3

Place = tuple[float, float, float]


class Enclosing(NamedTuple):
    """The area within the panels, and the upper edge of every closed one.

    The area is the convex outline of the panels' ends, so that missing sides are closed by
    straight lines and the order in the file does not matter.
    """

    area: BaseGeometry
    edges: tuple[tuple[BaseGeometry, float], ...]

    def is_above(self, start: Place, end: Place) -> bool:
        """Whether a way ends over the area or starts beyond it, higher than every panel."""
        highest = max(top for _, top in self.edges)
        within = shapely.covers(self.area, shapely.points([start[:2], end[:2]])).tolist()
        return (start[2] >= highest and not within[0]) or (end[2] >= highest and within[1])

    def passes_over(self, start: Place, end: Place) -> bool:
        """Whether the way from start to end leaves the area above the panel that it crosses."""
        way = shapely.LineString([start[:2], end[:2]])
        for edge, top in self.edges:
            meets = shapely.intersection(way, edge)
            if shapely.is_empty(meets):
                continue
            share = shapely.line_locate_point(
                way, shapely.Point(shapely.get_coordinates(meets)[0]), normalized=True
            )
            if start[2] + share * (end[2] - start[2]) >= top:
                return True
        return False


def enclosing_line(layout: Layout) -> Enclosing | None:
    """Return the line of a layout's enclosure; None with fewer than two panels."""
    enclosure = layout.enclosure
    if enclosure is None:
        return None
    closed = [panel for panel in enclosure.panels.values() if not panel.open]
    corners = [
        point for panel in enclosure.panels.values() for point in (panel.from_mm, panel.to_mm)
    ]
    if len(enclosure.panels) < _FEWEST or len(set(corners)) < _CORNERS or not closed:
        return None
    edges = tuple(
        (shapely.LineString([panel.from_mm, panel.to_mm]), enclosure.heights_mm(panel)[1])
        for panel in closed
    )
    return Enclosing(shapely.convex_hull(shapely.MultiPoint(corners)), edges)
