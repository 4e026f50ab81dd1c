"""Something on the sheets for the shop cannot be made as drawn, or will not fit.

Why it matters
--------------
A hole that a tool cannot make, an edge that tears out, bolts that meet no hole: each is found
in the workshop, when the sheet has been paid for.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     T1: {kind: target, after: red, distance: 300}
   routes:
     main: [red, T1]
   enclosure:
     panels:
       south:
         from: [0, 0]
         to: [800, 0]
         fix: {hole: 6.6, pitch: 150, inset: 8}  # <- fit-for-making

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     T1: {kind: target, after: red, distance: 300}
   routes:
     main: [red, T1]
   enclosure:
     panels:
       south:
         from: [0, 0]
         to: [800, 0]
         fix: {hole: 6.6, pitch: 150, inset: 10}

What it does not see
--------------------
The mass of sheets whose material states no density: their drawings say that it is not
computed. Beams that go through a round opening without being handed over there by a route.
What a particular shop's tools can do.

Source
------
Common practice: holes at least as wide as the sheet is thick; the middle of a hole at least
1.5 diameters from any edge; two people from about 15 kg; M6 screws in holes of 6.6 mm, which
leave 0.6 mm between two of them in all. 1 inch is 25.4 mm by definition.
"""

from __future__ import annotations

from collections.abc import Iterator
from itertools import combinations
from math import dist, hypot
from typing import TYPE_CHECKING

from benchlay.checks._check import Context, length_text
from benchlay.document.span import Span
from benchlay.elements.mount import Mount
from benchlay.findings import Finding, Severity
from benchlay.layout.enclosure import Enclosure, Lid, Opening, Panel
from benchlay.layout.layout import Layout
from benchlay.layout.materials import SHEET

if TYPE_CHECKING:
    from benchlay.making.parts import Part

NAME = "fit-for-making"

# It can be mended in the shop, or done another way.
SEVERITY = Severity.WARN

_EDGE = 1.5  # diameters from the middle of a hole
_HEAVY_KG = 15.0
_METRIC_MM, _INCH_MM = 25.0, 25.4
_PLAY_MM = 0.6  # of two M6 screws in holes of 6.6
_ROUNDING_MM = 1e-6


def check(context: Context, variant: int) -> Iterator[Finding]:
    """Report what is wrong with panels and lids, ports and grids, by name."""
    layout = context.layout(variant)
    enclosure = layout.enclosure
    if enclosure is not None:
        for name in sorted(enclosure.panels):
            yield from _small(name, enclosure.panels[name], enclosure, layout)
        if any(p.fix for p in enclosure.panels.values()) or _weighable(layout, enclosure):
            # Loaded here: blanks are of use to no other check.
            from benchlay.making.parts import parts_of

            for part in parts_of(layout):
                yield from _of_part(part, enclosure)
        yield from _ports(context, variant, enclosure)
    yield from _grids(context, variant)


def _found(
    what: str,
    expected: str,
    remedy: str,
    *,
    place: tuple[str | None, Span | None],
    figures: tuple[float, float, str],
    key: str,
) -> Finding:
    name, span = place
    value, limit, unit = figures
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=what,
        expected=expected,
        remedy=remedy,
        element=name,
        span=span,
        value=value,
        limit=limit,
        unit=unit,
        key=(key, name or ""),
    )


# ------------------------------------------------------------------ holes


def _small(name: str, panel: Panel, enclosure: Enclosure, layout: Layout) -> Iterator[Finding]:
    """Report holes and openings narrower than the sheet is thick."""
    material = enclosure.material_of(panel)
    thick = (SHEET if material is None else layout.materials[material]).thickness_mm
    widths = [(f"opening '{k}'", _narrowest(o), o.span) for k, o in sorted(panel.openings.items())]
    if panel.fix is not None:
        widths.append(("the fixing holes", panel.fix.hole_mm, panel.fix.span_of("hole")))
    for what, width, span in widths:
        if width < thick - _ROUNDING_MM:
            yield _found(
                f"{what} of panel '{name}': {length_text(width)} wide in a sheet of "
                f"{length_text(thick)}",
                "holes at least as wide as the sheet is thick",
                f"make it {length_text(thick)} wide, or take a thinner sheet",
                place=(name, span),
                figures=(width, thick, "mm"),
                key=f"small {what}",
            )


def _narrowest(opening: Opening) -> float:
    start, end, low, high = opening.box_mm()
    return min(end - start, high - low)


def _of_part(part: Part, enclosure: Enclosure) -> Iterator[Finding]:
    kind, sheets = part.kind, enclosure.panels if part.kind == "panel" else enclosure.lids
    names = ", ".join(f"'{name}'" for name in part.names)
    first = part.names[0]
    if part.mass_kg is not None and part.mass_kg > _HEAVY_KG:
        yield _found(
            f"{kind} {names} weighs {part.mass_kg:.3g} kg",
            f"at most {_HEAVY_KG:g} kg for one pair of hands",
            "divide it, take a thinner or lighter sheet, or plan for two people",
            place=(first, sheets.spans.get(first)),
            figures=(part.mass_kg, _HEAVY_KG, "kg"),
            key="heavy",
        )
    worst = _worst_edge(part)
    if worst is not None and worst[0] < -_ROUNDING_MM:
        _, distance, diameter = worst
        panel = enclosure.panels[first]
        span = panel.span_of("fix") if panel.fix is not None else enclosure.panels.spans.get(first)
        yield _found(
            f"a hole of {length_text(diameter)} in panel {names} has its middle "
            f"{length_text(distance)} from an edge",
            f"at least 1.5 diameters, {length_text(_EDGE * diameter)}",
            f"move the row by {length_text(_EDGE * diameter - distance)} (`inset`, `pitch`), "
            "or move the opening",
            place=(first, span),
            figures=(distance, _EDGE * diameter, "mm"),
            key="edge",
        )


