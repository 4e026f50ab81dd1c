"""Beams in the open: their stretch above a limit, against closed forms and dense sampling."""

import itertools
import math
import random

import numpy as np
import pytest

from benchlay.exposure import OutOfRange
from benchlay.exposure.averaging import elliptical_fraction
from benchlay.exposure.beams import (
    Axis,
    far_field_m,
    from_axes,
    from_moments,
    hazardous_stretch,
)
from benchlay.exposure.distances import hazardous_span, nohd_quadratic_m
from benchlay.optics import moments

MPE = 18.0 * 0.25**-0.25
AREA = math.pi * 3.5e-3**2


@pytest.mark.parametrize("waist_at", [0.0, 0.3, 10.0, -2.0])
@pytest.mark.parametrize("angle", [0.0, 5e-4, 0.05])
@pytest.mark.parametrize("power", [5e-4, 2e-3, 1.0])
def test_a_round_beam_is_the_closed_form(waist_at, angle, power):
    found = hazardous_stretch(from_axes(Axis(0.5, angle, waist_at)), power, MPE, 7.0)
    expected = hazardous_span(
        power,
        MPE,
        aperture_mm=7.0,
        waist_w_mm=0.5,
        half_angle_86_rad=angle,
        waist_at_m=waist_at,
    )
    if expected is None or found is None:
        assert found == expected
    else:
        assert found == pytest.approx(expected, rel=1e-9, abs=1e-9)


def test_radii_follow_each_axis():
    beam = from_axes(Axis(0.1, 1e-3, 2.0), Axis(0.5, 2e-3, -1.0))
    w1, w2 = math.hypot(0.1, 3.0 - 2.0), math.hypot(0.5, 2.0 * (3.0 + 1.0))
    assert beam.radii_mm(3.0) == pytest.approx((w1, w2))
    assert beam.foci_m() == pytest.approx((-1.0, 2.0))


def test_two_foci_with_a_harmless_gap_between_are_one_stretch():
    # Two lines of light, 1 m and 9 m away, each wide the other way.
    beam = from_axes(Axis(0.02, 0.02, 1.0), Axis(0.02, 0.02, 9.0))
    power = 0.065
    over = [power * beam.share(7.0, z) > MPE * AREA for z in np.linspace(0.0, 12.0, 4001)]
    changes = sum(a != b for a, b in itertools.pairwise(over))
    assert changes == 4  # above at both foci, below before, between and after
    start, end = hazardous_stretch(beam, power, MPE, 7.0)
    at = np.linspace(0.0, 12.0, 4001)[over]
    assert start == pytest.approx(at[0], abs=0.003)
    assert end == pytest.approx(at[-1], abs=0.003)


def random_beam(dice):
    """A beam with coupled axes: from two waists, turned, through a lens that is turned too."""
    waists = [10 ** dice.uniform(-1.5, 0.5) for _ in range(2)]
    ahead = [dice.uniform(-2e3, 5e3) for _ in range(2)]
    quality = [dice.uniform(1.0, 5.0) for _ in range(2)]
    rows = moments.from_waists(633.0, 1.0, *waists, *ahead, *quality)
    turn = dice.uniform(0.0, math.pi)
    rows = moments.rotate(rows, math.cos(turn), math.sin(turn))
    bend = [dice.uniform(-1e-3, 1e-3) for _ in range(3)]
    return moments.kick(rows, *bend)


def of_moments(rows):
    xx, xy, yy, xu, xv, yu, yv, uu, uv, vv = (float(v) for v in rows)
    return from_moments((xx, xy, yy), (xu, xv, yu, yv), (uu, uv, vv))


def test_radii_of_any_beam_are_those_of_its_moments():
    dice = random.Random(2)
    for _ in range(30):
        rows = random_beam(dice)
        beam = of_moments(rows)
        for z in (0.0, 0.7, 30.0):
            later = moments.propagate(rows, z * 1e3, 1.0)
            matrix = 4.0 * np.array([[later[0], later[1]], [later[1], later[2]]])
            expected = np.sqrt(np.linalg.eigvalsh(matrix))
            assert beam.radii_mm(z) == pytest.approx(tuple(expected), rel=1e-7)


