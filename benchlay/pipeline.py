"""The stages in a row: what the commands and Python users call.

`read`, `place`, `trace`, `check` and `draw` are the public stages. A layout that cannot be
used raises `LayoutError`, which carries every problem in it. The functions with `review` and
`result` in their names are what the commands use: they take a file's bytes and return
problems as results.
"""

from __future__ import annotations

import os
import re
from collections.abc import Sequence
from datetime import date
from typing import TYPE_CHECKING

from benchlay.document.problems import Problem, Problems
from benchlay.document.span import Span
from benchlay.document.words import nearest
from benchlay.layout import AS_DRAWN, LayoutSource, read_layout
from benchlay.placing import Placed
from benchlay.report.model import LayoutErrors, Reported, Review

if TYPE_CHECKING:
    from benchlay.checks import Context
    from benchlay.faults import Review as FaultReview
    from benchlay.faults.sweeps import Progress
    from benchlay.report.details import TraceResult
    from benchlay.report.faults import FaultsResult
    from benchlay.report.model import Remedies
    from benchlay.results.review import Checked
    from benchlay.tracing import Trace
    from benchlay.zones import Zones

_LINE_BREAK = re.compile("\r\n|[\n\r\x85\u2028\u2029]")  # what counts as one in YAML


class LayoutError(Exception):
    """A layout that cannot be used.

    Attributes
    ----------
    problems : tuple of Problem
        All that is wrong with it, in the order of the file.
    """

    def __init__(self, problems: tuple[Problem, ...]) -> None:
        super().__init__("\n".join(map(str, problems)))
        self.problems = problems


def read(file: str | os.PathLike[str], text: str | bytes | None = None) -> LayoutSource:
    """Read a layout.

    Parameters
    ----------
    file : str or path
        The file; its name stands in every message.
    text : str or bytes, optional
        What it holds, where it is not to be read from disk.

    Returns
    -------
    LayoutSource
        The layout in every state, `as drawn` first, the others by name.

    Raises
    ------
    LayoutError
        If anything is wrong with what is written.
    OSError
        If the file cannot be read.
    """
    if text is None:
        with open(file, "rb") as opened:
            text = opened.read()
    layout, problems = read_layout(text, os.fspath(file))
    if layout is None:
        raise LayoutError(tuple(problems.sorted()))
    others = sorted(name for name in layout.layouts if name != AS_DRAWN)
    return layout._replace(layouts={name: layout.layouts[name] for name in (AS_DRAWN, *others)})


def place(layout: LayoutSource) -> Placed:
    """Place every source and element in every state, along the nominal chief ray.

    Raises
    ------
    LayoutError
        If a place is ambiguous, hangs on itself or cannot be reached by a beam.
    """
    from benchlay.placing import place as solve

    problems = Problems()
    placed = solve(layout, problems)
    if placed is None:
        raise LayoutError(tuple(problems.sorted()))
    return placed


def trace(placed: Placed) -> Trace:
    """Trace the light of every state down to the power floor."""
    from benchlay.checks import floors_w, limits_of
    from benchlay.tracing import trace as follow

    return follow(placed, floors_w(placed, limits_of(placed)))


def check(
    traced: Trace, *, on: date | None = None, states: Sequence[str] | None = None
) -> tuple[Reported, ...]:
    """Run every check in every state.

    Parameters
    ----------
    traced : Trace
        From `trace`.
    on : date, optional
        The day on which the layout's accept entries are held against what is found; without
        one they are left alone, and nothing counts as accepted.
    states : sequence of str, optional
        The states to speak of; all of them by default.

    Returns
    -------
    tuple of Reported
        The gravest first; each over all the states in which it holds.
    """
    from benchlay.results.review import judge

    return judge(_checked(traced, states), on).findings


def draw(traced: Trace) -> dict[str, bytes]:
    """Draw every sheet in each of its formats.

    Returns
    -------
    dict of str to bytes
        By file name, such as ``plan.dxf``.

    Raises
    ------
    LayoutError
        If a sheet fits on no paper, or not on the one that the layout asks for.
    """
    return _drawn(traced)


