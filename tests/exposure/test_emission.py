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


C2_310 = 10.0**3.0
C4_800 = 10.0**0.2
ONE, TWO, THREE_R, THREE_B = Level

# One value for every row of the classes' tables: W or J as the table writes it.
ROWS = [
    (ONE, 250.0, 1e-10, 2.4e4, "W"),
    (ONE, 250.0, 1.0, 2.4e-5, "J"),
    (ONE, 310.0, 1e-10, 2.4e4, "W"),
    (ONE, 310.0, 1e-8, 7.9e-7 * 5600 * 1e-2, "J"),
    (ONE, 310.0, 1.0, 7.9e-7 * C2_310, "J"),
    (ONE, 310.0, 100.0, 7.9e-7 * C2_310, "J"),
    (ONE, 314.9, 10.0, 7.9e-7 * 10**3.98, "J"),
    (ONE, 350.0, 1e-10, 2.4e4, "W"),
    (ONE, 350.0, 1.0, 7.9e-7 * 5600, "J"),
    (ONE, 350.0, 100.0, 7.9e-3, "J"),
    (ONE, 350.0, 1e4, 7.9e-6, "W"),
    (ONE, 440.0, 50.0, 3.9e-3, "J"),
    (ONE, 440.0, 100.0, 3.9e-5, "W"),
    (ONE, 500.0, 1e3, 3.9e-4, "W"),
    (ONE, 633.0, 1.0, 7e-4, "J"),
    (ONE, 800.0, 1e-12, 3.8e-8 * C4_800, "J"),
    (ONE, 800.0, 1e-8, 7.7e-8 * C4_800, "J"),
    (ONE, 800.0, 1.0, 7e-4 * C4_800, "J"),
    (ONE, 800.0, 100.0, 3.9e-4 * C4_800, "W"),
    (ONE, 1050.0, 1e-8, 7.7e-7, "J"),
    (ONE, below(1050.0), 1e-8, 7.7e-8 * 10**0.7, "J"),
    (ONE, 1064.0, 1e-12, 3.8e-7, "J"),
    (ONE, 1225.0, 1e-8, 7.7e-7 * (8 + 0.1), "J"),
    (ONE, 1225.0, 100.0, 3.9e-4 * 5 * (8 + 0.1), "W"),
    (ONE, 1450.0, 1e-10, 8e5, "W"),
    (ONE, 1450.0, 1e-6, 8e-4, "J"),
    (ONE, 1450.0, 1.0, 1e-2, "J"),
    (ONE, 1450.0, 100.0, 1e-2, "W"),
    (ONE, 1550.0, 1e-10, 8e6, "W"),
    (ONE, 1550.0, 1e-3, 8e-3, "J"),
    (ONE, 1550.0, 1.0, 1.8e-2, "J"),
    (ONE, 2000.0, 0.0081, 4.4e-3 * 0.3, "J"),
    (ONE, 3000.0, 1e-10, 8e4, "W"),
    (ONE, 3000.0, 1e-8, 8e-5, "J"),
    (ONE, 3000.0, 0.0081, 4.4e-3 * 0.3, "J"),
    (TWO, 633.0, 1e-8, 7.7e-8, "J"),
    (TWO, 633.0, 1.0, 1e-3, "W"),
    (THREE_R, 310.0, 1e-10, 1.2e5, "W"),
    (THREE_R, 310.0, 1e-8, 4e-6 * 56.0, "J"),
    (THREE_R, 310.0, 1.0, 4e-6 * C2_310, "J"),
    (THREE_R, 314.9, 10.0, 4e-6 * 10**3.98, "J"),
    (THREE_R, 350.0, 1e-10, 1.2e5, "W"),
    (THREE_R, 350.0, 1.0, 4e-6 * 5600, "J"),
    (THREE_R, 350.0, 100.0, 4e-2, "J"),
    (THREE_R, 350.0, 1e4, 4e-5, "W"),
    (THREE_R, 633.0, 100.0, 5e-3, "W"),
    (THREE_R, 800.0, 1e-12, 1.9e-7 * C4_800, "J"),
    (THREE_R, 800.0, 1e-8, 3.8e-7 * C4_800, "J"),
    (THREE_R, 800.0, 1.0, 3.5e-3 * C4_800, "J"),
    (THREE_R, 800.0, 100.0, 2e-3 * C4_800, "W"),
    (THREE_R, 1064.0, 1e-12, 1.9e-6, "J"),
    (THREE_R, 1064.0, 1e-8, 3.8e-6, "J"),
    (THREE_R, 1064.0, 1.0, 1.8e-2, "J"),
    (THREE_R, 1064.0, 100.0, 1e-2, "W"),
    (THREE_R, 1390.0, 100.0, 0.5, "W"),
    (THREE_R, 1450.0, 1e-10, 4e6, "W"),
    (THREE_R, 1450.0, 1.0, 5e-2, "J"),
    (THREE_R, 1550.0, 100.0, 5e-2, "W"),
    (THREE_R, 3000.0, 1e-8, 4e-4, "J"),
    (THREE_B, 250.0, 1e-10, 3.8e5, "W"),
    (THREE_B, 250.0, 1e-8, 3.8e-4, "J"),
    (THREE_B, 250.0, 1.0, 1.5e-3, "W"),
    (THREE_B, 310.0, 1e-10, 1.25e4 * C2_310, "W"),
    (THREE_B, 310.0, 1e-8, 1.25e-5 * C2_310, "J"),
    (THREE_B, 310.0, 1.0, 5e-5 * C2_310, "W"),
    (THREE_B, 350.0, 1e-10, 1.25e8, "W"),
    (THREE_B, 350.0, 1e-8, 0.125, "J"),
    (THREE_B, 350.0, 1.0, 0.5, "W"),
    (THREE_B, 800.0, 1e-10, 3e7 * C4_800, "W"),
    (THREE_B, 800.0, 0.09, 0.03 * C4_800, "J"),
    (THREE_B, 800.0, 0.1, 0.5, "W"),
    (THREE_B, 1064.0, 1e-10, 1.5e8, "W"),
    (THREE_B, 1064.0, 1e-8, 0.15, "J"),
    (THREE_B, 1064.0, 1.0, 0.5, "W"),
    (THREE_B, 1550.0, 1e-10, 1.25e8, "W"),
    (THREE_B, 1550.0, 1e-8, 0.125, "J"),
    (THREE_B, 1550.0, 1.0, 0.5, "W"),
]


