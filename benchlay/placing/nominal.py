"""The nominal chief ray through one element: from face to face, without clipping."""

from __future__ import annotations

from math import hypot, isnan

import numpy as np
from numpy.typing import NDArray

from benchlay.elements._kind import Acts, Face, Geometry, Inside, Step
from benchlay.geometry.axes import in_plane_axes
from benchlay.named import NamedTuple
from benchlay.optics.rays import reflect, refract
from benchlay.placing.media import Media
from benchlay.placing.pose import Pose, Vector, add, dot, unit


class NominalRay(NamedTuple):
    """Where a chief ray leaves an item, in the bench's medium, and its unit direction.

    Scattered light goes everywhere: until it is `aimed` at the next item, its direction is
    that of the light that was scattered.
    """

    point: Vector
    direction: Vector
    wavelength_nm: float
    aimed: bool = True


class Lost(NamedTuple):
    """Why a ray does not come through, and the mend where `after` is not to blame."""

    why: str
    mend: str = ""


class Standing(NamedTuple):
    """An element in its place: what a ray meets."""

    name: str
    pose: Pose
    geometry: Geometry


_BEHIND_MM = 1e-9  # a face met less than this behind the ray counts as touched


def through(
    ray: NominalRay,
    ways: tuple[tuple[Step, ...], ...],
    standing: Standing,
    media: Media,
    made_nm: float | None = None,
) -> NominalRay | Lost:
    """Return the ray that leaves an element by one of its branches.

    Behind the first face it may become light of another wavelength, `made_nm`. The way
    whose first face the ray enters nearest to its middle is the one taken.
    """
    best: tuple[float, tuple[Step, ...]] | None = None
    for way in ways:
        reach = _enters(ray, _face(standing, way[0][0]), standing, way[0][1])
        if reach is not None and (best is None or reach < best[0]):
            best = (reach, way)
    if best is None:
        return Lost(
            f"the beam does not come towards {standing.name!r} from a side where this branch begins"
        )
    if best[0] > 1.0:
        return Lost(f"the beam passes beside {standing.name!r}")
    if made_nm is None:
        return _along(ray, best[1], standing, media)
    if len(best[1]) == 1:
        return Lost(f"{standing.name!r} makes no light where it only reflects")
    inside = _along(ray, best[1][:1], standing, media)
    if isinstance(inside, Lost):
        return inside
    made = inside._replace(wavelength_nm=made_nm)
    entry = _face(standing, best[1][0][0])
    return _along(made, best[1][1:], standing, media, within=_beyond(entry, None))


def scattered(ray: NominalRay, standing: Standing) -> NominalRay | Lost:
    """Return the diffuse light of an element's front, not aimed at anything yet."""
    front = _face(standing, "front")
    reach = _enters(ray, front, standing, "reflected")
    if reach is None or reach > 1.0:
        return Lost(f"the beam does not meet the front of {standing.name!r}")
    _, point, _ = _meet(ray, front, standing.pose)
    return ray._replace(point=point, aimed=False)


def _face(standing: Standing, name: str) -> Face:
    return next(face for face in standing.geometry.faces if face.name == name)


def _meet(ray: NominalRay, face: Face, pose: Pose) -> tuple[float, Vector, Vector]:
    """Return the distance to a face's plane, where it is met, and its normal."""
    normal = pose.turn(face.normal)
    centre = pose.point(face.origin)
    slope = dot(ray.direction, normal)
    if abs(slope) < _BEHIND_MM:
        return float("inf"), ray.point, normal
    distance = dot(add(centre, ray.point, -1.0), normal) / slope
    return distance, add(ray.point, ray.direction, distance), normal


def _enters(ray: NominalRay, face: Face, standing: Standing, event: str) -> float | None:
    """Return how far from the middle (1 = at the rim) the ray enters a face from outside."""
    distance, point, normal = _meet(ray, face, standing.pose)
    from_front = dot(ray.direction, normal) < 0.0
    if not -_BEHIND_MM <= distance < float("inf"):
        return None
    if event == "transmitted" and _opens(face):
        return _reach(point, face, standing.pose)
    if not from_front or (face.acts is Acts.OPAQUE and event == "transmitted"):
        return None
    return _reach(point, face, standing.pose)


def _opens(face: Face) -> bool:
    """Whether a face is an opening, if a closed one: for the nominal ray all is at rest."""
    return face.acts is Acts.PASSES or (face.acts is Acts.OPAQUE and face.inside is Inside.NOWHERE)


