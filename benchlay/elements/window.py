"""A plane window, parallel or wedged.

.. code-block:: yaml

   W1:
     kind: window
     after: laser
     distance: 120
     incidence: 5
     diameter: 25.4
     thickness: 3
     wedge: 30 arcmin
     wedge_towards: right

Bare faces are assumed unless coatings are stated: of BK7 they send about 4 % back each.
"""

from __future__ import annotations

from typing import ClassVar

from benchlay.document.record import key
from benchlay.elements._coating import COATING, UNCOATED, Coating
from benchlay.elements._glass import GLASS
from benchlay.elements._kind import Branches, ElementKind, Geometry, Glass
from benchlay.elements._sized import (
    LENGTH_OR_ZERO,
    PlateShape,
    Wedged,
    plate_geometry,
)
from benchlay.elements._through import PASSING_PLATE


class Window(Wedged, ElementKind):
    """A plane window."""

    KIND = "window"
    BRANCHES: ClassVar[Branches] = PASSING_PLATE
    DEFAULT_BRANCH = "transmitted"
    TURNS_FRONT = True

    thickness_mm: float = key(
        LENGTH_OR_ZERO, default=5.0, name="thickness", meaning="thickness at the centre"
    )
    glass: Glass = key(GLASS, default=Glass("BK7", None), meaning="the plate")
    front: Coating = key(COATING, default=UNCOATED, meaning="coating of the front face")
    back: Coating = key(COATING, default=UNCOATED, meaning="coating of the back face")

    def geometry(self) -> Geometry:
        """Return front, back and edge."""
        outline = self.outline()
        shape = PlateShape(outline, outline.scaled(self.clear), self.thickness_mm, self.slope())
        coated = "front" if self.front != UNCOATED else "back" if self.back != UNCOATED else ""
        return plate_geometry(shape, shape.faces(self.front, self.back), self.glass, coated=coated)

    def glass_of(self) -> Glass:
        """Return the glass of the plate."""
        return self.glass
