"""The nominal ray and glass of unknown index."""

from benchlay.layout import read_layout
from benchlay.placing import place

TEXT = """
bench: {size: [900, 600]}
sources:
  uv: {wavelength: 200, power: 1 mW, beam: {waist_radius: 0.4}, at: [100, 200], heading: 0}
elements:
  X: {%s, after: uv, distance: 300, diameter: 25.4}
  T: {kind: target, after: X, distance: 100}
"""


def placed(element):
    layout, problems = read_layout(TEXT % element, "u.yaml")
    return place(layout, problems), problems.sorted()


def test_a_reflection_asks_for_no_index_behind():
    state, problems = placed("kind: mirror, metal: gold, turn: left 90")
    assert problems == []
    assert state.states[0].elements["T"].pose.at[1] == 300.0


def test_refraction_does_and_the_mend_is_about_the_glass():
    _, (problem,) = placed("kind: window")
    assert "no known index at 200 nm" in problem.message
    assert "glass: {index: 1.5}" in problem.remedy
    _, problems = placed("kind: window, glass: {index: 1.5}")
    assert problems == []
