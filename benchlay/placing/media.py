"""Refractive indices of a layout's media, absolute, by vacuum wavelength."""

from __future__ import annotations

from math import isnan

from benchlay.elements._kind import Glass
from benchlay.optics.materials import MATERIALS, air_index


class Media:
    """Looks up absolute indices for one bench.

    Catalogue formulas are relative to air, so they are multiplied by the index of air; an
    index given in the layout is relative to the bench's own medium.
    """

    def __init__(self, medium: str | float) -> None:
        self._medium = medium
        self._known: dict[tuple[Glass | None, float], float] = {}

    def index(self, glass: Glass | None, wavelength_nm: float) -> float:
        """Return the absolute index of a glass (None: of the bench's medium); NaN out of range."""
        key = (None if glass is None else glass._replace(span=None), wavelength_nm)
        known = self._known.get(key)
        if known is None:
            known = self._known[key] = self._look_up(key[0], wavelength_nm)
        return known

    def _look_up(self, glass: Glass | None, wavelength_nm: float) -> float:
        if glass is None:
            if isinstance(self._medium, float):
                return self._medium
            return 1.0 if self._medium == "vacuum" else float(air_index(wavelength_nm))
        if glass.ratio is not None:
            return glass.ratio * self.index(None, wavelength_nm)
        return float(MATERIALS[glass.name or ""].absolute_index(wavelength_nm))

    def known(self, glass: Glass, wavelength_nm: float) -> bool:
        """Whether the catalogue covers a wavelength."""
        return not isnan(self.index(glass, wavelength_nm))
