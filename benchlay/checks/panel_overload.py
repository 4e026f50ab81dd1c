"""A panel or lid takes more than it withstands, or a hazardous beam without a rating.

Why it matters
--------------
A panel that burns through is no panel. How long it holds has to be known before it is relied
on.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     green:
       {wavelength: 532, power: 2 W, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   materials:
     card: {withstands: {irradiance: 20 W/cm2, for: 100 s}}
   enclosure:
     material: card
     panels:
       east: {from: [800, 0], to: [800, 400]}  # <- panel-overload

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     green:
       {wavelength: 532, power: 2 W, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   materials:
     steel: {withstands: {irradiance: 2 kW/cm2, for: 100 s}}
   enclosure:
     material: steel
     panels:
       east: {from: [800, 0], to: [800, 400]}

What it does not see
--------------------
Beams that add up in one place: each is taken alone. Diffuse light. Whether the rating was
taken at this wavelength and for a spot of this size, and whether the time it was taken for is
long enough.

Source
------
Peak irradiance of a Gaussian beam: 2 P/(pi w1 w2) across the beam, which is no less than on a
tilted panel. Guards are rated by what they withstand for a stated time (IEC 60825-4:2006, cited
from memory; written for machines that process, the method is borrowed).
"""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from benchlay.checks._check import (
    Context,
    Found,
    above,
    exposure_words,
    irradiance_text,
    power_text,
    unjudged,
    wavelength_text,
)
from benchlay.findings import Finding, Severity
from benchlay.layout.layout import Layout
from benchlay.layout.materials import Withstands
from benchlay.named import NamedTuple
from benchlay.scene.tables import SINK, Ints
from benchlay.tracing.beams import SOLID

NAME = "panel-overload"

_W_CM2 = 1e-4  # per W/m2
_J_CM2 = 1e-4  # per J/m2


class _Load(NamedTuple):
    """What a sheet takes of one kind, and what it withstands; in the unit told."""

    beam: int
    value: float
    limit: float
    unit: str
    text: str


def check(context: Context, variant: int) -> Iterator[Found]:
    """Report by panel and lid the beam that loads it most."""
    yield from unjudged(context, variant)
    layout = context.layout(variant)
    if layout.enclosure is None:
        return
    beams, s = context.trace.beams, context.trace.scene.solids
    rows = context.beams_of(variant)
    rows = rows[beams.end_kind[rows] == SOLID]
    rows = rows[s.sink[beams.end_row[rows]] == SINK["panel"]]
    for name in sorted({context.end_name(beam) or "" for beam in rows.tolist()}):
        mine = np.array([b for b in rows.tolist() if context.end_name(b) == name], dtype=np.int64)
        rating = _rating(layout, name)
        load = None if rating is None else _load(context, mine, rating)
        if load is not None and above(load.value, load.limit):
            yield _overloaded(context, variant, name, load)
            continue
        unrated = _unrated(context, mine, rating)
        if len(unrated):
            yield _not_shown(context, variant, name, unrated)


def _unrated(context: Context, rows: Ints, rating: Withstands | None) -> Ints:
    """Return the hazardous beams that a rating does not speak of.

    A rating by fluence is one for pulses, and says nothing of continuous light.
    """
    rows = rows[context.hazardous[rows]]
    if rating is not None and rating.fluence_j_m2 is None:
        return rows[:0]
    steady = [rating is None or context.pulse_rate_hz(beam) is None for beam in rows.tolist()]
    unrated: Ints = rows[np.array(steady, dtype=np.bool_)]
    return unrated


def _rating(layout: Layout, name: str) -> Withstands | None:
    enclosure = layout.enclosure
    assert enclosure is not None
    sheet = enclosure.panels.get(name) or enclosure.lids[name]
    material = enclosure.material_of(sheet)
    return None if material is None else layout.materials[material].withstands


def _load(context: Context, rows: Ints, rating: Withstands) -> _Load | None:
    """Return the worst load in the rating's own quantity; None where it does not apply."""
    beams = context.trace.beams
    if rating.power_w is not None:
        total = float(beams.end_core[rows].sum())
        worst = int(rows[np.argmax(beams.end_core[rows])])
        return _Load(worst, total, rating.power_w, "W", power_text(total))
    peak = context.peak_w_m2(rows)
    if rating.irradiance_w_m2 is not None:
        at = int(np.argmax(peak))
        value = float(peak[at])
        limit = rating.irradiance_w_m2 * _W_CM2
        return _Load(int(rows[at]), value * _W_CM2, limit, "W/cm2", irradiance_text(value))
    rates = np.array([context.pulse_rate_hz(beam) or np.inf for beam in rows.tolist()])
    fluence = peak / rates
    at = int(np.argmax(fluence))
    if fluence[at] <= 0.0 or rating.fluence_j_m2 is None:
        return None
    value = float(fluence[at]) * _J_CM2
    return _Load(int(rows[at]), value, rating.fluence_j_m2 * _J_CM2, "J/cm2", f"{value:.3g} J/cm2")


def _overloaded(context: Context, variant: int, name: str, load: _Load) -> Finding:
    return Finding(
        check=NAME,
        severity=Severity.FAIL,  # it may burn through
        message=(
            f"'{name}' takes {load.text} of {wavelength_text(context.wavelength_nm(load.beam))} "
            f"from '{context.source_of(load.beam)}' and is rated for {load.limit:.3g} {load.unit}"
        ),
        expected=f"at most {load.limit:.3g} {load.unit}",
        remedy=f"end the beam on a dump before '{name}', or rate '{name}' for it",
        element=name,
        beam=int(context.numbers[load.beam]),
        at=context.end_at(load.beam),
        span=context.span_of(name, variant),
        value=load.value,
        limit=load.limit,
        unit=load.unit,
        key=(name,),
    )


def _not_shown(context: Context, variant: int, name: str, rows: Ints) -> Finding:
    peak = context.peak_w_m2(rows)
    beam = int(rows[np.argmax(peak)])
    worst = float(peak.max())
    return Finding(
        check=NAME,
        severity=Severity.WARN,  # nothing says that it fails, and nothing that it holds
        message=(
            f"not shown: '{name}' takes {irradiance_text(worst)} of "
            f"{wavelength_text(context.wavelength_nm(beam))} from '{context.source_of(beam)}' "
            "and states no rating for it; an eye would meet "
            f"{exposure_words(context, beam, float(context.accessible_w[beam]))}"
        ),
        expected="a rating of whatever takes a beam above the accessible limit",
        remedy=(
            f"state what the material of '{name}' withstands, such as "
            "`withstands: {irradiance: …, for: 100 s}`"
        ),
        element=name,
        beam=int(context.numbers[beam]),
        at=context.end_at(beam),
        span=context.span_of(name, variant),
        value=worst * _W_CM2,
        unit="W/cm2",
        key=(name,),
    )
