"""An enclosure as it stands in a state: its line, what stops light, and what of it is open."""

from __future__ import annotations

from collections.abc import Iterator
from math import dist, hypot
from typing import TypeAlias

from benchlay.coverage.blockers import Blocker, Place, Prism, Window
from benchlay.coverage.planar import Convex, Pair, less
from benchlay.geometry.polygon import convex_pieces, is_convex, signed_area
from benchlay.layout.enclosure import Enclosure, Panel
from benchlay.layout.layout import Layout
from benchlay.named import NamedTuple
from benchlay.scene.surroundings import BENCH_THICKNESS_MM, material_of
from benchlay.zones.enclosure_line import EnclosureLine, Side, enclosure_line, inside

_Box: TypeAlias = tuple[float, float, float, float]
_ROUNDING_MM = 1e-6
_ENDLESS_MM = 1e5
_AT_WALL_MM = 0.5  # a panel that ends this near to a wall of the room is meant to end at it


class OpenLid(NamedTuple):
    """A lid that is off: its convex pieces in space."""

    name: str
    height_mm: float
    pieces: tuple[tuple[Pair, ...], ...]


class Enclosed(NamedTuple):
    """What encloses a bench in one state.

    Attributes
    ----------
    layout : Layout
    line : EnclosureLine
    convex : bool
        Whether the line is a convex polygon.
    bottom_mm, top_mm : float
        Between these heights the line's sides are looked at.
    blockers : tuple of Blocker
        Panels and lids that are shut, the bench top, walls of the room that close a side.
    closed : frozenset of str
        Openings that an element fills.
    roofless, floorless : tuple of Convex
        Parts of the line's area that no lid covers (open or shut), and no bench top.
    lids_off : tuple of OpenLid
    """

    layout: Layout
    line: EnclosureLine
    convex: bool
    bottom_mm: float
    top_mm: float
    blockers: tuple[Blocker, ...]
    closed: frozenset[str]
    roofless: tuple[Convex, ...]
    floorless: tuple[Convex, ...]
    lids_off: tuple[OpenLid, ...]

    @property
    def enclosure(self) -> Enclosure:
        """The enclosure; one is there wherever something is enclosed."""
        assert self.layout.enclosure is not None
        return self.layout.enclosure

    def holds(self, place: Place) -> bool:
        """Whether a place lies within the line, below its top."""
        return self.bottom_mm <= place[2] < self.top_mm and inside(self.line, place[:2])

    def neighbours(self, number: int) -> tuple[str, str] | None:
        """Return the panels before and after a side; None where there are none."""
        sides = self.line.sides
        before = next((s.panel for s in _round(sides, number, -1) if s.panel), None)
        after = next((s.panel for s in _round(sides, number, 1) if s.panel), None)
        return (before, after) if before and after else None


def enclosed_of(layout: Layout, closed: frozenset[str] = frozenset()) -> Enclosed | None:
    """Return what encloses a layout; None without panels and lids.

    `closed` names the openings ("east.port") that an element fills.
    """
    enclosure = layout.enclosure
    if enclosure is None or not (enclosure.panels or enclosure.lids):
        return None
    line = enclosure_line(layout)
    corners = line.corners if signed_area(line.corners) > 0.0 else line.corners[::-1]
    heights = [enclosure.heights_mm(panel) for panel in enclosure.panels.values()]
    lids = sorted(enclosure.lids.items())
    tops = [high for _, high in heights] + [lid.height_mm for _, lid in lids]
    area: list[Convex] = [list(piece) for piece in convex_pieces(corners)]
    roofless, floorless = area, area
    lids_off = []
    for name, lid in lids:
        pieces = convex_pieces(lid.outline)
        if lid.open:
            lids_off.append(OpenLid(name, lid.height_mm, pieces))
        for piece in pieces:
            roofless = less(roofless, piece)
    for piece in convex_pieces(layout.bench.outline):
        floorless = less(floorless, piece)
    return Enclosed(
        layout=layout,
        line=line,
        convex=is_convex(corners),
        bottom_mm=min([0.0, *(low for low, _ in heights)]),
        top_mm=max(tops),
        blockers=tuple(_blockers(layout, enclosure, line)),
        closed=closed,
        roofless=tuple(roofless),
        floorless=tuple(floorless),
        lids_off=tuple(lids_off),
    )


