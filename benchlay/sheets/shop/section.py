"""The fold of a panel seen along its bend, formed, 1:1 on paper."""

from __future__ import annotations

from math import pi, tan

from benchlay.making.blank import Folding
from benchlay.making.parts import Part
from benchlay.sheets.lettering import SMALL_MM
from benchlay.sheets.primitives import Across, Line, Point, Polyline, Primitive, Text, figure
from benchlay.sheets.scale import Window

_QUARTER = tan(pi / 8)  # bulge of a quarter circle
_STUB_MM = 24.0  # of the sheet above the bend that is shown
_LEFT_MM = 22.0


def section(folding: Folding, part: Part, window: Window, decimal: str) -> list[Primitive]:
    """Draw the folded edge, inside at the right, as far as it has room in a window."""
    t, r, f = part.thickness_mm, folding.radius_mm, folding.flange_mm
    stub = max(_STUB_MM, 2 * (r + t))
    if f + _LEFT_MM + 30.0 > window.width or stub + 22.0 > window.height:
        return [_title(window, "Fold: see the notes; it has no room here at 1:1")]
    way = 1.0 if folding.sense == "in" else -1.0
    x0 = window.left + _LEFT_MM + (0.0 if way > 0 else f)
    y0 = window.low + 11.0

    def at(x: float, y: float) -> Point:
        return (x0 + way * x, y0 + y)

    corners = (
        at(0.0, stub), at(0.0, r + t), at(r + t, 0.0), at(f, 0.0), at(f, t), at(r + t, t),
        at(t, r + t), at(t, stub),
    )  # fmt: skip
    turn = way * _QUARTER
    bulges = (0.0, turn, 0.0, 0.0, 0.0, -turn if r > 0.0 else 0.0, 0.0, 0.0)
    # Enlarged in files that are true to size: so lines and a figure, and no dimension that
    # a program would measure.
    (ax, ay), (bx, _) = sorted((at(0.0, 0.0), at(f, 0.0)))
    y = ay - 6.0
    line: list[Primitive] = [Line("DIMENSIONS", (ax, y), (bx, y))]
    line += [Line("DIMENSIONS", (x, ay - 1.0), (x, y - 2.0)) for x in (ax, bx)]
    line += [Line("DIMENSIONS", (x - 1.2, y - 1.2), (x + 1.2, y + 1.2)) for x in (ax, bx)]
    label = ((ax + bx) / 2, y + 1.0)
    line.append(Text("DIMENSIONS", label, figure(f, 2, decimal), SMALL_MM, Across.CENTRE))
    words = f"Fold, formed, 1:1: R{figure(r, 2, decimal)}, t = {figure(t, 2, decimal)}"
    side = "inside at the right"
    return [
        Polyline("PANELS", corners, closed=True, bulges=bulges),
        *line,
        _title(window, f"{words}; {side}"),
    ]


def _title(window: Window, words: str) -> Text:
    return Text("TAGS", (window.left, window.high - 2 * SMALL_MM), words, SMALL_MM)
