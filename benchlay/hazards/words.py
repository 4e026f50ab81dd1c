"""The figures of hazards as people read them: on the terminal and on the sheet.

Densities and distances are rounded up, never down.
"""

from __future__ import annotations

import math
from collections.abc import Iterator, Sequence

from benchlay.exposure.viewing import NEAREST_M
from benchlay.hazards.classes import WORST
from benchlay.hazards.model import (
    Diffuse,
    Distance,
    Eyewear,
    Passage,
    Person,
    Reached,
    SourceHazard,
    Span,
    StateHazards,
)
from benchlay.hazards.reach import INSIDE
from benchlay.zones.words import number, with_unit

_DIGITS = 3
_SHORT_M = 0.1
NOT_EXCEEDED = "limit not exceeded as modelled"


def density_up(density: float) -> float:
    """Round a density up to a tenth.

    >>> density_up(2.5902), density_up(2.6)
    (2.6, 2.6)
    """
    return math.ceil(round(density * 10.0, 9)) / 10.0


def metres_up(distance_m: float, decimal: str = ".") -> str:
    """Write a distance, rounded up to three figures.

    >>> metres_up(58.777), metres_up(0.1), metres_up(float("inf"))
    ('58.8 m', '0.1 m', 'no end')
    >>> metres_up(4967.8), metres_up(0.0151)
    ('4970 m', '15.1 mm')
    """
    if math.isinf(distance_m):
        return "no end"
    if distance_m <= 0.0:
        return "0 m"
    step = 10.0 ** (math.floor(math.log10(distance_m)) - _DIGITS + 1)
    up = math.ceil(round(distance_m / step, 6)) * step
    return metres(up, decimal)


def metres(distance_m: float, decimal: str = ".") -> str:
    """Write a distance in metres, short ones in millimetres."""
    if 0.0 < distance_m < _SHORT_M:
        return f"{number(1e3 * distance_m, _DIGITS, decimal)} mm"
    return f"{number(distance_m, _DIGITS, decimal)} m"


def counted(count: int, one: str, more: str = "") -> str:
    """Write a number of things.

    >>> counted(1, "surface"), counted(2, "surface"), counted(1, "beam", " more")
    ('1 surface', '2 surfaces', '1 more beam')
    """
    return f"{count}{more} {one}{'' if count == 1 else 's'}"


def power(power_w: float, decimal: str = ".") -> str:
    """Write a power."""
    return with_unit(power_w, "W", decimal=decimal)


def wavelength(wavelength_nm: float, decimal: str = ".") -> str:
    """Write a wavelength.

    >>> wavelength(632.8, ",")
    '632,8 nm'
    """
    return f"{wavelength_nm:.10g}".replace(".", decimal) + " nm"


def output(source: SourceHazard, decimal: str = ".") -> str:
    """Write what a line emits: mean power, and its pulses."""
    words = with_unit(source.power_W, "W", decimal=decimal)
    if source.pulses is None:
        return words
    energy, lasts, rate = source.pulses
    pulse = with_unit(energy, "J", decimal=decimal), with_unit(lasts, "s", decimal=decimal)
    return f"{pulse[0]} in {pulse[1]}, {with_unit(rate, 'Hz', decimal=decimal)} (mean {words})"


def span(found: Span | None, decimal: str = ".") -> str:
    """Write a hazardous stretch, the formula's figure beside it."""
    if found is None:
        return NOT_EXCEEDED
    start, end, formula = found
    # Its start is rounded down: the longer stretch.
    begins = number(math.floor(start * 1000.0) / 1000.0, 4, decimal)
    return (
        f"{begins} m to {metres_up(end, decimal)} (far-field formula {metres_up(formula, decimal)})"
    )


def short_span(found: Span | None, decimal: str = ".") -> str:
    """Write a hazardous stretch for a column that says what stands in brackets."""
    if found is None:
        return "nowhere"
    return span(found, decimal).replace("far-field formula ", "")


def short_class(name: str | None) -> str:
    """Write within the limit of which class something stays, for a column that says so."""
    if name is None:
        return "no limit known"
    return "above class 3B" if name == WORST else f"class {name}"


def reached(found: Reached) -> str:
    """Say within which limit all light in reach stays, and which of it is the worst."""
    return f"{found.statement}{f'; the worst: {found.governs}' if found.governs else ''}"


def distance_span(row: Distance, decimal: str = ".") -> str:
    """Write the hazardous stretch of a beam in reach."""
    return span(span_of(row), decimal)


