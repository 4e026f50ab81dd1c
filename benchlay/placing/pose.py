"""Poses: where an element stands and which way its front faces."""

from __future__ import annotations

from math import asin, atan2, cos, sin
from typing import TypeAlias

from benchlay.named import NamedTuple

Vector: TypeAlias = tuple[float, float, float]
Axes: TypeAlias = tuple[Vector, Vector, Vector]


class Pose(NamedTuple):
    """A reference point (mm, plan frame), the heading of the front normal and its pitch."""

    at: Vector
    facing_rad: float
    pitch_rad: float
    rolled: Axes | None = None  # its axes where it is turned about something else as well

    def axes(self) -> Axes:
        """Return the element's axes (front normal, left, up) as unit vectors."""
        if self.rolled is not None:
            return self.rolled
        c, s = cos(self.facing_rad), sin(self.facing_rad)
        cp, sp = cos(self.pitch_rad), sin(self.pitch_rad)
        return ((cp * c, cp * s, sp), (-s, c, 0.0), (-sp * c, -sp * s, cp))

    def upright_axes(self) -> Axes:
        """Return the axes without pitch: of what stands on the bench below."""
        return Pose(self.at, self.facing_rad, 0.0).axes()

    def point(self, local: Vector) -> Vector:
        """Return a point of the element's frame in the plan frame."""
        return add(self.at, self.turn(local))

    def turn(self, local: Vector) -> Vector:
        """Return a direction of the element's frame in the plan frame."""
        x, y, z = self.axes()
        return (
            local[0] * x[0] + local[1] * y[0] + local[2] * z[0],
            local[0] * x[1] + local[1] * y[1] + local[2] * z[1],
            local[0] * x[2] + local[1] * y[2] + local[2] * z[2],
        )

    def moved(self, offset: Vector, yaw_rad: float, pitch_rad: float) -> Pose:
        """Return the pose shifted along its own axes, then turned."""
        if offset == (0.0, 0.0, 0.0) and yaw_rad == 0.0 and pitch_rad == 0.0:
            return self
        return Pose(self.point(offset), self.facing_rad + yaw_rad, self.pitch_rad + pitch_rad)


def facing(at: Vector, normal: Vector, heading_if_upright: float = 0.0) -> Pose:
    """Return the pose at a point whose front normal is a given unit vector."""
    flat = (normal[0] ** 2 + normal[1] ** 2) ** 0.5
    heading = atan2(normal[1], normal[0]) if flat > UPRIGHT else heading_if_upright
    return Pose(at, heading, asin(max(-1.0, min(1.0, normal[2]))))


UPRIGHT = 1e-9  # below this horizontal part a direction has no heading: rounding leaves 1e-16


def add(a: Vector, b: Vector, factor: float = 1.0) -> Vector:
    """Return a + factor * b."""
    return (a[0] + factor * b[0], a[1] + factor * b[1], a[2] + factor * b[2])


def dot(a: Vector, b: Vector) -> float:
    """Return the scalar product."""
    return a[0] * b[0] + a[1] * b[1] + a[2] * b[2]


def cross(a: Vector, b: Vector) -> Vector:
    """Return the vector product."""
    return (a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0])


def unit(a: Vector) -> Vector | None:
    """Return the direction of a vector, or None for a vector of no length."""
    length = dot(a, a) ** 0.5
    return None if length < UPRIGHT else (a[0] / length, a[1] / length, a[2] / length)
