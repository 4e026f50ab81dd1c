"""The beams that sources send out."""

from __future__ import annotations

import numpy as np

from benchlay.layout.light import Polarization
from benchlay.layout.sources import Source
from benchlay.optics import coherency, moments
from benchlay.optics.rays import bench_basis
from benchlay.placing.placed import Placed, PlacedSource
from benchlay.scene.tables import Floats, Scene
from benchlay.tracing.front import EMITTED, EXIT, OUTSIDE, Front
from benchlay.tracing.ways import Ways


def emitted(placed: Placed, scene: Scene, ways: Ways) -> Front:
    """Return one beam a line, source and state, in that order of names."""
    wave_of = {nm: i for i, nm in enumerate(scene.wavelengths_nm.tolist())}
    found = [
        (variant, number, wave_of[line.wavelength_nm], state.sources[name], line.power_w)
        for variant, state in enumerate(placed.states)
        for number, name in enumerate(scene.sources)
        if not state.sources[name].source.stand.out
        for line in sorted(state.sources[name].source.lines, key=lambda line: line.wavelength_nm)
    ]
    count = len(found)
    wave = np.array([wave for _, _, wave, _, _ in found], dtype=np.int64)
    source = np.array([number for _, number, _, _, _ in found], dtype=np.int64)
    direction = np.array([item.pose.axes()[0] for _, _, _, item, _ in found]).reshape(-1, 3)
    index = scene.index_outside[wave]
    node = [
        ways.roots.get((scene.sources[s], scene.wavelengths_nm[w]), -1)
        for s, w in zip(source, wave, strict=True)
    ]
    return Front.made(
        count,
        variant=np.array([variant for variant, *_ in found], dtype=np.int64),
        source=source,
        wave=wave,
        parent=-1,
        node=np.array(node, dtype=np.int64),
        event=EMITTED,
        face=EXIT,
        body=-1,
        owner=source + len(scene.elements),
        within=OUTSIDE,
        index=index,
        kept=1.0,
        position=np.array([item.pose.at for _, _, _, item, _ in found]).reshape(-1, 3),
        direction=direction,
        axis=bench_basis(direction)[0],
        coherency=coherency_of([(item.source.polarization, power) for *_, item, power in found]),
        moments=_moments([item for *_, item, _ in found], scene.wavelengths_nm[wave], index),
    )


def coherency_of(states: list[tuple[Polarization, float]]) -> Floats:
    """Return coherency (4, N) of states and powers in W, from horizontal."""
    columns = [_one(polarization, power) for polarization, power in states]
    return np.stack(columns, axis=1) if columns else np.zeros((4, 0))


def _one(polarization: Polarization, power: float) -> Floats:
    """Return the coherency (4,) of a state; its angle is from horizontal, which is e1."""
    if polarization.kind == "angle":
        return coherency.linear(polarization.angle_rad, power)
    if polarization.kind == "circular":
        return coherency.circular(polarization.hand == "right", power)
    return coherency.unpolarized(power)


def _moments(items: list[PlacedSource], wavelength_nm: Floats, index: Floats) -> Floats:
    shapes = [
        _waists(item.source, float(nm)) for item, nm in zip(items, wavelength_nm, strict=True)
    ]
    if not shapes:
        return np.zeros((10, 0))
    w1, w2, ahead1, ahead2, m2_1, m2_2 = np.array(shapes).T
    return moments.from_waists(wavelength_nm, index, w1, w2, ahead1, ahead2, m2_1, m2_2)


def _waists(source: Source, wavelength_nm: float) -> tuple[float, ...]:
    return tuple(source.beam.waists(wavelength_nm))
