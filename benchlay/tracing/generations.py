"""Traces in batches: all live beams of a kind meet what they meet together.

A batch has a high price and a beam in it a low one, so beams are sorted by what they need:
those inside glass (cheap) go first, then those outside, and those whose cross-sections must
be divided wait until no others are left.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from benchlay.optics import moments
from benchlay.scene.tables import SINK, Flags, Floats, Ints, Scene
from benchlay.tracing.beams import Beams, Ledger, gathered
from benchlay.tracing.bulk import passage
from benchlay.tracing.children import children
from benchlay.tracing.coverage import covered, face_covers, near, radius_of, reach_of
from benchlay.tracing.front import OUTSIDE, Front, join
from benchlay.tracing.hits import FACE, NOTHING, Hits, inside_hits, nearest
from benchlay.tracing.run_state import RunState
from benchlay.tracing.section import Cut, cut, uncut
from benchlay.tracing.ways import Ways

MOST_BATCHES = 12_000
MOST_BEAMS = 400_000


class Traced(NamedTuple):
    """Beams, ledger, and how the trace ended."""

    beams: Beams
    ledger: Ledger
    bounded: Flags  # (V,) variants in which a bound on batches or beams was met


class _Ready(NamedTuple):
    """Beams with what they meet, not yet advanced."""

    front: Front
    hits: Hits
    moments: Floats  # (10, N) at the end of the leg
    reach: Floats  # (N,) in w

    def take(self, rows: Ints) -> _Ready:
        """Return some of them."""
        return _Ready(
            self.front.take(rows), self.hits.take(rows), self.moments[:, rows], self.reach[rows]
        )


def run(front: Front, scene: Scene, ways: Ways, floor_w: Floats) -> Traced:
    """Trace beams until all power has landed or lies under the floor.

    Parameters
    ----------
    front : Front
        The beams that sources send out.
    scene : Scene
        What they may meet.
    ways : Ways
        What they are meant to do.
    floor_w : (L,) ndarray of float64
        Power below which a beam is booked and not followed, W, by wavelength.
    """
    state = RunState(scene, ways, floor_w)
    queue = _Queue(front)
    for _ in range(MOST_BATCHES):
        if queue.empty or state.count > MOST_BEAMS:
            break
        if queue.inside:
            ready, wanted = _meet_inside(join(queue.take_inside()), state)
        elif queue.outside:
            ready, wanted = _meet_outside(join(queue.take_outside()), state)
        else:
            queue.add(_advance(_joined(queue.take_waiting()), state, cutting=True))
            continue
        if wanted.any():
            queue.waiting.append(ready.take(np.flatnonzero(wanted)))
            ready = ready.take(np.flatnonzero(~wanted))
        if len(ready.reach):
            queue.add(_advance(ready, state, cutting=False))
    bounded = np.zeros(len(scene.variants), dtype=np.bool_)
    for rest in queue.rest():
        bounded[rest.variant] = True
        # The leg they would have been is not there: they are booked with their parents.
        state.book(rest.parent - state.count, SINK["below-floor"], -1, rest.power)
    return Traced(*_finished(state), bounded)


class _Queue:
    """Live beams by what they need."""

    def __init__(self, front: Front) -> None:
        self.inside: list[Front] = []
        self.outside: list[Front] = [front] if len(front) else []
        self.waiting: list[_Ready] = []

    @property
    def empty(self) -> bool:
        return not (self.inside or self.outside or self.waiting)

    def add(self, front: Front) -> None:
        inside = front.within != OUTSIDE
        count = int(inside.sum())
        if count == len(front):
            self.inside += [front] if count else []
            return
        if count:
            self.inside.append(front.take(inside))
        self.outside.append(front.take(~inside) if count else front)

    def take_inside(self) -> list[Front]:
        taken, self.inside = self.inside, []
        return taken

    def take_outside(self) -> list[Front]:
        taken, self.outside = self.outside, []
        return taken

    def take_waiting(self) -> list[_Ready]:
        taken, self.waiting = self.waiting, []
        return taken

    def rest(self) -> list[Front]:
        return [*self.inside, *self.outside, *(ready.front for ready in self.waiting)]


def _joined(parts: list[_Ready]) -> _Ready:
    return _Ready(
        join([part.front for part in parts]),
        Hits(
            *(np.concatenate(values) for values in zip(*(part.hits for part in parts), strict=True))
        ),
        np.concatenate([part.moments for part in parts], axis=1),
        np.concatenate([part.reach for part in parts]),
    )


def _meet_inside(front: Front, state: RunState) -> tuple[_Ready, Flags]:
    """Find the faces that beams inside glass meet, and which beams these do not cover.

    A beam that meets no face of its optic within the outline ends on the barrel; how far
    away does not matter, since nothing goes on from there.
    """
    hits = inside_hits(front, state.scene)
    end = moments.propagate(front.moments, hits.distance, front.index)
    reach = reach_of(front, state.floor_w)
    whole = (hits.kind == NOTHING) | face_covers(state.scene, hits, reach * radius_of(end))
    return _Ready(front, hits, end, reach), ~whole & ~front.lump


def _meet_outside(front: Front, state: RunState) -> tuple[_Ready, Flags]:
    """Find what beams outside glass meet, and which of them something may cut."""
    scene = state.scene
    hits, faces, solids = nearest(front, scene)
    end = moments.propagate(front.moments, hits.distance, front.index)
    reach = reach_of(front, state.floor_w)
    stop = radius_of(end)
    widest = reach * np.maximum(radius_of(front.moments), stop)
    wanted = ~covered(scene, hits, solids, front, reach * stop)
    wanted |= near(front, scene, hits, faces, solids, widest)
    return _Ready(front, hits, end, reach), wanted & ~front.lump


def _advance(ready: _Ready, state: RunState, *, cutting: bool) -> Front:
    """Take beams to the end of their legs and return what leaves there."""
    front, hits, scene = ready.front, ready.hits, state.scene
    arrived = _after_passage(front, hits.distance, state)
    power = arrived.power
    if cutting:
        divided = cut(arrived, scene, hits, ready.reach)
        landed = divided.landings
        state.book(landed.beam, landed.sink, landed.name, landed.power)
        left = np.divide(divided.core, power, out=np.zeros_like(power), where=power > 0.0)
        coherent = arrived.coherency * left
    else:
        divided, coherent = uncut(power, front.kept), arrived.coherency
    core = arrived.changed(
        position=front.position + hits.distance[:, None] * front.direction,
        moments=ready.moments,
        kept=divided.kept,
        optical_path=front.optical_path + front.index * hits.distance,
        coherency=coherent,
        parent=np.arange(len(power)) + state.count,
    )
    _record(front, arrived, core, hits, divided, state)
    born = children(core, hits, divided.spills, state)
    state.count += len(power)
    return born


def _after_passage(front: Front, length: Floats, state: RunState) -> Front:
    """Return beams after what their optic does to them inside, booking what it absorbs."""
    scene = state.scene
    rows = np.flatnonzero(front.within != OUTSIDE)
    if not len(rows) or not scene.bulks.kind[front.within[rows]].any():
        return front
    j, lost = passage(front.take(rows), scene, length[rows])
    state.book(rows, SINK["absorbed"], scene.face_owner_name[front.face[rows]], lost)
    whole = front.coherency.copy()
    whole[:, rows] = j
    return front.changed(coherency=whole)


def _record(
    front: Front, arrived: Front, core: Front, hits: Hits, divided: Cut, state: RunState
) -> None:
    on_face = hits.kind == FACE
    row = np.where(on_face, hits.row, 0)
    table = state.scene.faces.unstated
    unstated = on_face & table[row, front.wave] if len(table) else on_face
    state.fronts.append(front)
    state.ends.append(
        (
            hits.kind,
            hits.row,
            core.position,
            hits.distance,
            arrived.coherency,
            core.moments,
            divided.kept,
            divided.core,
            np.where(on_face, hits.left, np.nan),
            np.where(on_face, hits.up, np.nan),
            np.where(on_face, np.abs(hits.slope), np.nan),
            unstated,
        )
    )


def _finished(state: RunState) -> tuple[Beams, Ledger]:
    start = join(state.fronts)
    ends = gathered(state.ends, last_axis=(4, 5))
    none = np.zeros(0, dtype=np.int64)
    ledger = gathered(state.landings) if state.landings else [none, none, none, np.zeros(0)]
    return Beams(start, *ends), Ledger(*ledger)
