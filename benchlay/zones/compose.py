"""Zones of all states: strips and half circles united, split where a wall was passed."""

from __future__ import annotations

from collections.abc import Iterable

import numpy as np
import shapely
from shapely.geometry.base import BaseGeometry

from benchlay.named import NamedTuple
from benchlay.tracing.beams import FACE, HANDED, NOTHING
from benchlay.tracing.trace import Trace
from benchlay.zones.diffuse import Spot, spots
from benchlay.zones.enclosing import Enclosing, enclosing_of
from benchlay.zones.limits import LimitTable, limits_of
from benchlay.zones.polygons import Ring, rings, united
from benchlay.zones.swept import Leg, hazardous_legs
from benchlay.zones.words import number, with_unit

DIRECT, DIFFUSE, OVER = "direct", "diffuse", "over"
_MM2_PER_M2 = 1e6
_NAMED = 3  # of what makes a zone, named in its reason


class Zone(NamedTuple):
    """A polygon in which light exceeds the limit; the first seven fields are the contract's."""

    state: str
    kind: str
    wavelength_nm: float
    reason: str
    area_m2: float
    reach_m: float
    polygon: tuple[Ring, ...]  # mm: the first outer, the rest holes
    power_w: float  # the most that passes an aperture, or lands on a spot
    limit_w: float
    aperture_mm: float
    time_base_s: float
    makers: tuple[str, ...]  # what makes it, the strongest first


class Zones(NamedTuple):
    """All zones, and what could not be put into them."""

    zones: tuple[Zone, ...]
    not_computed: tuple[str, ...]


class _Maker(NamedTuple):
    how: str  # with the words before what it names
    names: tuple[str, ...]


class _Piece(NamedTuple):
    area: BaseGeometry
    maker: _Maker
    power_w: float
    reach_m: float
    beam: int


def zones_of(trace: Trace, states: Iterable[str] | None = None) -> Zones:
    """Return the hazard zones of a trace.

    Zones are areas in plan, whatever the heights: a beam that passes over someone's head is
    in them. They take each beam by itself, and end at the first opaque thing on its chief
    ray; light that passes beside that thing is named in `not_computed` where it exceeds the
    limit. Diffuse light is followed from its first surface only.

    Parameters
    ----------
    trace : Trace
    states : iterable of str, optional
        The states wanted; all by default.
    """
    limits = limits_of(trace)
    wanted = set(trace.scene.variants if states is None else states)
    found: list[Zone] = []
    not_computed = list(limits.unknown)
    for variant, state in enumerate(trace.scene.variants):
        if state in wanted:
            found += _of_state(trace, limits, variant)
            not_computed += _beside(trace, limits, variant)
            not_computed += _beyond(trace, limits, variant)
    return Zones(tuple(found), tuple(dict.fromkeys(not_computed)))


def _of_state(trace: Trace, limits: LimitTable, variant: int) -> list[Zone]:
    s = trace.beams.start
    enclosing = enclosing_of(trace.placed.states[variant].layout)
    pieces: dict[tuple[int, str], list[_Piece]] = {}
    for leg in hazardous_legs(trace, limits, variant):
        for kind, area in _by_kind(leg, enclosing):
            piece = _Piece(area, _maker(trace, leg.beam), leg.power_w, leg.reach_m, leg.beam)
            pieces.setdefault((int(s.wave[leg.beam]), kind), []).append(piece)
    for wave in range(len(trace.scene.wavelengths_nm)):
        for spot in spots(trace, limits, variant, wave):
            reach = spot.radius_mm / 1e3
            piece = _Piece(spot.area, _spot_maker(spot), spot.power_w, reach, spot.beam)
            pieces.setdefault((wave, DIFFUSE), []).append(piece)
    zones = [
        _zone(trace, limits, key, polygon, pieces[key])
        for key in sorted(pieces)
        for polygon in united(piece.area for piece in pieces[key])
    ]
    return sorted(zones, key=lambda zone: (zone.wavelength_nm, zone.kind, zone.polygon))


def _by_kind(leg: Leg, enclosing: Enclosing | None) -> list[tuple[str, BaseGeometry]]:
    """Divide a leg that passes over the enclosure: inside it is direct, beyond it over."""
    if enclosing is None:
        return [(DIRECT, leg.area)]
    if enclosing.is_above(leg.start, leg.end):
        return [(OVER, leg.area)]
    if not enclosing.passes_over(leg.start, leg.end):
        return [(DIRECT, leg.area)]
    inside = shapely.intersection(leg.area, enclosing.area)
    beyond = shapely.difference(leg.area, enclosing.area)
    parts = [(DIRECT, inside), (OVER, beyond)]
    return [(kind, area) for kind, area in parts if area.area > 0.0]


