"""Limits of the classes: rows on their exact sides, and their kinship with exposures."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from benchlay.exposure.apertures import circle_area_m2
from benchlay.exposure.emission import Level, emission_limit, thermal_emission_j
from benchlay.exposure.errors import OutOfRange
from benchlay.exposure.limits import eye_limit


def below(value):
    return math.nextafter(value, 0.0)


STEPS = [
    # class, wavelength, boundary in s, energy just below it, energy at it
    (Level.ONE, 250.0, 1e-9, 2.4e-5, 2.4e-5),
    (Level.ONE, 350.0, 10.0, 7.9e-7 * 5600 * 10**0.25, 7.9e-3),
    (Level.ONE, 350.0, 1e3, 7.9e-3, 7.9e-3),
    (Level.ONE, 633.0, 1e-11, 3.8e-8, 7.7e-8),
    (Level.ONE, 633.0, 5e-6, 7.7e-8, 7e-4 * 5e-6**0.75),
    (Level.ONE, 633.0, 10.0, 7e-4 * 10**0.75, 3.9e-3),
    (Level.ONE, 440.0, 100.0, 3.9e-3, 3.9e-3),
    (Level.ONE, 1064.0, 13e-6, 7.7e-7, 3.5e-3 * 13e-6**0.75),
    (Level.ONE, 1064.0, 10.0, 3.5e-3 * 10**0.75, 1.95e-2),
    (Level.ONE, 1450.0, 1e-3, 8e-4, 4.4e-3 * 1e-3**0.25),
    (Level.ONE, 1450.0, 0.35, 4.4e-3 * 0.35**0.25, 3.5e-3),
    (Level.ONE, 1550.0, 0.35, 8e-3, 1.8e-2 * 0.35**0.75),
    (Level.ONE, 1550.0, 10.0, 1.8e-2 * 10**0.75, 0.1),
    (Level.ONE, 3000.0, 1e-7, 8e-5, 4.4e-3 * 1e-7**0.25),
    (Level.TWO, 633.0, 0.25, 7e-4 * 0.25**0.75, 2.5e-4),
    (Level.THREE_R, 350.0, 10.0, 4e-6 * 5600 * 10**0.25, 4e-2),
    (Level.THREE_R, 633.0, 1e-11, 1.9e-7, 3.8e-7),
    (Level.THREE_R, 633.0, 0.25, 3.5e-3 * 0.25**0.75, 1.25e-3),
    (Level.THREE_R, 1064.0, 13e-6, 3.8e-6, 1.8e-2 * 13e-6**0.75),
    (Level.THREE_R, 1064.0, 10.0, 1.8e-2 * 10**0.75, 0.1),
    (Level.THREE_R, 1550.0, 10.0, 9e-2 * 10**0.75, 0.5),
    (Level.THREE_B, 250.0, 0.25, 3.8e-4, 3.75e-4),
    (Level.THREE_B, 633.0, 1e-9, 0.03, 0.03),
    (Level.THREE_B, 633.0, 0.06, 0.03, 0.03),
    (Level.THREE_B, 1064.0, 0.25, 0.15, 0.125),
    (Level.THREE_B, 10600.0, 0.25, 0.125, 0.125),
]


@pytest.mark.parametrize(("level", "wavelength", "time", "low", "high"), STEPS)
def test_step_is_on_its_exact_side(level, wavelength, time, low, high):
    before = emission_limit(level, wavelength, below(time)).energy_j(below(time))
    assert before == pytest.approx(low, rel=1e-6)
    at = emission_limit(level, wavelength, time).energy_j(time)
    assert at == pytest.approx(high, rel=1e-6)


@pytest.mark.parametrize(
    ("level", "wavelength", "exists"),
    [
        (Level.TWO, below(400.0), False),
        (Level.TWO, 400.0, True),
        (Level.TWO, below(700.0), True),
        (Level.TWO, 700.0, False),
        (Level.THREE_R, below(302.5), False),
        (Level.THREE_R, 302.5, True),
    ],
)
def test_where_a_class_exists(level, wavelength, exists):
    assert (emission_limit(level, wavelength, 0.25) is not None) == exists


def test_far_infrared_is_the_exposure_limit_through_its_aperture():
    found = emission_limit(Level.ONE, 10600.0, 100.0)
    assert found.unit == "W"
    assert found.value == pytest.approx(1000.0 * circle_area_m2(3.5))
    three_r = emission_limit(Level.THREE_R, 10600.0, 100.0)
    assert three_r.value == pytest.approx(5.0 * found.value)
    pulse = emission_limit(Level.ONE, 10600.0, 1e-8)
    assert (pulse.unit, pulse.value) == ("J", pytest.approx(100.0 * circle_area_m2(1)))


def test_near_1400_nm_class_1_is_capped_by_class_3b():
    found = emission_limit(Level.ONE, 1390.0, 100.0)
    assert (found.value, found.governs) == (0.5, "anterior")


def test_blue_light_of_long_emission_is_photochemical():
    assert emission_limit(Level.ONE, 440.0, 100.0).governs == "photochemical"
    # C3 of the thermal part is one: the thermal limit alone stays ten times higher.
    assert thermal_emission_j(Level.ONE, 440.0, 100.0) == pytest.approx(3.9e-2)


def test_c5_has_no_thermal_limit_to_lower_elsewhere():
    for level, wavelength in ((Level.THREE_B, 532.0), (Level.ONE, 350.0)):
        with pytest.raises(OutOfRange, match="no thermal limit"):
            thermal_emission_j(level, wavelength, 1e-8)


@given(
    wl=st.floats(180.0, 1e6).filter(lambda w: not 1250.0 <= w < 1400.0),
    t=st.floats(-12.9, 4.4).map(lambda x: 10.0**x),
)
def test_class_1_is_the_exposure_limit_but_for_rounding(wl, t):
    # The standard's roundings stay within 12 % (1e-2 W at 3.5 mm is 4 % off, the
    # rows from 0.35 s take the mean of an aperture that grows with time).
    mpe = eye_limit(wl, t)
    through = mpe.dose_j_m2 * circle_area_m2(mpe.aperture_mm)
    assert emission_limit(Level.ONE, wl, t).energy_j(t) == pytest.approx(through, rel=0.12)


@given(
    wl=st.floats(302.5, 99999.0),
    t=st.floats(-12.9, 4.4).map(lambda x: 10.0**x),
)
def test_classes_are_ordered(wl, t):
    # Above 0.1 mm they are not: an 11 mm aperture lifts class 1 above 3B for pulses.
    one = emission_limit(Level.ONE, wl, t).energy_j(t)
    three_r = emission_limit(Level.THREE_R, wl, t).energy_j(t)
    three_b = emission_limit(Level.THREE_B, wl, t).energy_j(t)
    assert one <= three_r
    assert one <= three_b
