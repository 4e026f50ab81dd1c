"""The accessible limit of every line in every state, and the power floor made from it."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from typing import TypeAlias

from benchlay.exposure import AccessibleLimit, OutOfRange, Pulse, accessible_limit
from benchlay.layout.light import Line, PulseTrain
from benchlay.named import NamedTuple
from benchlay.placing.placed import Placed, PlacedState

# Contract of the language: the floor is never more than this share of what a line emits.
_MOST_OF_SOURCE = 1e-6
# A bench whose lines all emit nothing still needs a floor above zero.
_DARK_W = 1e-9


class LineLimit(NamedTuple):
    """The accessible limit, or the sentence that says why there is none, and for what pulses."""

    limit: AccessibleLimit | None
    reason: str | None = None
    pulse: Pulse | None = None


LimitKey: TypeAlias = tuple[int, str, float]
"""State (number), source (name), wavelength in nm."""

Limits: TypeAlias = Mapping[LimitKey, LineLimit]


def limits_of(placed: Placed) -> Limits:
    """Return the accessible limit by state, source and wavelength.

    A source has a limit at every wavelength of the layout, so that light which it makes
    elsewhere is judged too; there its own pulses count.
    """
    waves = placed.wavelengths_nm
    known: dict[tuple[float, float | None, PulseTrain | None], LineLimit] = {}
    found: dict[LimitKey, LineLimit] = {}
    for variant, state in enumerate(placed.states):
        base_s = state.layout.limits.time_base_s
        for name in sorted(state.sources):
            lines = state.lines(name)
            for nm in waves:
                question = (nm, base_s, _pulses(lines, nm))
                if question not in known:
                    known[question] = _limit(*question)
                found[variant, name, nm] = known[question]
    return found


def _pulses(lines: Sequence[Line], wavelength_nm: float) -> PulseTrain | None:
    """Return the pulses of a source's light at a wavelength; None for continuous light."""
    own = [line for line in lines if line.wavelength_nm == wavelength_nm]
    some = own or sorted(lines, key=lambda line: -line.power_w)
    return next((line.pulse for line in some if line.pulse is not None), None)


def _limit(wavelength_nm: float, base_s: float | None, pulse: PulseTrain | None) -> LineLimit:
    train = None if pulse is None else Pulse(pulse.energy_j, pulse.duration_s, pulse.rate_hz)
    try:
        return LineLimit(accessible_limit(wavelength_nm, base_s, train), pulse=train)
    except OutOfRange as error:
        return LineLimit(None, str(error), train)


def floors_w(placed: Placed, limits: Limits) -> dict[float, float]:
    """Return by wavelength (nm) the power (W) below which beams need not be followed.

    The lowest over all states of `limits.floor` times the accessible limit, and never more
    than a millionth of what a line emits; where there is no limit the source alone speaks.
    """
    floors: dict[float, float] = {}
    for variant, state in enumerate(placed.states):
        for nm, floor in _floors_in(state, variant, limits):
            floors[nm] = min(floors.get(nm, floor), floor)
    return {nm: floors.get(nm, _DARK_W) for nm in placed.wavelengths_nm}


def _floors_in(state: PlacedState, variant: int, limits: Limits) -> list[tuple[float, float]]:
    share = state.layout.limits.floor
    found = [
        (line.wavelength_nm, _MOST_OF_SOURCE * line.power_w)
        for item in state.sources.values()
        for line in item.source.lines
        if line.power_w > 0.0 and not item.source.stand.out
    ]
    emitted = [power for _, power in found]
    found += [(nm, min(emitted)) for nm in state.made_nm() if emitted]
    for (number, _, nm), line_limit in limits.items():
        if number == variant and line_limit.limit is not None:
            found.append((nm, share * line_limit.limit.accessible_w))
    return found
