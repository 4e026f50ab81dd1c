"""What is said of mistakes in room: every message in full, with its place."""

import pytest

CASES = [
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "room: {outline: [[0, 0], [9, 0], [9, 9]], doors: {d: {from: [0, 0], to: [0, "
            "0]}}}\n"
        ),
        [
            (
                "b.yaml:2:73: error: room.doors.d: it starts and ends in the same point\n"
                "  expected: two different points\n"
                "  to mend: move one of the two"
            ),
        ],
        id="door",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "room: {outline: [[0, 0], [9, 0], [9, 9]], windows: {w: {from: [0, 0], to: [5"
            ", 0], to_height: 800}}}\n"
        ),
        [
            (
                "b.yaml:2:94: error: room.windows.w: its upper edge (800 mm) is not above its "
                "sill (900 mm)\n"
                "  expected: 'to_height' above 'from_height'\n"
                "  to mend: set 'to_height' above 900"
            ),
        ],
        id="window",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "room: {outline: [[0, 0], [9, 0], [9, 9]], people: {p: {at: [1, 1], eyes: sit"
            "ing}}}\n"
        ),
        [
            (
                "b.yaml:2:74: error: room.people.p.eyes: 'siting' is not known here\n"
                "  expected: one of 'seated' or 'standing'\n"
                "  to mend: write one of 'seated' or 'standing'"
            ),
        ],
        id="eyes",
    ),
]


@pytest.mark.parametrize(("text", "messages"), CASES)
def test_mistakes_are_told_in_full(complaints, text, messages):
    assert complaints(text) == messages
