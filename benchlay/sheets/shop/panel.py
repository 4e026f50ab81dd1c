"""Shop drawing of a panel or lid: its flat blank, dimensioned from one corner.

What a shop needs and the layout does not say makes the sheet *not for manufacture*, in words
at its top. The cutting file beside it has the same contours.
"""

from __future__ import annotations

from collections.abc import Iterator

from benchlay.layout.layout import Layout
from benchlay.making.blank import Blank
from benchlay.making.grouping import Group
from benchlay.making.parts import LID, Part
from benchlay.sheets.drafting.picture import title_fields
from benchlay.sheets.form import Form, form_for
from benchlay.sheets.lettering import LARGE_MM, MIDDLE_MM, SMALL_MM, shorten, wrap
from benchlay.sheets.primitives import (
    Axis,
    Circle,
    Dimension,
    Line,
    Polyline,
    Primitive,
    Sheet,
    Text,
    figure,
)
from benchlay.sheets.scale import SCALES, Window
from benchlay.sheets.shop.ordinates import DECIMALS, ROOM_MM, SAME_MM, datum_mark, running
from benchlay.sheets.shop.panel_tags import MOST_BESIDE, cross, named, tags
from benchlay.sheets.shop.rows import MARKS_MM
from benchlay.sheets.shop.section import section
from benchlay.sheets.tables import BETWEEN_MM, Column, Table, notes, table
from benchlay.sheets.title_block import TitleFields

TOLERANCE = "ISO 2768-m; hole positions ±0,2"
_COLUMN_MM = 108.0
_HEADING_MM = 36.0
_OVERALL_MM = 10.0  # of the dimensions of the whole blank, off it
_RIGHT_MM = 16.0
_READABLE = 10  # N of 1:N: beyond it holes are specks, and a larger sheet is taken
_SIZES = ("A3", "A2", "A1", "A0")


def lacking(part: Part, layout: Layout) -> tuple[str, ...]:
    """Return what a shop needs and is not told, of the sheet and of the drawing."""
    d = layout.drawing
    fields = {"drawing number": d.number, "date": d.date, "drawn by": d.drawn_by}
    return (*part.lacks, *(name for name, value in fields.items() if not value))


def panel_sheet(part: Part, layout: Layout, sha256: str, number: str) -> Sheet:
    """Return the shop drawing of a part."""
    decimal = "." if layout.drawing.decimal == "point" else ","
    kind = "Lid" if part.kind == LID else "Panel"
    fields = title_fields(layout, f"{kind} {part.names[0]}, shop drawing", sha256)._replace(
        tolerance=TOLERANCE.replace(",", decimal), sheet=number
    )
    form, scale = _form(fields, part.blank)
    form = form_for(fields._replace(scale=f"1:{scale}"), size=form.size)
    view = _view(form)
    width, height = part.blank.flat_mm
    origin = (
        view.left + max(0.0, (view.width - width / scale) / 2),
        view.low + max(0.0, (view.height - height / scale) / 2),
    )
    missing = lacking(part, layout)
    paper = [
        *_heading(part, missing, form.window),
        *_column(part, layout, form.window, decimal),
    ]
    if part.blank.folding is not None and form.beside is not None:
        paper += section(part.blank.folding, part, form.beside, decimal)
    return form.sheet(
        f"panel-{part.name}",
        f"Shop drawing of {', '.join(part.names)}: flat blank, holes and bends",
        model=_drawn(part.blank, scale, decimal),
        paper=paper,
        scale=scale,
        origin_mm=origin,
        properties=_properties(part, layout, sha256),
        decimal=decimal,
    )


def _properties(part: Part, layout: Layout, sha256: str) -> tuple[tuple[str, str], ...]:
    return (
        ("drawing number", layout.drawing.number),
        ("revision", layout.revision),
        ("layout sha256", sha256),
        ("quantity", str(part.quantity)),
    )


