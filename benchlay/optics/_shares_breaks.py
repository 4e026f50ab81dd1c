"""The directions at which the radial order of the outlines may change.

Between two neighbouring break angles the same outlines follow each other along every
ray, so the order is worked out once for each interval. A break too many costs a little
time and no accuracy; hence all tests below lean to the generous side.
"""

from __future__ import annotations

import numpy as np

from benchlay.optics._shares_curves import (
    CUT_RADIUS,
    Bools,
    Complexes,
    Ellipses,
    Floats,
    Ints,
    Lines,
    largest_stretch,
    pick_lines,
    select,
    spans,
    starts,
    transform,
)
from benchlay.optics._shares_prepare import Section

_SAME_ANGLE = 1e-14  # breaks are good to a few 1e-16 rad
_END = 1e-12  # how far beyond its ends a piece is still crossed (widths of the beam)
_TOUCH = 1e-9  # outlines this near to touching (of a semi-axis) have a break there
_AT_OUTLINE = 1e-6  # the axis is this near an outline, of a semi-axis
_CIRCULAR = 1e-9  # below this the quartic is solved as a quadratic, then polished
_ON_CIRCLE = 1e-2  # a double root may leave the unit circle by the root of its error
# Three fixed directions keep every interval below pi, where arcs are unambiguous.
_FIXED = np.array([0.3, 0.3 + 2.0 * np.pi / 3.0, 0.3 + 4.0 * np.pi / 3.0]) - np.pi


def break_angles(section: Section) -> tuple[Ints, Floats]:
    """List the break angles of all problems that have bodies.

    Returns
    -------
    problem : (N,) ndarray of intp
        Non-decreasing.
    angle : (N,) ndarray of float64
        In (-pi, pi], rising within a problem, neighbours less than pi apart.
    """
    lines, ellipses = section.lines, section.ellipses
    around = section.bodies.problem[ellipses.body]
    found = [
        (lines.problem, _on_line(lines, lines.start)),
        (lines.problem, _on_line(lines, lines.end)),
        _lines_with_lines(lines),
        _lines_with_ellipses(lines, ellipses, starts(around, section.problems)),
        *_tangents(ellipses, around),
        _ellipses_with_ellipses(ellipses, around, section.problems),
    ]
    busy = np.flatnonzero(np.diff(section.bodies.first))
    point = np.concatenate([place for _, place in found], axis=1)
    angle = np.concatenate((np.arctan2(point[1], point[0]), np.tile(_FIXED, len(busy))))
    problem = np.concatenate([owner for owner, _ in found] + [np.repeat(busy, 3)])
    sequence = np.lexsort((angle, problem))
    problem, angle = problem[sequence], angle[sequence]
    keep = np.ones(len(angle), dtype=bool)
    keep[1:] = (angle[1:] - angle[:-1] > _SAME_ANGLE) | (problem[1:] > problem[:-1])
    return problem[keep], angle[keep]


def _on_line(lines: Lines, place: Floats) -> Floats:
    """Points (2, L) at distance `place` from the foot of each line."""
    n = lines.normal
    return np.array((lines.distance * n[0] - place * n[1], lines.distance * n[1] + place * n[0]))


def _lines_with_lines(lines: Lines) -> tuple[Ints, Floats]:
    """Crossings of straight pieces of different bodies."""
    row = np.arange(len(lines.problem))
    last = lines.problem.searchsorted(lines.problem, side="right")
    a, b = spans(row + 1, last - row - 1)
    other = (lines.body[a] != lines.body[b]) | (lines.body[a] < 0)
    a, b = a[other], b[other]
    na, nb = select(lines.normal, a), select(lines.normal, b)
    ha, hb = lines.distance[a], lines.distance[b]
    aligned = na[0] * nb[0] + na[1] * nb[1]
    turned = na[0] * nb[1] - na[1] * nb[0]
    with np.errstate(divide="ignore", invalid="ignore"):
        sa = (hb - ha * aligned) / turned
        sb = (hb * aligned - ha) / turned
    hit = (sa >= lines.start[a] - _END) & (sa <= lines.end[a] + _END)
    hit &= (sb >= lines.start[b] - _END) & (sb <= lines.end[b] + _END)
    pick = hit.nonzero()[0]
    a = a[pick]
    return lines.problem[a], _on_line(pick_lines(lines, a), sa[pick])


def _lines_with_ellipses(lines: Lines, ellipses: Ellipses, first: Ints) -> tuple[Ints, Floats]:
    """Crossings of straight pieces with ellipses, where the ellipse is a unit circle."""
    a, e = spans(first[lines.problem], first[lines.problem + 1] - first[lines.problem])
    begin = _on_line(lines, lines.start)[:, a]
    reach = _on_line(lines, lines.end)[:, a] - begin
    inverse, centre = select(ellipses.inverse, e), select(ellipses.centre, e)
    p, d = transform(inverse, begin - centre), transform(inverse, reach)
    length2 = d[0] * d[0] + d[1] * d[1]
    foot = -(p[0] * d[0] + p[1] * d[1]) / length2
    miss = (p[0] * d[1] - p[1] * d[0]) ** 2 / length2
    pick = np.flatnonzero(miss < 1.0 + _TOUCH)
    half = np.sqrt(np.maximum(1.0 - miss[pick], 0.0) / length2[pick])
    where = np.concatenate((foot[pick] - half, foot[pick] + half))
    pick = np.concatenate((pick, pick))
    on = (where > -_END) & (where < 1.0 + _END)
    where, pick = where[on], pick[on]
    return lines.problem[a[pick]], begin[:, pick] + where * reach[:, pick]


