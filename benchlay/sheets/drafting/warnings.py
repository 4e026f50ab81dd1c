"""What a plan says of the hazard of its state in large letters, and which signs it needs."""

from __future__ import annotations

from collections.abc import Iterable, Iterator

from benchlay.hazards.model import Sign, StateHazards
from benchlay.hazards.words import density_up
from benchlay.sheets.layers import wavelength_words
from benchlay.zones.words import number

_NO_CLASS = "LASER LIGHT IN REACH: NO CLASS COULD BE MODELLED"


def warning_lines(hazards: StateHazards, decimal: str) -> tuple[str, ...]:
    """Return what can be reached, and the eyewear for each side of the enclosure."""
    reached = hazards.accessible
    known = reached.class_as_modelled is not None
    first = f"LASER LIGHT IN REACH: {reached.statement}" if known else _NO_CLASS
    return (first, *_eyewear(hazards, decimal))


def _eyewear(hazards: StateHazards, decimal: str) -> Iterator[str]:
    for side in dict.fromkeys(row.where for row in hazards.eyewear):
        needed = [
            f"{wavelength_words(row.wavelength_nm, decimal)} "
            + _density(row.optical_density, decimal)
            for row in hazards.eyewear
            if row.where == side and row.optical_density != 0.0
        ]
        yield f"Eyewear {side}: {', '.join(needed) or 'none asked for by the model'}"


def _density(density: float | None, decimal: str) -> str:
    if density is None:
        return "OD not known"
    return f"OD {number(density_up(density), 3, decimal)} or more"


def sign_rows(signs: Iterable[Sign]) -> tuple[tuple[str, str, str], ...]:
    """Return number, least size and place of each sign; its words are on the safety sheet."""
    return tuple(
        (
            sign.number,
            "×".join(f"{side:g}" for side in sign.size_mm),
            f"{sign.words[0] if sign.words else sign.kind}: {sign.place}",
        )
        for sign in signs
    )
