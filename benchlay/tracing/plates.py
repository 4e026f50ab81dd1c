"""Flat regions across and along beams, as outlines in the cross-section.

One that stands across the beam takes W at the depth where its plane crosses the chief ray,
and is seen in the perspective of W there.
"""

from __future__ import annotations

import numpy as np

from benchlay.named import NamedTuple
from benchlay.optics.rays import cross
from benchlay.scene.tables import Flags, Floats, Ints
from benchlay.tracing.frames import (
    Frame,
    frame_of,
    gradient,
    inverse_roots,
    local,
    plane_depth,
    scaled,
    unit_vectors,
)
from benchlay.tracing.front import Front
from benchlay.tracing.outlines import HOLE, NO_OUTLINES, Labels, Outlines
from benchlay.tracing.spreading import growth, perspective_plate

GRAZING = 0.2  # sine of the angle between beam and plane below which it counts as lying along
_TOUCH_MM = 1e-6  # the two faces of a thin optic stand in one place, give or take rounding


class Plates(NamedTuple):
    """Flat regions in space: centre and two half axes (mm), round or rectangular."""

    centre: Floats  # (K, 3)
    first: Floats  # (K, 3)
    second: Floats  # (K, 3)
    round: Flags  # (K,)


def _plate_shapes(
    frame: Frame, plates: Plates
) -> tuple[Floats, Floats, Floats, Ints, Floats, Flags]:
    """Return vertices, centre, axes, corners, depth, and which lie ahead of the beam's start."""
    normal = unit_vectors(cross(plates.first, plates.second))
    x, y, z = local(frame, plates.centre, point=True)
    ax, ay, az = local(frame, plates.first, point=False)
    bx, by, bz = local(frame, plates.second, point=False)
    crossing, slope = plane_depth(frame, plates.centre, normal)
    reach = np.where(plates.round, np.hypot(az, bz), np.abs(az) + np.abs(bz))
    depth = np.maximum(np.clip(crossing, z - reach, z + reach), 0.0)
    root = inverse_roots(frame, depth)
    rate = growth(frame.moments, frame.medium, depth)
    vertices, centre, first, second = perspective_plate(
        scaled(root, x, y),
        scaled(root, ax, ay),
        scaled(root, bx, by),
        (rate * (z - depth), rate * az, rate * bz),
    )
    clockwise = first[:, 0] * second[:, 1] - first[:, 1] * second[:, 0] < 0.0
    vertices[clockwise] = vertices[clockwise, ::-1]
    # From where the plane crosses the chief ray, if outside the plate: plates of one plane must
    # lie at one depth, so that their order decides between them.
    rise = gradient(frame, normal, slope, inverse_roots(frame, np.maximum(crossing, 0.0)))
    flat = np.abs(slope) < GRAZING
    rise[flat] = 0.0
    plane = np.concatenate((np.where(flat, z, crossing)[:, None], rise), axis=1)
    corners = np.where(plates.round, 0, 4)
    return (
        vertices,
        centre,
        np.stack((first, second), axis=2),
        corners,
        plane,
        z + reach > -_TOUCH_MM,
    )


class Labelled(NamedTuple):
    """Flat regions beside beams (`problem`), and what they stand for."""

    problem: Ints  # (K,)
    plates: Plates
    order: Ints  # (K,)
    labels: Labels


def plate_outlines(part: Front, sets: list[Labelled], reach: Floats) -> list[Outlines]:
    """Return the outlines of those plates that come within reach of the axis (problems,).

    All sets are worked out together; what is left of the first comes back first, all others
    as a second piece. Holes name the rows of their hosts.
    """
    problem = np.concatenate([one.problem for one in sets])
    order = np.concatenate([one.order for one in sets])
    plates = Plates._make(map(np.concatenate, zip(*(one.plates for one in sets), strict=True)))
    labels = Labels._make(map(np.concatenate, zip(*(one.labels for one in sets), strict=True)))
    frame = frame_of(part, problem)
    vertices, centre, axes, corners, depth, ahead = _plate_shapes(frame, plates)
    kept = ahead & touching(vertices, reach[problem])
    outlines = Outlines(
        problem,
        corners,
        vertices,
        centre,
        axes,
        depth,
        order,
        np.where(labels.role == HOLE, labels.row, -1),
        *labels,
        inside_name=NO_OUTLINES.inside_name,
    )
    first = len(sets[0].problem)
    pieces = (kept[:first].nonzero()[0], first + kept[first:].nonzero()[0])
    return [
        Outlines._make((*(c.take(rows, 0) for c in outlines[:-1]), outlines[-1])) for rows in pieces
    ]


def touching(vertices: Floats, reach: Floats) -> Flags:
    """Tell which outlines' boxes come within the reach of the axis."""
    low, high = vertices.min(axis=1), vertices.max(axis=1)
    touches: Flags = ((low < reach[:, None]) & (high > -reach[:, None])).all(axis=1)
    return touches
