"""Where light can be sent astray: every source, optic and target that stands on the bench."""

from __future__ import annotations

import numpy as np

from benchlay.coverage.blockers import Place, stopped
from benchlay.coverage.enclosed import Enclosed
from benchlay.coverage.gaps import Gap
from benchlay.named import NamedTuple
from benchlay.placing.placed import PlacedState
from benchlay.scene.tables import Floats
from benchlay.tracing import Trace
from benchlay.tracing.beams import FACE
from benchlay.tracing.front import EMITTED, OUTSIDE


class Standpoint(NamedTuple):
    """A source or element, and its reference point."""

    name: str
    at: Place


class Astray(NamedTuple):
    """A place with the strongest hazardous beam that arrives there, or starts."""

    name: str
    at: Place
    beam: int
    power_w: float


def standpoints(state: PlacedState) -> list[Standpoint]:
    """Return the places of a state by name.

    Screens, dumps, tubes and obstacles are none: they are there to end light.
    """
    found = [
        Standpoint(name, item.pose.at)
        for name, item in state.sources.items()
        if not item.source.stand.out
    ]
    found += [
        Standpoint(name, item.pose.at)
        for name, item in state.elements.items()
        if not item.out and item.element.record.DARK_MATTERS
    ]
    return sorted(found)


class Strongest(NamedTuple):
    """The strongest beam at a place, W."""

    power_w: float
    beam: int


def strongest(trace: Trace, variant: int, above_w: Floats | None = None) -> dict[str, Strongest]:
    """Return by source and element the strongest beam that starts or arrives there in a state.

    Only beams outside optics count, and of these those above a power (N,), where it is given.
    """
    beams, scene = trace.beams, trace.scene
    rows = np.flatnonzero((beams.start.variant == variant) & (beams.start.within == OUTSIDE))
    arriving = beams.end_coherency[0] + beams.end_coherency[1]
    met = rows[beams.end_kind[rows] == FACE]
    made = rows[beams.start.event[rows] == EMITTED]
    lists = (
        (met, arriving[met], scene.faces.owner[beams.end_row[met]], scene.elements),
        (made, beams.start.power[made], beams.start.source[made], scene.sources),
    )
    found: dict[str, Strongest] = {}
    for beam, power, owner, names in lists:
        with np.errstate(invalid="ignore"):
            kept = np.ones(len(beam), dtype=np.bool_) if above_w is None else power > above_w[beam]
        columns = (column[kept].tolist() for column in (beam, power, owner))
        for b, p, o in zip(*columns, strict=True):
            if names[o] not in found or p > found[names[o]].power_w:
                found[names[o]] = Strongest(p, b)
    return found


def sees(enclosed: Enclosed, gap: Gap, eye: Place) -> bool:
    """Whether light from a place may leave through a gap.

    One ray through the gap's middle mostly answers it; only where something stands in its way
    are the shadows thrown.
    """
    if not enclosed.holds(eye):
        return False
    if not stopped(eye, gap.at, enclosed.blockers):
        return True
    from benchlay.coverage.regions import open_parts

    return bool(open_parts(enclosed, gap, eye))