def test_stretch_of_any_beam_against_dense_sampling():
    dice = random.Random(4)
    hazardous = 0
    for _ in range(25):
        beam = of_moments(random_beam(dice))
        power = 10 ** dice.uniform(-3, -1)
        found = hazardous_stretch(beam, power, MPE, 7.0)
        at = np.linspace(0.0, 40.0, 1001)
        over = [power * beam.share(7.0, float(z)) > MPE * AREA for z in at]
        if found is None:
            assert not any(over)
            continue
        hazardous += 1
        seen = at[over]
        if len(seen):
            assert found.start_m <= seen[0]
            assert found.end_m >= min(seen[-1], 40.0)
        # At its end the aperture takes what is allowed, and nothing more beyond.
        assert power * beam.share(7.0, found.end_m) == pytest.approx(MPE * AREA, rel=1e-6)
        for further in (1.001, 1.1, 2.0, 10.0):
            assert power * beam.share(7.0, found.end_m * further) <= MPE * AREA
    assert hazardous > 10


def test_in_glass_angles_are_those_of_the_medium():
    rows = moments.from_waists(633.0, 1.5, 0.1, 0.2, 50.0, -30.0, 1.0, 1.0)
    xx, xy, yy, xu, xv, yu, yv, uu, uv, vv = (float(v) for v in rows)
    beam = from_moments((xx, xy, yy), (xu, xv, yu, yv), (uu, uv, vv), index=1.5)
    assert beam.foci_m() == pytest.approx((-0.03, 0.05))
    assert beam.radii_mm(0.05)[0] == pytest.approx(0.1)


def test_the_far_field_beside_the_exact_distance():
    beam = from_axes(Axis(0.5, 5e-4))
    # Worked by hand: 316.28 m by the quadratic formula; without the exit's size a hair more.
    in_63 = 1e-3 / math.sqrt(2.0)
    quadratic = nohd_quadratic_m(1.0, MPE, divergence_full_63_rad=in_63)
    assert far_field_m(beam, 1.0, MPE) == pytest.approx(quadratic)
    assert far_field_m(beam, 1.0, MPE) == pytest.approx(316.28, abs=0.01)
    assert far_field_m(from_axes(Axis(0.5, 0.0)), 1.0, MPE) == math.inf


def test_an_elliptical_beam_reaches_as_far_as_its_mean_angle_says():
    # Far away the peak counts: 2 P/(pi w1 w2) = MPE.
    beam = from_axes(Axis(0.5, 2e-4), Axis(0.5, 8e-4))
    expected = math.sqrt(2.0 * 1.0 / (math.pi * MPE * 2e-4 * 8e-4))
    assert hazardous_stretch(beam, 1.0, MPE, 7.0).end_m == pytest.approx(expected, rel=2e-3)


def test_a_thin_beam_keeps_its_radii():
    assert from_axes(Axis(1e-3, 0.1), Axis(0.02, 0.1)).radii_mm(0.0) == pytest.approx((1e-3, 0.02))


def test_a_waist_lies_at_the_exit_unless_it_is_said():
    assert from_axes(Axis(0.5, 1e-3)).foci_m() == (0.0, 0.0)


def test_one_parallel_axis():
    beam = from_axes(Axis(1.0, 0.0), Axis(1.0, 1e-3, 0.5))
    assert beam.foci_m() == pytest.approx((0.5, 0.5))
    end = hazardous_stretch(beam, 1e-2, MPE, 7.0).end_m
    share = elliptical_fraction(3.5, 1.0, math.hypot(1.0, end - 0.5))
    assert 1e-2 * share == pytest.approx(MPE * AREA)


def test_nothing_exceeds_a_limit_that_all_the_power_keeps():
    assert hazardous_stretch(from_axes(Axis(1e-3, 0.0)), MPE * AREA, MPE, 7.0) is None


def test_a_beam_that_does_not_spread_has_no_end():
    assert hazardous_stretch(from_axes(Axis(1.0, 0.0)), 1.0, MPE, 7.0) == (0.0, math.inf)


@pytest.mark.parametrize(
    "axis",
    [
        Axis(0.0, 1e-3),
        Axis(math.inf, 1e-3),
        Axis(1.0, -1e-3),
        Axis(1.0, math.inf),
        Axis(1.0, 1e-3, math.nan),
    ],
)
def test_what_is_no_beam_is_refused(axis):
    with pytest.raises(OutOfRange, match="no beam"):
        from_axes(axis)


@pytest.mark.parametrize(
    ("power", "limit"), [(-1.0, 1.0), (1.0, 0.0), (math.nan, 1.0), (math.inf, 1.0), (1.0, math.inf)]
)
def test_no_stretch_without_power_and_limit(power, limit):
    with pytest.raises(OutOfRange, match="no distance"):
        hazardous_stretch(from_axes(Axis(1.0, 1e-3)), power, limit, 7.0)
