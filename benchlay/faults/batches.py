"""Traces variants of a bench in blocks, so that memory stays bounded however many there are.

A fault of one thing changes nothing for the light that has not come near it yet. So a variant is
not traced from the sources on, but from the hazardous legs of its own state that come near.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence

import numpy as np

from benchlay.checks import Context, limits_of
from benchlay.named import NamedTuple
from benchlay.placing.placed import Placed, PlacedState
from benchlay.scene.compile import compile_scene
from benchlay.scene.tables import Flags, Ints
from benchlay.tracing import Trace
from benchlay.tracing.emission import emitted
from benchlay.tracing.front import Front
from benchlay.tracing.generations import run
from benchlay.tracing.ways import ways_of

# Every variant adds rows of its own to the scene, all of which every beam of the block is held
# against: blocks much larger than the bench has rows take longer than several smaller ones.
BLOCK = 64
_SEED = -2  # parents of legs that are traced on: this less the number of the leg at rest


class Variant(NamedTuple):
    """A state with a fault, and the legs at rest from which it is traced; None: all emitted."""

    state: PlacedState
    seeds: Ints | None


def floors_of(placed: Placed, share: float | None = None) -> dict[float, float]:
    """Return by wavelength the power under which a fault's light is not followed, W.

    A share of the accessible limit (the layout's own by default), the lowest over the states.
    Light without a limit is followed to a millionth of the weakest line.
    """
    found: dict[float, float] = {}
    for (number, _, nm), line in limits_of(placed).items():
        if line.limit is not None:
            of = placed.states[number].layout.limits.floor if share is None else share
            floor = of * line.limit.accessible_w
            found[nm] = min(found.get(nm, floor), floor)
    lines = [
        line.power_w
        for state in placed.states
        for item in state.sources.values()
        for line in item.source.lines
        if line.power_w > 0.0
    ]
    least = 1e-6 * min(lines, default=1e-3)
    floors = {nm: found.get(nm, least) for nm in placed.wavelengths_nm}
    if makes_light(placed):  # light below its own limit may become light above a lower one
        return dict.fromkeys(floors, min(floors.values()))
    return floors


def makes_light(placed: Placed) -> bool:
    """Whether light of one wavelength becomes light of another anywhere."""
    return any(state.made_nm() for state in placed.states)


def seed_of(parent: int) -> int | None:
    """Return the leg at rest that a leg is the same as, by what stands as its parent."""
    return _SEED - parent if parent <= _SEED else None


class Tracer:
    """Traces variants of a bench whose own states are traced at rest."""

    def __init__(self, placed: Placed) -> None:
        self.placed = placed
        self._fine_w = floors_of(placed)
        self._coarse_w = floors_of(placed, 1.0)
        everything = np.ones(len(placed.states), dtype=np.bool_)
        rest = self._trace(placed, everything, None, self._fine_w)
        self.rest = Context(rest, limits_of(placed))

    def contexts(
        self, variants: Sequence[Variant], *, coarse: bool = False
    ) -> Iterator[tuple[range, Context]]:
        """Trace variants block by block.

        Coarsely, light is followed down to the accessible limit itself: no beam beneath it is
        a hazard, nor can one become one, and what a body takes of a beam is left in it where it
        is less than that. So no hazard is lost, and a power may come out too high by a limit.

        Every block's scene begins with the layout's own states, though nothing emits in
        them: so all blocks know the same light, and rows of what is at rest are the same.

        Yields
        ------
        range
            Which of the variants the block holds.
        Context
            Their trace: the layout's own states first, the variants after them.
        """
        own = self.placed.states
        for first in range(0, len(variants), BLOCK):
            which = range(first, min(first + BLOCK, len(variants)))
            states = (*own, *(variants[i].state for i in which))
            block = self.placed._replace(states=states)
            whole = np.zeros(len(states), dtype=np.bool_)
            whole[len(own) :] = [variants[i].seeds is None for i in which]
            seeds = [(len(own) + i - first, variants[i].seeds) for i in which]
            floors_w = self._coarse_w if coarse else self._fine_w
            trace = self._trace(block, whole, self._seeded(seeds), floors_w)
            yield which, Context(trace, limits_of(block))

    def _seeded(self, seeds: Sequence[tuple[int, Ints | None]]) -> Front | None:
        """Return the legs at rest that variants (by number) are traced from."""
        known = [(variant, rows) for variant, rows in seeds if rows is not None]
        if not known:
            return None
        rows = np.concatenate([rows for _, rows in known])
        variant = np.concatenate([np.full(len(rows), number) for number, rows in known])
        return self.rest.trace.beams.start.take(rows).changed(variant=variant, parent=_SEED - rows)

    def _trace(
        self,
        placed: Placed,
        whole: Flags,
        seeds: Front | None,
        floors_w: Mapping[float, float],
    ) -> Trace:
        scene = compile_scene(placed)
        ways = ways_of(placed, scene)
        parts = [] if seeds is None else [seeds]
        if whole.any():
            sent = emitted(placed, scene, ways)
            parts.append(sent.take(whole[sent.variant]))
        front = Front.joined(parts) if parts else Front.made(0)
        floors = np.array([floors_w[nm] for nm in scene.wavelengths_nm.tolist()])
        traced = run(front, scene, ways, floors, placed)
        return Trace(placed, scene, ways, traced.beams, traced.ledger, floors, traced.bounded)


def whole_benches(placed: Placed) -> bool:
    """Whether light of one place makes other light elsewhere, so that no leg stands alone."""
    return any(
        item.source.fed() is not None for state in placed.states for item in state.sources.values()
    )


__all__ = ["BLOCK", "Tracer", "Variant", "floors_of", "seed_of", "whole_benches"]
