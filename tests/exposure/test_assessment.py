"""One beam by itself: against published numbers and formulas worked apart."""

import math

import pytest

from benchlay.exposure import OutOfRange, Pulse
from benchlay.exposure.assessment import Exit, assess, question

GREEN_MPE = 18.0 * 0.25**-0.25
AREA = math.pi * 3.5e-3**2


def told(found, *words):
    return any(all(word in note for word in words) for note in found.assumptions)


def test_the_worked_example_of_a_hazard_distance():
    # Worked apart: 1 W, 0.25 s, 1 mm, 1 mrad: 316.20 m, 316.28 m quadratic, 315.28 m linear.
    reach = assess(question(532.0, 1.0, 0.25, Exit(1.0, 1e-3))).reach
    assert reach.span == (0.0, pytest.approx(316.20, abs=0.01))
    assert reach.quadratic_m == pytest.approx(316.28, abs=0.01)
    assert reach.linear_m == pytest.approx(315.28, abs=0.01)


@pytest.mark.parametrize(
    ("wavelength", "seconds", "mpe"),
    [
        (488.0, 0.25, 25.5),  # published: 2.55 mW/cm2
        (1064.0, 10.0, 50.0),  # published: 5 mW/cm2
        (10600.0, 10.0, 1000.0),  # published: 0.1 W/cm2
        (250.0, 3e4, 1e-3),  # published: 30 J/m2 over 30000 s
    ],
)
def test_limits_of_continuous_light(wavelength, seconds, mpe):
    found = assess(question(wavelength, 1e-3, seconds))
    assert found.eye[0].limit.value == pytest.approx(mpe, rel=5e-3)
    assert found.eye[0].limit.unit == "W/m2"


def test_a_published_density():
    # 3.8 W/cm2 at 488 nm against 2.55 mW/cm2: 3.2.
    found = assess(question(488.0, 3.8e4 * AREA, 0.25))
    assert found.density == pytest.approx(3.2, abs=0.05)


def test_a_train_is_held_to_every_rule_and_the_strictest_is_first():
    # Worked apart: 0.02 single, 0.05 average, 0.01 J/m2 repeated, C5 = 0.5.
    found = assess(question(1064.0, Pulse(1e-3, 1e-8, 1e3), 10.0))
    assert [(h.rule, round(h.limit.value, 9)) for h in found.eye] == [
        ("thermal, repeated", 0.01),
        ("single pulse", 0.02),
        ("average", 0.05),
    ]
    assert found.eye[0].exposure == pytest.approx(1e-3 / AREA)
    assert found.density == pytest.approx(math.log10(1e-3 / AREA / 0.01))


def test_the_density_follows_the_rule_that_the_beam_exceeds_most():
    # From 1400 nm on the rules have apertures of their own: a narrow beam is judged by the
    # single pulse through 1 mm, although the average through 3.5 mm is the smaller number.
    found = assess(question(10600.0, Pulse(1e-3, 1e-6, 11.0), 100.0, Exit(0.8, 0.05)))
    single, average = 5600.0 * 1e-6**0.25, 1e5 / 1100.0
    assert found.eye[0].limit.value == pytest.approx(average)
    share = 1.0 - math.exp(-2.0 * (1.0 / 0.8) ** 2)
    expected = 1e-3 * share / (math.pi * 0.5e-3**2) / single
    assert found.strictest.ratio == pytest.approx(expected)
    assert found.density == pytest.approx(math.log10(expected))
    assert told(found, "single pulse", "density follows")


def test_a_narrow_beam_is_averaged_over_the_aperture():
    found = assess(question(532.0, 1e-3, 0.25, Exit(0.3, 2.5e-3)))
    assert found.eye[0].exposure == pytest.approx(1e-3 / AREA)
    assert found.skin[0].exposure == pytest.approx(1e-3 / (math.pi * 1.75e-3**2))


def test_a_wide_beam_is_averaged_too():
    found = assess(question(532.0, 1e-3, 0.25, Exit(20.0, 1e-3)))
    share = 1.0 - math.exp(-2.0 * (3.5 / 10.0) ** 2)
    assert found.eye[0].exposure == pytest.approx(1e-3 * share / AREA)


def test_without_a_beam_the_distance_is_not_guessed():
    found = assess(question(532.0, 1e-3))
    assert found.reach is None
    assert told(found, "hazard distance cannot be computed")
    assert told(found, "narrower", "higher number")


def test_a_beam_within_the_limit_has_no_distance():
    # 0.1 mW through 7 mm is little; the formulas know only the peak of a narrow beam.
    reach = assess(question(532.0, 1e-4, 0.25, Exit(1.0, 1e-3))).reach
    assert reach.span is None
    d63, wide = 1e-3 / math.sqrt(2.0), math.sqrt(4.0 * 1e-4 / (math.pi * GREEN_MPE))
    assert reach.linear_m == pytest.approx((wide - d63) / d63)


