"""Coatings, as any face reads them."""

from math import inf

import pytest

from benchlay.document.form import Reader
from benchlay.document.nodes import parse
from benchlay.document.problems import Problems
from benchlay.elements._coating import (
    BARE_OR_REFLECTANCE,
    COATING,
    REFLECTANCE,
    UNCOATED,
    Band,
    Coating,
    everywhere,
    reflecting,
)

EXPECTED = (
    "'uncoated', '{metal: silver}' (or gold, aluminium), a reflectance, as '0.5 %' or "
    "'{s: 2 %, p: 1 %}', or a list by wavelength, as '[{from: 520, to: 545, is: 99.5 %}]'"
)
SHARE = "a ratio of at least 0 and of at most 1, as '0.5', '50 %', '5 ppm' or 'OD 0.3'"


def read(text, form=COATING):
    problems = Problems()
    ((_, node),) = parse(f"front: {text}", "b.yaml", problems).pairs
    value = form.read(node, Reader(problems))
    found = problems.sorted()
    assert (value is None) == bool(found)
    return value, [tuple(problem[1:]) for problem in found]


@pytest.mark.parametrize(
    ("text", "coating"),
    [
        ("uncoated", UNCOATED),
        ("0.5 %", reflecting(0.005, 0.005)),
        ("OD 1", reflecting(0.1, 0.1)),
        ("{s: 2 %, p: 0.01}", reflecting(0.02, 0.01)),
        ("{metal: gold}", Coating("metal", metal="gold")),
        (
            "[{from: 600, to: 700, is: {s: 2 %, p: 1 %}}, {from: 520, to: 545, is: 99 %}]",
            Coating(
                "stated",
                bands=(Band(520.0, 545.0, 0.99, 0.99), Band(600.0, 700.0, 0.02, 0.01)),
            ),
        ),
    ],
)
def test_reads_every_way_of_writing(text, coating):
    assert read(text) == (coating, [])


@pytest.mark.parametrize(
    ("text", "problem"),
    [
        ("silver", ("'silver' is not a coating", EXPECTED, "write '{metal: silver}'")),
        (
            "unkoated",
            ("'unkoated' is not a coating", EXPECTED, "write a coating, such as 'uncoated'"),
        ),
        (
            "150 %",
            ("'150 %' is too large", EXPECTED, "write a value within the bounds, such as '50 %'"),
        ),
        (
            "",
            ("nothing is written", EXPECTED, "write it in that form, such as 'uncoated'"),
        ),
        (
            "{s: 1 %}",
            (
                "'p' is missing",
                f"'p' with {SHARE}",
                "add 'p: 50 %', with the value that is meant",
            ),
        ),
        (
            "{metal: silvr}",
            (
                "metal: 'silvr' is not known here",
                "one of 'silver', 'gold' or 'aluminium'",
                "write 'silver'",
            ),
        ),
        (
            "[{from: 600, to: 500, is: 1 %}]",
            (
                "[1]: the band runs backwards, from 600 nm to 500 nm",
                "'from' at or below 'to'",
                "write 'from: 500' and 'to: 600'",
            ),
        ),
        (
            "[{from: 590, to: 700, is: 2 %}, {from: 500, to: 600, is: 1 %}]",
            (
                "this band begins at 590 nm, inside the one from 500 nm to 600 nm",
                "bands that do not overlap",
                "begin it at 600, or end the other one at 590",
            ),
        ),
    ],
)
def test_says_what_is_wrong(text, problem):
    assert read(text) == (None, [problem])


def test_reports_all_that_is_wrong_with_a_list():
    _, found = read("[{from: 500, to: 600}, {from: 1, to: 2, is: 300 %}, 7]")
    assert [message for message, _, _ in found] == [
        "[1]: 'is' is missing",
        "[2].is: '300 %' is too large",
        "[3]: '7' is not what is read here",
    ]


def test_bands_may_touch():
    coating, _ = read("[{from: 500, to: 600, is: 1 %}, {from: 600, to: 700, is: 2 %}]")
    assert coating.at(600.0).s == 0.01


def test_a_reflectance_is_neither_bare_nor_metal():
    expected = EXPECTED.partition("aluminium), ")[2]
    assert read("uncoated", REFLECTANCE) == (
        None,
        [("'uncoated' is not a coating", expected, "write a coating, such as '99.5 %'")],
    )
    assert read("{metal: gold}", REFLECTANCE) == (
        None,
        [
            (
                "a film of metal is opaque, which is not what is read here",
                expected,
                "write the share that is reflected, such as '99.5 %'",
            )
        ],
    )
    assert read("90 %", REFLECTANCE) == (reflecting(0.9, 0.9), [])


def test_a_dividing_face_may_be_bare():
    assert read("uncoated", BARE_OR_REFLECTANCE) == (UNCOATED, [])


def test_both_ends_belong_to_a_band_and_nothing_beyond():
    coating, _ = read("[{from: 520, to: 545, is: 99 %}]")
    assert coating.at(520.0) == coating.at(545.0) == Band(520.0, 545.0, 0.99, 0.99)
    assert coating.at(519.999) is None
    assert coating.at(545.001) is None
    assert coating.general() is None


def test_without_wavelengths_it_is_stated_for_none_in_particular():
    coating = reflecting(0.2, 0.1)
    assert coating.at(532.0) is None
    assert coating.general() == Band(None, None, 0.2, 0.1)


def test_everywhere_is_stated_at_every_wavelength():
    coating = everywhere(0.2, 0.1, (0.05, 0.0))
    assert coating.at(1.0) == coating.at(1e5) == Band(0.0, inf, 0.2, 0.1)
    assert coating.absorbs == (0.05, 0.0)
