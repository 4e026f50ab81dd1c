"""Repeated pulses: three rules, of which the smallest speaks."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from benchlay.exposure.errors import OutOfRange
from benchlay.exposure.factors import c5
from benchlay.exposure.limits import eye_limit
from benchlay.exposure.trains import (
    Train,
    eye_rules,
    pulse_limit,
    skin_rules,
)


def by_name(rules):
    return {rule.name: rule for rule in rules}


def test_worked_train_of_a_nanosecond_laser():
    # 1064 nm, 10 ns, 1 kHz for 10 s, worked by hand: 0.02, 0.05 and 0.01 J/m2.
    found = by_name(eye_rules(1064.0, 10.0, Train(1e-8, 1e3)))
    assert found["single pulse"].per_pulse == pytest.approx(0.02)
    assert found["average"].per_pulse == pytest.approx(0.05)
    assert found["thermal, repeated"].per_pulse == pytest.approx(0.01)
    limit, rule = pulse_limit(1064.0, 10.0, Train(1e-8, 1e3))
    assert limit.value == pytest.approx(0.01)
    assert limit.unit == "J/m2"
    assert limit.governs == rule.name == "thermal, repeated"


def test_pulses_within_ti_count_as_one():
    # 532 nm, 1 ns, 1 MHz for 10 s: five pulses in 5 us, 2e6 groups, C5 = 0.4.
    found = by_name(eye_rules(532.0, 10.0, Train(1e-9, 1e6)))
    rule = found["thermal, pulses within Ti as one"]
    expected = 18.0 * 5e-6**0.75 * 0.4 / 5.0
    assert rule.per_pulse == pytest.approx(expected)
    assert rule.pulses == pytest.approx(2e6)


def test_the_train_is_counted_no_longer_than_t2():
    found = by_name(eye_rules(1064.0, 100.0, Train(1e-8, 100.0)))
    assert found["thermal, repeated"].pulses == 1000.0
    assert found["average"].pulses == 1e4


@pytest.mark.parametrize(
    ("rate", "exposure", "count"),
    [
        (10.0, 0.25, 3.0),
        (1000.0, 10.0, 10000.0),
        (0.1, 1.0, 1.0),
        (0.0, 100.0, 1.0),
        (0.3, 10.0, 3.0),
        (10.0, 0.1 + 0.2, 3.0),
    ],
)
def test_whole_pulses_are_counted(rate, exposure, count):
    assert Train(1e-8, rate).count(exposure) == count


def test_a_single_pulse_has_one_rule():
    rules = eye_rules(532.0, 100.0, Train(1e-8, 0.0))
    assert [rule.name for rule in rules] == ["single pulse"]


def test_c5_is_not_used_outside_the_retina():
    for wavelength in (250.0, 350.0, 1550.0, 10600.0):
        names = set(by_name(eye_rules(wavelength, 100.0, Train(1e-8, 1e3))))
        assert names == {"single pulse", "average"}
    assert set(by_name(skin_rules(532.0, 100.0, Train(1e-8, 1e3)))) == {
        "single pulse",
        "average",
    }


def test_c5_is_not_used_for_pulses_beyond_a_quarter_second():
    assert "thermal, repeated" in by_name(eye_rules(532.0, 100.0, Train(0.25, 1.0)))
    longer = Train(math.nextafter(0.25, 1.0), 1.0)
    assert "thermal, repeated" not in by_name(eye_rules(532.0, 100.0, longer))


@pytest.mark.parametrize(
    ("pulses", "pulse_s", "exposure_s", "alpha", "value"),
    [
        (1e6, 1e-8, 0.25, 1.5, 1.0),
        (1e6, 1e-8, 0.2500001, 1.5, 0.4),
        (601.0, 1e-8, 10.0, 1.5, 1.0),
        (1e4, 1e-8, 10.0, 1.5, 0.5),
        (1e4, 5e-6, 10.0, 1.5, 0.5),
        (1e4, 6e-6, 10.0, 5.0, 1.0),
        (1e4, 6e-6, 10.0, 5.1, 0.2),
        (16.0, 6e-6, 10.0, 5.1, 0.5),
        (16.0, 0.1, 10.0, 50.0, 0.5),
        (1e4, 0.1, 10.0, 50.0, 0.4),
        (1e4, 0.1, 10.0, 80.0, 0.2),
        (1e4, 0.1, 10.0, 100.0, 0.2),
        (1e4, 0.1, 10.0, 100.1, 1.0),
        (1e6, 1e-8, 10.0, 100.0, 0.4),
        (1e6, 1e-8, 10.0, 100.1, 1.0),
        (700.0, 1e-8, 10.0, 1.5, 5.0 * 700.0**-0.25),
    ],
)
def test_c5_on_each_side(pulses, pulse_s, exposure_s, alpha, value):
    found = c5(pulses, pulse_s, 532.0, exposure_s, alpha_mrad=alpha)
    assert found == pytest.approx(value)


def test_shorter_groups_are_tried_for_large_sources():
    rules = eye_rules(800.0, 10.0, Train(1e-5, 1e4), alpha_mrad=100.0)
    groups = [rule for rule in rules if rule.name == "shorter group"]
    average = by_name(rules)["average"].per_pulse
    assert min(rule.per_pulse for rule in groups) < average
    for rule in groups:
        assert rule.duration_s == pytest.approx((rule.pulses - 1.0) / 1e4 + 1e-5)
        dose = eye_limit(800.0, rule.duration_s, alpha_mrad=100.0).dose_j_m2
        assert rule.per_pulse == pytest.approx(dose / rule.pulses)
    # every group length, one by one: no other is stricter than those tried
    train = Train(1e-5, 1e4)
    every = min(
        eye_limit(800.0, (n - 1) / train.rate_hz + 1e-5, alpha_mrad=100.0).dose_j_m2 / n
        for n in range(1, 20_000, 1)
    )
    assert min(r.per_pulse for r in rules if r.c5 == 1.0) <= every * (1.0 + 1e-9)


@pytest.mark.parametrize(
    ("pulse_s", "rate"),
    [(0.0, 1.0), (-1.0, 1.0), (1e-8, -1.0), (math.nan, 1.0), (1e-8, math.inf)],
)
def test_impossible_trains_are_refused(pulse_s, rate):
    with pytest.raises(OutOfRange, match="positive duration"):
        Train(pulse_s, rate)


def test_overlapping_pulses_are_refused():
    with pytest.raises(OutOfRange, match="overlap"):
        Train(1e-3, 1000.0)


def test_a_pulse_as_long_as_the_exposure_is_refused():
    with pytest.raises(OutOfRange, match="fills the whole exposure"):
        eye_rules(532.0, 0.25, Train(0.25, 0.0))


def test_a_pulse_too_short_for_the_tables_is_refused():
    with pytest.raises(OutOfRange, match="1e-13 s"):
        pulse_limit(800.0, 100.0, Train(5e-14, 8e7))


@given(
    wl=st.floats(180.0, 1e6),
    pulse=st.floats(-13.0, -1.0).map(lambda x: max(10.0**x, 1e-13)),
    duty=st.floats(1e-6, 0.9),
    alpha=st.floats(0.0, 150.0),
)
def test_the_governing_rule_is_the_smallest_and_never_above_one_pulse(wl, pulse, duty, alpha):
    train = Train(pulse, duty / pulse)
    limit, _ = pulse_limit(wl, 100.0, train, alpha_mrad=alpha)
    rules = eye_rules(wl, 100.0, train, alpha_mrad=alpha)
    assert limit.value == min(rule.per_pulse for rule in rules)
    single = eye_limit(wl, pulse, alpha_mrad=alpha).dose_j_m2
    whole = eye_limit(wl, 100.0, alpha_mrad=alpha)
    assert 0.0 < limit.value <= single
    assert limit.value * train.rate_hz <= whole.irradiance_w_m2 * (1.0 + 1e-6)
