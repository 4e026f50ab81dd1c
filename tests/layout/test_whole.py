"""Whole layouts: every key once, and every mistake in one run."""

from pathlib import Path

import pytest

from benchlay.elements import KINDS
from benchlay.layout import read_layout
from benchlay.layout.elements import Shared
from benchlay.layout.reference import SECTIONS, reference

HERE = Path(__file__).parent
EVERY_KEY = (HERE / "every_key.yaml").read_text(encoding="utf-8")
BROKEN = (HERE / "broken.yaml").read_text(encoding="utf-8")


def test_every_key_is_read():
    source, problems = read_layout(EVERY_KEY, "every_key.yaml")
    assert [str(problem) for problem in problems.sorted()] == []
    assert list(source.layouts) == ["as drawn", "alignment"]


@pytest.mark.parametrize(("path", "cls"), SECTIONS, ids=[path for path, _ in SECTIONS])
def test_the_layout_with_every_key_leaves_none_out(path, cls):
    names = {key.name for key in cls.KEYS.values()} - {"include", "parts"}
    assert [name for name in sorted(names) if f"{name}:" not in EVERY_KEY] == []


def test_bytes_and_text_are_the_same():
    (text, none), (data, also_none) = (
        read_layout(EVERY_KEY, "a"),
        read_layout(EVERY_KEY.encode(), "a"),
    )
    assert not none
    assert not also_none
    assert text.as_drawn.elements["M1"].record == data.as_drawn.elements["M1"].record


def test_every_mistake_is_told_in_one_run_with_its_line():
    source, problems = read_layout(BROKEN, "broken.yaml")
    marked = {n for n, line in enumerate(BROKEN.splitlines(), start=1) if line.endswith("# <-")}
    told = {problem.span.line for problem in problems.sorted()}
    assert source is None
    assert told == marked | {line_of("  clip: 3")}
    assert len(marked) >= 20


def line_of(text):
    return BROKEN.splitlines().index(text) + 1


def test_every_problem_has_all_its_parts():
    _, problems = read_layout(BROKEN, "broken.yaml")
    for problem in problems.sorted():
        assert all((problem.message, problem.expected, problem.remedy)), problem
        assert "\n" not in problem.message + problem.expected + problem.remedy


def test_what_is_not_acted_on_yet_is_noted():
    source, _ = read_layout(EVERY_KEY, "every_key.yaml")
    noted = [text.partition(":")[0] for _, text in source.as_drawn.not_yet]
    assert noted == [
        "matched",
        "cavities",
        "tolerances",
    ]


@pytest.mark.parametrize("data", [b"", b"\xff\xfe", b"[1", b"a: b: c", b"\x00", b"bench"])
def test_what_is_no_layout_at_all_is_told(data):
    source, problems = read_layout(data, "b.yaml")
    assert source is None
    assert problems.sorted()


def test_the_order_of_entries_changes_no_entry(laser):
    head, _, rest = EVERY_KEY.partition("elements:\n")
    body, _, tail = rest.partition("routes:\n")
    one_line = [
        line
        for line in body.splitlines(keepends=True)
        if line.startswith("  ") and "{kind" in line[:8]
    ]
    moved = "".join(
        line for line in body.splitlines(keepends=True) if line not in one_line
    ) + "".join(one_line[::-1])
    first, _ = read_layout(EVERY_KEY, "a")
    second, problems = read_layout(f"{head}elements:\n{moved}routes:\n{tail}", "a")
    assert not problems
    for name, element in first.as_drawn.elements.items():
        assert second.as_drawn.elements[name].record == element.record
        assert second.as_drawn.elements[name].stand == element.stand


def test_the_reference_names_every_key():
    text = reference()
    classes = [*(cls for _, cls in SECTIONS), *KINDS.values(), Shared]
    missing = {
        k.name for cls in classes for k in cls.KEYS.values() if f"| `{k.name}` |" not in text
    }
    assert missing == set()
