"""Leaves out outlines that no light can reach because a nearer one hides them whole.

Behind the front of a mount stand its sides, its post, its foot and the optic's edge; on a
crowded bench most outlines of a wide beam are hidden so, and dividing the cross-section
costs more than in proportion to their number.
"""

from __future__ import annotations

import numpy as np

from benchlay.scene.tables import Flags, Floats, Ints
from benchlay.tracing.outlines import HOLE, Outlines

_WITHIN = 1e-12  # scaled units: a corner that much outside still counts as inside
_QUADRANGLE = 4
_NO_LIMIT = 700.0  # exponents above it overflow, and are far above what counts
_FEW = 4  # below so many outlines in a problem there is nothing to gain
_EQUAL_MM = 1e-9  # depths nearer than this are equal; the order then decides


def worthwhile(outlines: Outlines, reach: Floats) -> Outlines:
    """Return the outlines that may take a share that counts and are not hidden."""
    corners = _corners(outlines)
    kept = counting(outlines, corners, reach)
    outlines = outlines.take(kept)
    return outlines.take(visible(outlines, corners[kept]))


def counting(outlines: Outlines, corners: Floats, reach: Floats) -> Flags:
    """Tell which outlines (S,) may take a share that counts.

    No more lands on an outline than its area times the density at its nearest point; what is
    below the share beyond the reach (problems,) does not count. Bodies with holes are kept.
    """
    low, high = corners.min(axis=1), corners.max(axis=1)
    nearest = np.minimum(np.maximum(0.0, low), high)
    after = corners[:, (1, 2, 3, 0)]
    area = 0.5 * (corners[..., 0] * after[..., 1] - corners[..., 1] * after[..., 0]).sum(axis=1)
    out = reach[outlines.problem]
    ratio = 2.0 * (out * out - (nearest * nearest).sum(axis=1))
    kept: Flags = (2.0 / np.pi) * np.abs(area) * np.exp(np.minimum(ratio, _NO_LIMIT)) >= 1.0
    kept |= outlines.role == HOLE
    kept[outlines.hole_of[outlines.hole_of >= 0]] = True
    return kept


def visible(outlines: Outlines, corners: Floats) -> Flags:
    """Tell which outlines (S,) are not wholly hidden behind a single nearer one.

    Holes, and bodies that have holes, are kept; only whole bodies hide others.
    """
    kept = np.ones(len(outlines.problem), dtype=np.bool_)
    counts = np.bincount(outlines.problem)
    if not len(counts) or counts.max() < _FEW:
        return kept
    whole = outlines.role != HOLE
    whole[outlines.hole_of[outlines.hole_of >= 0]] = False
    front, back = _pairs(counts, whole, corners)
    if not len(front):
        return kept
    points = corners[back]  # (K, 4, 2)
    hides = _ahead(outlines, front, back, points)
    front, back, points = front[hides], back[hides], points[hides]
    round_ones = outlines.corners[front] == 0
    hidden = np.empty(len(front), dtype=np.bool_)
    hidden[round_ones] = _in_ellipse(outlines, front[round_ones], points[round_ones])
    hidden[~round_ones] = _in_polygon(outlines.vertices[front[~round_ones]], points[~round_ones])
    kept[back[hidden]] = False
    return kept


def _corners(outlines: Outlines) -> Floats:
    """Return (S, 4, 2) corners of a quadrangle round each outline: itself, or its box."""
    vertices = outlines.vertices
    low, high = vertices.min(axis=1), vertices.max(axis=1)
    round_ones = outlines.corners == 0
    half = np.sqrt((outlines.axes**2).sum(axis=2))
    low = np.where(round_ones[:, None], outlines.centre - half, low)
    high = np.where(round_ones[:, None], outlines.centre + half, high)
    box = np.stack(
        (low, np.stack((high[:, 0], low[:, 1]), 1), high, np.stack((low[:, 0], high[:, 1]), 1)), 1
    )
    if vertices.shape[1] < _QUADRANGLE:
        return box
    quadrangle = (vertices[:, _QUADRANGLE:] == vertices[:, 3:4]).all(axis=(1, 2)) & ~round_ones
    return np.where(quadrangle[:, None, None], vertices[:, :_QUADRANGLE], box)


def _pairs(counts: Ints, whole: Flags, corners: Floats) -> tuple[Ints, Ints]:
    """Return the pairs of a problem of which the first one's box holds the second one's."""
    low, high = corners.min(axis=1), corners.max(axis=1)
    fronts, backs = [], []
    first = 0
    for count in counts.tolist():
        # Each body with each: of a crowded cross-section a table as large as the square.
        if count >= _FEW:
            a, b = low[first : first + count], high[first : first + count]
            holds = (a[:, None] <= a).all(axis=2) & (b[:, None] >= b).all(axis=2)
            i, j = holds.nonzero()
            fronts.append(i + first)
            backs.append(j + first)
        first += count
    front, back = np.concatenate(fronts), np.concatenate(backs)
    both = whole[front] & whole[back] & (front != back)
    return front[both], back[both]


def _ahead(outlines: Outlines, front: Ints, back: Ints, points: Floats) -> Flags:
    """Tell for which pairs the first is nearer at every corner of the second."""
    x, y = points[..., 0], points[..., 1]
    near, far = outlines.depth[front][:, :, None], outlines.depth[back][:, :, None]
    step = (far[:, 0] - near[:, 0]) + (far[:, 1] - near[:, 1]) * x + (far[:, 2] - near[:, 2]) * y
    least = step.min(axis=1)
    earlier = outlines.order[front] < outlines.order[back]
    ahead: Flags = (least > _EQUAL_MM) | ((least > -_EQUAL_MM) & earlier)
    return ahead


def _in_ellipse(outlines: Outlines, rows: Ints, points: Floats) -> Flags:
    """Tell whether all corners (K, 4, 2) lie inside ellipses (K,)."""
    axes = outlines.axes[rows]
    det = axes[:, 0, 0] * axes[:, 1, 1] - axes[:, 0, 1] * axes[:, 1, 0]
    safe = np.where(np.abs(det) > 0.0, det, np.inf)[:, None]
    away = points - outlines.centre[rows][:, None, :]
    a, b = axes[:, None, :, 0], axes[:, None, :, 1]
    u = (away[..., 0] * b[..., 1] - away[..., 1] * b[..., 0]) / safe
    v = (away[..., 1] * a[..., 0] - away[..., 0] * a[..., 1]) / safe
    inside: Flags = (u * u + v * v <= 1.0).all(axis=1) & (np.abs(det) > 0.0)
    return inside


def _in_polygon(vertices: Floats, points: Floats) -> Flags:
    """Tell whether all corners (K, 4, 2) lie inside anticlockwise polygons (K, V, 2)."""
    side = np.roll(vertices, -1, axis=1) - vertices
    length = np.sqrt((side * side).sum(axis=2))
    offset = side[..., 0] * vertices[..., 1] - side[..., 1] * vertices[..., 0]
    turn = side[:, None, :, 0] * points[:, :, None, 1] - side[:, None, :, 1] * points[:, :, None, 0]
    inside: Flags = (turn - offset[:, None, :] >= -_WITHIN * length[:, None, :]).all(axis=(1, 2))
    return inside
