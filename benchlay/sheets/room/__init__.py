"""Room plan: the bench in its room, who is where, how far hazards reach, where signs go."""

from __future__ import annotations

import itertools
import math
from collections.abc import Iterator, Sequence

import shapely
from shapely.geometry.base import BaseGeometry

from benchlay.hazards.model import Sign
from benchlay.layout.layout import Layout
from benchlay.layout.room import Room
from benchlay.named import NamedTuple
from benchlay.sheets.drafting.picture import title_fields
from benchlay.sheets.form import Form, form_for
from benchlay.sheets.hatching import hatch, region, rim
from benchlay.sheets.lettering import LARGE_MM, SMALL_MM, width_mm
from benchlay.sheets.primitives import (
    Across,
    Axis,
    Circle,
    Dimension,
    Line,
    Point,
    Polyline,
    Primitive,
    Sheet,
    Text,
    Up,
    figure,
    line_ends,
    measured,
)
from benchlay.sheets.room.furniture import door_drawn, marks_of, window_drawn
from benchlay.sheets.room.widths import WALK_MM, extent, overall, walkways
from benchlay.sheets.room.words import Places, box_of, leader
from benchlay.sheets.safety.marks import warning_mark
from benchlay.sheets.scale import SCALES, Window
from benchlay.sheets.shop.rows import MARKS_MM
from benchlay.sheets.tables import BETWEEN_MM, Column, Table, notes, table
from benchlay.sheets.title_block import TitleFields
from benchlay.zones.controlled import ControlledArea
from benchlay.zones.words import number

TITLE = "Room plan"
_COLUMN_MM = 108.0
_MARGIN_MM = 16.0
_HEADING_MM = 12.0
_SIZES = ("A3", "A2", "A1", "A0")
_READABLE = 20
_BAND_MM, _SPACING_MM = 6.0, 3.0
_MARK_MM = 5.0
_BENCH = "bench"  # needs no line that leads to it
_PERSON_MM = 250.0  # radius of what someone takes up (common practice)
_CHORDS = 24  # of a circle, for keeping words off it


class Subject(NamedTuple):
    """What a room plan shows."""

    layout: Layout
    areas: tuple[ControlledArea, ...]
    signs: tuple[Sign, ...]
    not_computed: tuple[str, ...] = ()


def room_sheet(subject: Subject, room: Room, sha256: str, sheet_number: str) -> Sheet:
    """Return the room plan."""
    layout = subject.layout
    decimal = "." if layout.drawing.decimal == "point" else ","
    fields = title_fields(layout, TITLE, sha256)._replace(sheet=sheet_number)
    low, high = extent(room)
    form, view, scale = _form(fields, (high[0] - low[0], high[1] - low[1]))
    origin = (
        (view.left + view.right) / 2 - (low[0] + high[0]) / 2 / scale,
        (view.low + view.high) / 2 - (low[1] + high[1]) / 2 / scale,
    )
    paper = [
        Text(
            "TITLE",
            (form.window.left, form.window.high - LARGE_MM),
            "Room, seen from above",
            LARGE_MM,
        ),
        *_column(subject, room, form.window, decimal),
    ]
    paper += _lettered(subject, room, _Board(form.window, origin, scale))
    return form.sheet(
        "room",
        "Room with bench, doors, windows, people, the controlled area and the places of signs",
        model=list(_drawn(subject, room, scale)),
        paper=paper,
        scale=scale,
        origin_mm=origin,
        properties=(("drawing number", layout.drawing.number), ("layout sha256", sha256)),
        decimal=decimal,
    )


def _form(fields: TitleFields, size: Point) -> tuple[Form, Window, int]:
    for paper in _SIZES:
        form = form_for(fields, size=paper)
        left, foot, right, top = form.window
        view = Window(
            left + _MARGIN_MM,
            foot + _MARGIN_MM,
            right - _COLUMN_MM - _MARGIN_MM,
            top - _HEADING_MM - _MARGIN_MM,
        )
        fits = [n for n in SCALES if size[0] <= view.width * n and size[1] <= view.height * n]
        if fits and (fits[0] <= _READABLE or paper == _SIZES[-1]):
            break
    scale = fits[0] if fits else SCALES[-1]
    return form_for(fields._replace(scale=f"1:{scale}"), size=paper), view, scale


