"""What elements do to light on its way inside, as arrays."""

from __future__ import annotations

from collections.abc import Mapping
from math import cos, pi, sin

import numpy as np

from benchlay.elements._kind import Bulk, Volume
from benchlay.placing.placed import PlacedElement
from benchlay.scene.tables import BULKS, SINK, Bulks


def bulks_table(
    items: list[tuple[PlacedElement, Volume]],
    wavelengths_nm: list[float],
    spoken_for: Mapping[str, frozenset[float]],
) -> Bulks:
    """Return the insides of distinct placed elements, volume by volume."""
    bulks = [volume.bulk for _, volume in items]
    axes = [_axis(item, volume.bulk) for item, volume in items]
    shape = (len(items), len(wavelengths_nm))
    phases = [
        _phase(volume.bulk, nm, spoken_for[item.element.name])
        for item, volume in items
        for nm in wavelengths_nm
    ]
    passes = [_passes(bulk, nm) for bulk in bulks for nm in wavelengths_nm]
    return Bulks(
        np.array([BULKS.index(bulk.kind) for bulk in bulks], dtype=np.int64),
        np.array(axes, dtype=np.float64).reshape(-1, 3),
        np.array(passes, dtype=np.float64).reshape(shape),
        np.repeat(np.array([bulk.refused for bulk in bulks], dtype=np.float64), shape[1]).reshape(
            shape
        ),
        np.array(phases, dtype=np.float64).reshape(shape),
        np.array([bulk.thickness_mm for bulk in bulks], dtype=np.float64),
        np.array([SINK[volume.barrel] for _, volume in items], dtype=np.int64),
    )


def _axis(item: PlacedElement, bulk: Bulk) -> tuple[float, float, float]:
    """Return the axis in the plan frame.

    It is measured from horizontal, anticlockwise to a viewer who looks at the back face: at
    angle 0 it lies to that viewer's right, which is the element's right (-y). What a rotator
    turns about points at that viewer.
    """
    if bulk.kind == "rotator":
        return item.pose.turn((-1.0, 0.0, 0.0))
    angle = bulk.axis_rad
    return item.pose.turn((0.0, -cos(angle), sin(angle)))


def _passes(bulk: Bulk, wavelength_nm: float) -> float:
    for low, high, share in bulk.bands:
        if low <= wavelength_nm <= high:
            return share
    return bulk.passes


def _phase(bulk: Bulk, wavelength_nm: float, spoken_for: frozenset[float]) -> float:
    """Return the retardance in rad, or a rotator's angle.

    Away from its design wavelength a retardance goes with 1/wavelength; a rotator's angle is
    taken at its word.
    """
    if bulk.kind != "retarder":
        return bulk.turns_rad
    design = bulk.design_nm
    if design is None:
        design = wavelength_nm if wavelength_nm in spoken_for else min(spoken_for)
    return 2.0 * pi * bulk.waves * design / wavelength_nm
