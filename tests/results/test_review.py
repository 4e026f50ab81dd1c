"""Findings judged and put together; what is said of a layout."""

from datetime import date

import pytest

from benchlay import pipeline
from benchlay.document.span import Span
from benchlay.findings import Finding, Severity, identify
from benchlay.results.review import Checked, Paper, judge, review

BENCH = """
title: A bench
bench: {size: [900, 600], beam_height: 100}
sources:
  red: {wavelength: 633, power: 8 mW, beam: {waist_radius: 0.5}, at: [100, 100], heading: 0}
elements:
  T1: {kind: target, at: [400, 100], facing: 180}
states:
  b: {sources.red.power: 2 mW}
  a: {sources.red.power: 1 mW}
"""
DAY = date(2027, 1, 1)


@pytest.fixture(scope="module")
def trace():
    return pipeline.trace(pipeline.place(pipeline.read("x.yaml", BENCH)))


@pytest.fixture
def checked(trace):
    def make(*findings, states=("as drawn", "a", "b")):
        from benchlay.checks import Context, Run, limits_of

        runs = tuple(Run("escape", state, True) for state in trace.scene.variants)
        named = tuple(identify(findings))
        return Checked(Context(trace, limits_of(trace.placed)), named, runs, states)

    return make


def finding(state, value, **fields):
    whole = Finding(
        "escape", Severity.FAIL, f"{value} W leave", "less", "stop it", state=state,
        element="T1", span=Span("x.yaml", 7, 3), value=value, limit=1e-3, unit="W",
    )  # fmt: skip
    return whole._replace(**fields)


def test_states_come_by_name_whatever_the_file_says(trace):
    assert trace.scene.variants == ("as drawn", "a", "b")


def test_one_finding_over_its_states_with_the_data_of_the_worst(checked):
    judged = judge(checked(finding("as drawn", 8e-3), finding("b", 9e-3)), None)
    (told,) = judged.findings
    assert (told.states, told.worst_state, told.value) == (("as drawn", "b"), "b", 9e-3)


def test_only_the_states_asked_for_are_spoken_of(checked):
    found = [finding("as drawn", 8e-3), finding("b", 9e-3, element="red")]
    judged = judge(checked(*found, states=("b",)), None)
    assert [told.element for told in judged.findings] == ["red"]
    assert [run.state for run in judged.runs] == ["b"]


def test_the_gravest_come_first(checked):
    found = [
        finding("as drawn", 1.0, check="clipped", severity=Severity.NOTE),
        finding("as drawn", 1.0, check="unaccounted", severity=Severity.WARN),
        finding("as drawn", 1.0),
    ]
    judged = judge(checked(*found), None)
    assert [told.severity for told in judged.findings] == ["fail", "warn", "note"]


def test_a_plain_review_leaves_out_what_takes_time(checked):
    paper = Paper("x.yaml", "", ("title: A bench",))
    told = review(checked(finding("b", 9e-3)), paper, DAY, in_full=False)
    assert (told.title, told.revision, told.as_of) == ("A bench", None, None)
    assert told.verdict == "fail"
    assert (told.ledger, told.routes, told.zones) == ((), (), ())
    assert told.limits_used


def test_a_full_review_tells_every_state(checked):
    paper = Paper("x.yaml", "0" * 64, ())
    told = review(checked(), paper, DAY, in_full=True)
    assert [entry.state for entry in told.ledger] == ["as drawn", "a", "b"]
    assert [entry.emitted_W for entry in told.ledger] == [8e-3, 1e-3, 2e-3]
    assert told.verdict == "none"


def test_stretches_are_worked_out_once_for_findings_and_drawings(monkeypatch):
    """To find where a mirror could throw light out takes longer than all else of a review."""
    from benchlay.coverage import mirrors

    text = BENCH + (
        "enclosure:\n  panels:\n    south: {from: [0, 0], to: [800, 0]}\n"
        "    north: {from: [800, 400], to: [0, 400]}\n"
    )
    asked = []
    find = mirrors.stretches

    def counted(enclosed, gap, leg):
        asked.append((enclosed.layout is not None, gap.key, leg))
        return find(enclosed, gap, leg)

    monkeypatch.setattr(mirrors, "stretches", counted)
    reviewed, files = pipeline.review_files(text.encode(), "x.yaml", on=DAY, state="as drawn")
    assert any(one.stretches for one in reviewed.findings)
    assert any(name.startswith("plan") for name in files)
    assert len(asked) == len(set(asked)) > 0
