"""PDF, true to size on paper: vectors, lettering that can be searched, layers as in the DXF.

The file is written here and not by a library: a sheet needs paths, one font and layers, and
no library at hand writes layers without reaching into its inside. What readers have to agree
on is tested with two that did not write it. Pages may differ in size. A viewer is told not to
shrink them when they are printed.
"""

from __future__ import annotations

import math
from collections.abc import Iterable, Sequence

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
from benchlay.writers.backend import checked_fill, checked_polyline, send, send_shape
from benchlay.writers.dimension_lines import take_apart
from benchlay.writers.pdf_file import PdfFile, Raw, array, dictionary, name, number, string
from benchlay.writers.pdf_font import add_font

_POINTS_PER_MM = 72.0 / 25.4
_BUTT, _ROUND = 0, 1
_RISE = {Up.BASELINE: 0.0, Up.MIDDLE: 0.5, Up.TOP: 1.0}  # of capitals, at the named point
_SHIFT = {Across.LEFT: 0.0, Across.CENTRE: 0.5, Across.RIGHT: 1.0}
_LARGEST_STEP_RAD = math.pi / 4  # of an arc as one curve: then it is off by 4e-6 of its radius
_NOT_PRINTED = frozenset({"VIEWPORT"})


def write(sheet: Sheet) -> bytes:
    """Return a sheet as a PDF file of one page; the same sheet gives the same bytes."""
    return write_set([sheet])


def write_set(sheets: Sequence[Sheet]) -> bytes:
    """Return sheets as one PDF file, a page each, with bookmarks.

    Raises
    ------
    ValueError
        Without sheets.
    """
    if not sheets:
        msg = "a file of no pages is none"
        raise ValueError(msg)
    letters: dict[int, str] = {}
    contents = [send(sheet, PdfPage(sheet, letters)) for sheet in sheets]
    file = PdfFile()
    tree = file.reserve()
    groups = _groups(file, sheets)
    lettering = add_font(file, letters)
    resources = file.add(
        dictionary(
            {
                "Font": dictionary({"F": lettering}),
                "Properties": dictionary({f"L-{layer}": ref for layer, ref in groups.items()}),
            }
        )
    )
    pages = []
    for sheet, content in zip(sheets, contents, strict=True):
        box = array(["0", "0", *(f"{side * _POINTS_PER_MM:.8f}" for side in sheet.size_mm)])
        page = {
            "Type": "/Page",
            "Parent": tree,
            "MediaBox": box,
            "TrimBox": box,
            "Resources": resources,
            "Contents": file.add_stream(content),
        }
        pages.append(file.add(dictionary(page)))
    file.give(
        tree,
        dictionary({"Type": "/Pages", "Kids": array(pages), "Count": str(len(pages))}),
    )
    root = file.add(dictionary(_catalogue(file, tree, groups, sheets, pages)))
    return file.finish(root, file.add(dictionary(_info(sheets))))


def _groups(file: PdfFile, sheets: Iterable[Sheet]) -> dict[str, Raw]:
    """Add an optional content group for every layer, in the order of inking."""
    out: dict[str, Raw] = {}
    for layer in (layer for sheet in sheets for layer in sheet.layers):
        if layer.name in out:
            continue
        group = {"Type": "/OCG", "Name": string(layer.name)}
        if layer.name in _NOT_PRINTED:
            group["Usage"] = "<</Print <</PrintState /OFF>>>>"
        out[layer.name] = file.add(dictionary(group))
    return out


def _catalogue(
    file: PdfFile,
    tree: Raw,
    groups: dict[str, Raw],
    sheets: Sequence[Sheet],
    pages: Sequence[Raw],
) -> dict[str, str]:
    every = array(groups.values())
    return {
        "Type": "/Catalog",
        "Pages": tree,
        "Lang": "(en)",
        "PageMode": "/UseOutlines" if len(sheets) > 1 else "/UseNone",
        "ViewerPreferences": "<</PrintScaling /None /DisplayDocTitle true>>",
        "OCProperties": dictionary(
            {"OCGs": every, "D": dictionary({"BaseState": "/ON", "Order": every})}
        ),
        "Outlines": _bookmarks(file, sheets, pages),
    }


def _bookmarks(file: PdfFile, sheets: Sequence[Sheet], pages: Sequence[Raw]) -> Raw:
    """Add a bookmark for every sheet: its name, which is that of its files, and its title."""
    root = file.reserve()
    marks = [file.reserve() for _ in sheets]
    for n, (sheet, page) in enumerate(zip(sheets, pages, strict=True)):
        entries = {
            "Title": string(plain(f"{sheet.name}: {sheet.title}")),
            "Parent": root,
            "Dest": array((page, "/Fit")),
        }
        if n:
            entries["Prev"] = marks[n - 1]
        if n + 1 < len(marks):
            entries["Next"] = marks[n + 1]
        file.give(marks[n], dictionary(entries))
    known = {"First": marks[0], "Last": marks[-1], "Count": str(len(marks))}
    file.give(root, dictionary({"Type": "/Outlines", **known}))
    return root


def _info(sheets: Sequence[Sheet]) -> dict[str, str]:
    first = sheets[0]
    own = {plain(key): string(plain(value)) for key, value in first.properties}
    return {
        **own,
        "Title": string(plain(first.title)),
        "Subject": string(plain(first.description)),
        "Producer": "(benchlay)",
    }


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
        matrix = " ".join(map(number, (cos, sin, -sin, cos, x, y)))
        self._ink(text.layer, f"BT /F {number(size)} Tf {matrix} Tm {self._shown(words)} ET")

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
        out = [f"{_POINTS_PER_MM:.10f} 0 0 {_POINTS_PER_MM:.10f} 0 0 cm"]
        for layer in self._sheet.layers:
            ink = self._layers[layer.name]
            if ink:
                mark = name(f"L-{layer.name}")
                out += [f"/OC {mark} BDC", "q", _look(layer), *ink, "Q", "EMC"]
        return ("\n".join(out) + "\n").encode("ascii")

    def _ink(self, layer: str, operators: str) -> None:
        self._layers[layer].append(operators)

    def _pair(self, point: Point) -> str:
        x, y = self._frame.on_paper(point)
        return f"{number(x)} {number(y)}"

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
            code = letter.encode("utf-16-be", "replace").hex().upper()
            out.append(f"/Span <</ActualText <FEFF{code}>>> BDC <0000> Tj EMC")
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


def _look(layer: Layer) -> str:
    """Return the operators that set colour, width and pattern of a layer."""
    red, green, blue = (number(int(layer.colour[n : n + 2], 16) / 255) for n in (1, 3, 5))
    colour = f"{red} {green} {blue}"
    pattern = " ".join(number(length) for length in layer.pattern_mm)
    cap = _BUTT if layer.pattern_mm else _ROUND
    width = number(layer.width_mm)
    return f"{colour} RG {colour} rg {width} w {cap} J {_ROUND} j [{pattern}] 0 d"


def _polar(centre: Point, radius: float, angle: float) -> Point:
    return (centre[0] + radius * math.cos(angle), centre[1] + radius * math.sin(angle))


def _centre(start: Point, end: Point, bulge: float) -> Point:
    """Return the centre of the arc that a bulge means."""
    (ax, ay), (bx, by) = start, end
    offset = (1.0 - bulge * bulge) / (4.0 * bulge)
    return ((ax + bx) / 2 - (by - ay) * offset, (ay + by) / 2 + (bx - ax) * offset)
