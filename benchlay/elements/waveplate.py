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
from benchlay.elements._coating import COATING, UNCOATED, Coating
from benchlay.elements._glass import GLASS
from benchlay.elements._kind import Branches, Bulk, ElementKind, Geometry, Glass
from benchlay.elements._sized import (
    LENGTH_OR_ZERO,
    PlateShape,
    Sized,
    plate_geometry,
)
from benchlay.elements._through import PASSING_PLATE

_ANGLE = Quantity(Dimension.ANGLE)
RETARDANCE = OneOf(Words({"half": 0.5, "quarter": 0.25}), Quantity(Dimension.RATIO, above=0.0))
"""Reads a retardance in waves."""


class Waveplate(Sized, ElementKind):
    """A waveplate."""

    KIND = "waveplate"
    BRANCHES: ClassVar[Branches] = PASSING_PLATE
    DEFAULT_BRANCH = "transmitted"
    TURNS_FRONT = True

    retardance: float = key(RETARDANCE, meaning="waves by which the slow component falls behind")
    axis_rad: float = key(_ANGLE, name="axis", meaning="direction of the fast axis")
    design_nm: float | None = key(
        Quantity(Dimension.WAVELENGTH, above=0.0),
        default=None,
        name="design_wavelength",
        meaning="where the retardance holds (default: the route's wavelength)",
    )
    thickness_mm: float = key(
        LENGTH_OR_ZERO,
        default=0.0,
        name="thickness",
        meaning="thickness; 0 for a thin one",
    )
    glass: Glass = key(GLASS, default=Glass("quartz", None), meaning="what it is made of")
    front: Coating = key(COATING, default=UNCOATED, meaning="coating of the front face")
    back: Coating = key(COATING, default=UNCOATED, meaning="coating of the back face")

    def geometry(self) -> Geometry:
        """Return front, back and edge, and what happens inside."""
        outline = self.outline()
        shape = PlateShape(outline, outline.scaled(self.clear), self.thickness_mm)
        bulk = Bulk(
            "retarder",
            axis_rad=self.axis_rad,
            waves=self.retardance,
            design_nm=self.design_nm,
        )
        return plate_geometry(
            shape, shape.faces(self.front, self.back), self.glass, coated="", bulk=bulk
        )

    def glass_of(self) -> Glass:
        """Return what it is made of."""
        return self.glass
