"""A second opinion on scattered light: eyes on a grid, each at many heights, each looked at.

Nothing of `benchlay.zones.sight` is used. Solids are taken by their bounding planes, panels by
their frames and openings, walls by their line; a way is free if no part of it is inside one.
"""

import math

import numpy as np
import shapely

from benchlay.elements._kind import Acts
from benchlay.scene.tables import PART

_STEPS = 7  # looked at within the thickness of a sheet
_SLACK = 1e-6


def visible(trace, variant, place, radius, eyes, *, dark=()):
    """Which points of the plan (N, 2) see a place, at any height (M,), within a distance.

    `place` is the point and its surface's normal, `eyes` are the points of the plan and the
    heights. Mounts and bodies of optics that light may pass shade nothing, unless they are
    named in `dark`.
    """
    (at, normal), (plan, heights) = place, eyes
    layout = trace.placed.states[variant].layout
    n, m = len(plan), len(heights)
    eyes = np.empty((n, m, 3))
    eyes[..., :2], eyes[..., 2] = plan[:, None], heights
    at = np.asarray(at, dtype=float)
    way = eyes - at
    free = np.sqrt((way**2).sum(axis=-1)) <= radius
    if normal is not None:
        free &= way @ np.asarray(normal) > 0.0
        at = at + 1e-3 * np.asarray(normal)
        way = eyes - at
    for blocked in (
        _by_panels(layout, at, way),
        _by_solids(trace, variant, at, way, dark),
        _by_walls(layout, at, plan)[:, None],
    ):
        free &= ~blocked
    return free.any(axis=1)


def _clip(part, start, slope, between):
    """Part of a way in which start + t slope lies between two values."""
    (t0, t1), (low, high) = part, between
    with np.errstate(divide="ignore", invalid="ignore"):
        a, b = (low - start) / slope, (high - start) / slope
    level = np.abs(slope) < 1e-12
    inside = (start >= low) & (start <= high)
    a = np.where(level, np.where(inside, -np.inf, np.inf), a)
    b = np.where(level, np.where(inside, np.inf, -np.inf), b)
    return np.maximum(t0, np.minimum(a, b)), np.minimum(t1, np.maximum(a, b))


def _by_panels(layout, at, way):
    found = np.zeros(way.shape[:2], dtype=bool)
    enclosure = layout.enclosure
    for panel in [] if enclosure is None else enclosure.panels.values():
        if panel.open:
            continue
        name = enclosure.material_of(panel)
        thick = 2.0 if name is None else layout.materials[name].thickness_mm
        low, high = enclosure.heights_mm(panel)
        (x0, y0), (x1, y1) = panel.from_mm, panel.to_mm
        length = math.hypot(x1 - x0, y1 - y0)
        u = np.array([(x1 - x0) / length, (y1 - y0) / length])
        out = np.array([u[1], -u[0]])
        along, across = (at[:2] - (x0, y0)) @ u, (at[:2] - (x0, y0)) @ out
        du, dn, dz = way[..., :2] @ u, way[..., :2] @ out, way[..., 2]
        t0, t1 = _clip((0.0, 1.0), across, dn, (0.0, thick))
        meets = t1 > t0 + _SLACK
        for step in np.linspace(0.0, 1.0, _STEPS):
            t = np.where(meets, t0 + step * (t1 - t0), 0.0)
            a, h = along + t * du, at[2] + t * dz
            solid = (a > 0) & (a < length) & (h > low) & (h < high)
            for hole in panel.openings.values():
                if hole.diameter_mm is not None:
                    r = np.hypot(a - hole.along_mm, h - hole.height_mm)
                    solid &= r > hole.diameter_mm / 2
                else:
                    left, right = hole.along_mm, hole.along_mm + hole.width_mm
                    inside = (a > left) & (a < right)
                    solid &= ~(inside & (h > hole.from_height_mm) & (h < hole.to_height_mm))
            found |= meets & solid
    return found


def _by_solids(trace, variant, at, way, dark):
    scene = trace.scene
    s = scene.solids
    found = np.zeros(way.shape[:2], dtype=bool)
    round_ = {int(row): i for i, row in enumerate(s.axis_solid)}
    through = (Acts.INTERFACE, Acts.PASSES, Acts.LENS)
    acts = zip(scene.faces.owner.tolist(), scene.faces.acts.tolist(), strict=True)
    skip = {owner for owner, act in acts if act in through}
    skip -= {scene.elements.index(name) for name in dark}
    for row in np.flatnonzero(s.present[variant]):
        if s.part[row] in (PART["panel"], PART["wall"]):
            continue
        if int(s.owner[row]) in skip and s.part[row] not in (PART["post"], PART["foot"]):
            continue
        t0, t1 = np.zeros(way.shape[:2]), np.ones(way.shape[:2])
        for plane in np.flatnonzero(s.plane_solid == row):
            n, d = s.plane_normal[plane], s.plane_offset[plane]
            t0, t1 = _clip((t0, t1), float(n @ at) - d, way @ n, (-np.inf, 0.0))
        if row in round_:
            i = round_[row]
            axis, rel = s.axis[i], at - s.axis_point[i]
            p, q = rel - (rel @ axis) * axis, way - (way @ axis)[..., None] * axis
            a, b = (q**2).sum(-1), q @ p
            c = p @ p - s.axis_radius[i] ** 2
            root = b * b - a * c
            with np.errstate(divide="ignore", invalid="ignore"):
                half = np.sqrt(np.maximum(root, 0.0))
                t0 = np.where(root > 0, np.maximum(t0, (-b - half) / a), np.inf)
                t1 = np.where(root > 0, np.minimum(t1, (-b + half) / a), -np.inf)
        found |= t1 > t0 + _SLACK
    return found


def _by_walls(layout, at, plan):
    if layout.room is None:
        return np.zeros(len(plan), dtype=bool)
    room = shapely.Polygon(layout.room.outline).buffer(1e-6)
    ways = [shapely.LineString([at[:2], p]) for p in plan]
    return ~np.array([room.covers(w) for w in ways])
