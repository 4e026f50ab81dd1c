"""A plate of two planes met by one ray: all rays that leave it, one by one."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from tests.tracing.referee.fresnel import Ray, at_face, onto


class Plate(NamedTuple):
    """Planes through `front` and `back` with outward normals; n outside and inside.

    `front_share`, `back_share` are (Rs, Rp) of coated faces; `absorbs` is the share of power
    that passes `thickness` of glass.
    """

    front: np.ndarray
    front_normal: np.ndarray
    back: np.ndarray
    back_normal: np.ndarray
    outside: float
    inside: float
    front_share: tuple[float, float] | None = None
    back_share: tuple[float, float] | None = None
    passes: float = 1.0
    thickness: float = 1.0


class Left(NamedTuple):
    """What leaves: from the front, from the back, and what the glass swallowed."""

    front: list[Ray]
    back: list[Ray]
    absorbed: float


def plate(facing, incidence_point, thickness, outside, inside, *, pitch=0.0, slope=(0, 0), **more):
    """A plate whose front normal has a heading (rad); slope: thicker per mm to left and up."""
    c, s, cp, sp = np.cos(facing), np.sin(facing), np.cos(pitch), np.sin(pitch)
    x = np.array([cp * c, cp * s, sp])
    left = np.array([-s, c, 0.0])
    up = np.cross(x, left)
    point = np.asarray(incidence_point, dtype=float)
    back = -x - slope[0] * left - slope[1] * up
    return Plate(
        point,
        x,
        point - thickness * x,
        back / np.linalg.norm(back),
        outside,
        inside,
        thickness=thickness,
        **more,
    )


def through(ray, p, least=1e-15):
    """Follow a ray through a plate until what is left inside is below `least`."""
    ray = onto(ray, p.front, p.front_normal, p.outside)
    reflected, inside = at_face(ray, p.front_normal, p.outside, p.inside, p.front_share)
    left = Left([reflected], [], 0.0)
    absorbed = 0.0
    at_back = True
    while inside is not None and inside.power > least:
        point, normal = (p.back, p.back_normal) if at_back else (p.front, p.front_normal)
        share = p.back_share if at_back else p.front_share
        before = inside.path
        inside = onto(inside, point, normal, p.inside)
        passed = p.passes ** ((inside.path - before) / p.inside / p.thickness)
        absorbed += inside.power * (1.0 - passed)
        inside = inside._replace(field=inside.field * passed)
        kept, out = at_face(inside, normal, p.inside, p.outside, share)
        if out is not None:
            (left.back if at_back else left.front).append(out)
        inside, at_back = kept, not at_back
    return left._replace(absorbed=absorbed)