def _drawn(subject: Subject, room: Room, scale: int) -> Iterator[Primitive]:
    layout = subject.layout
    yield Polyline("PANELS", tuple(room.outline), closed=True)
    yield Polyline("BENCH", tuple(layout.bench.outline), closed=True)
    if layout.enclosure is not None:
        for name in sorted(layout.enclosure.panels):
            panel = layout.enclosure.panels[name]
            yield Line("PANELS", panel.from_mm, panel.to_mm)
    yield from _hazard(subject.areas, room, scale)
    inside = shapely.Polygon(room.outline)
    for name in sorted(room.doors):
        door = room.doors[name]
        yield from door_drawn(door.from_mm, door.to_mm, inside, scale)
    for name in sorted(room.windows):
        window = room.windows[name]
        yield from window_drawn(window.from_mm, window.to_mm, scale)
    for name in sorted(room.people):
        yield Circle("BODIES", room.people[name].at_mm, _PERSON_MM)
    yield from walkways(layout, room)
    yield from overall(room, scale)


def _middle(corners: Sequence[Point]) -> Point:
    at = shapely.Polygon(corners).representative_point()
    return at.x, at.y


class _Board(NamedTuple):
    """Where the plan lies on the paper."""

    window: Window
    origin: Point
    scale: int

    def on_paper(self, point: Point) -> Point:
        """Return where a point of the plan lies."""
        return self.origin[0] + point[0] / self.scale, self.origin[1] + point[1] / self.scale


def _lettered(subject: Subject, room: Room, board: _Board) -> Iterator[Primitive]:
    """Write names and set signs, on paper, each where there is room beside its thing."""
    field = board.window._replace(
        right=board.window.right - _COLUMN_MM, high=board.window.high - _HEADING_MM
    )
    places = Places(field)
    for dimension in (*walkways(subject.layout, room), *overall(room, board.scale)):
        places.take(_figure_box(dimension, board))
    for primitive in _drawn(subject, room, board.scale):
        for start, end in _edges(primitive):
            places.take_line(board.on_paper(start), board.on_paper(end))
    for at, numbers in marks_of(subject.layout, room, subject.signs):
        words, anchor = " ".join(numbers), board.on_paper(at)
        width = _MARK_MM + 1.0 + width_mm(words, SMALL_MM)
        x, y = places.put(anchor, width, _MARK_MM)
        yield from leader("TAGS", anchor, (x, y), width, _MARK_MM)
        yield from warning_mark((x - width / 2 + _MARK_MM / 2, y), _MARK_MM, words)
    for at, words in _names(subject.layout, room):
        anchor = board.on_paper(at)
        width = width_mm(words, SMALL_MM)
        place = places.put(anchor, width, SMALL_MM)
        if words != _BENCH:
            yield from leader("TAGS", anchor, place, width, SMALL_MM)
        yield Text("TAGS", place, words, SMALL_MM, Across.CENTRE, Up.MIDDLE)


def _edges(primitive: Primitive) -> list[tuple[Point, Point]]:
    """Return the lines that words keep off; hatching may have words in it."""
    if isinstance(primitive, Polyline):
        after = (*primitive.points[1:], primitive.points[0])
        return list(zip(primitive.points, after, strict=True))
    if isinstance(primitive, Line) and primitive.layer != "HAZARD":
        return [(primitive.start, primitive.end)]
    if isinstance(primitive, Circle):
        (x, y), r = primitive.centre, primitive.radius
        turns = [math.tau * n / _CHORDS for n in range(_CHORDS + 1)]
        ring = [(x + r * math.cos(t), y + r * math.sin(t)) for t in turns]
        return list(itertools.pairwise(ring))
    if isinstance(primitive, Dimension):
        return [line_ends(primitive)]
    return []


def _names(layout: Layout, room: Room) -> Iterator[tuple[Point, str]]:
    for name in sorted(room.people):
        yield room.people[name].at_mm, f"{name}, {room.people[name].eyes}"
    for kind, things in (("door", room.doors), ("window", room.windows)):
        for name in sorted(things):
            (ax, ay), (bx, by) = things[name].from_mm, things[name].to_mm
            yield ((ax + bx) / 2, (ay + by) / 2), f"{kind} {name}"
    yield _middle(layout.bench.outline), _BENCH


