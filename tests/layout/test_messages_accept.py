"""What is said of mistakes in accept: every message in full, with its place."""

import pytest

CASES = [
    pytest.param(
        ("bench: {size: [1500, 900]}\naccept: [{finding: x, reason: y}]\n"),
        [
            (
                "b.yaml:2:10: error: accept[1]: 'by' is missing\n"
                "  expected: 'by' with a role on one line, at most 80 characters\n"
                "  to mend: add 'by: text', with the value that is meant"
            ),
            (
                "b.yaml:2:10: error: accept[1]: 'until' is missing\n"
                "  expected: 'until' with a date as YYYY-MM-DD\n"
                "  to mend: add 'until: 2027-06-30', with the value that is meant"
            ),
        ],
        id="incomplete",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "accept: [{finding: x, reason: y, by: z, until: 30.6.2027}]\n"
        ),
        [
            (
                "b.yaml:2:48: error: accept[1].until: '30.6.2027' is not a date\n"
                "  expected: a date as YYYY-MM-DD\n"
                "  to mend: write a date as YYYY-MM-DD, such as '2027-06-30'"
            ),
        ],
        id="date",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "accept: [{finding: x, reason: y, by: z, until: 2027-06-30, at_most: 3 banana"
            "s}]\n"
        ),
        [
            (
                "b.yaml:2:69: error: accept[1].at_most: '3 bananas' is not what is read here\n"
                "  expected: the value that may be reached, with the finding's unit\n"
                "  to mend: write it in that form, such as '2 mW'"
            ),
        ],
        id="amount",
    ),
]


@pytest.mark.parametrize(("text", "messages"), CASES)
def test_mistakes_are_told_in_full(complaints, text, messages):
    assert complaints(text) == messages
