"""A page of PDF: what is drawn on it, layer over layer, as the operators of its content."""

from __future__ import annotations

import math

from pikepdf import Name, String

from benchlay.named import NamedTuple
from benchlay.sheets.font import UNITS_PER_EM, font
from benchlay.sheets.lettering import font_size_mm, plain
from benchlay.sheets.primitives import (
    Across,
    Arc,
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
from benchlay.writers.backend import checked_fill, checked_polyline, send_shape
from benchlay.writers.dimension_lines import take_apart

POINTS_PER_MM = 72.0 / 25.4
_DECIMALS = 4  # a tenth of a micrometre on paper
_BUTT, _ROUND = 0, 1
_RISE = {Up.BASELINE: 0.0, Up.MIDDLE: 0.5, Up.TOP: 1.0}  # of capitals, at the named point
_SHIFT = {Across.LEFT: 0.0, Across.CENTRE: 0.5, Across.RIGHT: 1.0}
_LARGEST_STEP_RAD = math.pi / 4  # of an arc as one curve: then it is off by 4e-6 of its radius


class _Frame(NamedTuple):
    """How coordinates of a space, or of a block in it, become mm on paper."""

    scale: float
    origin: Point
    turn: Point = (1.0, 0.0)  # cosine and sine
    shift: Point = (0.0, 0.0)

    def on_paper(self, point: Point) -> Point:
        """Return where a point lies on paper."""
        (cos, sin), (x, y) = self.turn, point
        return (
            self.origin[0] + (self.shift[0] + cos * x - sin * y) / self.scale,
            self.origin[1] + (self.shift[1] + sin * x + cos * y) / self.scale,
        )


class PdfPage:
    """Draws one page; what it gives at the end is the page's content, not yet a file."""

    def __init__(self, sheet: Sheet, letters: dict[int, str]) -> None:
        """Start an empty page; the letters used, by their glyphs, go into `letters`."""
        self._sheet = sheet
        self._letters = letters
        self._blocks = {block.name: block for block in sheet.blocks}
        self._layers: dict[str, list[str]] = {layer.name: [] for layer in sheet.layers}
        self.enter(Space.PAPER)

    def enter(self, space: Space) -> None:
        """See `Backend`."""
        sheet = self._sheet
        model = space is Space.MODEL
        self._frame = _Frame(sheet.scale, sheet.origin_mm) if model else _Frame(1.0, (0.0, 0.0))

    def line(self, line: Line) -> None:
        """See `Backend`."""
        self._ink(line.layer, f"{self._pair(line.start)} m {self._pair(line.end)} l S")

    def arc(self, arc: Arc) -> None:
        """See `Backend`."""
        sweep = (arc.to_deg - arc.from_deg) % 360.0 or 360.0
        start = _polar(arc.centre, arc.radius, math.radians(arc.from_deg))
        curves = self._curves(start, arc.centre, math.radians(sweep))
        self._ink(arc.layer, f"{self._pair(start)} m {curves} S")

    def circle(self, circle: Circle) -> None:
        """See `Backend`."""
        start = (circle.centre[0] + circle.radius, circle.centre[1])
        # Clockwise, as circles run in SVG: dashes then fall in the same places.
        curves = self._curves(start, circle.centre, -math.tau)
        self._ink(circle.layer, f"{self._pair(start)} m {curves} s")

    def polyline(self, polyline: Polyline) -> None:
        """See `Backend`."""
        checked_polyline(polyline)
        points = polyline.points
        bulges = polyline.bulges or (0.0,) * len(points)
        ends = [*points[1:], points[0]] if polyline.closed else [*points[1:]]
        steps = [f"{self._pair(points[0])} m"]
        for n, (start, end, bulge) in enumerate(zip(points, ends, bulges, strict=False)):
            if bulge != 0.0:
                steps.append(self._curves(start, _centre(start, end, bulge), 4 * math.atan(bulge)))
            elif n + 1 < len(points):  # the last straight piece of a closed one closes it
                steps.append(f"{self._pair(end)} l")
        self._ink(polyline.layer, f"{' '.join(steps)} {'s' if polyline.closed else 'S'}")

    def fill(self, fill: Fill) -> None:
        """See `Backend`."""
        first, *others = (self._pair(point) for point in checked_fill(fill))
        self._ink(fill.layer, f"{first} m {' '.join(f'{p} l' for p in others)} f")

    def text(self, text: Text) -> None:
        """See `Backend`."""
        words = plain(text.text)
        if not words:
            return
        size = font_size_mm(text.height_mm)
        width = font().advance(words) * size / UNITS_PER_EM
        angle = math.radians(text.rotation_deg)
        cos, sin = math.cos(angle), math.sin(angle)
        back, drop = _SHIFT[text.across] * width, _RISE[text.up] * text.height_mm
        x, y = self._frame.on_paper(text.at)
        x, y = x - back * cos + drop * sin, y - back * sin - drop * cos
        matrix = " ".join(map(_number, (cos, sin, -sin, cos, x, y)))
        self._ink(text.layer, f"BT /F {_number(size)} Tf {matrix} Tm {self._shown(words)} ET")

    def dimension(self, dimension: Dimension) -> None:
        """See `Backend`."""
        parts = take_apart(dimension, self._frame.scale, self._sheet.decimal)
        for line in parts.lines:
            self.line(line)
        for arrow in parts.arrows:
            self.fill(arrow)
        self.text(parts.text)

    def block_use(self, use: BlockUse) -> None:
        """See `Backend`."""
        outer, angle = self._frame, math.radians(use.rotation_deg)
        self._frame = outer._replace(turn=(math.cos(angle), math.sin(angle)), shift=use.at)
        for shape in self._blocks[use.block].primitives:
            send_shape(shape, self)
        self._frame = outer

    def finish(self) -> bytes:
        """Return the page's content: layer over layer, in mm."""
        out = [f"{POINTS_PER_MM:.10f} 0 0 {POINTS_PER_MM:.10f} 0 0 cm"]
        for layer in self._sheet.layers:
            ink = self._layers[layer.name]
            if ink:
                mark = _ascii(Name(known_as(layer)))
                out += [f"/OC {mark} BDC", "q", _look(layer), *ink, "Q", "EMC"]
        return ("\n".join(out) + "\n").encode("ascii")

    def _ink(self, layer: str, operators: str) -> None:
        self._layers[layer].append(operators)

    def _pair(self, point: Point) -> str:
        x, y = self._frame.on_paper(point)
        return f"{_number(x)} {_number(y)}"

    def _shown(self, words: str) -> str:
        """Return the operators that show a line, and keep what its glyphs mean."""
        known, out, run = font().glyphs, [], ""
        for letter in words:
            if letter in known:
                self._letters.setdefault(known[letter], letter)
                run += f"{known[letter]:04X}"
                continue
            if run:
                out.append(f"<{run}> Tj")
            # A box stands for what the font lacks; who copies it still gets the letter.
            out.append(f"/Span <</ActualText {_ascii(String(letter))}>> BDC <0000> Tj EMC")
            run = ""
        return " ".join([*out, *([f"<{run}> Tj"] if run else [])])

    def _curves(self, start: Point, centre: Point, sweep: float) -> str:
        """Return an arc from a point about a centre as curves of the third degree."""
        steps = max(1, math.ceil(abs(sweep) / _LARGEST_STEP_RAD - 1e-9))
        step = sweep / steps
        reach = 4.0 / 3.0 * math.tan(step / 4.0)
        radius = math.dist(start, centre)
        begin = math.atan2(start[1] - centre[1], start[0] - centre[0])
        out = []
        for n in range(steps):
            a, b = begin + n * step, begin + (n + 1) * step
            (ax, ay), (bx, by) = _polar(centre, radius, a), _polar(centre, radius, b)
            first = (ax - reach * (ay - centre[1]), ay + reach * (ax - centre[0]))
            second = (bx + reach * (by - centre[1]), by - reach * (bx - centre[0]))
            out.append(f"{self._pair(first)} {self._pair(second)} {self._pair((bx, by))} c")
        return " ".join(out)


def known_as(layer: Layer) -> str:
    """Return the name by which pages speak of a layer."""
    return f"/L-{layer.name}"


def _ascii(value: Name | String) -> str:
    return value.unparse().decode("ascii")


def _number(value: float) -> str:
    """Write a number: rounded, without trailing zeros or a minus zero."""
    text = f"{value:.{_DECIMALS}f}".rstrip("0").rstrip(".")
    return "0" if text in ("-0", "") else text


def _look(layer: Layer) -> str:
    """Return the operators that set colour, width and pattern of a layer."""
    red, green, blue = (_number(int(layer.colour[n : n + 2], 16) / 255) for n in (1, 3, 5))
    colour = f"{red} {green} {blue}"
    pattern = " ".join(_number(length) for length in layer.pattern_mm)
    cap = _BUTT if layer.pattern_mm else _ROUND
    width = _number(layer.width_mm)
    return f"{colour} RG {colour} rg {width} w {cap} J {_ROUND} j [{pattern}] 0 d"


def _polar(centre: Point, radius: float, angle: float) -> Point:
    return (centre[0] + radius * math.cos(angle), centre[1] + radius * math.sin(angle))


def _centre(start: Point, end: Point, bulge: float) -> Point:
    """Return the centre of the arc that a bulge means."""
    (ax, ay), (bx, by) = start, end
    offset = (1.0 - bulge * bulge) / (4.0 * bulge)
    return ((ax + bx) / 2 - (by - ay) * offset, (ay + by) / 2 + (bx - ax) * offset)
