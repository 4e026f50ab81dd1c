"""Which body owns which stretch of a ray, once for each interval of directions."""

from __future__ import annotations

import numpy as np

from benchlay.named import NamedTuple
from benchlay.optics._shares_curves import (
    CUT_RADIUS,
    DEPTH_TIE_MM,
    Bodies,
    Bools,
    Floats,
    Ints,
    select,
    spans,
    starts,
    transform,
)
from benchlay.optics._shares_prepare import Section
from benchlay.optics._shares_windows import ellipse_window, polygon_window

_EMPTY = 1e-12  # a stretch thinner than this part of its radius is rounding
# Not the middle: in a symmetric layout outlines that touch do so in the middle of an
# interval, and the one ray on which they are one would stand for all.
_PROBE = 0.4637
_APART = 32.0  # keeps the angles of one problem from those of the next
_MOST = 14.0  # no angle of a probing ray, nor of a window, is as large
_ELEMENTS = 60_000  # of the largest table at a time: it should stay in the cache


class Intervals(NamedTuple):
    """Intervals of directions between break angles, a row an interval."""

    problem: Ints  # (I,)
    angle: Floats  # (I,) rad, where it begins
    width: Floats  # (I,) rad, below pi
    begin: Floats  # (2, I) direction as a unit vector
    probe: Floats  # (2, I) the ray whose order stands for the interval
    end: Floats  # (2, I)
    first: Ints  # (problems + 1,) first interval of each problem


class Rays(NamedTuple):
    """Where the probing ray of each interval enters and leaves each body.

    A row is an (interval, body met) pair, those of an interval together and in the order
    of the slots. Radii are cut at the cut radius.
    """

    first: Ints  # (I + 1,) first row of each interval
    body: Ints  # (R,) row in Bodies
    host: Ints  # (R,) place within the interval of the body a hole is in; -1 for a body
    enter: Floats  # (R,)
    leave: Floats  # (R,)
    row: Ints  # (R,) row in `edge_radius`, or of the ellipse
    edge_radius: Floats  # (V, Q) where the ray meets each edge of a polygon; NaN if not


class Stretches(NamedTuple):
    """Stretches of rays with one owner each, from the axis outwards, by interval."""

    interval: Ints  # (T,)
    body: Ints  # (T,) owner, row in Bodies; -1: free
    bound: Ints  # (T,) inner end: -1 the axis; 2 ray row + (0 enter, 1 leave);
    #                   from 2 len(enter) on: a line of equal depth


def intervals(problem: Ints, angle: Floats, problems: int) -> Intervals:
    """Intervals from each break angle to the next of the same problem."""
    first = starts(problem, problems)
    follow = np.arange(1, len(angle) + 1)
    last = first[1:][problem] == follow
    follow = np.where(last, first[problem], follow)
    width = angle[follow] - angle + np.where(last, 2.0 * np.pi, 0.0)
    begin, probe = _unit(angle), _unit(angle + _PROBE * width)
    return Intervals(problem, angle, width, begin, probe, begin[:, follow], first)


def _unit(angle: Floats) -> Floats:
    return np.array((np.cos(angle), np.sin(angle)))


def cast(section: Section, sweep: Intervals) -> Rays:
    """Send the probing ray of each interval through the bodies that may lie on it."""
    bodies = section.bodies
    corner = section.polygons.corner
    which, interval = _facing(section, sweep, section.polygons.body, polygon_window(corner))
    near, far, edge_radius = _through_polygons(section, which, sweep.probe[:, interval])
    window = ellipse_window(section.ellipses)
    round_, at = _facing(section, sweep, section.ellipses.body, window)
    round_near, round_far = _through_ellipses(section, round_, sweep.probe[:, at])
    enter, leave = np.concatenate((near, round_near)), np.concatenate((far, round_far))
    row = np.concatenate((np.arange(len(which)), round_))
    body = np.concatenate((section.polygons.body[which], section.ellipses.body[round_]))
    interval = np.concatenate((interval, at))
    met = ((enter < leave) & (enter < CUT_RADIUS)).nonzero()[0]
    code = interval[met] * (int(bodies.slot.max(initial=0)) + 1) + bodies.slot[body[met]]
    order = code.argsort()
    code, met = code[order], met[order]
    body, interval = body[met], interval[met]
    host, kept = _hosts(bodies, body, interval, code)
    met, body, host = met[kept], body[kept], host[kept]
    begin = starts(interval[kept], len(sweep.problem))
    leave = np.minimum(leave[met], CUT_RADIUS)
    return Rays(begin, body, host, enter[met], leave, row[met], edge_radius)


