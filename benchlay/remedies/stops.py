"""Screens and dumps on the last leg of a beam, where there is room for them."""

from __future__ import annotations

from collections.abc import Iterator
from math import asin, atan2, ceil, degrees, hypot

import numpy as np

from benchlay.checks import Context
from benchlay.optics import moments
from benchlay.optics.rays import dot
from benchlay.remedies.edits import Edit
from benchlay.remedies.trials import Change, unused_name
from benchlay.scene.tables import Floats
from benchlay.zones.enclosure_line import bench_line, enclosure_line, inside

# Where along the leg a stop is tried, in shares of the part that lies over the bench: the
# middle first, where there is most room on both sides.
_SHARES = (0.5, 0.3, 0.7, 0.85, 0.15, 0.93, 0.6, 0.4)
_STRONG_W = 0.5  # above this a trap that swallows is offered before a plate that scatters
_STEEP = 0.3  # sine of the climb above which an upright plate would be passed or grazed
_WIDTHS_MM = (50.0, 25.0, 100.0)
_TALLEST_MM = 400.0  # a plate that stands on the bench up to a beam at half of this height
_RADII = 3.0  # of the beam within a stop: all but 1e-7 of its light
_OPENING_MM = 20.0  # of a dump by default
_WALL_MM = 5.0  # of a dump round its opening
_FROM_BEAMS_MM = 3.0  # from the axis of another beam to a stop's edge, at the least
_GRID_MM = 0.5  # places are told to half a millimetre: a rule can be read so


def stops(context: Context, beam: int, taken: list[str]) -> Iterator[Change]:
    """Give screens and dumps that would end a beam on its leg, the likeliest first."""
    power = float(context.trace.beams.start.power[beam])
    order = ("dump", "screen") if power > _STRONG_W else ("screen", "dump")
    spots = _spots(context, beam)
    for kind in order:
        for spot, free in spots:
            sizes = _WIDTHS_MM if kind == "screen" else (_OPENING_MM + 2.0 * _WALL_MM,)
            for size in (one for one in sizes if one / 2 + _FROM_BEAMS_MM <= free):
                change = _stop(context, beam, spot, (kind, size), taken)
                if change is not None:
                    yield change


def _spots(context: Context, beam: int) -> list[tuple[Floats, float]]:
    """Return places on a leg, over the bench and within the enclosure, with the room there."""
    start = context.trace.beams.start
    origin, k = start.position[beam], start.direction[beam]
    over = _way_over_bench(context, beam)
    spots = [origin + share * over * k for share in _SHARES]
    return [(spot, context.routes.apart(spot, beam)) for spot in spots]


def _way_over_bench(context: Context, beam: int) -> float:
    """Return how much of a leg, from its start, lies over the bench and in the enclosure, mm."""
    start = context.trace.beams.start
    origin, k = start.position[beam], start.direction[beam]
    layout = context.layout(int(start.variant[beam]))
    bench, line = bench_line(layout), enclosure_line(layout)
    length = float(context.trace.beams.length[beam])
    ways = np.linspace(0.0, length, 401)[1:]
    good = 0.0
    for way in ways.tolist():
        x, y, z = (origin + way * k).tolist()
        here = inside(bench, (x, y)) and inside(line, (x, y))
        if not here or z < 0.0 or z > line.top_mm:
            break
        good = way
    return good


def _stop(
    context: Context, beam: int, spot: Floats, what: tuple[str, float], taken: list[str]
) -> Change | None:
    """Return one stop that faces the beam; None where it would be too small for it."""
    kind, size = what
    start = context.trace.beams.start
    k = start.direction[beam]
    way = float(dot(spot - start.position[beam], k))
    needed = 2.0 * _RADII * _radius(context, beam, way)
    x, y, z = (round(float(v) / _GRID_MM) * _GRID_MM for v in spot)
    steep = abs(float(k[2])) > _STEEP
    # Along the leg so short a step changes nothing; across it the plate is wide enough.
    facing = round(degrees(atan2(-k[1], -k[0]))) % 360 if hypot(k[0], k[1]) > 1e-6 else 0  # noqa: PLR2004 (upright)
    pitch = round(degrees(asin(-float(k[2])))) if steep or kind == "dump" else 0
    pose = f"at: [{x:g}, {y:g}, {z:g}], facing: {facing}" + (f", pitch: {pitch}" if pitch else "")
    name = unused_name("S" if kind == "screen" else "D", taken)
    if kind == "dump":
        opening = max(_OPENING_MM, 5.0 * ceil(needed / 5.0))
        body = "" if opening == _OPENING_MM else f", opening: {opening:g}"
        words = f"a dump of {opening:g} mm opening at [{x:g}, {y:g}, {z:g}]"
    else:
        width, height = size, _height(z, needed, steep)
        if needed > min(width, height):
            return None
        body = f", size: [{width:g}, {height:g}]"
        words = f"a screen {width:g} by {height:g} mm at [{x:g}, {y:g}, {z:g}]"
        if steep:
            words += ", held from the side at that height,"
        elif height == 2.0 * z:
            words += ", standing on the bench,"
    value = f"{{kind: {kind}, {pose}{body}}}"
    words += f" ends the beam that leaves '{context.left_at(beam)}'"
    return Change(kind, words, (Edit(("elements",), name, value),))


def _height(z: float, needed: float, steep: bool) -> float:
    """Return a plate's height: it stands on the bench where the beam runs low enough."""
    if not steep and 0.0 < 2.0 * z <= _TALLEST_MM and 2.0 * z >= needed:
        return 2.0 * z
    return max(75.0, 5.0 * ceil(needed / 5.0))


def _radius(context: Context, beam: int, way_mm: float) -> float:
    """Return the larger 1/e² radius some way along a leg, mm."""
    start = context.trace.beams.start
    m = moments.propagate(start.moments[:, beam], way_mm, start.index[beam])
    w1, w2, _ = moments.radii(m)
    return float(np.maximum(w1, w2))
