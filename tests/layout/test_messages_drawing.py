"""What is said of mistakes in drawing: every message in full, with its place."""

import pytest

CASES = [
    pytest.param(
        ("bench: {size: [1500, 900]}\ndrawing: {scale: 1/5}\n"),
        [
            (
                "b.yaml:2:18: error: drawing.scale: '1/5' is not a scale\n"
                "  expected: a scale on one line, at most 12 characters\n"
                "  to mend: write a scale, such as '1:5'"
            ),
        ],
        id="scale",
    ),
    pytest.param(
        ("bench: {size: [1500, 900]}\ndrawing: {sheet: A5}\n"),
        [
            (
                "b.yaml:2:18: error: drawing.sheet: 'A5' is not known here\n"
                "  expected: one of 'auto', 'A4', 'A3', 'A2', 'A1' or 'A0'\n"
                "  to mend: write 'A4'"
            ),
        ],
        id="sheet",
    ),
    pytest.param(
        ("bench: {size: [1500, 900]}\ndrawing: {number: 12345678901234567}\n"),
        [
            (
                "b.yaml:2:19: error: drawing.number: this text is 17 characters long\n"
                "  expected: text on one line, at most 16 characters\n"
                "  to mend: shorten it to 16 characters"
            ),
        ],
        id="number",
    ),
    pytest.param(
        ("bench: {size: [1500, 900]}\nrevisions: [{rev: A, date: 2027-02-30, what: x, by: y}]\n"),
        [
            (
                "b.yaml:2:28: error: revisions[1].date: '2027-02-30' is a day no calendar has\n"
                "  expected: a date as YYYY-MM-DD\n"
                "  to mend: write a date as YYYY-MM-DD, such as '2027-06-30'"
            ),
        ],
        id="revision",
    ),
]


@pytest.mark.parametrize(("text", "messages"), CASES)
def test_mistakes_are_told_in_full(complaints, text, messages):
    assert complaints(text) == messages
