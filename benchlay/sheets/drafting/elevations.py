"""Routes laid out straight along their paths, from a trace."""

from __future__ import annotations

from collections.abc import Iterator
from math import cos, sin

import numpy as np

from benchlay.layout.layout import Layout
from benchlay.optics import moments
from benchlay.optics.rays import cross, dot
from benchlay.placing.placed import PlacedElement, PlacedState
from benchlay.scene.tables import Floats
from benchlay.sheets.drafting.picture import properties, title_fields
from benchlay.sheets.elevation.contents import Band, Elevation, Level, Station, Stretch
from benchlay.tracing.beams import FACE, HANDED, SOLID
from benchlay.tracing.front import EMITTED, OUTSIDE
from benchlay.tracing.trace import Trace

_STEPS = 24  # along a stretch at which radii are shown
_NO_LENGTH_MM = 1e-6
_BODY_SHOWN_MM = 40.0  # of a source's body, which may be long


def chain_of(trace: Trace, variant: int, route: int) -> list[int]:
    """Return the beams of a route one after the other, as far as its light gets.

    Of several on the last leg it is the strongest, and what it came from.
    """
    start = trace.beams.start
    legs = {
        node: leg
        for node, place in enumerate(trace.ways.places)
        for number, leg in place.routes
        if number == route
    }
    rows = trace.of_variant(variant)
    on = [row for row in rows.tolist() if int(start.node[row]) in legs]
    if not on:
        return []
    arrived = trace.beams.end_core
    last = max(on, key=lambda row: (legs[int(start.node[row])], float(arrived[row]), -row))
    chain = [last]
    while (before := int(start.parent[chain[-1]])) >= 0:
        chain.append(before)
    return chain[::-1]


def state_of(trace: Trace, route: int) -> int:
    """Return the number of the first state in which a route's light gets to its end; else 0."""
    for variant in range(len(trace.scene.variants)):
        chain = chain_of(trace, variant, route)
        if chain and _end_of(trace, chain) == _meant(trace, route):
            return variant
    return 0


def _end_of(trace: Trace, chain: list[int]) -> str | None:
    """Return the element or the opening at which the light of a route ends."""
    beams, end = trace.beams, chain[-1]
    if beams.end_kind[end] == FACE:
        return trace.scene.elements[int(trace.scene.faces.owner[beams.end_row[end]])]
    if beams.end_kind[end] == HANDED:
        return trace.scene.names[int(trace.scene.solids.hole_name[beams.end_row[end]])]
    return None


def _meant(trace: Trace, route: int) -> str:
    last = trace.ways.routes[route].items[-1]
    return ".".join(last.opening) if last.opening is not None else last.name


def elevation_of(trace: Trace, variant: int, route: int, sha256: str) -> Elevation | None:
    """Return the elevation of a route in a state; None where no light follows it.

    Parameters
    ----------
    trace : Trace
    variant, route : int
        Numbers of the state and of the route (in `Trace.ways.names`).
    sha256 : str
        Of the layout's bytes.
    """
    chain = chain_of(trace, variant, route)
    lengths = [float(trace.beams.length[beam]) for beam in chain]
    if not chain or sum(lengths) <= _NO_LENGTH_MM:
        return None
    state = trace.placed.states[variant]
    ways = np.concatenate(([0.0], np.cumsum(lengths))).tolist()
    stretches = tuple(
        _stretch(trace, beam, s)
        for beam, s, length in zip(chain, ways, lengths, strict=False)
        if length > _NO_LENGTH_MM
    )
    layout = state.layout
    name = trace.ways.names[route]
    return Elevation(
        route=name,
        state=state.name,
        fields=title_fields(layout, f"Elevation of route {name}", sha256),
        stations=tuple(_merged(list(_stations(trace, state, chain, ways)))),
        stretches=stretches,
        levels=tuple(_levels(layout)),
        bands=_bands(layout),
        notes=tuple(_notes(trace, route, chain, state)),
        properties=tuple(properties(layout, sha256)),
        decimal="." if layout.drawing.decimal == "point" else ",",
    )


