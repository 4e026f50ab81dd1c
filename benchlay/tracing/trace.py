"""The trace of a placed layout: every state in one batch."""

from __future__ import annotations

from collections.abc import Mapping

import numpy as np

from benchlay.named import NamedTuple
from benchlay.placing.placed import Placed
from benchlay.scene.compile import compile_scene
from benchlay.scene.tables import Flags, Floats, Ints, Scene
from benchlay.tracing.beams import Beams, Ledger
from benchlay.tracing.emission import emitted
from benchlay.tracing.front import EMITTED, SCATTERED
from benchlay.tracing.generations import run
from benchlay.tracing.ways import Ways, ways_of


class Trace(NamedTuple):
    """All beams of all states, and where all power landed.

    `accessible_w` is the accessible limit by variant and wavelength, `floor_w` the power
    under which beams were not followed.
    """

    placed: Placed
    scene: Scene
    ways: Ways
    beams: Beams
    ledger: Ledger
    floor_w: Floats  # (L,)
    bounded: Flags  # (V,)

    def of_variant(self, variant: int) -> Ints:
        """Return the beams of a variant, in order."""
        found: Ints = np.flatnonzero(self.beams.start.variant == variant)
        return found

    def landings_of(self, variant: int) -> Ints:
        """Return the rows of the ledger that belong to a variant."""
        rows: Ints = np.flatnonzero(self.beams.start.variant[self.ledger.beam] == variant)
        return rows

    def diffuse(self) -> Flags:
        """Tell which beams are scattered light on a route: they carry no power of their own."""
        event, parent = self.beams.start.event, self.beams.start.parent
        found: Flags = event == SCATTERED
        if not self.ways.scatterings:
            return found
        for beam in range(int(found.argmax()), len(found)):  # parents come first
            found[beam] |= bool(parent[beam] >= 0 and found[parent[beam]])
        return found

    def emitted_w(self, variant: int) -> Mapping[str, float]:
        """Return what each source emits in a variant, its rear leak included, W."""
        state = self.placed.states[variant]
        return {
            name: self._given_w(variant, name) if item.source.fed() else item.source.emitted_w()
            for name, item in state.sources.items()
            if not item.source.stand.out
        }

    def _given_w(self, variant: int, source: str) -> float:
        """Return what a source gave that other light feeds, W."""
        start = self.beams.start
        mine = (start.event == EMITTED) & (start.variant == variant)
        mine &= start.source == self.scene.sources.index(source)
        return float(start.power[mine].sum())


def trace(placed: Placed, floor_w: Mapping[float, float]) -> Trace:
    """Trace a placed layout in every state.

    Parameters
    ----------
    placed : Placed
        Poses of every state.
    floor_w : mapping of float to float
        By wavelength in nm, the power in W under which beams are booked and not followed.
    """
    scene = compile_scene(placed)
    ways = ways_of(placed, scene)
    floors = np.array([floor_w[nm] for nm in scene.wavelengths_nm.tolist()])
    traced = run(emitted(placed, scene, ways), scene, ways, floors, placed)
    return Trace(placed, scene, ways, traced.beams, traced.ledger, floors, traced.bounded)
