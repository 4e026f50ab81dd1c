"""What a circle takes of a beam, against an integral done another way."""

import itertools
import math
import random

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy import integrate, special

from benchlay.exposure import OutOfRange
from benchlay.exposure.averaging import averaged_exposure, elliptical_fraction
from benchlay.exposure.distances import gaussian_fraction
from benchlay.optics.special import circle_share


def strips(a, w1, w2):
    """Share of strips across the circle: one error function each, laid side by side."""

    def strip(psi):
        x, half = a * math.sin(psi), a * math.cos(psi)
        across = math.exp(-2.0 * (x / w1) ** 2) * special.erf(math.sqrt(2.0) * half / w2)
        return across * half

    # The strips that matter lie within a few w1 of the middle.
    edges = sorted({math.asin(min(1.0, k * w1 / a)) for k in (0.0, 0.5, 1.0, 2.0, 4.0, 8.0)})
    parts = [
        integrate.quad(strip, low, high, epsabs=1e-14, epsrel=1e-12, limit=200)[0]
        for low, high in itertools.pairwise(edges)
    ]
    return 2.0 * math.sqrt(2.0 / math.pi) / w1 * sum(parts)


@pytest.mark.parametrize("a", [0.5, 3.5, 25.0])
@pytest.mark.parametrize("w1", [0.02, 0.3, 3.0, 40.0])
@pytest.mark.parametrize("w2", [0.05, 1.0, 3.0000001, 10.0, 200.0])
def test_against_strips(a, w1, w2):
    assert elliptical_fraction(a, w1, w2) == pytest.approx(strips(a, w1, w2), rel=1e-8, abs=1e-11)


def test_it_is_what_the_tracer_takes():
    dice = random.Random(1)
    w1, w2 = np.array([[10 ** dice.uniform(-2, 2.5) for _ in range(100)] for _ in range(2)])
    np.testing.assert_allclose(
        elliptical_fraction(3.5, w1, w2), circle_share(w1, w2, 3.5), rtol=1e-10
    )


def test_a_line_of_light_is_an_error_function():
    # Of no width across, the circle takes what lies within its radius along the line.
    expected = special.erf(math.sqrt(2.0) * 3.5 / 10.0)
    assert elliptical_fraction(3.5, 1e-4, 10.0) == pytest.approx(expected, rel=1e-8)


def test_a_round_beam_is_the_closed_form():
    assert elliptical_fraction(3.5, 2.0, 2.0) == gaussian_fraction(3.5, 2.0)
    nearly = elliptical_fraction(3.5, 2.0, 2.0 * (1.0 + 1e-6))
    assert nearly == pytest.approx(gaussian_fraction(3.5, 2.0), rel=1e-6)


@given(
    a=st.floats(0.1, 30.0),
    w1=st.floats(-2.0, 2.5).map(lambda x: 10.0**x),
    w2=st.floats(-2.0, 2.5).map(lambda x: 10.0**x),
)
def test_a_beam_lies_between_the_round_ones_of_its_radii(a, w1, w2):
    share = elliptical_fraction(a, w1, w2)
    assert share == elliptical_fraction(a, w2, w1)
    low, high = (gaussian_fraction(a, f(w1, w2)) for f in (max, min))
    assert low * (1.0 - 1e-9) <= share <= high * (1.0 + 1e-9) + 1e-12


def test_a_narrow_beam_is_judged_by_the_aperture_and_not_by_its_peak():
    # 1 mW in 0.3 mm: over 7 mm 26 W/m2, at its peak a thousand times more.
    found = averaged_exposure(1e-3, 7.0, 0.15, 0.15)
    assert found == pytest.approx(1e-3 / (math.pi * 3.5e-3**2))
    assert 2.0 * 1e-3 / (math.pi * 0.15e-3**2) > 1000.0 * found


def test_a_wide_beam_comes_near_its_peak_from_below():
    peak = 2.0 * 1.0 / (math.pi * 0.1 * 0.2)
    found = averaged_exposure(1.0, 7.0, 100.0, 200.0)
    assert found == pytest.approx(peak, rel=1e-3)
    assert found < peak


def test_arrays():
    w = np.array([0.5, 5.0])
    assert elliptical_fraction(3.5, w, 10.0).tolist() == [
        elliptical_fraction(3.5, one, 10.0) for one in w.tolist()
    ]


@pytest.mark.parametrize(("w1", "w2"), [(0.0, 1.0), (1.0, -1.0), (math.nan, 1.0), (1.0, math.inf)])
def test_no_share_of_what_is_no_beam(w1, w2):
    with pytest.raises(OutOfRange, match="radii"):
        elliptical_fraction(3.5, w1, w2)
