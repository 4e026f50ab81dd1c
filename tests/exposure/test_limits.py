"""Single exposures: the rows, their exact boundaries, and what is refused."""

import math

import pytest
from hypothesis import example, given
from hypothesis import strategies as st

from benchlay.exposure.errors import OutOfRange
from benchlay.exposure.factors import c3, c6, check_duration, check_wavelength, t2_s
from benchlay.exposure.limits import EDITION, eye_limit, skin_limit
from benchlay.exposure.tables import retina_photochemical, retina_thermal, skin

WAVELENGTHS = st.floats(180.0, 1e6)
DURATIONS = st.floats(-13.0, math.log10(3e4)).map(lambda x: min(10.0**x, 3e4))


def below(value):
    return math.nextafter(value, 0.0)


# wavelength, boundary in s, dose just below it, dose at it
TIME_STEPS = [
    (250.0, 1e-9, 3e10 * 1e-9, 30.0),
    (310.0, 1e-9, 3e10 * 1e-9, 5600.0 * 1e-9**0.25),
    (350.0, 10.0, 5600.0 * 10**0.25, 1e4),
    (350.0, 1e3, 1e4, 1e4),
    (633.0, 1e-11, 1e-3, 2e-3),
    (633.0, 5e-6, 2e-3, 18.0 * 5e-6**0.75),
    (633.0, 10.0, 18.0 * 10**0.75, 100.0),
    (1064.0, 1e-11, 1e-2, 2e-2),
    (1064.0, 13e-6, 2e-2, 90.0 * 13e-6**0.75),
    (1064.0, 10.0, 90.0 * 10**0.75, 500.0),
    (440.0, 10.0, 18.0 * 10**0.75, 100.0),
    (440.0, 100.0, 100.0, 100.0),
    (1450.0, 1e-9, 1e3, 1e3),
    (1450.0, 1e-3, 1e3, 5600.0 * 1e-3**0.25),
    (1450.0, 10.0, 5600.0 * 10**0.25, 1e4),
    (1550.0, 1e-9, 1e4, 1e4),
    (1550.0, 10.0, 1e4, 1e4),
    (10600.0, 1e-9, 100.0, 100.0),
    (10600.0, 1e-7, 100.0, 5600.0 * 1e-7**0.25),
]


@pytest.mark.parametrize(("wavelength", "time", "low", "high"), TIME_STEPS)
def test_time_step_is_on_its_exact_side(wavelength, time, low, high):
    before = eye_limit(wavelength, below(time)).dose_j_m2
    assert before == pytest.approx(low, rel=1e-9)
    assert eye_limit(wavelength, time).dose_j_m2 == pytest.approx(high, rel=1e-9)


# boundary in nm, duration, dose just below it, dose at it
WAVELENGTH_STEPS = [
    (302.5, 100.0, 30.0, 10**1.5),
    (315.0, 100.0, 10**4.0, 1e4),
    (400.0, 1.0, 5600.0, 18.0),
    (1050.0, 1e-6, 2e-3 * 10**0.7, 2e-2),
    (1050.0, 10.0, 100.0 * 10**0.7, 500.0),
    (1150.0, 10.0, 500.0, 500.0),
    (1200.0, 1.0, 90.0 * 10**0.9, 90.0 * (8.0 + 10**-2.0)),
    (1400.0, 1e-6, 11000.0 * 5 * 1e-6**0.25, 1e3),
    (1500.0, 1e-6, 1e3, 1e4),
    (1800.0, 1e-6, 1e4, 1e3),
    (2600.0, 1e-8, 1e3, 100.0),
]


@pytest.mark.parametrize(("wavelength", "time", "low", "high"), WAVELENGTH_STEPS)
def test_wavelength_step_is_on_its_exact_side(wavelength, time, low, high):
    before = eye_limit(below(wavelength), time).dose_j_m2
    assert before == pytest.approx(low, rel=1e-9)
    assert eye_limit(wavelength, time).dose_j_m2 == pytest.approx(high, rel=1e-9)


def test_c1_holds_up_to_t1_and_c2_after_it():
    t1 = 1e-15 * 10 ** (0.8 * 15.0)
    assert eye_limit(310.0, below(t1)).governs == "thermal"
    assert eye_limit(310.0, t1 * 1.01).governs == "photochemical"
    assert eye_limit(310.0, t1 * 1.01).value == pytest.approx(1000.0)


def test_the_photochemical_limit_governs_blue_light_of_long_exposure():
    limit = eye_limit(440.0, 1000.0)
    assert (limit.value, limit.unit, limit.governs) == (1.0, "W/m2", "photochemical")