def review(
    data: bytes, file: str, *, on: date, state: str | None, in_full: bool
) -> Review | LayoutErrors:
    """Review a layout given by its bytes; one state of it where one is named."""
    try:
        return _reviewed(data, file, on=on, state=state, in_full=in_full)[0]
    except LayoutError as error:
        return LayoutErrors(file, error.problems, _lines(data))


def trace_result(data: bytes, file: str, *, state: str | None) -> TraceResult | LayoutErrors:
    """Trace one state of a layout given by its bytes; the state as drawn by default."""
    wanted = AS_DRAWN if state is None else state
    try:
        return _traced(trace(place(_with_state(read(file, data), wanted))), file, wanted)
    except LayoutError as error:
        return LayoutErrors(file, error.problems, _lines(data))


def faults_result(
    data: bytes, file: str, *, state: str | None, progress: Progress | None
) -> FaultsResult | LayoutErrors:
    """Review every credible single fault of a layout given by its bytes; of one state if named."""
    try:
        return _faults(place(_with_state(read(file, data), state)), data, file, state, progress)
    except LayoutError as error:
        return LayoutErrors(file, error.problems, _lines(data))


def _faults(
    placed: Placed, data: bytes, file: str, state: str | None, progress: Progress | None
) -> FaultsResult:
    from benchlay.results.faults import faults_result as put_together

    return put_together(_fault_review(placed, state, progress), placed, file, _digest(data))


def _fault_review(
    placed: Placed, state: str | None, progress: Progress | None = None
) -> FaultReview:
    from benchlay.faults import review_faults

    return review_faults(placed, None if state is None else (state,), progress or _nobody)


def _nobody(done: int, total: int) -> None:
    """Tell nobody how far it is."""
    del done, total


def review_files(
    data: bytes, file: str, *, on: date, state: str | None, progress: Progress | None = None
) -> tuple[Review, dict[str, bytes]] | LayoutErrors:
    """Review a layout in full; also return every file of the review, by name."""
    from benchlay import __version__
    from benchlay.report.json_out import check_document, dumps, faults_document, trace_document
    from benchlay.results.faults import faults_result as put_together
    from benchlay.results.tables import tables

    try:
        reviewed, checked = _reviewed(data, file, on=on, state=state, in_full=True)
        placed = checked.trace.placed
        single = _fault_review(placed, state, progress)
        drawings = _drawn(
            checked.trace,
            reviewed.findings,
            checked.zones,
            reviewed.sha256,
            state=state,
            faults=single,
            context=checked.context,
        )
    except LayoutError as error:
        return LayoutErrors(file, error.problems, _lines(data))
    faults = put_together(single, placed, file, reviewed.sha256)
    remedies = _remedies(data, checked, reviewed, single, on)
    # Unlike a check, a review speaks of what panels take by faults too.
    reviewed = reviewed._replace(remedies=remedies, faults=faults, panels=faults.panels)
    documents = {
        "findings.json": check_document([reviewed], version=__version__),
        "faults.json": faults_document(faults, version=__version__),
        "beams.json": trace_document(_traced(checked.trace, file, checked.states[0])),
    }
    files = {name: dumps(document).encode("ascii") for name, document in documents.items()}
    return reviewed, files | tables(checked.trace.placed) | drawings


def _remedies(
    data: bytes, checked: Checked, reviewed: Review, single: FaultReview, on: date
) -> Remedies:
    """Return what would clear escapes and strays, each tried out on the layout's text."""
    from benchlay.remedies import Judged, fault_offers, offers
    from benchlay.results.review import judge

    def again(text: str) -> Judged | None:
        try:
            other = _checked(trace(place(read(reviewed.layout, text))), checked.states)
        except LayoutError:
            return None
        return Judged(judge(other, on).findings, other.context)

    own = Judged(reviewed.findings, checked.context)
    text = data.decode("utf-8-sig")
    at_rest = offers(text, own, again)
    taken = [name for one in at_rest.offered for name in one.adds]
    found = fault_offers(text, own, again, single.faults, taken)
    return at_rest._replace(
        of_faults=found.offered, faults_without=found.without, faults_left=found.left
    )


