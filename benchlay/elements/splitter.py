"""A plate beam splitter: a dividing front on a plate of glass, the back usually bare.

.. code-block:: yaml

   BS1:
     kind: splitter
     after: laser
     distance: 150
     turn: left 90
     diameter: 25.4
     reflectance: 50 %

What the front does not reflect goes into the plate, whose bare back sends some of it back
beside the first reflection. Say `BS1.reflected` or `BS1.transmitted` where a beam goes on
from it.
"""

from __future__ import annotations

from typing import ClassVar

from benchlay.document.record import key
from benchlay.elements._coating import BARE_OR_REFLECTANCE, COATING, UNCOATED, Coating
from benchlay.elements._glass import GLASS
from benchlay.elements._kind import Branches, ElementKind, Geometry, Glass
from benchlay.elements._sized import (
    LENGTH_OR_ZERO,
    PlateShape,
    Wedged,
    plate_geometry,
)
from benchlay.elements._through import DIVIDING_PLATE


class Splitter(Wedged, ElementKind):
    """A plate beam splitter."""

    KIND = "splitter"
    BRANCHES: ClassVar[Branches] = DIVIDING_PLATE
    TURNS_FRONT = True

    reflectance: Coating = key(BARE_OR_REFLECTANCE, meaning="reflected share of the front face")
    thickness_mm: float = key(
        LENGTH_OR_ZERO, default=5.0, name="thickness", meaning="thickness at the centre"
    )
    glass: Glass = key(GLASS, default=Glass("BK7", None), meaning="the plate")
    back: Coating = key(COATING, default=UNCOATED, meaning="coating of the back face")

    def geometry(self) -> Geometry:
        """Return front, back and edge."""
        outline = self.outline()
        shape = PlateShape(outline, outline.scaled(self.clear), self.thickness_mm, self.slope())
        return plate_geometry(shape, shape.faces(self.reflectance, self.back), self.glass)

    def glass_of(self) -> Glass:
        """Return the glass of the plate."""
        return self.glass
