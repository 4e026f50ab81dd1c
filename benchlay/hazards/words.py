"""The figures of hazards as people read them: on the terminal and on the sheet.

Densities and distances are rounded up, never down.
"""

from __future__ import annotations

import math

from benchlay.hazards.model import (
    Diffuse,
    Distance,
    Eyewear,
    Passage,
    Person,
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


def distance_span(row: Distance, decimal: str = ".") -> str:
    """Write the hazardous stretch of a beam in reach."""
    return span(Span(row.from_m, row.to_m, row.far_field_m), decimal)


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
    return "inside, panels open" if where == INSIDE else "outside the enclosure"


def beam_of(row: Eyewear | Distance) -> str:
    """Say which beam a row is about."""
    if row.beam is None:
        return "no light there"
    if row.from_ == row.source:
        return f"{row.source} itself"
    return f"{row.from_}, beam {row.beam}"


def viewing(row: Diffuse, decimal: str = ".") -> str:
    """Write the least distance from a matt surface."""
    far = metres_up(row.distance_m, decimal)
    if row.point_source_m <= row.distance_m:
        return far
    return f"{far} (as a point {metres_up(row.point_source_m, decimal)})"


def person(row: Person, decimal: str = ".") -> str:
    """Say where someone's place lies with respect to the controlled area."""
    where = "INSIDE the controlled area" if row.inside else "outside the controlled area"
    edge = "" if row.edge_m is None else f", {metres(row.edge_m, decimal)}"
    return f"{row.name} ({row.eyes}): {where}{edge}{' from its edge' if edge else ''}"


def passage(row: Passage) -> str:
    """Say whether the controlled area reaches a door or window."""
    return f"{row.kind} {row.name}: {'REACHED by' if row.reached else 'not reached by'} it"


def who(state: StateHazards, decimal: str = ".") -> list[str]:
    """Say who may stand where in a state."""
    area = f"{number(state.controlled_area_m2, 3, decimal)} m²"
    lines = [f"controlled area {area} in plan; inside it only with the eyewear of this state"]
    lines += [person(row, decimal) for row in state.people]
    lines += [passage(row) for row in state.passages]
    if not state.people:
        lines.append("the layout names no places of people: nobody is known to be outside it")
    return lines
