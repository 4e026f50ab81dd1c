"""Classes of several lines together, and the order of classes."""

import pytest
from judged import hazards

from benchlay.exposure import Pulse
from benchlay.exposure.classes import GaussianExit
from benchlay.hazards.classes import classify, name_of, statement, together, worst


@pytest.mark.parametrize("power_w", [1e-4, 5e-4, 3e-3, 0.1, 2.0])
@pytest.mark.parametrize("wavelength_nm", [355.0, 532.0, 1064.0, 1550.0, 10600.0])
def test_a_line_alone_is_what_it_is(wavelength_nm, power_w):
    found = classify(wavelength_nm, power_w, None)
    assert together([found]) == name_of(found)


def test_two_lines_add_up():
    # 0.3 mW each: class 1 (0.39 mW); 0.6 mW together: class 2 (1 mW).
    half = classify(532.0, 0.3e-3, None)
    assert (half.name, together([half, half])) == ("1", "2")
    # 0.6 mW each: class 2; 1.2 mW: class 3R (5 mW). 4 mW each: 3R; 8 mW: 3B.
    for power_w, alone, both in ((0.6e-3, "2", "3R"), (4e-3, "3R", "3B"), (0.4, "3B", "4")):
        line = classify(633.0, power_w, None)
        assert (line.name, together([line, line])) == (alone, both)


def test_wide_beams_stay_wide_together():
    wide = GaussianExit(waist_w_mm=20.0, half_angle_86_rad=1e-5)
    line = classify(532.0, 2e-3, None, wide)
    # 7 mm take 6 % of 2 mW, 0.12 mW; 50 mm take 96 %.
    assert (line.name, together([line, line])) == ("1M", "1M")
    assert together([line] * 4) == "2M"  # 0.48 mW to the naked eye


def test_invisible_light_is_never_of_class_2():
    green, infrared = classify(532.0, 0.3e-3, None), classify(1064.0, 1.8e-3, None)
    assert (green.name, infrared.name) == ("1", "1")
    assert together([green, infrared]) == "3R"


def test_pulses_count_with_continuous_light():
    pulses = classify(1064.0, 7e-6, Pulse(0.0, 8e-9, 10.0))  # 0.7 of 0.77 uJ each
    red = classify(633.0, 0.2e-3, None)  # 0.2 of 0.39 mW
    assert (pulses.name, red.name) == ("1", "1")
    assert together([pulses, red]) == "3R"


def test_what_has_no_limit_is_the_worst():
    unknown = classify(170.0, 1e-6, None)
    assert isinstance(unknown, str)
    assert together([unknown, classify(532.0, 1e-6, None)]) is None
    assert worst(["1", None, "4"]) is None
    assert worst(["1", "3R", "2M"]) == "3R"
    assert worst([]) == "1"
    assert "taken as above the limit of class 3B" in statement(None)


def test_a_beam_over_the_top_gets_out():
    text = """
bench: {size: [1000, 600], medium: vacuum}
sources:
  green: {wavelength: 532, power: 20 mW, beam: {waist_radius: 0.5}, at: [100, 300, 100],
          heading: 0, pitch: 30}
enclosure:
  panels:
    south: {from: [0, 0], to: [1000, 0]}
    east: {from: [1000, 0], to: [1000, 600]}
    north: {from: [1000, 600], to: [0, 600]}
    west: {from: [0, 600], to: [0, 0]}
"""
    found = hazards(text)["as drawn"].accessible
    assert found.because == ("no lid covers all of the enclosure",)
    (line,) = found.outside.lines
    # 200 mm up to the panels' tops, at 30 degrees.
    assert line.at == pytest.approx((100.0 + 200.0 * 3**0.5, 300.0, 300.0))
