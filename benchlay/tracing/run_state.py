"""What grows while a trace runs: beams that are done, and where power landed."""

from __future__ import annotations

from typing import TYPE_CHECKING

import numpy as np

from benchlay.named import NamedTuple
from benchlay.scene.tables import Floats, Ints, Scene
from benchlay.tracing.front import Front
from benchlay.tracing.hits import Hits
from benchlay.tracing.ways import Ways

if TYPE_CHECKING:
    from benchlay.tracing.handing import Handing


class Leg(NamedTuple):
    """What one batch adds to the record of legs."""

    front: Front  # at the start
    hits: Hits
    place: Floats  # (B, 3) of the end, mm
    arrived: Floats  # (4, B) coherency at the end, before any cut
    kept: Floats  # (B,) after the cut
    core: Floats  # (B,) W


class RunState:
    """Collects legs and landings; `count` is the number of legs that are done.

    `handing` tells which beams end in openings, where any route does.
    """

    def __init__(self, scene: Scene, ways: Ways, floor_w: Floats) -> None:
        self.scene = scene
        self.ways = ways
        self.floor_w = floor_w  # (L,)
        self.legs: list[Leg] = []
        self.landings: list[tuple[Ints, Ints, Ints, Floats]] = []
        self.count = 0
        self.acts_inside = bool(scene.bulks.kind.any())  # whether any optic does more than refract
        self.handing: Handing | None = None

    def book(self, beam: Ints, sink: Ints | int, name: Ints | int, power: Floats) -> None:
        """Book power where it lands; beams are numbered from the first of the batch in hand."""
        if len(beam):
            count = len(beam)
            sinks = np.full(count, sink) if isinstance(sink, int) else sink
            names = np.full(count, name) if isinstance(name, int) else name
            self.landings.append((beam + self.count, sinks, names, power))