def _stretch(trace: Trace, beam: int, s: float) -> Stretch:
    start, length = trace.beams.start, float(trace.beams.length[beam])
    depth = np.linspace(0.0, length, _STEPS + 1)
    m = moments.propagate(start.moments[:, beam, None], depth, start.index[beam])
    first, second, _ = moments.radii(m)
    return Stretch(
        s=s,
        s_out=s + length,
        z=float(start.position[beam, 2]),
        z_out=float(trace.beams.end[beam, 2]),
        wavelength_nm=float(trace.scene.wavelengths_nm[start.wave[beam]]),
        inside=bool(start.within[beam] != OUTSIDE),
        up_mm=tuple(_upright(start.axis[beam], start.direction[beam], m).tolist()),
        least_mm=tuple(np.minimum(first, second).tolist()),
        most_mm=tuple(np.maximum(first, second).tolist()),
    )


def _upright(axis: Floats, direction: Floats, m: Floats) -> Floats:
    """Return the 1/e² radius across the beam in the upright plane, twice a root of a variance."""
    up = np.array([0.0, 0.0, 1.0])
    across = up - dot(up, direction) * direction
    size = float(np.sqrt(dot(across, across)))
    if size < 1e-9:  # noqa: PLR2004 (a beam that goes straight up has no upright plane)
        first, second, _ = moments.radii(m)
        largest: Floats = np.maximum(first, second)
        return largest
    across = across / size
    a, b = float(dot(across, axis)), float(dot(across, cross(direction, axis)))
    variance = a * a * m[moments.XX] + 2.0 * a * b * m[moments.XY] + b * b * m[moments.YY]
    radius: Floats = 2.0 * np.sqrt(np.maximum(variance, 0.0))
    return radius


def _stations(
    trace: Trace, state: PlacedState, chain: list[int], ways: list[float]
) -> Iterator[Station]:
    beams, scene = trace.beams, trace.scene
    first = chain[0]
    if beams.start.event[first] == EMITTED:
        yield _source(trace, state, first)
    for beam, s in zip(chain, ways[1:], strict=True):
        z, row = float(beams.end[beam, 2]), int(beams.end_row[beam])
        if beams.end_kind[beam] == FACE:
            yield _met(trace, state, beam, s)
        elif beams.end_kind[beam] == HANDED:
            name = scene.names[int(scene.solids.hole_name[row])]
            yield Station(name, "opening", s, s, z)
        elif beams.end_kind[beam] == SOLID:
            name_row = int(scene.solids.name[row])
            yield Station(scene.names[name_row] if name_row >= 0 else "", "body", s, s, z)


def _source(trace: Trace, state: PlacedState, beam: int) -> Station:
    start = trace.beams.start
    name, z = trace.scene.sources[int(start.source[beam])], float(start.position[beam, 2])
    body = state.sources[name].source.body
    if body is None:
        return Station(name, "source", 0.0, 0.0, z)
    half = body.height_mm / 2
    shown = min(body.length_mm, _BODY_SHOWN_MM)
    return Station(name, "source", 0.0, 0.0, z, holders=(("body", shown, z - half, z + half),))


def _met(trace: Trace, state: PlacedState, beam: int, s: float) -> Station:
    f, row = trace.scene.faces, int(trace.beams.end_row[beam])
    name = trace.scene.elements[int(f.owner[row])]
    placed = state.elements[name]
    rise = abs(float(f.up[row, 2]))
    cosine = float(trace.beams.cosine[beam])
    across = float(f.clear[row, 0]) * (cosine if np.isfinite(cosine) else 1.0)
    middle = f.origin[row] + f.middle[row, 0] * f.left[row] + f.middle[row, 1] * f.up[row]
    clear_up = float(f.clear[row, 1])
    back, front = placed.geometry.extent[:2]
    return Station(
        name=name,
        kind=placed.element.kind,
        s=s,
        s_out=s,
        z=float(trace.beams.end[beam, 2]),
        centre_z=float(middle[2]),
        half_height=float(f.radii[row, 1]) * rise,
        clear_half=clear_up * rise,
        clear_least=min(across, clear_up),
        thickness=front - back,
        holders=tuple(_holders(placed)),
    )


