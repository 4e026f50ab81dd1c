"""Something stands off the bench.

Why it matters
--------------
A foot that hangs over the edge cannot be bolted down, and what it carries will not stay where
it was set.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     M1:  # <- off-bench
       {kind: mirror, after: red, distance: 690, turn: left 90, diameter: 25.4, metal: silver}

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     M1:
       {kind: mirror, after: red, distance: 600, turn: left 90, diameter: 25.4, metal: silver}

What it does not see
--------------------
Whether the bench top carries the weight. What is mounted in a panel's opening stands on no
bench. An element without foot, post or body of its own is judged by its reference point.

Source
------
Common practice.
"""

from __future__ import annotations

from collections.abc import Iterator

import shapely
from shapely.geometry.base import BaseGeometry

from benchlay.checks._check import Body, Context, length_text, rounded_up
from benchlay.findings import Finding, Severity
from benchlay.layout.stand import Place

NAME = "off-bench"

# It cannot be built as drawn.
SEVERITY = Severity.FAIL

_STANDS = ("foot", "post", "source")
_LOWEST_MM = 1e-6  # a body whose lower side is no higher stands on the bench itself
_ROUNDING_MM = 1e-6


def check(context: Context, variant: int) -> Iterator[Finding]:
    """Report each item once, by the part that reaches out furthest."""
    bench = shapely.Polygon(context.layout(variant).bench.outline)
    shapely.prepare(bench)
    rows = context.bodies.rows(variant)
    inside = shapely.covers(bench, context.bodies.outline[rows])
    standing: dict[str, list[Body]] = {}
    for row, within in zip(rows.tolist(), inside.tolist(), strict=True):
        body = context.bodies.body(row)
        on_bench = body.part == "body" and abs(body.low_mm) <= _LOWEST_MM
        if body.part in _STANDS or on_bench:
            outside = standing.setdefault(body.name, [])
            if not within:
                outside.append(body)
    for name, where in _items(context, variant):
        parts = standing.get(name, [])
        if name in standing and not parts:
            continue
        outlines = [body.outline for body in parts] or [shapely.Point(where[:2])]
        beyond = [_beyond(outline, bench) for outline in outlines]
        worst = max(range(len(outlines)), key=beyond.__getitem__)
        if beyond[worst] > _ROUNDING_MM:
            part = parts[worst].part if parts else "middle"
            yield _finding(context, variant, name, (part, where), beyond[worst])


def _items(context: Context, variant: int) -> Iterator[tuple[str, tuple[float, float, float]]]:
    state = context.state(variant)
    for name, source in sorted(state.sources.items()):
        if _on_bench(source.source.stand):
            yield name, source.pose.at
    for name, element in sorted(state.elements.items()):
        if _on_bench(element.element.stand):
            yield name, element.pose.at


def _on_bench(stand: Place) -> bool:
    return not stand.out and stand.in_opening is None


def _beyond(outline: BaseGeometry, bench: BaseGeometry) -> float:
    """Return how far an outline reaches beyond the bench, mm."""
    outside = shapely.difference(outline, bench)
    if shapely.is_empty(outside):
        return 0.0
    corners = shapely.points(shapely.get_coordinates(outside))
    return float(shapely.distance(corners, bench).max())


def _finding(
    context: Context,
    variant: int,
    name: str,
    what: tuple[str, tuple[float, float, float]],
    beyond: float,
) -> Finding:
    part, where = what
    thing = {"foot": "the foot of ", "post": "the post of ", "source": "source "}.get(part, "")
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=f"{thing}'{name}' reaches {length_text(beyond)} beyond the edge of the bench",
        expected="everything that stands on the bench within its outline",
        remedy=f"move '{name}' inwards by {rounded_up(beyond, 3):g} mm or more",
        element=name,
        at=where,
        span=context.span_of(name, variant),
        value=beyond,
        limit=0.0,
        unit="mm",
    )
