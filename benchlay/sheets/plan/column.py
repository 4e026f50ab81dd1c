"""The column at the right of a plan: revisions, legend, zones, elements, notes."""

from __future__ import annotations

from collections.abc import Iterator

from benchlay.named import NamedTuple
from benchlay.sheets.contents import Picture
from benchlay.sheets.layers import beam_layer
from benchlay.sheets.lettering import MIDDLE_MM, SMALL_MM, shorten
from benchlay.sheets.plan.balloons import findings_table
from benchlay.sheets.plan.beams import DUMPS, LEAVES, STOPS, end_mark
from benchlay.sheets.plan.bench import USED_MM
from benchlay.sheets.plan.board import Board
from benchlay.sheets.plan.elements import elements_table
from benchlay.sheets.plan.warning import signs_table
from benchlay.sheets.primitives import (
    Circle,
    Fill,
    Line,
    Point,
    Polyline,
    Primitive,
    Text,
)
from benchlay.sheets.scale import Window
from benchlay.sheets.tables import BETWEEN_MM, Column, Drawn, Table, notes, table

_SAMPLE_MM = 22.0
_ROW_MM = 5.2
_LEAST_MM = 24.0  # what a table must have to be begun
_NOTES_SHARE = 0.3  # of the column, kept for notes

_NOTES = (Column("No.", 11.0), Column("Note", 97.0))
_ZONES = (Column("No.", 11.0), Column("Zone, and what it assumes", 97.0))
_REVISIONS = (
    Column("Rev", 11.0),
    Column("Date", 24.0),
    Column("Change", 57.0),
    Column("By", 16.0),
)


class Filled(NamedTuple):
    """The column, and the tables that found no room in it, or not for all their rows."""

    primitives: tuple[Primitive, ...]
    rest: tuple[Table, ...]


def column(picture: Picture, board: Board, all_notes: list[str]) -> Filled:
    """Draw the column; whatever is too long says where the rest is."""
    out: list[Primitive] = []
    rest: list[Table] = []
    room = board.column
    least = room.low + _NOTES_SHARE * room.height
    elsewhere = f"sheet {picture.name}-2"

    def put(drawn: Drawn) -> None:
        nonlocal room
        out.extend(drawn.primitives)
        room = room._replace(high=drawn.foot - BETWEEN_MM)

    def put_table(content: Table, low: float) -> None:
        content = content._replace(elsewhere=elsewhere)
        if room.high - low < _LEAST_MM:
            rest.append(content)
            return
        drawn = table(content, room._replace(low=low))
        put(drawn)
        if drawn.missing:
            rest.append(content)

    if picture.revisions:
        put_table(_revisions(picture), room.high - room.height / 5)
    put(_legend(picture, room))
    for content in _tables(picture):
        put_table(content, least)
    if board.strip is None and picture.items:
        rest.append(elements_table(picture, picture.items))
    if rest:
        heads = ", ".join(content.heading.capitalize() for content in rest)
        all_notes = [f"In full on {elsewhere}: {heads}.", *all_notes]
    drawn = notes("NOTES", all_notes, room, elsewhere)
    if drawn.missing:
        rows = tuple((str(n), note) for n, note in enumerate(all_notes, start=1))
        rest.append(Table("NOTES", _NOTES, rows, elsewhere, "NOTES"))
    put(drawn)
    return Filled(tuple(out), tuple(rest))


def _tables(picture: Picture) -> Iterator[Table]:
    """Yield what stands between legend and notes, as far as there is anything to say."""
    if picture.zones:
        rows = tuple((zone.name, "; ".join(zone.schedule)) for zone in picture.zones)
        words = picture.zones_are
        columns = (_ZONES[0], _ZONES[1]._replace(heading=words.head))
        yield Table(words.title, columns, rows, "", most_lines=4)
    if picture.findings:
        yield findings_table(picture.findings)
    if picture.signs:
        yield signs_table(picture)


def _revisions(picture: Picture) -> Table:
    return Table("REVISIONS", _REVISIONS, tuple(picture.revisions), "", "REVISION")


def _legend(picture: Picture, room: Window) -> Drawn:
    out: list[Primitive] = []
    y = room.high - MIDDLE_MM
    out.append(Text("TABLES", (room.left, y), "LEGEND", MIDDLE_MM))
    y -= 1.0
    for words, sample in _samples(picture, room.left):
        y -= _ROW_MM
        out += [_shifted(primitive, y + SMALL_MM / 2) for primitive in sample]
        words = shorten(words, room.width - _SAMPLE_MM - 2.0, SMALL_MM)
        out.append(Text("TABLES", (room.left + _SAMPLE_MM + 2.0, y), words, SMALL_MM))
    return Drawn(tuple(out), y)


