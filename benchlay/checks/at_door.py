"""Light above the exposure limit reaches a door or a window of the room.

Why it matters
--------------
Who opens the door stands in the beam; what leaves by a window meets people who know nothing of
the laser.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     M1:  # <- at-door
       {kind: mirror, after: red, distance: 300, turn: left 90, diameter: 25.4, metal: silver}
   room:
     outline: [[-1000, -1500], [2000, -1500], [2000, 1500], [-1000, 1500]]
     doors: {corridor: {from: [800, 1500], to: [0, 1500]}}

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     M1: {kind: mirror, after: red, distance: 300, turn: right 90, diameter: 25.4, metal: silver}
   room:
     outline: [[-1000, -1500], [2000, -1500], [2000, 1500], [-1000, 1500]]
     doors: {corridor: {from: [800, 1500], to: [0, 1500]}}

What it does not see
--------------------
Light that is scattered twice. Panes and curtains of windows do not count: a window is taken to
be open. Doors end zones like walls: how far light goes on beyond one that opens is not computed.

Source
------
Beams are kept off doors and windows (common practice of laser safety manuals). The accessible
limit is that of IEC 60825-1:2014 for the layout's time base. Of scattered light every point of
a door or window is looked at, 20 mm apart, over its whole height.
"""

from __future__ import annotations

from collections.abc import Iterator
from math import ceil, hypot
from typing import TYPE_CHECKING

import numpy as np

from benchlay.checks._check import (
    Context,
    Found,
    Unevaluated,
    above,
    against,
    exposure_words,
    length_text,
    place_words,
    power_text,
    unjudged,
    wavelength_text,
)
from benchlay.findings import Finding, Severity
from benchlay.geometry.polygon import Point
from benchlay.layout.layout import Layout
from benchlay.named import NamedTuple
from benchlay.optics import moments
from benchlay.scene.tables import SINKS
from benchlay.tracing.beams import SOLID

if TYPE_CHECKING:
    from benchlay.checks._check.scattered import Met

NAME = "at-door"

# A beam that can hurt an eye is where people come and go.
SEVERITY = Severity.FAIL

_STEP_MM = 20.0  # between the points of a door that are looked at: less than an eye is wide
_BEFORE_WALL_MM = 2.0
_IN_WALL_MM = 1.0  # doors lie in the wall's line: rounding and decimals stay far below


class _Way(NamedTuple):
    """A door or window: its ends in plan and its heights above the floor, mm."""

    what: str
    name: str
    start: Point
    end: Point
    low_mm: float
    high_mm: float


def check(context: Context, variant: int) -> Iterator[Found]:
    """Report each beam that ends on a wall where a door or window is."""
    layout = context.layout(variant)
    ways = list(_ways(layout))
    if not ways:
        return
    yield from unjudged(context, variant)
    yield from _off_the_walls(layout, ways)
    beams, s = context.trace.beams, context.trace.scene.solids
    rows = context.beams_of(variant)
    rows = rows[context.hazardous[rows] & (beams.end_kind[rows] == SOLID)]
    for beam in rows.tolist():
        if SINKS[s.sink[beams.end_row[beam]]] != "wall":
            continue
        for way in ways:
            if _reaches(context, beam, way, layout.bench.surface_height_mm):
                power = float(context.accessible_w[beam])
                if above(power, float(context.limit_w[beam])):
                    yield _finding(context, variant, beam, way, power)
    yield from _scattered(context, variant, ways)


def _ways(layout: Layout) -> Iterator[_Way]:
    if layout.room is None:
        return
    for name, door in sorted(layout.room.doors.items()):
        yield _Way("door", name, door.from_mm, door.to_mm, 0.0, door.height_mm)
    for name, window in sorted(layout.room.windows.items()):
        yield _Way(
            "window",
            name,
            window.from_mm,
            window.to_mm,
            window.from_height_mm,
            window.to_height_mm,
        )


def _off_the_walls(layout: Layout, ways: list[_Way]) -> Iterator[Unevaluated]:
    """Say of what lies in no wall that nothing can reach it: walls stop the light elsewhere."""
    assert layout.room is not None
    corners = layout.room.outline
    walls = list(zip(corners, (*corners[1:], corners[0]), strict=True))
    for way in ways:
        if not any(_off_wall(wall, way) <= _IN_WALL_MM for wall in walls):
            places = layout.room.doors if way.what == "door" else layout.room.windows
            yield Unevaluated(
                f"{way.what} '{way.name}' does not lie in a wall of the room",
                "set both its ends on one side of the room's outline",
                span=places.spans.get(way.name),
            )


