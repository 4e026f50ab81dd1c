"""Faraday rotators."""

from math import radians

import pytest

from benchlay.elements._kind import Glass


def test_defaults(make):
    made = make("kind: rotator, diameter: 20")
    assert (made.angle_rad, made.thickness_mm, made.glass) == (radians(45), 0.0, Glass("BK7", None))


@pytest.mark.parametrize("angle", [45.0, -30.0, 200.0])
def test_the_inside_turns_by_its_angle(make, angle):
    geometry = make(f"kind: rotator, diameter: 20, angle: {angle}, thickness: 8").geometry()
    assert (geometry.bulk.kind, geometry.bulk.turns_rad) == ("rotator", radians(angle))
    assert [face.origin[0] for face in geometry.faces] == [0.0, -8.0]


def test_asks_for_a_size(complaints):
    ((message, _, _),) = complaints("kind: rotator, angle: 45")
    assert message == "no size is given"
