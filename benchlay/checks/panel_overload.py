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
taken at this wavelength and for a spot of this size. How long a beam really stays: it is taken
to last for the time base of its limit.

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
from benchlay.document.span import Span
from benchlay.findings import Finding, Severity
from benchlay.layout.layout import Layout
from benchlay.layout.materials import Withstands
from benchlay.named import NamedTuple
from benchlay.scene.tables import PART, SINK, Ints
from benchlay.tracing.beams import SOLID

NAME = "panel-overload"

_W_CM2 = 1e-4  # per W/m2
_J_CM2 = 1e-4  # per J/m2


class _Sheet(NamedTuple):
    """A panel or a lid."""

    name: str
    is_lid: bool

    def words(self, layout: Layout) -> str:
        """Return its name; for a lid that a panel shares it with, what it is too."""
        enclosure = layout.enclosure
        shared = self.is_lid and enclosure is not None and self.name in enclosure.panels
        return f"lid '{self.name}'" if shared else f"'{self.name}'"

    @property
    def key(self) -> tuple[str, ...]:
        """What stays the same of it from run to run."""
        return (self.name, "lid") if self.is_lid else (self.name,)


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
    # A panel and a lid may have one name, and each its own material.
    parts = s.part[beams.end_row[rows]]
    found = [
        _Sheet(context.end_name(b) or "", p == PART["lid"])
        for b, p in zip(rows.tolist(), parts.tolist(), strict=True)
    ]
    for sheet in sorted(set(found)):
        mine = rows[np.array([one == sheet for one in found])]
        rating = _rating(layout, sheet)
        load = None if rating is None else _load(context, mine, rating)
        if load is not None and above(load.value, load.limit):
            yield _overloaded(context, variant, sheet, load)
            continue
        unrated = _unrated(context, mine, rating)
        if len(unrated):
            yield _not_shown(context, variant, sheet, (unrated, rating))


def _unrated(context: Context, rows: Ints, rating: Withstands | None) -> Ints:
    """Return the hazardous beams that a rating does not speak of.

    A rating by fluence is one for pulses, and says nothing of continuous light; one for a time
    says nothing of a longer exposure, which is taken to last for the time base of the limit.
    """
    rows = rows[context.hazardous[rows]]
    if rating is not None and rating.fluence_j_m2 is None:
        short = [_exposed_s(context, beam) > (rating.for_s or np.inf) for beam in rows.tolist()]
        too_short: Ints = rows[np.array(short, dtype=np.bool_)]
        return too_short
    steady = [rating is None or context.pulse_rate_hz(beam) is None for beam in rows.tolist()]
    unrated: Ints = rows[np.array(steady, dtype=np.bool_)]
    return unrated


def _exposed_s(context: Context, beam: int) -> float:
    """Return for how long a sheet is taken to be exposed to a beam, s."""
    variant = int(context.trace.beams.start.variant[beam])
    line = context.limits.get((variant, context.source_of(beam), context.wavelength_nm(beam)))
    return line.limit.time_base_s if line is not None and line.limit is not None else 0.0


def _rating(layout: Layout, sheet: _Sheet) -> Withstands | None:
    enclosure = layout.enclosure
    assert enclosure is not None
    where = enclosure.lids if sheet.is_lid else enclosure.panels
    material = enclosure.material_of(where[sheet.name])
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


def _overloaded(context: Context, variant: int, sheet: _Sheet, load: _Load) -> Finding:
    words = sheet.words(context.layout(variant))
    return Finding(
        check=NAME,
        severity=Severity.FAIL,  # it may burn through
        message=(
            f"{words} takes {load.text} of {wavelength_text(context.wavelength_nm(load.beam))} "
            f"from '{context.source_of(load.beam)}' and is rated for {load.limit:.3g} {load.unit}"
        ),
        expected=f"at most {load.limit:.3g} {load.unit}",
        remedy=f"end the beam on a dump before {words}, or rate {words} for it",
        element=sheet.name,
        beam=int(context.numbers[load.beam]),
        at=context.end_at(load.beam),
        span=_span(context, variant, sheet),
        value=load.value,
        limit=load.limit,
        unit=load.unit,
        key=sheet.key,
    )


def _not_shown(
    context: Context, variant: int, sheet: _Sheet, unrated: tuple[Ints, Withstands | None]
) -> Finding:
    rows, rating = unrated
    words = sheet.words(context.layout(variant))
    peak = context.peak_w_m2(rows)
    beam = int(rows[np.argmax(peak)])
    worst = float(peak.max())
    return Finding(
        check=NAME,
        severity=Severity.WARN,  # nothing says that it fails, and nothing that it holds
        message=(
            f"not shown: {words} takes {irradiance_text(worst)} of "
            f"{wavelength_text(context.wavelength_nm(beam))} from '{context.source_of(beam)}' "
            f"and {_missing(context, beam, rating)}; an eye would meet "
            f"{exposure_words(context, beam, float(context.accessible_w[beam]))}"
        ),
        expected="a rating of whatever takes a beam above the accessible limit",
        remedy=(
            f"state what the material of {words} withstands, such as "
            f"`withstands: {{irradiance: …, for: {max(_exposed_s(context, beam), 100.0):g} s}}`"
        ),
        element=sheet.name,
        beam=int(context.numbers[beam]),
        at=context.end_at(beam),
        span=_span(context, variant, sheet),
        value=worst * _W_CM2,
        unit="W/cm2",
        key=sheet.key,
    )


def _missing(context: Context, beam: int, rating: Withstands | None) -> str:
    """Say what the rating does not speak of."""
    if rating is None or rating.for_s is None or rating.fluence_j_m2 is not None:
        return "states no rating for it"
    return f"is rated for {rating.for_s:g} s, not for the {_exposed_s(context, beam):g} s assumed"


def _span(context: Context, variant: int, sheet: _Sheet) -> Span | None:
    enclosure = context.layout(variant).enclosure
    assert enclosure is not None
    where = enclosure.lids if sheet.is_lid else enclosure.panels
    return where.spans.get(sheet.name)
