"""How much of what surrounds a place is closed, gap by gap: the rows of a review."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from math import pi

from benchlay.coverage.angles import Directions, directions
from benchlay.coverage.blockers import Place
from benchlay.coverage.enclosed import Enclosed, enclosed_of
from benchlay.coverage.filled import filled_openings
from benchlay.coverage.gaps import Gap, gaps_of
from benchlay.coverage.places import standpoints
from benchlay.coverage.regions import open_parts
from benchlay.named import NamedTuple
from benchlay.tracing import Trace

OUTSIDE = "outside the enclosure"


class Seen(NamedTuple):
    """A gap (None outside of the enclosure) and the directions in which it is seen."""

    gap: Gap | None
    directions: Directions


class CoverageRow(NamedTuple):
    """A place and what is open round it; `covered` is a share of all directions."""

    place: str
    covered: float
    seen: tuple[Seen, ...]


def coverage_of(trace: Trace, variant: int) -> Iterator[CoverageRow]:
    """Yield the coverage of every place of a state; nothing for a layout without enclosure."""
    state = trace.placed.states[variant]
    enclosed = enclosed_of(
        state.layout, frozenset(filled_openings(state.layout, trace.scene, variant))
    )
    if enclosed is None:
        return
    gaps = gaps_of(enclosed)
    for place in standpoints(state):
        seen = _seen(enclosed, gaps, place.at)
        open_sr = sum(one.directions.solid_angle_sr for one in seen)
        yield CoverageRow(place.name, max(0.0, 1.0 - open_sr / (4.0 * pi)), tuple(seen))


def _seen(enclosed: Enclosed, gaps: Sequence[Gap], eye: Place) -> list[Seen]:
    if not enclosed.holds(eye):
        whole = Directions((-pi, pi), (-pi / 2, pi / 2), 4.0 * pi)
        return [Seen(None, whole)]
    return [
        Seen(gap, found)
        for gap in gaps
        for found in directions(eye, open_parts(enclosed, gap, eye))
    ]
