"""Findings: stable ids, and states merged without losing the worst."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from benchlay import findings as module
from benchlay.findings import (
    Finding,
    MergedFinding,
    Severity,
    identify,
    make_id,
    merge_states,
    sort_key,
)


def finding(**changes):
    basis = Finding(
        check="escape",
        severity=Severity.FAIL,
        message="m",
        expected="e",
        remedy="r",
        element="W1",
        key=("green", 532.0, "W1.back"),
    )
    return basis._replace(**changes)


def test_severities_are_ordered_and_have_words():
    assert Severity.NOTE < Severity.WARN < Severity.FAIL
    assert [s.word for s in Severity] == ["note", "warn", "fail"]


def test_ids_never_change():
    # Pinned: accept entries in users' files hold on to these.
    assert make_id("escape", "W1", ("green", 532.0, "W1.back")) == "escape/W1/deda"
    assert make_id("open-side", None, ()) == "open-side/-/20ec"


def test_last_bits_of_a_number_do_not_matter():
    one = make_id("escape", "W1", ("green", 532.0))
    assert make_id("escape", "W1", ("green", 532.0 * (1 + 2e-16))) == one
    assert make_id("escape", "W1", ("green", 532)) == one
    assert make_id("escape", "W1", ("green", 533.0)) != one
    assert make_id("c", None, (1_234_567,)) != make_id("c", None, (1_234_568,))


@given(
    st.lists(st.text(max_size=4), max_size=4),
    st.lists(st.text(max_size=4), max_size=4),
)
def test_different_keys_have_different_hashes(one, other):
    same = make_id("c", "e", tuple(one), 32) == make_id("c", "e", tuple(other), 32)
    assert same == (one == other)


def test_state_value_and_words_do_not_enter_the_id():
    first, second = identify(
        [finding(), finding(state="alignment", value=3.0, message="other", beam=7)]
    )
    assert first.id == second.id == make_id(first.check, first.element, first.key)


def test_repeated_keys_in_one_state_are_numbered():
    named = identify([finding(beam=1), finding(beam=2), finding(state="b", beam=1)])
    one = make_id("escape", "W1", finding().key)
    assert [f.id for f in named] == [one, f"{one}-2", one]


def colliding():
    """Return two keys whose short hashes agree."""
    seen = {}
    for number in range(100_000):
        short = make_id("escape", "W1", (number,))
        if short in seen:
            return (seen[short],), (number,)
        seen[short] = number
    pytest.fail("no two short hashes agree")


def test_colliding_hashes_grow_until_they_differ():
    one, other = colliding()
    found = identify([finding(key=one), finding(key=other), finding(key=("x",))])
    ids = [f.id for f in found]
    assert len(set(ids)) == 3
    assert all(
        i.startswith(make_id("escape", "W1", k)) for i, k in zip(ids, (one, other), strict=False)
    )
    assert len(ids[0]) == len(ids[1]) == len(ids[2]) + 2
    assert ids[2] == make_id("escape", "W1", ("x",))


def test_ids_do_not_depend_on_order():
    one, other = colliding()
    forth = identify([finding(key=one), finding(key=other)])
    back = identify([finding(key=other), finding(key=one)])
    assert {f.key: f.id for f in forth} == {f.key: f.id for f in back}


def merged(*found):
    return [(m.id, m.states, m.worst_state, m.finding.value) for m in merge_states(found)]


def test_states_are_merged_and_the_worst_keeps_its_data():
    assert merged(
        finding(id="a", state="as drawn", value=1.0),
        finding(id="b", state="as drawn", value=9.0),
        finding(id="a", state="open", value=5.0),
        finding(id="a", state="low", value=2.0),
    ) == [
        ("a", ("as drawn", "open", "low"), "open", 5.0),
        ("b", ("as drawn",), "as drawn", 9.0),
    ]


def test_severity_outweighs_value():
    warn = finding(id="a", state="x", severity=Severity.WARN, value=100.0)
    fail = finding(id="a", state="y", severity=Severity.FAIL, value=1.0)
    assert merge_states([warn, fail]) == [MergedFinding(fail, ("x", "y"), "y")]


def test_worst_where_small_is_bad_unknown_or_equal():
    small = [finding(id="a", state=s, value=v, smaller_is_worse=True) for s, v in STATES]
    assert merge_states(small)[0].worst_state == "y"
    unknown = [
        finding(id="a", state="x", value=1e9),
        finding(id="a", state="y", value=float("nan")),
    ]
    assert merge_states(unknown)[0].worst_state == "y"
    absent = [finding(id="a", state="x"), finding(id="a", state="y", value=-1.0)]
    assert merge_states(absent)[0].worst_state == "y"
    equal = [finding(id="a", state=s, value=1.0) for s in "xy"]
    assert merge_states(equal)[0].worst_state == "x"


STATES = (("x", 0.8), ("y", 0.2), ("z", 0.5))


def test_findings_without_id_stay_apart():
    assert len(merge_states([finding(), finding()])) == 2


def test_report_order_puts_the_gravest_first():
    note = finding(severity=Severity.NOTE, check="a")
    fail = finding(severity=Severity.FAIL, check="z", element=None)
    other = finding(severity=Severity.FAIL, check="b")
    assert sorted([note, fail, other], key=sort_key) == [other, fail, note]


def test_nothing_is_kept_between_calls():
    first = identify([finding(), finding()])
    assert identify([finding(), finding()]) == first
    assert module.identify([]) == []
