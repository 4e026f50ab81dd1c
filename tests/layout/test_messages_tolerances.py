"""What is said of mistakes in tolerances: every message in full, with its place."""

import pytest

CASES = [
    pytest.param(
        ("bench: {size: [1500, 900]}\ntolerances: {mirror: {yawn: 1}}\n"),
        [
            (
                "b.yaml:2:23: error: tolerances.mirror: 'yawn' is not a key here\n"
                "  expected: the keys 'yaw', 'pitch', 'along', 'left', 'up' or 'spread'\n"
                "  to mend: write 'yaw', or remove the key"
            ),
        ],
        id="unknown",
    ),
    pytest.param(
        ("bench: {size: [1500, 900]}\ntolerances: {thickness: -1}\n"),
        [
            (
                "b.yaml:2:25: error: tolerances.thickness: '-1' is too small\n"
                "  expected: a length of at least 0 mm, in mm or with its unit (nm um mm m cm "
                "in ft)\n"
                "  to mend: write a value within the bounds, such as '25'"
            ),
        ],
        id="negative",
    ),
    pytest.param(
        ("bench: {size: [1500, 900]}\ntolerances: {mirror: {spread: flat}}\n"),
        [
            (
                "b.yaml:2:31: error: tolerances.mirror.spread: 'flat' is not known here\n"
                "  expected: one of 'normal' or 'uniform'\n"
                "  to mend: write one of 'normal' or 'uniform'"
            ),
        ],
        id="spread",
    ),
]


@pytest.mark.parametrize(("text", "messages"), CASES)
def test_mistakes_are_told_in_full(complaints, text, messages):
    assert complaints(text) == messages
