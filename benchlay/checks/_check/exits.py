"""Where hazardous beams leave the enclosure, or the bench, and by which way."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from benchlay.checks._check.context import Context
from benchlay.layout.enclosure import Opening
from benchlay.named import NamedTuple
from benchlay.scene.tables import SINKS
from benchlay.tracing.beams import NOTHING, SOLID
from benchlay.zones.enclosure_line import EnclosureLine, Side, bench_line, covers, inside, leaving

_LITTLE_MM = 1e-3  # above rounding, below any thickness


class Exit(NamedTuple):
    """Where a beam goes beyond the line; no side where it goes upwards or starts beyond."""

    beam: int
    way_mm: float
    side: Side | None
    upwards: bool


class WayOut(NamedTuple):
    """How a beam leaves: `kind` is up, bench, gap, over, under, open or opening.

    Of one that goes up `panel` is the lid that stands open there, if one does.
    """

    kind: str
    panel: str | None = None
    opening: str | None = None
    between: tuple[str, str] | None = None  # the panels beside a gap

    def words(self) -> str:
        """Name the way in the form of the results.

        >>> WayOut("opening", "south", "port").words(), WayOut("over", "north").words()
        ('south/port', 'over north')
        """
        if self.kind == "opening":
            return f"{self.panel}/{self.opening}"
        if self.kind == "gap" and self.between is not None:
            return f"{'/'.join(self.between)} corner"
        if self.kind == "up" and self.panel is not None:
            return f"open lid {self.panel}"
        fixed = {"up": "upwards", "bench": "edge of the bench", "gap": "where no panel stands"}
        return fixed.get(self.kind) or f"{self.kind} {self.panel}"


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


def place_of(context: Context, found: Exit) -> tuple[float, float, float]:
    """Return where a beam goes beyond the line, mm."""
    start = context.trace.beams.start
    return context.point(start.position[found.beam] + found.way_mm * start.direction[found.beam])


def way_out(
    context: Context, variant: int, line: EnclosureLine, found: Exit, at: tuple[float, float, float]
) -> WayOut:
    """Return by which way a beam leaves the line at a place."""
    if found.upwards:
        return WayOut("up", _open_lid(context, variant, at))
    if not line.enclosed or found.side is None:
        return WayOut("bench")
    name = found.side.panel
    if name is None:
        return WayOut("gap", between=_beside(line, found.side))
    return _past_panel(context, variant, name, at)


def _open_lid(context: Context, variant: int, at: tuple[float, float, float]) -> str | None:
    """Return the lid that would stand over a place if it were not open."""
    enclosure = context.layout(variant).enclosure
    lids = () if enclosure is None else sorted(enclosure.lids.items())
    return next((name for name, lid in lids if lid.open and covers(lid.outline, at[:2])), None)


def _past_panel(
    context: Context, variant: int, name: str, at: tuple[float, float, float]
) -> WayOut:
    """Return how a beam gets past the panel that stands on its side of the line."""
    enclosure = context.layout(variant).enclosure
    assert enclosure is not None
    panel = enclosure.panels[name]
    low, high = enclosure.heights_mm(panel)
    if at[2] >= high:
        return WayOut("over", name)
    if at[2] <= low:
        return WayOut("under", name)
    along = float(np.hypot(at[0] - panel.from_mm[0], at[1] - panel.from_mm[1]))
    openings = sorted(panel.openings.items())
    opening = next((key for key, hole in openings if _is_in(hole, along, at[2])), None)
    if panel.open or opening is None:
        return WayOut("open", name)
    return WayOut("opening", name, opening)


def _beside(line: EnclosureLine, gap: Side) -> tuple[str, str] | None:
    number = line.sides.index(gap)
    before, after = line.sides[number - 1].panel, line.sides[(number + 1) % len(line.sides)].panel
    return None if before is None or after is None else (before, after)


def _is_in(opening: Opening, along: float, height: float) -> bool:
    start, end, low, high = opening.box_mm()
    return start <= along <= end and low <= height <= high
