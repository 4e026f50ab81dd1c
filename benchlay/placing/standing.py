"""Where one item stands and how it is turned, from its keys and the ray that arrives."""

from __future__ import annotations

from math import isnan
from typing import TYPE_CHECKING

from benchlay.elements._kind import Glass, Goal
from benchlay.layout.stand import Place, Stand
from benchlay.optics.fresnel import brewster_angle_rad
from benchlay.placing.complaints import complain, no_ray
from benchlay.placing.nominal import NominalRay
from benchlay.placing.orient import (
    Trouble,
    aimed,
    at_incidence,
    squarely,
    turned_in_height,
    turned_in_plan,
)
from benchlay.placing.points import fixed_point, goal_of, panel_of, point_meant
from benchlay.placing.pose import Pose, Vector, add, dot, facing, unit

if TYPE_CHECKING:
    from benchlay.layout.elements import Element
    from benchlay.layout.sources import Source
    from benchlay.placing.solve import Solver

_ORIGIN: Vector = (0.0, 0.0, 0.0)
_ROUNDS = 60  # of post and heading hanging on each other: converges geometrically
_CONVERGED_MM = 1e-12


def stand_source(source: Source, solver: Solver) -> Pose:
    """Return the nominal pose of a source: its front normal is the way of its beam."""
    stand = source.stand
    at = fixed_point(stand, solver)
    if at is None:
        complain(
            source,
            "at",
            "a source needs a place",
            expected="`at: [x, y]`",
            remedy="add `at`",
            solver=solver,
        )
    if stand.facing is None and stand.in_opening is not None:
        x, y = panel_of(stand.in_opening, solver).outward
        return facing(at, (-x, -y, 0.0))
    return _looking(source, stand, at, stand.pitch_rad or 0.0, solver)


def stand_element(element: Element, solver: Solver) -> Pose:
    """Return the nominal pose of an element."""
    stand = element.stand
    ray = None if _needs_no_ray(element) else solver.arrivals.at(element)
    at = fixed_point(stand, solver)
    turned = _turned(element, ray, at, solver)
    if at is None and stand.hole is not None:
        return _over_hole(element, ray, turned, solver)
    if at is None:
        if ray is None:
            no_ray(element, solver)
        at = _on_ray(ray, stand, turned)
    pose = Pose(at, turned.facing_rad, turned.pitch_rad)
    if stand.height_mm is not None:
        pose = pose._replace(at=(at[0], at[1], stand.height_mm))
    return pose


def _needs_no_ray(element: Element) -> bool:
    stand = element.stand
    fixed = stand.at_mm is not None or stand.hole is not None or stand.in_opening is not None
    return fixed and (stand.facing is not None or element.record.leads_to() is not None)


def _turned(element: Element, ray: NominalRay | None, at: Vector | None, solver: Solver) -> Pose:
    """Return a pose of the right turn; its place counts only where `at` is given."""
    stand = element.stand
    pitch = stand.pitch_rad or 0.0
    goal = element.record.leads_to()
    if goal is not None:
        return _leading(element, goal, ray, at, solver)
    if isinstance(stand.facing, float):
        return Pose(_ORIGIN if at is None else at, stand.facing, pitch)
    if stand.facing is not None:
        return _looking(element, stand, _centre(element, ray, at, solver), pitch, solver)
    if ray is None and stand.in_opening is not None:
        x, y = panel_of(stand.in_opening, solver).outward
        return Pose(_ORIGIN, facing(_ORIGIN, (x, y, 0.0)).facing_rad, pitch)
    if ray is None:
        no_ray(element, solver)
    result = _by_ray(element, ray, at, pitch, solver)
    if isinstance(result, Trouble):
        way = next((k for k in ("turn", "aim", "incidence") if k in element.spans), "after")
        complain(
            element,
            way,
            result.message,
            expected=result.expected,
            remedy=result.remedy,
            solver=solver,
        )
    return result


def _centre(element: Element, ray: NominalRay | None, at: Vector | None, solver: Solver) -> Vector:
    """Return where an element stands before it is turned."""
    if at is not None:
        return at
    if ray is None and element.stand.hole is not None:
        return _ORIGIN  # a first guess: what stands over a hole is turned again in its place
    if ray is None:
        no_ray(element, solver)
    return _on_ray(ray, element.stand, Pose(_ORIGIN, 0.0, 0.0))


def _leading(
    element: Element, goal: Goal, ray: NominalRay | None, at: Vector | None, solver: Solver
) -> Pose:
    """Turn the front away from where the element leads to."""
    centre = _centre(element, ray, at, solver)
    back = unit(add(centre, goal_of(goal, centre, solver), -1.0))
    if back is None:
        complain(
            element,
            "to",
            "it would end where it begins",
            expected="another place",
            remedy="lead it on",
            solver=solver,
        )
    return facing(centre, back)


