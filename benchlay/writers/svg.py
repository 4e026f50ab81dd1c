"""SVG, true to size on paper, with real lettering and one group a layer.

The file opens in any browser and prints at its own size; layers carry their names as ids.
Nothing is fetched and nothing runs: no scripts, no styles from elsewhere.
"""

from __future__ import annotations

import math
import re
from collections.abc import Iterable
from typing import Any

import svgwrite

from benchlay.sheets.lettering import FONT_FAMILY, font_size_mm, plain
from benchlay.sheets.primitives import (
    Across,
    Arc,
    Block,
    BlockUse,
    Circle,
    Dimension,
    Fill,
    Layer,
    Line,
    Point,
    Polyline,
    Sheet,
    Space,
    Text,
    Up,
)
from benchlay.writers.backend import checked_fill, checked_polyline, send, send_shape
from benchlay.writers.dimension_lines import take_apart

_DECIMALS = 4  # a tenth of a micrometre on paper
_INKSCAPE_LAYER = "layer"
_ANCHOR = {Across.LEFT: "start", Across.CENTRE: "middle", Across.RIGHT: "end"}
# Capitals' height above the base line, as a share, at the named point.
_RISE = {Up.BASELINE: 0.0, Up.MIDDLE: 0.5, Up.TOP: 1.0}
_DATA_KEY = re.compile(r"[a-z][a-z0-9-]*")


def write(sheet: Sheet) -> bytes:
    """Return a sheet as an SVG file."""
    return send(sheet, SvgBackend(sheet))


class SvgBackend:
    """Draws on paper: model space is brought to scale, y is turned to run down."""

    def __init__(self, sheet: Sheet) -> None:
        """Set up the page and an empty group for every layer."""
        self._sheet = sheet
        self._blocks = {block.name: block for block in sheet.blocks}
        self._drawing = _page(sheet)
        self._groups: dict[str, Any] = {
            layer.name: _group(self._drawing, layer) for layer in sheet.layers
        }
        self._target: Any = None
        self.enter(Space.PAPER)

    def enter(self, space: Space) -> None:
        """See `Backend`."""
        model = space is Space.MODEL
        self._scale = self._sheet.scale if model else 1.0
        self._origin = self._sheet.origin_mm if model else (0.0, 0.0)
        self._turn = (1.0, 0.0)
        self._shift = (0.0, 0.0)

    def line(self, line: Line) -> None:
        """See `Backend`."""
        (x1, y1), (x2, y2) = self._on_page(line.start), self._on_page(line.end)
        path = self._drawing.path(d=f"M{x1} {y1}L{x2} {y2}")
        if line.note:
            path.set_desc(title=plain(line.note))
        self._add(line.layer, path)

    def arc(self, arc: Arc) -> None:
        """See `Backend`."""
        start = _polar(arc.centre, arc.radius, arc.from_deg)
        end = _polar(arc.centre, arc.radius, arc.to_deg)
        large = int((arc.to_deg - arc.from_deg) % 360.0 > 180.0)  # noqa: PLR2004 (half a turn)
        step = self._arc_to(end, arc.radius, large, anticlockwise=True)
        path = f"M{_pair(self._on_page(start))}{step}"
        self._add(arc.layer, self._drawing.path(d=path))

    def circle(self, circle: Circle) -> None:
        """See `Backend`."""
        cx, cy = self._on_page(circle.centre)
        radius = _number(circle.radius / self._scale)
        shape = self._drawing.circle()
        shape.attribs.update({"cx": cx, "cy": cy, "r": radius})
        self._add(circle.layer, shape)

    def polyline(self, polyline: Polyline) -> None:
        """See `Backend`."""
        checked_polyline(polyline)
        path = self._path_of(polyline)
        self._add(polyline.layer, self._drawing.path(d=path))

    def fill(self, fill: Fill) -> None:
        """See `Backend`."""
        corners = "L".join(_pair(self._on_page(p)) for p in checked_fill(fill))
        self._add(fill.layer, self._drawing.path(d=f"M{corners}Z", class_="f"))

    def text(self, text: Text) -> None:
        """See `Backend`."""
        x, y = self._on_page(text.at)
        angle = math.radians(text.rotation_deg)
        drop = _RISE[text.up] * text.height_mm
        x = _number(float(x) + drop * math.sin(angle))
        y = _number(float(y) + drop * math.cos(angle))
        letters = self._drawing.text(plain(text.text))
        size = _number(font_size_mm(text.height_mm))
        letters.attribs.update({"x": x, "y": y, "font-size": size})
        if text.across is not Across.LEFT:
            letters.attribs["text-anchor"] = _ANCHOR[text.across]
        if text.rotation_deg:
            turn = _number(-text.rotation_deg)
            letters.attribs["transform"] = f"rotate({turn} {x} {y})"
        self._add(text.layer, letters)

    def dimension(self, dimension: Dimension) -> None:
        """See `Backend`."""
        parts = take_apart(dimension, self._scale, self._sheet.decimal)
        for line in parts.lines:
            self.line(line)
        for arrow in parts.arrows:
            self.fill(arrow)
        self.text(parts.text)

    def block_use(self, use: BlockUse) -> None:
        """Draw each layer's share of the block as one group that bears its data."""
        block = self._blocks[use.block]
        angle = math.radians(use.rotation_deg)
        self._turn, self._shift = (math.cos(angle), math.sin(angle)), use.at
        for layer in dict.fromkeys(p.layer for p in block.primitives):
            self._target = _marked(self._drawing.g(), use)
            self._groups[layer].add(self._target)
            self._draw_shapes(block, layer)
        self._target = None
        self._turn, self._shift = (1.0, 0.0), (0.0, 0.0)

    def finish(self) -> bytes:
        """Return the whole file."""
        for group in self._groups.values():
            self._drawing.add(group)
        text: str = self._drawing.tostring()
        head = '<?xml version="1.0" encoding="utf-8"?>\n'
        # One element a line, so that a comparison of two revisions can be read.
        return (head + text.replace("><", ">\n<") + "\n").encode("utf-8")

    def _draw_shapes(self, block: Block, layer: str) -> None:
        for shape in block.primitives:
            if shape.layer == layer:
                send_shape(shape, self)

    def _add(self, layer: str, element: Any) -> None:  # noqa: ANN401 - svgwrite has no types
        target = self._groups[layer] if self._target is None else self._target
        target.add(element)

    def _on_page(self, point: Point) -> tuple[str, str]:
        """Return where a point lies on the page, as the numbers of the file."""
        cos, sin = self._turn
        x = self._shift[0] + cos * point[0] - sin * point[1]
        y = self._shift[1] + sin * point[0] + cos * point[1]
        right = self._origin[0] + x / self._scale
        down = self._sheet.size_mm[1] - self._origin[1] - y / self._scale
        return _number(right), _number(down)

    def _arc_to(self, end: Point, radius: float, large: int, *, anticlockwise: bool) -> str:
        size = _number(radius / self._scale)
        sweep = 0 if anticlockwise else 1  # y runs down, so the sense is turned
        return f"A{size} {size} 0 {large} {sweep} {_pair(self._on_page(end))}"

    def _path_of(self, polyline: Polyline) -> str:
        points = polyline.points
        bulges = polyline.bulges or (0.0,) * len(points)
        ends = [*points[1:], points[0]] if polyline.closed else [*points[1:]]
        path = f"M{_pair(self._on_page(points[0]))}"
        for start, end, bulge in zip(points, ends, bulges, strict=False):
            if bulge == 0.0:
                path += f"L{_pair(self._on_page(end))}"
                continue
            chord = math.dist(start, end)
            radius = chord * (1.0 + bulge * bulge) / (4.0 * abs(bulge))
            large = int(abs(bulge) > 1.0)
            path += self._arc_to(end, radius, large, anticlockwise=bulge > 0.0)
        return path + ("Z" if polyline.closed else "")