def _figure_box(dimension: Dimension, board: _Board) -> Window:
    """Return the box round the figure of a dimension along x or y."""
    (ax, ay), (bx, by) = (board.on_paper(p) for p in line_ends(dimension))
    words = figure(measured(dimension), dimension.decimals, ".")
    lift = 1.0 + dimension.height_mm / 2
    upright = dimension.axis is Axis.VERTICAL
    at = ((ax + bx) / 2 - (lift if upright else 0.0), (ay + by) / 2 + (0.0 if upright else lift))
    return box_of(at, words, dimension.height_mm + 1.0, turned=upright)


def _hazard(areas: Sequence[ControlledArea], room: Room, scale: int) -> Iterator[Primitive]:
    """Draw the limit of the controlled area and hatch its rim, as far as the room goes."""
    whole = shapely.union_all([region(area.polygon) for area in areas])
    within: BaseGeometry = shapely.intersection(whole, shapely.Polygon(room.outline))
    for polygon in shapely.get_parts(within):
        if polygon.geom_type != "Polygon":
            continue
        for ring in (polygon.exterior, *polygon.interiors):
            points = tuple((float(x), float(y)) for x, y in ring.coords[:-1])
            yield Polyline("HAZARD", points, closed=True)
    yield from hatch("HAZARD", rim(within, _BAND_MM * scale), _SPACING_MM * scale, 45.0)


_SIGNS = (Column("Sign", 14.0), Column("Where", 62.0), Column("Label, mm", 28.0))
_AREAS = (Column("State", 34.0), Column("Wavelengths", 44.0), Column("Area, m²", 26.0))


def _column(subject: Subject, room: Room, window: Window, decimal: str) -> list[Primitive]:
    places = Window(window.right - _COLUMN_MM, window.low, window.right - MARKS_MM, window.high)
    drawn = notes("NOTES", list(_notes(subject, room, decimal)), places, "the safety sheet")
    out = [*drawn.primitives]
    areas = tuple(
        (
            area.state,
            ", ".join(f"{figure(nm, 4, decimal)} nm" for nm in area.wavelengths_nm),
            number(area.area_m2, 2, decimal),
        )
        for area in subject.areas
    )
    signs = tuple(
        (sign.number, sign.place, " x ".join(figure(v, 0, decimal) for v in sign.size_mm))
        for sign in subject.signs
    )
    for heading, columns, rows in (
        ("CONTROLLED AREA", _AREAS, areas),
        ("SIGNS", _SIGNS, signs),
    ):
        if rows:
            places = places._replace(high=drawn.foot - BETWEEN_MM)
            drawn = table(Table(heading, columns, rows, "the safety sheet"), places)
            out += drawn.primitives
    return out


def _notes(subject: Subject, room: Room, decimal: str) -> Iterator[str]:
    states = list(dict.fromkeys(area.state for area in subject.areas))
    if states:
        yield (
            f"Hatched: the controlled area, states {', '.join(states)} together: where light of "
            "one beam or of a scattering surface exceeds the exposure limit, in plan, whatever the "
            "height, as far as the walls. Other states may reach farther: see the safety sheet."
        )
    else:
        yield "No hazard zone was found in the state drawn, as modelled; see the safety sheet."
    yield from (f"Not computed: {words}." for words in subject.not_computed)
    yield "Triangles: places of labels and signs; their texts stand on the safety sheet."
    narrow = [
        f"{d.axis.value} {figure(math.dist(d.first, d.second), 0, decimal)}"
        for d in walkways(subject.layout, room)
        if 1.0 < math.dist(d.first, d.second) < WALK_MM
    ]
    yield (
        "Figures beside the bench: clear width to the wall, furniture not counted"
        + (
            f"; narrower than {WALK_MM:g}, which two people need to pass: {', '.join(narrow)}."
            if narrow
            else "."
        )
    )
    yield "Doors open into the room in this drawing; the layout does not say which way they do."
