"""A waveplate: retards light across its fast axis.

.. code-block:: yaml

   H1: {kind: waveplate, after: laser, distance: 60, diameter: 25.4, retardance: half, axis: 22.5}

The retardance holds at `design_wavelength` (by default the wavelength of the route that
names it) and goes with 1/wavelength elsewhere.
"""

from __future__ import annotations

from typing import ClassVar

from benchlay.document.forms import OneOf, Quantity, Words
from benchlay.document.quantity import Dimension
from benchlay.document.record import key
from benchlay.elements._acting import ThinPlate
from benchlay.elements._glass import GLASS
from benchlay.elements._kind import Bulk, Glass

_ANGLE = Quantity(Dimension.ANGLE)
RETARDANCE = OneOf(Words({"half": 0.5, "quarter": 0.25}), Quantity(Dimension.RATIO, above=0.0))
"""Reads a retardance in waves."""


class Waveplate(ThinPlate):
    """A waveplate."""

    KIND = "waveplate"
    FAULTS: ClassVar[frozenset[str]] = frozenset(("out", "reversed", "wavelength", "turned"))

    retardance: float = key(RETARDANCE, meaning="waves by which the slow component falls behind")
    axis_rad: float = key(_ANGLE, name="axis", meaning="direction of the fast axis")
    design_nm: float | None = key(
        Quantity(Dimension.WAVELENGTH, above=0.0),
        default=None,
        name="design_wavelength",
        meaning="where the retardance holds (default: the route's wavelength)",
    )
    glass: Glass = key(GLASS, default=Glass("quartz", None), meaning="what it is made of")

    def bulk(self) -> Bulk:
        """Return what happens inside."""
        return Bulk(
            "retarder", axis_rad=self.axis_rad, waves=self.retardance, design_nm=self.design_nm
        )
