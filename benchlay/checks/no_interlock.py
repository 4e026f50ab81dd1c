"""A panel or lid that can be opened around a hazardous beam has no interlock.

Why it matters
--------------
Whoever opens it stands in front of the beam, and nothing stops the laser.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red:
       {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     T1: {kind: target, after: red, distance: 300}
   routes:
     main: [red, T1]
   enclosure:
     panels:
       south: {from: [0, 0], to: [800, 0], access: tool}  # <- no-interlock
       east: {from: [800, 0], to: [800, 400]}
       north: {from: [800, 400], to: [0, 400]}
       west: {from: [0, 400], to: [0, 0]}

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red:
       {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     T1: {kind: target, after: red, distance: 300}
   routes:
     main: [red, T1]
   enclosure:
     panels:
       south: {from: [0, 0], to: [800, 0], access: interlocked}
       east: {from: [800, 0], to: [800, 400]}
       north: {from: [800, 400], to: [0, 400]}
       west: {from: [0, 400], to: [0, 0]}

What it does not see
--------------------
Whether an interlock works, or is defeated. Where a panel that needs a tool is opened for
service only, a label may do instead: say so in an `accept` entry.

Source
------
Covers that are opened in use or maintenance need an interlock that is redundant or fails to
the safe side (IEC 60825-1:2014, protective housing and safety interlocks; cited from memory).
"""

from __future__ import annotations

from collections.abc import Iterator

from benchlay.checks._check import (
    Context,
    Found,
    exposure_words,
    power_text,
    unjudged,
    wavelength_text,
)
from benchlay.document.span import Span
from benchlay.findings import Finding, Severity
from benchlay.layout.layout import Layout
from benchlay.named import NamedTuple
from benchlay.zones.enclosure_line import EnclosureLine, enclosure_line, inside, passes

NAME = "no-interlock"

_INTERLOCKED = "interlocked"
_NOT_OPENED = "none"


def check(context: Context, variant: int) -> Iterator[Found]:
    """Report each panel and lid that is or may be opened, with the strongest beam inside."""
    layout = context.layout(variant)
    sheets = list(_without(layout))
    if not sheets:
        return
    yield from unjudged(context, variant)
    beam = _strongest_inside(context, variant)
    if beam is not None:
        for sheet in sheets:
            yield _finding(context, beam, sheet)


class _Sheet(NamedTuple):
    """A panel or lid without interlock."""

    what: str
    name: str
    span: Span | None
    stands_open: bool


def _without(layout: Layout) -> Iterator[_Sheet]:
    """Yield the panels and lids that are or may be opened and have no interlock."""
    if layout.enclosure is None:
        return
    panels, lids = layout.enclosure.panels, layout.enclosure.lids
    for name, panel in sorted(panels.items()):
        if panel.access != _INTERLOCKED and (panel.access != _NOT_OPENED or panel.open):
            yield _Sheet("panel", name, panels.spans.get(name), panel.open)
    for name, lid in sorted(lids.items()):
        if lid.access != _INTERLOCKED and (lid.access != _NOT_OPENED or lid.open):
            yield _Sheet("lid", name, lids.spans.get(name), lid.open)


def _strongest_inside(context: Context, variant: int) -> int | None:
    """Return the hazardous beam with the most power that runs within the enclosure's line."""
    line = enclosure_line(context.layout(variant))
    rows = context.beams_of(variant)
    rows = rows[context.hazardous[rows]]
    within = [b for b in rows.tolist() if _runs_inside(context, line, b)]
    return max(within, key=lambda b: (float(context.accessible_w[b]), -b), default=None)


def _runs_inside(context: Context, line: EnclosureLine, beam: int) -> bool:
    """Whether some part of a beam runs within the line, wherever it comes from."""
    start, length = context.trace.beams.start, float(context.trace.beams.length[beam])
    x, y, _ = context.point(start.position[beam])
    kx, ky, _ = context.point(start.direction[beam])
    return inside(line, (x, y)) or passes(line, (x, y), (kx, ky), length)


def _finding(context: Context, beam: int, sheet: _Sheet) -> Finding:
    name = sheet.name
    power, limit = float(context.accessible_w[beam]), float(context.limit_w[beam])
    state = "stands open" if sheet.stands_open else "can be opened with a tool"
    return Finding(
        check=NAME,
        # Standing open it exposes people; opened with a tool it does so only in service.
        severity=Severity.FAIL if sheet.stands_open else Severity.WARN,
        message=(
            f"{sheet.what} '{name}' {state} and has no interlock; inside runs "
            f"{power_text(power)} of {wavelength_text(context.wavelength_nm(beam))} from "
            f"'{context.source_of(beam)}': {exposure_words(context, beam, power)}"
        ),
        expected=f"an interlock, or at most {power_text(limit)} inside",
        remedy=f"give '{name}' an interlock (`access: interlocked`), or fix it for good",
        element=name,
        beam=int(context.numbers[beam]),
        span=sheet.span,
        value=power,
        limit=limit,
        unit="W",
        key=(context.source_of(beam), context.wavelength_nm(beam), name),
    )