def _form(fields: TitleFields, blank: Blank) -> tuple[Form, int]:
    """Return the smallest sheet on which the blank is shown large enough to be read."""
    for size in _SIZES:
        form = form_for(fields, size=size)
        view = _view(form)
        fits = [
            n
            for n in SCALES
            if blank.flat_mm[0] <= view.width * n and blank.flat_mm[1] <= view.height * n
        ]
        if fits and (fits[0] <= _READABLE or size == _SIZES[-1]):
            return form, fits[0]
    return form, form.scale_for(blank.flat_mm)


def _view(form: Form) -> Window:
    """Return where the blank itself may lie: room for dimensions, heading and column kept."""
    left, low, right, high = form.window
    return Window(left + ROOM_MM, low + ROOM_MM, right - _COLUMN_MM - _RIGHT_MM, high - _HEADING_MM)


def _heading(part: Part, missing: tuple[str, ...], window: Window) -> Iterator[Primitive]:
    y = window.high - LARGE_MM
    room = window.width - _COLUMN_MM - BETWEEN_MM
    words = f"{', '.join(part.names)}: {part.quantity} off"
    yield Text("TITLE", (window.left, y), shorten(words, room, LARGE_MM), LARGE_MM)
    if not missing:
        return
    y -= 2.4 + MIDDLE_MM
    yield Text("TITLE", (window.left, y), "NOT FOR MANUFACTURE", MIDDLE_MM)
    for line in wrap(f"Missing: {'; '.join(missing)}.", room, SMALL_MM, most=2):
        y -= 1.6 * SMALL_MM
        yield Text("NOTES", (window.left, y), line, SMALL_MM)


def _drawn(blank: Blank, scale: int, decimal: str) -> list[Primitive]:
    """Return the blank with its dimensions, in the model: its lower left is the datum."""
    listed = len(blank.holes) > MOST_BESIDE
    circles = (*blank.rounds, *blank.holes)
    out: list[Primitive] = [Polyline("PANELS", blank.outer, closed=True)]
    out += [Polyline("PANELS", loop, closed=True) for loop in blank.inner]
    for hole in circles:
        out.append(Circle("PANELS", hole.centre, hole.diameter_mm / 2))
        out += cross(hole, scale)
    for bend in blank.bends:
        out.append(Line("AXIS", bend.start, bend.end))
    corners = [c for loop in (blank.outer, *blank.inner) for c in loop]
    centres = [h.centre for h in (blank.rounds if listed else circles)]
    xs = [x for x, _ in (*corners, *centres)]
    ys = [y for _, y in (*corners, *centres)]
    xs += [b.start[0] for b in blank.bends if b.start[0] == b.end[0]]
    ys += [b.start[1] for b in blank.bends if b.start[1] == b.end[1]]
    datum, (width, height) = (0.0, 0.0), blank.flat_mm
    xs, ys = [x for x in xs if x < width - SAME_MM], [y for y in ys if y < height - SAME_MM]
    off = _OVERALL_MM * scale
    for axis, near, line in (
        (Axis.HORIZONTAL, (0.0, height), (0.0, height + off)),
        (Axis.VERTICAL, (width, 0.0), (width + off, 0.0)),
    ):
        far = (width, height)
        out.append(Dimension("DIMENSIONS", axis, near, far, line, decimals=DECIMALS))
    out += running(xs, across=True, datum=datum, edge=0.0, scale=scale, decimal=decimal)
    out += running(ys, across=False, datum=datum, edge=0.0, scale=scale, decimal=decimal)
    return out + datum_mark(datum, scale) + list(tags(blank, scale, decimal))


def _column(part: Part, layout: Layout, window: Window, decimal: str) -> list[Primitive]:
    """Return notes and the table of holes."""
    room = window._replace(left=window.right - _COLUMN_MM, right=window.right - MARKS_MM)
    drawn = notes("NOTES", list(_notes(part, layout, decimal)), room, f"panel {part.name}")
    room = room._replace(high=drawn.foot - BETWEEN_MM)
    content = Table("HOLES", _HOLES, _hole_rows(part.blank, decimal), f"cut-{part.name}.dxf")
    return [*drawn.primitives, *(table(content, room).primitives if content.rows else ())]


