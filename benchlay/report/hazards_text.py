"""The hazards of each state for the terminal: short, one line a fact."""

from __future__ import annotations

from collections.abc import Iterator

from benchlay.hazards import words
from benchlay.hazards.model import StateHazards
from benchlay.report.words import tame

_MOST = 4  # beams and surfaces a state; the rest is counted


def hazard_lines(states: tuple[StateHazards, ...]) -> Iterator[str]:
    """Write the hazards of states."""
    for state in states:
        yield f"hazards in {state.state} ({state.edition})"
        yield from (f"  {tame(line)}" for line in _lines(state))
        yield ""


def _lines(state: StateHazards) -> Iterator[str]:
    if not state.sources:
        yield "no source emits in this state"
    for source in state.sources:
        yield (
            f"source {source.source}, {words.wavelength(source.wavelength_nm)}, "
            f"{words.output(source)}: {source.statement}; {words.span(source.span)}"
        )
    yield from _accessible(state)
    yield from _eyewear(state)
    yield from _distances(state)
    yield from _diffuse(state)
    yield from words.who(state)
    yield from (f"holds {line}" for line in state.holds if line.startswith("for exposures"))
    yield from (f"not computed: {line}" for line in state.not_computed)


def _accessible(state: StateHazards) -> Iterator[str]:
    found = state.accessible
    why = ", ".join(found.because) if found.because else "outside the enclosure, shut as drawn"
    counted = found.outside if found.counts == "outside" and found.outside else found.inside
    yield f"in reach ({why}): {words.reached(counted)}"
    if found.outside is not None:
        kept = found.inside if found.counts == "outside" else found.outside
        where = "inside" if found.counts == "outside" else "outside the enclosure"
        yield f"{where}: {words.reached(kept)}"


def _eyewear(state: StateHazards) -> Iterator[str]:
    for row in state.eyewear:
        head = f"eyewear {words.place(row.where, state)}, {words.wavelength(row.wavelength_nm)}: "
        if row.optical_density == 0.0:
            yield head + words.NOT_EXCEEDED
        else:
            yield f"{head}OD {words.density(row)}, {words.scale(row)}; worst: {words.beam_of(row)}"
    if len({row.wavelength_nm for row in state.eyewear}) > 1:
        yield "one set of eyewear must do for all these wavelengths at once"


def _distances(state: StateHazards) -> Iterator[str]:
    for row in state.distances[:_MOST]:
        yield (
            f"beam in reach, {words.wavelength(row.wavelength_nm)} from {words.beam_of(row)}: "
            f"{words.distance_span(row)}; stopped at {words.stopped(row)}"
        )
    if len(state.distances) > _MOST:
        left = words.counted(len(state.distances) - _MOST, "beam", " more")
        yield f"and {left} in reach above the limit"


def _diffuse(state: StateHazards) -> Iterator[str]:
    for row in state.diffuse[:_MOST]:
        yield (
            f"scattered from {row.surface}, {words.wavelength(row.wavelength_nm)}: "
            f"look at it from {words.viewing(row)} or more"
        )
    if len(state.diffuse) > _MOST:
        left = words.counted(len(state.diffuse) - _MOST, "surface", " more")
        yield f"and {left} too bright from near by"
