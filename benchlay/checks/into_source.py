"""A beam comes back into a source.

Why it matters
--------------
Light that comes back makes many lasers unsteady and some break. It also says that a face
stands square to the beam, so that everything before it sees the light twice.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red:  # <- into-source
       {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     W1: {kind: window, after: red, distance: 200, diameter: 25.4}
     T1: {kind: target, after: W1, distance: 100}
   routes:
     main: [red, W1, T1]

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     W1: {kind: window, after: red, distance: 200, incidence: 1, diameter: 25.4}
     T1: {kind: target, after: W1, distance: 100}
   routes:
     main: [red, W1, T1]

What it does not see
--------------------
Diffuse light that comes back. Light of one source in a bare exit of another (`body: none`),
such as a sample that glows. Interference of several returns. The exit is taken as a circle
half as wide again as the beam is there.

Source
------
Faces are tilted by 1 to 3 degrees or wedged against this (common practice). Without
`limits.back_reflection` the limit is a ten-thousandth of what the source emits (common
practice: 40 dB is what is asked of isolators at most). An opening of half width 1.5 w passes
98.9 % of a round beam: exp(-2 a²/w²).
"""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from benchlay.checks._check import (
    Context,
    above,
    angle_text,
    length_text,
    power_text,
    wavelength_text,
)
from benchlay.findings import Finding, Severity
from benchlay.named import NamedTuple
from benchlay.optics import moments
from benchlay.optics.rays import cross, dot
from benchlay.optics.special import circle_share
from benchlay.placing.placed import PlacedSource
from benchlay.scene.tables import Floats, Ints

NAME = "into-source"

# The light is where it was meant to be; the source suffers.
SEVERITY = Severity.WARN

_EXIT_WIDTHS = 1.5  # half width of the exit, in 1/e² radii of the beam there
_LEAST_ACCEPTANCE_RAD = 2e-3  # of the language: full angle
_SHARE = 1e-4  # of what the source emits, where the layout sets no power
_ROUNDING_MM = 1e-6


class _Return(NamedTuple):
    """A beam that comes back: the power that enters, how far off and how much turned."""

    beam: int
    power_w: float
    off_mm: float
    turn_rad: float


def check(context: Context, variant: int) -> Iterator[Finding]:
    """Report by source and face what enters its exit within its acceptance, with the sum."""
    for name, item in sorted(context.state(variant).sources.items()):
        own = _own(context, variant, name)
        if item.source.stand.out or not len(own):
            continue
        limit = _limit(context, variant, own)
        groups: dict[tuple[int, int, str], list[_Return]] = {}
        for found in _returns(context, variant, item, own, limit):
            start = context.trace.beams.start
            since = context.left_at(context.astray_since(found.beam))
            key = int(start.source[found.beam]), int(start.wave[found.beam]), since
            groups.setdefault(key, []).append(found)
        for (_, _, since), returns in groups.items():
            yield _finding(context, variant, (name, since), returns, limit)


def _returns(
    context: Context, variant: int, item: PlacedSource, own: Ints, limit: float
) -> list[_Return]:
    """Return what enters an exit within its acceptance, each of it above the limit."""
    half_width, half_angle = _exit(context, own, item)
    rows, off, turn = _returning(context, variant, item)
    start = context.trace.beams.start
    counts = (turn <= half_angle) & (start.power[rows] > limit)
    if item.source.body is None:
        # A bare exit is no laser's: only its own light comes *back* to it.
        counts &= start.source[rows] == start.source[own[0]]
    chosen = np.flatnonzero(counts)
    power = _entering(context, rows[chosen], item, half_width)
    columns = zip(
        rows[chosen].tolist(), power.tolist(), off[chosen].tolist(), turn[chosen].tolist(),
        strict=True,
    )  # fmt: skip
    return [_Return(*row) for row in columns if above(row[1], limit)]


def _own(context: Context, variant: int, name: str) -> Ints:
    start = context.trace.beams.start
    rows = context.beams_of(variant)
    number = context.trace.scene.sources.index(name)
    own: Ints = rows[(start.parent[rows] < 0) & (start.source[rows] == number)]
    return own


def _exit(context: Context, own: Ints, item: PlacedSource) -> tuple[float, float]:
    """Return half the width of the exit (mm) and half the angle that it accepts (rad)."""
    start = context.trace.beams.start
    m = start.moments[:, own]
    half_width = _EXIT_WIDTHS * float(np.max(moments.radii(m)[:2]))
    if item.source.acceptance_rad is not None:
        return half_width, 0.5 * item.source.acceptance_rad
    spread = 4.0 * np.sqrt(np.maximum(m[moments.UU], m[moments.VV])) / start.index[own]
    return half_width, max(float(spread.max()), 0.5 * _LEAST_ACCEPTANCE_RAD)


