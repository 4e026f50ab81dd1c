"""Openings in opaque plates."""

import pytest

from benchlay.document.form import Reader
from benchlay.document.nodes import parse
from benchlay.document.problems import Problems
from benchlay.elements._plates import OPENING, opening_geometry
from benchlay.geometry.outline import circle, rectangle

EXPECTED = (
    "a diameter, a length above 0 mm, in mm or with its unit (nm um mm m cm in ft); "
    "or '[width, height]'"
)


def read(text):
    problems = Problems()
    ((_, node),) = parse(f"opening: {text}", "b.yaml", problems).pairs
    value = OPENING.read(node, Reader(problems))
    return value, [tuple(problem[1:]) for problem in problems.sorted()]


@pytest.mark.parametrize(
    ("text", "opening"),
    [
        ("5", circle(2.5)),
        ("200 um", circle(0.1)),
        ("[2, 8]", rectangle(2.0, 8.0)),
    ],
)
def test_a_diameter_or_two_sizes(text, opening):
    assert read(text) == (opening, [])


@pytest.mark.parametrize("text", ["{width: 3}", ""])
def test_all_else_is_refused(text):
    ((message, expected, remedy),) = read(text)[1]
    assert message in ("a table with 'width' is not what is read here", "nothing is written")
    assert (expected, remedy) == (EXPECTED, "write it in that form, such as '5'")


def test_a_list_of_one_is_refused():
    assert read("[3]")[1] == [
        (
            "a list of 1 is not what is read here",
            "a list of 2, each a length above 0 mm, in mm or with its unit (nm um mm m cm in ft)",
            "write it in that form, such as [25, 25]",
        )
    ]


def test_openings_are_shown_as_written():
    assert OPENING.show(circle(2.5)) == "5 mm"
    assert OPENING.show(rectangle(2.0, 8.0)) == "[2, 8] mm"


def test_a_section_shows_two_halves_and_the_gap():
    strokes = opening_geometry(rectangle(6.0, 20.0), (50.0, 40.0), 2.0).strokes
    left, right, gap = strokes
    assert left.points == ((0.0, 3.0), (0.0, 25.0), (-2.0, 25.0), (-2.0, 3.0))
    assert right.points == ((0.0, -3.0), (0.0, -25.0), (-2.0, -25.0), (-2.0, -3.0))
    assert (gap.points, gap.closed, gap.role) == (((0.0, -3.0), (0.0, 3.0)), False, "opening")
    assert left.closed
    assert right.closed
