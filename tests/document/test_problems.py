"""Problems: collected, sorted, told once."""

from benchlay.document.problems import LIMIT, Problem, Problems
from benchlay.document.span import Span


def add(problems, line, message="m"):
    problems.add(Span("a.yaml", line, 1), message, expected="e", remedy="r")


def test_sorted_by_place_and_told_once():
    problems = Problems()
    assert not problems
    for line in (3, 1, 3, 2):
        add(problems, line)
    assert [p.span.line for p in problems.sorted()] == [1, 2, 3]
    assert len(problems) == 4
    assert problems


def test_full_text():
    problem = Problem(Span("b.yaml", 4, 5), "it is wrong", "right", "mend it")
    assert str(problem) == ("b.yaml:4:5: error: it is wrong\n  expected: right\n  to mend: mend it")


def test_beyond_the_limit_the_rest_is_counted():
    problems = Problems()
    for line in range(1, LIMIT + 8):
        add(problems, line)
    found = problems.sorted()
    assert len(found) == LIMIT + 1
    assert found[-1] == Problem(
        Span("a.yaml", LIMIT, 1),
        "7 further problems are not shown",
        "a file with fewer than 200 problems",
        "mend the problems above first, then run again",
    )
