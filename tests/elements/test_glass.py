"""Glasses, as any kind reads them."""

import pytest

from benchlay.document.form import Reader
from benchlay.document.nodes import parse
from benchlay.document.problems import Problems
from benchlay.elements._glass import GLASS, GLASS_NAMES
from benchlay.elements._kind import Glass
from benchlay.optics import materials

EXPECTED = (
    "'fused-silica', 'BK7', 'SF10', 'SF11', 'CaF2', 'MgF2', 'sapphire', 'ZnSe', 'quartz', "
    "'calcite' or 'water', or an index as '{index: 1.5}'"
)


def read(text):
    problems = Problems()
    ((_, node),) = parse(f"glass: {text}", "b.yaml", problems).pairs
    value = GLASS.read(node, Reader(problems))
    return value, [tuple(problem[1:]) for problem in problems.sorted()]


@pytest.mark.parametrize("name", GLASS_NAMES)
def test_every_name_is_read_and_keeps_its_place(name):
    glass, found = read(name)
    assert found == []
    assert (glass.name, glass.ratio) == (name, None)
    assert (glass.span.line, glass.span.column) == (1, 8)


def test_an_index_is_read():
    glass, found = read("{index: 1.62}")
    assert found == []
    assert (glass.name, glass.ratio) == (None, 1.62)


@pytest.mark.parametrize(
    ("text", "problem"),
    [
        ("BK8", ("'BK8' is not a known glass", EXPECTED, "write 'BK7'")),
        (
            "jelly",
            (
                "'jelly' is not a known glass",
                EXPECTED,
                "write a material of the list, or its index",
            ),
        ),
        (
            "1.5",
            (
                "'1.5' is not a known glass",
                EXPECTED,
                "write '{index: 1.5}' if the index is meant",
            ),
        ),
        ("", ("nothing is written", EXPECTED, "write it in that form, such as 'BK7'")),
        (
            "[BK7]",
            (
                "a list of 1 is not what is read here",
                EXPECTED,
                "write it in that form, such as 'BK7'",
            ),
        ),
        (
            "{index: 0.5}",
            (
                "index: '0.5' is too small",
                "a ratio of at least 1 and of at most 10, as '0.5', '50 %', '5 ppm' or 'OD 0.3'",
                "write a value within the bounds, such as '1'",
            ),
        ),
    ],
)
def test_says_what_is_wrong(text, problem):
    assert read(text) == (None, [problem])


def test_defaults_are_shown_as_they_are_written():
    assert GLASS.show(Glass("BK7", None)) == "BK7"
    assert GLASS.show(Glass(None, 1.5)) == "{index: 1.5}"
    assert GLASS.show(None) == "none"


def test_optics_knows_every_name():
    known = materials.MATERIALS
    assert set(GLASS_NAMES) <= set(known)
