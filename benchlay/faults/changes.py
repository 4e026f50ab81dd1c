"""Single changes to a state as it was placed: nothing moves but what is named."""

from __future__ import annotations

from math import cos, sin

from benchlay.document.forms import Entries
from benchlay.elements._coating import UNCOATED
from benchlay.elements._kind import Geometry
from benchlay.layout.sources import Source
from benchlay.placing.nominal import NominalRay
from benchlay.placing.placed import PlacedElement, PlacedState
from benchlay.placing.pose import Pose, Vector, add, cross, dot

STATED = "stated"  # the kind of a coating that says how much it reflects


def with_element(state: PlacedState, item: PlacedElement) -> PlacedState:
    """Return a state in which one element is as given."""
    return state._replace(elements={**state.elements, item.element.name: item})


def knocked(item: PlacedElement, yaw_rad: float, pitch_rad: float) -> PlacedElement:
    """Return an element whose mount is turned; post and foot stay where they are."""
    at, facing, pitch, rolled = item.pose
    if rolled is not None:
        msg = f"{item.element.name} is rolled: its pitch is not an axis of its own any more"
        raise ValueError(msg)
    return item._replace(pose=Pose(at, facing + yaw_rad, pitch + pitch_rad))


def out(item: PlacedElement) -> PlacedElement:
    """Return an element that is not there."""
    stand = item.element.stand.replace(out=True)
    return item._replace(element=item.element._replace(stand=stand))


def reversed_(item: PlacedElement) -> PlacedElement:
    """Return an element put in back to front: turned about the upright through its middle."""
    back, front, _, _ = item.geometry.extent
    normal = item.pose.axes()[0]
    pose = item.pose
    turned = Pose(add(pose.at, normal, back + front), pose.facing_rad + _HALF_TURN, -pose.pitch_rad)
    return item._replace(pose=turned)


_HALF_TURN = 3.141592653589793


def turned(item: PlacedElement, by_rad: float) -> PlacedElement:
    """Return an element whose axis is turned in its holder."""
    geometry = item.geometry
    bulk = geometry.bulk._replace(axis_rad=geometry.bulk.axis_rad + by_rad)
    return item._replace(geometry=geometry._replace(bulk=bulk))


def rolled(item: PlacedElement, beam: NominalRay | None, by_rad: float) -> PlacedElement:
    """Return an element rolled about the beam that arrives, anticlockwise as it comes.

    Without a nominal beam it is rolled about its own front normal.
    """
    normal = item.pose.axes()[0]
    if beam is None:
        point, axis = item.pose.at, (-normal[0], -normal[1], -normal[2])
    else:
        point, axis = beam.point, beam.direction
    away = add(item.pose.at, point, -1.0)
    x, y, z = item.pose.axes()
    axes = (_about(x, axis, by_rad), _about(y, axis, by_rad), _about(z, axis, by_rad))
    at = add(point, _about(away, axis, by_rad))
    return item._replace(pose=item.pose._replace(at=at, rolled=axes))


def _about(vector: Vector, axis: Vector, by_rad: float) -> Vector:
    """Turn a vector about a unit axis (Rodrigues)."""
    c, s = cos(by_rad), sin(by_rad)
    along = add((0.0, 0.0, 0.0), axis, (1.0 - c) * dot(axis, vector))
    return add(add(along, vector, c), cross(axis, vector), s)


def bare(item: PlacedElement) -> PlacedElement | None:
    """Return an element without its stated coatings; None where it has none."""
    faces = item.geometry.faces
    if not any(face.coating.kind == STATED for face in faces):
        return None
    stripped = tuple(
        face._replace(coating=UNCOATED) if face.coating.kind == STATED else face for face in faces
    )
    return item._replace(geometry=item.geometry._replace(faces=stripped))


def reshaped(item: PlacedElement, geometry: Geometry) -> PlacedElement:
    """Return an element of another shape in the same place."""
    return item._replace(geometry=geometry)


def with_source(state: PlacedState, source: Source) -> PlacedState:
    """Return a state in which a source emits other light."""
    placed = state.sources[source.name]._replace(source=source)
    return state._replace(sources={**state.sources, source.name: placed})


def opened(state: PlacedState, sheet: tuple[str, str]) -> PlacedState:
    """Return a state in which a sheet stands open: ``("panel", name)`` or ``("lid", name)``."""
    enclosure = state.layout.enclosure
    assert enclosure is not None
    kind, name = sheet
    panels, lids = enclosure.panels, enclosure.lids
    if kind == "panel":
        wide = {**panels, name: panels[name].replace(open=True)}
        changed = enclosure.replace(panels=Entries(wide, panels.spans))
    else:
        up = {**lids, name: lids[name].replace(open=True)}
        changed = enclosure.replace(lids=Entries(up, lids.spans))
    return state._replace(layout=state.layout._replace(enclosure=changed))
