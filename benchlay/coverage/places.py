"""Where light can be sent astray: every source, optic and target that stands on the bench."""

from __future__ import annotations

from benchlay.coverage.blockers import Place, stopped
from benchlay.coverage.enclosed import Enclosed
from benchlay.coverage.gaps import Gap
from benchlay.named import NamedTuple
from benchlay.placing.placed import PlacedState


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
