"""Which openings of panels an element fills: what passes them is for tracing to say."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from benchlay.coverage.blockers import Window, outline_of_hole
from benchlay.coverage.enclosed import windows_of
from benchlay.coverage.planar import Convex, hull, least_width, less
from benchlay.layout.layout import Layout
from benchlay.scene.tables import Floats, Ints, Scene

# What is left round an element of the opening's own size: the polygons that stand for circles
# differ by less.
_LEFT_MM = 0.01
_TOUCH_MM = 1e-6
_CIRCLE = 64  # sides of the polygon round a round end


def filled_openings(layout: Layout, scene: Scene, variant: int) -> dict[str, str]:
    """Return by opening ("east.port") the name of the element that fills it in a state.

    The element stands in the passage, and its bodies (glass, plate, mount, box) together are at
    least as large as the opening.
    """
    enclosure = layout.enclosure
    if enclosure is None or not any(panel.openings for panel in enclosure.panels.values()):
        return {}
    found = {}
    for name, panel in sorted(enclosure.panels.items()):
        for window in windows_of(enclosure, layout, name, panel):
            owner = _filled_by(window, scene, variant)
            if owner is not None:
                found[window.name] = scene.elements[owner]
    return found


def _filled_by(window: Window, scene: Scene, variant: int) -> int | None:
    s = scene.solids
    start, end, low, high = window.box
    middle = np.array(window.place((0.5 * (start + end), 0.5 * (low + high))))
    reach = 0.5 * float(np.hypot(end - start, high - low)) + window.depth_mm
    away = np.linalg.norm(s.centre - middle, axis=1)
    near = s.present[variant] & (s.owner < len(scene.elements)) & (away <= reach + s.reach)
    rows = np.flatnonzero(near)
    for owner in sorted(set(s.owner[rows].tolist())):
        shadows = _shadows(window, scene, rows[s.owner[rows] == owner])
        if _covers(list(shadows), outline_of_hole(window)):
            return int(owner)
    return None


def _covers(shapes: list[Convex], hole: Convex) -> bool:
    left = [hole]
    for shape in shapes:
        left = less(left, shape)
    return all(least_width(piece) <= _LEFT_MM for piece in left)


def _shadows(window: Window, scene: Scene, rows: Ints) -> Iterator[Convex]:
    """Yield solids that stand in the passage, as seen along it."""
    (x, y), (c, s) = window.origin, window.along
    for row in rows.tolist():
        points = corners(scene, row)
        inwards = (points[:, 1] - y) * c - (points[:, 0] - x) * s
        if inwards.max() < -window.depth_mm - _TOUCH_MM or inwards.min() > _TOUCH_MM:
            continue
        along = (points[:, 0] - x) * c + (points[:, 1] - y) * s
        yield hull(zip(along.tolist(), points[:, 2].tolist(), strict=True))


def corners(scene: Scene, row: int, *, within: bool = False) -> Floats:
    """Return points (N, 3) whose hull is a solid; round ends as polygons round them, or within."""
    s = scene.solids
    patches = s.patch_solid == row
    flat = s.patch_points[patches].reshape(-1, 3)
    step = 2.0 * np.pi / _CIRCLE
    angles = (np.arange(_CIRCLE) + 0.5) * step
    size = 1.0 if within else 1.0 / np.cos(0.5 * step)
    unit = size * np.stack((np.cos(angles), np.sin(angles)), axis=1)
    discs = [
        s.disc_centre[disc] + unit @ s.disc_axes[disc]
        for disc in np.flatnonzero(s.disc_solid == row).tolist()
    ]
    points: Floats = np.concatenate([flat, *discs])
    return points
