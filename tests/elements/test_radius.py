"""Radii of curvature in the words of ISO 10110."""

import pytest

from benchlay.document.form import Reader
from benchlay.document.nodes import Scalar, Sequence
from benchlay.document.problems import Problems
from benchlay.document.span import NOWHERE
from benchlay.elements._radius import FLAT, RADIUS

EXPECTED = "a radius with CX (convex) or CC (concave), as '51.5 CX', or 'flat'"
LENGTH = "a length above 0 mm, in mm or with its unit (nm um mm m cm in ft)"


def read(node):
    problems = Problems()
    value = RADIUS.read(node, Reader(problems))
    return value, [tuple(problem[1:]) for problem in problems.sorted()]


@pytest.mark.parametrize(
    ("text", "radius"),
    [("51.5 CX", 51.5), ("400 CC", -400.0), ("2 m CC", -2000.0), ("1 in  CX", 25.4), ("flat", 0.0)],
)
def test_convex_is_positive(text, radius):
    assert read(Scalar(text, NOWHERE)) == (radius, [])


@pytest.mark.parametrize(
    ("text", "problem"),
    [
        (
            "400",
            (
                "'400' is not a radius of curvature",
                EXPECTED,
                "write CX or CC after the radius, or 'flat'",
            ),
        ),
        (
            "CX",
            (
                "'CX' is not a radius of curvature",
                EXPECTED,
                "write CX or CC after the radius, or 'flat'",
            ),
        ),
        (
            "-400 CX",
            ("'-400' is too small", LENGTH, "write a value within the bounds, such as '25'"),
        ),
        ("far CC", ("'far' is not a number", LENGTH, "write a length, such as '25'")),
        ("", ("nothing is written", EXPECTED, "write it in that form, such as '400 CC'")),
    ],
)
def test_says_what_is_wrong(text, problem):
    assert read(Scalar(text, NOWHERE)) == (None, [problem])


def test_a_list_is_no_radius():
    assert read(Sequence([], NOWHERE))[1] == [
        (
            "a list of 0 is not what is read here",
            EXPECTED,
            "write it in that form, such as '400 CC'",
        )
    ]


def test_the_default_is_shown_as_flat():
    assert RADIUS.show(FLAT) == "flat"
