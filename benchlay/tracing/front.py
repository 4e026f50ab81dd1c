"""The live beams of one generation, as arrays: one row a quantity, last axis the beams."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from benchlay.scene.tables import Flags, Floats, Ints

OUTSIDE = -1
EXIT = -1  # the "face" that a source's beam leaves

EVENTS = ("emitted", "reflected", "transmitted", "diffracted", "converted", "scattered", "spilled")
EMITTED, REFLECTED, TRANSMITTED, DIFFRACTED, CONVERTED, SCATTERED, SPILLED = range(7)


class Front(NamedTuple):
    """N beams where they start; `owner` numbers elements, then sources."""

    variant: Ints  # (N,)
    source: Ints  # (N,)
    wave: Ints  # (N,) number of the wavelength
    parent: Ints  # (N,) number of the parent beam, -1 for none
    node: Ints  # (N,) place in the tree of routes, -1 for strays
    splits: Ints  # (N,)
    event: Ints  # (N,)
    face: Ints  # (N,) row of the face it left, -1 for an exit or a body
    body: Ints  # (N,) row of the solid it left, -1 for none
    owner: Ints  # (N,) of what it left
    within: Ints  # (N,) row of the optic it is inside of, or OUTSIDE
    index: Floats  # (N,) absolute index of the medium
    position: Floats  # (N, 3)
    direction: Floats  # (N, 3) unit
    axis: Floats  # (N, 3) first transverse axis e1; the second is direction x axis
    coherency: Floats  # (4, N)
    moments: Floats  # (10, N)
    kept: Floats  # (N,) share of the unclipped beam that is left
    optical_path: Floats  # (N,) mm from the source
    lump: Flags  # (N,) a spilled lump: not cut again

    @property
    def power(self) -> Floats:
        """Power of each beam, W."""
        power: Floats = self.coherency[0] + self.coherency[1]
        return power

    def take(self, index: Ints | Flags) -> Front:
        """Return some of the beams."""
        return Front(
            *(
                value[:, index] if name in ("coherency", "moments") else value[index]
                for name, value in zip(Front._fields, self, strict=True)
            )
        )


def join(fronts: list[Front]) -> Front:
    """Return several sets of beams as one."""
    if len(fronts) == 1:
        return fronts[0]
    return Front(
        *(
            np.concatenate(values, axis=1 if name in ("coherency", "moments") else 0)
            for name, values in zip(Front._fields, zip(*fronts, strict=True), strict=True)
        )
    )
