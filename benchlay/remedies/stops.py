"""Screens and dumps on the last leg of a beam, where there is room for them."""

from __future__ import annotations

from collections.abc import Iterator
from math import asin, atan2, ceil, degrees, hypot

import numpy as np

from benchlay.checks import Context
from benchlay.optics.rays import dot
from benchlay.remedies.edits import Edit
from benchlay.remedies.trials import Change, unused_name
from benchlay.remedies.ways import Way
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


def stops(context: Context, way: Way, taken: list[str]) -> Iterator[Change]:
    """Give screens and dumps that would end a beam on its leg, the likeliest first."""
    order = ("dump", "screen") if way.power_w > _STRONG_W else ("screen", "dump")
    spots = _spots(context, way)
    for kind in order:
        for spot, free in spots:
            sizes = _WIDTHS_MM if kind == "screen" else (_OPENING_MM + 2.0 * _WALL_MM,)
            for size in (one for one in sizes if one / 2 + _FROM_BEAMS_MM <= free):
                change = _stop(way, spot, (kind, size), taken)
                if change is not None:
                    yield change


def _spots(context: Context, way: Way) -> list[tuple[Floats, float]]:
    """Return places on a leg, over the bench and within the enclosure, with the room there."""
    over = _way_over_bench(way)
    spots = [way.origin + share * over * way.direction for share in _SHARES]
    return [(spot, context.routes.apart(spot, way.beam)) for spot in spots]


def _way_over_bench(way: Way) -> float:
    """Return how much of a leg, from its start, lies over the bench and in the enclosure, mm."""
    bench, line = bench_line(way.layout), enclosure_line(way.layout)
    good = 0.0
    for far in np.linspace(0.0, way.length_mm, 401)[1:].tolist():
        x, y, z = (way.origin + far * way.direction).tolist()
        here = inside(bench, (x, y)) and inside(line, (x, y))
        if not here or z < 0.0 or z > line.top_mm:
            break
        good = far
    return good


def _stop(way: Way, spot: Floats, what: tuple[str, float], taken: list[str]) -> Change | None:
    """Return one stop that faces the beam; None where it would be too small for it."""
    kind, size = what
    k = way.direction
    needed = 2.0 * _RADII * way.radius_mm(float(dot(spot - way.origin, k)))
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
    words += f" ends the beam that leaves '{way.left}'"
    return Change(kind, words, (Edit(("elements",), name, value),))


def _height(z: float, needed: float, steep: bool) -> float:
    """Return a plate's height: it stands on the bench where the beam runs low enough."""
    if not steep and 0.0 < 2.0 * z <= _TALLEST_MM and 2.0 * z >= needed:
        return 2.0 * z
    return max(75.0, 5.0 * ceil(needed / 5.0))
