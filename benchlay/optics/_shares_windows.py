"""In which directions from the axis a shape lies.

A window that is too wide costs time only, so all of them are a little too wide.
"""

from __future__ import annotations

import numpy as np

from benchlay.optics._shares_curves import Ellipses, Floats, transform

_WIDER = 1e-7  # rad, far above the rounding of an angle
_NEAR_AXIS = 1e-9  # a corner this near the axis has no direction
_STRAIGHT = 1e-6  # an edge seen under all but this much of pi may hold the axis
_TURN = 2.0 * np.pi


def polygon_window(corner: Floats) -> tuple[Floats, Floats]:
    """Return the least and greatest direction, rad, of polygons (2, V, P), each (P,).

    The whole turn where the axis is inside or on the outline.
    """
    if not corner.size:
        return np.zeros(corner.shape[2]), np.zeros(corner.shape[2])
    angle = np.arctan2(corner[1], corner[0])
    step = np.concatenate((angle[1:], angle[:1])) - angle
    step -= _TURN * np.round(step / _TURN)
    along = angle[0] + step.cumsum(axis=0)
    around = np.abs(along[-1] - angle[0]) > 1.0
    around |= (np.abs(step) > np.pi - _STRAIGHT).any(axis=0)
    around |= (np.abs(corner).max(axis=0) < _NEAR_AXIS).any(axis=0)
    return _widened(along.min(axis=0), along.max(axis=0), around)


def ellipse_window(table: Ellipses) -> tuple[Floats, Floats]:
    """Return the least and greatest direction, rad, of ellipses, each (E,)."""
    away2 = np.sum(table.axis**2, axis=0)
    around = away2 < 1.0 + _STRAIGHT
    away2 = np.where(around, 2.0, away2)
    side = np.sqrt(away2 - 1.0) * np.array((-table.axis[1], table.axis[0]))
    middle = np.arctan2(table.centre[1], table.centre[0])
    ends = []
    for sign in (1.0, -1.0):
        touch = table.centre + transform(table.axes, (table.axis + sign * side) / away2)
        lean = np.arctan2(touch[1], touch[0]) - middle
        ends.append(lean - _TURN * np.round(lean / _TURN))
    low, high = np.minimum(*ends), np.maximum(*ends)
    return _widened(middle + low, middle + high, around)


def _widened(low: Floats, high: Floats, around: np.ndarray) -> tuple[Floats, Floats]:
    return (
        np.where(around, -np.pi, low - _WIDER),
        np.where(around, np.pi, high + _WIDER),
    )
