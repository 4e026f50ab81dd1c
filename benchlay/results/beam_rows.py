"""The beams of a state as rows, in the words of the contract.

Where the contract leaves a choice: `power_W` and `polarization` are those at the start;
`optical_path_mm`, `w_axis_deg` and the peak irradiance those at the end. A beam that was cut
keeps the shape of its uncut self, so its peak irradiance is that of its uncut self too.
`to` and `to_face` are null for what has no name: the bench, the open, the barrel of an
optic, its mount, post and foot.
"""

from __future__ import annotations

from typing import Any

import numpy as np

from benchlay.named import NamedTuple
from benchlay.optics import coherency, moments
from benchlay.optics.rays import cross, dot
from benchlay.report.details import BeamRow, Polarization
from benchlay.results.ends import Ends, ends_of
from benchlay.results.frames import horizontals
from benchlay.results.losses import losses
from benchlay.results.names import left
from benchlay.scene.tables import Flags, Floats, Ints, Scene
from benchlay.tracing import Trace
from benchlay.tracing.beams import Beams
from benchlay.tracing.front import EVENTS, Front
from benchlay.tracing.ways import Ways

_W_CM2_OF_W_MM2 = 100.0


def beam_rows(trace: Trace, variant: int) -> tuple[BeamRow, ...]:
    """Return the beams of a variant, numbered from 0 in the order of their making."""
    rows = trace.of_variant(variant)
    beams = _take(trace.beams, rows)
    parents = _renumbered(beams.start.parent, rows)
    level = horizontals(beams.start.direction, parents)
    ends = ends_of(trace, rows)
    diffuse = trace.diffuse()[rows]
    columns = zip(
        range(len(rows)),
        (parent if parent >= 0 else None for parent in parents.tolist()),
        *_origin(trace, beams, rows, ends),
        *_places(beams),
        beams.start.index.tolist(),
        _known(beams.start.power, diffuse),
        _known(ends.power_w, diffuse),
        losses(trace, rows, ends),
        _pulse_energies(trace, variant, beams.start),
        *_shape(trace.scene, beams, level),
        (beams.start.optical_path + beams.start.index * beams.length).tolist(),
        _polarizations(beams.start, level),
        _peaks(beams, ends),
        strict=True,
    )
    return tuple(BeamRow(*values) for values in columns)


def _known(power_w: Floats, diffuse: Flags) -> list[float | None]:
    """Return powers; scattered light on a route has none of its own."""
    pairs = zip(power_w.tolist(), diffuse.tolist(), strict=True)
    return [None if scattered else power for power, scattered in pairs]


def _take(beams: Beams, rows: Ints) -> Beams:
    fields: dict[str, Any] = beams._asdict()
    start = fields.pop("start").take(rows)
    return Beams(
        start,
        **{
            # Beams come last in coherency and moments, first in points.
            name: value[rows] if name == "end" else value[..., rows]
            for name, value in fields.items()
        },
    )


def _renumbered(parent: Ints, rows: Ints) -> Ints:
    """Return parents by their number within the variant."""
    if not len(rows):
        return parent
    return np.where(parent >= 0, np.searchsorted(rows, parent), -1)


class _Origin(NamedTuple):
    """From `source` to `event` in a row's order, as columns."""

    source: list[str]
    wavelength_nm: list[float]
    splits: list[int]
    route: list[str | None]
    routes: list[tuple[str, ...]]
    leg: list[int | None]
    from_: list[str]
    from_face: list[str]
    to: list[str | None]
    to_face: list[str | None]
    ends: list[str]
    event: list[str]


def _origin(trace: Trace, beams: Beams, rows: Ints, ends: Ends) -> _Origin:
    scene, start = trace.scene, beams.start
    followed = [_followed(trace.ways, node) for node in start.node.tolist()]
    origins = [left(trace, beam) for beam in rows.tolist()]
    return _Origin(
        [scene.sources[number] for number in start.source.tolist()],
        scene.wavelengths_nm[start.wave].tolist(),
        start.splits.tolist(),
        [names[0] if names else None for names, _ in followed],
        [names for names, _ in followed],
        [leg for _, leg in followed],
        [name for name, _ in origins],
        [face for _, face in origins],
        ends.to,
        ends.to_face,
        ends.word,
        [EVENTS[event] for event in start.event.tolist()],
    )