def _hosts(bodies: Bodies, body: Ints, interval: Ints, code: Ints) -> tuple[Ints, Bools]:
    """Return where each hole's body stands in its interval, and which rows count.

    A hole counts where its body is met; being last in the order, holes that do not count
    move nobody's place.
    """
    host, kept = np.full(len(body), -1), np.ones(len(body), dtype=bool)
    hole = np.flatnonzero(bodies.host[body] >= 0)
    if len(hole):
        wanted = code[hole] - bodies.slot[body[hole]] + bodies.host[body[hole]]
        place = np.minimum(np.searchsorted(code, wanted), len(code) - 1)
        kept[hole] = code[place] == wanted
        host[hole] = place - np.searchsorted(interval, interval[hole])
    return host, kept


def _facing(
    section: Section, sweep: Intervals, body: Ints, window: tuple[Floats, Floats]
) -> tuple[Ints, Ints]:
    """Pairs of a shape and an interval of its problem in whose direction the shape lies."""
    probe = sweep.angle + _PROBE * sweep.width  # rising through less than a turn
    key = sweep.problem * _APART + probe
    problem = section.bodies.problem[body] * _APART
    turn = np.array([[-2.0 * np.pi], [0.0], [2.0 * np.pi]])
    first = key.searchsorted((problem + np.maximum(window[0] + turn, -_MOST)).ravel())
    last = key.searchsorted((problem + np.minimum(window[1] + turn, _MOST)).ravel())
    which, member = spans(first, np.maximum(last - first, 0))
    return which % max(len(body), 1), member


def _through_polygons(section: Section, which: Ints, ray: Floats) -> tuple[Floats, Floats, Floats]:
    """Enter, leave and the radius at each edge (NaN: not met)."""
    table = section.polygons
    side = ray[0] * select(table.corner[1], which) > ray[1] * select(table.corner[0], which)
    met = side != np.concatenate((side[1:], side[:1]))
    normal = select(table.normal, which)
    toward = ray[0] * normal[0] + ray[1] * normal[1]
    met &= toward > 0.0
    with np.errstate(divide="ignore", invalid="ignore"):
        radius = np.where(met, select(table.distance, which) / toward, np.nan)
    near = np.fmin.reduce(radius, axis=0)
    far = np.fmax.reduce(radius, axis=0)
    count = met.sum(axis=0)
    near[count == 1] = 0.0  # the axis is inside
    near[count == 0], far[count == 0] = CUT_RADIUS, 0.0
    return near, far, radius


def _through_ellipses(section: Section, which: Ints, ray: Floats) -> tuple[Floats, Floats]:
    table = section.ellipses
    d, axis = transform(select(table.inverse, which), ray), table.axis[:, which]
    length2 = d[0] * d[0] + d[1] * d[1]
    along = d[0] * axis[0] + d[1] * axis[1]
    room = length2 - (d[0] * axis[1] - d[1] * axis[0]) ** 2
    root = np.sqrt(np.maximum(room, 0.0))
    outside = axis[0] * axis[0] + axis[1] * axis[1] > 1.0
    near = np.where(outside, (-along - root) / length2, 0.0)
    far = (root - along) / length2
    missed = (room <= 0.0) | (far <= 0.0)
    near[missed], far[missed] = CUT_RADIUS, 0.0
    return near, far


