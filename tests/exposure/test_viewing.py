"""How far from a lit matt surface: against a plain search from afar."""

import math
import random

import numpy as np
import pytest

from benchlay.exposure import OutOfRange, Pulse, eye_limit
from benchlay.exposure.viewing import viewing_distance_m
from tests.exposure import oracle

GREEN_MPE = 18.0 * 0.25**-0.25


def test_a_point_is_the_plain_formula():
    plain = math.sqrt(0.8 * 5.0 / (math.pi * GREEN_MPE))
    assert viewing_distance_m(532.0, 0.25, 5.0, reflectance=0.8) == pytest.approx(plain)


def test_a_point_may_be_nearer_than_the_eye_can_focus():
    plain = math.sqrt(1e-3 / (math.pi * GREEN_MPE))
    assert plain < 0.1
    assert viewing_distance_m(532.0, 0.25, 1e-3) == pytest.approx(plain)
    assert viewing_distance_m(532.0, 0.25, 1e-3, spot_d63_mm=5.0) == pytest.approx(plain)


def test_a_spot_is_solved_for_its_own_angle():
    # 100 W for 0.25 s, 10 mm: C6 = (10/r)/1.5, so r = 100 * 1.5/(10 pi E), in metres.
    expected = 100.0 * 1.5 / (10.0 * math.pi * GREEN_MPE)
    assert 0.1 < expected < 10.0 / 1.5
    assert viewing_distance_m(532.0, 0.25, 100.0, spot_d63_mm=10.0) == pytest.approx(expected)


def test_the_size_of_a_spot_never_brings_it_below_100_mm():
    assert viewing_distance_m(532.0, 0.25, 5.0) == pytest.approx(0.25, abs=0.002)
    assert viewing_distance_m(532.0, 0.25, 5.0, spot_d63_mm=2.0) == 0.1


def test_far_away_a_spot_is_a_point():
    point = viewing_distance_m(532.0, 0.25, 1000.0)
    assert 1.0 / point < 1.5
    assert viewing_distance_m(532.0, 0.25, 1000.0, spot_d63_mm=1.0) == point


def test_the_small_step_at_the_smallest_angle_is_on_the_far_side():
    # From 10 s on the limit steps up 1.2 % where the source passes 1.5 mrad: between the two
    # a spot is too bright just outside the step and not inside it.
    d63 = 15.0
    power = math.pi * 10.06 * 10.0**2  # at 10 m, where it fills 1.5 mrad: 10.06 W/m2
    found = viewing_distance_m(633.0, 10.0, power, spot_d63_mm=d63)
    assert found == pytest.approx(10.0 * math.sqrt(10.06 / 10.0))
    assert found > 10.0


@pytest.mark.parametrize("wavelength", [355.0, 1550.0, 10600.0])
def test_only_the_retina_sees_a_size(wavelength):
    point = viewing_distance_m(wavelength, 100.0, 5.0)
    assert viewing_distance_m(wavelength, 100.0, 5.0, spot_d63_mm=50.0) == point


def searched(wl, t, power, d63):
    """Farthest of many distances at which the limit is exceeded, the spot's angle in it."""
    point = math.sqrt(power * t / (math.pi * oracle.eye(wl, t)))
    at = np.geomspace(0.1, max(point, 0.1) * 1.001, 4000)
    over = [r for r in at if power * t / (math.pi * r * r) > oracle.eye(wl, t, d63 / r)]
    return max(over, default=min(point, 0.1))


def test_against_a_search_from_afar():
    dice = random.Random(3)
    for _ in range(60):
        wl = dice.choice([440.0, 460.0, 532.0, 633.0, 850.0, 1064.0, 1300.0])
        t = dice.choice([1e-3, 0.25, 2.0, 10.0, 30.0, 100.0])
        power, d63 = 10 ** dice.uniform(-2, 3.5), 10 ** dice.uniform(-1, 2)
        found = viewing_distance_m(wl, t, power, spot_d63_mm=d63)
        # The steps of the search are 0.2 % at most.
        assert found == pytest.approx(searched(wl, t, power, d63), rel=2.5e-3)


def test_pulses_are_held_to_the_strictest_of_their_rules():
    pulse = Pulse(energy_j=0.1, duration_s=1e-8, rate_hz=10.0)
    # 0.25 s: single pulse and no C5; 2 mJ/m2 for a point.
    point = math.sqrt(0.1 / (math.pi * 2e-3))
    assert viewing_distance_m(532.0, 0.25, pulse) == pytest.approx(point)
    # 20 mm at 3.2 m: alpha_max of a short pulse is 5 mrad, C6 is 10/3 from 4 m inwards.
    spot = viewing_distance_m(532.0, 0.25, pulse, spot_d63_mm=20.0)
    assert spot == pytest.approx(point / math.sqrt(5.0 / 1.5))
    assert spot < 4.0


def test_pulses_against_a_search_from_afar():
    dice = random.Random(5)
    for _ in range(8):
        rate, d63 = 10 ** dice.uniform(0, 1.5), 10 ** dice.uniform(0, 2)
        energy, duration = 10 ** dice.uniform(-3, 0), dice.choice([1e-8, 1e-4, 2e-3])
        found = viewing_distance_m(850.0, 10.0, Pulse(energy, duration, rate), spot_d63_mm=d63)
        at = np.geomspace(0.1, 20.0, 800)
        over = [
            r
            for r in at
            if energy / (math.pi * r * r) > oracle.train(850.0, 10.0, duration, rate, d63 / r)
        ]
        point = math.sqrt(energy / (math.pi * oracle.train(850.0, 10.0, duration, rate)))
        # The steps of the search are 0.66 %.
        assert found == pytest.approx(max(over, default=min(0.1, point)), rel=8e-3)


def test_what_cannot_be_is_refused():
    for diameter in (-1.0, math.nan, math.inf):
        with pytest.raises(OutOfRange, match="diameter"):
            viewing_distance_m(532.0, 0.25, 1.0, spot_d63_mm=diameter)
    with pytest.raises(OutOfRange, match="reflectance"):
        viewing_distance_m(532.0, 0.25, 1.0, reflectance=1.5)
    with pytest.raises(OutOfRange, match="power"):
        viewing_distance_m(532.0, 0.25, -1.0)


def test_the_limit_is_met_at_the_distance():
    r = viewing_distance_m(850.0, 100.0, 500.0, spot_d63_mm=30.0)
    limit = eye_limit(850.0, 100.0, alpha_mrad=30.0 / r).irradiance_w_m2
    assert 500.0 / (math.pi * r * r) == pytest.approx(limit)
