"""The width of a beam's zone: against SciPy for round beams, against a dense sum for others."""

import numpy as np
import pytest
from scipy.special import erf
from traced import half_width

from benchlay.zones.offside import farthest_mm, half_plane


@pytest.mark.parametrize("share", [1e-7, 1e-3, 0.05, 0.4, 0.6])
@pytest.mark.parametrize("w", [0.02, 0.2, 0.349, 0.351, 1.0, 3.0, 5.0])
def test_round_beams(w, share):
    radius = 3.5
    taken = 1.0 - np.exp(-2.0 * radius**2 / w**2)
    (found,) = farthest_mm(np.array([w]), np.array([w]), 2.0 * radius, share)
    if taken <= share:
        assert found == 0.0
        return
    true = half_width(w, share, radius)
    assert found == pytest.approx(true, rel=2e-3)
    assert found >= true * (1.0 - 1e-6)


@pytest.mark.parametrize(("across", "upright"), [(1.0, 4.0), (4.0, 1.0), (20.0, 0.9)])
def test_elliptical_beams(across, upright):
    share, a = 1e-3, 0.5 * 7.0
    (found,) = farthest_mm(np.array([across]), np.array([upright]), 2.0 * a, share)
    x = a * (2.0 * (np.arange(200_000) + 0.5) / 200_000 - 1.0)
    line = np.exp(-2.0 * ((found + x) / across) ** 2) * np.sqrt(2.0 / np.pi) / across
    taken = (line * erf(np.sqrt(2.0 * (a**2 - x**2)) / upright)).mean() * 2.0 * a
    assert taken == pytest.approx(share, rel=1e-5)


def test_a_half_plane_through_the_axis_holds_half():
    assert half_plane(0.5) == pytest.approx(0.0, abs=1e-12)
    assert half_plane(0.02275) == pytest.approx(1.0, abs=1e-4)  # two standard deviations
