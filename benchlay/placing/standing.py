"""Where one item stands and how it is turned, from its keys and the ray that arrives."""

from __future__ import annotations

from math import isnan
from typing import TYPE_CHECKING, NoReturn

from benchlay.elements._kind import Glass, Goal
from benchlay.layout._forms import Ref
from benchlay.layout.stand import Stand
from benchlay.optics.fresnel import brewster_angle_rad
from benchlay.placing.arrivals import Unplaceable
from benchlay.placing.nominal import NominalRay
from benchlay.placing.orient import (
    Trouble,
    aimed,
    at_incidence,
    squarely,
    turned_in_height,
    turned_in_plan,
)
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
    at = _fixed_point(source, stand, solver)
    if at is None:
        _complain(source, "at", "a source needs a place", "`at: [x, y]`", "add `at`", solver)
    pitch = stand.pitch_rad or 0.0
    if stand.facing is None:
        panel = solver.layout.enclosure.panels[stand.in_opening.panel]  # type: ignore[union-attr]
        x, y = panel.outward
        return facing(at, (-x, -y, 0.0))
    return _looking(source, stand, at, pitch, solver)


def stand_element(element: Element, solver: Solver) -> Pose:
    """Return the nominal pose of an element."""
    stand = element.stand
    ray = None if _needs_no_ray(element) else solver.arrivals.at(element)
    at = _fixed_point(element, stand, solver)
    turned = _turned(element, ray, at, solver)
    if at is None and stand.hole is not None:
        return _over_hole(element, ray, turned, solver)
    if at is None:
        assert ray is not None
        at = _on_ray(ray, stand, turned)
    pose = Pose(at, turned.facing_rad, turned.pitch_rad)
    if stand.height_mm is not None:
        pose = pose._replace(at=(at[0], at[1], stand.height_mm))
    return pose


def _needs_no_ray(element: Element) -> bool:
    stand = element.stand
    fixed = stand.at_mm is not None or stand.hole is not None or stand.in_opening is not None
    return fixed and (stand.facing is not None or element.record.leads_to() is not None)


def _fixed_point(item: Source | Element, stand: Stand, solver: Solver) -> Vector | None:
    height = solver.layout.bench.beam_height_mm if stand.height_mm is None else stand.height_mm
    if stand.at_mm is not None:
        x, y = stand.at_mm[0], stand.at_mm[1]
        if len(stand.at_mm) > 2 and stand.height_mm is None:  # noqa: PLR2004 (x, y and z)
            height = stand.at_mm[2]
        return (x, y, height)
    if stand.in_opening is not None:
        return _in_opening(stand, solver)
    return None


def _in_opening(stand: Stand, solver: Solver) -> Vector:
    assert stand.in_opening is not None
    assert solver.layout.enclosure is not None
    panel = solver.layout.enclosure.panels[stand.in_opening.panel]
    start, end, low, high = panel.openings[stand.in_opening.opening].box_mm()
    share = (start + end) / 2 / panel.length_mm
    x = panel.from_mm[0] + share * (panel.to_mm[0] - panel.from_mm[0])
    y = panel.from_mm[1] + share * (panel.to_mm[1] - panel.from_mm[1])
    height = (low + high) / 2 if stand.height_mm is None else stand.height_mm
    return (x, y, height)


def _turned(element: Element, ray: NominalRay | None, at: Vector | None, solver: Solver) -> Pose:
    """Return a pose of the right turn; its place counts only where `at` is given."""
    stand = element.stand
    pitch = stand.pitch_rad or 0.0
    goal = element.record.leads_to()
    if goal is not None:
        return _leading(element, goal, ray, at, solver)
    if stand.facing is not None:
        centre = at if at is not None else ray.point if ray is not None else _ORIGIN
        if isinstance(stand.facing, float) or ray is None or at is not None:
            return _looking(element, stand, centre, pitch, solver)
        return _looking(element, stand, _on_ray(ray, stand, Pose(_ORIGIN, 0.0, 0.0)), pitch, solver)
    if ray is None:
        if stand.in_opening is not None:
            panel = solver.layout.enclosure.panels[stand.in_opening.panel]  # type: ignore[union-attr]
            x, y = panel.outward
            return Pose(_ORIGIN, facing(_ORIGIN, (x, y, 0.0)).facing_rad, pitch)
        no_ray(element, solver)
    result = _by_ray(element, ray, at, pitch, solver)
    if isinstance(result, Trouble):
        way = next((k for k in ("turn", "aim", "incidence") if k in element.spans), "after")
        _complain(element, way, result.message, result.expected, result.remedy, solver)
    return result


def _leading(
    element: Element, goal: Goal, ray: NominalRay | None, at: Vector | None, solver: Solver
) -> Pose:
    """Turn the front away from where the element leads to."""
    if at is None and ray is None:
        no_ray(element, solver)
    centre = at if at is not None else _on_ray(ray, element.stand, Pose(_ORIGIN, 0.0, 0.0))  # type: ignore[arg-type]
    back = unit(add(centre, goal_of(goal, centre, solver), -1.0))
    if back is None:
        _complain(
            element, "to", "it would end where it begins", "another place", "lead it on", solver
        )
    return facing(centre, back)