def _followed(ways: Ways, node: int) -> tuple[tuple[str, ...], int | None]:
    """Return the routes that a place of the tree lies on, by name, and the leg of the first."""
    if node < 0:
        return (), None
    routes = ways.places[node].routes
    return tuple(ways.names[route] for route, _ in routes), routes[0][1] if routes else None


def _places(beams: Beams) -> tuple[list[tuple[float, ...]], ...]:
    """Return starts, ends and directions as columns."""
    vectors = (beams.start.position, beams.end, beams.start.direction)
    return tuple([tuple(row) for row in value.tolist()] for value in vectors)


def _pulse_energies(trace: Trace, variant: int, start: Front) -> list[float | None]:
    scene, state = trace.scene, trace.placed.states[variant]
    rates = {
        (number, line.wavelength_nm): line.pulse.rate_hz
        for number, name in enumerate(scene.sources)
        for line in state.lines(name)
        if line.pulse is not None and line.pulse.rate_hz > 0.0
    }
    if not rates:
        return [None] * len(start.wave)
    keys = zip(start.source.tolist(), scene.wavelengths_nm[start.wave].tolist(), strict=True)
    found = [rates.get(key) for key in keys]
    return [
        None if rate is None else power / rate
        for power, rate in zip(start.power.tolist(), found, strict=True)
    ]


def _turned(start: Front, level: Floats) -> tuple[Floats, Floats]:
    """Return cosine and sine of the turn from each beam's own axis to its horizontal."""
    return dot(start.axis, level), dot(cross(start.direction, start.axis), level)


def _shape(scene: Scene, beams: Beams, level: Floats) -> tuple[list[object], ...]:
    """Return radii at start and end, the first axis' angle and M² as columns.

    The axes are those of the end (of the start where the end is round); the radii at the
    start are ordered by them.
    """
    cos, sin = _turned(beams.start, level)
    first = moments.rotate(beams.start.moments, cos, sin)
    last = moments.rotate(beams.end_moments, cos, sin)
    angle = moments.radii(last)[2]
    angle = np.where(angle == 0.0, moments.radii(first)[2], angle)
    first, last = (moments.rotate(m, np.cos(angle), np.sin(angle)) for m in (first, last))
    w_start, w_end = moments.radii(first)[:2], moments.radii(last)[:2]
    quality = moments.m2(first, scene.wavelengths_nm[beams.start.wave])
    return (
        list(zip(*(w.tolist() for w in w_start), strict=True)),
        list(zip(*(w.tolist() for w in w_end), strict=True)),
        np.degrees(angle).tolist(),
        list(zip(*quality.tolist(), strict=True)),
    )


def _polarizations(start: Front, level: Floats) -> list[Polarization]:
    return polarizations(coherency.rotate(start.coherency, *_turned(start, level)), level)


def polarizations(j: Floats, level: Floats) -> list[Polarization]:
    """Describe coherency (4, N), given from the horizontals (N, 3), for people."""
    state = coherency.describe(j)
    return [
        Polarization(degree, angle, ellipticity, (x, y, z))
        for degree, angle, ellipticity, (x, y, z) in zip(
            state.degree.tolist(),
            np.degrees(state.angle_rad).tolist(),
            np.degrees(state.ellipticity_rad).tolist(),
            level.tolist(),
            strict=True,
        )
    ]


def _peaks(beams: Beams, ends: Ends) -> list[float]:
    """Return the peak irradiance at the end, W/cm²: 2 P / (pi w1 w2) of the uncut beam."""
    w1, w2, _ = moments.radii(beams.end_moments)
    arriving = beams.end_coherency[0] + beams.end_coherency[1]
    uncut = np.where(ends.power_w > 0.0, arriving / beams.start.kept, 0.0)
    with np.errstate(divide="ignore"):
        peak = 2.0 * uncut / (np.pi * w1 * w2)
    values: list[float] = (_W_CM2_OF_W_MM2 * peak).tolist()
    return values