def _worst_edge(part: Part) -> tuple[float, float, float] | None:
    """Return by how much a hole clears the nearest edge at least, its distance, its diameter."""
    from benchlay.making.edges import edge_distances

    distances = zip(part.blank.holes, edge_distances(part.blank), strict=True)
    return min(
        ((d - _EDGE * hole.diameter_mm, d, hole.diameter_mm) for hole, d in distances),
        default=None,
    )


def _weighable(layout: Layout, enclosure: Enclosure) -> bool:
    """Whether the material of any panel or lid states a density."""
    sheets: list[Panel | Lid] = [*enclosure.panels.values(), *enclosure.lids.values()]
    names = {enclosure.material_of(sheet) for sheet in sheets} - {None}
    return any(layout.materials[name].density_kg_m3 for name in names if name)


# ------------------------------------------------------------------ ports


def _ports(context: Context, variant: int, enclosure: Enclosure) -> Iterator[Finding]:
    """Report round openings whose beams, handed over there, miss their middle."""
    allowed = context.layout(variant).limits.off_centre_mm
    ports = {
        f"{panel}.{name}": (panel, name)
        for panel in sorted(enclosure.panels)
        for name, opening in sorted(enclosure.panels[panel].openings.items())
        if opening.round
    }
    if not ports:
        return
    worst: dict[str, float] = {}
    for beam in context.beams_of(variant).tolist():
        port = context.routes.handed_at(beam)
        if port in ports:
            panel, name = ports[port]
            off = _off(enclosure.panels[panel], name, context.end_at(beam))
            worst[port] = max(off, worst.get(port, 0.0))
    for port, off in sorted(worst.items()):
        if off > allowed + _ROUNDING_MM:
            panel, name = ports[port]
            yield _found(
                f"the beam handed over at '{port}' passes {length_text(off)} from its middle",
                f"at most {length_text(allowed)} (`limits.off_centre`)",
                f"move the opening, or the beam, by {length_text(off)}",
                place=(panel, enclosure.panels[panel].openings[name].span),
                figures=(off, allowed, "mm"),
                key=f"port {port}",
            )


def _off(panel: Panel, name: str, at: tuple[float, float, float]) -> float:
    """Return how far from an opening's middle a beam crosses its panel's line."""
    opening = panel.openings[name]
    out = panel.outward
    along = (at[0] - panel.from_mm[0]) * -out[1] + (at[1] - panel.from_mm[1]) * out[0]
    return hypot(along - opening.along_mm, at[2] - (opening.height_mm or 0.0))


# ------------------------------------------------------------------ grids


def _grids(context: Context, variant: int) -> Iterator[Finding]:
    """Report threads, rows of holes and slots of the other grid than the bench's."""
    layout = context.layout(variant)
    holes = layout.bench.holes
    if holes is None or not any(_is(holes.pitch_mm, p) for p in (_METRIC_MM, _INCH_MM)):
        return
    own, other = _METRIC_MM, _INCH_MM
    if _is(holes.pitch_mm, _INCH_MM):
        own, other = other, own
    if holes.thread.upper().startswith("M") != (own == _METRIC_MM):
        yield _found(
            f"the bench's holes are {own:g} mm apart and have a thread of {holes.thread}",
            "M6 with 25 mm, or 1/4-20 with 25.4 mm",
            "look which of the two it is: over 36 holes the grids differ by 14.4 mm",
            place=(None, holes.span_of("thread") if holes.written("thread") else holes.span),
            figures=(own, other, "mm"),
            key="thread",
        )
    for name, span, length in _spacings(context, variant, layout):
        count = round(length / other)
        gap = abs(count * (own - other))
        if count and _is(length, count * other) and gap > _PLAY_MM + _ROUNDING_MM:
            yield _found(
                f"bolts of '{name}' are {length_text(length)} apart, {count} x {other:g}, on a "
                f"bench of {own:g} mm: off by {length_text(gap)}",
                f"at most {length_text(_PLAY_MM)}, the play of two M6 screws",
                f"use multiples of {own:g} mm, or slots",
                place=(name, span),
                figures=(gap, _PLAY_MM, "mm"),
                key="grid",
            )


def _is(value: float, wanted: float) -> bool:
    return abs(value - wanted) < _ROUNDING_MM * max(1.0, wanted)


def _spacings(
    context: Context, variant: int, layout: Layout
) -> Iterator[tuple[str, Span | None, float]]:
    """Yield the longest distance between bolts into the bench, of panels' feet and of mounts."""
    if layout.enclosure is not None:
        for name, panel in sorted(layout.enclosure.panels.items()):
            if panel.fix is None or panel.fold is None:
                continue  # only a foot is bolted to the bench
            count = int((panel.length_mm - 2 * panel.fix.inset_mm) / panel.fix.pitch_mm + 1e-9)
            if count > 0:
                yield name, panel.fix.span_of("pitch"), count * panel.fix.pitch_mm
    for name, item in sorted(context.state(variant).elements.items()):
        mount = item.element.mount
        if isinstance(mount, Mount) and mount.slots and not item.out:
            apart = [dist(a, b) for a, b in combinations(mount.slots, 2)]
            if apart:
                yield name, context.span_of(name, variant), max(apart)