def goal_of(goal: Goal, own: Vector, solver: Solver) -> Vector:
    """Return where something at a point leads to: level for a point, else the item's own height."""
    return _reference_point(goal, solver) if isinstance(goal, str) else (*goal, own[2])


def _by_ray(
    element: Element, ray: NominalRay, at: Vector | None, pitch: float, solver: Solver
) -> Pose | Trouble:
    stand = element.stand
    if (stand.turn is not None or stand.aim is not None) and not element.record.TURNS_FRONT:
        way = "turn" if stand.turn is not None else "aim"
        _complain(
            element,
            way,
            f"`{way}` is for fronts that reflect, not for a {element.kind}",
            "`incidence` or `facing`" + (" (and `sends`)" if element.kind == "cube" else ""),
            f"write `incidence: 0` instead of `{way}`",
            solver,
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
    target = _point_meant(element, element.stand.aim, solver)
    on_ray = add(ray.point, ray.direction, element.stand.distance_mm or 0.0)
    if at is None and element.stand.hole is not None:
        at = None
    return aimed(on_ray if at is None else ray.point, ray.direction, at, target)


def _point_meant(item: Source | Element, meant: Ref | tuple[float, ...], solver: Solver) -> Vector:
    if isinstance(meant, Ref):
        return _reference_point(meant.name, solver)
    if len(meant) > 2:  # noqa: PLR2004 (x, y and z)
        return (meant[0], meant[1], meant[2])
    return (meant[0], meant[1], solver.layout.bench.beam_height_mm)


def _reference_point(name: str, solver: Solver) -> Vector:
    """Return where something stands; what has a place of its own need not be turned first."""
    if name not in solver.poses:
        named = solver.layout.sources.get(name) or solver.layout.elements[name]
        fixed = _fixed_point(named, named.stand, solver)
        if fixed is not None:
            return fixed
    return solver.pose(name).at


def _brewster(element: Element, ray: NominalRay, solver: Solver) -> float:
    glass = element.record.glass_of()
    if glass is None:
        _complain(
            element,
            "incidence",
            f"a {element.kind} has no glass, so no Brewster's angle",
            "an angle",
            "write the angle",
            solver,
        )
    outside = solver.media.index(None, ray.wavelength_nm)
    inside = index_of(glass, ray, element, solver)
    return float(brewster_angle_rad(outside, inside))


def index_of(glass: Glass, ray: NominalRay, element: Element, solver: Solver) -> float:
    """Return the index of a glass for a ray, or say that it is not known."""
    inside = solver.media.index(glass, ray.wavelength_nm)
    if isnan(inside):
        _complain(
            element,
            "incidence",
            f"{glass.name!r} has no known index at {ray.wavelength_nm:g} nm",
            "a wavelength within the range of the glass's formula",
            "name another glass, or give its index: `glass: {index: 1.5}`",
            solver,
        )
    return inside


def _looking(
    item: Source | Element, stand: Stand, at: Vector, pitch: float, solver: Solver
) -> Pose:
    """Turn the front normal to a heading, or to a point with its height."""
    if isinstance(stand.facing, float):
        return Pose(at, stand.facing, pitch)
    towards = unit(add(_point_meant(item, stand.facing, solver), at, -1.0))
    if towards is None:
        _complain(
            item,
            "facing",
            "it would face itself",
            "another element or point",
            "face elsewhere",
            solver,
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
        _complain(
            element,
            "hole",
            "the bench has no grid of holes",
            "`bench.holes: {pitch: 25, first: [25, 25]}`",
            "add `holes` to the bench, or use `at`",
            solver,
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
        again = (
            _turned(element, ray, at, solver)
            if stand.aim is not None or isinstance(stand.facing, Ref)
            else pose
        )
        pose = Pose(at, again.facing_rad, again.pitch_rad)
        if moved < _CONVERGED_MM**2:
            break
    return pose


def _post_offset(element: Element, solver: Solver, height: float) -> tuple[float, float]:
    from benchlay.elements.mount import holder

    held = holder(element.record, element.record.geometry(), element.mount, height)
    return held.post_mm or (0.0, 0.0)


def no_ray(element: Element, solver: Solver) -> NoReturn:
    """Say that the ray that arrives is not known."""
    way = next((k for k in ("turn", "aim", "incidence") if k in element.spans), None)
    name = element.name
    if way is not None:
        what = f"`{way}` needs to know which beam arrives at {name!r}"
        expected = "`after` with the item the beam comes from, or a route that names it"
        remedy = "add `after`, or use `facing`"
    else:
        what = f"nothing says which way {name!r} faces, and no beam is known to arrive"
        expected = (
            "`facing`, or `after` with the item the beam comes from, or a route that names it"
        )
        remedy = "add `facing: 90`, or `after`"
    _complain(element, way or "kind", what, expected, remedy, solver)


def _complain(
    item: Source | Element, key: str, what: str, expected: str, remedy: str, solver: Solver
) -> NoReturn:
    if not solver.arrivals.trying:
        solver.problems.add(item.spans.get(key, item.span), what, expected=expected, remedy=remedy)
    raise Unplaceable(item.name)
