"""What each beam lost on its way, by the kind of what took it."""

from __future__ import annotations

import numpy as np

from benchlay.results.ends import OPTIC, Ends
from benchlay.scene.tables import SINK, SINKS, Floats, Ints
from benchlay.tracing import Trace
from benchlay.tracing.front import OUTSIDE

_ROUNDING = 1e-12  # of the beam's power: below it a difference of landings says nothing


def losses(trace: Trace, rows: Ints, ends: Ends) -> list[dict[str, float]]:
    """Return, for some beams (`rows`, ascending), the power lost before the end, W by sink.

    What landed on the way is what landed in all, without what landed at the end. The rim is
    always named; other sinks where they took something. Light swallowed inside an optic
    on the way is `absorbed`; light that another optic redirects is in beams of its own.
    """
    beams = trace.beams
    landed = _landed(trace, rows)
    beam = np.arange(len(rows))
    at_sink = ends.sink != OPTIC
    landed[beam[at_sink], ends.sink[at_sink]] -= ends.taken_w[at_sink]
    arriving = beams.end_coherency[0, rows] + beams.end_coherency[1, rows]
    start = beams.start.power[rows]
    landed[:, SINK["absorbed"]] = np.where(
        beams.start.within[rows] != OUTSIDE, start - arriving, 0.0
    )
    landed[:, SINK["below-floor"]] = 0.0
    landed[landed < _ROUNDING * start[:, None]] = 0.0
    rim = SINK["rim"]
    found: list[dict[str, float]] = [{SINKS[rim]: power} for power in landed[:, rim].tolist()]
    for number, sink in zip(*np.nonzero(landed), strict=True):
        found[number][SINKS[sink]] = float(landed[number, sink])
    return found


def _landed(trace: Trace, rows: Ints) -> Floats:
    """Return what landed of each beam in each sink (N, sinks)."""
    place = np.full(len(trace.beams.length), -1)
    place[rows] = np.arange(len(rows))
    at = place[trace.ledger.beam]
    mine = at >= 0
    code = at[mine] * len(SINKS) + trace.ledger.sink[mine]
    total = np.bincount(code, trace.ledger.power[mine], minlength=len(rows) * len(SINKS))
    return total.astype(np.float64).reshape(len(rows), len(SINKS))
