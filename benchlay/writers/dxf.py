r"""DXF (R2010), in millimetres, the bench 1:1 in model space.

What readers taught us (each tried):

* Several readers merge paper space into model space, so the frame lies in model space too,
  N times its size round the bench, and paper space holds one viewport at 1:N.
* Without extents and an active view, some open on an empty corner.
* Text is TEXT; the data of a block stands in invisible attributes besides.
* A dimension is a true DIMENSION, with its picture drawn by us, so that it looks alike in
  every format; the style's values are in the header too, for readers that draw it anew.
* Some draw the figure of a dimension along its line whatever is asked for: a running one has
  none of its own, and a TEXT square to the line in its place.
* ``%%`` starts a special sign in TEXT, ``^`` a control character, and ``\\U+`` a letter;
  in the text of a dimension a backslash and braces are commands.
"""

from __future__ import annotations

import io
from collections.abc import Iterator
from contextlib import contextmanager
from typing import Any

from ezdxf import options  # type: ignore[attr-defined]  # a documented name
from ezdxf.enums import TextEntityAlignment

from benchlay.sheets.lettering import width_mm
from benchlay.sheets.primitives import (
    Across,
    Arc,
    Axis,
    Block,
    BlockUse,
    Circle,
    Dimension,
    Fill,
    Line,
    Point,
    Polyline,
    Sheet,
    Space,
    Text,
    Up,
    direction_of,
    line_ends,
    measured,
    outward,
    to_model,
)
from benchlay.writers.backend import checked_fill, checked_polyline, send, send_shape
from benchlay.writers.dimension_lines import take_apart
from benchlay.writers.dxf_setup import DIMSTYLE, LETTERING, NAME, document
from benchlay.writers.dxf_text import rounded, safe_markup, safe_text

_NO_FIGURE = " "  # as a dimension's text, it suppresses the figure
# DIMENSION, group code 70
_LINEAR, _ALIGNED, _OWN_BLOCK, _FIGURE_MOVED = 0, 1, 32, 128
_MIDDLE = 0.5
_INVISIBLE = 1  # ATTDEF, group code 70

_ALIGNMENT = {
    (Across.LEFT, Up.BASELINE): TextEntityAlignment.LEFT,
    (Across.CENTRE, Up.BASELINE): TextEntityAlignment.CENTER,
    (Across.RIGHT, Up.BASELINE): TextEntityAlignment.RIGHT,
    (Across.LEFT, Up.MIDDLE): TextEntityAlignment.MIDDLE_LEFT,
    (Across.CENTRE, Up.MIDDLE): TextEntityAlignment.MIDDLE_CENTER,
    (Across.RIGHT, Up.MIDDLE): TextEntityAlignment.MIDDLE_RIGHT,
    (Across.LEFT, Up.TOP): TextEntityAlignment.TOP_LEFT,
    (Across.CENTRE, Up.TOP): TextEntityAlignment.TOP_CENTER,
    (Across.RIGHT, Up.TOP): TextEntityAlignment.TOP_RIGHT,
}


def write(sheet: Sheet) -> bytes:
    """Return a sheet as a DXF file; the same sheet gives the same bytes."""
    with _no_clock():
        return send(sheet, DxfBackend(sheet))


@contextmanager
def _no_clock() -> Iterator[None]:
    """Keep times and random ids out of what ezdxf writes."""
    before = options.write_fixed_meta_data_for_testing
    options.write_fixed_meta_data_for_testing = True
    try:
        yield
    finally:
        options.write_fixed_meta_data_for_testing = before


