"""What is said of mistakes in beam: every message in full, with its place."""

import pytest

CASES = [
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {m2: 1.2}, at: [100, 450], hea"
            "ding: 0}\n"
        ),
        [
            (
                "b.yaml:3:47: error: sources.green.beam: 'waist_radius' is missing\n"
                "  expected: 'waist_radius' (with 'waist_ahead' and 'm2'), or 'diameter' and "
                "'divergence', or 'waist_radius_h' and 'waist_radius_v' (with their own "
                "'waist_ahead' and 'm2')\n"
                "  to mend: add 'waist_radius'"
            ),
        ],
        id="nothing",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {diameter: 1}, at: [100, 450],"
            " heading: 0}\n"
        ),
        [
            (
                "b.yaml:3:47: error: sources.green.beam: 'divergence' is missing\n"
                "  expected: 'waist_radius' (with 'waist_ahead' and 'm2'), or 'diameter' and "
                "'divergence', or 'waist_radius_h' and 'waist_radius_v' (with their own "
                "'waist_ahead' and 'm2')\n"
                "  to mend: add 'divergence'"
            ),
        ],
        id="half-an-exit",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5, diameter: "
            "1, divergence: 1 mrad}, at: [100, 450], heading: 0}\n"
        ),
        [
            (
                "b.yaml:3:77: error: sources.green.beam: 'waist_radius' and 'diameter' belong "
                "to different ways of stating a beam\n"
                "  expected: 'waist_radius' (with 'waist_ahead' and 'm2'), or 'diameter' and "
                "'divergence', or 'waist_radius_h' and 'waist_radius_v' (with their own "
                "'waist_ahead' and 'm2')\n"
                "  to mend: remove 'waist_radius' or 'diameter'"
            ),
        ],
        id="mixed",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius_h: 0.5}, at: [10"
            "0, 450], heading: 0}\n"
        ),
        [
            (
                "b.yaml:3:47: error: sources.green.beam: 'waist_radius_v' is missing\n"
                "  expected: 'waist_radius' (with 'waist_ahead' and 'm2'), or 'diameter' and "
                "'divergence', or 'waist_radius_h' and 'waist_radius_v' (with their own "
                "'waist_ahead' and 'm2')\n"
                "  to mend: add 'waist_radius_v'"
            ),
        ],
        id="half-astigmatic",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {diameter: 1, divergence: 0.3 "
            "mrad}, at: [100, 450], heading: 0}\n"
        ),
        [
            (
                "b.yaml:3:73: error: sources.green: no beam of 532 nm this wide diverges so "
                "little: M² would be 0.443\n"
                "  expected: a full divergence of at least 0.6774 mrad for this diameter\n"
                "  to mend: check that 'divergence' is the full angle and 'diameter' is not a "
                "radius, or state 'widths'"
            ),
        ],
        id="impossible",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 1, m2: 0.9}, at"
            ": [100, 450], heading: 0}\n"
        ),
        [
            (
                "b.yaml:3:69: error: sources.green.beam.m2: '0.9' is too small\n"
                "  expected: a ratio of at least 1 and of at most 1e+06, as '0.5', '50 %', '5 "
                "ppm' or 'OD 0.3'\n"
                "  to mend: write a value within the bounds, such as '1'"
            ),
        ],
        id="m2",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 1, widths: 1/e3"
            "}, at: [100, 450], heading: 0}\n"
        ),
        [
            (
                "b.yaml:3:73: error: sources.green.beam.widths: '1/e3' is not known here\n"
                "  expected: one of '1/e2', '1/e' or 'fwhm'\n"
                "  to mend: write '1/e2'"
            ),
        ],
        id="widths",
    ),
]


@pytest.mark.parametrize(("text", "messages"), CASES)
def test_mistakes_are_told_in_full(complaints, text, messages):
    assert complaints(text) == messages
