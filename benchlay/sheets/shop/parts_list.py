"""Parts list: what has to be there before the bench is set out, like things once."""

from __future__ import annotations

import re
from collections.abc import Iterable, Iterator
from math import degrees
from typing import TypeAlias

from benchlay.document.record import Record
from benchlay.elements._coating import Band, Coating
from benchlay.elements._kind import Glass
from benchlay.elements.mount import Holder
from benchlay.geometry.outline import Outline
from benchlay.geometry.solid import Solid
from benchlay.layout.layout import Layout
from benchlay.making.parts import parts_of
from benchlay.placing.placed import PlacedElement, PlacedSource, PlacedState
from benchlay.sheets.shop.rows import Heading, Rows

_HEADINGS = (
    Heading("item", 12.0),
    Heading("quantity", 18.0),
    Heading("what", 36.0),
    Heading("data", 150.0),
    Heading("names", 118.0),
)
# How a thing is set is no matter of which thing it is.
_PLACE = re.compile(r"Span\([^()]*\)")  # where in the file a value is written
_SETTINGS = frozenset({"axis", "closed", "sends", "wedge_towards"})
_Thing: TypeAlias = tuple[str, str, str, str, str]  # group, what, data, what else is alike, name
_ORDER = ("source", "element", "mount", "post", "foot", "panel", "lid")


def parts_list(state: PlacedState) -> Rows:
    """Return the parts list of the bench as drawn, with what is taken out in that state."""
    together: dict[tuple[int, str, str, str], list[str]] = {}
    for group, what, data, alike, name in _things(state):
        together.setdefault((_ORDER.index(group), what, data, alike), []).append(name)
    rows = tuple(
        (item, len(names), what, data, ", ".join(sorted(names)))
        for item, ((_, what, data, _), names) in enumerate(sorted(together.items()), start=1)
    )
    notes = (
        "Counted from the layout: things of the same kind and data share an item. Elements that "
        "a state takes out are counted too. Lengths in mm; posts run from the bench's top to the "
        "mount. Of coatings, what they reflect is listed; elements that differ in what is not "
        "listed are items of their own. Screws, clamps, cables and switches are not in the layout "
        "and not listed.",
    )
    return Rows("parts", "Parts list", _HEADINGS, rows, notes)


def _things(state: PlacedState) -> Iterator[_Thing]:
    for name in sorted(state.sources):
        yield "source", "source", _source_data(state.sources[name]), "", name
    for name in sorted(state.elements):
        item = state.elements[name]
        data, alike = _data(item.element.record)
        yield "element", item.element.kind, data, alike, name
        yield from _held(item, name)
    yield from _sheets(state.layout)


def _source_data(placed: PlacedSource) -> str:
    lines = sorted({line.wavelength_nm for line in placed.source.lines})
    words = " + ".join(f"{nm:g} nm" for nm in lines)
    body = placed.source.body
    if body is None:
        return words
    return f"{words}, body {body.length_mm:g} x {body.width_mm:g} x {body.height_mm:g}"


def _data(record: Record) -> tuple[str, str]:
    """Return what a record says in words, and what it says that no words here are found for.

    Tables inside it stand in the layout; things that differ in them are other things.
    """
    out, others = [], []
    for attribute, spec in record.KEYS.items():
        value = getattr(record, attribute)
        if spec.name in _SETTINGS or value is None:
            continue
        text = _value(degrees(value) if attribute.endswith("_rad") else value)
        if not text or isinstance(value, Coating):
            others.append(f"{spec.name} {_PLACE.sub('', repr(value))}")
        if text and _telling(attribute, value, spec.default):
            out.append(f"{spec.name} {text}{' deg' if attribute.endswith('_rad') else ''}")
    return ", ".join(out), "; ".join(others)


def _telling(attribute: str, value: object, default: object) -> bool:
    """Whether a value is worth a word: sizes and glass are, even where they are the default."""
    if isinstance(value, Outline | Glass):
        return True
    return value != 0.0 and (value != default or attribute.endswith("_mm"))


def _value(value: object) -> str:
    """Return plain values in words; tables inside a record have none that fit a line."""
    match value:
        case bool():
            words = "yes" if value else "no"
        case float() | int():
            words = f"{value:.6g}"
        case str():
            words = value
        case Outline():
            words = _wide(value)
        case Coating():
            words = _coated(value)
        case Glass():
            words = value.name or f"index {value.ratio:g}"
        case tuple() if value and all(isinstance(v, float | int) for v in value):
            words = " x ".join(f"{v:.6g}" for v in value)
        case _:
            words = ""
    return words


def _coated(coating: Coating) -> str:
    """Return what a coating reflects, band by band; of what is not coated, nothing."""
    if coating.metal:
        return coating.metal
    return ", ".join(_band(band) for band in coating.bands)


def _band(band: Band) -> str:
    words = f"{100 * band.s:.6g} %"
    if band.s != band.p:
        words = f"s {words} p {100 * band.p:.6g} %"
    if band.from_nm is None or band.to_nm is None:
        return words
    return f"{words} at {band.from_nm:g} to {band.to_nm:g} nm"


def _wide(outline: Outline) -> str:
    """Return how wide and high an outline is: one figure for a circle."""
    if outline.corners:
        sides = [max(c) - min(c) for c in zip(*outline.corners, strict=True)]
    else:
        sides = [2 * radius for radius in outline.radii]
    figures = [f"{side:.6g}" for side in sides]
    return figures[0] if not outline.corners and len(set(figures)) == 1 else " x ".join(figures)


def _held(item: PlacedElement, name: str) -> Iterator[_Thing]:
    holder: Holder = item.holder
    if holder.box is not None:
        depth, width, height = _extents(holder.box)
        yield "mount", "mount", f"width {width:g}, height {height:g}, depth {depth:g}", "", name
    for solid in holder.upright:
        length, width, height = _extents(solid)
        if solid.part == "post" and solid.cylinder is not None:
            yield "post", "post", f"diameter {2 * solid.cylinder[2]:g}, length {height:g}", "", name
        elif solid.part == "foot":
            yield "foot", "foot", f"{width:g} x {length:g}, thickness {height:g}", "", name


def _extents(solid: Solid) -> tuple[float, ...]:
    def span(values: Iterable[float]) -> float:
        ordered = sorted(values)
        return round(ordered[-1] - ordered[0], 6)

    return tuple(span(p[k] for p in solid.points) for k in range(3))


def _sheets(layout: Layout) -> Iterator[_Thing]:
    for part in parts_of(layout):
        width, height = (round(v, 2) for v in part.blank.flat_mm)
        data = (
            f"{part.material or 'material not stated'}, t = {part.thickness_mm:g}, flat {width:g} "
            f"x {height:g}, sheet panel-{part.name}"
        )
        for name in part.names:
            yield part.kind, part.kind, data, "", name
