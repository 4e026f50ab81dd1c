"""Densities and scale numbers."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from benchlay.exposure.errors import OutOfRange
from benchlay.exposure.eyewear import (
    Mode,
    continuous_load_w_m2,
    diameter_factor,
    mode_for,
    optical_density,
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
