"""A Faraday rotator: turns polarization in the same sense in space both ways.

.. code-block:: yaml

   F1: {kind: rotator, after: P1, distance: 40, diameter: 12.7, angle: 45}

The field of light that enters the front is turned by `angle` anticlockwise to a viewer
looking at its back face, so the viewer whom that light approaches; as `axis` is measured.
Light that comes back is turned on in the same sense in space: after a double pass by twice
the angle. Between a polarizer at 0 and one at 45 it lets light through one way only. The
angle holds at every wavelength: real ones turn shorter waves further.
"""

from __future__ import annotations

from math import radians
from typing import ClassVar

from benchlay.document.forms import Quantity
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


class Rotator(Sized, ElementKind):
    """A Faraday rotator."""

    KIND = "rotator"
    BRANCHES: ClassVar[Branches] = PASSING_PLATE
    DEFAULT_BRANCH = "transmitted"
    TURNS_FRONT = True

    angle_rad: float = key(
        _ANGLE,
        default=radians(45.0),
        name="angle",
        meaning="by which it turns the field, anticlockwise to a viewer looking at its back",
    )
    thickness_mm: float = key(
        LENGTH_OR_ZERO,
        default=0.0,
        name="thickness",
        meaning="thickness; 0 for a thin one",
    )
    glass: Glass = key(GLASS, default=Glass("BK7", None), meaning="what it is made of")
    front: Coating = key(COATING, default=UNCOATED, meaning="coating of the front face")
    back: Coating = key(COATING, default=UNCOATED, meaning="coating of the back face")

    def geometry(self) -> Geometry:
        """Return front, back and edge, and what happens inside."""
        outline = self.outline()
        shape = PlateShape(outline, outline.scaled(self.clear), self.thickness_mm)
        bulk = Bulk("rotator", turns_rad=self.angle_rad)
        return plate_geometry(
            shape, shape.faces(self.front, self.back), self.glass, coated="", bulk=bulk
        )

    def glass_of(self) -> Glass:
        """Return what it is made of."""
        return self.glass
