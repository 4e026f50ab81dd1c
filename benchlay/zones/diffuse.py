"""Where hazardous light lands on a matt surface, and from where it is seen.

The distance is that of `benchlay.exposure.viewing`: for the spot's own size, of an elliptical
spot the smaller, and never less than that of a point within 100 mm. It is taken in every
direction of the half space in front, which is the larger hazard.
"""

from __future__ import annotations

import math
from collections.abc import Iterator

import numpy as np
import shapely
from shapely.geometry.base import BaseGeometry

from benchlay.layout.materials import BODY, SHEET, Material
from benchlay.named import NamedTuple
from benchlay.placing.placed import PlacedState
from benchlay.scene.tables import SINKS, Floats, Ints
from benchlay.tracing.beams import FACE
from benchlay.tracing.trace import Trace
from benchlay.zones.blockers import Shone, blockers
from benchlay.zones.limits import LimitTable
from benchlay.zones.sight import Band, View, seen
from benchlay.zones.surfaces import normal_met
from benchlay.zones.viewing import scattered_mm, spot_d63_mm

_TOGETHER_MM = 25.0  # spots nearer than this act as one to a distant eye
_IN_WALL_MM = 1.0  # what is lit on a wall lies in its line, but for rounding
_STEPS = 32  # of half a circle
# What the layout says nothing of may be as white as can be.
_UNSTATED = 1.0
_DARK = frozenset({"absorbed", "below-floor", "handed-over", "escaped"})


class Spot(NamedTuple):
    """Light of one wavelength on one place of a surface."""

    beam: int  # the strongest that lands there
    sink: str
    name: str | None
    at: tuple[float, float, float]
    power_w: float
    reflectance: float
    d63_mm: float  # of the spot, 0 for a point
    radius_mm: float  # how far the limit is exceeded
    view: View
    area: BaseGeometry  # from where it is seen within that distance
    opaque: tuple[Floats, ...]  # corners of what stands in the way of its light, mm


class _Landing(NamedTuple):
    power_w: float
    beam: int
    sink: str
    name: str | None
    at: tuple[float, float, float]


def spots(trace: Trace, limits: LimitTable, variant: int, wave: int) -> Iterator[Spot]:
    """Yield the places of a state where a hazardous share lands on a surface that scatters."""
    state = trace.placed.states[variant]
    for group in _groups(trace, variant, wave):
        first = group[0]
        power = sum(landing.power_w for landing in group)
        allowed = float(limits.of(trace, np.array([first.beam]))[0][0])
        share = diffuse_share(state, first.sink, first.name)
        if power * share <= allowed:  # the eye's aperture cannot take more than all of it
            continue
        d63 = min(spot_d63_mm(trace, landing.beam) for landing in group)
        far = scattered_mm(trace, limits, first.beam, (power, share, d63))
        radius = min(far, state.layout.limits.reach_mm)  # as far as anything is followed
        view = _view(state, first.at, _normal(trace, first), radius)
        opaque = tuple(blockers(trace, variant, Shone(wave, allowed / (power * share))))
        area = seen(view, opaque, eye_band(state))
        yield Spot(*first[1:], power, share, d63, radius, view, area, opaque)


def _groups(trace: Trace, variant: int, wave: int) -> list[list[_Landing]]:
    """Return landings on one surface that lie together, the strongest of each first."""
    s, ledger = trace.beams.start, trace.ledger
    rows: Ints = trace.landings_of(variant)
    rows = rows[s.wave[ledger.beam[rows]] == wave]
    found = []
    for row in rows.tolist():
        beam, sink = int(ledger.beam[row]), SINKS[ledger.sink[row]]
        name = None if ledger.name[row] < 0 else trace.scene.names[ledger.name[row]]
        if sink not in _DARK and ledger.power[row] > 0.0:
            at = tuple(trace.beams.end[beam].tolist())
            found.append(_Landing(float(ledger.power[row]), beam, sink, name, at))
    found.sort(key=lambda landing: (-landing.power_w, landing.at, landing.beam))
    by_surface: dict[tuple[str, str | None], list[list[_Landing]]] = {}
    for landing in found:
        groups = by_surface.setdefault((landing.sink, landing.name), [])
        near = (g for g in groups if math.dist(g[0].at, landing.at) < _TOGETHER_MM)
        home = next(near, None)
        if home is None:
            groups.append([landing])
        else:
            home.append(landing)
    return [group for groups in by_surface.values() for group in groups]


