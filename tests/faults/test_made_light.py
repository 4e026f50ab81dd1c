"""Light below its own limit that becomes light above a lower one is followed."""

import pytest

from benchlay.faults import review_faults
from benchlay.pipeline import place, read

TEXT = """\
bench: {size: [1000, 600]}
sources:
  ir: {wavelength: 1064, power: 1.8 mW, beam: {waist_radius: 0.3}, at: [100, 300], heading: 0}
elements:
  M1: {kind: mirror, after: ir, distance: 200, turn: left 90, diameter: 25.4, metal: gold}
  SHG:
    kind: converter
    after: M1
    distance: 100
    size: [10, 10]
    length: 10
    glass: {index: 1.8}
    produces: [{wavelength: 532, share: 50 %}]
    front: 0 %
    back: 0 %
  D1: {kind: dump, after: SHG, distance: 300, opening: 8}
routes:
  main: [ir, M1, SHG, D1]
"""


def test_a_mirror_before_the_crystal_sends_made_light_past_its_dump(named):
    fault = named(review_faults(place(read("bench.yaml", TEXT))), "M1", "yaw")
    # The pump stays below its own limit all the way; a little off it still meets the crystal, and
    # what it makes there lands beside the opening of the dump.
    assert (fault.outcome, fault.worst.wavelength_nm) == ("stray", 532.0)
    assert fault.worst.through == "D1"
    assert fault.worst.power_w == pytest.approx(0.9e-3, rel=0.05)
