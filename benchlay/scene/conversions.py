"""What converters make of which light."""

from __future__ import annotations

from collections.abc import Mapping, Sequence

import numpy as np

from benchlay.elements._kind import Volume
from benchlay.placing.placed import PlacedElement
from benchlay.scene.tables import Conversions

_HARMONICS = (2, 3, 4, 5)
_NEAR = 0.01


def conversions(
    volumes: Sequence[tuple[PlacedElement, Volume]],
    wavelengths_nm: Sequence[float],
    spoken_for: Mapping[str, frozenset[float]],
) -> Conversions:
    """Return the products of all volumes that make light."""
    rows = [
        (volume, number, made, item.element.name, {m.wavelength_nm for m in inside.bulk.makes})
        for volume, (item, inside) in enumerate(volumes)
        for number, made in enumerate(inside.bulk.makes)
    ]
    pumps = [makers(made.wavelength_nm, spoken_for[name] - own) for _, _, made, name, own in rows]
    return Conversions(
        np.array([volume for volume, *_ in rows], dtype=np.int64),
        np.array([number for _, number, *_ in rows], dtype=np.int64),
        np.array([[nm in pump for nm in wavelengths_nm] for pump in pumps], dtype=np.bool_).reshape(
            len(rows), len(wavelengths_nm)
        ),
        np.array([wavelengths_nm.index(row[2].wavelength_nm) for row in rows], dtype=np.int64),
        np.array([row[2].share for row in rows], dtype=np.float64),
        tuple(row[2].polarization for row in rows),
    )


def makers(product_nm: float, lines_nm: frozenset[float]) -> frozenset[float]:
    """Return which lines make a product: those it is a harmonic of, else all of them."""
    harmonic = frozenset(
        nm
        for nm in lines_nm
        if any(abs(nm / product_nm / order - 1.0) < _NEAR for order in _HARMONICS)
    )
    return harmonic or lines_nm
