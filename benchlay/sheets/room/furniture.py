"""Doors, windows and the places of signs on a room plan."""

from __future__ import annotations

import math
from collections.abc import Iterator, Sequence

import shapely

from benchlay.hazards.model import Sign
from benchlay.layout.layout import Layout
from benchlay.layout.room import Room
from benchlay.sheets.primitives import Arc, Line, Point, Primitive

_OUTSIDE = 150.0  # of a door's sign off the wall's inner face: about a wall's thickness
_PROBE_MM = 1.0


def _unit(start: Point, end: Point) -> tuple[Point, float]:
    length = math.dist(start, end)
    return ((end[0] - start[0]) / length, (end[1] - start[1]) / length), length


def _inward(start: Point, end: Point, room: shapely.Polygon) -> Point:
    """Return the unit vector square to a wall, into the room."""
    (ux, uy), _ = _unit(start, end)
    x, y = (start[0] + end[0]) / 2, (start[1] + end[1]) / 2
    left = (-uy, ux)
    within = shapely.contains_xy(room, x + _PROBE_MM * left[0], y + _PROBE_MM * left[1])
    return left if within else (uy, -ux)


def door_drawn(
    start: Point, end: Point, room: shapely.Polygon, scale: float
) -> Iterator[Primitive]:
    """Draw a door: its leaf open into the room, and its swing."""
    _, length = _unit(start, end)
    into = _inward(start, end, room)
    leaf = (start[0] + length * into[0], start[1] + length * into[1])
    yield Line("OPTICS", start, leaf)
    first = math.degrees(math.atan2(into[1], into[0]))
    second = math.degrees(math.atan2(end[1] - start[1], end[0] - start[0]))
    if (second - first) % 360.0 > 180.0:  # noqa: PLR2004 (a quarter turn, either way)
        first, second = second, first
    yield Arc("BODIES", start, length, first, second)
    for corner in (start, end):
        reach = 1.5 * scale
        yield Line(
            "OPTICS",
            (corner[0] - reach * into[0], corner[1] - reach * into[1]),
            (corner[0] + reach * into[0], corner[1] + reach * into[1]),
        )


def window_drawn(start: Point, end: Point, scale: float) -> Iterator[Primitive]:
    """Draw a window: lines along both sides of the wall."""
    (ux, uy), _ = _unit(start, end)
    for off in (-1.0, 1.0):
        dx, dy = -uy * off * scale, ux * off * scale
        yield Line("BODIES", (start[0] + dx, start[1] + dy), (end[0] + dx, end[1] + dy))
    for x, y in (start, end):
        yield Line("BODIES", (x - uy * -scale, y + ux * -scale), (x - uy * scale, y + ux * scale))


def marks_of(layout: Layout, room: Room, signs: Sequence[Sign]) -> list[tuple[Point, list[str]]]:
    """Return places in the plan with the numbers of the signs that go there."""
    places = _places(layout, room)
    found: dict[Point, list[str]] = {}
    for sign in signs:
        at = places.get(sign.place)
        if at is not None:
            found.setdefault(at, []).append(sign.number)
    return list(found.items())


def _places(layout: Layout, room: Room) -> dict[str, Point]:
    """Return places in the plan by what the schedule of signs calls them."""
    found: dict[str, Point] = {}
    for name, source in layout.sources.items():
        at = source.stand.at_mm
        if at is not None:
            found[f"on the housing of {name}"] = found[f"at the exit of {name}"] = (at[0], at[1])
    inside = shapely.Polygon(room.outline)
    for name, door in room.doors.items():
        into = _inward(door.from_mm, door.to_mm, inside)
        x, y = ((a + b) / 2 for a, b in zip(door.from_mm, door.to_mm, strict=True))
        found[f"at door {name}, outside"] = (x - _OUTSIDE * into[0], y - _OUTSIDE * into[1])
    if layout.enclosure is not None:
        for name, panel in layout.enclosure.panels.items():
            x, y = ((a + b) / 2 for a, b in zip(panel.from_mm, panel.to_mm, strict=True))
            found[f"on panel {name}"] = (x, y)
        for name, lid in layout.enclosure.lids.items():
            centre = shapely.Polygon(lid.outline).representative_point()
            found[f"on lid {name}"] = (centre.x, centre.y)
    return found