def span_of(row: Distance) -> Span:
    """Return the hazardous stretch of a beam in reach."""
    return Span(row.from_m, row.to_m, row.far_field_m)


def stopped(row: Distance, decimal: str = ".") -> str:
    """Say what stops a beam in the model, and where."""
    if math.isinf(row.stopped_m):
        return "nothing stops it"
    return f"{metres(row.stopped_m, decimal)}, {row.ends}"


def density(row: Eyewear, decimal: str = ".") -> str:
    """Write the optical density that eyewear must have."""
    if row.optical_density is None:
        return "no limit known"
    if row.optical_density <= 0.0:
        return "-"
    return f"{density_up(row.optical_density):.1f}".replace(".", decimal)


def scale(row: Eyewear, decimal: str = ".") -> str:
    """Write the scale numbers, and what a focus asks for beyond them."""
    if row.optical_density is None:
        return "no eyewear can be named"
    if row.scale is None or row.scale_1_mm is None:
        return NOT_EXCEEDED
    if row.scale == row.scale_1_mm or row.beam_mm is None:
        return row.scale
    width = number(row.beam_mm, 2, decimal)
    return f"{row.scale_1_mm} (in the focus, {width} mm wide: {row.scale})"


def place(where: str, state: StateHazards) -> str:
    """Say where a row of eyewear is for."""
    if state.accessible.outside is None:
        return "at the open bench"
    return "inside, panels open" if where == INSIDE else "outside"


def beam_of(row: Eyewear | Distance) -> str:
    """Say which beam a row is about."""
    if row.from_ is None:
        return "no light there"
    if row.beam is None:
        return row.from_
    if row.from_ == row.source:
        return f"{row.source} itself"
    return f"{row.from_}, beam {row.beam}"


def viewing(row: Diffuse, decimal: str = ".") -> str:
    """Write the least distance from a matt surface: never less than an eye focuses at."""
    far = metres_up(row.distance_m, decimal)
    if row.distance_m < NEAREST_M:
        return f"{metres(NEAREST_M, decimal)} (limit met at {far})"
    if row.point_source_m <= row.distance_m:
        return far
    return f"{far} (as a point {metres_up(row.point_source_m, decimal)})"


def person(row: Person, decimal: str = ".") -> str:
    """Say where someone's place lies with respect to the controlled area."""
    where = "INSIDE the controlled area" if row.inside else "outside the controlled area"
    edge = "" if row.edge_m is None else f", {metres(row.edge_m, decimal)}"
    return f"{row.name} ({row.eyes}): {where}{edge}{' from its edge' if edge else ''}"


def _passages(rows: Sequence[Passage]) -> Iterator[str]:
    """Yield which doors and windows the controlled area reaches, and which it does not."""
    for row in rows:
        if row.reached:
            yield f"{row.kind} {row.name}: REACHED by the controlled area"
    clear = [f"{row.kind} {row.name}" for row in rows if not row.reached]
    if clear:
        yield f"not reached by it: {', '.join(clear)}"


def area(state: StateHazards, decimal: str = ".") -> str:
    """Write how large the controlled area is in plan, and how much of it is outside a shut box."""
    whole, outside = state.controlled_area_m2, state.controlled_area_outside_m2
    words = f"{number(whole, _DIGITS, decimal)} m²"
    if whole <= 0.0 or outside is None or state.accessible.counts == INSIDE:
        return words
    if outside <= 0.0:
        return f"{words}, none of it outside the enclosure"
    return f"{words}, {number(outside, _DIGITS, decimal)} m² of it outside the enclosure"


def entry(state: StateHazards) -> str:
    """Say who may be in the controlled area of a state."""
    if state.controlled_area_m2 <= 0.0:
        return "the limit is exceeded nowhere, as modelled"
    if state.accessible.counts == INSIDE:
        return "in it only with the eyewear of this state"
    if state.controlled_area_outside_m2:
        return "in it, outside, only with the eyewear for outside"
    return "whoever opens the enclosure needs the eyewear for inside"


def who(state: StateHazards, decimal: str = ".") -> list[str]:
    """Say who may stand where in a state."""
    return [
        f"controlled area in plan {area(state, decimal)}: {entry(state)}",
        *others(state, decimal),
    ]


def others(state: StateHazards, decimal: str = ".") -> list[str]:
    """Say which places of people, doors and windows are in the controlled area."""
    lines = [person(row, decimal) for row in state.people]
    lines += _passages(state.passages)
    if not state.people:
        lines.append("the layout names no places of people: nobody is known to be outside it")
    return lines
