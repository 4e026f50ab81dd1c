"""Sheets: what goes on each, as plain data that every writer can draw."""

from __future__ import annotations

from collections.abc import Collection, Iterable
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from benchlay.findings import Severity
    from benchlay.sheets.primitives import Sheet
    from benchlay.tracing.trace import Trace
    from benchlay.zones import Zones

SHEETS = ("plan",)
"""The names of all sheets there are; a file's name starts with its sheet's."""


def sheets_of(
    trace: Trace,
    zones: Zones | None = None,
    *,
    only: Collection[str] | None = None,
    counts: Iterable[tuple[Severity, int]] = (),
    sha256: str = "",
) -> list[Sheet]:
    """Return the sheets of a traced layout, in its state as drawn.

    Nothing of drawing is loaded before this is called.

    Parameters
    ----------
    trace : Trace
    zones : Zones, optional
        The hazard zones, where they are known already.
    only : collection of str, optional
        Names of the sheets that are wanted; all of `SHEETS` by default.
    counts : iterable of (Severity, int), optional
        How many findings the review has, for the notes.
    sha256 : str, optional
        Of the layout's bytes, to be written into the files.

    Raises
    ------
    ValueError
        For the name of a sheet that there is not.
    """
    wanted = SHEETS if only is None else tuple(only)
    unknown = sorted(set(wanted) - set(SHEETS))
    if unknown:
        msg = f"there is no sheet {unknown[0]!r}, but {', '.join(SHEETS)}"
        raise ValueError(msg)
    from benchlay.sheets.drafting import plan_picture
    from benchlay.sheets.plan import compose
    from benchlay.zones import zones_of

    if not wanted:
        return []
    if zones is None:
        zones = zones_of(trace, states=(trace.scene.variants[0],))
    return [compose(plan_picture(trace, zones, counts=counts, sha256=sha256))]