def passage_mm(enclosure: Enclosure, layout: Layout, panel: Panel, depth_mm: float) -> float:
    """Return how long the way through an opening is: its duct, or the sheet if that is thicker."""
    return max(material_of(layout, enclosure.material_of(panel)).thickness_mm, depth_mm)


def windows_of(enclosure: Enclosure, layout: Layout, name: str, panel: Panel) -> tuple[Window, ...]:
    """Return the openings of a panel."""
    (x0, y0), (x1, y1) = panel.from_mm, panel.to_mm
    along = ((x1 - x0) / panel.length_mm, (y1 - y0) / panel.length_mm)
    low, high = enclosure.heights_mm(panel)
    edges = (0.0, panel.length_mm, low, high)
    found = []
    for key, opening in sorted(panel.openings.items()):
        box, depth = opening.box_mm(), passage_mm(enclosure, layout, panel, opening.depth_mm)
        whole = opening.round or opening.depth_mm > 0.0  # a duct has walls all round
        clear = box if whole else _drawn_out(box, edges)
        mouth = (panel.from_mm, along, box, opening.round, depth, clear)
        found.append(Window(f"{name}.{key}", *mouth))
    return tuple(found)


def _drawn_out(box: _Box, edges: _Box) -> _Box:
    """Draw a box out without end where it reaches an edge."""
    start, end, low, high = (
        (value - _ENDLESS_MM, value + _ENDLESS_MM)[number % 2]
        if abs(value - edge) < _ROUNDING_MM
        else value
        for number, (value, edge) in enumerate(zip(box, edges, strict=True))
    )
    return start, end, low, high


def _blockers(layout: Layout, enclosure: Enclosure, line: EnclosureLine) -> Iterator[Prism]:
    for name, panel in sorted(enclosure.panels.items()):
        if not panel.open:
            thickness = material_of(layout, enclosure.material_of(panel)).thickness_mm
            yield _sheet(name, panel.from_mm, panel.to_mm, thickness)._replace(
                low_mm=enclosure.heights_mm(panel)[0],
                high_mm=enclosure.heights_mm(panel)[1],
                windows=windows_of(enclosure, layout, name, panel),
            )
    for name, lid in sorted(enclosure.lids.items()):
        thickness = material_of(layout, enclosure.material_of(lid)).thickness_mm
        for piece in convex_pieces(lid.outline) if not lid.open else ():
            yield Prism(name, piece, lid.height_mm, lid.height_mm + thickness)
    for piece in convex_pieces(layout.bench.outline):
        yield Prism("bench", piece, -BENCH_THICKNESS_MM, 0.0)
    yield from _walls(layout, line)


def _sheet(name: str, start: Pair, end: Pair, thickness_mm: float) -> Prism:
    """Return an upright sheet over its inner face; the thickness goes outwards."""
    length = dist(start, end)
    x, y = (end[1] - start[1]) / length, -(end[0] - start[0]) / length
    far = [(px + thickness_mm * x, py + thickness_mm * y) for px, py in (start, end)]
    return Prism(name, (start, far[0], far[1], end), 0.0, 0.0)


def _walls(layout: Layout, line: EnclosureLine) -> Iterator[Prism]:
    """Yield the walls of the room that close a side of the line where no panel stands."""
    for side in line.sides:
        if layout.room is not None and side.panel is None and at_wall(layout, side):
            floor = -layout.bench.surface_height_mm
            wall = _sheet("wall", side.start, side.end, 100.0)
            yield wall._replace(low_mm=floor, high_mm=floor + layout.room.height_mm)


def at_wall(layout: Layout, side: Side) -> bool:
    """Whether a wall of the room closes a side of the enclosure.

    A wall further away does not count: people stand between.
    """
    if layout.room is None:
        return False
    corners = layout.room.outline
    return any(
        all(from_line(point, start, end) <= _AT_WALL_MM for point in (side.start, side.end))
        for start, end in zip(corners, corners[1:] + corners[:1], strict=True)
    )


def from_line(point: Pair, start: Pair, end: Pair) -> float:
    """Return the distance of a point from a segment."""
    x, y = end[0] - start[0], end[1] - start[1]
    share = ((point[0] - start[0]) * x + (point[1] - start[1]) * y) / (x * x + y * y)
    share = min(1.0, max(0.0, share))
    return hypot(point[0] - start[0] - share * x, point[1] - start[1] - share * y)


def _round(sides: tuple[Side, ...], number: int, step: int) -> Iterator[Side]:
    for count in range(1, len(sides)):
        yield sides[(number + step * count) % len(sides)]
