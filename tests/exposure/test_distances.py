"""Hazard distances."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from benchlay.exposure.distances import (
    diffuse_distance_m,
    gaussian_fraction,
    hazardous_span,
    nohd_exact_m,
    nohd_linear_m,
    nohd_quadratic_m,
)
from benchlay.exposure.errors import OutOfRange

MPE = 18.0 * 0.25**-0.25


def exact(power=1.0, **changed):
    beam = {"aperture_mm": 7.0, "waist_w_mm": 0.5, "half_angle_86_rad": 5e-4}
    return nohd_exact_m(power, MPE, **(beam | changed))


def test_the_three_formulas_on_one_worked_beam():
    # Worked by hand: 1 W, w0 = 0.5 mm, half angle 0.5 mrad: 316.20, 316.28, 315.28 m.
    in_63 = {
        "divergence_full_63_rad": 1e-3 / math.sqrt(2.0),
        "exit_diameter_63_m": 1e-3 / math.sqrt(2.0),
    }
    assert exact() == pytest.approx(316.20, abs=0.01)
    assert nohd_quadratic_m(1.0, MPE, **in_63) == pytest.approx(316.28, abs=0.01)
    assert nohd_linear_m(1.0, MPE, **in_63) == pytest.approx(315.28, abs=0.01)


def test_diameters_at_the_wrong_level_are_the_trap_the_names_guard_against():
    wrong = nohd_linear_m(1.0, MPE, divergence_full_63_rad=1e-3, exit_diameter_63_m=1e-3)
    assert wrong == pytest.approx(222.6, abs=0.1)


def test_at_the_distance_the_aperture_takes_exactly_the_limit():
    z = exact(power=0.1)
    w = math.hypot(0.5, 0.5e-3 * z * 1e3)
    through = 0.1 * gaussian_fraction(3.5, w)
    assert through == pytest.approx(MPE * math.pi * 3.5e-3**2)


def test_no_distance_at_or_under_the_limit():
    allowed = MPE * math.pi * 3.5e-3**2
    assert exact(power=allowed) == 0.0
    assert exact(power=allowed * 1.001) > 0.0
    assert exact(power=0.0) == 0.0


def test_a_beam_already_wide_enough_has_no_span():
    assert (
        hazardous_span(1e-2, MPE, aperture_mm=7.0, waist_w_mm=50.0, half_angle_86_rad=1e-4) is None
    )


def test_a_focus_ahead_is_hazardous_on_both_sides_of_itself():
    span = hazardous_span(
        0.1,
        MPE,
        aperture_mm=7.0,
        waist_w_mm=0.05,
        half_angle_86_rad=0.05,
        waist_at_m=10.0,
    )
    assert 0.0 < span.start_m < 10.0 < span.end_m
    assert span.end_m - 10.0 == pytest.approx(10.0 - span.start_m)


def test_a_span_behind_the_exit_is_none():
    assert exact(power=0.1, half_angle_86_rad=0.05, waist_at_m=-50.0) == 0.0


def test_a_parallel_beam_has_no_end():
    assert exact(half_angle_86_rad=0.0) == math.inf
    assert nohd_linear_m(1.0, MPE, divergence_full_63_rad=0.0) == math.inf
    assert nohd_quadratic_m(1.0, MPE, divergence_full_63_rad=0.0) == math.inf
    assert nohd_linear_m(1e-9, MPE, divergence_full_63_rad=0.0, exit_diameter_63_m=1.0) == 0.0


def test_diffuse_light_by_angle_and_spot():
    straight = diffuse_distance_m(5.0, 25.0)
    assert straight == pytest.approx(math.sqrt(5.0 / (math.pi * 25.0)))
    oblique = diffuse_distance_m(5.0, 25.0, angle_rad=math.radians(60.0))
    assert oblique == pytest.approx(straight * math.sqrt(0.5))
    assert diffuse_distance_m(5.0, 25.0, angle_rad=math.radians(91.0)) == 0.0
    spread = diffuse_distance_m(5.0, 25.0, spot_radius_m=0.1)
    assert spread == pytest.approx(math.sqrt(straight**2 - 0.01))
    assert diffuse_distance_m(5.0, 25.0, spot_radius_m=1.0) == 0.0
    grey = diffuse_distance_m(5.0, 25.0, reflectance=0.25)
    assert grey == pytest.approx(straight / 2.0)
    assert diffuse_distance_m(5.0, 25.0, reflectance=0.0) == 0.0


@pytest.mark.parametrize("bad", [-1.0, math.nan, math.inf])
def test_impossible_input_is_refused(bad):
    with pytest.raises(OutOfRange):
        exact(power=bad)
    with pytest.raises(OutOfRange):
        exact(half_angle_86_rad=bad)
    with pytest.raises(OutOfRange):
        exact(waist_w_mm=bad)
    with pytest.raises(OutOfRange):
        exact(waist_at_m=math.nan)
    with pytest.raises(OutOfRange):
        nohd_linear_m(bad, MPE, divergence_full_63_rad=1e-3)
    with pytest.raises(OutOfRange):
        nohd_quadratic_m(1.0, MPE, divergence_full_63_rad=bad)
    with pytest.raises(OutOfRange):
        diffuse_distance_m(bad, MPE)
    with pytest.raises(OutOfRange):
        diffuse_distance_m(1.0, MPE, angle_rad=math.nan)
    with pytest.raises(OutOfRange, match="reflectance"):
        diffuse_distance_m(1.0, MPE, reflectance=1.01)
    with pytest.raises(OutOfRange, match="reflectance"):
        diffuse_distance_m(1.0, MPE, reflectance=-0.01)


@given(
    power=st.floats(1e-4, 100.0),
    angle=st.floats(1e-5, 0.1),
    exit_m=st.floats(0.0, 0.05),
)
def test_the_linear_distance_is_never_the_longer(power, angle, exit_m):
    beam = {"divergence_full_63_rad": angle, "exit_diameter_63_m": exit_m}
    linear = nohd_linear_m(power, MPE, **beam)
    assert linear <= nohd_quadratic_m(power, MPE, **beam) * (1.0 + 1e-12)


@given(
    power=st.floats(1e-3, 100.0),
    w=st.floats(0.05, 20.0),
    angle=st.floats(1e-5, 0.1),
    more=st.floats(1.0, 100.0),
)
def test_more_power_reaches_farther(power, w, angle, more):
    beam = {"waist_w_mm": w, "half_angle_86_rad": angle}
    assert exact(power * more, **beam) >= exact(power, **beam)
