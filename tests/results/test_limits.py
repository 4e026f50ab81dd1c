"""The limits that results were held against."""

import pytest

from benchlay.checks import limits_of
from benchlay.results.limits import limits_used

TWO = """
bench: {size: [900, 600]}
sources:
  a: {wavelength: 633, power: 8 mW, beam: {waist_radius: 0.5}, at: [100, 100], heading: 0}
  b: {wavelength: 532, power: 8 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
  c: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100, 300], heading: 0}
elements:
  T1: {kind: target, at: [400, 300], facing: 180}
states:
  glance: {limits.time_base: 0.25 s}
"""


@pytest.fixture(scope="module")
def used(traced):
    placed = traced(TWO).placed
    return lambda *states: limits_used(placed, limits_of(placed), states)


def test_each_limit_once_by_wavelength_and_time(used):
    told = [(u.wavelength_nm, u.time_base_s, u.overridden) for u in used("as drawn", "glance")]
    assert told == [
        (532.0, 0.25, True),
        (532.0, 100.0, False),
        (633.0, 0.25, True),
        (633.0, 100.0, False),
    ]


def test_only_of_the_states_spoken_of(used):
    assert [u.time_base_s for u in used("as drawn")] == [100.0, 100.0]
    green = used("as drawn")[0]
    assert (green.mpe_W_m2, green.aperture_mm) == (10.0, 7.0)
    assert green.accessible_W == pytest.approx(10.0 * 0.00003848451, rel=1e-6)
