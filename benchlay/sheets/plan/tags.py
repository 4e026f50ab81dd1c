"""Tags and heights: every element, beam and zone says its name, clear of everything else."""

from __future__ import annotations

import math
from collections.abc import Iterable, Iterator, Mapping

import shapely
from shapely.geometry.base import BaseGeometry

from benchlay.named import NamedTuple
from benchlay.sheets.contents import SOURCE, Item, Leg, LidOutline, PanelLine, Picture, Zone
from benchlay.sheets.lettering import MIDDLE_MM, SMALL_MM, plain
from benchlay.sheets.placing_text import Place
from benchlay.sheets.plan.beams import clipped, layer_of
from benchlay.sheets.plan.bench import ARROW_MM
from benchlay.sheets.plan.board import Board
from benchlay.sheets.plan.gaps import anchors
from benchlay.sheets.plan.items import placed, straightened
from benchlay.sheets.plan.panels import lid_line, point_on
from benchlay.sheets.plan.tag_shapes import Wanted, cross, drawn, size_of
from benchlay.sheets.plan.zones import seen
from benchlay.sheets.primitives import (
    Point,
    Primitive,
    figure,
)
from benchlay.sheets.scale import Window

_ON_LEG = (0.5, 0.3, 0.7, 0.15, 0.85)
_LEVEL_MM = 1e-3  # heights that differ by less are the same to every reader
_FAR_MM = 3.0  # a tag farther from its item than this points to it
_CLEARLY_MM = 1.5  # and one that is not nearer to its own item by this


class Tagged(NamedTuple):
    """What was drawn on paper, and the names for which there was no room."""

    paper: tuple[Primitive, ...]
    left_out: tuple[str, ...]
    off_sheet: tuple[str, ...]  # names of what lies beyond the sheet's edge


def tags(picture: Picture, board: Board) -> Tagged:
    """Place and draw every tag, most needed first."""
    out: list[Primitive] = []
    left_out: list[str] = []
    off_sheet: list[str] = []
    shapes = {item.name: _on_paper(item, board) for item in picture.items}
    wanted = [
        *_datum_tag(picture, board),
        *(_item_tag(item, picture, board) for item in picture.items),
        *_leg_tags(picture, board, stray=False),
        *_panel_tags(picture, board),
        *_gap_tags(picture, board),
        *_zone_tags(picture, board),
        *_leg_tags(picture, board, stray=True),
    ]
    for item in picture.items:
        if _height_written(item, picture):
            out += cross(board.on_paper(item.at))
    for tag in wanted:
        if not tag.anchors:
            off_sheet.append(tag.name)
            continue
        place = _place(tag, board)
        if place is None:
            left_out.append(tag.name)
        else:
            out += drawn(tag, _pointed(tag, place, shapes))
    return Tagged(tuple(out), tuple(dict.fromkeys(left_out)), tuple(dict.fromkeys(off_sheet)))


def _place(tag: Wanted, board: Board) -> Place | None:
    size = size_of(tag)
    if tag.within is not None:
        x, y = ((tag.within[n] + tag.within[n + 2]) / 2 for n in (0, 1))
        box = Window(x - size[0] / 2, y - size[1] / 2, x + size[0] / 2, y + size[1] / 2)
        if board.crowd.take(box):
            board.crowd.add_box(tag.within)  # no other tag stands in the body
            return Place(box, None)
    return board.crowd.place(size, tag.anchors)


def _on_paper(item: Item, board: Board) -> BaseGeometry:
    """Return what of an item tags may be taken to name: its outline, else its body, on paper."""
    shapes = [straightened(shape) for shape in item.outlines or item.bodies]
    lines = shapes or [list(line) for line in item.lines] or [[(0.0, 0.0)]]
    points = [[board.on_paper(placed(item, p)) for p in line] for line in lines]
    return shapely.union_all([shapely.MultiPoint(line).convex_hull for line in points])


def _pointed(tag: Wanted, place: Place, shapes: Mapping[str, BaseGeometry]) -> Place:
    """Give an item's tag a leader where it is far from its item, or nearer to another."""
    own = shapes.get(tag.name)
    if own is None or place.leader is not None:
        return place
    box = shapely.box(*place.box)
    away = float(shapely.distance(own, box))
    nearest = min(
        (shapely.distance(other, box) for name, other in shapes.items() if name != tag.name),
        default=math.inf,
    )
    if away < min(_FAR_MM, nearest - _CLEARLY_MM):
        return place
    (ax, ay), (bx, by) = shapely.shortest_line(own, box).coords
    return place._replace(leader=((ax, ay), (bx, by)))


def _height_written(item: Item, picture: Picture) -> bool:
    """Heights stand where light starts, and wherever they are not the bench's own."""
    own = abs(item.at[2] - picture.beam_height_mm) <= _LEVEL_MM
    return item.kind == SOURCE or not own


def _datum_tag(picture: Picture, board: Board) -> Iterator[Wanted]:
    if picture.holes is not None and picture.shows(picture.holes.first[0]):
        lines = (("DATUM", "datum, hole 1-1", SMALL_MM),)
        x, y = board.on_paper(picture.holes.first)
        yield Wanted("datum", lines, "", "DATUM", (((x, y), 3.0),))
        for name, end in (("X", (x + ARROW_MM, y)), ("Y", (x, y + ARROW_MM))):
            letter = (("DATUM", name, SMALL_MM),)
            yield Wanted(f"axis {name}", letter, "", "DATUM", ((end, 0.0),))


