"""The standard's test probe: whether it gets through a gap to a beam."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from math import hypot

import numpy as np

from benchlay.coverage.blockers import Window
from benchlay.coverage.enclosed import Enclosed
from benchlay.coverage.gaps import OPENING, OVER, SHEET, SIDE, UNDER, Gap, windows
from benchlay.coverage.mirrors import Leg
from benchlay.scene.surroundings import material_of
from benchlay.scene.tables import Floats

DIAMETER_MM = 12.0
LENGTH_MM = 80.0
# A beam is looked at in so many points, then between the two round the nearest, and again: to a
# nanometre of ten metres.
_POINTS = 257
_ROUNDS = 5
_TOUCH_MM = 1e-9
_ROUNDING_MM = 1e-9


def may_reach(mouths: Sequence[Window], leg: Leg) -> bool:
    """Whether a beam comes as near to a mouth as the probe is long."""
    return any(not _is_far(mouth, leg) for mouth in mouths)


def probe_mm(mouths: Sequence[Window], leg: Leg, radius_mm: float) -> float | None:
    """Return how long a probe of that diameter would have to be to reach a beam.

    Parameters
    ----------
    mouths : sequence of Window
        From `mouths_of`.
    leg : Leg
        The axis of the beam.
    radius_mm : float
        How far round it the beam reaches.

    Returns
    -------
    float or None
        From the outer mouth to the tip, mm; None where the probe does not get there. The probe
        may lean as far as the mouths let it. How far it then reaches sideways is taken
        generously: its radius and the beam's.
    """
    lengths = [_needed(mouth, leg, radius_mm) for mouth in mouths]
    return min((length for length in lengths if length is not None), default=None)


def mouths_of(enclosed: Enclosed, gap: Gap) -> list[Window]:
    """Return the openings of a gap that the probe goes into; none of a lid that is off."""
    return [mouth for mouth in _mouths(enclosed, gap) if _admits(mouth)]


def _mouths(enclosed: Enclosed, gap: Gap) -> Iterator[Window]:
    """Yield the openings that a gap is, as rectangles with the depth of what is round them."""
    if gap.kind not in (OPENING, SIDE, SHEET, OVER, UNDER) or gap.through.startswith("lid "):
        return
    side = enclosed.line.sides[gap.sides[0]]
    if gap.kind == OPENING:
        yield from (one for one in windows(enclosed, gap.sheets[0]) if one.name == gap.through)
        return
    panel = enclosed.enclosure.panels[gap.sheets[0]]
    sheet = material_of(enclosed.layout, enclosed.enclosure.material_of(panel))
    x, y = side.end[0] - side.start[0], side.end[1] - side.start[1]
    length = hypot(x, y)
    box = (0.0, length, *gap.heights_mm)
    along = (x / length, y / length)
    yield Window(gap.through, side.start, along, box, False, sheet.thickness_mm, box)


def _needed(mouth: Window, leg: Leg, radius_mm: float) -> float | None:
    start, end, low, high = mouth.box
    half = 0.5 * DIAMETER_MM
    axes = ((start + half, end - half), (low + half, high - half))

    def lengths(ways: Floats) -> Floats:
        return _lengths(mouth, leg, ways, axes, half + radius_mm)

    ends, least = (leg.from_mm, leg.to_mm), np.inf
    for _ in range(_ROUNDS):
        ways = np.linspace(*ends, _POINTS)
        found = _lengths(mouth, leg, ways, axes, half + radius_mm)
        best = int(np.argmin(found))
        least = min(least, float(found[best]))
        ends = (float(ways[max(best - 1, 0)]), float(ways[min(best + 1, _POINTS - 1)]))
    return least if np.isfinite(least) else None


def _admits(mouth: Window) -> bool:
    start, end, low, high = mouth.box
    return min(end - start, high - low) >= DIAMETER_MM - _ROUNDING_MM


def _is_far(mouth: Window, leg: Leg) -> bool:
    """Whether all of a beam lies further inside than the probe is long, or none inside at all."""
    (x, y), (c, s) = mouth.origin, mouth.along
    ends = (leg.at(way) for way in (leg.from_mm, leg.to_mm))
    inwards = [(py - y) * c - (px - x) * s for px, py, _ in ends]
    return min(inwards) + mouth.depth_mm > LENGTH_MM + _ROUNDING_MM or max(inwards) <= 0.0


def _lengths(
    mouth: Window,
    leg: Leg,
    ways: Floats,
    axes: tuple[tuple[float, float], tuple[float, float]],
    aside_mm: float,
) -> Floats:
    """Return the length of a probe to each point of a beam; infinite where none gets there."""
    points = np.array(leg.start) + ways[:, None] * np.array(leg.direction)
    (x, y), (c, s), deep = mouth.origin, mouth.along, mouth.depth_mm
    along = (points[:, 0] - x) * c + (points[:, 1] - y) * s
    inwards = (points[:, 1] - y) * c - (points[:, 0] - x) * s
    ahead = inwards >= -_TOUCH_MM
    inwards = np.maximum(inwards, _TOUCH_MM)
    grown = (inwards + deep) / inwards
    square = np.zeros(len(ways))
    for place, (least, most) in zip((along, points[:, 2]), axes, strict=True):
        # Where the axis may stand in the outer mouth, so that it passes the inner one too.
        nearest = np.clip(place, least, most)
        first = np.maximum(least, place + (least - place) * grown)
        last = np.minimum(most, place + (most - place) * grown)
        ahead &= first <= last + aside_mm
        outer = np.clip(nearest, first, np.maximum(first, last))
        square += (place - outer) ** 2
    sideways = np.maximum(np.sqrt(square) - aside_mm, 0.0)
    lengths: Floats = np.where(ahead, np.hypot(inwards + deep, sideways), np.inf)
    return lengths
