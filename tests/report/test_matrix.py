"""Findings by state, on the terminal and as data."""

import pytest

from benchlay.report.json_out import review_object
from benchlay.report.matrix import matrix_lines, matrix_of
from benchlay.report.model import CheckRun
from benchlay.report.text import check_text


@pytest.fixture
def bench(make_review, make_finding):
    """A review of some states; findings by id, the states they hold in, and the worst."""

    def make(states, **found):
        findings = [
            make_finding(id=f"check/{name}/0a1b", states=tuple(held), worst_state=worst)
            for name, (held, worst) in found.items()
        ]
        checks = tuple(CheckRun("escape", state, True) for state in states)
        return make_review(findings=findings, checks=checks)

    return make


THREE = ("as drawn", "alignment", "loading")


@pytest.fixture
def three(bench):
    return bench(
        THREE, M1=(THREE[:2], "alignment"), W1=(THREE, "as drawn"), D1=(THREE[2:], "loading")
    )


def test_one_line_a_finding_and_one_column_a_state(three):
    assert list(matrix_lines(matrix_of(three))) == [
        "findings by state (x: holds there, X: the worst there)",
        "   1 2 3",
        "   x X .  check/M1/0a1b",
        "   X x x  check/W1/0a1b",
        "   . . X  check/D1/0a1b",
        "  1 as drawn, 2 alignment, 3 loading",
        "",
    ]


def test_it_stands_between_the_findings_and_the_limits(three):
    text = check_text([three])
    assert text.index("  id: check/D1") < text.index("findings by state") < text.index("limit used")


def test_as_data(three):
    assert review_object(three)["matrix"] == {
        "states": list(THREE),
        "rows": [
            {"id": "check/M1/0a1b", "in": [True, True, False], "worst": "alignment"},
            {"id": "check/W1/0a1b", "in": [True, True, True], "worst": "as drawn"},
            {"id": "check/D1/0a1b", "in": [False, False, True], "worst": "loading"},
        ],
    }


def test_nothing_is_written_of_one_state_or_no_finding(bench):
    assert list(matrix_lines(matrix_of(bench(("as drawn",), M1=(("as drawn",), "as drawn"))))) == []
    assert list(matrix_lines(matrix_of(bench(THREE)))) == []


@pytest.mark.parametrize("count", [9, 10, 40, 120])
def test_many_states_are_written_in_blocks_that_fit_a_terminal(bench, count):
    states = [f"s{number}" for number in range(1, count + 1)]
    lines = list(
        matrix_lines(matrix_of(bench(states, M1=(states[::2], states[-1 - (count + 1) % 2]))))
    )
    assert all(len(line) <= 80 for line in lines)
    rows = [line for line in lines if line.endswith("check/M1/0a1b")]
    marks = "".join(row.removesuffix("check/M1/0a1b") for row in rows).split()
    assert [mark != "." for mark in marks] == [number % 2 == 0 for number in range(count)]
    assert marks.count("X") == 1
    assert ", ".join(line.strip().rstrip(",") for line in lines[-3:-1]).endswith(f"s{count}")
