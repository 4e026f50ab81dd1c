"""Zones of all states: strips and half circles united, split where a wall was passed."""

from __future__ import annotations

import math
from collections.abc import Iterable

import numpy as np
import shapely
from shapely.geometry.base import BaseGeometry

from benchlay.layout.layout import Layout
from benchlay.named import NamedTuple
from benchlay.placing.placed import PlacedState
from benchlay.tracing.beams import FACE, HANDED, NOTHING
from benchlay.tracing.trace import Trace
from benchlay.zones.diffuse import Spot, eye_band, spots
from benchlay.zones.enclosing import Enclosing, enclosing_of
from benchlay.zones.limits import LimitTable, limits_of
from benchlay.zones.polygons import Ring, rings, united
from benchlay.zones.reasons import (
    DIFFUSE,
    DIRECT,
    OVER,
    Bounds,
    Maker,
    Measure,
    makers_in_words,
    reason,
)
from benchlay.zones.swept import Leg, hazardous_legs
from benchlay.zones.words import with_unit

_MM_PER_M = 1e3
_MM2_PER_M2 = 1e6
_LITTLE_MM2 = 1.0
_REACHED = 1.0 - 1e-9
_NEAREST_M = 0.1  # at which an eye can focus on what is lit


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
    ratio: float  # to the limit, where it is highest; infinite where no limit is known


class Zones(NamedTuple):
    """All zones, and what could not be put into them."""

    zones: tuple[Zone, ...]
    not_computed: tuple[str, ...]


class _Piece(NamedTuple):
    area: BaseGeometry
    maker: Maker
    power_w: float
    reach_m: float
    beam: int
    ratio: float  # to the limit, where it is highest


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
    layout = trace.placed.states[variant].layout
    enclosing, room = enclosing_of(layout), _room(layout)
    pieces: dict[tuple[int, str], list[_Piece]] = {}
    for leg in hazardous_legs(trace, limits, variant):
        for kind, area in _by_kind(_within(leg, room), enclosing):
            ratio = _ratio(leg.power_w, float(limits.of(trace, np.array([leg.beam]))[0][0]))
            maker = _maker(trace, leg.beam)
            piece = _Piece(area, maker, leg.power_w, leg.reach_m, leg.beam, ratio)
            pieces.setdefault((int(s.wave[leg.beam]), kind), []).append(piece)
    for wave in range(len(trace.scene.wavelengths_nm)):
        for spot in spots(trace, limits, variant, wave):
            reach = spot.radius_mm / _MM_PER_M
            ratio = _scattered_ratio(trace, limits, spot)
            maker = _spot_maker(spot)
            piece = _Piece(spot.area, maker, spot.power_w, reach, spot.beam, ratio)
            pieces.setdefault((wave, DIFFUSE), []).append(piece)
    zones = [
        _zone(trace, limits, key, polygon, pieces[key])
        for key in sorted(pieces)
        for polygon in united(piece.area for piece in pieces[key])
    ]
    return sorted(zones, key=lambda zone: (zone.wavelength_nm, zone.kind, zone.polygon))


def _ratio(value: float, limit: float) -> float:
    return value / limit if limit > 0.0 else math.inf


def _scattered_ratio(trace: Trace, limits: LimitTable, spot: Spot) -> float:
    """Return the ratio to a point's limit at 100 mm; of what ends nearer, of all of its light."""
    allowed, mpe, _ = (float(v[0]) for v in limits.of(trace, np.array([spot.beam])))
    light = spot.power_w * spot.reflectance
    there = _ratio(light / (math.pi * _NEAREST_M**2), mpe)
    return there if there > 1.0 else _ratio(light, allowed)


def _room(layout: Layout) -> BaseGeometry | None:
    return None if layout.room is None else shapely.Polygon(layout.room.outline)


def _within(leg: Leg, room: BaseGeometry | None) -> Leg:
    """Return a leg without what of its width is beyond the walls, if it starts within them."""
    if room is None or not shapely.covers(room, shapely.Point(leg.start[:2])):
        return leg
    return leg._replace(area=shapely.intersection(leg.area, room))


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
    measure = Measure(
        own[0].power_w,
        float(limits.accessible_w[at]),
        float(limits.aperture_mm[at]),
        float(limits.time_base_s[at]),
        max(piece.ratio for piece in own),
    )
    makers = makers_in_words(piece.maker for piece in own)
    reach = max(piece.reach_m for piece in own)
    bounds = _bounds(trace.placed.states[at[0]], kind, polygon, reach)
    return Zone(
        trace.scene.variants[at[0]],
        kind,
        float(trace.scene.wavelengths_nm[wave]),
        reason(kind, makers, measure, bounds),
        polygon.area / _MM2_PER_M2,
        reach,
        rings(polygon),
        *measure[:4],
        makers,
        measure.ratio,
    )


def _bounds(state: PlacedState, kind: str, polygon: BaseGeometry, reach_m: float) -> Bounds:
    layout = state.layout
    most_m = layout.limits.reach_mm / _MM_PER_M
    enclosing = enclosing_of(layout) if kind == DIFFUSE else None
    return Bounds(
        most_m if reach_m >= most_m * _REACHED else None,
        (eye_band(state)[1] + layout.bench.surface_height_mm) / _MM_PER_M,
        enclosing is not None and _leaves(polygon, enclosing.area),
    )


def _leaves(zone: BaseGeometry, within: BaseGeometry) -> bool:
    """Whether a zone begins inside an area and goes on beyond it."""
    beyond = shapely.difference(zone, within)
    return bool(beyond.area > _LITTLE_MM2 and shapely.intersects(zone, within))


def _maker(trace: Trace, beam: int) -> Maker:
    s, ways = trace.beams.start, trace.ways
    source = trace.scene.sources[s.source[beam]]
    node = int(s.node[beam])
    if node >= 0:
        routes = sorted({ways.names[route] for route, _ in ways.places[node].routes})
        return Maker(f"{source} on", tuple(routes))
    names = (*trace.scene.elements, *trace.scene.sources)
    owner = int(s.owner[beam])
    place = names[owner] if owner < len(names) else "the surroundings"
    return Maker(f"stray light of {source} from", (place,))


def _spot_maker(spot: Spot) -> Maker:
    return Maker("scattered from", (spot.name or f"the {spot.sink}",))


def _beyond(trace: Trace, limits: LimitTable, variant: int) -> list[str]:
    """Name hazardous light that is handed over: it goes on where nothing is traced."""
    b, scene = trace.beams, trace.scene
    out = []
    rows = trace.of_variant(variant)
    for beam in rows[b.end_kind[rows] == HANDED].tolist():
        power = float(b.end_core[beam])
        if power > float(limits.of(trace, np.array([beam]))[0][0]):
            opening = scene.names[int(scene.solids.hole_name[b.end_row[beam]])]
            who = makers_in_words([_maker(trace, beam)])[0]
            out.append(
                f"{with_unit(power, 'W')} of {who} is handed over at {opening}: no zone is "
                f"drawn beyond it (state {scene.variants[variant]})"
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
            f"{with_unit(power, 'W')} of {makers_in_words([_maker(trace, beam)])[0]} passes beside "
            f"{scene.names[owner] if owner >= 0 else 'the bench'} and ends on {place}: "
            f"no zone is drawn for it (state {scene.variants[variant]})"
        )
    return out
