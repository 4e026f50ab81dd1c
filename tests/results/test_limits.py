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
    trace = traced(TWO)
    return lambda *states: limits_used(trace, limits_of(trace.placed), states)


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


MADE = """
bench: {size: [800, 400]}
sources:
  ir: {wavelength: 1064, pulse: {energy: 1 mJ, duration: 8 ns, rate: 10 Hz},
       beam: {waist_radius: 1}, at: [100, 200], heading: 0}
  red: {wavelength: 633, power: 1 mW, beam: {waist_radius: 0.5}, at: [100, 50], heading: 0}
elements:
  C: {kind: converter, after: ir, distance: 200, incidence: 2, diameter: 10, length: 10,
      produces: [{wavelength: 532, share: 30 %, polarization: vertical}]}
  D1: {kind: dump, after: C, wavelength: 532, distance: 200}
  T1: {kind: target, after: red, distance: 300}
routes: {main: [ir, C.532, D1], pilot: [red, T1]}
states:
  pilot: {sources.ir.out: yes}
  bare: {elements.C.out: yes}
"""


def test_light_that_is_made_has_the_limit_of_the_pulses_it_is_made_of(traced):
    trace = traced(MADE)
    limits = limits_of(trace.placed)

    def told(state):
        used = limits_used(trace, limits, [state])
        return [(u.wavelength_nm, pytest.approx(u.accessible_W, rel=1e-3)) for u in used]

    # Ten pulses a second: 2 mJ/m2 each in the visible, 20 mJ/m2 at 1064 nm, through 7 mm;
    # continuous red 10 W/m2.
    area = 0.00003848451
    green, infrared, red = 10 * 2e-3 * area, 10 * 20e-3 * area, 10 * area
    each = {u.wavelength_nm: u.accessible_J for u in limits_used(trace, limits, ["as drawn"])}
    assert each == {
        532.0: pytest.approx(green / 10, rel=1e-3),
        633.0: None,
        1064.0: pytest.approx(infrared / 10, rel=1e-3),
    }
    assert told("as drawn") == [(532.0, green), (633.0, red), (1064.0, infrared)]
    assert told("pilot") == [(633.0, red)]
    assert told("bare") == [(633.0, red), (1064.0, infrared)]
