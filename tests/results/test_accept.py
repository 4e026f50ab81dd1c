"""Accept entries: what they cover, and what is said of those that do not hold."""

from datetime import date

import pytest

from benchlay import pipeline
from benchlay.findings import Finding, MergedFinding, Severity
from benchlay.results.accept import hold

BENCH = """
bench: {{size: [900, 600], beam_height: 100}}
sources:
  red: {{wavelength: 633, power: 8 mW, beam: {{waist_radius: 0.5}}, at: [100, 100], heading: 0}}
elements:
  T1: {{kind: target, at: [400, 100], facing: 180}}
states:
  moved: {{elements.T1.at: [402, 100]}}
accept:
  - finding: escape/T1/1a2b
    reason: surveyed
    by: officer
    until: 2027-06-30
    {more}
"""
DAY = date(2027, 6, 30)
EVERY = ("as drawn", "moved")


@pytest.fixture
def held():
    def call(more="", on=DAY, states=EVERY, *, id="escape/T1/1a2b", seen=("as drawn",), **fields):
        placed = pipeline.place(pipeline.read("x.yaml", BENCH.format(more=more)))
        finding = Finding("escape", Severity.FAIL, "m", "e", "r", id=id, **fields)
        return hold([MergedFinding(finding, seen, seen[0])], placed, on, states)

    return call


def names(result):
    return [finding.check for finding in result.findings]


def test_an_entry_covers_its_finding_through_its_last_day(held):
    result = held()
    entry = result.accepted["escape/T1/1a2b"]
    assert (entry.reason, entry.by, entry.until) == ("surveyed", "officer", "2027-06-30")
    assert entry.at_most is None
    assert result.findings == ()
    assert [(r.check, r.ran) for r in result.runs] == [
        ("accept-expired", True),
        ("accept-unmatched", True),
        ("accept-widened", True),
    ]


def test_the_day_after_it_is_expired(held):
    result = held(on=date(2027, 7, 1))
    assert result.accepted == {}
    (finding,) = result.findings
    assert finding.check == "accept-expired"
    assert finding.severity is Severity.WARN
    assert (finding.span.line, finding.span.column) == (10, 14)
    assert finding.message == ("the finding 'escape/T1/1a2b' was accepted until 2027-06-30 only")


def test_without_a_day_nothing_is_held(held):
    result = held(on=None)
    assert (result.accepted, result.findings, result.runs) == ({}, (), ())


def test_an_entry_that_matches_nothing_names_what_is_near(held):
    result = held(id="escape/T1/ffff")
    (finding,) = result.findings
    assert finding.check == "accept-unmatched"
    assert "'escape/T1/ffff'" in finding.remedy
    assert held(id="escape/M9/ffff").findings[0].remedy == "remove the entry"


def test_what_matches_nothing_cannot_be_told_from_one_state(held):
    result = held(id="escape/T1/ffff", states=("as drawn",))
    assert result.findings == ()
    run = next(run for run in result.runs if run.check == "accept-unmatched")
    assert (run.ran, run.reason) == (False, "not every state was checked")


@pytest.mark.parametrize(
    ("at_most", "value", "unit", "covered"),
    [
        ("2 mW", 0.002, "W", True),
        ("2 mW", 0.0019, "W", True),
        ("2 mW", 0.0021, "W", False),
        ("2", 0.001, "W", False),  # a power must carry its unit
        ("2", 1.9, "mm", True),
        ("2", 2.1, "mm", False),
        ("1 cm", 9.0, "mm", True),
        ("5 %", 0.04, "", True),
        ("5 %", 0.06, "", False),
        ("3 W/cm2", 2.9, "W/cm2", True),
        ("3 W/cm2", 3.1, "W/cm2", False),
        ("2 mW", 0.001, "mm", False),
        ("2 mW", float("nan"), "W", False),
        ("2 mW", None, "W", False),
    ],
)
def test_a_value_may_reach_what_was_accepted(held, at_most, value, unit, covered):
    result = held(f"at_most: {at_most}", value=value, unit=unit)
    assert bool(result.accepted) is covered
    assert names(result) == ([] if covered else ["accept-widened"])


def test_where_less_is_worse_the_value_may_not_fall_below(held):
    less = {"unit": "mm", "smaller_is_worse": True}
    assert held("at_most: 5", value=5.0, **less).accepted
    assert names(held("at_most: 5", value=4.9, **less)) == ["accept-widened"]


@pytest.mark.parametrize(
    ("bound", "seen", "covered"),
    [
        ("{at: [400, 100, 100], within: 0}", ("as drawn",), True),
        ("{at: [400, 100], within: 0.5}", ("as drawn",), True),
        ("{at: [400.6, 100], within: 0.5}", ("as drawn",), False),
        ("{at: [400, 100, 101], within: 0.5}", ("as drawn",), False),
        ("{at: [400, 100], within: 0.5}", ("as drawn", "moved"), False),
        ("{at: [400, 100], within: 2}", ("as drawn", "moved"), True),
    ],
)
def test_elements_must_stay_where_they_were(held, bound, seen, covered):
    result = held(f"bound: {{T1: {bound}}}", seen=seen)
    assert bool(result.accepted) is covered
    assert names(result) == ([] if covered else ["accept-widened"])


def test_all_that_is_beyond_is_said_together(held):
    result = held(
        "at_most: 1 mW\n    bound: {T1: {at: [390, 100], within: 1}}", value=0.002, unit="W"
    )
    (finding,) = result.findings
    assert finding.message == (
        "the finding 'escape/T1/1a2b' goes beyond what was accepted: its value is 0.002 W, "
        "1 mW is accepted; 'T1' stands 10 mm from where it was accepted, 1 mm are"
    )