def _panel_tags(picture: Picture, board: Board) -> Iterator[Wanted]:
    """Name every panel and every opening in it."""
    for panel in picture.panels:
        length = math.dist(panel.start, panel.end)
        words = _sheet_words(panel.name, panel)
        shares = [length * share for share in _ON_LEG]
        yield _panel_tag(words, panel, shares, board)
        for opening in panel.openings:
            middle = (opening.start_mm + opening.end_mm) / 2
            yield _panel_tag(f"{panel.name}.{opening.name}", panel, [middle], board)

    for lid in picture.lids:
        words = _sheet_words(f"lid {lid.name} +{figure(lid.height_mm, 1, picture.decimal)}", lid)
        corners = [board.on_paper(p) for p in lid_line(lid, board)]
        edges = zip(corners, (*corners[1:], corners[0]), strict=True)
        anchors = tuple(_between(edge, share) for edge in edges for share in _ON_LEG)
        yield Wanted(words, (("TAGS", plain(words), SMALL_MM),), "", "TAGS", anchors)


def _gap_tags(picture: Picture, board: Board) -> Iterator[Wanted]:
    for gap in picture.gaps:
        lines = (("HAZARD", plain(gap.label), SMALL_MM),)
        yield Wanted(gap.name, lines, "square", "HAZARD", tuple(anchors(gap, board)))


def _sheet_words(name: str, sheet: PanelLine | LidOutline) -> str:
    """Return the tag of a panel or lid: how it may be opened, and whether it stands open."""
    access = {"none": "", "tool": ", by tool", "interlocked": ", interlocked"}[sheet.access]
    return f"{name}{access}{' (open)' if sheet.is_open else ''}"


def _between(edge: tuple[Point, Point], share: float) -> tuple[Point, float]:
    (ax, ay), (bx, by) = edge
    return (ax + share * (bx - ax), ay + share * (by - ay)), 0.0


def _panel_tag(words: str, panel: PanelLine, along: Iterable[float], board: Board) -> Wanted:
    lines = (("TAGS", plain(words), SMALL_MM),)
    places = (board.on_paper(point_on(panel, s, panel.thickness_mm)) for s in along)
    return Wanted(words, lines, "", "TAGS", tuple((at, 1.0) for at in places))


def _item_tag(item: Item, picture: Picture, board: Board) -> Wanted:
    lines = [("TAGS", plain(item.name), MIDDLE_MM)]
    if _height_written(item, picture):
        level = figure(item.at[2], 2, picture.decimal)
        lines.append(("LEVELS", level if level[0] in "-0" else f"+{level}", SMALL_MM))
    shapes = item.outlines or item.bodies
    points = [placed(item, p) for shape in shapes for p in straightened(shape)]
    on_paper = [board.on_paper(p) for p in points] or [board.on_paper(item.at)]
    xs, ys = [p[0] for p in on_paper], [p[1] for p in on_paper]
    middle = ((min(xs) + max(xs)) / 2, (min(ys) + max(ys)) / 2)
    reach = min(max(math.dist(middle, p) for p in on_paper), 12.0)
    anchors = [(middle, 0.6 * reach), (middle, reach)]
    within = None if item.outlines else Window(min(xs), min(ys), max(xs), max(ys))
    return Wanted(item.name, tuple(lines), "", "TAGS", tuple(anchors), within)


def _leg_tags(picture: Picture, board: Board, *, stray: bool) -> Iterator[Wanted]:
    for leg in picture.legs:
        if leg.words and leg.stray is stray:
            lines = tuple(("TAGS", plain(part), SMALL_MM) for part in leg.words.split("\n"))
            border = "rounded" if stray else "square"
            anchors = tuple(_on_leg(leg, board))
            layer = layer_of(leg) if stray else "TAGS"
            yield Wanted(leg.name, lines, border, layer, anchors)


def _on_leg(leg: Leg, board: Board) -> Iterator[tuple[Point, float]]:
    part = clipped(leg.start[:2], leg.end[:2], board.field_in_model())
    if part is None:
        return
    ends = (board.on_paper(part[0]), board.on_paper(part[1]))
    for share in _ON_LEG:
        yield _between(ends, share)


def _zone_tags(picture: Picture, board: Board) -> Iterator[Wanted]:
    for zone in picture.zones:
        lines = tuple(("HAZARD", plain(words), SMALL_MM) for words in zone.label)
        yield Wanted(zone.name, lines, "zone", "HAZARD", tuple(_in_zone(zone, board)))


def _in_zone(zone: Zone, board: Board) -> Iterator[tuple[Point, float]]:
    area = seen(zone, board)
    if shapely.is_empty(area):
        return
    inner = shapely.point_on_surface(area)
    yield board.on_paper((inner.x, inner.y)), 0.0
    edge = shapely.boundary(area)
    for share in (0.1, 0.35, 0.6, 0.85):
        at = shapely.line_interpolate_point(shapely.get_parts(edge)[0], share, normalized=True)
        yield board.on_paper((at.x, at.y)), 0.0


def untagged(tagged: Tagged) -> Iterator[str]:
    """Return the notes that name what bears no tag."""
    if tagged.left_out:
        yield f"Not tagged for want of room: {', '.join(tagged.left_out)}."
    if tagged.off_sheet:
        yield f"Beyond the edge of this sheet: {', '.join(tagged.off_sheet)}."