def _off_wall(wall: tuple[Point, Point], way: _Way) -> float:
    """Return how far the ends of a door or window are from a wall at most, mm."""
    (ax, ay), (bx, by) = wall
    length = hypot(bx - ax, by - ay)
    off = 0.0
    for x, y in (way.start, way.end):
        along = ((x - ax) * (bx - ax) + (y - ay) * (by - ay)) / length**2
        t = min(max(along, 0.0), 1.0)
        off = max(off, hypot(x - ax - t * (bx - ax), y - ay - t * (by - ay)))
    return off


def _reaches(context: Context, beam: int, way: _Way, floor_mm: float) -> bool:
    """Whether the envelope of a beam overlaps a door or window where it meets the wall."""
    x, y, z = context.end_at(beam)
    width = _half_width_mm(context, beam)
    (ax, ay), (bx, by) = way.start, way.end
    length = hypot(bx - ax, by - ay)
    along = ((x - ax) * (bx - ax) + (y - ay) * (by - ay)) / length
    off = abs((x - ax) * (by - ay) - (y - ay) * (bx - ax)) / length
    height = z + floor_mm
    beside = -width <= along <= length + width
    return off <= _IN_WALL_MM and beside and way.low_mm - width <= height <= way.high_mm + width


def _half_width_mm(context: Context, beam: int) -> float:
    """Return how far from the axis an eye could still meet too much where a beam ends, mm."""
    from benchlay.zones.limits import limits_of
    from benchlay.zones.swept import half_widths

    length = np.array([float(context.trace.beams.length[beam])])
    m = context.trace.beams.end_moments[:, beam]
    radius = float(max(moments.radii(m)[0], moments.radii(m)[1]))
    return max(radius, float(half_widths(context.trace, limits_of(context.trace), beam, length)[0]))


def _scattered(context: Context, variant: int, ways: list[_Way]) -> Iterator[Finding]:
    """Report by door or window and wavelength the lit surface that is seen from too near."""
    from benchlay.checks._check.scattered import lit, met_at

    floor = context.layout(variant).bench.surface_height_mm
    places = lit(context, variant)
    for way in ways:
        heights = way.low_mm - floor, way.high_mm - floor
        worst: dict[float, Met] = {}
        for one in places:
            # The wall itself begins at the point: looked at is what is just before it.
            for point in _points(way, (one.spot.at[0], one.spot.at[1])):
                for met in met_at((one,), point, heights):
                    if met.nm not in worst or met.ratio > worst[met.nm].ratio:
                        worst[met.nm] = met
        for nm, met in sorted(worst.items()):
            yield _lit_from(context, variant, way, met, nm)


def _points(way: _Way, towards: Point) -> Iterator[Point]:
    """Yield points along a door or window, a little nearer to some place than the wall."""
    (ax, ay), (bx, by) = way.start, way.end
    steps = max(2, ceil(hypot(bx - ax, by - ay) / _STEP_MM))
    for i in range(steps + 1):
        x, y = ax + (bx - ax) * i / steps, ay + (by - ay) * i / steps
        far = hypot(x - towards[0], y - towards[1])
        if far > _BEFORE_WALL_MM:
            share = _BEFORE_WALL_MM / far
            yield x + share * (towards[0] - x), y + share * (towards[1] - y)


def _lit_from(context: Context, variant: int, way: _Way, met: Met, nm: float) -> Finding:
    spot = met.spot
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=(
            f"{wavelength_text(nm)} from '{context.source_of(spot.beam)}' scattered by "
            f"{place_words(spot.sink, spot.name)} reaches {way.what} '{way.name}', "
            f"{length_text(met.far_mm)} away: {against(met.limit, met.irradiance_w_m2)}; how far "
            "it goes on beyond is not computed"
        ),
        expected=(
            f"at least {length_text(spot.radius_mm)} to what is lit, or something opaque between"
        ),
        remedy=f"screen what is lit from {way.what} '{way.name}', or end the beam on a dump",
        element=spot.name,
        beam=int(context.numbers[spot.beam]),
        at=spot.at,
        span=context.span_of(spot.name, variant),
        value=met.irradiance_w_m2,
        limit=met.limit.mpe_w_m2,
        unit="W/m2",
        key=(way.name, context.source_of(spot.beam), nm, spot.sink, spot.name),
    )


def _finding(context: Context, variant: int, beam: int, way: _Way, power: float) -> Finding:
    name = context.left_name(beam)
    limit = float(context.limit_w[beam])
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=(
            f"{power_text(power)} of {context.from_words(beam)} reaches {way.what} "
            f"'{way.name}': {exposure_words(context, beam, power)}; how far it goes on beyond "
            "is not computed"
        ),
        expected=f"at most {power_text(limit)} at doors and windows",
        remedy=f"end the beam on a dump or screen before it reaches {way.what} '{way.name}'",
        element=name,
        beam=int(context.numbers[beam]),
        at=context.end_at(beam),
        span=context.span_of(name, variant),
        value=power,
        limit=limit,
        unit="W",
        key=(*context.chain(beam), way.name),
    )
