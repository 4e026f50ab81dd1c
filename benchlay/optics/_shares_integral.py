r"""The power beyond and within an outline, over an interval of directions.

With r(t) a point of the outline and d theta = (r x r') / r^2 dt,

    beyond = 1/(2 pi) \int exp(-2 r^2) d theta,
    within = 1/(2 pi) \int (1 - exp(-2 r^2)) d theta = width / (2 pi) - beyond.

The integral runs along the outline and not over the angle: d theta / dt is smooth where a
ray only touches, so the square-root ends of an integral over the angle do not arise.
`beyond` keeps its digits far from the axis, but its integrand has poles at r = 0, near the
real t when the outline passes near the axis. That of `within` is entire (r^2 divides
1 - exp(-2 r^2)), so it is used there; far out its difference to the width would lose
digits. Each piece takes the one that suits it and has the other from the width.
"""

from __future__ import annotations

from collections.abc import Callable

import numpy as np

from benchlay.named import NamedTuple
from benchlay.optics import _gauss
from benchlay.optics._shares_curves import (
    Bools,
    Ellipses,
    Floats,
    Ints,
    Lines,
    join_lines,
    pick_ellipses,
    pick_lines,
    spans,
    transform,
)
from benchlay.optics._shares_order import Intervals, Rays, Stretches
from benchlay.optics._shares_prepare import Section

_NEAR_AXIS = 0.5  # closer than this the pole-free integrand is taken
_PANEL = {8: 0.5, 16: 2.0}  # longest panel, in w: exp(-2 r^2) varies on the scale of w/2
_TURN = {8: 0.8, 16: 1.6}  # longest panel of an arc, in rad
_TOGETHER = 400  # panels at a time: their tables stay in the cache
_TINY = 1e-300  # in place of r^2 = 0, where the integrand is 2
# A Gauss rule of n nodes on a panel of length L errs by about rho^(-2n), where
# rho + 1/rho = (sum of the distances of the nearest pole from the panel's ends) / (L/2).
_POLE = {8: 4.4, 16: 1.6}  # least (sum of distances) / L for an error below 1e-14
_RULES = {n: _gauss.rule(n) for n in _POLE}


# From the columns of `Pieces.shape`, the middles and half lengths of panels (N,), and
# nodes x (n, 1) in -1 .. 1: r^2 and (r x r') dt/dx at the nodes (n, N).
Outline = Callable[[tuple[Floats, ...], Floats, Floats, Floats], tuple[Floats, Floats]]


class Pieces(NamedTuple):
    """Pieces of outlines r(t): begin <= t <= begin + length (length may be negative)."""

    begin: Floats  # (N,)
    length: Floats  # (N,)
    scale: Floats  # (N,) largest |r'|
    pole: Floats  # (N,) least distance of a pole of d theta / dt from the piece
    near: Bools  # (N,) passes near the axis
    shape: tuple[Floats, ...]  # of each piece: the distance, or centre and axes


def shares(
    section: Section, sweep: Intervals, rays: Rays, found: Stretches
) -> tuple[Floats, Floats]:
    """Power on each row of Bodies, and the free power of each problem.

    Returns
    -------
    body : (N,) ndarray of float64
    free : (problems,) ndarray of float64
    """
    width = sweep.width[found.interval] / (2.0 * np.pi)
    beyond, within = width.copy(), np.zeros_like(width)
    near = np.zeros(len(width), dtype=bool)
    for at, value, is_within in _evaluate(section, sweep, rays, found):
        near[at] = is_within
        within[at] = np.where(is_within, value, width[at] - value)
        beyond[at] = np.where(is_within, width[at] - value, value)
    # The outer end is the inner end of the next stretch, or far away.
    last = np.append(np.diff(found.interval) > 0, True)
    beyond_end = np.where(last, 0.0, np.append(beyond[1:], 0.0))
    within_end = np.append(within[1:], 0.0)
    by_within = ~last & np.append(near[1:], False)
    # From the axis outwards, too, `within` of the outer end is the share itself.
    by_within |= ~last & (found.bound < 0)
    value = np.where(by_within, within_end - within, beyond - beyond_end)
    value = np.maximum(value, 0.0)
    free = found.body < 0
    problem = sweep.problem[found.interval[free]]
    return (
        _collect(found.body[~free], value[~free], len(section.bodies.problem)),
        _collect(problem, value[free], section.problems),
    )


def _collect(row: Ints, value: Floats, rows: int) -> Floats:
    """Sum the values of each row."""
    return np.bincount(row, value, rows).astype(np.float64)


