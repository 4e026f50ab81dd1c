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
    pytest.param(
        ("bench: {size: [1500, 900]}\nroom: {outline: [[5000, 0], [9000, 0], [9000, 900]]}\n"),
        [
            (
                "b.yaml:2:17: error: room: no corner of the bench lies in the room\n"
                "  expected: an outline round the bench, in the bench's own coordinates\n"
                "  to mend: count the room's corners from the bench's near left corner"
            ),
        ],
        id="bench-outside",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "room: {outline: [[0, 0], [9000, 0], [9000, 900], [0, 900]], height: 2.7}\n"
        ),
        [
            (
                "b.yaml:2:69: error: room: the room is 2.7 mm high, the bench's surface 900"
                " mm\n"
                "  expected: a height above 900 mm, from the floor\n"
                "  to mend: give the height of the walls above the floor in mm"
            ),
        ],
        id="height-in-metres",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "room: {outline: [[0, 0], [9000, 0], [9000, 900], [0, 900]], people: {p: {a"
            "t: [100, 1000]}}}\n"
        ),
        [
            (
                "b.yaml:2:78: error: room.people.p: this place lies outside the room\n"
                "  expected: a point within the room's outline\n"
                "  to mend: correct the place, or draw the room round it"
            ),
        ],
        id="people-outside",
    ),
]


@pytest.mark.parametrize(("text", "messages"), CASES)
def test_mistakes_are_told_in_full(complaints, text, messages):
    assert complaints(text) == messages