@pytest.mark.parametrize(("level", "wavelength", "time", "value", "unit"), ROWS)
def test_every_row(level, wavelength, time, value, unit):
    found = emission_limit(level, wavelength, time)
    assert found.value == pytest.approx(value, rel=1e-9)
    assert found.unit == unit


def test_extended_sources_are_allowed_more():
    factor = 50.0 / 1.5
    t2 = 10.0 * 10.0 ** (48.5 / 98.5)
    for level, slope in ((ONE, 7e-4), (THREE_R, 3.5e-3)):
        early = emission_limit(level, 800.0, 20.0, alpha_mrad=50.0)
        expected = slope * C4_800 * factor * 20.0**0.75
        assert (early.value, early.unit) == (pytest.approx(expected), "J")
        late = emission_limit(level, 800.0, 100.0, alpha_mrad=50.0)
        expected = slope * C4_800 * factor * t2**-0.25
        assert (late.value, late.unit) == (pytest.approx(expected), "W")
    assert emission_limit(TWO, 633.0, 1.0, alpha_mrad=50.0).value == pytest.approx(1e-3 * factor)
    assert emission_limit(THREE_R, 633.0, 1.0, alpha_mrad=50.0).value == pytest.approx(
        5e-3 * factor
    )


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


def test_heat_of_class_2_on_both_sides_of_its_time_base():
    short = 7e-4 * below(0.25) ** 0.75
    assert thermal_emission_j(Level.TWO, 633.0, below(0.25)) == pytest.approx(short, rel=1e-9)
    assert thermal_emission_j(Level.TWO, 633.0, 0.25) == pytest.approx(2.5e-4, rel=1e-9)


@pytest.mark.parametrize(
    ("level", "wavelength", "seconds", "recalled"),
    [
        (Level.ONE, 633.0, 100.0, True),
        (Level.ONE, 440.0, below(100.0), True),
        (Level.ONE, 440.0, 100.0, False),
        (Level.ONE, 460.0, 100.0, True),
        (Level.TWO, 633.0, 0.25, False),
        (Level.TWO, 633.0, below(0.25), True),
        (Level.THREE_R, 633.0, 0.25, False),
        (Level.THREE_R, 633.0, below(0.25), True),
        (Level.THREE_B, 532.0, 1e-8, False),
        (Level.THREE_B, 1064.0, 1e-8, True),
        (Level.THREE_B, 1064.0, 0.25, False),
        (Level.THREE_B, 250.0, 0.25, True),
    ],
)
def test_what_was_recalled_says_so(level, wavelength, seconds, recalled):
    assert emission_limit(level, wavelength, seconds).from_memory is recalled


def test_limits_of_large_sources_are_recalled():
    for level in (Level.TWO, Level.THREE_R):
        assert not emission_limit(level, 633.0, 0.25, alpha_mrad=1.5).from_memory
        assert emission_limit(level, 633.0, 0.25, alpha_mrad=1.6).from_memory
