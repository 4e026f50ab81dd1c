"""Findings for people: each with its place, the layout's own line, and how to mend it.

The words of a finding are the finding's; this form adds none of its own but the summary.
"""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from math import ceil, floor, log10

from benchlay.document.problems import Problem
from benchlay.report.cautions import CAUTIONS, IN_FULL
from benchlay.report.matrix import matrix_lines, matrix_of
from benchlay.report.model import LayoutErrors, LimitUsed, Reported, Review
from benchlay.report.numbers import shown
from benchlay.report.words import Ink, listed, quoted, tame

PLAIN = Ink()
_SEVERITIES = ("fail", "warn", "note")
_NAMED = 2  # faults that a change keeps in too
_WORTH_ACCEPTING = ("fail", "warn")
_GROWING = ("W", "J", "W/m2", "J/m2", "W/cm2", "J/cm2")  # of values that are worse when larger


def check_text(results: Sequence[Review | LayoutErrors], *, ink: Ink = PLAIN) -> str:
    """Write what was found in each layout, its verdict last, then the cautions once."""
    parts = [
        errors_text(result, ink=ink)
        if isinstance(result, LayoutErrors)
        else _review_text(result, ink)
        for result in results
    ]
    reviews = [result for result in results if isinstance(result, Review)]
    if reviews:
        parts.append(_cautions(of_exposure=any(review.hazards for review in reviews)))
    return "\n".join(parts)


def errors_text(result: LayoutErrors, *, ink: Ink = PLAIN) -> str:
    """Write what is wrong with a layout that could not be used."""
    lines: list[str] = []
    for problem in result.errors:
        lines += _problem_lines(problem, result.lines, ink)
    count = len(result.errors)
    lines.append(
        f"{tame(result.layout)}: {count} {'error' if count == 1 else 'errors'}; "
        "nothing was placed, traced or checked"
    )
    return "\n".join(lines) + "\n"


def verdict_line(review: Review) -> str:
    """Sum up a review in one line."""
    name = tame(review.layout)
    states = listed(review.states)
    if not review.findings:
        return f"{name}: no finding under these rules, in these states: {states}"
    open_ones = [f.severity for f in review.findings if not f.accepted]
    counts = [f"{open_ones.count(s)} {s}" for s in _SEVERITIES if s in open_ones]
    accepted = len(review.findings) - len(open_ones)
    if accepted:
        counts.append(f"{accepted} accepted")
    return f"{name}: verdict {review.verdict} ({', '.join(counts)}); states: {states}"


def _review_text(review: Review, ink: Ink) -> str:
    lines: list[str] = []
    for finding in review.findings:
        lines += _finding_lines(finding, review, ink)
    lines += _remedy_lines(review)
    lines += _fault_lines(review, ink)
    lines += matrix_lines(matrix_of(review))
    if review.hazards:
        from benchlay.report.hazards_text import hazard_lines

        lines += hazard_lines(review.hazards)
    lines += _not_evaluated(review)
    lines += _limit_lines(review)
    lines.append(verdict_line(review))
    return "\n".join(lines) + "\n"


def _finding_lines(finding: Reported, review: Review, ink: Ink) -> Iterator[str]:
    place = f"{finding.file}:{finding.line}:{finding.column}"
    where = tame(place if finding.line else review.layout)
    word = "accepted" if finding.accepted else ink.paint(finding.severity)
    yield f"{where}: {word} {finding.check}: {tame(finding.message)}"
    yield from quoted(review.lines, finding.line, finding.column)
    yield f"  expected: {tame(finding.expected)}"
    yield f"  to mend: {tame(finding.remedy)}"
    for other in finding.related:
        yield f"  {tame(f'{other.file}:{other.line}:{other.column}: {other.message}')}"
    yield f"  in: {listed(finding.states)}{_worst(finding)}"
    if finding.accepted:
        entry = finding.accepted
        yield f"  accepted by {tame(entry.by)} until {entry.until}: {tame(entry.reason)}"
    yield f"  id: {finding.id}"
    # What is wrong with an entry is mended there: no further entry covers it.
    worth = finding.severity in _WORTH_ACCEPTING and not finding.check.startswith("accept-")
    if worth and not finding.accepted:
        yield f"  to accept: {accept_entry(finding)}"
    yield ""


