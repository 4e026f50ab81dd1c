"""A dump or screen takes more than it withstands.

Why it matters
--------------
A dump that glows sends its beam back into the room, and one that melts lets it through.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     green:
       {wavelength: 532, power: 2 W, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     D1: {kind: dump, after: green, distance: 300, withstands: {power: 1 W}}  # <- dump-overload
   routes:
     main: [green, D1]

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     green:
       {wavelength: 532, power: 2 W, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     D1: {kind: dump, after: green, distance: 300, withstands: {power: 5 W}}
   routes:
     main: [green, D1]

What it does not see
--------------------
Dumps and screens that state no rating. How long the load lasts, and whether air or water takes
the heat away as the rating supposes.

Source
------
The rating is the layout's. That it be twice the power is good practice (common practice).
"""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from benchlay.checks._check import Context, above, irradiance_text, power_text, wavelength_text
from benchlay.findings import Finding, Severity
from benchlay.geometry.distinct import distinct
from benchlay.layout.elements import Element
from benchlay.layout.layout import Layout
from benchlay.layout.materials import Withstands
from benchlay.scene.tables import SINK, Ints
from benchlay.tracing.beams import FACE

NAME = "dump-overload"

# What is relied on to stop the light may not.
SEVERITY = Severity.FAIL

_STOPS = (SINK["dump"], SINK["screen"])
_PER_CM2 = 1e-4  # of what is told by the m²


def check(context: Context, variant: int) -> Iterator[Finding]:
    """Report each dump and screen with a rating, by all that lands on it."""
    for name, item in sorted(context.state(variant).elements.items()):
        rating = _rating(context.layout(variant), item.element)
        if rating is None or item.out:
            continue
        rows = _landings(context, variant, name)
        if len(rows):
            yield from _held_against(context, variant, name, rating, rows)


def _rating(layout: Layout, element: Element) -> Withstands | None:
    """Return what an element is rated for: its own figure, else that of its material."""
    material = getattr(element.record, "material", None)
    if element.withstands is not None or material is None:
        return element.withstands
    return layout.materials[material].withstands


def _landings(context: Context, variant: int, name: str) -> Ints:
    ledger, scene = context.trace.ledger, context.trace.scene
    if name not in scene.names:
        return np.zeros(0, dtype=np.int64)
    rows = np.flatnonzero((ledger.name == scene.names.index(name)) & np.isin(ledger.sink, _STOPS))
    mine: Ints = rows[context.trace.beams.start.variant[ledger.beam[rows]] == variant]
    return mine


def _held_against(
    context: Context, variant: int, name: str, rating: Withstands, rows: Ints
) -> Iterator[Finding]:
    ledger, beams = context.trace.ledger, context.trace.beams
    strongest = int(ledger.beam[rows[np.argmax(ledger.power[rows])]])
    if rating.power_w is not None:
        total = float(ledger.power[rows].sum())
        if above(total, rating.power_w):
            figures = (total, rating.power_w, "W", power_text(total), power_text(rating.power_w))
            yield _finding(context, variant, name, strongest, figures)
        return
    mine = distinct(ledger.beam[rows])
    mine = mine[beams.end_kind[mine] == FACE]
    if not len(mine):
        return
    peaks = context.peak_w_m2(mine)
    limit = rating.irradiance_w_m2
    if rating.fluence_j_m2 is not None:  # of one pulse; continuous light has none
        peaks = peaks / np.array([context.pulse_rate_hz(b) or np.inf for b in mine.tolist()])
        limit = rating.fluence_j_m2
    worst = float(peaks.max())
    if limit is not None and above(worst, limit):
        texts = (_fluence_text(worst), _fluence_text(limit))
        unit = "J/cm2"
        if rating.fluence_j_m2 is None:
            texts, unit = (irradiance_text(worst), irradiance_text(limit)), "W/cm2"
        figures = (worst * _PER_CM2, limit * _PER_CM2, unit, *texts)
        yield _finding(context, variant, name, int(mine[np.argmax(peaks)]), figures)


def _fluence_text(fluence_j_m2: float) -> str:
    return f"{fluence_j_m2 * _PER_CM2:.3g} J/cm2"


def _finding(
    context: Context,
    variant: int,
    name: str,
    beam: int,
    figures: tuple[float, float, str, str, str],
) -> Finding:
    value, limit, unit, found, rated = figures
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=(
            f"'{name}' takes {found}, most of it {wavelength_text(context.wavelength_nm(beam))} "
            f"from '{context.source_of(beam)}', and withstands {rated}"
        ),
        expected=f"at most {rated}",
        remedy=f"use a dump rated for {found} or more instead of '{name}'",
        element=name,
        beam=int(context.numbers[beam]),
        at=context.end_at(beam),
        span=context.span_of(name, variant),
        value=value,
        limit=limit,
        unit=unit,
        key=(name,),
    )
