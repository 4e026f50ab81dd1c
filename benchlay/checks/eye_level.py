"""Light above the exposure limit runs, or is scattered, where people have their eyes.

Why it matters
--------------
A beam at eye height is met by accident; one well below or above takes a bow or a ladder. Light
that a lit surface scatters is met by whoever sees that surface from too near.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400], surface_height: 1000, beam_height: 380}
   sources:
     red:  # <- eye-level
       {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     T1: {kind: target, after: red, distance: 300}
   routes:
     main: [red, T1]
   room:
     outline: [[-1000, -1500], [2000, -1500], [2000, 1500], [-1000, 1500]]
     people: {operator: {at: [400, -500], eyes: standing}}

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400], surface_height: 1000, beam_height: 360}
   sources:
     red:
       {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     T1: {kind: target, after: red, distance: 300}
   routes:
     main: [red, T1]
   room:
     outline: [[-1000, -1500], [2000, -1500], [2000, 1500], [-1000, 1500]]
     people: {operator: {at: [400, -500], eyes: standing}}

What it does not see
--------------------
People on steps, or bent over the bench. Beams within a closed enclosure are left out, whether or
not it has gaps. Without people in the layout everyone is taken to stand, and only beams are
judged; scattered light is judged where `room.people` says that someone is, exactly there.

Source
------
The bands are the layout's `limits.eyes`, site policy. Their defaults: 1.37 to 1.98 m for those
who stand (4.5 to 6.5 feet, a rule of laser safety manuals), 1.07 to 1.38 m for those who sit on
an ordinary chair (common practice). The limits are those of IEC 60825-1:2014.
"""

from __future__ import annotations

from collections.abc import Iterator
from typing import TYPE_CHECKING

import numpy as np

from benchlay.checks._check import (
    Context,
    Found,
    above,
    against,
    exposure_words,
    length_text,
    listed,
    place_words,
    power_text,
    unjudged,
    wavelength_text,
)
from benchlay.findings import Finding, Severity
from benchlay.layout.layout import Layout
from benchlay.named import NamedTuple
from benchlay.zones.enclosure_line import EnclosureLine, enclosure_line, leaving

if TYPE_CHECKING:
    from benchlay.checks._check.scattered import Met
    from benchlay.document.forms import Entries
    from benchlay.layout.room import Person

NAME = "eye-level"

# A beam that can hurt an eye is where eyes are.
SEVERITY = Severity.FAIL


class _Band(NamedTuple):
    """Heights above the floor at which some people have their eyes, mm."""

    eyes: str
    who: tuple[str, ...]
    low_mm: float
    high_mm: float


def check(context: Context, variant: int) -> Iterator[Found]:
    """Report each line of each source once a band, and each person whom scattered light meets."""
    yield from unjudged(context, variant)
    layout = context.layout(variant)
    line = _closed_line(layout)
    rows = context.beams_of(variant)
    told: set[tuple[str, float, str]] = set()
    for beam in rows[context.hazardous[rows]].tolist():
        part = _part(context, beam, line, layout.bench.surface_height_mm)
        if part is None:
            continue
        for band in _bands(layout):
            key = context.source_of(beam), context.wavelength_nm(beam), band.eyes
            if key not in told and part.low_mm <= band.high_mm and part.high_mm >= band.low_mm:
                told.add(key)
                yield _finding(context, variant, beam, band, part)
    if layout.room is not None and layout.room.people:
        yield from _scattered(context, variant, layout.room.people)


def _bands(layout: Layout) -> list[_Band]:
    eyes = layout.limits.eyes
    people = {} if layout.room is None else layout.room.people
    bands = []
    for word, (low, high) in (("seated", eyes.seated_mm), ("standing", eyes.standing_mm)):
        who = tuple(sorted(name for name, person in people.items() if person.eyes == word))
        if who or (not people and word == "standing"):
            bands.append(_Band(word, who, low, high))
    return bands


def _closed_line(layout: Layout) -> EnclosureLine | None:
    """Return the enclosure's line where all its panels and lids are shut."""
    line = enclosure_line(layout)
    enclosure = layout.enclosure
    if not line.enclosed or enclosure is None:
        return None
    panels = any(panel.open for panel in enclosure.panels.values())
    return None if panels or any(lid.open for lid in enclosure.lids.values()) else line


