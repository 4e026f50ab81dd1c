"""What a source is once it is read."""

from math import pi, radians

import pytest

BENCH = (
    "bench: {size: [1500, 900]}\nsources:\n  a:\n   "
    " at: [100, 450]\n    beam: {waist_radius: 0.5}\n"
)
CW = BENCH + "    wavelength: 532\n    power: 150 mW\n"


def test_one_line_of_continuous_light(layout_of):
    source = layout_of(CW + "    heading: 90\n").sources["a"]
    (line,) = source.lines
    assert (line.wavelength_nm, line.power_w, line.pulse) == (532.0, 0.15, None)
    assert str(line.span) == "b.yaml:6:17"
    assert str(source.span) == "b.yaml:3:3"
    assert source.stand.facing == pytest.approx(pi / 2)
    assert source.stand.at_mm == (100.0, 450.0)


def test_pulses_have_a_mean_power(layout_of):
    text = BENCH + (
        "    heading: 0\n    wavelength: 532\n    pulse: "
        "{energy: 2 mJ, duration: 8 ns, rate: 10 Hz}\n"
    )
    (line,) = layout_of(text).sources["a"].lines
    assert line.power_w == pytest.approx(0.02)
    assert (line.pulse.energy_j, line.pulse.duration_s, line.pulse.rate_hz) == (2e-3, 8e-9, 10.0)


def test_several_lines_in_the_order_of_the_file(layout_of):
    text = BENCH + (
        "    heading: 0\n    lines: [{wavelength: 1064, "
        "power: 2 mW}, {wavelength: 532, power: 150 mW}]\n"
    )
    lines = layout_of(text).sources["a"].lines
    assert [(line.wavelength_nm, line.power_w) for line in lines] == [
        (1064.0, 0.002),
        (532.0, 0.15),
    ]


@pytest.mark.parametrize(
    ("written", "state"),
    [
        ("horizontal", ("angle", 0.0, "")),
        ("vertical", ("angle", pi / 2, "")),
        ("none", ("none", 0.0, "")),
        ("{angle: 30}", ("angle", radians(30), "")),
        ("{circular: left}", ("circular", 0.0, "left")),
    ],
)
def test_polarization(layout_of, written, state):
    source = layout_of(CW + f"    heading: 0\n    polarization: {written}\n").sources["a"]
    assert source.polarization == state


def test_defaults(layout_of):
    source = layout_of(CW + "    heading: 0\n").sources["a"]
    assert source.polarization.kind == "none"
    assert source.body is None
    assert source.fed_by is None
    assert source.linewidth_hz is None
    assert source.acceptance_rad is None
    assert (source.line_shape, source.rear_leak_w, source.pointing_rad) == ("gaussian", 0.0, 0.0)


@pytest.mark.parametrize(
    ("body", "wanted"),
    [("none", None), ("{length: 220, width: 70, height: 140}", (220.0, 70.0, 140.0))],
)
def test_body(layout_of, body, wanted):
    found = layout_of(CW + f"    heading: 0\n    body: {body}\n").sources["a"].body
    assert (found and (found.length_mm, found.width_mm, found.height_mm)) == wanted


def test_a_fed_source_in_an_opening_needs_no_heading(layout_of):
    text = (
        "bench: {size: [1500, 900]}\n"
        "sources:\n"
        "  a: {wavelength: 532, power: 1 W, beam: {waist_radius: 1}, at: [1, 1], heading: 0}\n"
        "  b: {wavelength: 532, power: 1 W, beam: {waist_radius: "
        "1}, in: east.port, fed_by: {target: T, share: 60 %}}\n"
        "elements:\n"
        "  T: {kind: target, after: a, distance: 100}\n"
        "enclosure: {panels: {east: {from: [0, 0], to: [9, 0], "
        "openings: {port: {along: 4, height: 100, diameter: 3}}}}}\n"
    )
    source = layout_of(text).sources["b"]
    assert source.stand.in_opening[:2] == ("east", "port")
    assert (source.fed_by.target.name, source.fed_by.share) == ("T", 0.6)
