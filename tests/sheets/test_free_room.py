"""Free room on paper, against a search by hand over every place."""

import numpy as np
import pytest

from benchlay.sheets.free_room import FreeRoom
from benchlay.sheets.scale import Window

FIELD = Window(10.0, 20.0, 50.0, 60.0)


def free_by_hand(taken, size):
    """Every place on the raster whose box covers no taken box: (left, low)."""
    return {
        (x, y)
        for x in np.arange(FIELD.left, FIELD.right - size[0] + 1e-9)
        for y in np.arange(FIELD.low, FIELD.high - size[1] + 1e-9)
        if not any(
            x < box.right and x + size[0] > box.left and y < box.high and y + size[1] > box.low
            for box in taken
        )
    }


def test_free_places_are_those_found_by_hand():
    taken = [Window(15.0, 25.0, 30.0, 40.0), Window(35.0, 30.0, 45.0, 58.0)]
    room = FreeRoom(FIELD)
    for box in taken:
        room.take_box(box)
    found = room.places((6.0, 4.0), (20.0, 30.0), 10_000)
    assert {tuple(box[:2]) for box in found.tolist()} == free_by_hand(taken, (6.0, 4.0))


def test_the_nearest_comes_first():
    room = FreeRoom(FIELD)
    room.take_box(Window(15.0, 25.0, 30.0, 40.0))
    found = room.places((6.0, 4.0), (20.0, 33.0), 50)
    away = [
        np.hypot(np.clip(20.0, a, c) - 20.0, np.clip(33.0, b, d) - 33.0) for a, b, c, d in found
    ]
    assert away == sorted(away)
    assert away[0] == pytest.approx(7.0)  # above; at the left only 5 mm are free


def test_no_place_lies_on_a_slanting_line():
    room = FreeRoom(FIELD)
    start, end = (10.0, 20.0), (50.0, 47.0)
    room.take_line(start, end)
    share = np.linspace(0.0, 1.0, 4000)
    x, y = (a + share * (b - a) for a, b in zip(start, end, strict=True))
    for left, low, right, high in room.places((5.0, 3.0), (30.0, 40.0), 10_000):
        # Between two samples of a cell's quarter a corner of less may be cut.
        inside = (x > left + 0.2) & (x < right - 0.2) & (y > low + 0.2) & (y < high - 0.2)
        assert not inside.any()


def test_where_nothing_is_free_nothing_is_found():
    room = FreeRoom(FIELD)
    assert len(room.places((41.0, 1.0), (20.0, 30.0), 10)) == 0
    room.take_box(Window(0.0, 0.0, 100.0, 100.0))
    assert len(room.places((1.0, 1.0), (20.0, 30.0), 10)) == 0


@pytest.mark.parametrize("reach", [20.0, 1e9])
def test_a_line_takes_the_same_cells_however_far_it_runs_on(reach):
    room = FreeRoom(FIELD)
    room.take_line((30.5 - reach, 40.5), (30.5 + reach, 40.5))
    room.take_line((30.5, 40.5 - reach), (30.5, 40.5 + reach))
    taken = [Window(10.0, 40.0, 50.0, 41.0), Window(30.0, 20.0, 31.0, 60.0)]
    found = room.places((6.0, 4.0), (20.0, 30.0), 10_000)
    assert {tuple(box[:2]) for box in found.tolist()} == free_by_hand(taken, (6.0, 4.0))
