"""Sheets: what goes on each, as plain data that every writer can draw."""

from __future__ import annotations

from collections.abc import Callable, Collection, Iterable, Mapping
from typing import TYPE_CHECKING

from benchlay.named import NamedTuple

if TYPE_CHECKING:
    from benchlay.findings import Severity
    from benchlay.sheets.primitives import Sheet
    from benchlay.tracing.trace import Trace
    from benchlay.zones import Zones


class Subject(NamedTuple):
    """What sheets are drawn from."""

    trace: Trace
    zones: Zones
    counts: Iterable[tuple[Severity, int]]  # how many findings the review has, for the notes
    sha256: str  # of the layout's bytes, to be written into the files
    state: str | None = None  # the only one that the review speaks of, and so the one drawn


def _plan(subject: Subject) -> Sheet:
    from benchlay.sheets.drafting import plan_picture
    from benchlay.sheets.plan import compose

    trace, zones, counts, sha256, state = subject
    picture = plan_picture(
        trace,
        zones,
        variant=0 if state is None else trace.scene.variants.index(state),
        counts=counts,
        of_all_states=state is None,
        sha256=sha256,
    )
    return compose(picture)


SHEETS: Mapping[str, Callable[[Subject], Sheet]] = {"plan": _plan}
"""All sheets there are, by name; a file's name starts with its sheet's.

Each loads what it draws with when it is called: a check draws nothing.
"""


def sheets_of(
    trace: Trace,
    zones: Zones | None = None,
    *,
    only: Collection[str] | None = None,
    counts: Iterable[tuple[Severity, int]] = (),
    sha256: str = "",
    state: str | None = None,
) -> list[Sheet]:
    """Return the sheets of a traced layout, in its state as drawn or in the one named.

    Parameters
    ----------
    trace : Trace
    zones : Zones, optional
        The hazard zones, where they are known already: of the state drawn at least.
    only : collection of str, optional
        Names of the sheets that are wanted; all of `SHEETS` by default.
    counts, sha256, state
        See `Subject`.

    Raises
    ------
    ValueError
        For the name of a sheet that there is not.
    """
    wanted = tuple(SHEETS if only is None else only)
    unknown = sorted(set(wanted) - set(SHEETS))
    if unknown:
        msg = f"there is no sheet {unknown[0]!r}, but {', '.join(SHEETS)}"
        raise ValueError(msg)
    if not wanted:
        return []
    if zones is None:
        from benchlay.zones import zones_of

        zones = zones_of(trace, states=(state or trace.scene.variants[0],))
    subject = Subject(trace, zones, tuple(counts), sha256, state)
    return [SHEETS[name](subject) for name in wanted]