_HOLES = (
    Column("Hole", 19.0),
    Column("X", 30.0),
    Column("Y", 30.0),
    Column("Ø", 9.0),
    Column("For", 16.0),
)


def _group_row(letter: str, group: Group, decimal: str) -> tuple[str, ...]:
    places = [figure(v, 2, decimal) for v in group.holes[0].centre]
    name = f"{letter}1"
    if group.axis is not None:
        steps, pitch = len(group.holes) - 1, group.pitch_mm
        total = figure(steps * pitch, 2, decimal)
        places[group.axis] += f" + {steps} x {figure(pitch, 2, decimal)} (= {total})"
        name += f" to {letter}{steps + 1}"
    first = group.holes[0]
    return (name, *places, figure(first.diameter_mm, 2, decimal), first.use)


def _hole_rows(blank: Blank, decimal: str) -> tuple[tuple[str, ...], ...]:
    """Return a row a group; where they stand on the drawing too, a row a diameter."""
    if len(blank.holes) > MOST_BESIDE:
        return tuple(_group_row(letter, group, decimal) for letter, group in named(blank))
    kinds: dict[tuple[float, str], int] = {}
    for h in blank.holes:
        kinds[h.diameter_mm, h.use] = kinds.get((h.diameter_mm, h.use), 0) + 1
    return tuple(
        (f"{count}x", "on view", "", figure(diameter, 2, decimal), use)
        for (diameter, use), count in sorted(kinds.items())
    )


def _notes(part: Part, layout: Layout, decimal: str) -> Iterator[str]:
    def num(value: float, digits: int = 2) -> str:
        return figure(value, digits, decimal)

    blank = part.blank
    side = "above" if part.kind == LID else "outside"
    yield f"Flat blank seen from {side}; X and Y from the ringed corner; mm; do not scale."
    stated = part.material or "not stated"
    assumed = "" if part.thickness_stated else " (assumed)"
    yield f"Material {stated}, t = {num(part.thickness_mm)}{assumed}. Quantity {part.quantity}."
    yield f"Flat {num(blank.flat_mm[0])} x {num(blank.flat_mm[1])}."
    if blank.folding is not None:
        f = blank.folding
        yield (
            f"Formed {num(blank.formed_mm[0])} x {num(blank.formed_mm[1])} over the outer faces, "
            f"flange {num(f.flange_mm)} to the {'inside' if f.sense == 'in' else 'outside'}. Bend "
            f"allowance {num(f.allowance_mm, 3)} with R {num(f.radius_mm)}, K {num(f.k, 3)}: a "
            "shop with other figures tells the drafter. UP comes towards who looks at the sheet."
        )
    yield f"General tolerance ISO 2768-m; hole positions ±{num(0.2)}; thermal cuts ISO 9013."
    yield f"Deburr all edges, break sharp ones {num(0.2)} to {num(0.5)}. Keep the inside matt."
    if part.mass_kg is None:
        yield f"Mass not computed: no density is stated for {part.material or 'the material'}."
    else:
        yield f"Mass {num(part.mass_kg, 1)} kg each, by {num(part.density_kg_m3 or 0.0, 0)} kg/m3."
    if not blank.holes:
        yield "No fixing holes: the layout states none."
    if not part.draft.lacks:
        yield f"Cut from cut-{part.name}.dxf: the same contours, 1:1."
    yield from (f"{words[0].upper()}{words[1:]}." for words in part.draft.remarks)
    yield from _mounting(part, layout)


def _mounting(part: Part, layout: Layout) -> Iterator[str]:
    """Say what else is put on: switches, and the ducts behind openings."""
    if layout.enclosure is None:
        return
    sheets = layout.enclosure.lids if part.kind == LID else layout.enclosure.panels
    switched = [name for name in part.names if sheets[name].access == "interlocked"]
    if switched:
        names = ", ".join(switched)
        yield f"Interlock switch and actuator on {names}: holes by the switch's own sheet."
    if part.kind == LID:
        return
    for name in part.names:
        for key, opening in sorted(layout.enclosure.panels[name].openings.items()):
            if opening.depth_mm:
                yield f"Duct {opening.depth_mm:g} deep behind opening {key} of {name}."
