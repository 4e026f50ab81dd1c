"""Placing a layout that is given by its table of elements, in vacuum."""

import numpy as np
import pytest

from benchlay.document.problems import Problems
from benchlay.layout import read_layout
from benchlay.placing import place

HEAD = (
    "bench: {{size: [1500, 900], medium: vacuum, holes: {{pitch: 25, first: [25, 25]}}}}\n"
    "sources:\n"
    "  laser: {{wavelength: 633, power: 1 W, beam: {{waist_radius: 0.5}}, at: [100, 450],"
    " heading: {heading}, body: none{source}}}\n"
    "elements:\n"
)


class Standing:
    """A placed layout: poses and nominal rays as arrays."""

    def __init__(self, placed):
        self.placed = placed
        self.states = {state.name: state for state in placed.states}

    def at(self, name, state="as drawn"):
        """Return the reference point."""
        return np.array(self.states[state].elements[name].pose.at)

    def axes(self, name, state="as drawn"):
        """Return front normal, left and up, row by row."""
        return np.array(self.states[state].elements[name].pose.axes())

    def facing(self, name, state="as drawn"):
        """Return heading and pitch of the front normal in degrees, heading in [0, 360)."""
        x, y, z = self.axes(name, state)[0]
        heading = np.degrees(np.arctan2(y, x)) % 360
        return (0.0 if heading > 360 - 1e-9 else heading, np.degrees(np.arcsin(z)))

    def ray(self, name):
        """Return point and direction of the nominal ray that arrives."""
        ray = self.placed.arrivals[name]
        return np.array(ray.point), np.array(ray.direction)


def _placed(text):
    source, problems = read_layout(text, "b.yaml")
    if source is None:
        return None, problems
    problems = Problems()
    return place(source, problems), problems


@pytest.fixture
def standing():
    """Place elements; nothing may be wrong."""

    def build(elements, *, heading=0, source="", whole=False):
        text = elements if whole else HEAD.format(heading=heading, source=source) + elements
        placed, problems = _placed(text)
        assert placed is not None, [str(p) for p in problems.sorted()]
        return Standing(placed)

    return build


@pytest.fixture
def complaints():
    """Place elements; return what is wrong, as text."""

    def build(elements, *, heading=0, source="", whole=False):
        text = elements if whole else HEAD.format(heading=heading, source=source) + elements
        placed, problems = _placed(text)
        assert placed is None
        return [str(p) for p in problems.sorted()]

    return build
