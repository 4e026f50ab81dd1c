"""Small benches, traced."""

import pytest

from benchlay import pipeline


@pytest.fixture(scope="session")
def traced():
    """Trace a layout given as text."""

    def trace(text):
        return pipeline.trace(pipeline.place(pipeline.read("x.yaml", text)))

    return trace


CORNER = """
bench: {size: [900, 600], beam_height: 100, medium: vacuum}
sources:
  red:
    wavelength: 633
    power: 8 mW
    beam: {waist_radius: 0.5}
    polarization: {angle: 30}
    at: [100, 100]
    heading: 0
elements:
  M1: {kind: mirror, after: red, distance: 300, turn: left 90, diameter: 25.4, reflectance: 90 %,
       absorbs: 4 %}
  T1: {kind: target, after: M1, distance: 200}
routes:
  work: [red, M1, T1]
states:
  low: {sources.red.power: 1 mW}
  away: {elements.M1.out: yes}
"""


@pytest.fixture(scope="session")
def corner(traced):
    return traced(CORNER)
