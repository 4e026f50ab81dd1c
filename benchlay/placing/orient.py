"""How an element is turned, given the nominal ray that arrives."""

from __future__ import annotations

from math import asin, atan2, cos, pi, sin

from benchlay.named import NamedTuple
from benchlay.placing.pose import Pose, Vector, add, cross, dot, facing, unit

STEEP_RAD = 80 * pi / 180
"""Beams steeper than this have no usable heading: turns in plan are errors on them."""

_UP: Vector = (0.0, 0.0, 1.0)
_ROUNDS = 60  # the aim of a mirror whose middle is off the ray converges geometrically
_CONVERGED = 1e-14


class Trouble(NamedTuple):
    """Why it cannot be turned as asked: message, expectation and mend."""

    message: str
    expected: str
    remedy: str


def heading_of(direction: Vector) -> float:
    """Return the heading of a direction, in rad (0 for a vertical one)."""
    return atan2(direction[1], direction[0])


def is_steep(direction: Vector) -> bool:
    """Whether a beam is steeper than 80 degrees."""
    return abs(asin(max(-1.0, min(1.0, direction[2])))) > STEEP_RAD


def turned_in_plan(
    direction: Vector, way: str, angle_rad: float, pitch_rad: float
) -> Pose | Trouble:
    """Return the pose (at the origin) whose front turns a beam left or right by an angle."""
    if is_steep(direction):
        return Trouble(
            "a vertical beam cannot be turned left or right",
            "`aim` or `facing` (with `pitch`) on a beam steeper than 80°",
            "write `aim:` with the element or point the beam shall go to",
        )
    heading = heading_of(direction)
    if way == "left":
        return Pose((0.0, 0.0, 0.0), heading + pi / 2 + angle_rad / 2, pitch_rad)
    return Pose((0.0, 0.0, 0.0), heading - pi / 2 - angle_rad / 2, pitch_rad)


def turned_in_height(direction: Vector, way: str, angle_rad: float) -> Pose | Trouble:
    """Return the pose (at the origin) whose front turns a beam up or down by an angle."""
    left = unit(cross(_UP, direction))
    if left is None or is_steep(direction):
        return Trouble(
            "a vertical beam cannot be turned up or down",
            "`aim` or `facing` (with `pitch`) on a beam steeper than 80°",
            "write `aim:` with the element or point the beam shall go to",
        )
    above = cross(direction, left)
    signed = angle_rad if way == "up" else -angle_rad
    leaving = add(
        (cos(signed) * direction[0], cos(signed) * direction[1], cos(signed) * direction[2]),
        above,
        sin(signed),
    )
    return _mirror_between(direction, leaving, (0.0, 0.0, 0.0), heading_of(direction) + pi)


def _mirror_between(
    arriving: Vector, leaving: Vector, at: Vector, spare_heading: float
) -> Pose | Trouble:
    normal = unit(add(leaving, arriving, -1.0))
    if normal is None:
        return Trouble(
            "the beam would go straight on: no mirror can do that",
            "a turn other than 0",
            "remove the mirror, or turn it by more",
        )
    return facing(at, normal, spare_heading)


def squarely(direction: Vector) -> Pose:
    """Return the pose (at the origin) that faces a beam squarely, pitch included."""
    back = (-direction[0], -direction[1], -direction[2])
    return facing((0.0, 0.0, 0.0), back, 0.0)


def at_incidence(
    direction: Vector, angle_rad: float, side: str, pitch_rad: float
) -> Pose | Trouble:
    """Return the pose (at the origin) that a beam meets at an angle, in plan."""
    if is_steep(direction):
        if angle_rad == 0.0 and pitch_rad == 0.0:
            return squarely(direction)
        return Trouble(
            "a vertical beam has no angle of incidence in plan",
            "`facing` (with `pitch`) on a beam steeper than 80°",
            "write `facing:` and `pitch:`",
        )
    back = heading_of(direction) + pi
    return Pose(
        (0.0, 0.0, 0.0), back - angle_rad if side == "left" else back + angle_rad, pitch_rad
    )


def aimed(point: Vector, direction: Vector, at: Vector | None, target: Vector) -> Pose | Trouble:
    """Return the pose of a mirror that reflects a ray to a point.

    `point` and `direction` are of the ray. Where the reference point `at` is given and does
    not lie on the ray, the ray is reflected where it meets the mirror's plane, so that the
    reflected ray still reaches the target: a fixed point, found by repetition.
    """
    centre = point if at is None else at
    hit = centre
    pose: Pose | Trouble = Pose(centre, 0.0, 0.0)
    for _ in range(_ROUNDS):
        leaving = unit(add(target, hit, -1.0))
        if leaving is None:
            return Trouble(
                "it would aim at itself",
                "another element or point",
                "aim at where the beam shall go",
            )
        pose = _mirror_between(direction, leaving, centre, heading_of(direction) + pi)
        if isinstance(pose, Trouble) or at is None:
            return pose
        normal = pose.axes()[0]
        slope = dot(direction, normal)
        if abs(slope) < _CONVERGED:
            return pose
        met = add(point, direction, dot(add(centre, point, -1.0), normal) / slope)
        moved = add(met, hit, -1.0)
        hit = met
        if dot(moved, moved) < _CONVERGED**2:
            break
    return pose
