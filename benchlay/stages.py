"""The stages in a row: the public interface.

`read`, `place`, `trace`, `check` and `draw` each take what the one before gave. A layout that
cannot be used raises `LayoutError`, which carries every problem in it.
"""

from __future__ import annotations

import os
from collections.abc import Sequence
from datetime import date
from typing import TYPE_CHECKING

from benchlay.document.problems import Problem, Problems
from benchlay.layout import AS_DRAWN, LayoutSource, read_layout
from benchlay.placing import Placed

if TYPE_CHECKING:
    from benchlay.checks import Context
    from benchlay.faults import Review as FaultReview
    from benchlay.faults.sweeps import Progress
    from benchlay.report.model import Reported
    from benchlay.results.review import Checked
    from benchlay.tracing import Trace
    from benchlay.zones import Zones


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

    return judge(checked_of(traced, states), on).findings


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
    return drawn(traced)


def drawn(
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
    """Draw the sheets asked for, with what a review knows already; see `drawings`."""
    from benchlay.results.drawings import drawings, refusals

    problems = refusals(traced.placed.base.layout, sheet, form)
    if problems:
        raise LayoutError(problems)
    # Whether there is a sheet of faults decides how many the set has: they are reviewed for any.
    if faults is None:
        faults = fault_review(traced.placed, state)
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


def checked_of(traced: Trace, states: Sequence[str] | None) -> Checked:
    """Run every check; return what was found and what it was found in."""
    from benchlay.checks import Context, limits_of, run_checks
    from benchlay.results.review import Checked

    context = Context(traced, limits_of(traced.placed))
    findings, runs = run_checks(context)
    spoken_of = traced.scene.variants if states is None else tuple(states)
    return Checked(context, tuple(findings), tuple(runs), spoken_of)


def fault_review(
    placed: Placed, state: str | None, progress: Progress | None = None
) -> FaultReview:
    """Review every credible single fault, of one state where one is named."""
    from benchlay.faults import review_faults

    return review_faults(placed, None if state is None else (state,), progress or _nobody)


def _nobody(done: int, total: int) -> None:
    """Tell nobody how far it is."""
    del done, total
