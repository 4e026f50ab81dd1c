"""Classes of whole beams."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from benchlay.exposure import OutOfRange, Pulse
from benchlay.exposure.classes import (
    GaussianExit,
    classify_continuous,
    classify_pulsed,
    time_base_s,
)
from benchlay.exposure.emission import Level

# Common knowledge of the trade: the powers at which visible classes end.
VISIBLE = [
    (0.39e-3, "1"),
    (0.3901e-3, "2"),
    (1e-3, "2"),
    (1.001e-3, "3R"),
    (5e-3, "3R"),
    (5.001e-3, "3B"),
    (0.5, "3B"),
    (0.5001, "4"),
]


@pytest.mark.parametrize(("power", "name"), VISIBLE)
def test_continuous_red(power, name):
    found = classify_continuous(633.0, power)
    assert found.name == name
    assert found.unit == "W"


@pytest.mark.parametrize(
    ("wavelength", "power", "name"),
    [
        (1064.0, 1.95e-3, "1"),
        (1064.0, 2e-3, "3R"),
        (1064.0, 0.0101, "3B"),
        (1550.0, 1e-2, "1"),
        (10600.0, 0.6, "4"),
        (266.0, 7.9e-10, "1"),
        (266.0, 1e-3, "3B"),
        (266.0, 1.6e-3, "4"),
    ],
)
def test_continuous_invisible(wavelength, power, name):
    assert classify_continuous(wavelength, power).name == name


def test_no_class_2_for_invisible_light():
    assert classify_continuous(1064.0, 1e-4).limits["2"] is None


def test_a_wide_beam_is_1m_where_binoculars_gather_it():
    wide = GaussianExit(waist_w_mm=10.0, half_angle_86_rad=5e-4)
    found = classify_continuous(1064.0, 5e-3, wide)
    assert found.name == "1M"
    assert found.naked_eye < found.limits["1"] < found.binoculars
    assert classify_continuous(1064.0, 5e-3).name == "3R"


def test_a_wide_visible_beam_is_2m():
    wide = GaussianExit(waist_w_mm=10.0, half_angle_86_rad=5e-4)
    assert classify_continuous(633.0, 3e-3, wide).name == "2M"


def test_no_m_class_when_binoculars_gather_more_than_3b():
    # A beam that comes to a focus 2 m ahead: wide at the naked eye, narrow there.
    focused = GaussianExit(waist_w_mm=0.5, half_angle_86_rad=0.106, waist_at_m=2.0)
    found = classify_continuous(633.0, 0.6, focused)
    assert found.naked_eye <= found.limits["1"]
    assert found.binoculars > found.limits["3B"]
    assert found.name == "4"


def test_above_the_limit_of_3b_no_other_class_is_given():
    # Beyond 0.1 mm the eye's limit through 11 mm exceeds the limit of class 3B.
    found = classify_pulsed(1e5, Pulse(0.51, 1.0, 0.0))
    assert found.limits["1"] > 0.51 > found.limits["3B"]
    assert found.name == "4"


@pytest.mark.parametrize(
    ("wavelength", "naked_mm", "binoculars_mm"),
    [(355.0, 1.0, 7.0), (532.0, 7.0, 50.0), (1550.0, 3.5, 24.5)],
)
def test_apertures_of_the_two_conditions(wavelength, naked_mm, binoculars_mm):
    # A parallel beam of 20 mm radius: shares straight from 1 - exp(-2 a^2/w^2).
    found = classify_continuous(wavelength, 1.0, GaussianExit(20.0, 0.0))
    for share, diameter in ((found.naked_eye, naked_mm), (found.binoculars, binoculars_mm)):
        assert share == pytest.approx(1.0 - math.exp(-2.0 * (diameter / 40.0) ** 2))


def test_the_two_conditions_stand_at_their_distances():
    # 10 mrad from a point: 1 mm at 0.1 m, 20 mm at 2 m.
    found = classify_continuous(532.0, 1.0, GaussianExit(1e-3, 0.01))
    assert found.naked_eye == pytest.approx(1.0 - math.exp(-2.0 * 3.5**2), rel=1e-5)
    assert found.binoculars == pytest.approx(1.0 - math.exp(-2.0 * 1.25**2), rel=1e-5)


def test_without_binoculars_the_exit_itself_is_judged():
    for wavelength, diameter in ((302.4, 1.0), (4000.0, 3.5)):
        found = classify_continuous(wavelength, 1.0, GaussianExit(2.0, 0.5))
        expected = 1.0 - math.exp(-2.0 * (diameter / 4.0) ** 2)
        assert found.naked_eye == found.binoculars == pytest.approx(expected)


def test_far_infrared_has_no_binoculars():
    wide = GaussianExit(waist_w_mm=10.0, half_angle_86_rad=1e-3)
    found = classify_continuous(10600.0, 1.0, wide)
    assert found.binoculars == found.naked_eye


def test_pulsed_limits_follow_the_rules_for_trains():
    # 1064 nm, 10 ns, 1 kHz, 100 s: 7.7e-7 J x C5, N = 1e4 in T2 = 10 s, C5 = 0.5.
    found = classify_pulsed(1064.0, Pulse(1e-3, 1e-8, 1e3))
    assert found.unit == "J"
    assert found.limits["1"] == pytest.approx(3.85e-7)
    # Class 3B: no C5, and 0.5 W shared by a thousand pulses a second.
    assert found.limits["3B"] == pytest.approx(5e-4)
    assert found.name == "4"


def test_a_single_pulse():
    found = classify_pulsed(532.0, Pulse(1e-2, 1e-8, 0.0))
    assert found.limits["1"] == pytest.approx(7.7e-8)
    assert found.limits["3B"] == pytest.approx(0.03)
    assert found.name == "3B"


def test_a_pulse_longer_than_the_glance_keeps_the_power_of_class_2():
    found = classify_pulsed(633.0, Pulse(4e-4, 0.5, 1.0))
    assert found.limits["2"] == pytest.approx(1e-3 * 0.5)


@pytest.mark.parametrize(
    ("level", "wavelength", "seconds"),
    [
        (Level.TWO, 532.0, 0.25),
        (Level.THREE_R, 532.0, 0.25),
        (Level.THREE_R, 1064.0, 100.0),
        (Level.ONE, 532.0, 100.0),
        (Level.THREE_B, 355.0, 3e4),
    ],
)
def test_classes_use_their_own_time_bases(level, wavelength, seconds):
    assert time_base_s(level, wavelength) == seconds


def test_the_statement_promises_no_more_than_the_model():
    assert classify_continuous(633.0, 1e-5).statement == "within the limit of class 1 as modelled"
    assert classify_continuous(633.0, 10.0).statement == "above the limit of class 3B as modelled"
    assert classify_continuous(633.0, 10.0).cautions


@pytest.mark.parametrize("power", [-1.0, math.nan, math.inf])
def test_impossible_power_is_refused(power):
    with pytest.raises(OutOfRange, match="emitted"):
        classify_continuous(633.0, power)


ORDER = ("1", "1M", "2", "2M", "3R", "3B", "4")


@given(
    wl=st.floats(180.0, 1e6),
    power=st.floats(-10.0, 2.0).map(lambda x: 10.0**x),
    more=st.floats(1.0, 1e4),
    w=st.floats(0.05, 50.0),
)
def test_more_power_never_gives_a_lower_class(wl, power, more, w):
    beam = GaussianExit(w, 1e-3)
    for given_beam in (None, beam):
        weak = classify_continuous(wl, power, given_beam).name
        strong = classify_continuous(wl, power * more, given_beam).name
        assert ORDER.index(strong) >= ORDER.index(weak)


def test_limits_that_rest_on_memory_are_named():
    # 0.5 W, 5 mW and 1 mW stand in public texts, the limit of class 1 was recalled.
    assert "limits of class 1 from memory" in classify_continuous(633.0, 1e-3).source
    assert "limits of class 1, 3R from memory" in classify_continuous(1064.0, 1e-3).source
    # From 400 to 450 nm the long limit of class 1 is published as 0.039 mW.
    assert "limits of class" not in classify_continuous(440.0, 1e-3).source
    # C5 is from memory, so is what it lowers; 0.5 W among 10 000 pulses is not.
    fast = classify_pulsed(633.0, Pulse(1e-9, 1e-8, 1e4))
    assert "limits of class 1, 2, 3R from memory" in fast.source


def test_any_form_of_beam_is_classified():
    class Half:
        def share(self, aperture_mm, distance_m):
            return 0.5

    assert classify_continuous(633.0, 7.5e-4, Half()).name == "1"


def below(x):
    return math.nextafter(x, 0.0)


@pytest.mark.parametrize(
    ("wavelength", "naked_mm", "naked_m", "wide_mm", "wide_m"),
    [
        (below(302.5), 1.0, 0.0, 1.0, 0.0),
        (302.5, 1.0, 0.1, 7.0, 2.0),
        (below(400.0), 1.0, 0.1, 7.0, 2.0),
        (400.0, 7.0, 0.1, 50.0, 2.0),
        (below(1400.0), 7.0, 0.1, 50.0, 2.0),
        (1400.0, 3.5, 0.1, 24.5, 2.0),
        (below(4000.0), 3.5, 0.1, 24.5, 2.0),
        (4000.0, 3.5, 0.0, 3.5, 0.0),
        (below(1e5), 3.5, 0.0, 3.5, 0.0),
        (1e5, 11.0, 0.0, 11.0, 0.0),
    ],
)
def test_both_conditions_on_both_sides_of_their_edges(
    wavelength, naked_mm, naked_m, wide_mm, wide_m
):
    asked = []

    class Listening:
        def share(self, aperture_mm, distance_m):
            asked.append((aperture_mm, distance_m))
            return 1.0

    classify_continuous(wavelength, 1e-3, Listening())
    assert set(asked) == {(naked_mm, naked_m), (wide_mm, wide_m)}


@pytest.mark.parametrize(
    ("level", "wavelength", "seconds"),
    [
        (Level.THREE_R, below(400.0), 3e4),
        (Level.THREE_R, 400.0, 0.25),
        (Level.THREE_R, below(700.0), 0.25),
        (Level.THREE_R, 700.0, 100.0),
        (Level.ONE, below(400.0), 3e4),
        (Level.ONE, 400.0, 100.0),
        (Level.THREE_B, 400.0, 100.0),
    ],
)
def test_time_bases_on_both_sides_of_their_edges(level, wavelength, seconds):
    assert time_base_s(level, wavelength) == seconds


@pytest.mark.parametrize(("wavelength", "exists"), [(below(302.5), False), (302.5, True)])
def test_class_3r_begins_at_302_5_nm(wavelength, exists):
    assert (classify_continuous(wavelength, 1e-9).limits["3R"] is not None) is exists


@pytest.mark.parametrize(
    ("wavelength", "exists"),
    [(below(400.0), False), (400.0, True), (below(700.0), True), (700.0, False)],
)
def test_class_2_is_for_visible_light(wavelength, exists):
    assert (classify_continuous(wavelength, 1e-9).limits["2"] is not None) is exists


def test_each_class_ends_at_its_limit_and_not_before():
    # One by one at the limit and a hair above: the two sides of every class.
    for wavelength in (355.0, 532.0, 1064.0, 1550.0):
        limits = classify_continuous(wavelength, 0.0).limits
        order = [name for name in ("1", "2", "3R", "3B") if limits[name] is not None]
        for name, after in zip(order, [*order[1:], "4"], strict=True):
            assert classify_continuous(wavelength, limits[name]).name == name
            above = math.nextafter(limits[name], math.inf)
            assert classify_continuous(wavelength, above).name == after
