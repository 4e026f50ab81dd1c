"""A state that changes a source's wavelength leaves its beam on its route."""

from benchlay.document.problems import Problems
from benchlay.layout import read_layout
from benchlay.placing import place
from benchlay.tracing import trace

BENCH = """
bench: {size: [900, 600]}
sources:
  red: {wavelength: 633, power: 1 mW, beam: {waist_radius: 0.5}, at: [50, 300], heading: 0}
elements:
  M: {kind: mirror, after: red, distance: 200, turn: left 90, diameter: 25.4, metal: silver}
  T: {kind: target, after: M, distance: 200}
routes: {work: [red, M, T]}
states: {green: {sources.red.wavelength: 532}}
"""


def test_a_working_beam_stays_one_at_another_wavelength():
    layouts, problems = read_layout(BENCH, "light.yaml")
    assert not problems
    placed = place(layouts, Problems())
    found = trace(placed, {532.0: 1e-9, 633.0: 1e-9})
    start = found.beams.start
    working = start.node >= 0
    for variant, nm in ((0, 633.0), (1, 532.0)):
        legs = working & (start.variant == variant)
        assert legs.sum() == 2
        assert set(found.scene.wavelengths_nm[start.wave[legs]]) == {nm}