def test_default_times_are_told():
    for wavelength, seconds in ((355.0, 3e4), (532.0, 100.0), (1064.0, 100.0)):
        found = assess(question(wavelength, 1e-3))
        assert found.question.exposure_s == seconds
        assert told(found, "no exposure given", f"{seconds:g} s")
    assert not told(assess(question(532.0, 1e-3, 100.0)), "no exposure given")


def test_a_glance_is_for_visible_light_and_told():
    assert told(assess(question(532.0, 1e-3, 0.25)), "accidental viewing", "not reliable")


@pytest.mark.parametrize("wavelength", [355.0, math.nextafter(400.0, 0.0), 700.0, 1064.0, 10600.0])
@pytest.mark.parametrize("seconds", [0.1, 0.25, math.nextafter(1.0, 0.0)])
def test_a_glance_at_what_nobody_sees_is_refused(wavelength, seconds):
    with pytest.raises(OutOfRange, match="only for accidental viewing of visible light"):
        question(wavelength, 1e-3, seconds)


@pytest.mark.parametrize("wavelength", [400.0, math.nextafter(700.0, 0.0)])
def test_the_ends_of_visible_light_may_be_glanced_at(wavelength):
    assert question(wavelength, 1e-3, 0.25).exposure_s == 0.25


@pytest.mark.parametrize("seconds", [math.nextafter(0.1, 0.0), 1.0, 5.0])
def test_what_ends_other_exposures_to_invisible_light_is_told(seconds):
    found = assess(question(1064.0, 1e-3, seconds))
    assert found.eye[0].limit.irradiance_w_m2 == pytest.approx(90.0 * seconds**-0.25)
    assert told(found, "the source or a shutter ends the exposure")


def test_a_pulse_that_fills_the_exposure_is_refused():
    with pytest.raises(OutOfRange, match="fills the whole exposure"):
        question(532.0, Pulse(1e-3, 0.25, 0.0), 0.25)
    with pytest.raises(OutOfRange, match="overlap"):
        question(532.0, Pulse(1e-3, 1e-3, 1e3), 10.0)


def test_a_beam_that_cannot_be_is_computed_as_written_and_told():
    # 10.6 um, 5 mm and 1 mrad: M2 = pi 5e-3 1e-3/(4 10.6e-6) = 0.37.
    found = assess(question(10600.0, 10.0, 10.0, Exit(5.0, 1e-3)))
    assert told(found, "M² would be 0.37")
    assert not told(assess(question(10600.0, 10.0, 10.0, Exit(5.0, 3e-3))), "M²")


def test_class_keeps_its_own_time_bases():
    # 5 mW of green light is class 3R for 0.25 s whatever the exposure asked for.
    for seconds in (0.25, 10.0, 3e4):
        found = assess(question(532.0, 4.9e-3, seconds))
        assert found.classification.name == "3R"
    assert told(found, "time bases", "3R: 0.25 s", "1: 100 s")


def test_a_scattering_surface_sees_the_beam_at_its_exit():
    point = assess(question(532.0, 100.0, 0.25)).diffuse_m
    spot = assess(question(532.0, 100.0, 0.25, Exit(10.0 * math.sqrt(2.0), 1e-3))).diffuse_m
    assert point == pytest.approx(math.sqrt(100.0 / (math.pi * GREEN_MPE)))
    # The same spot of 10 mm as worked in the tests of viewing.
    assert spot == pytest.approx(100.0 * 1.5 / (10.0 * math.pi * GREEN_MPE))


def test_eyewear_that_does_not_exist_is_told():
    found = assess(question(1064.0, 1e9, 10.0))
    assert found.scale.text is None
    assert told(found, "nothing up to LB10 suffices")


def test_the_factor_for_wide_beams_is_told_where_it_is_applied():
    # Published: 600 W of 1064 nm over 40 mm (63 %) need LB7.
    found = assess(question(1064.0, 600.0, 10.0, Exit(40.0 * math.sqrt(2.0), 1e-3)))
    assert found.scale.text == "D LB7"
    assert told(found, "factor for wide beams")
    assert not told(assess(question(1064.0, 0.1, 10.0)), "factor for wide beams")


@pytest.mark.parametrize(
    "wavelength", [200.0, 308.0, 355.0, 440.0, 633.0, 900.0, 1064.0, 1350.0, 1550.0, 3000.0, 5e5]
)
@pytest.mark.parametrize("light", [1e-4, 10.0, Pulse(1e-6, 1e-10, 1e4), Pulse(1.0, 1e-3, 0.0)])
def test_every_answer_is_whole(wavelength, light):
    found = assess(question(wavelength, light, None, Exit(2.0, 0.5)))
    assert found.eye[0].limit.value == min(h.limit.value for h in found.eye)
    assert found.density >= 0.0
    assert found.diffuse_m >= 0.0
    over = found.strictest.ratio > 1.0
    assert (found.reach.span is not None) is over
    assert (found.density > 0.0) is over
    assert len(set(found.assumptions)) == len(found.assumptions)
