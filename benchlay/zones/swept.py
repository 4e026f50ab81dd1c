"""What beams sweep in plan: where an eye's limiting aperture can take too much.

See `benchlay.zones.offside` for the width. A strip comes to an end, where the limit is met along
the beam, as a blunt point.
"""

from __future__ import annotations

import numpy as np
import shapely
from shapely.geometry.base import BaseGeometry

from benchlay.named import NamedTuple
from benchlay.optics import moments
from benchlay.optics.special import circle_share
from benchlay.scene.tables import Flags, Floats, Ints
from benchlay.tracing.trace import Trace
from benchlay.zones.limits import LimitTable
from benchlay.zones.offside import farthest_mm, half_plane
from benchlay.zones.surfaces import normal_left, normal_met

_SAMPLES = 33
_BETWEEN = np.linspace(0.0, 1.0, 17)  # of the way from one waist to the other
_HALVINGS = 24  # of a stretch between two samples: to micrometres
# A strip's side is one line where it bends by less than both, the latter of its width: its area is
# then right to a part in a thousand.
_STRAIGHT_MM = 0.05
_STRAIGHT = 1e-3
_SIDES = 64  # of a circle
_MM_PER_M = 1e3


class Leg(NamedTuple):
    """A leg on which the limit is exceeded, and how far."""

    beam: int
    start: tuple[float, float, float]
    end: tuple[float, float, float]  # where the limit, or the leg, ends
    area: BaseGeometry
    reach_m: float
    power_w: float  # the most that passes the aperture anywhere on the leg


def hazardous_legs(trace: Trace, limits: LimitTable, variant: int) -> list[Leg]:
    """Return the legs of a state on which the limit is exceeded.

    A leg counts from its start to the last place where too much passes the aperture, even
    where it is too wide at the start. Legs inside optics count too: they join the zones on
    either side, and are out of reach anyway.
    """
    s = trace.beams.start
    beams = np.flatnonzero(s.variant == variant)
    allowed, _, _ = limits.of(trace, beams)
    beams = beams[s.power[beams] > allowed]
    if not len(beams):
        return []
    reach = trace.placed.states[variant].layout.limits.reach_mm
    length = np.minimum(trace.beams.length[beams], reach)
    stop, most = _extent(trace, limits, beams, length)
    found = np.flatnonzero(most > limits.of(trace, beams)[0])
    return [_leg(trace, limits, int(beams[i]), (float(stop[i]), float(most[i]))) for i in found]


def through_aperture(trace: Trace, limits: LimitTable, beams: Ints, depth: Floats) -> Floats:
    """Return the power (N, K) through the limiting aperture at depths (N, K), mm, of beams."""
    s = trace.beams.start
    m = moments.propagate(s.moments[:, beams, None], depth, s.index[beams, None])
    w1, w2, _ = moments.radii(m)
    _, _, aperture = limits.of(trace, beams)
    tiny = np.finfo(np.float64).tiny
    share = circle_share(np.maximum(w1, tiny), np.maximum(w2, tiny), aperture[:, None] / 2)
    # A beam that was cut keeps the shape of its uncut self, and never gives more than is left.
    whole = s.power[beams] / s.kept[beams]
    power: Floats = np.minimum(whole[:, None] * share, s.power[beams, None])
    return power


def _extent(trace: Trace, limits: LimitTable, beams: Ints, length: Floats) -> tuple[Floats, Floats]:
    """Return how far along each leg the limit is exceeded (0: nowhere), and the most power."""
    s = trace.beams.start
    even = length[:, None] * np.linspace(0.0, 1.0, _SAMPLES)
    # A focus lies between samples: the waists of both axes are looked at as well, and what is
    # between them, where an elliptical beam may be worst.
    first, last = moments.waist_distance(s.moments[:, beams], s.index[beams])
    foci = first[:, None] + (last - first)[:, None] * _BETWEEN
    depth = np.sort(np.concatenate([even, np.clip(foci, 0.0, length[:, None])], axis=1), axis=1)
    power = through_aperture(trace, limits, beams, depth)
    allowed = limits.of(trace, beams)[0]
    too_much = power > allowed[:, None]
    rows, last = np.arange(len(beams)), depth.shape[1] - 1
    at = np.where(too_much.any(axis=1), last - np.argmax(too_much[:, ::-1], axis=1), 0)
    near, far = depth[rows, at], depth[rows, np.minimum(at + 1, last)]
    ending = np.flatnonzero(far > near)  # all others are hazardous to the end of the leg
    for _ in range(_HALVINGS if len(ending) else 0):
        middle = 0.5 * (near[ending] + far[ending])
        power_there = through_aperture(trace, limits, beams[ending], middle[:, None])[:, 0]
        still = power_there > allowed[ending]
        near[ending] = np.where(still, middle, near[ending])
        far[ending] = np.where(still, far[ending], middle)
    return np.where(too_much.any(axis=1), far, 0.0), power.max(axis=1)


