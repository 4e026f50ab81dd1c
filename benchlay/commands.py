"""What each command does: results in, text and an exit status out. Nothing prints here.

The pipeline is imported when a command runs, so that ``--help`` and mistakes on the command
line are answered at once.
"""

from __future__ import annotations

import os
import sys
from argparse import Namespace
from collections.abc import Callable, Iterator, Mapping
from datetime import date
from enum import IntEnum
from typing import TYPE_CHECKING, Protocol, TypeAlias, TypeVar

from benchlay.document.problems import Problem
from benchlay.document.span import Span
from benchlay.findings import Severity
from benchlay.named import NamedTuple
from benchlay.report.model import LayoutErrors, Review
from benchlay.report.words import Ink

if TYPE_CHECKING:
    from pathlib import Path

    from benchlay.report.details import TraceResult
    from benchlay.report.faults import FaultsResult

Result = TypeVar("Result")
Progress: TypeAlias = Callable[[int, int], None]
Files: TypeAlias = Mapping[str, bytes]


class Status(IntEnum):
    """Exit statuses; of several layouts the highest counts."""

    NOTHING = 0
    FINDINGS = 1
    WRONG = 2
    FAILED = 3


class Outcome(NamedTuple):
    """What a command leaves: results, remarks, and how it went."""

    status: Status
    out: str = ""
    err: str = ""


class Pipeline(Protocol):
    """What the commands ask of `benchlay.pipeline`."""

    def review(
        self, data: bytes, file: str, *, on: date, state: str | None, in_full: bool
    ) -> Review | LayoutErrors:
        """Check a layout; zones, coverage and routes too where it is asked for in full."""

    def trace_result(
        self, data: bytes, file: str, *, state: str | None
    ) -> TraceResult | LayoutErrors:
        """Trace one state; the state as drawn where none is named."""

    def review_files(
        self,
        data: bytes,
        file: str,
        *,
        on: date,
        state: str | None,
        progress: Progress | None = None,
    ) -> tuple[Review, Files] | LayoutErrors:
        """Review in full, telling how far it is; also every file of the review, by name."""

    def faults_result(
        self, data: bytes, file: str, *, state: str | None, progress: Progress | None
    ) -> FaultsResult | LayoutErrors:
        """Review every credible single fault, telling how far it is."""

    def draw_files(
        self, data: bytes, file: str, *, sheet: str | None, form: str | None
    ) -> Files | LayoutErrors:
        """Draw the sheets asked for (all of them for None), each in its forms, by name."""


def _pipeline() -> Pipeline:
    from benchlay import pipeline

    return pipeline


def run_check(options: Namespace, ink: Ink) -> Outcome:
    """Report the findings of every layout; write nothing else."""
    pipeline = _pipeline()

    def check(data: bytes, file: str) -> Review | LayoutErrors:
        return pipeline.review(data, file, on=options.on, state=options.state, in_full=options.json)

    results = [_of_file(name, check) for name in options.layouts]
    status = max(_status(result, options.fail_on) for result in results)
    return Outcome(status, _check_output(results, options, ink))


def run_trace(options: Namespace, ink: Ink) -> Outcome:
    """Report the beams and the ledger of one state."""
    pipeline = _pipeline()

    def trace(data: bytes, file: str) -> TraceResult | LayoutErrors:
        return pipeline.trace_result(data, file, state=options.state)

    result = _of_file(options.layout, trace)
    status = Status.WRONG if isinstance(result, LayoutErrors) else Status.NOTHING
    if options.json:
        from benchlay.report.json_out import dumps, trace_document

        return Outcome(status, dumps(trace_document(result)))
    if isinstance(result, LayoutErrors):
        return _errors(result, ink)
    from benchlay.report.trace_text import trace_text

    return Outcome(status, trace_text(result))


def run_faults(options: Namespace, ink: Ink) -> Outcome:
    """Report what every credible single fault would do."""
    pipeline = _pipeline()

    def review(data: bytes, file: str) -> FaultsResult | LayoutErrors:
        return pipeline.faults_result(
            data, file, state=options.state, progress=getattr(options, "progress", None)
        )

    result = _of_file(options.layout, review)
    status = (
        Status.WRONG if isinstance(result, LayoutErrors) else _fault_status(result, options.fail_on)
    )
    if options.json:
        from benchlay import __version__
        from benchlay.report.json_out import dumps, faults_document

        return Outcome(status, dumps(faults_document(result, version=__version__)))
    if isinstance(result, LayoutErrors):
        return _errors(result, ink)
    from benchlay.report.faults_text import faults_text

    return Outcome(status, faults_text(result, ink=ink))


def _fault_status(result: FaultsResult, fail_on: str) -> Status:
    """Return the status: what gets out or could not be judged fails, a stray warns."""
    counts = {"fail": ("escape", "not evaluated"), "warn": ("escape", "not evaluated", "stray")}
    reached = any(result.count(outcome) for outcome in counts.get(fail_on, ()))
    return Status.FINDINGS if reached else Status.NOTHING


def run_draw(options: Namespace, ink: Ink) -> Outcome:
    """Write the drawings into the layout's folder."""
    from benchlay.report.files import unwritable, write_all

    pipeline = _pipeline()

    def draw(data: bytes, file: str) -> Files | LayoutErrors:
        return pipeline.draw_files(data, file, sheet=options.sheet, form=options.format)

    drawn = _of_file(options.layout, draw)
    if isinstance(drawn, LayoutErrors):
        return _errors(drawn, ink)
    (folder,) = _folders([options.layout], options.output)
    try:
        written = write_all(folder, drawn)
    except OSError as error:
        return Outcome(Status.WRONG, err=unwritable(folder, error))
    return Outcome(Status.NOTHING, "".join(f"{path}\n" for path in written))


