"""Cutting files: the flat blank 1:1, closed contours and circles, and nothing beside them.

The lower left corner of the blank lies in the origin; the sheet is the blank's own extent, so
that the file's extents are those of what is cut.
"""

from __future__ import annotations

from collections.abc import Iterator

from benchlay.making.blank import Blank
from benchlay.making.parts import Part
from benchlay.sheets.primitives import Circle, Layer, Line, Polyline, Primitive, Sheet

LAYERS = (
    Layer("CUT_OUTER", "outer contours, cut last", "#000000", 0.25),
    Layer("CUT_INNER", "inner contours, cut first", "#a31515", 0.25),
    Layer("DRILL", "holes of fixings, drilled or cut", "#123f9c", 0.25),
    Layer("TAP", "holes to be tapped, core diameter", "#4b1d8f", 0.25),
    Layer("BEND_UP", "bends towards who looks at the blank; not cut", "#0f6b2e", 0.25),
    Layer("BEND_DOWN", "bends away from who looks at the blank; not cut", "#8a5a00", 0.25),
    Layer("ENGRAVE", "engraved; not cut", "#606060", 0.25),
)
"""All layers of a cutting file, used or not: a machine's presets go by their names."""


def cut_sheet(part: Part, properties: tuple[tuple[str, str], ...] = ()) -> Sheet:
    """Return the cutting file of a part."""
    blank = part.blank
    width, height = blank.flat_mm
    return Sheet(
        name=f"cut-{part.name}",
        title=f"cut-{part.name}",
        description=f"Flat blank of {', '.join(part.names)}, 1:1",
        size_mm=(width, height),
        scale=1.0,
        origin_mm=(0.0, 0.0),
        window_mm=((0.0, 0.0), (width, height)),
        layers=LAYERS,
        model=tuple(contours(blank)),
        paper=(),
        properties=(
            ("material", part.material or "not stated"),
            ("thickness mm", f"{part.thickness_mm:g}"),
            ("quantity", str(part.quantity)),
            *properties,
        ),
    )


def contours(blank: Blank) -> Iterator[Primitive]:
    """Yield what is cut, drilled and bent, each on its layer."""
    yield Polyline("CUT_OUTER", blank.outer, closed=True)
    for loop in blank.inner:
        yield Polyline("CUT_INNER", loop, closed=True)
    for hole in blank.rounds:
        yield Circle("CUT_INNER", hole.centre, hole.diameter_mm / 2)
    for hole in blank.holes:
        yield Circle("DRILL", hole.centre, hole.diameter_mm / 2)
    for bend in blank.bends:
        yield Line("BEND_UP" if bend.up else "BEND_DOWN", bend.start, bend.end)