def _leg(trace: Trace, limits: LimitTable, beam: int, extent: tuple[float, float]) -> Leg:
    stop, most = extent
    s = trace.beams.start
    # Closer at both ends, where a strip comes to a point like a root.
    spread = 0.5 - 0.5 * np.cos(np.pi * np.linspace(0.0, 1.0, _ALONG))
    depth = stop * spread
    half = half_widths(trace, limits, beam, depth)
    first = int(np.argmax(half > _BLUNT_MM))
    if first > 0:  # too wide to be hazardous where it starts
        depth = depth[first - 1] + (stop - depth[first - 1]) * spread
        half = half_widths(trace, limits, beam, depth)
    points = s.position[beam] + depth[:, None] * s.direction[beam]
    (ax, ay, az), (bx, by, bz) = points[0].tolist(), points[-1].tolist()
    whole = stop >= float(trace.beams.length[beam])
    left = None if first > 0 else normal_left(trace, beam)
    ends = left, normal_met(trace, beam) if whole else None
    area = _strip(points[:, :2], half, ends)
    return Leg(beam, (ax, ay, az), (bx, by, bz), area, stop / _MM_PER_M, most)


def half_widths(trace: Trace, limits: LimitTable, beam: int, depth: Floats) -> Floats:
    """Return half the width of a beam's strip in plan at depths along it, mm.

    How far the pointing of the source may be off counts over the whole path; what lenses on the
    way make of the angle is left aside.
    """
    s = trace.beams.start
    one = np.array([beam])
    allowed, _, aperture = (float(v[0]) for v in limits.of(trace, one))
    across, upright, turned = _radii_in_plan(trace, beam, depth)
    power = float(s.power[beam] / s.kept[beam])
    if not allowed > 0.0:
        far: Floats = aperture / 2 + _NO_LIMIT * across
    elif turned:
        far = np.maximum(aperture / 2 + across * half_plane(allowed / power), 0.0)
    else:
        far = farthest_mm(across, upright, aperture, allowed / power)
    source = trace.placed.states[int(s.variant[beam])].sources[trace.scene.sources[s.source[beam]]]
    path = float(s.optical_path[beam]) + depth * float(s.index[beam])
    aside = np.tan(source.source.pointing_rad) * path
    half: Floats = np.maximum(far, _BLUNT_MM) + aside
    return half


_NO_LIMIT = 2.0  # 1/e2 radii beyond the aperture, where any light counts
_BLUNT_MM = 0.5  # half the width of a point: nobody's eye is placed to better
_ALONG = 49
_TURNED = 1e-3  # of the radii: an ellipse that is turned more than this in its cross-section


def _radii_in_plan(trace: Trace, beam: int, depth: Floats) -> tuple[Floats, Floats, bool]:
    """Return the 1/e^2 radii aside and upright, and whether the ellipse is turned from these."""
    s = trace.beams.start
    m = moments.propagate(s.moments[:, [beam]], depth, s.index[beam])
    k, e1 = s.direction[beam], s.axis[beam]
    flat = float(np.hypot(k[0], k[1]))
    if flat < _UPRIGHT:
        widest = envelope_radii(trace, beam, depth)
        return widest, widest, False
    side = np.array([-k[1], k[0], 0.0]) / flat
    a, b = float(side @ e1), float(side @ np.cross(k, e1))
    xx, xy, yy = m[moments.XX], m[moments.XY], m[moments.YY]
    along = a * a * xx + 2.0 * a * b * xy + b * b * yy
    up = b * b * xx - 2.0 * a * b * xy + a * a * yy
    both = a * b * (yy - xx) + (a * a - b * b) * xy
    turned = bool((np.abs(both) > _TURNED * np.sqrt(np.maximum(along * up, 0.0))).any())
    radii = (2.0 * np.sqrt(np.maximum(v, 1e-12)) for v in (along, up))
    across, upright = radii
    return across, upright, turned


