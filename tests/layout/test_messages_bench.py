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
]


@pytest.mark.parametrize(("text", "messages"), CASES)
def test_mistakes_are_told_in_full(complaints, text, messages):
    assert complaints(text) == messages
