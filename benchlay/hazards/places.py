"""Who may stand where: the controlled area of a state, people's places, doors and windows."""

from __future__ import annotations

from collections.abc import Iterable

import shapely
from shapely.geometry.base import BaseGeometry

from benchlay.hazards.model import Passage, Person
from benchlay.layout.layout import Layout
from benchlay.named import NamedTuple
from benchlay.zones import ControlledArea
from benchlay.zones.enclosure_line import enclosure_line

_MM_PER_M = 1e3
_MM2_PER_M2 = 1e6
_IN_WALL_MM = 1.0  # doors lie in the wall's line: rounding and decimals stay far below


class Places(NamedTuple):
    """The controlled area, and who and what is in it."""

    area_m2: float
    outside_m2: float | None  # of it, beyond the enclosure's line; None without one
    people: tuple[Person, ...]
    passages: tuple[Passage, ...]


# Zones end at the inner face of a panel but for the rounding of polygons, which is far below.
ROUNDING_MM = 0.05


def enclosed_area(layout: Layout) -> BaseGeometry | None:
    """Return the area within the enclosure's line, mm; None without an enclosure."""
    line = enclosure_line(layout)
    return shapely.Polygon(line.corners) if line.enclosed else None


def beyond(area: BaseGeometry, enclosed: BaseGeometry) -> BaseGeometry:
    """Return what of an area is beyond the enclosure's line, by more than rounding."""
    return shapely.difference(area, shapely.buffer(enclosed, ROUNDING_MM))


def places_of(
    layout: Layout, areas: Iterable[ControlledArea], enclosed: BaseGeometry | None
) -> Places:
    """Return who is inside the controlled area of a state, and which doors it reaches.

    Parameters
    ----------
    layout : Layout
        Of the state.
    areas : iterable of ControlledArea
        Of the state.
    enclosed : geometry or None
        From `enclosed_area`.
    """
    area = shapely.union_all([shapely.Polygon(a.polygon[0], a.polygon[1:]) for a in areas])
    outside = None if enclosed is None else _square_metres(beyond(area, enclosed))
    room = layout.room
    if room is None:
        return Places(_square_metres(area), outside, (), ())
    people = tuple(
        _person(area, name, person.at_mm, person.eyes)
        for name, person in sorted(room.people.items())
    )
    ways = [
        *(("door", name, door.from_mm, door.to_mm) for name, door in sorted(room.doors.items())),
        *(("window", name, w.from_mm, w.to_mm) for name, w in sorted(room.windows.items())),
    ]
    passages = tuple(
        Passage(kind, name, _reached(area, shapely.LineString([start, end])))
        for kind, name, start, end in ways
    )
    return Places(_square_metres(area), outside, people, passages)


def _square_metres(area: BaseGeometry) -> float:
    return round(float(area.area) / _MM2_PER_M2, 9)


def _person(area: BaseGeometry, name: str, at: tuple[float, float], eyes: str) -> Person:
    point = shapely.Point(at)
    if area.is_empty:
        return Person(name, eyes, at, inside=False, edge_m=None)
    edge = float(shapely.distance(area.boundary, point)) / _MM_PER_M
    return Person(name, eyes, at, bool(shapely.intersects(area, point)), round(edge, 6))


def _reached(area: BaseGeometry, way: BaseGeometry) -> bool:
    return not area.is_empty and float(shapely.distance(area, way)) <= _IN_WALL_MM
