"""What is said of mistakes in limits: every message in full, with its place."""

import pytest

CASES = [
    pytest.param(
        ("bench: {size: [1500, 900]}\nlimits: {time_base: 100}\n"),
        [
            (
                "b.yaml:2:21: error: limits.time_base: '100' has no unit\n"
                "  expected: a duration above 0 s, with its unit (s ms us ns ps fs min h)\n"
                "  to mend: write '100 s', or whichever unit is meant"
            ),
        ],
        id="no-unit",
    ),
    pytest.param(
        ("bench: {size: [1500, 900]}\nlimits: {eyes: {seated: [1400, 1000]}}\n"),
        [
            (
                "b.yaml:2:25: error: limits.eyes: the band 'seated' runs from 1400 mm to 1000 "
                "mm\n"
                "  expected: [lower, upper]\n"
                "  to mend: write 'seated: [1000, 1400]'"
            ),
        ],
        id="eyes-upside-down",
    ),
    pytest.param(
        ("bench: {size: [1500, 900]}\nlimits: {clip: 120 %}\n"),
        [
            (
                "b.yaml:2:16: error: limits.clip: '120 %' is too large\n"
                "  expected: a ratio of at least 0 and of at most 1, as '0.5', '50 %', '5 ppm' "
                "or 'OD 0.3'\n"
                "  to mend: write a value within the bounds, such as '50 %'"
            ),
        ],
        id="clip",
    ),
    pytest.param(
        ("bench: {size: [1500, 900]}\nlimits: {clearence: 3}\n"),
        [
            (
                "b.yaml:2:10: error: limits: 'clearence' is not a key here\n"
                "  expected: the keys 'time_base', 'eyes', 'clip', 'off_height', 'off_centre', "
                "'clearance', 'driver', 'reach', 'floor', 'back_reflection' or 'faults'\n"
                "  to mend: write 'clearance', or remove the key"
            ),
        ],
        id="unknown",
    ),
    pytest.param(
        "bench: {size: [1500, 900]}\nlimits: {faults: {range: 91}}\n",
        [
            (
                "b.yaml:2:26: error: limits.faults.range: '91' is too large\n"
                "  expected: an angle of at least 0 deg and of at most 90 deg, "
                "in deg or with its unit (deg ° arcmin arcsec mrad rad urad)\n"
                "  to mend: write a value within the bounds, such as '30'"
            ),
        ],
        id="range-of-faults",
    ),
]


@pytest.mark.parametrize(("text", "messages"), CASES)
def test_mistakes_are_told_in_full(complaints, text, messages):
    assert complaints(text) == messages
