"""No mounting hole is within reach of what holds an element.

Why it matters
--------------
What cannot be bolted or clamped down moves at the first touch.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400], holes: {pitch: 100, first: [100, 100]}}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     M1:  # <- hole-miss
       {kind: mirror, after: red, distance: 250, turn: left 90, diameter: 25.4, metal: silver}

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400], holes: {pitch: 25, first: [25, 25]}}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     M1:
       {kind: mirror, after: red, distance: 250, turn: left 90, diameter: 25.4, metal: silver}

What it does not see
--------------------
Where in the foot its slots are: a hole anywhere under it counts. Holes that another foot
covers. A post without a foot is taken to be held by a fork. Sources, and what stands on the
bench by its own weight.

Source
------
A clamping fork reaches some 40 mm from the axis of a post (common practice).
"""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from benchlay.checks._check import Context, length_text, rounded_up
from benchlay.findings import Finding, Severity
from benchlay.geometry import convex
from benchlay.layout.bench import Bench
from benchlay.named import NamedTuple
from benchlay.scene.tables import Flags, Floats

NAME = "hole-miss"

# It can be set down, and with a clamp or a plate it can be held.
SEVERITY = Severity.WARN

_FORK_MM = 40.0  # from the axis of a bare post
_UNDER_MM = 1e-6


def check(context: Context, variant: int) -> Iterator[Finding]:
    """Report each element whose foot covers no hole, or whose post has none in reach."""
    bench = context.layout(variant).bench
    holes = _holes(bench)
    if holes is None:
        return
    bodies = context.bodies
    for name, row in sorted(_held(context, variant).items()):
        _, part = bodies.label(row)
        reach = _UNDER_MM if part == "foot" else _FORK_MM
        outline = bodies.body(row).outline
        if part == "foot" and _stands_over(holes, outline):
            continue
        place = outline if part == "foot" else np.array([convex.centroid(outline)])
        nearest = _nearest(holes, place)
        if nearest > reach:
            short = nearest - (0.0 if part == "foot" else reach)
            yield _finding(context, variant, name, part, short)


class _Holes(NamedTuple):
    """The holes of a grid: X columns by Y rows."""

    x: Floats  # (X,) mm
    y: Floats  # (Y,)
    there: Flags  # (Y, X) whether the bench reaches there


def _stands_over(holes: _Holes, outline: Floats) -> bool:
    """Tell whether a convex outline has a hole in it, or on its rim.

    Most feet do. They have a few corners and a few holes in their boxes: to look at these one
    by one is quicker than to measure them all.
    """
    (x0, y0), (x1, y1) = outline.min(axis=0).tolist(), outline.max(axis=0).tolist()
    columns = range(holes.x.searchsorted(x0), holes.x.searchsorted(x1, side="right"))
    rows = range(holes.y.searchsorted(y0), holes.y.searchsorted(y1, side="right"))
    corners = outline.tolist()
    sides = list(zip(corners, corners[1:] + corners[:1], strict=True))
    for column in columns:
        x = float(holes.x[column])
        for row in rows:
            y = float(holes.y[row])
            if holes.there[row, column] and all(
                (bx - ax) * (y - ay) - (by - ay) * (x - ax) >= 0.0 for (ax, ay), (bx, by) in sides
            ):
                return True
    return False


def _nearest(holes: _Holes, place: Floats) -> float:
    """Return how far the nearest hole is from a convex outline or a point; inf for no hole.

    A bench has thousands of holes: only those are measured whose columns and rows come so near
    to the place's box that one of them can be the nearest.
    """
    if not holes.there.any():
        return float("inf")
    low, high = place.min(axis=0), place.max(axis=0)
    across = np.maximum(np.maximum(low[0] - holes.x, holes.x - high[0]), 0.0)
    along = np.maximum(np.maximum(low[1] - holes.y, holes.y - high[1]), 0.0)
    # The place touches its box, so no hole is farther from it than from the box by more
    # than the box's diagonal.
    far = float(np.hypot(across.min(), along.min()) + np.hypot(*(high - low))) + _UNDER_MM
    while True:
        x, y = holes.x[across <= far], holes.y[along <= far]
        row, column = holes.there[along <= far][:, across <= far].nonzero()
        nearest = _least(np.stack((x[column], y[row]), axis=1), place)
        if nearest <= far:
            return nearest
        far *= 4.0  # the holes hoped for are not there: the outline cuts them off


def _least(holes: Floats, place: Floats) -> float:
    away = np.hypot(*(holes - place).T) if len(place) == 1 else convex.distances(holes, place)
    return float(away.min(initial=np.inf))


def _holes(bench: Bench) -> _Holes | None:
    """Return all holes on the bench; None without a grid."""
    if bench.holes is None:
        return None
    pitch, (x0, y0) = bench.holes.pitch_mm, bench.holes.first_mm
    outline = np.array(bench.outline)
    x = np.arange(x0, outline[:, 0].max() + _UNDER_MM, pitch)
    y = np.arange(y0, outline[:, 1].max() + _UNDER_MM, pitch)
    if bench.size_mm is not None:
        return _Holes(x, y, (x >= 0.0) & (y >= 0.0)[:, None])
    # Loaded here: polygons take longer to load than a plain check has other things to do.
    import shapely

    grid = shapely.points(*np.meshgrid(x, y))
    return _Holes(x, y, shapely.covers(shapely.Polygon(outline), grid))


def _held(context: Context, variant: int) -> dict[str, int]:
    """Return the row of what holds each element down: of its foot, else of its post."""
    elements = context.state(variant).elements
    found: dict[str, int] = {}
    for row in context.bodies.rows(variant).tolist():
        name, part = context.bodies.label(row)
        bare = part == "post" and name not in found
        if name in elements and (part == "foot" or bare):
            found[name] = row
    return found


def _finding(context: Context, variant: int, name: str, part: str, short: float) -> Finding:
    item = context.state(variant).elements[name]
    what = f"under the foot of '{name}'" if part == "foot" else f"in reach of the post of '{name}'"
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=f"no mounting hole is {what}; the next is {length_text(short)} out of reach",
        expected=(
            "a hole under the foot"
            if part == "foot"
            else f"a hole within {length_text(_FORK_MM)} of the post's axis"
        ),
        remedy=f"move '{name}' by {rounded_up(short, 3):g} mm, or give it a larger foot",
        element=name,
        at=item.pose.at,
        span=context.span_of(name, variant),
        value=short,
        limit=0.0,
        unit="mm",
    )
