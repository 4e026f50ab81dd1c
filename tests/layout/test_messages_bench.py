"""What is said of mistakes in bench: every message in full, with its place."""

import pytest

CASES = [
    pytest.param(
        ("bench: {beam_height: 80}\n"),
        [
            (
                "b.yaml:1:8: error: bench: the bench has no size\n"
                "  expected: either 'size' or 'outline'\n"
                "  to mend: add 'size: [1500, 900]', x by y"
            ),
        ],
        id="no-size",
    ),
    pytest.param(
        ("bench: {size: [10, 10], outline: [[0, 0], [9, 0], [0, 9]]}\n"),
        [
            (
                "b.yaml:1:34: error: bench: both size and outline are given\n"
                "  expected: either 'size' or 'outline'\n"
                "  to mend: remove one of the two"
            ),
        ],
        id="both",
    ),
    pytest.param(
        ("bench: {outline: [[0, 0], [10, 10], [10, 0], [0, 10]]}\n"),
        [
            (
                "b.yaml:1:18: error: bench.outline: the outline crosses or touches itself, or "
                "encloses nothing\n"
                "  expected: corners in order round an area, each of them once\n"
                "  to mend: put the corners in order; do not repeat the first one at the end"
            ),
        ],
        id="crossing-outline",
    ),
    pytest.param(
        ("title: nothing\n"),
        [
            (
                "b.yaml:1:1: error: 'bench' is missing\n"
                "  expected: 'bench' with a table with the keys 'size', 'outline', "
                "'surface_height', 'beam_height', 'holes' and 'medium'\n"
                "  to mend: add 'bench: {size: [25, 25]}', with the value that is meant"
            ),
        ],
        id="no-bench",
    ),
    pytest.param(
        ("bench: {size: [10, 10], medium: helium}\n"),
        [
            (
                "b.yaml:1:33: error: bench.medium: 'helium' is not what is read here\n"
                "  expected: one of 'air' or 'vacuum'; or a table with the key 'index'\n"
                "  to mend: write it in that form, such as 'air'"
            ),
        ],
        id="medium",
    ),
    pytest.param(
        ("bench: {size: [10, 10], medium: {index: 0.9}}\n"),
        [
            (
                "b.yaml:1:41: error: bench.medium.index: '0.9' is too small\n"
                "  expected: a ratio of at least 1 and of at most 10, as '0.5', '50 %', '5 "
                "ppm' or 'OD 0.3'\n"
                "  to mend: write a value within the bounds, such as '1'"
            ),
        ],
        id="index",
    ),
    pytest.param(
        ("bench: {size: [1500, 900], holes: {pitch: 0.025, first: [25, 25]}}\n"),
        [
            (
                "b.yaml:1:43: error: bench: a hole every 0.025 mm makes 2.16e+09 holes\n"
                "  expected: at most 250000 holes in a bench\n"
                "  to mend: check the unit of the pitch (a bare number is in mm), or leave "
                "'holes' out"
            ),
        ],
        id="too-many-holes",
    ),
    pytest.param(
        ("bench: {size: [1500, 900], holes: {pitch: 25, first: [2500, 25]}}\n"),
        [
            (
                "b.yaml:1:54: error: bench: the first hole is not on the bench\n"
                "  expected: a point from [0.0, 0.0] to [1500.0, 900.0]\n"
                "  to mend: give the hole that is nearest to the bench's near left corner"
            ),
        ],
        id="first-hole-off-the-bench",
    ),
]


@pytest.mark.parametrize(("text", "messages"), CASES)
def test_mistakes_are_told_in_full(complaints, text, messages):
    assert complaints(text) == messages