def _evaluate(
    section: Section, sweep: Intervals, rays: Rays, found: Stretches
) -> list[tuple[Ints, Floats, Bools]]:
    """Integrals of all inner ends: (rows of Stretches, value, is it `within`?)."""
    split = 2 * len(rays.enter)
    level = found.bound >= split
    outline = (found.bound >= 0) & ~level
    polygon = np.zeros(len(section.bodies.problem), dtype=bool)
    polygon[section.polygons.body] = True
    ray = np.where(outline, found.bound // 2, 0)
    interval, body = found.interval, rays.body[ray]
    straight = np.flatnonzero(outline & polygon[body])
    curved = np.flatnonzero(outline & ~polygon[body])
    level_rows = np.flatnonzero(level)
    edges = _edges(section, rays, found.bound[straight], body[straight])
    lines = section.lines
    number = found.bound[level_rows] - split
    line = join_lines(edges, pick_lines(lines, number))
    rows = np.concatenate((straight, level_rows))
    results = []
    pieces = _line_pieces(line, sweep, interval[rows])
    results.append((rows, _integrate(pieces, _straight), pieces.near))
    which = rays.row[ray[curved]]
    table = section.ellipses
    ellipse = pick_ellipses(table, which)
    leaving = (found.bound[curved] & 1).astype(bool)
    pieces = _arc_pieces(ellipse, leaving, sweep, interval[curved])
    results.append((curved, _integrate(pieces, _curved), pieces.near))
    return results


def _edges(section: Section, rays: Rays, bound: Ints, body: Ints) -> Lines:
    """Edges of polygons at which a ray enters or leaves."""
    polygons = section.polygons
    ray = bound // 2
    which, radius = rays.row[ray], rays.edge_radius[:, rays.row[ray]]
    extreme = np.where(bound & 1, np.fmax.reduce(radius, axis=0), np.fmin.reduce(radius, axis=0))
    edge = (radius == extreme).argmax(axis=0)
    which = _polygon_of(section, body)
    return Lines(
        section.bodies.problem[body],
        body,
        polygons.distance[edge, which],
        polygons.normal[:, edge, which],
        polygons.start[edge, which],
        polygons.end[edge, which],
    )


def _polygon_of(section: Section, body: Ints) -> Ints:
    return np.searchsorted(section.polygons.body, body)


def _line_pieces(line: Lines, sweep: Intervals, interval: Ints) -> Pieces:
    """Cut each line to its interval of directions."""
    n = line.normal
    ends = []
    for ray in (sweep.begin[:, interval], sweep.end[:, interval]):
        toward = np.maximum(n[0] * ray[0] + n[1] * ray[1], _TINY)
        place = line.distance * ((n[0] * ray[1] - n[1] * ray[0]) / toward)
        ends.append(np.clip(place, line.start, line.end))
    begin, end = ends
    foot = np.maximum(np.maximum(begin, -end), 0.0)
    closest = np.hypot(line.distance, foot)
    one = np.ones_like(begin)
    near = closest < _NEAR_AXIS
    return Pieces(begin, end - begin, one, closest, near, (line.distance,))


def _arc_pieces(ellipse: Ellipses, leaving: Bools, sweep: Intervals, interval: Ints) -> Pieces:
    r"""Cut each ellipse to its interval of directions.

    On the unit circle the ray from the axis a in the direction d meets phi with
    sin(phi - arg d) = d x a / |d|: two solutions, where it enters and where it leaves.
    """
    d0 = transform(ellipse.inverse, sweep.begin[:, interval])
    d1 = transform(ellipse.inverse, sweep.end[:, interval])
    turn = np.arctan2(d0[0] * d1[1] - d0[1] * d1[0], d0[0] * d1[0] + d0[1] * d1[1])
    lean0, lean1 = _lean(d0, ellipse.axis), _lean(d1, ellipse.axis)
    toward = np.arctan2(d0[1], d0[0])
    begin = np.where(leaving, toward + lean0, toward + np.pi - lean0)
    length = turn + np.where(leaving, lean1 - lean0, lean0 - lean1)
    closest = _closest(ellipse, leaving, begin, length)
    shape = (*ellipse.centre, *ellipse.axes.reshape(4, -1))
    # |r(phi + i y) - r(phi)| cannot reach the axis before exp(y) = 1 + |r| / reach.
    pole = np.log1p(closest / ellipse.reach)
    return Pieces(begin, length, ellipse.reach, pole, closest < _NEAR_AXIS, shape)


def _lean(d: Floats, axis: Floats) -> Floats:
    across = d[0] * axis[1] - d[1] * axis[0]
    room = d[0] * d[0] + d[1] * d[1] - across * across
    angle: Floats = np.arctan2(across, np.sqrt(np.maximum(room, 0.0)))
    return angle


def _closest(ellipse: Ellipses, leaving: Bools, begin: Floats, length: Floats) -> Floats:
    """Lower bound of the distance of each arc from the axis.

    Where rays leave, the arc lies beyond its chords; where they enter, it lies beyond
    the tangent at any of its points.
    """
    phi = begin + 0.5 * length * np.arange(3.0)[:, None]
    c, s = np.cos(phi), np.sin(phi)
    (axx, axy), (ayx, ayy) = ellipse.axes
    x, y = ellipse.centre[0] + axx * c + axy * s, ellipse.centre[1] + ayx * c + ayy * s
    tx, ty = axy * c - axx * s, ayy * c - ayx * s
    tangent = (np.abs(x * ty - y * tx) / np.hypot(tx, ty)).max(axis=0)
    dx, dy = np.diff(x, axis=0), np.diff(y, axis=0)
    chord2 = np.maximum(dx * dx + dy * dy, _TINY)
    foot = np.clip(-(x[:-1] * dx + y[:-1] * dy) / chord2, 0.0, 1.0)
    chord = np.hypot(x[:-1] + foot * dx, y[:-1] + foot * dy).min(axis=0)
    bound: Floats = np.where(leaving, chord, tangent)
    return bound


class _Rule(NamedTuple):
    """How a group of pieces is integrated."""

    nodes: int
    outline: Outline
    near: bool  # `within`, else `beyond`


def _integrate(pieces: Pieces, outline: Outline) -> Floats:
    """Integrate over each piece, the large rule on as many panels as it needs."""
    total = np.zeros(len(pieces.begin))
    size = np.abs(pieces.length)
    pole = np.where(pieces.near, np.inf, 2.0 * pieces.pole)
    panels = {
        n: size * np.maximum(np.maximum(pieces.scale / _PANEL[n], _POLE[n] / pole), 1.0 / turn)
        for n, turn in _TURN.items()
    }
    short = panels[8] <= 1.0
    many = np.maximum(np.ceil(panels[16]), 1.0).astype(np.intp)
    for nodes, chosen in ((8, short), (16, ~short)):
        for near in (False, True):
            rows = (chosen & (pieces.near == near)).nonzero()[0]
            if len(rows):
                count = np.where(short[rows], 1, many[rows])
                total[rows] = _sum(pieces, rows, count, _Rule(nodes, outline, near))
    return total / (2.0 * np.pi)


def _sum(pieces: Pieces, rows: Ints, count: Ints, rule: _Rule) -> Floats:
    """Gauss-Legendre sum over `count` equal panels of each of the pieces `rows`."""
    piece, panel = spans(np.zeros_like(rows), count)
    row = rows[piece]
    half = 0.5 * pieces.length[row] / count[piece]
    middle = pieces.begin[row] + (2.0 * panel + 1.0) * half
    value = np.empty(len(row))
    for start in range(0, len(row), _TOGETHER):
        some = slice(start, start + _TOGETHER)
        shape = tuple(column.take(row[some]) for column in pieces.shape)
        value[some] = _panels(shape, middle[some], half[some], rule)
    return _collect(piece, value, len(rows))


def _panels(shape: tuple[Floats, ...], middle: Floats, half: Floats, rule: _Rule) -> Floats:
    """Integrate over single panels."""
    x, weight = _RULES[rule.nodes]
    r2, cross = rule.outline(shape, middle, half, x[:, None])
    r2 = np.maximum(r2, _TINY)
    power = -np.expm1(-2.0 * r2) if rule.near else np.exp(-2.0 * r2)
    value: Floats = weight @ (power * cross / r2)
    return value


def _straight(
    shape: tuple[Floats, ...], middle: Floats, half: Floats, x: Floats
) -> tuple[Floats, Floats]:
    """Follow a line at a distance from the axis, t from its foot."""
    (distance,) = shape
    t = middle + half * x
    return distance * distance + t * t, distance * half


def _curved(
    shape: tuple[Floats, ...], middle: Floats, half: Floats, x: Floats
) -> tuple[Floats, Floats]:
    """Follow an ellipse, t its eccentric angle.

    The nodes are even in tan((t - middle) / 2) instead of t, which needs no sine.
    """
    x0, y0, axx, axy, ayx, ayy = shape
    c, s = np.cos(middle), np.sin(middle)
    ux, uy = axx * c + axy * s, ayx * c + ayy * s
    vx, vy = axy * c - axx * s, ayy * c - ayx * s
    stretch = np.tan(0.5 * half)
    t = stretch * x
    q = 2.0 / (1.0 + t * t)
    c, s = q - 1.0, t * q
    px, py = x0 + ux * c + vx * s, y0 + uy * c + vy * s
    cross = (ux * vy - uy * vx) + (x0 * vy - y0 * vx) * c - (x0 * uy - y0 * ux) * s
    return px * px + py * py, cross * q * stretch
