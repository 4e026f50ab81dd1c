"""Where the power of each source went, in a state: landings added up by place and wavelength."""

from __future__ import annotations

from collections.abc import Iterator
from math import fsum

from benchlay.report.details import Ledger, Sink
from benchlay.scene.tables import SINK, SINKS
from benchlay.tracing import Trace

_BELOW_FLOOR = SINK["below-floor"]


def ledgers(trace: Trace, variant: int) -> tuple[Ledger, ...]:
    """Return one entry a source that emits in a variant, in name order.

    Every sink is a sum of what landed there, exact to the last bit whatever its order; what
    is unaccounted is the only difference.
    """
    by_source = _landings(trace, variant)
    emitted = trace.emitted_w(variant)
    return tuple(
        _ledger(trace.scene.variants[variant], name, emitted[name], by_source.get(name, {}))
        for name in sorted(emitted)
    )


_Place = tuple[int, str | None, float]


def _landings(trace: Trace, variant: int) -> dict[str, dict[_Place, list[float]]]:
    """Return the powers that landed, by source and by (sink, name, wavelength)."""
    scene, start, ledger = trace.scene, trace.beams.start, trace.ledger
    rows = trace.landings_of(variant)
    beam = ledger.beam[rows]
    columns = (
        start.source[beam],
        ledger.sink[rows],
        ledger.name[rows],
        scene.wavelengths_nm[start.wave[beam]],
        ledger.power[rows],
    )
    found: dict[str, dict[_Place, list[float]]] = {}
    for source, sink, name, nm, power in zip(*(c.tolist() for c in columns), strict=True):
        place = (sink, scene.names[name] if name >= 0 else None, nm)
        found.setdefault(scene.sources[source], {}).setdefault(place, []).append(power)
    return found


def _ledger(state: str, source: str, emitted_w: float, places: dict[_Place, list[float]]) -> Ledger:
    sinks = tuple(_sinks(places))
    missing = fsum([emitted_w, *(-power for powers in places.values() for power in powers)])
    return Ledger(state, source, emitted_w, sinks, missing)


def _sinks(places: dict[_Place, list[float]]) -> Iterator[Sink]:
    """Yield the sinks in the order of their kinds, names and wavelengths."""
    for place in sorted(places, key=lambda p: (p[0], p[1] or "", p[2])):
        sink, name, nm = place
        powers = places[place]
        total = fsum(powers)
        if total > 0.0:
            largest = max(powers) if sink == _BELOW_FLOOR else None
            yield Sink(SINKS[sink], name, nm, total, largest)
