"""A thin-film plate polarizer: reflects s light and passes p light at its own incidence.

.. code-block:: yaml

   TP1:
     kind: plate-polarizer
     after: laser
     distance: 200
     incidence: brewster
     side: left
     size: [30, 50]

Its film is on the front; the back is bare glass, which sends no p light back at Brewster's
angle. Say `TP1.reflected` or `TP1.transmitted` where a beam goes on from it.
"""

from __future__ import annotations

from typing import ClassVar

from benchlay.document.form import Reader
from benchlay.document.record import key
from benchlay.elements._coating import COATING, UNCOATED, Coating, everywhere
from benchlay.elements._glass import GLASS
from benchlay.elements._kind import Branches, ElementKind, Geometry, Glass
from benchlay.elements._shares import SHARE, refuse_excess
from benchlay.elements._sized import LENGTH_OR_ZERO, PlateShape, Sized, plate_geometry
from benchlay.elements._through import DIVIDING_PLATE


class PlatePolarizer(Sized, ElementKind):
    """A thin-film plate polarizer."""

    KIND = "plate-polarizer"
    FAULTS: ClassVar[frozenset[str]] = frozenset(("out", "reversed", "wavelength", "rolled"))
    BRANCHES: ClassVar[Branches] = DIVIDING_PLATE
    TURNS_FRONT = True

    extinction: float = key(SHARE, default=1e-3, meaning="share of s light that the film passes")
    reflects: float = key(SHARE, default=0.99, meaning="share of s light that the film reflects")
    thickness_mm: float = key(
        LENGTH_OR_ZERO, default=3.0, name="thickness", meaning="thickness of the plate"
    )
    glass: Glass = key(GLASS, default=Glass("fused-silica", None), meaning="the plate")
    back: Coating = key(COATING, default=UNCOATED, meaning="coating of the back face")

    def after_read(self, reader: Reader) -> None:
        """Refuse a film that gives more than it gets."""
        super().after_read(reader)
        refuse_excess(self, ("reflects", self.reflects), ("extinction", self.extinction), reader)

    def geometry(self) -> Geometry:
        """Return front, back and edge."""
        outline = self.outline()
        shape = PlateShape(outline, outline.scaled(self.clear), self.thickness_mm)
        # Rounding may leave a hair below nought; no film gives light.
        swallowed = max(0.0, 1.0 - self.reflects - self.extinction)
        film = everywhere(self.reflects, 0.0, absorbs=(swallowed, 0.0))
        return plate_geometry(shape, shape.faces(film, self.back), self.glass)

    def glass_of(self) -> Glass:
        """Return the glass of the plate."""
        return self.glass
