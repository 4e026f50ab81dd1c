"""What passes over the enclosure: its line as an area, and how high each panel stands."""

from __future__ import annotations

import shapely
from shapely.geometry.base import BaseGeometry

from benchlay.layout.layout import Layout
from benchlay.named import NamedTuple
from benchlay.zones.enclosure_line import enclosure_line

Place = tuple[float, float, float]


class Enclosing(NamedTuple):
    """The area within the enclosure's line, and the upper edge of every closed panel."""

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


def enclosing_of(layout: Layout) -> Enclosing | None:
    """Return what a layout's panels enclose; None where they enclose nothing."""
    enclosure, line = layout.enclosure, enclosure_line(layout)
    if enclosure is None or not line.enclosed:
        return None
    area = shapely.Polygon(line.corners)
    edges = tuple(
        (shapely.LineString([panel.from_mm, panel.to_mm]), enclosure.heights_mm(panel)[1])
        for panel in enclosure.panels.values()
        if not panel.open
    )
    return Enclosing(area, edges) if edges and area.area > 0.0 else None
