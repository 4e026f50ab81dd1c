"""A plane's own two axes: left and up of its outward normal."""

from __future__ import annotations

from typing import TypeAlias

Vector: TypeAlias = tuple[float, float, float]

_LEVEL = 1e-9  # a normal within this of vertical has no up: its left is taken as y


def in_plane_axes(normal: Vector) -> tuple[Vector, Vector]:
    """Return (left, up) of a unit normal: left = z x normal, up = normal x left.

    For the front (normal +x) they are y and z of the element frame.
    """
    x, y, z = normal
    flat = (x * x + y * y) ** 0.5
    if flat < _LEVEL:
        return (0.0, 1.0, 0.0), (-1.0 if z > 0 else 1.0, 0.0, 0.0)
    left = (-y / flat, x / flat, 0.0)
    up = (y * left[2] - z * left[1], z * left[0] - x * left[2], x * left[1] - y * left[0])
    return left, up
