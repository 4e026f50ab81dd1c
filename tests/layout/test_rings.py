"""Rings of places are told together with every other mistake in the file."""

import pytest

from benchlay.layout import read_layout

HEAD = """
bench: {size: [1000, 600]}
sources:
  red: {wavelength: 633, power: 1 mW, beam: {waist_radius: 0.5}, at: [50, 300], heading: 0}
elements:
"""
M = "kind: mirror, diameter: 25.4, reflectance: 99 %"


def problems(elements):
    return read_layout(HEAD + elements, "ring.yaml")[1].sorted()


def test_ring_and_unknown_key_are_reported_together():
    found = problems(
        f"  A: {{{M}, after: B, distance: 100, turn: left 90}}\n"
        f"  B: {{{M}, after: A, distance: 100, turn: left 90}}\n"
        f"  C: {{{M}, at: [1, 2], facing: 0, colour: red}}\n"
    )
    assert [problem.span.line for problem in found] == [6, 8]
    assert found[0].message == "these places hang on one another: A → B → A"
    assert "'A'" in found[0].remedy


@pytest.mark.parametrize(
    "elements",
    [
        # aims at what has a place of its own, though that one hangs on the mirror
        f"  A: {{{M}, after: red, distance: 100, aim: B}}\n"
        f"  B: {{{M}, after: A, at: [200, 500], turn: left 90}}\n",
        # a ring of mirrors that stand and face by themselves
        f"  A: {{{M}, after: B, at: [300, 300], facing: 135}}\n"
        f"  B: {{{M}, after: A, at: [300, 500], facing: 270}}\n",
    ],
)
def test_places_that_can_be_solved_are_no_ring(elements):
    assert problems(elements) == []