class _Part(NamedTuple):
    """What of a beam runs outside an enclosure: heights above the floor, mm, and power, W."""

    low_mm: float
    high_mm: float
    power_w: float


def _part(context: Context, beam: int, line: EnclosureLine | None, floor_mm: float) -> _Part | None:
    """Return the part of a beam outside an enclosure that an eye could meet too much of."""
    start, length = context.trace.beams.start, float(context.trace.beams.length[beam])
    x, y, z = context.point(start.position[beam])
    k = context.point(start.direction[beam])
    way, power = 0.0, float(context.accessible_w[beam])
    if line is not None:
        crossing = leaving(line, (x, y), (k[0], k[1]), length)
        if crossing is None:
            return None
        way = crossing.way_mm
        power = float(context.beyond_w(np.array([beam]), np.array([way]))[0])
        if not above(power, float(context.limit_w[beam])):
            return None
    low, high = sorted((z + way * k[2] + floor_mm, z + length * k[2] + floor_mm))
    return _Part(low, high, power)


def _finding(context: Context, variant: int, beam: int, band: _Band, part: _Part) -> Finding:
    height = min(max(part.low_mm, band.low_mm), part.high_mm)
    name = context.left_name(beam)
    who = f"{listed([repr(n) for n in band.who])} ({band.eyes})" if band.who else "people who stand"
    beams = context.trace.beams
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=(
            f"{power_text(part.power_w)} of {context.from_words(beam)} runs {height / 1e3:.4g} m "
            f"above the floor, where {who} {'has' if len(band.who) == 1 else 'have'} their eyes: "
            f"{exposure_words(context, beam, part.power_w)}"
        ),
        expected=(
            f"nothing above the accessible limit between {band.low_mm / 1e3:g} m and "
            f"{band.high_mm / 1e3:g} m outside a closed enclosure"
        ),
        remedy="lower or raise the beam, or enclose it",
        element=name,
        beam=int(context.numbers[beam]),
        at=context.point(beams.start.position[beam]),
        span=context.span_of(name, variant),
        value=height,
        limit=band.low_mm,
        unit="mm",
        key=(context.source_of(beam), context.wavelength_nm(beam), band.eyes),
    )


def _scattered(context: Context, variant: int, people: Entries[Person]) -> Iterator[Finding]:
    """Report by person and wavelength the lit surface that they see from too near."""
    # Loaded where there are people: a plain check needs none of it.
    from benchlay.checks._check.scattered import lit, met_at

    layout = context.layout(variant)
    floor, eyes = layout.bench.surface_height_mm, layout.limits.eyes
    places = lit(context, variant)
    for name, person in sorted(people.items()):
        low, high = eyes.seated_mm if person.eyes == "seated" else eyes.standing_mm
        worst: dict[float, Met] = {}
        for met in met_at(places, person.at_mm, (low - floor, high - floor)):
            if met.nm not in worst or met.ratio > worst[met.nm].ratio:
                worst[met.nm] = met
        for nm, met in sorted(worst.items()):
            surface = met.spot.name
            yield Finding(
                check=NAME,
                severity=SEVERITY,
                message=(
                    f"'{name}' ({person.eyes}) sees {wavelength_text(nm)} from "
                    f"'{context.source_of(met.spot.beam)}' scattered by "
                    f"{place_words(met.spot.sink, surface)} from {length_text(met.far_mm)}: "
                    f"{against(met.limit, met.irradiance_w_m2)}"
                ),
                expected=(
                    f"at least {length_text(met.spot.radius_mm)} to what is lit, or something "
                    "opaque between"
                ),
                remedy=f"screen what is lit from '{name}', or end the beam on a dump",
                element=surface,
                beam=int(context.numbers[met.spot.beam]),
                at=met.spot.at,
                span=context.span_of(surface, variant),
                value=met.irradiance_w_m2,
                limit=met.limit.mpe_w_m2,
                unit="W/m2",
                key=(name, context.source_of(met.spot.beam), nm, met.spot.sink, surface),
            )