def _reach(point: Vector, face: Face, pose: Pose) -> float:
    left, up = (pose.turn(axis) for axis in in_plane_axes(face.normal))
    from_centre = add(point, pose.point(face.origin), -1.0)
    u = dot(from_centre, left) - face.outline.centre[0]
    v = dot(from_centre, up) - face.outline.centre[1]
    a, b = face.outline.radii
    if face.outline.round:
        return hypot(u / a, v / b)
    return max(abs(u) / a, abs(v) / b)


def _along(
    ray: NominalRay,
    way: tuple[Step, ...],
    standing: Standing,
    media: Media,
    *,
    within: int | None = None,
) -> NominalRay | Lost:
    outside = media.index(None, ray.wavelength_nm)
    insides = [media.index(v.glass, ray.wavelength_nm) for v in standing.geometry.volumes()]
    index = outside if within is None else insides[within]
    for name, event in way:
        face = _face(standing, name)
        distance, point, normal = _meet(ray, face, standing.pose)
        if not -_BEHIND_MM <= distance < float("inf"):
            return Lost(f"the beam inside {standing.name!r} does not reach its face {name!r}")
        beyond = _beyond(face, within)
        behind = outside if beyond is None else insides[beyond]
        if isnan(index) or (event == "transmitted" and isnan(behind)):
            return _dark(standing, ray)
        if face.acts is Acts.OPAQUE and event == "transmitted" and not _opens(face):
            return Lost(f"face {name!r} of {standing.name!r} is opaque")
        direction: Vector | None
        if face.acts is Acts.LENS and event == "transmitted":
            power = outside / (2.0 * face.focal_mm)
            direction = _lensed(ray.direction, point, (index, behind, power), face, standing.pose)
        else:
            direction = _turned(ray.direction, normal, event, (index, behind), face)
        if direction is None:
            return Lost(f"the beam is totally reflected at face {name!r} of {standing.name!r}")
        if event == "transmitted":
            index, within = behind, beyond
        if face.acts is Acts.RETURNS:
            point = add(standing.pose.point(face.origin), _between(point, face, standing), -1.0)
        ray = NominalRay(point, direction, ray.wavelength_nm)
    return ray


def _dark(standing: Standing, ray: NominalRay) -> Lost:
    return Lost(
        f"the glass of {standing.name!r} has no known index at {ray.wavelength_nm:g} nm",
        f"name another glass for {standing.name!r}, or give its index: `glass: {{index: 1.5}}`",
    )


def _between(point: Vector, face: Face, standing: Standing) -> Vector:
    """Return the way from the middle of a face to a point."""
    return add(point, standing.pose.point(face.origin), -1.0)


def _beyond(face: Face, within: int | None) -> int | None:
    """Return the volume on the other side of a face, None outside the element."""
    if face.inside is Inside.NOWHERE:
        return within
    before = face.volumes[1] if face.inside is Inside.BOTH else None
    return face.volumes[0] if within == before else before


def _turned(
    direction: Vector, normal: Vector, event: str, indices: tuple[float, float], face: Face
) -> Vector | None:
    if event == "transmitted" and _opens(face):
        return direction
    if face.acts is Acts.RETURNS:
        return (-direction[0], -direction[1], -direction[2])
    if event == "reflected":
        return _vector(reflect(direction, normal))
    bent, total = refract(direction, normal, *indices)
    return None if bool(total) else _vector(bent)


def _lensed(
    direction: Vector,
    point: Vector,
    indices: tuple[float, float, float],
    face: Face,
    pose: Pose,
) -> Vector:
    """Bend by one face of the ideal thin lens: indices before and behind, and its power."""
    from benchlay.optics.thin_lens import bend

    forward, left, up = pose.axes()
    along = dot(direction, forward)
    from_centre = add(point, pose.point(face.origin), -1.0)
    offset = (dot(from_centre, left), dot(from_centre, up))
    slope = (dot(direction, left) / abs(along), dot(direction, up) / abs(along))
    bent = bend(slope, offset, indices[2], indices[0], indices[1])
    way = 1.0 if along > 0 else -1.0
    total = add(
        add((way * forward[0], way * forward[1], way * forward[2]), left, float(bent[0])),
        up,
        float(bent[1]),
    )
    result = unit(total)
    assert result is not None
    return result


def _vector(array: NDArray[np.float64]) -> Vector:
    x, y, z = array.tolist()
    return (x, y, z)
