"""A plane's own two axes."""

from math import cos, pi, sin

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from benchlay.geometry.axes import in_plane_axes


def test_of_the_front_they_are_y_and_z():
    left, up = in_plane_axes((1.0, 0.0, 0.0))
    assert left == (0.0, 1.0, 0.0)
    assert up == (0.0, 0.0, 1.0)


def test_left_of_the_back_is_right_of_the_front():
    left, up = in_plane_axes((-1.0, 0.0, 0.0))
    assert left == (0.0, -1.0, 0.0)
    assert up == (0.0, 0.0, 1.0)


@pytest.mark.parametrize("up_or_down", [1.0, -1.0])
def test_a_level_plane_has_y_as_its_left(up_or_down):
    normal = (0.0, 0.0, up_or_down)
    left, up = in_plane_axes(normal)
    assert left == (0.0, 1.0, 0.0)
    assert np.cross(left, up).tolist() == pytest.approx(normal)


@given(st.floats(-pi, pi), st.floats(-1.5, 1.5))
def test_they_are_right_handed_with_the_normal_and_left_is_level(heading, pitch):
    normal = (cos(heading) * cos(pitch), sin(heading) * cos(pitch), sin(pitch))
    left, up = in_plane_axes(normal)
    assert left[2] == 0.0
    assert up[2] > 0.0
    assert np.linalg.norm(left) == pytest.approx(1.0, abs=1e-12)
    assert np.cross(left, up).tolist() == pytest.approx(normal, abs=1e-12)
