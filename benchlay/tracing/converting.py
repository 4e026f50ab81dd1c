"""Light of other wavelengths, made of light on its way through a crystal."""

from __future__ import annotations

import numpy as np

from benchlay.optics import moments
from benchlay.optics.rays import bench_basis, dot
from benchlay.scene.tables import SINK, Floats, Ints
from benchlay.tracing.emission import coherency_of
from benchlay.tracing.front import CONVERTED, TRANSMITTED, Front
from benchlay.tracing.run_state import RunState


def converted(front: Front, rows: Ints, length_mm: Floats, state: RunState) -> tuple[Floats, Front]:
    """Return the share that legs (N,) keep, and the light made, from the middles of the legs.

    Parameters
    ----------
    front : Front
        Beams inside optics, some of them in crystals.
    rows : (N,) ndarray of int
        Their numbers in the batch.
    length_mm : (N,) ndarray of float64
        Of their legs.
    state : RunState
        What is too weak to follow is booked here.
    """
    table = state.scene.conversions
    kept = np.ones(len(rows))
    made: list[Front] = [front.take(rows[:0])]
    entered = front.event == TRANSMITTED
    for product, volume in enumerate(table.volume.tolist()):
        mine = (entered & (front.within == volume) & table.of[product, front.wave]).nonzero()[0]
        if not len(mine):
            continue
        kept[mine] -= table.share[product]
        light = _light(front.take(mine), product, 0.5 * length_mm[mine], state)
        light.set(parent=rows[mine] + state.count)
        made.append(light)
    return kept, _followed(Front.joined(made), state)


def _followed(light: Front, state: RunState) -> Front:
    power = light.power
    alive = power >= state.floor_w[light.wave]
    dead = (~alive & (power > 0.0)).nonzero()[0]
    state.book(light.parent[dead] - state.count, SINK["below-floor"], -1, power[dead])
    return light.take(alive.nonzero()[0])


def _light(front: Front, product: int, half_mm: Floats, state: RunState) -> Front:
    """Return what becomes of beams as one product."""
    scene = state.scene
    table = scene.conversions
    wave = int(table.wave[product])
    middle = moments.propagate(front.moments, half_mm, front.index)
    ratio = scene.wavelengths_nm[wave] / scene.wavelengths_nm[front.wave]
    number = np.full(len(front), table.number[product])
    light = front.changed(
        wave=wave,
        event=CONVERTED,
        node=state.ways.follow(front.node, front.owner, number, CONVERTED),
        index=scene.indices[front.within, wave],
        position=front.position + half_mm[:, None] * front.direction,
        optical_path=front.optical_path + half_mm * front.index,
        coherency=table.share[product] * front.coherency,
        moments=of_other_wavelength(middle, ratio),
    )
    stated = table.polarization[product]
    if stated is not None:
        unit = coherency_of([(stated, 1.0)])
        axis = bench_basis(light.direction)[0]
        cos, sin = dot(light.axis, axis), dot(np.cross(light.direction, light.axis), axis)
        light.set(
            axis=axis,
            coherency=unit * light.power,
            moments=moments.rotate(light.moments, cos, sin),
        )
    return light


def of_other_wavelength(m: Floats, ratio: Floats) -> Floats:
    """Return moments (10, N) of light of another wavelength with the same spot, curvature and M².

    The spread of u that is no curvature (U - V' X^-1 V, with X, V and U the blocks of xx, xu
    and uu) goes with the square of the ratio of wavelengths (N,).
    """
    xx, xy, yy, xu, xv, yu, yv, uu, uv, vv = m
    det = xx * yy - xy * xy
    a, b, c = yy / det, -xy / det, xx / det
    # Columns of V are (xu, yu) and (xv, yv).
    uu_c = a * xu * xu + 2.0 * b * xu * yu + c * yu * yu
    uv_c = a * xu * xv + b * (xu * yv + yu * xv) + c * yu * yv
    vv_c = a * xv * xv + 2.0 * b * xv * yv + c * yv * yv
    square = ratio * ratio
    changed = [
        curved + square * (whole - curved) for whole, curved in ((uu, uu_c), (uv, uv_c), (vv, vv_c))
    ]
    return np.stack((xx, xy, yy, xu, xv, yu, yv, *changed))
