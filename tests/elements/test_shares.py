"""Shares and densities."""

import pytest

from benchlay.document.form import Reader
from benchlay.document.nodes import Scalar
from benchlay.document.problems import Problems
from benchlay.document.record import Record, key
from benchlay.document.span import NOWHERE, Span
from benchlay.elements._shares import SHARE, USABLE, DensityForm, refuse_excess

EXPECTED = "an optical density of at least 0, as '2' or 'OD 2'"


def read(text, form):
    problems = Problems()
    value = form.read(Scalar(text, NOWHERE), Reader(problems))
    return value, [tuple(problem[1:]) for problem in problems.sorted()]


@pytest.mark.parametrize(("text", "density"), [("2", 2.0), ("OD 2", 2.0), ("0.3", 0.3), ("0", 0.0)])
def test_a_density_is_read_with_or_without_its_sign(text, density):
    assert read(text, DensityForm()) == (density, [])


@pytest.mark.parametrize(
    ("text", "problem"),
    [
        (
            "10 %",
            (
                "'10 %' is a share, not an optical density",
                EXPECTED,
                "write 'OD 1', which lets 10 % of the light pass",
            ),
        ),
        (
            "100 %",
            (
                "'100 %' is a share, not an optical density",
                EXPECTED,
                "write 'OD 0', which lets 100 % of the light pass",
            ),
        ),
        (
            "100 ppm",
            (
                "'100 ppm' is a share, not an optical density",
                EXPECTED,
                "write 'OD 4', which lets 100 ppm of the light pass",
            ),
        ),
        (
            "0 %",
            (
                "'0 %' is a ratio, not an optical density",
                EXPECTED,
                "write an optical density, such as '2'",
            ),
        ),
        ("-1", ("'-1' is too small", EXPECTED, "write a value within the bounds, such as '2'")),
        ("x %", ("'x %' is not a number", EXPECTED, "write an optical density, such as '2'")),
    ],
)
def test_a_share_is_no_density(text, problem):
    assert read(text, DensityForm()) == (None, [problem])


@pytest.mark.parametrize(("text", "share"), [("0", 0.0), ("1", 1.0), ("100 %", 1.0)])
def test_both_ends_are_shares(text, share):
    assert read(text, SHARE) == (share, [])


def test_nothing_usable_is_no_size():
    assert read("0", USABLE)[1] == [
        (
            "'0' is too small",
            "a ratio above 0 and of at most 1, as '0.5', '50 %', '5 ppm' or 'OD 0.3'",
            "write a value within the bounds, such as '50 %'",
        )
    ]


class Two(Record):
    back: float = key(SHARE, default=0.0, meaning="One share.")
    through: float = key(SHARE, default=0.0, meaning="Another.")


def excess(back, through, /, **spans):
    problems = Problems()
    record = Two(back=back, through=through, span=Span("b.yaml", 1, 1), spans=spans)
    refuse_excess(record, ("back", back), ("through", through), Reader(problems))
    return problems.sorted()


@pytest.mark.parametrize("share", [0.0, 0.1, 0.57, 0.83, 0.9, 0.991, 0.995, 1.0])
def test_exactly_all_is_not_too_much(share):
    assert excess(share, round(1.0 - share, 6)) == []


@pytest.mark.parametrize("share", [0.1, 0.123_456_4, 0.123_456_6, 0.9, 0.991, 1.0])
def test_more_than_all_is_refused_and_the_mend_is_enough(share):
    (problem,) = excess(share, 0.95, through=Span("b.yaml", 2, 1))
    assert problem.span == Span("b.yaml", 2, 1)
    room = float(problem.remedy.removeprefix("set 'through' to ").removesuffix(" or less"))
    assert excess(share, room) == []
    assert 1.0 - share - room < 2e-6


def test_the_message():
    (problem,) = excess(0.99, 0.02, back=Span("b.yaml", 3, 1))
    assert problem == (
        Span("b.yaml", 3, 1),
        "'back' and 'through' add up to 1.01",
        "at most 1 together",
        "set 'through' to 0.01 or less",
    )