def _page(sheet: Sheet) -> Any:  # noqa: ANN401 - svgwrite has no types
    width, height = (_number(side) for side in sheet.size_mm)
    drawing = svgwrite.Drawing(
        size=(f"{width}mm", f"{height}mm"),
        viewBox=f"0 0 {width} {height}",
        profile="full",
        debug=False,  # the checks cost half of the time and refuse data attributes
    )
    drawing.attribs.update(
        {
            "role": "img",
            "xmlns:inkscape": "http://www.inkscape.org/namespaces/inkscape",
            "font-family": FONT_FAMILY,
        }
    )
    drawing.set_desc(title=plain(sheet.title), desc=plain(sheet.description))
    drawing.defs.add(drawing.style(_style(width, height)))
    paper = drawing.rect(insert=(0, 0), size=(width, height), fill="#ffffff")
    paper.attribs["id"] = "paper"
    drawing.add(paper)
    return drawing


def _style(width: str, height: str) -> str:
    return (
        "path,circle{fill:none}.f{fill:inherit;stroke:none}"
        "text{stroke:none;white-space:pre}"
        f"@page{{size:{width}mm {height}mm;margin:0}}"
        "@media print{svg{print-color-adjust:exact;-webkit-print-color-adjust:exact}}"
    )


def _group(drawing: Any, layer: Layer) -> Any:  # noqa: ANN401 - svgwrite has no types
    """Return the group of one layer; everything in it takes its looks from here."""
    group = drawing.g(id=layer.name)
    group.attribs.update(
        {
            "inkscape:groupmode": _INKSCAPE_LAYER,
            "inkscape:label": layer.name,
            "aria-label": plain(layer.meaning),
            "stroke": layer.colour,
            "fill": layer.colour,
            "stroke-width": _number(layer.width_mm),
            "stroke-linejoin": "round",
            "stroke-linecap": "butt" if layer.pattern_mm else "round",
        }
    )
    if layer.pattern_mm:
        dashes = " ".join(_number(length) for length in layer.pattern_mm)
        group.attribs["stroke-dasharray"] = dashes
    return group


def _marked(group: Any, use: BlockUse) -> Any:  # noqa: ANN401 - svgwrite has no types
    """Put a block's data on its group, for programs and for the pointer that rests on it."""
    for key, value in use.attributes:
        name = key.lower().replace("_", "-")
        if not _DATA_KEY.fullmatch(name):
            msg = f"{key!r} cannot name an attribute"
            raise ValueError(msg)
        group.attribs[f"data-{name}"] = plain(value)
    words = ", ".join(plain(value) for _, value in use.attributes)
    group.set_desc(title=words or use.block)
    return group


def _number(value: float) -> str:
    """Write a number: rounded, without trailing zeros or a minus zero."""
    text = f"{value:.{_DECIMALS}f}".rstrip("0").rstrip(".")
    return "0" if text == "-0" else text


def _pair(point: Iterable[str]) -> str:
    return " ".join(point)


def _polar(centre: Point, radius: float, angle_deg: float) -> Point:
    angle = math.radians(angle_deg)
    return (
        centre[0] + radius * math.cos(angle),
        centre[1] + radius * math.sin(angle),
    )
