"""What a person reads on the terminal."""

import pytest

from benchlay.document.problems import Problem
from benchlay.document.span import Span
from benchlay.report.cautions import CAUTIONS
from benchlay.report.details import Ledger, Sink, TraceResult
from benchlay.report.model import Acceptance, CheckRun, Elsewhere, LayoutErrors, LimitUsed
from benchlay.report.text import accept_entry, check_text, errors_text, verdict_line
from benchlay.report.trace_text import trace_text
from benchlay.report.words import Ink, quoted, tame

WHOLE = """\
x.yaml:2:3: fail escape: 6.1 mW of 532 nm leave over the south side
  2 |   W1: {kind: window}
    |   ^
  expected: at most 0.385 mW beyond the enclosure
  to mend: raise panel 'south' to 320 mm
  x.yaml:1:1: panel 'south' stands here
  in: as drawn, alignment (the worst in alignment)
  id: escape/W1/g7f3
  to accept: - {finding: escape/W1/g7f3, reason: WHY, by: WHO, until: YYYY-MM-DD, at_most: 0.0061 W}

limit used: 0.000385 W through 7 mm at 532 nm for 100 s (IEC 60825-1:2014)
x.yaml: verdict fail (1 fail); states: as drawn
"""


def test_a_finding_in_full(make_review, make_finding):
    finding = make_finding(related=(Elsewhere("x.yaml", 1, 1, "panel 'south' stands here"),))
    text = check_text([make_review(findings=[finding])])
    assert text.startswith(WHOLE)
    assert all(caution in text for caution in CAUTIONS)


def test_nothing_found_is_said_in_the_words_agreed(make_review):
    checks = (CheckRun("escape", "as drawn", True), CheckRun("escape", "alignment", True))
    assert verdict_line(make_review(checks=checks)) == (
        "x.yaml: no finding under these rules, in these states: as drawn, alignment"
    )


def test_a_check_that_did_not_run_is_listed(make_review):
    checks = (CheckRun("escape", "as drawn", False, "no limit at 12 µm"),)
    text = check_text([make_review(checks=checks)])
    assert "not evaluated: escape in as drawn: no limit at 12 µm" in text


def test_an_accepted_finding_stays_on_the_record(make_review, make_finding):
    entry = Acceptance("survey of May", "safety officer", "2027-06-30")
    text = check_text([make_review(findings=[make_finding("fail", accepted=entry)])])
    assert "x.yaml:2:3: accepted escape:" in text
    assert "  accepted by safety officer until 2027-06-30: survey of May" in text
    assert "verdict none (1 accepted)" in text


def test_only_what_weighs_and_is_not_accepted_says_how_to_accept_it(make_review, make_finding):
    entry = Acceptance("survey of May", "safety officer", "2027-06-30")
    found = [make_finding("note"), make_finding("warn", accepted=entry)]
    assert "to accept:" not in check_text([make_review(findings=found)])


def test_what_is_wrong_with_an_entry_is_not_to_be_accepted(make_review, make_finding):
    finding = make_finding("warn")._replace(check="accept-expired", id="accept-expired/-/b39a")
    assert "to accept:" not in check_text([make_review(findings=[finding])])
    assert "to accept:" in check_text([make_review(findings=[make_finding("warn")])])


@pytest.mark.parametrize(
    ("value", "unit", "written"),
    [
        (0.0061, "W", ", at_most: 0.0061 W"),
        (0.00610001, "W", ", at_most: 0.00611 W"),
        (1234.0, "W/cm2", ", at_most: 1.24e+03 W/cm2"),
        (4.0, "mm", ""),
        (None, None, ""),
        (0.0, "W", ""),
    ],
)
def test_an_entry_to_paste_covers_the_value(make_finding, value, unit, written):
    entry = accept_entry(make_finding(value=value, unit=unit))
    assert entry.removesuffix("}").endswith(f"until: YYYY-MM-DD{written}")


def test_a_limit_that_the_layout_sets_is_shown_as_such(make_review):
    review = make_review()
    (limit,) = review.limits_used
    text = check_text([review._replace(limits_used=(limit._replace(overridden=True),))])
    assert "(IEC 60825-1:2014; set by the layout)" in text


def test_a_limit_of_pulses_says_what_each_may_have(make_review):
    told = LimitUsed(1064.0, 100.0, 0.2, 7.0, 7.7e-6, "IEC 60825-1:2014", False, 7.7e-7)
    text = check_text([make_review(limits_used=(told,))])
    assert (
        "limit used: 7.7e-06 W in the mean, 7.7e-07 J a pulse, through 7 mm at 1064 nm for 100 s "
        "(IEC 60825-1:2014)\n"
    ) in text


def test_errors_count_and_say_that_nothing_was_done():
    problem = Problem(Span("x.yaml", 1, 8), "'1 ft' has no unit we know", "mm", "write 305")
    text = errors_text(LayoutErrors("x.yaml", (problem,), ("size: [1 ft, 2]",)))
    assert text == (
        "x.yaml:1:8: error: '1 ft' has no unit we know\n"
        "  1 | size: [1 ft, 2]\n"
        "    |        ^\n"
        "  expected: mm\n"
        "  to mend: write 305\n"
        "\n"
        "x.yaml: 1 error; nothing was placed, traced or checked\n"
    )


def test_no_class_and_no_approval_is_ever_awarded(make_review):
    text = check_text([make_review()]).lower()
    assert "class 1" not in text
    assert "safe " not in text.replace("laser safety officer", "")


def test_a_file_cannot_steer_the_terminal(make_review, make_finding):
    finding = make_finding(message="a\x1b[2Jb\u202ec", line=1, column=1)
    text = check_text([make_review(findings=[finding], lines=("x\x1b]0;t\x07",))])
    assert "\x1b" not in text
    assert "\u202e" not in text
    assert "a\\x1b[2Jb\\u202ec" in text


def test_colour_changes_the_severity_only(make_review, make_finding):
    review = make_review(findings=[make_finding("warn")])
    coloured = check_text([review], ink=Ink(coloured=True))
    assert coloured.replace("\x1b[33;1m", "").replace("\x1b[0m", "") == check_text([review])
    assert coloured.count("\x1b") == 2


def test_a_long_line_is_quoted_round_the_place():
    line = "a" * 300 + "HERE" + "b" * 300
    text, mark = quoted([line], 1, 301)
    assert len(text) < 120
    assert text[mark.index("^") :].startswith("HERE")


def test_a_place_outside_the_file_is_not_quoted():
    assert quoted(["one"], 2, 1) == []
    assert quoted(["one"], None, None) == []


def test_ordinary_text_of_any_script_is_left_alone():
    assert tame("Schärfe 測定 µm²") == "Schärfe 測定 µm²"


def test_the_trace_lists_where_the_power_went():
    sinks = (Sink("target", "plate", 632.8, 0.0131), Sink("escaped", None, 632.8, 1e-6))
    ledger = Ledger("as drawn", "red", 0.0131 + 1e-6, sinks, 1e-19)
    text = trace_text(TraceResult("x.yaml", "as drawn", (), {}, (ledger,)))
    assert "red emits 0.0131 W, which ends on:" in text
    assert "  target   plate  632.8 nm  0.0131 W" in text
    assert "  not accounted for: 0 W" in text
