"""The three ways of stating a beam come to the same waists."""

from math import exp, pi

import pytest

from benchlay.document.form import Reader
from benchlay.document.nodes import parse
from benchlay.document.problems import Problems
from benchlay.document.record import read_record
from benchlay.layout.beam import BeamShape


@pytest.fixture
def beam():
    def read(text):
        problems = Problems()
        shape = read_record(BeamShape, parse(text, "b.yaml", problems), Reader(problems))
        assert not problems
        return shape

    return read


def test_a_round_beam_is_the_same_both_ways(beam):
    shape = beam("{waist_radius: 0.5, waist_ahead: -200, m2: 1.1}")
    assert shape.waists(532.0) == (0.5, 0.5, -200.0, -200.0, 1.1, 1.1)


def test_waist_ahead_and_m2_have_defaults(beam):
    assert beam("{waist_radius: 500 um}").waists(532.0) == (0.5, 0.5, 0.0, 0.0, 1.0, 1.0)


def test_an_astigmatic_beam_is_horizontal_first(beam):
    shape = beam("{waist_radius_h: 1, waist_radius_v: 2, waist_ahead_v: 30, m2_h: 1.5}")
    assert shape.waists(532.0) == (1.0, 2.0, 0.0, 30.0, 1.5, 1.0)


def test_exit_diameter_and_divergence_fix_m2_for_each_line(beam):
    shape = beam("{diameter: 1, divergence: 3 mrad}")
    for wavelength_nm in (532.0, 1064.0):
        waists = shape.waists(wavelength_nm)
        # far from the waist a beam widens by half the full divergence: M² λ / (π w0)
        half_angle = waists.m2_1 * wavelength_nm * 1e-6 / (pi * waists.radius_1_mm)
        assert half_angle == pytest.approx(1.5e-3, rel=1e-12)
        assert waists.radius_1_mm == 0.5
        assert waists.ahead_1_mm == 0.0


def test_the_divergence_is_that_in_the_medium_of_the_bench(beam):
    waists = beam("{diameter: 1, divergence: 3 mrad}").waists(532.0, 1.33)
    half_angle = waists.m2_1 * 532e-6 / 1.33 / (pi * waists.radius_1_mm)
    assert half_angle == pytest.approx(1.5e-3, rel=1e-12)


def test_a_quotient_just_under_one_is_rounding_of_the_figures(beam):
    # 4 λ / (π d) is 0.80572 mrad at 632.8 nm; a data sheet rounds it to 0.80
    shape = beam("{diameter: 1, divergence: 0.80 mrad}")
    assert shape.measured_m2(632.8) == pytest.approx(0.80 / 0.805706, rel=1e-5)
    assert shape.waists(632.8).m2_1 == 1.0


@pytest.mark.parametrize(("widths", "share"), [("1/e", exp(-1)), ("fwhm", 0.5), ("1/e2", exp(-2))])
def test_widths_are_turned_into_those_at_one_over_e_squared(beam, widths, share):
    w = beam(f"{{waist_radius: 0.7, widths: {widths}}}").waists(532.0).radius_1_mm
    assert exp(-2 * 0.7**2 / w**2) == pytest.approx(share, rel=1e-12)


def test_widths_turn_diameter_and_divergence_both(beam):
    plain, quoted = (
        "{diameter: 1, divergence: 2 mrad}",
        "{diameter: 1, divergence: 2 mrad, widths: 1/e}",
    )
    assert beam(quoted).measured_m2(532.0) == pytest.approx(2 * beam(plain).measured_m2(532.0))


def test_m2_of_exactly_the_least_allowed(complaints):
    def text(divergence):
        return (
            "bench: {size: [9, 9]}\nsources:\n  a: {wavelength: "
            "1000, power: 1 W, at: [1, 1], heading: 0, "
            f"beam: {{diameter: 1, divergence: {divergence!r} mrad}}}}\n"
        )

    limit_mrad = 0.99 * 4 * 1e-3 / pi * 1e3
    assert complaints(text(limit_mrad * (1 + 1e-9))) == []
    assert len(complaints(text(limit_mrad * (1 - 1e-9)))) == 1
