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

import numpy as np

from benchlay.checks._check import Context, length_text, rounded_up
from benchlay.findings import Finding, Severity
from benchlay.layout.bench import Bench
from benchlay.layout.stand import Place
from benchlay.scene.tables import Floats

NAME = "off-bench"

# It cannot be built as drawn.
SEVERITY = Severity.FAIL

_STANDS = ("foot", "post", "source")
_LOWEST_MM = 1e-6  # a body whose lower side is no higher stands on the bench itself
_ROUNDING_MM = 1e-6


def check(context: Context, variant: int) -> Iterator[Finding]:
    """Report each item once, by the part that reaches out furthest."""
    bench = context.layout(variant).bench
    standing = _standing(context, variant)
    for name, where in _items(context, variant):
        parts = standing.get(name) or [("middle", np.array([where[:2]]))]
        beyond = [_beyond(corners, bench) for _, corners in parts]
        worst = max(range(len(parts)), key=beyond.__getitem__)
        if beyond[worst] > _ROUNDING_MM:
            yield _finding(context, variant, name, (parts[worst][0], where), beyond[worst])


def _standing(context: Context, variant: int) -> dict[str, list[tuple[str, Floats]]]:
    """Return, by item, the parts of it that stand on the bench, with their corners in plan."""
    bodies = context.bodies
    found: dict[str, list[tuple[str, Floats]]] = {}
    for row in bodies.rows(variant).tolist():
        name, part = bodies.label(row)
        if part in _STANDS or (part == "body" and abs(bodies.low_mm[row, 2]) <= _LOWEST_MM):
            found.setdefault(name, []).append((part, bodies.corners(row)[:, :2]))
    return found


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


def _beyond(corners: Floats, bench: Bench) -> float:
    """Return how far the hull of corners (N, 2) reaches beyond the bench, mm.

    Over a convex bench the distance from it is greatest at a corner.
    """
    if bench.size_mm is None:
        return _beyond_outline(corners, bench)
    over = np.maximum(np.maximum(-corners, corners - np.array(bench.size_mm)), 0.0)
    return float(np.hypot(over[:, 0], over[:, 1]).max())


def _beyond_outline(corners: Floats, bench: Bench) -> float:
    """Return the same for a bench of any other outline, which may have inward corners."""
    # Loaded here: polygons take longer to load than a plain check has other things to do.
    import shapely

    top = shapely.Polygon(bench.outline)
    outside = shapely.difference(shapely.convex_hull(shapely.multipoints(corners)), top)
    if shapely.is_empty(outside):
        return 0.0
    ends = shapely.points(shapely.get_coordinates(outside))
    return float(shapely.distance(ends, top).max())


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