def stretches(section: Section, sweep: Intervals, rays: Rays) -> Stretches:
    """Divide every probing ray among the bodies it meets first."""
    levels = _levels(section, sweep, 2 * len(rays.enter))
    size = np.diff(rays.first)
    sequence = np.argsort(-size, kind="stable")
    parts, done = [], 0
    while done < len(sequence):
        slots = max(1, int(size[sequence[done]]))
        step = max(1, _ELEMENTS // (slots * (2 * slots + 1)))
        chunk = np.sort(sequence[done : done + step])
        parts.append(_divide(section, sweep, rays, chunk, levels))
        done += step
    whole = [np.concatenate(column) for column in zip(*parts, strict=True)]
    if len(parts) > 1:
        order = np.argsort(whole[0], kind="stable")
        whole = [column[order] for column in whole]
    return Stretches(*whole)


def _levels(section: Section, sweep: Intervals, base: int) -> tuple[Ints, Floats, Ints]:
    """Lines of equal depth (from `base` on), the radii at which rays meet them, and starts."""
    nobody = np.flatnonzero(section.lines.body < 0)
    problem = section.lines.problem[nobody]
    begin = sweep.first[problem]
    line, interval = spans(begin, sweep.first[problem + 1] - begin)
    line = nobody[line]
    normal, ray = section.lines.normal[:, line], sweep.probe[:, interval]
    toward = normal[0] * ray[0] + normal[1] * ray[1]
    hit = section.lines.distance[line] < CUT_RADIUS * toward
    line, interval, toward = line[hit], interval[hit], toward[hit]
    sequence = interval.argsort(kind="stable")
    line, interval, toward = line[sequence], interval[sequence], toward[sequence]
    radius = section.lines.distance[line] / toward
    return line + base, radius, starts(interval, len(sweep.problem))


def _divide(
    section: Section,
    sweep: Intervals,
    rays: Rays,
    chunk: Ints,
    levels: tuple[Ints, Floats, Ints],
) -> tuple[Ints, Ints, Ints]:
    """Owners along the probing rays of some intervals (as the columns of Stretches)."""
    many = rays.first[chunk + 1] - rays.first[chunk]
    slot = np.arange(max(1, int(many.max())))[:, None]
    real = slot < many
    ray = np.where(real, rays.first[chunk] + slot, -1)  # -1: any row, never covering
    enter = np.where(real, rays.enter[ray], CUT_RADIUS)
    leave = np.where(real, rays.leave[ray], 0.0)
    radius, bound = _bounds(enter, leave, ray, chunk, levels)
    middle = np.ascontiguousarray(0.5 * (radius[:, 1:] + radius[:, :-1]).T)
    cover = (enter[:, None] < middle) & (middle < leave[:, None])
    _pierce(cover, np.where(real, rays.host[ray], -1))
    depth = section.bodies.depth[rays.body[ray]]
    owner = _foremost(cover, depth, sweep.probe[:, chunk], middle)
    real_stretch = radius[:, 1:] - radius[:, :-1] > _EMPTY * radius[:, 1:]
    which, place = real_stretch.nonzero()
    owner = owner[place, which]
    change = np.ones(len(which), dtype=bool)
    opens = change.copy()
    opens[1:] = which[1:] > which[:-1]
    change[1:] = opens[1:] | (owner[1:] != owner[:-1])
    inner = np.where(opens, -1, bound[which, place])[change]
    which, owner = which[change], owner[change]
    ray = ray[np.minimum(owner, len(slot) - 1), which]
    return chunk[which], np.where(owner == len(slot), -1, rays.body[ray]), inner


def _bounds(
    enter: Floats,
    leave: Floats,
    ray: Ints,
    chunk: Ints,
    levels: tuple[Ints, Floats, Ints],
) -> tuple[Floats, Ints]:
    """Radii (n, B) at which the owner may change, rising, and what stands there."""
    n = len(chunk)
    radius = [np.zeros((n, 1)), enter.T, leave.T, np.full((n, 1), CUT_RADIUS)]
    nothing = np.full((n, 1), -1)
    bound = [nothing, 2 * ray.T, 2 * ray.T + 1, nothing]
    line, level, first = levels
    count = first[chunk + 1] - first[chunk]
    if count.any():
        column = np.arange(int(count.max()))
        held = column < count[:, None]
        place = np.where(held, first[chunk][:, None] + column, 0)
        radius.append(np.where(held, level[place], CUT_RADIUS))
        bound.append(line[place])
    whole = np.concatenate(radius, axis=1)
    whole[:, 1:][whole[:, 1:] <= 0.0] = CUT_RADIUS  # the axis is inside: nothing begins
    sequence = whole.argsort(axis=1)
    sequence = sequence[:, : int((whole < CUT_RADIUS).sum(axis=1).max()) + 1]
    place = sequence + whole.shape[1] * np.arange(n)[:, None]
    return whole.take(place), np.concatenate(bound, axis=1).take(place)


def _pierce(cover: Bools, host: Ints) -> None:
    """Take the holes out of their bodies and out of the running, in place."""
    for slot in np.flatnonzero((host >= 0).any(axis=1)):
        ray = np.flatnonzero(host[slot] >= 0)
        cover[host[slot, ray], :, ray] &= ~cover[slot][:, ray].T
        cover[slot][:, ray] = False


def _foremost(cover: Bools, depth: Floats, ray: Floats, radius: Floats) -> Ints:
    """Slot of the covering body of least depth; the number of slots where there is none.

    Parameters
    ----------
    cover : (K, B, n) ndarray of bool
    depth : (K, n, 3) ndarray of float64
    ray : (2, n) ndarray of float64
    radius : (B, n) ndarray of float64
    """
    slope = depth[..., 1] * ray[0] + depth[..., 2] * ray[1]
    at = np.where(cover, depth[:, None, :, 0] + slope[:, None] * radius, np.inf)
    least = at.min(axis=0)
    least[np.isinf(least)] = np.nan
    slots = len(cover)
    slot = np.arange(slots, dtype=np.int16)[:, None, None]
    owner = np.where(at <= least + DEPTH_TIE_MM, slot, np.int16(slots)).min(axis=0)
    foremost: Ints = owner.astype(np.intp)
    return foremost
