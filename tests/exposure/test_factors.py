"""Factors: their values, and where they begin and end."""

import math

import pytest

from benchlay.exposure import factors
from benchlay.exposure.errors import OutOfRange


def below(value):
    return math.nextafter(value, 0.0)


@pytest.mark.parametrize(
    ("function", "first", "end"),
    [
        (factors.c2_j_m2, 180.0, 315.0),
        (factors.t1_s, 302.5, 315.0),
        (factors.c3, 400.0, 600.0),
        (factors.c4, 400.0, 1400.0),
        (factors.c7, 400.0, 1400.0),
    ],
)
def test_a_factor_is_refused_outside_its_range(function, first, end):
    assert function(first) > 0.0
    assert function(below(end)) > 0.0
    for outside in (below(first), end):
        with pytest.raises(OutOfRange, match="is defined from"):
            function(outside)


def test_c5_is_refused_outside_the_retina():
    for outside in (below(400.0), 1400.0):
        with pytest.raises(OutOfRange, match="C5 is defined"):
            factors.c5(1000.0, 1e-8, outside, 10.0)


@pytest.mark.parametrize(
    ("wavelength", "seconds"),
    [
        (400.0, 5e-6),
        (below(1050.0), 5e-6),
        (1050.0, 13e-6),
        (1400.0, 1e-3),
        (1500.0, 10.0),
        (1800.0, 1e-3),
        (2600.0, 1e-7),
        (1e6, 1e-7),
    ],
)
def test_ti(wavelength, seconds):
    assert factors.ti_s(wavelength) == seconds


def test_ti_is_refused_outside_its_range():
    for outside in (below(400.0), math.nextafter(1e6, math.inf)):
        with pytest.raises(OutOfRange, match="Ti is defined"):
            factors.ti_s(outside)


@pytest.mark.parametrize(
    ("seconds", "angle"),
    [(1.0, 11.0), (100.0, 11.0), (400.0, 22.0), (below(1e4), 110.0), (3e4, 110.0)],
)
def test_gamma_ph(seconds, angle):
    assert factors.gamma_ph_mrad(seconds) == pytest.approx(angle)


@pytest.mark.parametrize(
    ("seconds", "angle"),
    [(1e-12, 5.0), (below(625e-6), 5.0), (0.01, 20.0), (0.25, 100.0), (100.0, 100.0)],
)
def test_alpha_max(seconds, angle):
    assert factors.alpha_max_mrad(seconds) == pytest.approx(angle)


@pytest.mark.parametrize(
    ("wavelength", "value"),
    [(400.0, 1.0), (450.0, 1.0), (500.0, 10.0), (550.0, 100.0)],
)
def test_c3(wavelength, value):
    assert factors.c3(wavelength) == pytest.approx(value)


@pytest.mark.parametrize(
    ("wavelength", "value"),
    [(below(700.0), 1.0), (850.0, 10**0.3), (1050.0, 5.0), (1300.0, 5.0)],
)
def test_c4(wavelength, value):
    assert factors.c4(wavelength) == pytest.approx(value)


@pytest.mark.parametrize(
    ("wavelength", "value"),
    [
        (1100.0, 1.0),
        (1175.0, 10**0.45),
        (1200.0, 8.01),
        (1250.0, 9.0),
        (1300.0, 108.0),
    ],
)
def test_c7(wavelength, value):
    assert factors.c7(wavelength) == pytest.approx(value)


@pytest.mark.parametrize(
    ("alpha", "seconds", "value"),
    [(0.0, 1.0, 1.0), (1.5, 1.0, 1.0), (3.0, 1e-6, 2.0), (30.0, 1e-6, 5.0 / 1.5)],
)
def test_c6(alpha, seconds, value):
    assert factors.c6(alpha, seconds) == pytest.approx(value)


def test_t2_between_its_ends():
    assert factors.t2_s(50.75) == pytest.approx(10.0 * math.sqrt(10.0))
    assert factors.t2_s(500.0) == 100.0


@pytest.mark.parametrize(
    ("wavelength", "retinal", "visible"),
    [
        (below(400.0), False, False),
        (400.0, True, True),
        (below(700.0), True, True),
        (700.0, True, False),
        (below(1400.0), True, False),
        (1400.0, False, False),
    ],
)
def test_parts_of_the_spectrum(wavelength, retinal, visible):
    assert factors.is_retinal(wavelength) is retinal
    assert factors.is_visible(wavelength) is visible
