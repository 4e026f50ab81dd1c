"""Rows of holes, found again among others."""

from benchlay.making.blank import RoundHole
from benchlay.making.grouping import grouped


def holes(places, diameter=4.5, use="fixing"):
    return [RoundHole(place, diameter, use) for place in places]


def test_rows_columns_and_what_is_left():
    row = holes([(10.0 + 50.0 * n, 8.0) for n in range(5)])
    column = holes([(300.0, 40.0 + 25.0 * n) for n in range(3)])
    uneven = holes([(400.0, 8.5), (410.0, 8.5), (430.0, 8.5)])
    other = holes([(60.0, 8.0)], diameter=6.6)
    found = grouped([*uneven, *column[::-1], *row, *other])
    assert sorted(hole for group in found for hole in group.holes) == sorted(
        [*row, *column, *uneven, *other]
    )
    named = {group.holes: (group.axis, group.pitch_mm) for group in found}
    assert named[tuple(row)] == (0, 50.0)
    assert named[tuple(column)] == (1, 25.0)
    assert sum(axis is None for axis, _ in named.values()) == 4
