"""What beams are compared with."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from benchlay.exposure import (
    EDITION,
    OutOfRange,
    Pulse,
    accessible_limit,
    default_time_base_s,
)
from benchlay.exposure.apertures import circle_area_m2, eye_aperture_mm


@pytest.mark.parametrize(
    ("wavelength", "seconds"),
    [(180.0, 3e4), (math.nextafter(400.0, 0.0), 3e4), (400.0, 100.0), (1e6, 100.0)],
)
def test_default_time_base(wavelength, seconds):
    assert default_time_base_s(wavelength) == seconds


def test_default_time_base_knows_its_range():
    with pytest.raises(OutOfRange):
        default_time_base_s(150.0)


def test_continuous_green():
    # The agreed example: 10 W/m2 through 7 mm is 0.385 mW.
    limit = accessible_limit(532.0, 100.0)
    assert limit.mpe_w_m2 == 10.0
    assert limit.aperture_mm == 7.0
    assert limit.accessible_w == pytest.approx(0.000385, rel=1e-3)
    assert limit.accessible_j is None
    assert limit.edition == EDITION
    assert limit.governs == "thermal"


def test_time_base_left_out_is_the_default():
    assert accessible_limit(355.0) == accessible_limit(355.0, 3e4)


def test_a_glance_is_for_visible_light_and_says_so():
    limit = accessible_limit(532.0, 0.25)
    assert limit.time_base_s == 0.25
    assert limit.mpe_w_m2 == pytest.approx(18.0 * 0.25**-0.25)
    assert any("aversion" in note for note in limit.assumptions)


@pytest.mark.parametrize(("wavelength", "used"), [(1064.0, 100.0), (355.0, 3e4)])
def test_a_glance_is_refused_to_invisible_light(wavelength, used):
    limit = accessible_limit(wavelength, 0.25)
    assert limit.time_base_s == used
    default = accessible_limit(wavelength)
    assert limit.accessible_w == default.accessible_w
    assert any("only visible" in note for note in limit.assumptions)


def test_ten_seconds_are_taken_for_invisible_light():
    assert accessible_limit(1064.0, 10.0).time_base_s == 10.0


def test_train_is_given_as_mean_power_and_energy():
    pulse = Pulse(energy_j=2e-3, duration_s=1e-8, rate_hz=1000.0)
    limit = accessible_limit(1064.0, 10.0, pulse)
    area = circle_area_m2(7.0)
    assert limit.accessible_j == pytest.approx(0.01 * area)
    assert limit.accessible_w == pytest.approx(10.0 * area)
    assert limit.mpe_w_m2 == pytest.approx(10.0)
    assert pulse.mean_power_w(10.0) == pytest.approx(2.0)


def test_a_single_pulse_is_spread_over_the_time_base_on_both_sides():
    pulse = Pulse(energy_j=1e-6, duration_s=1e-8, rate_hz=0.0)
    limit = accessible_limit(532.0, 100.0, pulse)
    assert limit.accessible_j == pytest.approx(2e-3 * circle_area_m2(7.0))
    ratio = pulse.mean_power_w(100.0) / limit.accessible_w
    assert ratio == pytest.approx(pulse.energy_j / limit.accessible_j)


def test_a_pulse_longer_than_the_time_base_is_judged_as_continuous():
    glance = accessible_limit(532.0, 0.25)
    limit = accessible_limit(532.0, 0.25, Pulse(1e-3, 1.0, 0.5))
    assert limit.accessible_j == pytest.approx(glance.accessible_w * 1.0)
    assert any("outlasts" in note for note in limit.assumptions)


def test_far_infrared_pulse_takes_the_stricter_of_rule_and_aperture():
    # 10.6 um, 1 us, 1 Hz: one pulse, 5600 (1e-6)^0.25 = 177 J/m2 through 1 mm, against
    # 1e5 J/m2 among 100 pulses through 3.5 mm: the single pulse by both measures.
    limit = accessible_limit(10600.0, 100.0, Pulse(1e-3, 1e-6, 1.0))
    assert limit.aperture_mm == 1.0
    assert limit.accessible_j == pytest.approx(177.1 * circle_area_m2(1.0), rel=1e-3)
    # At 1 kHz the mean of 1000 W/m2 governs, 1 J/m2 a pulse, through 3.5 mm.
    fast = accessible_limit(10600.0, 100.0, Pulse(1e-3, 1e-6, 1e3))
    assert fast.aperture_mm == 3.5
    assert fast.accessible_w == pytest.approx(1000.0 * circle_area_m2(3.5))
    assert fast.governs == "average (thermal)"


@pytest.mark.parametrize("energy", [-1.0, math.nan, math.inf])
def test_impossible_energy_is_refused(energy):
    with pytest.raises(OutOfRange, match="energy"):
        accessible_limit(532.0, 100.0, Pulse(energy, 1e-8, 10.0))


def test_a_source_that_is_off_has_its_limit_all_the_same():
    off = accessible_limit(532.0, 100.0, Pulse(0.0, 1e-8, 10.0))
    assert off == accessible_limit(532.0, 100.0, Pulse(1e-3, 1e-8, 10.0))


def test_too_short_a_pulse_is_refused_not_guessed():
    with pytest.raises(OutOfRange, match="1e-13 s"):
        accessible_limit(800.0, 100.0, Pulse(1e-9, 3e-14, 8e7))


@pytest.mark.parametrize(
    ("wavelength", "time", "diameter"),
    [
        (399.9, 1.0, 1.0),
        (400.0, 1.0, 7.0),
        (1399.9, 1.0, 7.0),
        (1400.0, 0.35, 1.0),
        (1400.0, 1.0, 1.5),
        (1400.0, 10.0, 3.5),
        (99999.0, 10.0, 3.5),
        (1e5, 1e-9, 11.0),
    ],
)
def test_eye_apertures(wavelength, time, diameter):
    assert eye_aperture_mm(wavelength, time) == diameter


@given(
    wl=st.floats(180.0, 1e6),
    rate=st.floats(0.0, 1e6),
    base=st.sampled_from([None, 0.25, 10.0, 100.0, 3e4]),
)
def test_pulses_never_get_more_mean_power_than_continuous_light(wl, rate, base):
    steady = accessible_limit(wl, base)
    pulsed = accessible_limit(wl, base, Pulse(1e-9, 1e-8, rate))
    for limit in (steady, pulsed):
        area = circle_area_m2(limit.aperture_mm)
        assert limit.accessible_w == pytest.approx(limit.mpe_w_m2 * area)
    # A train slower than one pulse in the time base has its energy limit alone.
    if rate * steady.time_base_s >= 1.0:
        assert pulsed.accessible_w <= steady.accessible_w * (1.0 + 1e-6)
