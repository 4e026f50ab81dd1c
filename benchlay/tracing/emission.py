"""The beams that sources send out."""

from __future__ import annotations

import numpy as np

from benchlay.layout.light import Polarization
from benchlay.named import NamedTuple
from benchlay.optics import coherency, moments
from benchlay.optics.rays import bench_basis
from benchlay.placing.placed import Placed, PlacedSource
from benchlay.placing.pose import Vector
from benchlay.scene.tables import Floats, Scene
from benchlay.tracing.front import EMITTED, EXIT, OUTSIDE, Front
from benchlay.tracing.ways import Ways


class Beam(NamedTuple):
    """One beam that a source sends out, forwards or (its rear leak) backwards."""

    variant: int
    source: int
    wave: int
    item: PlacedSource
    power_w: float
    rear: bool = False

    def direction(self) -> Vector:
        """Return the way it goes."""
        x, y, z = self.item.pose.axes()[0]
        return (-x, -y, -z) if self.rear else (x, y, z)

    def start(self) -> Vector:
        """Return the middle of the front of the body, or of its back."""
        body = self.item.source.body
        if not self.rear or body is None:
            return self.item.pose.at
        return self.item.pose.point((-body.length_mm, 0.0, 0.0))

    def polarization(self) -> Polarization:
        """Return its state; the field of a rear leak is that of the main beam in space."""
        stated = self.item.source.polarization
        return reversed_(stated) if self.rear else stated


def reversed_(state: Polarization) -> Polarization:
    """Return the state of light that goes the other way with the same field in space."""
    if state.kind == "circular":
        return state._replace(hand="left" if state.hand == "right" else "right")
    return state._replace(angle_rad=-state.angle_rad)


def emitted(placed: Placed, scene: Scene, ways: Ways) -> Front:
    """Return one beam a line, source and state, in that order of names, then rear leaks.

    A rear leak is shared by the lines as their powers are. Its beam has the shape of the main
    one, as it would leave a source that is turned round where its back is.
    """
    return front_of(_beams(placed, scene), scene, ways)


def front_of(found: list[Beam], scene: Scene, ways: Ways) -> Front:
    """Return beams that leave sources."""
    wave = np.array([beam.wave for beam in found], dtype=np.int64)
    source = np.array([beam.source for beam in found], dtype=np.int64)
    direction = np.array([beam.direction() for beam in found]).reshape(-1, 3)
    index = scene.index_outside[wave]
    node = [
        -1 if beam.rear else ways.roots.get((scene.sources[beam.source], float(nm)), -1)
        for beam, nm in zip(found, scene.wavelengths_nm[wave], strict=True)
    ]
    return Front.made(
        len(found),
        variant=np.array([beam.variant for beam in found], dtype=np.int64),
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
        position=np.array([beam.start() for beam in found]).reshape(-1, 3),
        direction=direction,
        axis=bench_basis(direction)[0],
        coherency=coherency_of([(beam.polarization(), beam.power_w) for beam in found]),
        moments=_moments([beam.item for beam in found], scene.wavelengths_nm[wave], index),
    )


def _beams(placed: Placed, scene: Scene) -> list[Beam]:
    wave_of = {nm: i for i, nm in enumerate(scene.wavelengths_nm.tolist())}
    main: list[Beam] = []
    leaks: list[Beam] = []
    for variant, state in enumerate(placed.states):
        for number, name in enumerate(scene.sources):
            item = state.sources[name]
            if item.source.stand.out:
                continue
            lines = sorted(item.source.lines, key=lambda line: line.wavelength_nm)
            total = sum(line.power_w for line in lines)
            fed = item.source.fed() is not None
            for line in lines:
                beam = Beam(variant, number, wave_of[line.wavelength_nm], item, line.power_w)
                if not fed:
                    main.append(beam)
                leak = item.source.rear_leak_w * (line.power_w / total if total else 1 / len(lines))
                if leak > 0.0:
                    leaks.append(beam._replace(power_w=leak, rear=True))
    return main + leaks


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
        tuple(item.source.beam.waists(nm, n))
        for item, nm, n in zip(items, wavelength_nm.tolist(), index.tolist(), strict=True)
    ]
    if not shapes:
        return np.zeros((10, 0))
    w1, w2, ahead1, ahead2, m2_1, m2_2 = np.array(shapes).T
    return moments.from_waists(wavelength_nm, index, w1, w2, ahead1, ahead2, m2_1, m2_2)
