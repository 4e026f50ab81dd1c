"""The far ends of fibres: sources whose power is a share of what lands on a target."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from benchlay.layout.sources import FedBy
from benchlay.placing.placed import Placed, PlacedSource
from benchlay.scene.tables import SINK
from benchlay.tracing.emission import Beam, front_of
from benchlay.tracing.front import Front
from benchlay.tracing.run_state import RunState


class Feeding:
    """Knows what fed sources have given so far; more light may land later, also of theirs."""

    def __init__(self, state: RunState, placed: Placed) -> None:
        self._state, self._placed = state, placed
        self._given: dict[tuple[int, int, int], float] = {}

    def next(self) -> Front | None:
        """Return what fed sources have yet to give; None where that is below the floor."""
        found: list[Beam] = []
        for variant, number, item, fed in self._fed():
            for line in item.source.lines:
                wave = self._state.scene.wavelengths_nm.tolist().index(line.wavelength_nm)
                key = (variant, number, wave)
                due = fed.share * self._landed(variant, wave, fed.target.name)
                more = due - self._given.get(key, 0.0)
                if more >= self._state.floor_w[wave]:
                    self._given[key] = due
                    found.append(Beam(variant, number, wave, item, more))
        return front_of(found, self._state.scene, self._state.ways) if found else None

    def _fed(self) -> Iterator[tuple[int, int, PlacedSource, FedBy]]:
        for variant, state in enumerate(self._placed.states):
            for number, name in enumerate(self._state.scene.sources):
                item = state.sources[name]
                fed = item.source.fed()
                if fed is not None and not item.source.stand.out:
                    yield variant, number, item, fed

    def _landed(self, variant: int, wave: int, target: str) -> float:
        """Return what of a wavelength landed on a target in a variant, W."""
        names = self._state.scene.names
        if target not in names or not self._state.landings:
            return 0.0
        fronts = [leg.front for leg in self._state.legs]
        variants = np.concatenate([front.variant for front in fronts])
        waves = np.concatenate([front.wave for front in fronts])
        beam, sink, name, power = (
            np.concatenate(column) for column in zip(*self._state.landings, strict=True)
        )
        there = (sink == SINK["target"]) & (name == names.index(target))
        there &= (variants[beam] == variant) & (waves[beam] == wave)
        return float(power[there].sum())
