"""Traces in batches: all live beams meet what they meet together.

A batch has a high price and a beam in it a low one, so all that live are advanced together,
inside glass or outside, and those whose cross-sections must be divided wait until few others
are left.
"""

from __future__ import annotations

import numpy as np

from benchlay.named import NamedTuple
from benchlay.optics import moments
from benchlay.placing.placed import Placed
from benchlay.scene.tables import SINK, Flags, Floats, Ints, Scene
from benchlay.tracing.beams import Beams, Ledger, gathered
from benchlay.tracing.children import children
from benchlay.tracing.coverage import (
    covered,
    face_covers,
    near,
    radius_of,
    reach_of,
    unclipped_core,
)
from benchlay.tracing.feeding import Feeding
from benchlay.tracing.front import OUTSIDE, Front
from benchlay.tracing.handing import handing_of
from benchlay.tracing.hits import FACE, Hits, inside_hits, nearest
from benchlay.tracing.run_state import Leg, RunState
from benchlay.tracing.section import cut_after, uncut
from benchlay.tracing.ways import Ways

MOST_BATCHES = 3000  # light between two mirrors of 99.5 % is down to a millionth by then
MOST_BEAMS = 400_000
_MANY = 4  # beams wait to be cut until there are this many for each that goes on
_NO_LENGTH_MM = 1e-6


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
            self.front.take(rows),
            self.hits.take(rows),
            self.moments.take(rows, 1),
            self.reach.take(rows),
        )