def _tangents(ellipses: Ellipses, around: Ints) -> list[tuple[Ints, Floats]]:
    """Points where a ray from the axis only touches an ellipse.

    When the axis lies on the outline it is itself that point, and no direction can be had
    from it: the tangent's two directions are taken there instead.
    """
    away2 = np.sum(ellipses.axis**2, axis=0)
    pick = np.flatnonzero(away2 > 1.0)
    axis, away2_out = ellipses.axis[:, pick], away2[pick]
    side = np.sqrt(away2_out - 1.0) * np.array((-axis[1], axis[0]))
    centre, axes = ellipses.centre[:, pick], select(ellipses.axes, pick)
    on = np.flatnonzero(np.abs(away2 - 1.0) < _AT_OUTLINE)
    along = np.array((-ellipses.axis[1, on], ellipses.axis[0, on]))
    along = transform(select(ellipses.axes, on), along)
    return [
        (around[pick], centre + transform(axes, (axis + side) / away2_out)),
        (around[pick], centre + transform(axes, (axis - side) / away2_out)),
        (around[on], along),
        (around[on], -along),
    ]


def _ellipses_with_ellipses(ellipses: Ellipses, around: Ints, problems: int) -> tuple[Ints, Floats]:
    """Crossings of ellipses with each other and with the circle of the cut radius."""
    row = np.arange(len(around))
    first = starts(around, problems)
    a, b = spans(row + 1, first[around + 1] - row - 1)
    disc = CUT_RADIUS * np.eye(2)[:, :, None]
    axes = np.concatenate((ellipses.axes, disc), axis=-1)
    inverse = np.concatenate((ellipses.inverse, disc / CUT_RADIUS**2), axis=-1)
    centre = np.concatenate((ellipses.centre, np.zeros((2, 1))), axis=-1)
    a = np.concatenate((np.full(len(row), len(row)), a))  # the disc is the last row
    b = np.concatenate((row, b))
    offset = select(centre, b) - select(centre, a)
    cross = _overlap(select(inverse, a), select(axes, b), offset)
    cross &= _overlap(select(inverse, b), select(axes, a), -offset)
    if not cross.any():
        return around[:0], centre[:, :0]
    a, b, offset = a[cross], b[cross], offset[:, cross]
    here, within = select(axes, b), select(inverse, a)
    pair, phi = _crossings(_product(within, here), transform(within, offset))
    turn = np.array((np.cos(phi), np.sin(phi)))
    b = b[pair]
    return around[b], centre[:, b] + transform(select(axes, b), turn)


def _product(left: Floats, right: Floats) -> Floats:
    """Matrix products of (2, 2, N) with (2, 2, N)."""
    return np.stack((transform(left, right[:, 0]), transform(left, right[:, 1])), axis=1)


def _overlap(inverse: Floats, axes: Floats, offset: Floats) -> Bools:
    """Can an ellipse cross the other's outline? No if clearly beyond or within it."""
    centre = transform(inverse, offset)
    distance = np.hypot(centre[0], centre[1])
    reach = largest_stretch(_product(inverse, axes))
    result: Bools = (distance - reach < 1.0 + _TOUCH) & (distance + reach > 1.0 - _TOUCH)
    return result


def _crossings(matrix: Floats, centre: Floats) -> tuple[Ints, Floats]:
    r"""Angles at which centre + matrix @ (cos, sin) crosses the unit circle.

    With z = exp(i phi) the point is c + alpha z + beta / z as a complex number, and
    |point|^2 = 1 is a quartic in z, whose roots of modulus 1 are the crossings.
    """
    c = centre[0] + 1j * centre[1]
    alpha = matrix[0, 0] + matrix[1, 1] + 1j * (matrix[1, 0] - matrix[0, 1])
    beta = matrix[0, 0] - matrix[1, 1] + 1j * (matrix[1, 0] + matrix[0, 1])
    alpha, beta = 0.5 * alpha, 0.5 * beta
    lead = alpha * beta.conj()
    next_ = alpha * c.conj() + c * beta.conj()
    level = np.abs(c) ** 2 + np.abs(alpha) ** 2 + np.abs(beta) ** 2 - 1.0
    scale = np.abs(next_) + np.abs(level) + np.abs(lead)
    least = np.maximum(_CIRCULAR * scale, _END)  # all below _END: one ellipse twice
    full = np.abs(lead) > least
    root = np.zeros((len(c), 4), dtype=np.complex128)
    quartic = np.stack((next_, level + 0j, next_.conj(), lead.conj()), axis=-1)
    if full.any():
        root[full] = _roots(quartic[full] / lead[full, None])
    simple = ~full & (np.abs(next_) > least)
    if simple.any():
        quadratic = np.stack((level + 0j, next_.conj()), axis=-1)
        root[simple, :2] = _roots(quadratic[simple] / next_[simple, None])
    pair, which = np.nonzero(np.abs(np.abs(root) - 1.0) < _ON_CIRCLE)
    phi = np.angle(root[pair, which])
    for _ in range(6):  # Newton; a double root halves its error at each step
        z = np.exp(1j * phi)
        value = 2.0 * (lead[pair] * z * z + next_[pair] * z)
        slope = 2.0j * (2.0 * lead[pair] * z * z + next_[pair] * z)
        safe = np.where(np.abs(slope.real) > 0.0, slope.real, 1.0)
        phi -= np.minimum(np.maximum((value.real + level[pair]) / safe, -0.05), 0.05)
    return pair, phi


def _roots(tail: Complexes) -> Complexes:
    """Roots of the monic polynomials with the coefficients (N, degree) after the first."""
    degree = tail.shape[1]
    companion = np.zeros((len(tail), degree, degree), dtype=np.complex128)
    companion[:, 0] = -tail
    companion[:, np.arange(1, degree), np.arange(degree - 1)] = 1.0
    roots: Complexes = np.linalg.eigvals(companion).astype(np.complex128)
    return roots
