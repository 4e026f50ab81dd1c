"""Where hazardous beams leave the enclosure, or the bench."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from benchlay.checks._check.context import Context
from benchlay.named import NamedTuple
from benchlay.scene.tables import SINKS
from benchlay.tracing.beams import NOTHING, SOLID
from benchlay.zones.enclosure_line import EnclosureLine, Side, bench_line, inside, leaving

_LITTLE_MM = 1e-3  # above rounding, below any thickness


class Exit(NamedTuple):
    """Where a beam goes beyond the line; no side where it goes upwards or starts beyond."""

    beam: int
    way_mm: float
    side: Side | None
    upwards: bool


def exits_of(context: Context, variant: int, line: EnclosureLine) -> Iterator[Exit]:
    """Yield where hazardous beams of a state first leave; handing over is no leaving."""
    rows = context.beams_of(variant)
    bench = bench_line(context.layout(variant))
    gone: set[int] = set()
    for beam in rows[context.hazardous[rows]].tolist():
        found = _exit(context, beam, line, bench, gone)
        if found is None:
            continue
        gone.add(beam)
        if context.routes.handed_at(beam) is None:
            yield found


def _exit(
    context: Context, beam: int, line: EnclosureLine, bench: EnclosureLine, gone: set[int]
) -> Exit | None:
    """Return where a beam leaves, unless what it came from has left before."""
    crossing = _crossing(context, beam, line)
    if crossing is not None:
        return Exit(beam, crossing[0], crossing[1], upwards=False)
    if inside(line, _just_after(context, beam)):
        way = _upwards(context, beam, line)
        return None if way is None else Exit(beam, way, None, upwards=True)
    ancestors = context.ancestors(beam)
    if gone.intersection(ancestors):
        return None
    if inside(line, _just_after(context, ancestors[-1])):
        return Exit(beam, 0.0, None, upwards=False)  # it left inside an optic on the line
    crossing = _crossing(context, beam, bench)
    return None if crossing is None else Exit(beam, crossing[0], None, upwards=False)


def _plan(context: Context, beam: int) -> tuple[float, float]:
    x, y, _ = context.point(context.trace.beams.start.position[beam])
    return x, y


def _just_after(context: Context, beam: int) -> tuple[float, float]:
    """Return a place a little along a leg: what starts on a panel is on the side it goes to."""
    (x, y), k = _plan(context, beam), context.trace.beams.start.direction[beam]
    return x + _LITTLE_MM * float(k[0]), y + _LITTLE_MM * float(k[1])


def _crossing(context: Context, beam: int, line: EnclosureLine) -> tuple[float, Side | None] | None:
    beams = context.trace.beams
    x, y, _ = context.point(beams.start.direction[beam])
    found = leaving(line, _plan(context, beam), (x, y), float(beams.length[beam]))
    return None if found is None else (found.way_mm, found.side)


def _upwards(context: Context, beam: int, line: EnclosureLine) -> float | None:
    """Return where a beam that nothing on the bench stops rises above the enclosure."""
    beams, s = context.trace.beams, context.trace.scene.solids
    row = int(beams.end_row[beam])
    lost = beams.end_kind[beam] == NOTHING or (
        beams.end_kind[beam] == SOLID and SINKS[s.sink[row]] == "wall"
    )
    z, slope = float(beams.start.position[beam, 2]), float(beams.start.direction[beam, 2])
    if not lost or slope <= 0.0:
        return None
    length = float(beams.length[beam])
    if line.top_mm == np.inf:
        return 0.0
    return min(max((line.top_mm - z) / slope, 0.0), length)