def _samples(picture: Picture, x: float) -> Iterator[tuple[str, list[Primitive]]]:
    """Return the legend's rows: words, and a sample about y = 0."""
    right = x + _SAMPLE_MM
    middle = (x + right) / 2
    for entry in picture.legend:
        layer = beam_layer(entry.wavelength_nm)
        arrow = ((middle + 2.0, 0.0), (middle - 2.0, 1.2), (middle - 2.0, -1.2))
        yield entry.words, [Line(layer, (x, 0.0), (right, 0.0)), Fill(layer, arrow)]
    if any(leg.stray for leg in picture.legs):
        yield "stray light, off every route", _stray_sample(x, right)
        sinks = {leg.ends for leg in picture.legs if leg.stray and not leg.weak}
        for sink, words in ((sink, words) for sink, words, all_ in _ENDS if all_ & sinks):
            mark = list(end_mark("STRAY", sink, (x, 0.0), (right - 3.0, 0.0), 1.0))
            yield words, [Line("STRAY", (x, 0.0), (right - 3.0, 0.0)), *mark]
    if any(leg.radii_mm for leg in picture.legs):
        pair: list[Primitive] = [Line("ENVELOPE", (x, dy), (right, dy)) for dy in (0.8, -0.8)]
        yield "envelope: 1/e² radius on either side, to scale", pair
    if any(item.coated for item in picture.items):
        yield "coated side: second line before the face", _coated_sample(middle)
    if picture.zones:
        yield picture.zones_are.legend, _zone_sample(x, right)
    if picture.used_holes:
        yield "mounting hole that something is held by", [Circle("HOLES", (middle, 0.0), USED_MM)]
    if picture.panels:
        corners = ((x, -0.4), (right, -0.4), (right, 0.4), (x, 0.4))
        yield "panel of the enclosure", [Polyline("PANELS", corners, closed=True)]
    if picture.lids:
        dashes = [Line("PANELS", (x + a, 0.0), (x + a + 4.0, 0.0)) for a in (0.0, 6.0, 12.0, 18.0)]
        yield "edge of a lid, above; drawn within the true one", [*dashes]


_ENDS = (
    ("dump", "stray that ends in a dump", DUMPS),
    ("panel", "stray that ends on a panel, wall or body", STOPS),
    ("escaped", "stray that leaves the bench", LEAVES),
)


def _stray_sample(x: float, right: float) -> list[Primitive]:
    middle = (x + right) / 2
    out: list[Primitive] = [Line("STRAY", (x, 0.0), (right, 0.0))]
    out += [Line("STRAY", (middle, 0.0), (middle - 2.7, dy)) for dy in (1.25, -1.25)]
    return out


def _coated_sample(middle: float) -> list[Primitive]:
    glass = ((middle - 5, -1.4), (middle + 5, -1.4), (middle + 5, 0.2), (middle - 5, 0.2))
    coated = Line("OPTICS", (middle - 5.0, 1.1), (middle + 5.0, 1.1))
    return [Polyline("OPTICS", glass, closed=True), coated]


def _zone_sample(x: float, right: float) -> list[Primitive]:
    out: list[Primitive] = [Line("HAZARD", (x, 1.4), (right, 1.4))]
    out += [Line("HAZARD", (x + a, 1.4), (x + a, -0.2)) for a in (5.0, 15.0)]
    for n in range(5):
        start = x + 1.0 + 4.0 * n
        out.append(Line("HAZARD", (start, -1.6), (start + 3.0, 1.4)))
    return out


def _shifted(primitive: Primitive, up: float) -> Primitive:
    """Return a sample's primitive moved up."""

    def moved(point: Point) -> Point:
        return (point[0], point[1] + up)

    match primitive:
        case Line():
            return primitive._replace(start=moved(primitive.start), end=moved(primitive.end))
        case Circle():
            return primitive._replace(centre=moved(primitive.centre))
        case Fill() | Polyline():
            return primitive._replace(points=tuple(map(moved, primitive.points)))
    msg = f"no sample is made of {type(primitive).__name__}"
    raise TypeError(msg)