def test_the_blue_limit_ends_at_600_nm():
    # At 600 nm C3 would be 10^3; just below it heat has long since taken over.
    assert retina_photochemical(below(600.0), 100.0, 1.5).value == pytest.approx(1e3)
    assert retina_photochemical(600.0, 100.0, 1.5) is None


def test_heat_overtakes_blue_light_at_500_nm_in_long_exposures():
    assert eye_limit(499.0, 1e4).governs == "photochemical"
    assert eye_limit(501.0, 1e4).governs == "thermal"


@pytest.mark.parametrize(
    ("wavelength", "alpha", "first_s"),
    [
        (483.9, 1.6, 1.0),
        (483.9, 82.0, 1.0),
        (483.9, 82.1, 10.0),
        (483.9, 1.5, 10.0),
        (484.0, 10.0, 10.0),
    ],
)
def test_blue_limit_begins_early_for_moderate_sources(wavelength, alpha, first_s):
    assert retina_photochemical(wavelength, below(first_s), alpha) is None
    assert retina_photochemical(wavelength, first_s, alpha) is not None


def test_extended_source_just_above_the_smallest_is_not_smoothed():
    assert eye_limit(633.0, 10.0, alpha_mrad=1.5).irradiance_w_m2 == 10.0
    above = eye_limit(633.0, 10.0, alpha_mrad=math.nextafter(1.5, 2.0))
    assert above.irradiance_w_m2 == pytest.approx(18.0 * 10**-0.25)


def test_extended_source_stops_gaining_with_time_at_t2():
    alpha = 50.0
    t2 = t2_s(alpha)
    limit = eye_limit(800.0, t2 * 1.01, alpha_mrad=alpha)
    expected = 18.0 * 10**0.2 * (50.0 / 1.5) * t2**-0.25
    assert limit.value == pytest.approx(expected)
    assert limit.unit == "W/m2"
    assert eye_limit(800.0, t2, alpha_mrad=alpha).unit == "J/m2"


def test_the_front_of_the_eye_caps_the_retina_near_1400_nm():
    limit = eye_limit(1390.0, 100.0)
    assert (limit.value, limit.governs) == (1e4, "anterior")
    assert any("skin" in note for note in limit.assumptions)
    # 50 C7 overtakes the skin's 1e4 W/m2 where C7 = 200, near 1307 nm.
    assert eye_limit(1306.0, 100.0).governs == "thermal"
    assert eye_limit(1309.0, 100.0).governs == "anterior"


@pytest.mark.parametrize(
    ("time", "low", "high"),
    [
        (1e-9, 200.0, 200.0),
        (1e-7, 200.0, 1.1e4 * 1e-7**0.25),
        (10.0, 1.1e4 * 10**0.25, 2e4),
    ],
)
def test_skin_steps(time, low, high):
    assert skin_limit(532.0, below(time)).dose_j_m2 == pytest.approx(low, rel=1e-9)
    assert skin_limit(532.0, time).dose_j_m2 == pytest.approx(high, rel=1e-9)


def test_skin_follows_the_eye_in_the_ultraviolet_and_far_infrared():
    for wavelength in (250.0, 305.0, 350.0, 1450.0, 1550.0, 10600.0):
        for time in (1e-10, 1e-5, 1.0, 100.0):
            eye, on_skin = eye_limit(wavelength, time), skin_limit(wavelength, time)
            assert (eye.value, eye.unit) == (on_skin.value, on_skin.unit)


@pytest.mark.parametrize(
    ("area", "value"), [(0.005, 1000.0), (0.01, 1000.0), (0.05, 200.0), (1.0, 100.0)]
)
def test_a_large_area_of_skin_bears_less(area, value):
    limit = skin_limit(10600.0, 100.0, exposed_area_m2=area)
    assert limit.value == pytest.approx(value)


def test_a_small_area_is_assumed_aloud():
    assert any("0.01 m2" in n for n in skin_limit(10600.0, 100.0).assumptions)


def test_sources_name_edition_table_and_memory():
    recalled = eye_limit(1064.0, 1e-8).source
    seen = eye_limit(633.0, 0.25).source
    assert recalled.startswith(f"{EDITION}, table A.1")
    assert "this value from memory" in recalled
    assert "this value from memory" not in seen
    assert "table A.2" in eye_limit(633.0, 0.25, alpha_mrad=10.0).source


@pytest.mark.parametrize("wavelength", [179.9, 1.001e6, 0.0, -5.0, math.nan, math.inf])
def test_no_limit_outside_the_wavelengths(wavelength):
    for function in (eye_limit, skin_limit):
        with pytest.raises(OutOfRange, match="180 nm to 1 mm"):
            function(wavelength, 1.0)