def diffuse_share(state: PlacedState, sink: str, name: str | None) -> float:
    """Return what share of the light on a surface it scatters; what nobody states is 1."""
    layout = state.layout
    if sink == "panel" and layout.enclosure is not None and name is not None:
        enclosure = layout.enclosure
        sheet = enclosure.panels.get(name) or enclosure.lids.get(name)
        material = None if sheet is None else enclosure.material_of(sheet)
        return _material(state, material, SHEET).diffuse
    item = state.elements.get(name) if name is not None else None
    if item is None:
        return BODY.diffuse if name in state.sources else _UNSTATED
    own = _OWN_KEY.get(sink)
    if own is not None:
        return float(getattr(item.element.record, own, _UNSTATED))
    return _material(state, item.geometry.material, BODY).diffuse


_OWN_KEY = {"target": "diffuse", "dump": "returns"}


def _material(state: PlacedState, name: str | None, otherwise: Material) -> Material:
    return otherwise if name is None else state.layout.materials[name]


def _normal(trace: Trace, landing: _Landing) -> tuple[float, float, float] | None:
    """Return the normal of the surface a beam ends on; None where it is not known.

    Only what the chief ray meets has a known place and side: what lands beside it is taken
    to lie at the same place, with space all round.
    """
    b, scene = trace.beams, trace.scene
    kind, row = int(b.end_kind[landing.beam]), int(b.end_row[landing.beam])
    normal = normal_met(trace, landing.beam)
    if normal is None:
        return None
    owner = (scene.face_owner_name if kind == FACE else scene.solids.name)[row]
    mine = owner if owner < 0 else scene.names[owner]
    if mine != (landing.name if landing.name is not None else -1):
        return None
    x, y, z = normal.tolist()
    return (x, y, z)


def _view(
    state: PlacedState,
    at: tuple[float, float, float],
    normal: tuple[float, float, float] | None,
    radius: float,
) -> View:
    """Return what lies within a distance of a place, before its surface and within the walls."""
    area = _in_front(at, normal, radius)
    room = state.layout.room
    if room is not None:
        walls = shapely.Polygon(room.outline)
        if shapely.covers(shapely.buffer(walls, _IN_WALL_MM), shapely.Point(at[:2])):
            area = shapely.intersection(area, walls)
    return View(np.array(at), None if normal is None else np.array(normal), radius, area)


def eye_band(state: PlacedState) -> Band:
    """Return between which heights people have their eyes, mm above the bench."""
    limits, floor = state.layout.limits, state.layout.bench.surface_height_mm
    bands = (limits.eyes.seated_mm, limits.eyes.standing_mm)
    return min(low for low, _ in bands) - floor, max(high for _, high in bands) - floor


def _in_front(
    at: tuple[float, float, float], normal: tuple[float, float, float] | None, radius: float
) -> BaseGeometry:
    """Return half a ball seen from above: half a circle and, for a tilted side, half an ellipse."""
    x, y, z = normal or (0.0, 0.0, 1.0)
    flat = float(np.hypot(x, y))
    ux, uy = (x / flat, y / flat) if flat > 0.0 else (1.0, 0.0)
    outer = radius / np.cos(np.pi / (2 * _STEPS))
    angle = np.linspace(-np.pi / 2, np.pi / 2, _STEPS + 1)
    front = np.stack([np.cos(angle), np.sin(angle)], axis=1)
    back = np.stack([-abs(z) * np.cos(angle), np.sin(angle)], axis=1)[::-1]
    local = outer * (np.concatenate([front, back[1:-1]]) if z != 0.0 else front)
    turned = local @ np.array([[ux, uy], [-uy, ux]])
    return shapely.Polygon(turned + np.array(at[:2]))