def _by_ray(
    element: Element, ray: NominalRay, at: Vector | None, pitch: float, solver: Solver
) -> Pose | Trouble:
    stand = element.stand
    if (stand.turn is not None or stand.aim is not None) and not element.record.TURNS_FRONT:
        way = "turn" if stand.turn is not None else "aim"
        complain(
            element,
            way,
            f"`{way}` is for fronts that reflect, not for a {element.kind}",
            expected="`incidence` or `facing`"
            + (" (and `sends`)" if "sends" in element.record.KEYS else ""),
            remedy=f"write `incidence: 0` instead of `{way}`",
            solver=solver,
        )
    if stand.turn is not None:
        if stand.turn.direction in ("up", "down"):
            return turned_in_height(ray.direction, stand.turn.direction, stand.turn.angle_rad)
        return turned_in_plan(ray.direction, stand.turn.direction, stand.turn.angle_rad, pitch)
    if stand.aim is not None:
        return _aimed(element, ray, at, solver)
    if stand.incidence == "brewster":
        angle = _brewster(element, ray, solver)
        return at_incidence(ray.direction, angle, stand.side, pitch)
    if stand.incidence is None and element.record.SQUARE:
        square = squarely(ray.direction)
        return square if stand.pitch_rad is None else square._replace(pitch_rad=pitch)
    return at_incidence(ray.direction, stand.incidence or 0.0, stand.side, pitch)


def _aimed(element: Element, ray: NominalRay, at: Vector | None, solver: Solver) -> Pose | Trouble:
    target = point_meant(element.stand.aim, solver)
    on_ray = add(ray.point, ray.direction, element.stand.distance_mm or 0.0)
    return aimed(on_ray if at is None else ray.point, ray.direction, at, target)


def _brewster(element: Element, ray: NominalRay, solver: Solver) -> float:
    glass = element.record.glass_of()
    if glass is None:
        complain(
            element,
            "incidence",
            f"a {element.kind} has no glass, so no Brewster's angle",
            expected="an angle",
            remedy="write the angle",
            solver=solver,
        )
    outside = solver.media.index(None, ray.wavelength_nm)
    inside = index_of(glass, ray, element, solver)
    return float(brewster_angle_rad(outside, inside))


def index_of(glass: Glass, ray: NominalRay, element: Element, solver: Solver) -> float:
    """Return the index of a glass for a ray, or say that it is not known."""
    inside = solver.media.index(glass, ray.wavelength_nm)
    if isnan(inside):
        complain(
            element,
            "incidence",
            f"{glass.name!r} has no known index at {ray.wavelength_nm:g} nm",
            expected="a wavelength within the range of the glass's formula",
            remedy="name another glass, or give its index: `glass: {index: 1.5}`",
            solver=solver,
        )
    return inside


def _looking(
    item: Source | Element, stand: Place, at: Vector, pitch: float, solver: Solver
) -> Pose:
    """Turn the front normal to a heading, or to a point with its height."""
    if isinstance(stand.facing, float):
        return Pose(at, stand.facing, pitch)
    towards = unit(add(point_meant(stand.facing, solver), at, -1.0))
    if towards is None:
        complain(
            item,
            "facing",
            "it would face itself",
            expected="another element or point",
            remedy="face elsewhere",
            solver=solver,
        )
    looking = facing(at, towards)
    return looking if stand.pitch_rad is None else looking._replace(pitch_rad=pitch)


def _on_ray(ray: NominalRay, stand: Stand, turned: Pose) -> Vector:
    """Put the point of the front that the beam is meant to meet on the ray."""
    left, up = stand.beam_at_mm
    meant = add(ray.point, ray.direction, stand.distance_mm or 0.0)
    return add(meant, turned.turn((0.0, left, up)), -1.0)


def _over_hole(element: Element, ray: NominalRay | None, turned: Pose, solver: Solver) -> Pose:
    """Put the post over its hole; heading and place may hang on each other (with `aim`)."""
    stand = element.stand
    holes = solver.layout.bench.holes
    if holes is None:
        complain(
            element,
            "hole",
            "the bench has no grid of holes",
            expected="`bench.holes: {pitch: 25, first: [25, 25]}`",
            remedy="add `holes` to the bench, or use `at`",
            solver=solver,
        )
    assert stand.hole is not None
    column, row = stand.hole
    x = holes.first_mm[0] + (column - 1) * holes.pitch_mm
    y = holes.first_mm[1] + (row - 1) * holes.pitch_mm
    height = solver.layout.bench.beam_height_mm if stand.height_mm is None else stand.height_mm
    from_post = _post_offset(element, solver, height)
    pose = turned
    for _ in range(_ROUNDS):
        level = Pose(_ORIGIN, pose.facing_rad, 0.0).turn((from_post[0], from_post[1], 0.0))
        at = (x - level[0], y - level[1], height)
        moved = dot(add(at, pose.at, -1.0), add(at, pose.at, -1.0))
        again = _turned(element, ray, at, solver) if _looks_at_a_point(element) else pose
        pose = Pose(at, again.facing_rad, again.pitch_rad)
        if moved < _CONVERGED_MM**2:
            break
    return pose


def _looks_at_a_point(element: Element) -> bool:
    """Whether an element's turn hangs on its place: it aims, faces or leads somewhere."""
    stand = element.stand
    faces_a_point = stand.facing is not None and not isinstance(stand.facing, float)
    return stand.aim is not None or faces_a_point or element.record.leads_to() is not None


def _post_offset(element: Element, solver: Solver, height: float) -> tuple[float, float]:
    from benchlay.elements.mount import holder

    held = holder(element.record, element.record.geometry(), element.mount, height)
    return held.post_mm or (0.0, 0.0)
