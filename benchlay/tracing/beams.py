"""All beams of a trace, and where all power landed, as arrays.

N beams in the order of their making (a parent before its children), K landings.
"""

from __future__ import annotations

import numpy as np

from benchlay.named import NamedTuple
from benchlay.scene.tables import Flags, Floats, Ints
from benchlay.tracing.front import Front
from benchlay.tracing.hits import FACE, HANDED, NOTHING, SOLID

__all__ = ["FACE", "HANDED", "NOTHING", "SOLID", "Beams", "Ledger"]


class Beams(NamedTuple):
    """Every leg that was traced.

    Coherency and moments are given in the basis (axis, direction x axis) of each beam, at
    its start and at its end (there before the face or body acts, after what happens inside
    an optic on the way and after the cut by what stands beside).
    """

    start: Front  # everything at the start
    end_kind: Ints  # (N,) NOTHING, FACE, SOLID or HANDED
    end_row: Ints  # (N,) row of the face, solid or opening met
    end: Floats  # (N, 3) mm
    length: Floats  # (N,) mm
    end_coherency: Floats  # (4, N) of what arrives, before any cut
    end_moments: Floats  # (10, N)
    end_kept: Floats  # (N,) share of the unclipped beam left after the cut
    end_core: Floats  # (N,) W that reach what the chief ray meets, after the cut
    off_left: Floats  # (N,) mm: where on the face it was met, from the middle of the outline
    off_up: Floats  # (N,)
    cosine: Floats  # (N,) of incidence on a face; NaN elsewhere
    unstated: Flags  # (N,) met a coating that says nothing of this wavelength


class Ledger(NamedTuple):
    """Where power landed: one row a beam and place; every row was added up by itself."""

    beam: Ints  # (K,)
    sink: Ints  # (K,) number in SINKS
    name: Ints  # (K,) number in Scene.names, -1 for none
    power: Floats  # (K,) W


def gathered(
    parts: list[tuple[Ints, Ints, Ints, Floats]],
) -> list[np.ndarray]:
    """Return columns of several batches as one."""
    return [np.concatenate(values) for values in zip(*parts, strict=True)]
