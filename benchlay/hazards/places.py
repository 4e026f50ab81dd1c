"""Who may stand where: the controlled area of a state, people's places, doors and windows."""

from __future__ import annotations

from collections.abc import Iterable

import shapely
from shapely.geometry.base import BaseGeometry

from benchlay.hazards.model import Passage, Person
from benchlay.layout.layout import Layout
from benchlay.named import NamedTuple
from benchlay.zones import ControlledArea

_MM_PER_M = 1e3
_MM2_PER_M2 = 1e6
_IN_WALL_MM = 1.0  # doors lie in the wall's line: rounding and decimals stay far below


class Places(NamedTuple):
    """The controlled area, and who and what is in it."""

    area_m2: float
    people: tuple[Person, ...]
    passages: tuple[Passage, ...]


def places_of(layout: Layout, areas: Iterable[ControlledArea]) -> Places:
    """Return who is inside the controlled area of a state, and which doors it reaches.

    Parameters
    ----------
    layout : Layout
        Of the state.
    areas : iterable of ControlledArea
        Of the state.
    """
    area = shapely.union_all([shapely.Polygon(a.polygon[0], a.polygon[1:]) for a in areas])
    room = layout.room
    if room is None:
        return Places(_square_metres(area), (), ())
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
    return Places(_square_metres(area), people, passages)


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
