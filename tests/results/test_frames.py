"""The horizontal of beams, carried along where they have none of their own."""

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from benchlay.results.frames import carried, horizontals

X, Y, Z = (1.0, 0.0, 0.0), (0.0, 1.0, 0.0), (0.0, 0.0, 1.0)
DOWN, BACK = (0.0, 0.0, -1.0), (-1.0, 0.0, 0.0)


def along(*directions):
    table = np.array(directions)
    return horizontals(table, np.arange(len(table)) - 1)


def test_a_level_beam_has_its_left():
    level = along(X, Y, BACK)
    assert level.tolist() == [[0, 1, 0], [-1, 0, 0], [0, -1, 0]]


@pytest.mark.parametrize("upright", [Z, DOWN])
def test_a_vertical_beam_keeps_that_of_the_beam_before(upright):
    assert np.allclose(along(Y, upright)[1], [-1, 0, 0], atol=1e-15)
    assert np.allclose(along(X, upright)[1], [0, 1, 0], atol=1e-15)


def test_a_vertical_beam_sent_back_keeps_it_as_it_is():
    assert np.allclose(along(Y, Z, DOWN)[2], [-1, 0, 0], atol=1e-15)


def test_after_a_periscope_a_beam_has_its_own_again():
    assert np.allclose(along(X, Z, Y)[2], [-1, 0, 0], atol=1e-15)


def test_a_vertical_source_has_one_without_a_parent():
    level = along(Z)
    assert np.allclose(level @ np.array(Z), 0.0)
    assert np.allclose(np.linalg.norm(level, axis=1), 1.0)


_angle = st.floats(0.0, 2.0 * math.pi)


@given(_angle, _angle, st.floats(0.01, math.pi - 0.01))
def test_carrying_keeps_an_axis_across_and_of_unit_length(heading, turn, tilt):
    before = np.array([math.cos(heading), math.sin(heading), 0.0])
    axis = np.array([-math.sin(heading), math.cos(heading), 0.0])
    across = math.cos(turn) * axis + math.sin(turn) * np.array(Z)
    after = math.cos(tilt) * before + math.sin(tilt) * across
    new = np.array(carried(tuple(axis), tuple(before), tuple(after)))
    assert abs(new @ after) < 1e-12
    assert np.linalg.norm(new) == pytest.approx(1.0, abs=1e-12)
    # The least rotation leaves alone what is at right angles to both directions.
    pivot = np.cross(before, after)
    assert new @ pivot == pytest.approx(axis @ pivot, abs=1e-12)
