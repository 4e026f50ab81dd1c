"""No straight corridor leads a driver to the adjusters of a mount.

Why it matters
--------------
A mirror that cannot be reached cannot be set. Bent fingers and hands in the beam are what is
left.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     M1:  # <- tight-access
       {kind: mirror, after: red, distance: 300, incidence: 0, diameter: 25.4, metal: silver}
     supply:
       kind: obstacle
       at: [500, 180]
       facing: 0
       outline: [[0, 0], [50, 0], [50, 50], [0, 50]]
       to_height: 150

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     M1:
       {kind: mirror, after: red, distance: 300, incidence: 0, diameter: 25.4, metal: silver}
     supply:
       kind: obstacle
       at: [520, 180]
       facing: 0
       outline: [[0, 0], [50, 0], [50, 50], [0, 50]]
       to_height: 150

What it does not see
--------------------
Where on its side of the mount each adjuster is: the corridor is taken from the middle. Panels
and lids, which come off for adjusting. Mounts of optics that do not steer are left out unless
the layout writes their `adjusters`.

Source
------
A hand with a driver takes a straight way of some 25 mm by 100 mm (common practice); the
layout's `limits.driver`.
"""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from benchlay.checks._check import Bodies, Body, Context, length_text, overlapping
from benchlay.elements.mount import DEFAULT_MOUNT, Mount
from benchlay.findings import Finding, Severity
from benchlay.geometry.convex import hull
from benchlay.placing.placed import PlacedElement
from benchlay.placing.pose import add

NAME = "tight-access"

# It can be built, and set with some trouble.
SEVERITY = Severity.WARN

_SHEETS = ("panel", "lid")


def check(context: Context, variant: int) -> Iterator[Finding]:
    """Report each mount whose corridor something stands in, with all that does."""
    bodies = context.bodies
    rows = bodies.rows(variant)
    for name, item in sorted(context.state(variant).elements.items()):
        corridor = None if item.out else _corridor(context, variant, item)
        if corridor is None:
            continue
        inside = sorted(
            {
                bodies.label(row)[0]
                for row in bodies.in_box(rows, corridor).tolist()
                if _in_the_way(bodies, row, corridor)
            }
        )
        if inside:
            yield _finding(context, variant, name, inside)


def _in_the_way(bodies: Bodies, row: int, corridor: Body) -> bool:
    name, part = bodies.label(row)
    own = name == corridor.name or part in _SHEETS
    return not own and overlapping(bodies.body(row), corridor)


def _corridor(context: Context, variant: int, item: PlacedElement) -> Body | None:
    """Return the way that a driver needs, as a body; None where nothing is to be set."""
    box = item.holder.box
    mount = item.element.mount if isinstance(item.element.mount, Mount) else DEFAULT_MOUNT
    # What has a branch of its own that goes straight on is not there to steer.
    steers = item.element.record.DEFAULT_BRANCH != "transmitted" or mount.written("adjusters")
    if box is None or not steers:
        return None
    driver = context.layout(variant).limits.driver
    half, length = 0.5 * driver.diameter_mm, driver.length_mm
    points = np.array(box.points)
    low, high = points.min(axis=0), points.max(axis=0)
    middle = 0.5 * (low + high)
    axis, sign = {"back": (0, -1.0), "left": (1, 1.0), "right": (1, -1.0), "top": (2, 1.0)}[
        mount.adjusters
    ]
    near, far = middle - half, middle + half
    edge = float(low[axis] if sign < 0.0 else high[axis])
    near[axis], far[axis] = sorted((edge, edge + sign * length))
    corners = [
        (x, y, z) for x in (near[0], far[0]) for y in (near[1], far[1]) for z in (near[2], far[2])
    ]
    placed = np.array([add(item.pose.at, item.pose.turn(corner)) for corner in corners])
    outline = hull(placed[:, :2])
    return Body(
        item.element.name, "corridor", outline, float(placed[:, 2].min()), float(placed[:, 2].max())
    )


def _finding(context: Context, variant: int, name: str, inside: list[str]) -> Finding:
    item = context.state(variant).elements[name]
    driver = context.layout(variant).limits.driver
    mount = item.element.mount if isinstance(item.element.mount, Mount) else DEFAULT_MOUNT
    what = " and ".join(f"'{other}'" for other in inside)
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=(
            f"{what} {'stands' if len(inside) == 1 else 'stand'} in the way of a driver to the "
            f"adjusters of '{name}' ({mount.adjusters})"
        ),
        expected=(
            f"a straight corridor {length_text(driver.diameter_mm)} wide and "
            f"{length_text(driver.length_mm)} long"
        ),
        remedy=f"move {what}, or turn the adjusters to another side (`mount: {{adjusters: …}}`)",
        element=name,
        at=item.pose.at,
        span=context.span_of(name, variant),
        key=tuple(inside),
    )
