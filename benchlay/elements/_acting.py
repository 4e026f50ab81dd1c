"""Plates that act on the light inside them: what polarizers, waveplates and their like share."""

from __future__ import annotations

from typing import ClassVar

from benchlay.document.record import key
from benchlay.elements._coating import COATING, UNCOATED, Coating
from benchlay.elements._glass import GLASS
from benchlay.elements._kind import Branches, Bulk, ElementKind, Geometry, Glass
from benchlay.elements._sized import LENGTH_OR_ZERO, PlateShape, Sized, plate_geometry
from benchlay.elements._through import PASSING_PLATE


class ActingPlate(Sized, ElementKind):
    """A plate with parallel faces; the kind says how deep it is and what happens inside."""

    BRANCHES: ClassVar[Branches] = PASSING_PLATE
    DEFAULT_BRANCH = "transmitted"

    glass: Glass = key(GLASS, meaning="what it is made of")
    front: Coating = key(COATING, default=UNCOATED, meaning="coating of the front face")
    back: Coating = key(COATING, default=UNCOATED, meaning="coating of the back face")

    def depth_mm(self) -> float:
        """Return the way from face to face."""
        raise NotImplementedError

    def bulk(self) -> Bulk:
        """Return what happens inside."""
        raise NotImplementedError

    def geometry(self) -> Geometry:
        """Return front, back and edge, and what happens inside."""
        outline = self.outline()
        shape = PlateShape(outline, outline.scaled(self.clear), self.depth_mm())
        faces = shape.faces(self.front, self.back)
        return plate_geometry(shape, faces, self.glass, coated="", bulk=self.bulk())

    def glass_of(self) -> Glass:
        """Return what it is made of."""
        return self.glass


class ThinPlate(ActingPlate):
    """A plate whose thickness seldom matters."""

    TURNS_FRONT = True

    thickness_mm: float = key(
        LENGTH_OR_ZERO, default=0.0, name="thickness", meaning="thickness; 0 for a thin one"
    )

    def depth_mm(self) -> float:
        """Return the thickness."""
        return self.thickness_mm