def run_explain(options: Namespace, ink: Ink) -> Outcome:
    """Say what a check or a kind means; list them all where none is named."""
    from benchlay.report.explain import explain, listing, unknown

    if options.name is None:
        return Outcome(Status.NOTHING, listing())
    page = explain(options.name)
    if page is None:
        return Outcome(Status.WRONG, err=unknown(options.name))
    return Outcome(Status.NOTHING, page)


def run_schema(options: Namespace, ink: Ink) -> Outcome:
    """Write the JSON Schema of the layout language."""
    from benchlay.layout.schema import schema
    from benchlay.report.json_out import dumps

    return Outcome(Status.NOTHING, dumps(schema()))


def run_review(options: Namespace, ink: Ink) -> Outcome:
    """Do the main job: everything of every layout, one folder each."""
    folders = _folders(options.layouts, options.output)
    twice = next((f for f in folders if folders.count(f) > 1), None)
    if twice is not None:
        return Outcome(
            Status.WRONG,
            err=f"benchlay: two of the layouts would be written into {twice}\n"
            "  expected: layouts whose file names differ\n"
            "  to mend: review them one by one, each with its own -o DIR\n",
        )
    outcomes = [
        _review_one(name, folder, options, ink)
        for name, folder in zip(options.layouts, folders, strict=True)
    ]
    return Outcome(
        max(outcome.status for outcome in outcomes),
        "\n".join(outcome.out for outcome in outcomes if outcome.out),
        "\n".join(outcome.err for outcome in outcomes if outcome.err),
    )


def run_exposure(options: Namespace, _ink: Ink) -> Outcome:
    """Say of one beam what limits, class, distances and eyewear follow, without a layout."""
    from benchlay.exposure.assessment import Question, assess
    from benchlay.results.one_beam import read

    asked = read(options)
    if not isinstance(asked, Question):
        return Outcome(Status.WRONG, err="".join(f"{mistake}\n" for mistake in asked))
    from benchlay.report.one_beam import beam_document, beam_text

    found = assess(asked)
    if options.json:
        from benchlay.report.json_out import dumps

        return Outcome(Status.NOTHING, dumps(beam_document(found)))
    return Outcome(Status.NOTHING, beam_text(found))


def _review_one(name: str, folder: Path, options: Namespace, ink: Ink) -> Outcome:
    from benchlay.report.files import left_over, refusal, unwritable, write_all
    from benchlay.report.text import check_text

    pipeline = _pipeline()

    def review(data: bytes, file: str) -> tuple[Review, Files] | LayoutErrors:
        # Said only where somebody looks on: what is given to a pipeline stays as short as it was.
        told = {"progress": options.progress} if getattr(options, "progress", None) else {}
        return pipeline.review_files(data, file, on=options.on, state=options.state, **told)

    if not options.force and (refused := refusal(folder, name)):
        return Outcome(Status.WRONG, err=refused)
    result = _of_file(name, review)
    if isinstance(result, LayoutErrors):
        return _errors(result, ink)
    reviewed, files = result
    try:
        written = write_all(folder, files)
    except OSError as error:
        return Outcome(Status.WRONG, err=unwritable(folder, error))
    text = check_text([reviewed], ink=ink)
    return Outcome(
        _status(reviewed, options.fail_on),
        f"{text}written: {len(written)} files in {folder}\n",
        left_over(folder, written),
    )


def _check_output(results: list[Review | LayoutErrors], options: Namespace, ink: Ink) -> str:
    if options.json:
        from benchlay import __version__
        from benchlay.report.json_out import check_document, dumps

        return dumps(check_document(results, version=__version__))
    from benchlay.report.text import check_text

    return check_text(results, ink=ink)


def _errors(result: LayoutErrors, ink: Ink) -> Outcome:
    from benchlay.report.text import errors_text

    return Outcome(Status.WRONG, err=errors_text(result, ink=ink))


def _status(result: Review | LayoutErrors, fail_on: str) -> Status:
    if isinstance(result, LayoutErrors):
        return Status.WRONG
    if fail_on == "never" or result.verdict == "none":
        return Status.NOTHING
    reached = Severity[result.verdict.upper()] >= Severity[fail_on.upper()]
    return Status.FINDINGS if reached else Status.NOTHING


def _of_file(name: str, work: Callable[[bytes, str], Result]) -> Result | LayoutErrors:
    """Read a layout's bytes and work on them; a file that cannot be read is an error in it."""
    try:
        data = _bytes_of(name)
    except OSError as error:
        return LayoutErrors(name, (_unreadable(name, error),))
    return work(data, name)


def _bytes_of(name: str) -> bytes:
    if name == "-":
        return sys.stdin.buffer.read()
    with open(name, "rb") as file:
        return file.read()


def _unreadable(name: str, error: OSError) -> Problem:
    why = (error.strerror or type(error).__name__).lower()
    return Problem(
        Span(name, 1, 1),
        f"the layout cannot be read: {why}",
        "a file of YAML text, or - for standard input",
        f"check the path{_beside(name)}",
    )


def _beside(name: str) -> str:
    """Name the layouts that stand in the same folder, for a path with a slip in it."""
    found = sorted(_layouts_in(os.path.dirname(name) or os.curdir))
    return f"; in that folder there are: {', '.join(found[:8])}" if found else ""


def _layouts_in(folder: str) -> Iterator[str]:
    try:
        yield from (name for name in os.listdir(folder) if name.endswith((".yaml", ".yml")))
    except OSError:
        return


def _folders(layouts: list[str], output: str | None) -> list[Path]:
    from pathlib import Path

    if output is not None and len(layouts) == 1:
        return [Path(output)]
    above = Path("exports" if output is None else output)
    return [above / ("stdin" if name == "-" else Path(name).stem) for name in layouts]