def _holders(placed: PlacedElement) -> Iterator[tuple[str, float, float, float]]:
    """Give what holds an element: part, width along the path as drawn, and its true heights."""
    box = placed.holder.box
    if box is not None:
        pitch, base = placed.pose.pitch_rad, placed.pose.at[2]
        heights = [base + x * sin(pitch) + z * cos(pitch) for x, _, z in box.points]
        depths = [x for x, _, _ in box.points]
        yield ("mount", max(depths) - min(depths), min(heights), max(heights))
    for solid in placed.holder.upright:
        heights = [z for _, _, z in solid.points]
        widths = [x for x, _, _ in solid.points]
        yield (solid.part, max(widths) - min(widths), min(heights), max(heights))


def _merged(stations: list[Station]) -> Iterator[Station]:
    """Make one station of the faces of an element that are met one after the other."""
    now: Station | None = None
    for station in stations:
        if now is not None and station.name == now.name and station.kind == now.kind:
            least = [one for one in (now.clear_least, station.clear_least) if one is not None]
            now = now._replace(s_out=station.s_out, clear_least=min(least, default=None))
            continue
        if now is not None:
            yield now
        now = station
    if now is not None:
        yield now


def _levels(layout: Layout) -> Iterator[Level]:
    """Give the heights of lids and of the tops of panels, those that are alike as one."""
    enclosure = layout.enclosure
    if enclosure is None:
        return
    tops: dict[float, list[str]] = {}
    for name, panel in sorted(enclosure.panels.items()):
        if not panel.open:
            tops.setdefault(enclosure.heights_mm(panel)[1], []).append(name)
    for z, names in sorted(tops.items()):
        yield Level(f"top of {_listed(names, 'panel')}", z)
    lids: dict[float, list[str]] = {}
    for name, lid in sorted(enclosure.lids.items()):
        if not lid.open:
            lids.setdefault(lid.height_mm, []).append(name)
    for z, names in sorted(lids.items()):
        yield Level(_listed(names, "lid"), z)


_MOST_NAMED = 2


def _listed(names: list[str], what: str) -> str:
    if len(names) > _MOST_NAMED:
        return f"{len(names)} {what}s"
    return f"{what}{'s' if len(names) > 1 else ''} {', '.join(names)}"


def _bands(layout: Layout) -> tuple[Band, ...]:
    eyes, floor = layout.limits.eyes, layout.bench.surface_height_mm
    bands = (("seated eyes", eyes.seated_mm), ("standing eyes", eyes.standing_mm))
    return tuple(Band(words, low - floor, high - floor) for words, (low, high) in bands)


def _notes(trace: Trace, route: int, chain: list[int], state: PlacedState) -> Iterator[str]:
    yield (
        f"Route {trace.ways.names[route]} laid out straight along its chief ray, in the state "
        f"{state.name}. Heights and lengths are true to scale; widths of posts and mounts along "
        "the path are their own, whichever way they face. Do not scale."
    )
    meant = _meant(trace, route)
    if _end_of(trace, chain) != meant:
        yield (
            f"In this state its light does not reach {meant}; shown is where it goes, beyond the "
            "edge of the bench too."
        )
    yield (
        "Radii are 1/e2, from second moments of the beam as if nothing cut it; in the profile the "
        "larger one, and thin the smaller where they differ. The clear half-width is the smaller "
        "way across, as the beam sees it."
    )