def draw_files(
    data: bytes, file: str, *, sheet: str | None, form: str | None
) -> dict[str, bytes] | LayoutErrors:
    """Draw the sheets asked for (all of them for None), each in its forms, by file name."""
    try:
        traced = trace(place(read(file, data)))
        return _drawn(traced, digest=_digest(data), sheet=sheet, form=form)
    except LayoutError as error:
        return LayoutErrors(file, error.problems, _lines(data))


def _drawn(
    traced: Trace,
    judged: Sequence[Reported] = (),
    zones: Zones | None = None,
    digest: str = "",
    *,
    state: str | None = None,
    sheet: str | None = None,
    form: str | None = None,
    faults: FaultReview | None = None,
    context: Context | None = None,
) -> dict[str, bytes]:
    from benchlay.results.drawings import drawings, refusals

    problems = refusals(traced.placed.base.layout, sheet, form)
    if problems:
        raise LayoutError(problems)
    # Whether there is a sheet of faults decides how many the set has: they are reviewed for any.
    if faults is None:
        faults = _fault_review(traced.placed, state)
    made = drawings(
        traced,
        judged,
        zones,
        digest,
        state=state,
        sheet=sheet,
        form=form,
        faults=faults,
        context=context,
    )
    if isinstance(made, Problem):
        raise LayoutError((made,))
    return made


def _traced(traced: Trace, file: str, state: str) -> TraceResult:
    from benchlay.report.details import TraceResult
    from benchlay.results.beam_rows import beam_rows
    from benchlay.results.ledger import ledgers
    from benchlay.results.placed import poses

    variant = traced.scene.variants.index(state)
    return TraceResult(
        file,
        state,
        beam_rows(traced, variant),
        poses(traced.placed.states[variant]),
        ledgers(traced, variant),
    )


def _reviewed(
    data: bytes, file: str, *, on: date, state: str | None, in_full: bool
) -> tuple[Review, Checked]:
    from benchlay.results.review import Paper
    from benchlay.results.review import review as put_together

    traced = trace(place(_with_state(read(file, data), state)))
    checked = _checked(traced, None if state is None else (state,))
    if in_full:
        # Loaded here: polygons take longer to load than all the rest of a plain check.
        from benchlay.zones import zones_of

        checked = checked._replace(zones=zones_of(traced, checked.states))
    paper = Paper(file, _digest(data) if in_full else "", _lines(data))
    return put_together(checked, paper, on, in_full=in_full), checked


def _checked(traced: Trace, states: Sequence[str] | None) -> Checked:
    from benchlay.checks import Context, limits_of, run_checks
    from benchlay.results.review import Checked

    context = Context(traced, limits_of(traced.placed))
    findings, runs = run_checks(context)
    spoken_of = traced.scene.variants if states is None else tuple(states)
    return Checked(context, tuple(findings), tuple(runs), spoken_of)


def _digest(data: bytes) -> str:
    from hashlib import sha256

    return sha256(data).hexdigest()


def _with_state(layout: LayoutSource, state: str | None) -> LayoutSource:
    """Return the layout whole, if it has the state.

    All states are traced whichever is asked for: the power floor is the lowest over all of
    them, and beams have the same numbers in every output.
    """
    if state is not None and state not in layout.layouts:
        raise LayoutError((_unknown_state(layout, state),))
    return layout


def _unknown_state(layout: LayoutSource, state: str) -> Problem:
    known = (AS_DRAWN, *sorted(set(layout.layouts) - {AS_DRAWN}))
    near = nearest(state, known)
    return Problem(
        Span(layout.file, 1, 1),
        f"the layout has no state {state!r}",
        "one of its states: " + ", ".join(known),
        f"write --state {near!r}" if near else "name one of these after --state",
    )


def _lines(data: bytes) -> tuple[str, ...]:
    text = data.decode("utf-8", errors="replace").removeprefix("\ufeff")
    return tuple(_LINE_BREAK.split(text))
