"""Densities and scale numbers."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from benchlay.exposure.errors import OutOfRange
from benchlay.exposure.eyewear import (
    Mode,
    continuous_load_w_m2,
    continuous_scale,
    diameter_factor,
    diameter_factor_applies,
    mode_for,
    optical_density,
    pulsed_scale,
    scale_level,
    scale_limit,
    train_factor,
)


def test_density_is_the_decimal_logarithm_and_never_negative():
    assert optical_density(1e6, 1.0) == pytest.approx(6.0)
    assert optical_density(1.0, 1.0) == 0.0
    assert optical_density(0.5, 1.0) == 0.0
    assert optical_density(0.0, 1.0) == 0.0


@pytest.mark.parametrize(
    ("exposure", "limit"),
    [(-1.0, 1.0), (math.nan, 1.0), (1.0, 0.0), (1.0, math.nan), (math.inf, 1.0)],
)
def test_impossible_density_is_refused(exposure, limit):
    with pytest.raises(OutOfRange, match="no density"):
        optical_density(exposure, limit)


@pytest.mark.parametrize(
    ("seconds", "mode"),
    [
        (math.nextafter(1e-9, 0.0), Mode.M),
        (1e-9, Mode.R),
        (math.nextafter(1e-6, 0.0), Mode.R),
        (1e-6, Mode.I),
        (0.25, Mode.I),
        (math.nextafter(0.25, 1.0), Mode.D),
    ],
)
def test_modes_by_duration(seconds, mode):
    assert mode_for(seconds) is mode


@pytest.mark.parametrize("seconds", [0.0, -1.0, math.nan])
def test_no_mode_without_a_duration(seconds):
    with pytest.raises(OutOfRange):
        mode_for(seconds)


@pytest.mark.parametrize("mode", list(Mode))
@pytest.mark.parametrize("wavelength", [250.0, 532.0, 10600.0])
def test_a_load_at_the_limit_is_borne_and_just_above_is_not(wavelength, mode):
    for level in range(1, 10):
        limit = scale_limit(wavelength, mode, level).value
        assert scale_level(wavelength, mode, limit) == level
        assert scale_level(wavelength, mode, limit * (1 + 1e-12)) == level + 1


@pytest.mark.parametrize(("edge", "changed"), [(315.0, 1e4), (1400.0, 1e2)])
def test_the_ranges_meet_on_their_exact_side(edge, changed):
    before = scale_limit(math.nextafter(edge, 0.0), Mode.D, 3).value
    assert scale_limit(edge, Mode.D, 3).value == pytest.approx(before * changed)


def test_nothing_bears_more_than_lb10():
    assert scale_level(532.0, Mode.D, 1e11) == 10
    assert scale_level(532.0, Mode.D, 1.0001e11) is None


@pytest.mark.parametrize("level", [0, 11])
def test_scale_numbers_end(level):
    with pytest.raises(OutOfRange, match="LB1 to LB10"):
        scale_limit(532.0, Mode.D, level)


def test_impossible_loads_are_refused():
    for load in (-1.0, math.nan):
        with pytest.raises(OutOfRange, match="load"):
            scale_level(532.0, Mode.D, load)


def test_diameter_factor():
    assert diameter_factor(0.2) == 1.0
    assert diameter_factor(1.0) == 1.0
    assert diameter_factor(10.0) == pytest.approx(10**1.7)
    assert diameter_factor(15.0) == pytest.approx(99.85, abs=0.01)
    assert diameter_factor(math.nextafter(15.0, 16.0)) == diameter_factor(15.1) == 100.0
    assert diameter_factor(40.0) == 100.0
    with pytest.raises(OutOfRange):
        diameter_factor(0.0)


def test_diameter_factor_is_for_strong_beams_alone():
    area = math.pi / 4.0 * 0.02**2
    assert continuous_load_w_m2(10.0, 20.0) == pytest.approx(10.0 / area)
    assert continuous_load_w_m2(10.1, 20.0) == pytest.approx(10.1 / area * 100.0)
    narrow = math.pi / 4.0 * 0.002**2
    expected = 1.0 / narrow * 2**1.7
    assert continuous_load_w_m2(1.0, 2.0) == pytest.approx(expected)


def test_train_factor_counts_five_seconds():
    assert train_factor(2000.0) == pytest.approx(10.0)
    assert train_factor(0.0) == 1.0
    assert train_factor(0.1) == 1.0


@given(
    wl=st.floats(180.0, 1e6),
    mode=st.sampled_from(list(Mode)),
    load=st.floats(-6.0, 20.0).map(lambda x: 10.0**x),
)
def test_the_level_is_the_smallest_that_bears_the_load(wl, mode, load):
    level = scale_level(wl, mode, load)
    if level is None:
        assert load > scale_limit(wl, mode, 10).value
        return
    assert load <= scale_limit(wl, mode, level).value
    assert level == 1 or load > scale_limit(wl, mode, level - 1).value


def test_scale_of_continuous_light():
    # 600 W, 40 mm: 4.8e5 W/m2 times 100 lies between LB6 and LB7 (a published example).
    assert continuous_scale(1064.0, 600.0, 40.0).text == "D LB7"
    assert continuous_scale(1064.0, 1e9, 1.0).text is None


@pytest.mark.parametrize(
    ("pulse_s", "letter"), [(1e-12, "M"), (1e-8, "R"), (1e-4, "I"), (0.25, "I")]
)
def test_pulses_have_a_level_for_themselves_and_one_for_their_mean(pulse_s, letter):
    found = pulsed_scale(532.0, 1e-6, pulse_s, 1.0, 1.0)
    assert [str(mode) for mode, _ in found.levels] == ["D", letter]


def test_levels_of_a_train_by_hand():
    # 1 mJ, 10 ns, 10 Hz in 2 mm: 318 J/m2, times 50^(1/4) = 846 J/m2; 10 mW are 3183 W/m2.
    # LB6 bears 5000 J/m2 and LB5 500; LB3 bears 1e4 W/m2.
    assert pulsed_scale(1064.0, 1e-3, 1e-8, 10.0, 2.0).text == "D LB3 + R LB6"


def test_a_single_short_pulse_in_the_ultraviolet_is_judged_by_its_peak():
    # 1 nJ in 100 fs over 1 mm2 (d = 1.128 mm): 1e-3 J/m2, 1e10 W/m2: LB1 bears 3e11 W/m2.
    d63 = 2.0 / math.sqrt(math.pi)
    assert pulsed_scale(248.0, 1e-9, 1e-13, 0.0, d63).levels[1] == (Mode.M, 1)
    assert pulsed_scale(248.0, 1e-7, 1e-13, 0.0, d63).levels[1] == (Mode.M, 2)


def test_a_long_pulse_is_continuous_light_of_its_own_power():
    assert pulsed_scale(532.0, 1.0, 0.5, 0.1, 2.0) == continuous_scale(532.0, 2.0, 2.0)


def test_the_factor_for_wide_beams_begins_above_its_bounds():
    area = math.pi / 4.0 * 0.005**2
    assert not diameter_factor_applies(1e5 * area, 5.0)
    assert diameter_factor_applies(1e5 * area * (1.0 + 1e-9), 5.0)
    assert not diameter_factor_applies(10.0, 50.0)
    assert diameter_factor_applies(10.0 * (1.0 + 1e-9), 50.0)
    assert not diameter_factor_applies(1e3, 1.0)
    assert diameter_factor_applies(1e3, 1.001)
