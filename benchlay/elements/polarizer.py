"""An absorbing sheet polarizer.

.. code-block:: yaml

   P1: {kind: polarizer, after: laser, distance: 80, diameter: 25.4, axis: 90, transmits: 88 %}

`axis` is the direction of the light that passes, from horizontal, anticlockwise to a viewer
looking at its back face. `extinction` is the share of the refused component that passes,
relative to that of the passed one. All is internal: the faces reflect besides.
"""

from __future__ import annotations

from typing import ClassVar

from benchlay.document.forms import Quantity
from benchlay.document.quantity import Dimension
from benchlay.document.record import key
from benchlay.elements._coating import COATING, UNCOATED, Coating
from benchlay.elements._glass import GLASS
from benchlay.elements._kind import Branches, Bulk, ElementKind, Geometry, Glass
from benchlay.elements._shares import SHARE
from benchlay.elements._sized import (
    LENGTH_OR_ZERO,
    PlateShape,
    Sized,
    plate_geometry,
)
from benchlay.elements._through import PASSING_PLATE

_ANGLE = Quantity(Dimension.ANGLE)


class Polarizer(Sized, ElementKind):
    """An absorbing sheet polarizer."""

    KIND = "polarizer"
    BRANCHES: ClassVar[Branches] = PASSING_PLATE
    DEFAULT_BRANCH = "transmitted"
    TURNS_FRONT = True

    axis_rad: float = key(_ANGLE, name="axis", meaning="direction of the light that passes")
    transmits: float = key(
        SHARE, default=0.9, meaning="internal share of light along the axis that passes"
    )
    extinction: float = key(
        SHARE,
        default=1e-4,
        meaning="share of the refused component that passes, relative to that",
    )
    thickness_mm: float = key(
        LENGTH_OR_ZERO,
        default=0.0,
        name="thickness",
        meaning="thickness; 0 for a thin sheet",
    )
    glass: Glass = key(GLASS, default=Glass(None, 1.5), meaning="what it is made of")
    front: Coating = key(COATING, default=UNCOATED, meaning="coating of the front face")
    back: Coating = key(COATING, default=UNCOATED, meaning="coating of the back face")

    def geometry(self) -> Geometry:
        """Return front, back and edge, and what happens inside."""
        outline = self.outline()
        shape = PlateShape(outline, outline.scaled(self.clear), self.thickness_mm)
        bulk = Bulk(
            "polarizer",
            axis_rad=self.axis_rad,
            passes=self.transmits,
            refused=self.transmits * self.extinction,
        )
        return plate_geometry(
            shape, shape.faces(self.front, self.back), self.glass, coated="", bulk=bulk
        )

    def glass_of(self) -> Glass:
        """Return what it is made of."""
        return self.glass
