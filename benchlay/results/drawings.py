"""The drawings of a traced layout, each in its formats, as files' bytes.

The drawing libraries are loaded with this module, so it is loaded when something is drawn.
"""

from __future__ import annotations

from collections import Counter
from collections.abc import Callable, Mapping, Sequence
from typing import TYPE_CHECKING

from benchlay.document.problems import Problem, format_choices
from benchlay.document.span import Span
from benchlay.findings import Severity
from benchlay.layout.layout import Layout
from benchlay.report.model import Reported
from benchlay.sheets import SHEETS, Composed, UnknownSheetError, sheets_of
from benchlay.sheets.contents import Mark
from benchlay.sheets.primitives import Sheet
from benchlay.sheets.scale import PLAN_SIZES, NothingFitsError
from benchlay.tracing import Trace
from benchlay.writers import dxf, pdf, svg
from benchlay.zones import Zones

if TYPE_CHECKING:
    from benchlay.checks import Context
    from benchlay.faults import Review as FaultReview

FORMS: Mapping[str, Callable[[Sheet], bytes]] = {
    "dxf": dxf.write,
    "svg": svg.write,
    "pdf": pdf.write,
}
"""How a sheet is written, by the ending of its file."""

SET = "sheets.pdf"  # all sheets of the set in one file


def refusals(layout: Layout, sheet: str | None, form: str | None) -> tuple[Problem, ...]:
    """Return what speaks against drawing what is asked for."""
    place = Span(layout.file, 1, 1)
    found = []
    if sheet is not None and sheet.partition("-")[0] not in {k.partition("-")[0] for k in SHEETS}:
        found.append(_unknown(layout, UnknownSheetError(sheet, SHEETS)))
    if form is not None and form not in FORMS:
        what = f"not yet: sheets are not written as {form}"
        found.append(Problem(place, what, f"--format {format_choices(FORMS)}", "name another"))
    asked = layout.drawing.sheet
    if asked not in ("auto", *PLAN_SIZES):
        found.append(
            Problem(
                layout.drawing.span_of("sheet"),
                f"a plan has no room on {asked} beside its tables and title block",
                f"auto, or one of {format_choices(PLAN_SIZES)}",
                "write 'sheet: auto'",
            )
        )
    return tuple(found)


def drawings(
    trace: Trace,
    judged: Sequence[Reported] = (),
    zones: Zones | None = None,
    sha256: str = "",
    *,
    state: str | None = None,
    sheet: str | None = None,
    form: str | None = None,
    faults: FaultReview | None = None,
    context: Context | None = None,
) -> dict[str, bytes] | Problem:
    """Return the sheets asked for (all for None) in the formats asked for, by file name.

    A sheet that fits on no paper is a problem of the layout. Findings and zones are what the
    review has of them: the findings are counted in the sheets' notes, and zones that are not
    known yet are worked out. `sha256` is that of the layout's bytes. `state` is the one that
    the review speaks of, where it is of one alone: it is drawn, else the one as drawn. `faults`
    is the review of single faults, where there was one, and `context` what the checks know of
    the trace already.
    """
    counts = Counter(Severity[finding.severity.upper()] for finding in judged)
    try:
        composed = sheets_of(
            trace,
            zones,
            only=sheet,
            counts=sorted(counts.items()),
            sha256=sha256,
            state=state,
            findings=_marks(judged, state or trace.scene.variants[0]),
            faults=faults,
            context=context,
        )
    except UnknownSheetError as error:
        return _unknown(trace.placed.base.layout, error)
    except NothingFitsError as error:
        return _too_large(trace.placed.base.layout, error)
    if sheet is not None and not composed:
        return _none(trace.placed.base.layout, sheet)
    files = {
        f"{drawn.name}.{ending}": write(drawn)
        for drawn, planned in composed
        for ending, write in FORMS.items()
        if form in (None, ending)
        and (planned.forms is None or ending in planned.forms)
        and not (planned.within and ending == "pdf")
        and not (sheet is None and planned.numbered and ending == "pdf")  # they are in the set
    }
    if form in (None, "pdf"):
        files |= _gathered(composed, whole=sheet is None)
    return files or _not_in(trace.placed.base.layout, sheet, form)


def _marks(judged: Sequence[Reported], state: str) -> tuple[Mark, ...]:
    """Return the findings as a plan marks them, in the order of the record."""
    return tuple(
        Mark(n, one.severity, f"{one.check}: {one.message}", one.at, state in one.states)
        for n, one in enumerate(judged, start=1)
    )


def _gathered(composed: Sequence[Composed], *, whole: bool) -> dict[str, bytes]:
    """Return the PDFs of several pages: the whole set, and those that sheets ask for by name."""
    pages: dict[str, list[Sheet]] = {}
    for drawn, planned in composed:
        if whole and planned.numbered:
            pages.setdefault(SET, []).append(drawn)
        if planned.within:
            pages.setdefault(f"{planned.within}.pdf", []).append(drawn)
    return {name: pdf.write_set(sheets) for name, sheets in pages.items()}


def _unknown(layout: Layout, error: UnknownSheetError) -> Problem:
    what = f"there is no sheet {error.name!r}"
    expected = f"--sheet {format_choices(error.known)}"
    return Problem(Span(layout.file, 1, 1), what, expected, "name another")


def _none(layout: Layout, sheet: str) -> Problem:
    """Say that a kind of sheet was asked for that the layout has nothing for."""
    what = f"the layout has nothing that a sheet {sheet!r} would show"
    expected = "a sheet of what is in the layout"
    return Problem(Span(layout.file, 1, 1), what, expected, "add it, or leave --sheet out")


def _not_in(layout: Layout, sheet: str | None, form: str | None) -> Problem:
    """Say that what was asked for is made, but not in the format asked for."""
    what = f"sheet {sheet!r} is not written as {form}"
    expected = "a format that this sheet is made in"
    return Problem(Span(layout.file, 1, 1), what, expected, "leave --format out")


def _too_large(layout: Layout, error: NothingFitsError) -> Problem:
    drawing = layout.drawing
    asked = drawing.written("sheet") or drawing.written("scale")
    return Problem(
        drawing.span if asked else layout.bench.span,
        f"the plan cannot be drawn: {error}",
        "a bench that fits on the sheet at the scale asked for",
        "write 'sheet: auto' and 'scale: auto'" if asked else "check the size of the bench",
    )
