"""What the commands ask for: a file's bytes in, results out, a user's mistakes among them.

The stages themselves, which raise `LayoutError`, are those of `benchlay.stages`; they can be
had from here too.
"""

from __future__ import annotations

import re
from datetime import date
from typing import TYPE_CHECKING

from benchlay.document.problems import Problem
from benchlay.document.span import Span
from benchlay.document.words import nearest
from benchlay.layout import AS_DRAWN, LayoutSource
from benchlay.placing import Placed
from benchlay.report.model import LayoutErrors, Review
from benchlay.stages import (
    LayoutError,
    check,
    checked_of,
    draw,
    drawn,
    fault_review,
    place,
    read,
    trace,
)

if TYPE_CHECKING:
    from benchlay.faults import Review as FaultReview
    from benchlay.faults.sweeps import Progress
    from benchlay.report.details import TraceResult
    from benchlay.report.faults import FaultsResult
    from benchlay.report.model import Remedies
    from benchlay.results.review import Checked
    from benchlay.tracing import Trace

__all__ = [
    "LayoutError",
    "check",
    "draw",
    "draw_files",
    "faults_result",
    "place",
    "read",
    "review",
    "review_files",
    "trace",
    "trace_result",
]

_LINE_BREAK = re.compile("\r\n|[\n\r\x85\u2028\u2029]")  # what counts as one in YAML


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

    return put_together(fault_review(placed, state, progress), placed, file, _digest(data))


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
        single = fault_review(placed, state, progress)
        drawings = drawn(
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
            other = checked_of(trace(place(read(reviewed.layout, text))), checked.states)
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
        return drawn(traced, digest=_digest(data), sheet=sheet, form=form)
    except LayoutError as error:
        return LayoutErrors(file, error.problems, _lines(data))


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
    checked = checked_of(traced, None if state is None else (state,))
    if in_full:
        # Loaded here: polygons take longer to load than all the rest of a plain check.
        from benchlay.zones import zones_of

        checked = checked._replace(zones=zones_of(traced, checked.states))
    paper = Paper(file, _digest(data) if in_full else "", _lines(data))
    return put_together(checked, paper, on, in_full=in_full), checked


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