@pytest.mark.parametrize("time", [0.99e-13, 0.0, -1.0, 30001.0, math.nan, math.inf])
def test_no_limit_outside_the_durations(time):
    for function in (eye_limit, skin_limit):
        with pytest.raises(OutOfRange, match="1e-13 s to 30000 s"):
            function(532.0, time)


@pytest.mark.parametrize("alpha", [-0.1, math.nan, math.inf])
def test_no_limit_for_an_impossible_angle(alpha):
    with pytest.raises(OutOfRange, match="angular subtense"):
        eye_limit(532.0, 1.0, alpha_mrad=alpha)


@pytest.mark.parametrize("area", [0.0, -1.0, math.nan])
def test_no_skin_limit_for_an_impossible_area(area):
    with pytest.raises(OutOfRange, match="area must be positive"):
        skin_limit(10600.0, 100.0, exposed_area_m2=area)


def test_the_ends_themselves_are_inside_even_after_rounding():
    assert check_wavelength(180.0) == 180.0
    assert check_wavelength(1e6 * (1 + 2e-16)) == 1e6
    assert check_duration(math.nextafter(1e-13, 0.0)) == 1e-13
    assert check_duration(3e4) == 3e4
    assert eye_limit(1e6, 3e4).aperture_mm == 11.0


@given(wl=WAVELENGTHS, t=DURATIONS)
@example(wl=400.0, t=10.0)
def test_limits_are_positive_finite_and_agree_with_their_units(wl, t):
    for limit in (eye_limit(wl, t), skin_limit(wl, t)):
        assert 0.0 < limit.value < math.inf
        assert limit.dose_j_m2 == pytest.approx(limit.irradiance_w_m2 * t)


@given(wl=WAVELENGTHS, t=DURATIONS, longer=st.floats(1.0, 1e4))
@example(wl=350.0, t=below(10.0), longer=1.0000001)
@example(wl=633.0, t=below(1e-11), longer=1.0000001)
def test_irradiance_never_rises_with_time_but_at_known_steps(wl, t, longer):
    # Two steps of the table go up: doubled at 10 ps, and 0.42 % at 10 s in the
    # ultraviolet and the infrared.
    later = min(t * longer, 3e4)
    doubled = 400.0 <= wl < 1400.0 and t < 1e-11 <= later
    allowed = 2.0 if doubled else 1.005
    first, second = eye_limit(wl, t), eye_limit(wl, later)
    assert second.irradiance_w_m2 <= first.irradiance_w_m2 * allowed


@given(wl=WAVELENGTHS, t=DURATIONS, longer=st.floats(1.0, 1e4))
@example(wl=633.0, t=below(5e-6), longer=1.0000001)
def test_dose_never_falls_with_time_but_at_known_steps(wl, t, longer):
    # Known steps down: 4.9 % at 5 us, 2.6 % at 13 us, 2.2 % on skin, 1.2 % at 10 s.
    first, second = eye_limit(wl, t), eye_limit(wl, min(t * longer, 3e4))
    assert second.dose_j_m2 >= first.dose_j_m2 * 0.93


@given(t=DURATIONS, alpha=st.floats(0.0, 200.0), more=st.floats(0.0, 200.0))
def test_a_larger_source_never_lowers_the_thermal_limit(t, alpha, more):
    small = retina_thermal(532.0, t, alpha).dose_j_m2(t)
    large = retina_thermal(532.0, t, alpha + more).dose_j_m2(t)
    assert large >= small * (1.0 - 1e-12)


@given(wl=st.floats(400.0, 1399.0), t=DURATIONS, alpha=st.floats(0.0, 200.0))
def test_the_smallest_of_all_limits_is_taken(wl, t, alpha):
    limit = eye_limit(wl, t, alpha_mrad=alpha)
    every = [retina_thermal(wl, t, alpha)]
    if (blue := retina_photochemical(wl, t, alpha)) is not None:
        every.append(blue)
    if wl >= 1250.0:
        every.append(skin(wl, t))
    assert limit.dose_j_m2 == min(cell.dose_j_m2(t) for cell in every)


@given(wl=st.floats(400.0, 599.0), longer=st.floats(0.0, 1.0))
def test_longer_wavelengths_are_less_blue(wl, longer):
    assert c3(min(wl + longer, 599.5)) >= c3(wl)


@given(t=DURATIONS, alpha=st.floats(0.0, 500.0))
def test_c6_lies_between_one_and_its_published_maximum(t, alpha):
    assert 1.0 <= c6(alpha, t) <= 66.7
