"""A beam above the accessible limit runs at the height of people's eyes.

Why it matters
--------------
A beam at eye height is met by accident; one well below or above takes a bow or a ladder.

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
Diffuse light. People on steps, or bent over the bench. Legs within a closed enclosure are left
out, whether or not it has gaps. Without people in the layout everyone is taken to stand.

Source
------
The bands are the layout's `limits.eyes`, site policy. Their defaults: 1.37 to 1.98 m for those
who stand (4.5 to 6.5 feet, a rule of laser safety manuals), 1.07 to 1.38 m for those who sit on
an ordinary chair (common practice).
"""

from __future__ import annotations

from collections.abc import Iterator

from benchlay.checks._check import (
    Context,
    Found,
    listed,
    power_text,
    unjudged,
)
from benchlay.findings import Finding, Severity
from benchlay.layout.layout import Layout
from benchlay.named import NamedTuple
from benchlay.zones.enclosure_line import EnclosureLine, enclosure_line, leaving

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
    """Report each line of each source once a band, where it first comes to that height."""
    yield from unjudged(context, variant)
    layout = context.layout(variant)
    line = _closed_line(layout)
    rows = context.beams_of(variant)
    told: set[tuple[str, float, str]] = set()
    for beam in rows[context.hazardous[rows]].tolist():
        heights = _heights(context, beam, line, layout.bench.surface_height_mm)
        if heights is None:
            continue
        for band in _bands(layout):
            key = context.source_of(beam), context.wavelength_nm(beam), band.eyes
            if key not in told and heights[0] <= band.high_mm and heights[1] >= band.low_mm:
                told.add(key)
                yield _finding(context, variant, beam, band, heights)


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


def _heights(
    context: Context, beam: int, line: EnclosureLine | None, floor_mm: float
) -> tuple[float, float] | None:
    """Return the least and greatest height above the floor of the part outside an enclosure."""
    start, length = context.trace.beams.start, float(context.trace.beams.length[beam])
    x, y, z = context.point(start.position[beam])
    k = context.point(start.direction[beam])
    way = 0.0
    if line is not None:
        crossing = leaving(line, (x, y), (k[0], k[1]), length)
        if crossing is None:
            return None
        way = crossing.way_mm
    ends = sorted((z + way * k[2] + floor_mm, z + length * k[2] + floor_mm))
    return ends[0], ends[1]


def _finding(
    context: Context, variant: int, beam: int, band: _Band, heights: tuple[float, float]
) -> Finding:
    height = min(max(heights[0], band.low_mm), heights[1])
    name = context.left_name(beam)
    power = float(context.accessible_w[beam])
    who = f"{listed([repr(n) for n in band.who])} ({band.eyes})" if band.who else "people who stand"
    beams = context.trace.beams
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=(
            f"{power_text(power)} of {context.from_words(beam)} runs {height / 1e3:.4g} m above "
            f"the floor, where {who} {'has' if len(band.who) == 1 else 'have'} their eyes"
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
