"""What people can reach of the light of a state: beyond the enclosure, or within it as well."""

from __future__ import annotations

import math

import numpy as np
import shapely

from benchlay.checks import Context, accessible_w
from benchlay.coverage.enclosed import at_wall
from benchlay.layout.enclosure import Enclosure
from benchlay.layout.layout import Layout
from benchlay.named import NamedTuple
from benchlay.optics import moments
from benchlay.scene.tables import Floats, Ints
from benchlay.tracing.beams import HANDED
from benchlay.zones.enclosure_line import EnclosureLine, enclosure_line, inside, leaving

OUTSIDE, INSIDE = "outside", "inside"
_LITTLE_MM = 1e-3  # above rounding, below any thickness


class Way(NamedTuple):
    """Beams outside optics and how far along each of them it can be reached, mm."""

    beams: Ints  # (K,)
    from_mm: Floats  # (K,)

    def take(self, rows: Ints) -> Way:
        """Return some of them."""
        return Way(self.beams[rows], self.from_mm[rows])


class Reach(NamedTuple):
    """The light of a state by where it can be met.

    `within` is all that runs outside optics, `beyond` what gets past the enclosure's line,
    None without an enclosure. `because` says why what is within can be reached: empty where
    the enclosure is whole and shut.
    """

    variant: int
    within: Way
    beyond: Way | None
    because: tuple[str, ...]

    @property
    def counts(self) -> str:
        """Which of the two people can reach."""
        return INSIDE if self.because or self.beyond is None else OUTSIDE

    @property
    def in_reach(self) -> Way:
        """The light that people can reach."""
        return self.within if self.beyond is None or self.because else self.beyond


def reach_of(context: Context, variant: int) -> Reach:
    """Return which light of a state can be met, and where it begins to."""
    start = context.trace.beams.start
    rows = context.beams_of(variant)
    rows = rows[context.outside[rows] & (start.power[rows] > 0.0)]
    within = Way(rows, np.zeros(len(rows)))
    layout = context.layout(variant)
    line = enclosure_line(layout)
    because = why_open(layout, line)
    if not line.enclosed:
        return Reach(variant, within, None, because)
    ways = np.array([_beyond_mm(context, line, beam) for beam in rows.tolist()])
    out = np.flatnonzero(np.isfinite(ways))
    return Reach(variant, within, Way(rows[out], ways[out]), because)


def why_open(layout: Layout, line: EnclosureLine) -> tuple[str, ...]:
    """Say why what is inside the enclosure can be reached; nothing where it is whole and shut."""
    enclosure = layout.enclosure
    if enclosure is None or not line.enclosed:
        return ("the bench has no enclosure",)
    out = []
    missing = [side for side in line.sides if side.panel is None and not at_wall(layout, side)]
    gaps = [math.dist(side.start, side.end) for side in missing]
    if gaps:
        out.append(f"no panel closes {max(gaps):.3g} mm of the enclosure's side")
    out += [f"panel {name} is open" for name in sorted(enclosure.panels) if _open(enclosure, name)]
    out += [f"lid {name} is open" for name in sorted(enclosure.lids) if enclosure.lids[name].open]
    if not any(lid.open for lid in enclosure.lids.values()) and not _covered(enclosure, line):
        out.append("no lid covers all of the enclosure")
    return tuple(out)


def _open(enclosure: Enclosure, name: str) -> bool:
    return enclosure.panels[name].open


def _covered(enclosure: Enclosure, line: EnclosureLine) -> bool:
    """Whether lids, taken together, lie over all of the area within the line."""
    lids = [shapely.Polygon(lid.outline) for lid in enclosure.lids.values()]
    area = shapely.Polygon(line.corners)
    return bool(shapely.covers(shapely.buffer(shapely.union_all(lids), _LITTLE_MM), area))


def _beyond_mm(context: Context, line: EnclosureLine, beam: int) -> float:
    """Return how far along its leg a beam is beyond the line or above the enclosure."""
    beams = context.trace.beams
    x, y, z = context.point(beams.start.position[beam])
    kx, ky, kz = context.point(beams.start.direction[beam])
    length = float(beams.length[beam])
    after = (x + _LITTLE_MM * kx, y + _LITTLE_MM * ky)
    if not inside(line, after) or z > line.top_mm + _LITTLE_MM:
        return 0.0
    ways = []
    crossing = leaving(line, (x, y), (kx, ky), length)
    # What is handed over ends in the plane of the opening's inner side.
    if crossing is not None and not _handed_there(context, beam, crossing.way_mm):
        ways.append(crossing.way_mm)
    if kz > 0.0 and math.isfinite(line.top_mm):
        over = (line.top_mm - z) / kz
        ways += [over] if over < length - _LITTLE_MM else []
    return min(ways, default=math.inf)


def _handed_there(context: Context, beam: int, way_mm: float) -> bool:
    beams = context.trace.beams
    ends = bool(beams.end_kind[beam] == HANDED)
    return ends and way_mm > float(beams.length[beam]) - _LITTLE_MM


def strongest(context: Context, way: Way, aperture_mm: float) -> tuple[int, float]:
    """Return which of some beams (its place in `way`) an aperture takes most of, and how much, W.

    The aperture is centred on each beam, at the worst place from where it can be met.
    """
    power = context.trace.beams.start.power[way.beams]
    first = int(np.argmax(power))
    least = taken_w(context, way.take(np.array([first])), aperture_mm)[0]
    # An aperture takes no more of a beam than it has.
    rows = np.flatnonzero(power >= least)
    taken = taken_w(context, way.take(rows), aperture_mm)
    best = int(np.argmax(taken))
    return int(rows[best]), float(taken[best])


def taken_w(context: Context, way: Way, aperture_mm: float) -> Floats:
    """Return what an aperture takes of each beam at the worst place in reach, W."""
    apertures = np.full(len(way.beams), aperture_mm)
    return accessible_w(context.trace.beams, way.beams, apertures, way.from_mm)


def narrowest_mm(context: Context, way: Way) -> Floats:
    """Return the diameter with 63 % of the power at the narrowest place in reach, mm.

    Of an elliptical beam it is that of the round one with the same peak.
    """
    beams = context.trace.beams
    m, index = beams.start.moments[:, way.beams], beams.start.index[way.beams]
    low, high = way.from_mm, np.maximum(beams.length[way.beams], way.from_mm)
    waists = np.clip(moments.waist_distance(m, index), low, high)
    between = waists[0] + (waists[1] - waists[0]) * np.linspace(0.0, 1.0, 9)[:, None]
    depths = np.concatenate((low[None], high[None], between))
    w1, w2, _ = moments.radii(moments.propagate(m[:, None, :], depths, index))
    narrowest: Floats = np.sqrt(2.0 * (w1 * w2).min(axis=0))
    return narrowest
