"""The live beams of one batch where they start."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from benchlay.scene.tables import Floats
from benchlay.tracing.packed import FlagColumn, FloatColumn, IntColumn, Packed, VectorColumn

OUTSIDE = -1
EXIT = -1  # the "face" that a source's beam leaves

EVENTS = ("emitted", "reflected", "transmitted", "diffracted", "converted", "scattered", "spilled")
EMITTED, REFLECTED, TRANSMITTED, DIFFRACTED, CONVERTED, SCATTERED, SPILLED = range(7)

_INTS, _FLOATS = 12, 26


class Front(Packed):
    """N beams where they start."""

    __slots__ = ()

    variant = IntColumn(0)  # number of the state
    source = IntColumn(1)  # number of the source
    wave = IntColumn(2)  # number of the wavelength
    parent = IntColumn(3)  # number of the beam it came from, -1 for none
    node = IntColumn(4)  # place in the tree of routes, -1 for strays
    splits = IntColumn(5)  # unintended splittings since the source
    event = IntColumn(6)  # what made it, a number in `EVENTS`
    face = IntColumn(7)  # row of the face that it left, -1 for none
    body = IntColumn(8)  # row of the solid that it left, -1 for none
    owner = IntColumn(9)  # what it left: elements, then sources, then one number for all else
    within = IntColumn(10)  # row of the optic that it is inside of, or `OUTSIDE`
    lump = FlagColumn(11)  # whether it is a spilled lump, which is not cut again
    index = FloatColumn(0)  # absolute index of the medium
    kept = FloatColumn(1)  # share of the unclipped beam that is left
    optical_path = FloatColumn(2)  # from the source, mm
    position = VectorColumn(3)  # where it starts, mm
    direction = VectorColumn(6)  # unit
    axis = VectorColumn(9)  # first transverse axis; the second is direction x axis
    coherency = FloatColumn(12, 4)  # W
    moments = FloatColumn(16, 10)  # mm and rad
    light = FloatColumn(12, 14)  # coherency above moments

    @staticmethod
    def made(count: int, **columns: ArrayLike) -> Front:
        """Return beams from their quantities; what is not named is 0."""
        front = Front(np.zeros((_INTS, count), dtype=np.int64), np.zeros((_FLOATS, count)))
        front.set(**columns)
        return front

    def changed(self, **columns: ArrayLike) -> Front:
        """Return beams with some quantities changed."""
        front = Front(self.ints.copy(), self.floats.copy())
        front.set(**columns)
        return front

    def twice(self) -> Front:
        """Return all beams, and all of them again."""
        return Front.joined([self, self])

    @property
    def power(self) -> Floats:
        """Power of each beam, W."""
        power: Floats = self.floats[12] + self.floats[13]
        return power