def _returning(context: Context, variant: int, item: PlacedSource) -> tuple[Ints, Floats, Floats]:
    """Return beams that cross the exit's plane from in front: offset (mm) and angle (rad)."""
    beams = context.trace.beams
    number = context.trace.scene.sources.index(item.source.name)
    rows = context.beams_of(variant)
    # What a source has just emitted does not come back; what another one shines into it counts.
    away_again = (beams.start.parent[rows] >= 0) | (beams.start.source[rows] != number)
    rows = rows[context.outside[rows] & away_again]
    normal = np.array(item.pose.axes()[0])
    away = np.array(item.pose.at) - beams.start.position[rows]
    slope = -(beams.start.direction[rows] @ normal)
    with np.errstate(divide="ignore", invalid="ignore"):
        way = -(away @ normal) / slope
    met = (slope > 0.0) & (way >= 0.0) & (way <= beams.length[rows] + _ROUNDING_MM)
    rows, way, slope, away = rows[met], way[met], slope[met], away[met]
    off = np.linalg.norm(way[:, None] * beams.start.direction[rows] - away, axis=1)
    return rows, off, np.arccos(np.minimum(slope, 1.0))


def _entering(context: Context, rows: Ints, item: PlacedSource, half_width: float) -> Floats:
    """Return the power of beams that the exit lets in, W."""
    start = context.trace.beams.start
    k, e1 = start.direction[rows], start.axis[rows]
    away = np.array(item.pose.at) - start.position[rows]
    along = dot(away, k)
    m = moments.propagate(start.moments[:, rows], along, start.index[rows])
    w1, w2, angle = moments.radii(m)
    first = np.cos(angle)[:, None] * e1 + np.sin(angle)[:, None] * cross(k, e1)
    across = away - along[:, None] * k
    share = circle_share(w1, w2, half_width, dot(across, first), dot(across, cross(k, first)))
    whole = start.power[rows] / start.kept[rows] * share
    entering: Floats = np.minimum(whole, context.trace.beams.end_core[rows])
    return entering


def _limit(context: Context, variant: int, own: Ints) -> float:
    written = context.layout(variant).limits.back_reflection_w
    return (
        _SHARE * float(context.trace.beams.start.power[own].sum()) if written is None else written
    )


def _finding(
    context: Context, variant: int, way: tuple[str, str], returns: list[_Return], limit: float
) -> Finding:
    name, since = way
    worst = max(returns, key=lambda one: (one.power_w, -one.beam))
    beam = worst.beam
    total = float(sum(one.power_w for one in returns))
    source, nm = context.source_of(beam), context.wavelength_nm(beam)
    last = _turned_by(context, beam)
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=(
            f"{power_text(total)} of {wavelength_text(nm)} from '{source}'{_way_back(last)} into "
            f"'{name}', {length_text(worst.off_mm)} from its middle "
            f"and {angle_text(worst.turn_rad)} from its axis"
        ),
        expected=f"at most {power_text(limit)} within its exit and acceptance",
        remedy=_remedy(context, variant, name, last),
        element=name,
        beam=int(context.numbers[beam]),
        at=context.state(variant).sources[name].pose.at,
        span=context.span_of(name, variant),
        value=total,
        limit=limit,
        unit="W",
        key=(source, nm, since),
    )


def _turned_by(context: Context, beam: int) -> str:
    """Return what turned a beam back most since it went astray; empty if nothing did."""
    start = context.trace.beams.start
    astray = context.astray_since(beam)
    line = context.ancestors(beam)
    later = [b for b in reversed(line[: line.index(astray) + 1]) if start.parent[b] >= 0]
    if not later:
        return ""
    rows = np.array(later, dtype=np.int64)
    onwards = dot(start.direction[rows], start.direction[start.parent[rows]])
    return context.left_at(later[int(np.argmin(np.round(onwards, 9)))])


def _way_back(last: str) -> str:
    return f", sent back by '{last}', comes back" if last else " shines"


def _remedy(context: Context, variant: int, name: str, last: str) -> str:
    back = last.partition(".")[0]
    if back in context.state(variant).elements:
        return f"tilt '{back}', or put an isolator before it"
    return f"end the beam on a dump or screen before it meets '{back or name}'"
