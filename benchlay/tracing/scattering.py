"""Diffuse light that routes go on with: straight rays without a power of their own.

What a face scatters is booked there. A route that goes on with it (to a camera, say) is
followed by one ray from where the light met the face towards the next item, so that places,
lengths and what stands in the way are known; it carries no power, and off the route nothing.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator

import numpy as np

from benchlay.optics.rays import bench_basis
from benchlay.placing.placed import Placed
from benchlay.scene.tables import Ints
from benchlay.tracing.front import OUTSIDE, SCATTERED, Front
from benchlay.tracing.hits import FACE
from benchlay.tracing.run_state import Leg, RunState
from benchlay.tracing.ways import Scattering


def follow_scattered(state: RunState, placed: Placed, step: Callable[[Front], Front]) -> None:
    """Add the legs of diffuse light on routes; `step` takes beams to their ends and beyond."""
    done = 0  # legs whose ends have been looked at
    beams = 0
    while done < len(state.legs):
        leg = state.legs[done]
        live = _scattered(leg, beams, state, placed)
        done, beams = done + 1, beams + len(leg.front)
        while live is not None and len(live):
            born = step(live)
            live = born.take((born.node >= 0).nonzero()[0])


def _scattered(leg: Leg, first: int, state: RunState, placed: Placed) -> Front | None:
    """Return the diffuse light of the ends of a batch, whose beams are numbered from `first`."""
    born = [
        _rays(leg, rows, first, scattering, placed)
        for scattering in state.ways.scatterings
        for rows in _where(leg, scattering, state)
    ]
    return Front.joined(born) if born else None


def _where(leg: Leg, scattering: Scattering, state: RunState) -> Iterator[Ints]:
    """Yield the beams that are scattered, variant by variant."""
    f = state.scene.faces
    rows = (leg.front.node == scattering.node) & (leg.hits.kind == FACE)
    rows &= f.owner[np.where(rows, leg.hits.row, 0)] == scattering.owner
    found = rows.nonzero()[0]
    for variant in sorted(set(leg.front.variant[found].tolist())):
        yield found[leg.front.variant[found] == variant]


def _rays(leg: Leg, rows: Ints, first: int, scattering: Scattering, placed: Placed) -> Front:
    front = leg.front.take(rows)
    start = leg.place[rows]
    variant = int(front.variant[0])
    aim = np.array(placed.states[variant].elements[scattering.to].pose.at)
    away = aim - start
    direction = away / np.sqrt(np.einsum("ij,ij->i", away, away))[:, None]
    length = leg.hits.distance[rows]
    return front.changed(
        parent=rows + first,
        node=scattering.end,
        event=SCATTERED,
        face=leg.hits.row[rows],
        body=-1,
        owner=scattering.owner,
        within=OUTSIDE,
        lump=0,
        kept=1.0,
        optical_path=front.optical_path + front.index * length,
        position=start,
        direction=direction,
        axis=bench_basis(direction)[0],
        coherency=0.0,
    )