def envelope_radii(trace: Trace, beam: int, depth: Floats) -> Floats:
    """Return the 1/e2 radius across a beam as seen in plan, at depths along it, mm."""
    s = trace.beams.start
    m = moments.propagate(s.moments[:, [beam]], depth, s.index[beam])
    k, e1 = s.direction[beam], s.axis[beam]
    flat = float(np.hypot(k[0], k[1]))
    w1, w2, _ = moments.radii(m)
    if flat < _UPRIGHT:
        return np.maximum(w1, w2)
    side = np.array([-k[1], k[0], 0.0]) / flat
    a, b = float(side @ e1), float(side @ np.cross(k, e1))
    variance = a * a * m[moments.XX] + 2.0 * a * b * m[moments.XY] + b * b * m[moments.YY]
    radius: Floats = 2.0 * np.sqrt(np.maximum(variance, 0.0))
    return radius


_UPRIGHT = 1e-9


def _strip(points: Floats, half: Floats, ends: tuple[Floats | None, Floats | None]) -> BaseGeometry:
    """Return the area along a leg in plan; round about both ends where it is steep.

    Where it starts and ends on a surface, it is cut along that: `ends` are the normals.
    """
    along = points[-1] - points[0]
    length = float(np.hypot(*along))
    widest = float(half.max())
    if length < 2.0 * widest:
        rounds = [circle(points[0], float(half[0])), circle(points[-1], float(half[-1]))]
        return shapely.convex_hull(shapely.union_all(rounds))
    ahead = along / length
    side = np.array([-ahead[1], ahead[0]])
    share = np.linspace(0.0, 1.0, len(half))
    chord = half[0] + share * (half[-1] - half[0])
    kept: Flags = np.ones(len(half), dtype=np.bool_)
    bends = np.abs(chord - half)
    if float(np.max(bends)) < min(_STRAIGHT_MM, _STRAIGHT * float(half.min())):
        kept[1:-1] = False
    points, half = points[kept], half[kept]
    cuts = []
    for at, way, normal in ((0, -1.0, ends[0]), (-1, 1.0, ends[1])):
        farther, cut = _cut(points[at], way * ahead, float(half[at]), normal)
        place = 0 if at == 0 else len(points)
        points = np.insert(points, place, points[at] + farther * way * ahead, axis=0)
        half = np.insert(half, place, half[at])
        cuts.append(cut)
    area = shapely.Polygon(
        [*(points - half[:, None] * side), *(points + half[:, None] * side)[::-1]]
    )
    for cut in cuts:
        area = area if cut is None else shapely.intersection(area, cut)
    return area


def _cut(
    end: Floats, ahead: Floats, half: float, normal: Floats | None
) -> tuple[float, BaseGeometry | None]:
    """Return how much farther a strip goes at an end, and the half plane that it is cut with.

    A surface met at a slant is met later on one side than on the axis; a tilted one later
    above or below it.
    """
    flat = 0.0 if normal is None else float(np.hypot(normal[0], normal[1]))
    if normal is None or flat < _STEEP:
        return 0.0, None
    inwards = normal[:2] / flat
    slant = abs(float(inwards @ ahead))
    tilt = half * abs(float(normal[2])) / flat
    turn = abs(float(inwards[0] * ahead[1] - inwards[1] * ahead[0]))
    farther = (half * turn + tilt) / max(slant, _STEEP)
    if slant < _STEEP:  # along the surface: no one place is its end
        return 0.0, None
    edge = end - tilt * inwards
    aside = np.array([-inwards[1], inwards[0]]) * _FAR_MM
    corners = [edge - aside, edge + aside, edge + aside + inwards * _FAR_MM]
    return farther, shapely.Polygon([*corners, edge - aside + inwards * _FAR_MM])


_STEEP = 0.2  # sine of 11.5 degrees: beyond, an end stays square to the beam
_FAR_MM = 1e6  # beyond any zone


def circle(centre: Floats, radius: float) -> BaseGeometry:
    """Return a polygon round a circle, nowhere inside it."""
    angle = 2.0 * np.pi * np.arange(_SIDES) / _SIDES
    outer = radius / np.cos(np.pi / _SIDES)
    return shapely.Polygon(centre + outer * np.stack([np.cos(angle), np.sin(angle)], axis=1))