def run(front: Front, scene: Scene, ways: Ways, floor_w: Floats, placed: Placed) -> Traced:
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
    placed : Placed
        Says where items stand that scattered light goes on to, and what feeds sources.
    """
    state = RunState(scene, ways, floor_w)
    state.handing = handing_of(ways, scene, placed)
    feeding = Feeding(state, placed)
    bounded = np.zeros(len(scene.variants), dtype=np.bool_)
    live: Front | None = front
    while live is not None:
        for rest in _exhaust(live, state):
            bounded[rest.variant] = True
            # The leg they would have been is not there: they are booked with their parents.
            state.book(rest.parent - state.count, SINK["below-floor"], -1, rest.power)
        live = None if bounded.any() else feeding.next()
    if ways.scatterings:
        from benchlay.tracing.scattering import follow_scattered

        follow_scattered(state, placed, lambda rays: _step(rays, state))
    traced = _finished(state) if state.legs else _dark(front)
    return Traced(*traced, bounded)


def _exhaust(live: Front, state: RunState) -> list[Front]:
    """Trace beams to their ends; return what is left where a bound was met."""
    waiting = list[_Ready]()
    for _ in range(MOST_BATCHES):
        if state.count > MOST_BEAMS or not (len(live) or waiting):
            break
        parts, whole = list[_Ready](), 0
        if len(live):
            ready, wanted = _meet(live, state)
            if np.count_nonzero(wanted):
                waiting.append(ready.take(wanted.nonzero()[0]))
                ready = ready.take((~wanted).nonzero()[0])
            parts, whole = [ready], len(ready.reach)
        if sum(len(ready.reach) for ready in waiting) > _MANY * whole:
            parts, waiting = parts + waiting, []
        live = _advance(_joined(parts), state, whole)
    return [live, *(ready.front for ready in waiting)]


def _step(front: Front, state: RunState) -> Front:
    """Take rays without power to what they meet, and return what goes on from there."""
    ready, _ = _meet(front, state)
    floor_w, state.floor_w = state.floor_w, np.zeros_like(state.floor_w)
    born = _advance(ready, state, len(ready.reach))
    state.floor_w = floor_w
    return born


def _joined(parts: list[_Ready]) -> _Ready:
    if len(parts) == 1:
        return parts[0]
    return _Ready(
        Front.joined([part.front for part in parts]),
        Hits.joined([part.hits for part in parts]),
        np.concatenate([part.moments for part in parts], axis=1),
        np.concatenate([part.reach for part in parts]),
    )


def _meet(front: Front, state: RunState) -> tuple[_Ready, Flags]:
    """Find what beams meet, and which of them must be cut; those inside glass come first.

    A beam inside glass that meets no face of its optic within the outline ends on the
    barrel; how far away does not matter, since nothing goes on from there.
    """
    scene = state.scene
    outside = front.within == OUTSIDE
    order = outside.argsort(kind="stable")
    first = len(order) - int(np.count_nonzero(outside))
    front = front.take(order) if first else front
    parts = []
    if first:
        parts.append(inside_hits(front.take(slice(0, first)), scene))
    if first < len(order):
        free = front.take(slice(first, None))
        hits, faces, passed, solids = nearest(free, scene)
        if state.handing is not None:
            state.handing.end(free, hits, scene)
        parts.append(hits)
    hits = Hits.joined(parts)
    end = moments.propagate(front.moments, hits.distance, front.index)
    reach = reach_of(front, state.floor_w)
    radius = radius_of(np.concatenate((front.moments[:3], end[:3]), axis=1))
    stop = radius[len(order) :]
    looked_at = np.minimum(reach, unclipped_core(front.kept))
    wanted = ~face_covers(scene, hits, looked_at * stop)
    wanted &= hits.kind == FACE
    # Between the faces of a thin optic, in one place, there is nothing that the first left.
    wanted[:first] &= hits.distance[:first] > _NO_LENGTH_MM
    if first < len(order):
        rest = slice(first, None)
        widest = looked_at[rest] * np.maximum(radius[first : len(order)], stop[rest])
        met = hits.take(rest)
        wanted[rest] |= ~covered(free, scene, met, solids, (looked_at * stop)[rest])
        wanted[rest] |= near(free, scene, met, faces, passed, radius=widest)
    return _Ready(front, hits, end, reach), wanted & ~front.lump


def _advance(ready: _Ready, state: RunState, whole: int) -> Front:
    """Take beams to the end of their legs and return what leaves there.

    All but the first so many are cut by what stands in their cross-sections.
    """
    front, hits, scene = ready.front, ready.hits, state.scene
    arrived, made = _after_passage(front, hits.distance, state)
    power = arrived.power
    if whole < len(power):
        divided = cut_after(whole, arrived, scene, hits, ready.reach)
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
    state.legs.append(
        Leg(front, hits, core.position, arrived.coherency, divided.kept, divided.core)
    )
    born = children(core, hits, divided.spills, state)
    state.count += len(power)
    return born if made is None else Front.joined([born, made])


def _after_passage(front: Front, length: Floats, state: RunState) -> tuple[Front, Front | None]:
    """Return beams after what their optic does to them inside, and light it makes of them.

    What it absorbs is booked.
    """
    if not state.acts_inside:
        return front, None
    scene = state.scene
    rows = np.flatnonzero(front.within != OUTSIDE)
    if not len(rows) or not scene.bulks.kind[front.within[rows]].any():
        return front, None
    from benchlay.tracing.bulk import passage

    inside, made = front.take(rows), None
    j, lost = passage(inside, scene, length[rows])
    if len(scene.conversions.volume):
        from benchlay.tracing.converting import converted

        kept, made = converted(inside, rows, length[rows], state)
        j = j * kept
    state.book(rows, SINK["absorbed"], scene.face_owner_name[front.face[rows]], lost)
    whole = front.coherency.copy()
    whole[:, rows] = j
    return front.changed(coherency=whole), made


def _dark(front: Front) -> tuple[Beams, Ledger]:
    """Return the trace of a bench on which nothing emits."""
    none, nothing = np.zeros(0, dtype=np.int64), np.zeros(0)
    no = np.zeros(0, dtype=np.bool_)
    points, figures = np.zeros((0, 3)), (np.zeros((4, 0)), np.zeros((10, 0)))
    beams = Beams(front, none, none, points, nothing, *figures, *(nothing,) * 5, no)
    return beams, Ledger(none, none, none, nothing)


def _finished(state: RunState) -> tuple[Beams, Ledger]:
    fronts, hits, places, coherencies, kept, cores = zip(*state.legs, strict=True)
    start, met = Front.joined(list(fronts)), Hits.joined(list(hits))
    on_face = met.kind == FACE
    row = np.where(on_face, met.row, 0)
    table = state.scene.faces.unstated
    beams = Beams(
        start,
        met.kind,
        met.row,
        np.concatenate(places),
        met.distance,
        np.concatenate(coherencies, axis=1),
        moments.propagate(start.moments, met.distance, start.index),
        np.concatenate(kept),
        np.concatenate(cores),
        np.where(on_face, met.left, np.nan),
        np.where(on_face, met.up, np.nan),
        np.where(on_face, np.abs(met.slope), np.nan),
        on_face & table[row, start.wave] if len(table) else on_face,
    )
    none = np.zeros(0, dtype=np.int64)
    ledger = gathered(state.landings) if state.landings else [none, none, none, np.zeros(0)]
    return beams, Ledger(*ledger)