def _zone(
    trace: Trace,
    limits: LimitTable,
    key: tuple[int, str],
    polygon: BaseGeometry,
    pieces: list[_Piece],
) -> Zone:
    wave, kind = key
    own = [piece for piece in pieces if shapely.intersects(piece.area, polygon)]
    own.sort(key=lambda piece: (-piece.power_w, piece.beam))
    s, beam = trace.beams.start, own[0].beam
    at = int(s.variant[beam]), int(s.source[beam]), int(s.wave[beam])
    measure = _Measure(
        own[0].power_w,
        float(limits.accessible_w[at]),
        float(limits.aperture_mm[at]),
        float(limits.time_base_s[at]),
    )
    makers = _makers(piece.maker for piece in own)
    return Zone(
        trace.scene.variants[at[0]],
        kind,
        float(trace.scene.wavelengths_nm[wave]),
        _reason(kind, makers, measure),
        polygon.area / _MM2_PER_M2,
        max(piece.reach_m for piece in own),
        rings(polygon),
        measure.power_w,
        measure.limit_w,
        measure.aperture_mm,
        measure.time_base_s,
        makers,
    )


class _Measure(NamedTuple):
    power_w: float
    limit_w: float
    aperture_mm: float
    time_base_s: float


def _reason(kind: str, makers: tuple[str, ...], measure: _Measure) -> str:
    who = "; ".join(makers)
    power, limit, aperture, time_s = measure
    above = (
        f"limit {with_unit(limit, 'W')} through {number(aperture)} mm in {number(time_s)} s"
        if limit > 0.0
        else "no limit is known, so that any light counts"
    )
    return f"{who}: up to {with_unit(power, 'W')}, {above}; {_WHERE[kind]}"


_WHERE = {
    DIRECT: "to the first opaque thing, seen in plan whatever the height",
    DIFFUSE: "the half space before the surface, seen in plan whatever the height",
    OVER: "beyond the top of the enclosure, seen in plan whatever the height",
}


def _maker(trace: Trace, beam: int) -> _Maker:
    s, ways = trace.beams.start, trace.ways
    source = trace.scene.sources[s.source[beam]]
    node = int(s.node[beam])
    if node >= 0:
        routes = sorted({ways.names[route] for route, _ in ways.places[node].routes})
        return _Maker(f"{source} on", tuple(routes))
    names = (*trace.scene.elements, *trace.scene.sources)
    owner = int(s.owner[beam])
    place = names[owner] if owner < len(names) else "the surroundings"
    return _Maker(f"stray light of {source} from", (place,))


def _makers(makers: Iterable[_Maker]) -> tuple[str, ...]:
    """Return in words what makes a zone, each way of making it once."""
    found: dict[str, dict[str, None]] = {}
    for maker in makers:
        found.setdefault(maker.how, {}).update(dict.fromkeys(maker.names))
    return tuple(f"{how} {_listed(list(names))}" for how, names in found.items())


def _listed(names: list[str]) -> str:
    if len(names) > _NAMED:
        return f"{', '.join(names[:_NAMED])} and {len(names) - _NAMED} more"
    return " and ".join([", ".join(names[:-1]), names[-1]] if len(names) > 1 else names)


def _spot_maker(spot: Spot) -> _Maker:
    return _Maker("scattered from", (spot.name or f"the {spot.sink}",))


def _beyond(trace: Trace, limits: LimitTable, variant: int) -> list[str]:
    """Name hazardous light that is handed over: it goes on where nothing is traced."""
    b, scene = trace.beams, trace.scene
    out = []
    rows = trace.of_variant(variant)
    for beam in rows[b.end_kind[rows] == HANDED].tolist():
        power = float(b.end_core[beam])
        if power > float(limits.of(trace, np.array([beam]))[0][0]):
            opening = scene.names[int(scene.solids.hole_name[b.end_row[beam]])]
            out.append(
                f"{with_unit(power, 'W')} of {_makers([_maker(trace, beam)])[0]} is handed over at "
                f"{opening}: no zone is drawn beyond it (state {scene.variants[variant]})"
            )
    return out


def _beside(trace: Trace, limits: LimitTable, variant: int) -> list[str]:
    """Name hazardous light that lands beside what its chief ray meets: where is not traced."""
    b, ledger, scene = trace.beams, trace.ledger, trace.scene
    out = []
    for row in trace.landings_of(variant).tolist():
        beam = int(ledger.beam[row])
        power = float(ledger.power[row])
        if power <= float(limits.of(trace, np.array([beam]))[0][0]):
            continue
        kind, met = int(b.end_kind[beam]), int(b.end_row[beam])
        if kind == NOTHING:
            continue
        names = {FACE: scene.face_owner_name, HANDED: scene.solids.hole_name}
        owner = int(names.get(kind, scene.solids.name)[met])
        name = int(ledger.name[row])
        if name == owner:
            continue
        place = scene.names[name] if name >= 0 else "no element or panel"
        out.append(
            f"{with_unit(power, 'W')} of {_makers([_maker(trace, beam)])[0]} passes beside "
            f"{scene.names[owner] if owner >= 0 else 'the bench'} and ends on {place}: "
            f"no zone is drawn for it (state {scene.variants[variant]})"
        )
    return out