class DxfBackend:
    """Draws everything in model space; what belongs to the paper is enlarged N times."""

    def __init__(self, sheet: Sheet) -> None:
        """Set up the document: units, layers, patterns, styles, blocks, views."""
        self._sheet = sheet
        self._doc = document(sheet)
        self._uses: dict[str, BlockUse] = {}
        for block in sheet.blocks:
            self._define(block)
        self._into: Any = self._doc.modelspace()
        self._paper = False

    def enter(self, space: Space) -> None:
        """See `Backend`."""
        self._paper = space is Space.PAPER

    def line(self, line: Line) -> None:
        """See `Backend`."""
        attributes = {"layer": line.layer}
        self._into.add_line(self._at(line.start), self._at(line.end), attributes)

    def arc(self, arc: Arc) -> None:
        """See `Backend`."""
        self._into.add_arc(
            self._at(arc.centre),
            self._long(arc.radius),
            arc.from_deg,
            arc.to_deg,
            dxfattribs={"layer": arc.layer},
        )

    def circle(self, circle: Circle) -> None:
        """See `Backend`."""
        self._into.add_circle(
            self._at(circle.centre), self._long(circle.radius), {"layer": circle.layer}
        )

    def polyline(self, polyline: Polyline) -> None:
        """See `Backend`."""
        checked_polyline(polyline)
        bulges = polyline.bulges or (0.0,) * len(polyline.points)
        self._into.add_lwpolyline(
            [(*self._at(p), b) for p, b in zip(polyline.points, bulges, strict=True)],
            format="xyb",
            close=polyline.closed,
            dxfattribs={"layer": polyline.layer},
        )

    def fill(self, fill: Fill) -> None:
        """See `Backend`."""
        corners = [self._at(point) for point in checked_fill(fill)]
        if len(corners) > 3:  # noqa: PLR2004 (a quadrilateral)
            # SOLID takes its corners in the order of a bow tie.
            corners[2], corners[3] = corners[3], corners[2]
        self._into.add_solid(corners, {"layer": fill.layer})

    def text(self, text: Text) -> None:
        """See `Backend`."""
        entity = self._into.add_text(
            safe_text(text.text),
            height=text.height_mm * self._sheet.scale,
            rotation=text.rotation_deg,
            dxfattribs={"layer": text.layer, "style": LETTERING},
        )
        alignment = _ALIGNMENT[text.across, text.up]
        entity.set_placement(self._at(text.at), align=alignment)

    def dimension(self, dimension: Dimension) -> None:
        """Draw a true dimension, with its picture in an anonymous block as CAD does."""
        moved = self._moved(dimension)
        picture = self._doc.blocks.new_anonymous_block(type_char="D")
        parts = take_apart(moved, self._sheet.scale, self._sheet.decimal)
        outer, paper = self._into, self._paper
        own = parts.lines[:-1] if moved.running else parts.lines
        self._into, self._paper = picture, False
        for line in own:
            self.line(line)
        for arrow in parts.arrows:
            self.fill(arrow)
        if not moved.running:
            self.text(parts.text)
        self._into = outer
        if moved.running:
            self.line(parts.lines[-1])
            self.text(parts.text)
        self._paper = paper
        attributes = self._dimension_attributes(moved, picture.name, parts.text)
        self._into.new_entity("DIMENSION", attributes)

    def block_use(self, use: BlockUse) -> None:
        """See `Backend`."""
        insert = self._into.add_blockref(
            use.block,
            self._at(use.at),
            {"layer": use.layer, "rotation": use.rotation_deg},
        )
        for tag, value in use.attributes:
            attribute = insert.add_attrib(
                tag, safe_text(value), self._at(use.at), self._data_look(use.layer)
            )
            attribute.is_invisible = True

    def finish(self) -> bytes:
        """Return the whole file."""
        self._doc.classes.add_required_classes(self._doc.dxfversion)
        # Their order would follow the hash seed.
        in_order = dict(sorted(self._doc.classes.classes.items()))
        self._doc.classes.classes = in_order
        stream = io.StringIO()
        self._doc.write(stream)
        return rounded(stream.getvalue()).encode("utf-8")

    def _define(self, block: Block) -> None:
        if not NAME.fullmatch(block.name):
            msg = f"{block.name!r} cannot name a block"
            raise ValueError(msg)
        self._into = self._doc.blocks.new(block.name)
        self._paper = False
        for shape in block.primitives:
            send_shape(shape, self)
        for tag in self._tags_of(block.name):
            definition = self._into.add_attdef(
                tag, (0.0, 0.0), "", dxfattribs=self._data_look(block.primitives[0].layer)
            )
            definition.is_invisible = True

    def _tags_of(self, name: str) -> list[str]:
        """Every attribute that any use of a block carries, in order of appearance."""
        uses = [
            p
            for p in (*self._sheet.model, *self._sheet.paper)
            if isinstance(p, BlockUse) and p.block == name
        ]
        return list(dict.fromkeys(tag for use in uses for tag, _ in use.attributes))

    def _data_look(self, layer: str) -> dict[str, Any]:
        height = 2.5 * self._sheet.scale
        return {"layer": layer, "style": LETTERING, "height": height, "flags": _INVISIBLE}

    def _at(self, point: Point) -> Point:
        return to_model(self._sheet, point) if self._paper else point

    def _long(self, length: float) -> float:
        return length * self._sheet.scale if self._paper else length

    def _moved(self, dimension: Dimension) -> Dimension:
        """Return a dimension with its points in model space, stating what it stated."""
        if not self._paper:
            return dimension
        points = (dimension.first, dimension.second, dimension.line_through)
        first, second, through = (self._at(point) for point in points)
        text = dimension.text
        if text is None:
            msg = "a dimension on paper must say its figure itself"
            raise ValueError(msg)
        return dimension._replace(first=first, second=second, line_through=through)

    def _dimension_attributes(
        self, dimension: Dimension, picture: str, figure: Text
    ) -> dict[str, Any]:
        words = None if dimension.text is None else safe_markup(dimension.text)
        aligned = dimension.axis is Axis.ALIGNED
        ux, uy = direction_of(dimension)
        lift = figure.height_mm / 2 * self._sheet.scale
        middle = (figure.at[0] - lift * uy, figure.at[1] + lift * ux)
        moved = _FIGURE_MOVED if dimension.figure_share != _MIDDLE or dimension.running else 0
        if dimension.running:
            half = width_mm(figure.text, figure.height_mm) / 2 * self._sheet.scale
            out = outward(dimension)
            middle = (figure.at[0] + half * out[0], figure.at[1] + half * out[1])
        attributes = {
            "layer": dimension.layer,
            "dimstyle": DIMSTYLE,
            "geometry": picture,
            "dimtype": (_ALIGNED if aligned else _LINEAR) | _OWN_BLOCK | moved,
            "defpoint": line_ends(dimension)[1],
            "defpoint2": dimension.first,
            "defpoint3": dimension.second,
            "text_midpoint": middle,
            "actual_measurement": measured(dimension),
            "angle": 90.0 if dimension.axis is Axis.VERTICAL else 0.0,
        }
        if dimension.running:
            attributes |= {"text_rotation": figure.rotation_deg, "text": _NO_FIGURE}
            return attributes
        return attributes if words is None else attributes | {"text": words}