def _remedy_lines(review: Review) -> Iterator[str]:
    """Write the changes that were tried out, each with what is to be pasted."""
    remedies = review.remedies
    if remedies is None or not any(remedies._replace(tried=0)):
        return
    if remedies.offered:
        yield "tried out: each of these clears its finding and raises no other"
    for remedy in remedies.offered:
        too = f" (and {', '.join(remedy.clears_too)})" if remedy.clears_too else ""
        yield f"  {remedy.finding}{too}: {tame(remedy.words)}"
        yield from (f"      {tame(line)}" for line in remedy.yaml.split("\n"))
    for finding in remedies.without:
        yield f"  {finding}: no stop, panel, coating, tilt or wedge that was tried clears it alone"
    if remedies.of_faults:
        yield "tried out: with each of these a single fault lets nothing out, and no finding is new"
    for one in remedies.of_faults:
        yield f"  {tame(one.fault)} in {tame(one.state)}{_too(one.clears_too)}: {tame(one.words)}"
        yield from (f"      {tame(line)}" for line in one.yaml.split("\n"))
    for name in remedies.faults_without:
        yield f"  {tame(name)}: no panel, lid, cover or stop that was tried keeps it in alone"
    if remedies.faults_left:
        yield f"  {remedies.faults_left} more faults that let light out: see faults.json"
    yield ""


def _too(names: tuple[str, ...]) -> str:
    """Say what else a change does, without naming more than a few."""
    more = f" and {len(names) - _NAMED} more" if len(names) > _NAMED else ""
    return f" (and {tame(', '.join(names[:_NAMED]))}{more})" if names else ""


def _fault_lines(review: Review, ink: Ink) -> Iterator[str]:
    """Say how many single faults there are and what the worst would do; the rest is a file."""
    if review.faults is None:
        return
    from benchlay.report.faults_text import overloaded, summary, worst_line

    worst = worst_line(review.faults, ink)
    yield summary(review.faults)
    if worst is not None:
        yield f"  the worst: {worst}"
    for guard in overloaded(review.faults):
        yield f"  overloaded by a fault: {guard}"
    yield "  all of them: faults.json, and `benchlay faults`; the verdict is of the layout as it is"
    yield ""


def accept_entry(finding: Reported) -> str:
    """Return the entry that would accept a finding, to be pasted under ``accept:``.

    What only a person can know is left in capitals, and is refused until it is filled in.
    """
    at_most = ""
    if finding.value is not None and finding.value > 0.0 and finding.unit in _GROWING:
        at_most = f", at_most: {_rounded_up(finding.value):.3g} {finding.unit}"
    return f"- {{finding: {finding.id}, reason: WHY, by: WHO, until: YYYY-MM-DD{at_most}}}"


def _rounded_up(value: float) -> float:
    """Round up to three figures, so that the value itself is covered."""
    step = 10.0 ** (floor(log10(value)) - 2)
    return ceil(value / step * (1.0 - 1e-12)) * step


def _worst(finding: Reported) -> str:
    if len(finding.states) == 1:
        return ""
    return f" (the worst in {finding.worst_state})"


def _problem_lines(problem: Problem, lines: Sequence[str], ink: Ink) -> Iterator[str]:
    span = problem.span
    yield f"{tame(str(span))}: {ink.paint('error')}: {tame(problem.message)}"
    yield from quoted(lines, span.line, span.column)
    yield f"  expected: {tame(problem.expected)}"
    yield f"  to mend: {tame(problem.remedy)}"
    yield ""


def _not_evaluated(review: Review) -> list[str]:
    """List the checks that did not run: they are not among those passed."""
    return [
        f"not evaluated: {run.check} in {run.state}: {tame(run.reason or 'no reason given')}"
        for run in review.checks
        if not run.ran
    ]


def _limit_lines(review: Review) -> list[str]:
    return [
        f"limit used: {_power(limit)} through {shown(limit.aperture_mm, 'mm')} "
        f"at {shown(limit.wavelength_nm, 'nm')} for {shown(limit.time_base_s, 's')} "
        f"({limit.edition}{'; set by the layout' if limit.overridden else ''})"
        for limit in review.limits_used
    ]


def _power(limit: LimitUsed) -> str:
    power = shown(limit.accessible_W, "W")
    if limit.accessible_J is None:
        return power
    return f"{power} in the mean, {shown(limit.accessible_J, 'J')} a pulse,"


def _cautions(*, of_exposure: bool) -> str:
    """Write what all of it must be read with, and what figures of exposure must besides."""
    words = IN_FULL if of_exposure else CAUTIONS
    return "\n".join(f"caution: {caution}" for caution in words) + "\n"
