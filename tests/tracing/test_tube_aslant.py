"""A tube met at a grazing angle swallows what spills into its mouth."""

import numpy as np
import pytest

from tests.tracing.bench import Bench, layout


def test_what_spills_into_a_tube_aslant_ends_in_it():
    # The chief ray passes the plane of the mouth 18 from its middle, half a degree off that
    # plane; inside the tube its line would meet the other mouth's plane 34 m to the side.
    across = 18 / np.tan(np.radians(89.5))
    text = layout(
        "  B1: {kind: tube, at: [600, 300], to: [300, 300], bore: 20}\n",
        at=f"[{600 + across + 0.873:.3f}, {300 + 18 + 100}]",
        heading=269.5,
        beam="{waist_radius: 5}",
    )
    bench = Bench(text, floor=1e-6)
    spilled = [beam for beam in bench.beams() if beam.left.startswith("B1.")]
    assert spilled
    assert all(abs(beam.end[1]) < 2000 for beam in spilled if beam.index > 1.0)
    assert all(np.abs(beam.start).max() < 2000 for beam in bench.beams())
    assert bench.sink("body", "B1") > 0.0
    assert sum(bench.sinks().values()) == pytest.approx(1.0, rel=1e-9)
