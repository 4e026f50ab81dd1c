"""A flat mirror: a coated front on a substrate.

.. code-block:: yaml

   M1:
     kind: mirror
     after: laser
     distance: 200
     turn: left 90
     diameter: 25.4
     reflectance: 99.5 %

What the coating neither reflects nor absorbs leaks into the substrate. A ground back (the
default) swallows the leak; a polished one lets it out, and `M1.transmitted` follows it.
"""

from __future__ import annotations

from typing import Any, ClassVar

from benchlay.document.form import Reader
from benchlay.document.forms import Choice
from benchlay.document.record import key
from benchlay.elements._coating import METAL_NAMES, REFLECTANCE, UNCOATED, Coating
from benchlay.elements._glass import GLASS
from benchlay.elements._kind import Acts, Branches, ElementKind, Geometry, Glass
from benchlay.elements._radius import FLAT, RADIUS
from benchlay.elements._shares import SHARE, refuse_excess
from benchlay.elements._sized import LENGTH, LENGTH_OR_ZERO, PlateShape, Sized, plate_geometry


class Mirror(Sized, ElementKind):
    """A flat mirror."""

    KIND = "mirror"
    BRANCHES: ClassVar[Branches] = {
        "reflected": (
            (("front", "reflected"),),
            (("back", "transmitted"), ("front", "reflected"), ("back", "transmitted")),
        ),
        "transmitted": (
            (("front", "transmitted"), ("back", "transmitted")),
            (("back", "transmitted"), ("front", "transmitted")),
        ),
    }
    DEFAULT_BRANCH = "reflected"
    TURNS_FRONT = True

    reflectance: Coating | None = key(
        REFLECTANCE, default=None, meaning="reflected share; the rest leaks through"
    )
    absorbs: float = key(SHARE, default=0.0, meaning="share that the coating swallows")
    metal: str | None = key(
        Choice(*METAL_NAMES), default=None, meaning="an opaque metal film instead"
    )
    radius_mm: float = key(
        RADIUS,
        default=FLAT,
        name="radius",
        meaning="radius of curvature, `500 CC`",
        not_yet="curved mirrors",
    )
    thickness_mm: float = key(
        LENGTH_OR_ZERO, default=6.0, name="thickness", meaning="thickness at the centre"
    )
    glass: Glass = key(GLASS, default=Glass("BK7", None), meaning="the substrate")
    back: str = key(
        Choice("ground", "polished"),
        default="ground",
        meaning="a ground back swallows light",
    )
    hole: Any = key(
        LENGTH,
        default=None,
        meaning="a hole through the middle",
        not_yet="mirrors with a hole",
    )

    def after_read(self, reader: Reader) -> None:
        """Ask for one kind of coating, whose parts fit together."""
        super().after_read(reader)
        if (self.reflectance is None) == (self.metal is None):
            both = self.metal is not None
            reader.complain(
                self.span_of("metal"),
                "both a reflectance and a metal are given" if both else "no coating is given",
                expected="either 'reflectance: 99.5 %' or 'metal: aluminium'",
                remedy="remove 'reflectance' or 'metal'"
                if both
                else "add 'reflectance: 99.5 %', with the share that is meant",
            )
        elif self.metal and self.written("absorbs"):
            reader.complain(
                self.span_of("absorbs"),
                "what a metal swallows follows from the metal",
                expected="'absorbs' only beside 'reflectance'",
                remedy="remove 'absorbs'",
            )
        if self.reflectance is not None:
            most = max(max(band.s, band.p) for band in self.reflectance.bands)
            refuse_excess(self, ("reflectance", most), ("absorbs", self.absorbs), reader)

    def coating(self) -> Coating:
        """Return the coating of the front."""
        if self.metal:
            return Coating("metal", metal=self.metal)
        return (self.reflectance or UNCOATED)._replace(absorbs=(self.absorbs, self.absorbs))

    def geometry(self) -> Geometry:
        """Return front, back and edge."""
        outline = self.outline()
        shape = PlateShape(outline, outline.scaled(self.clear), self.thickness_mm)
        front, back = shape.faces(self.coating(), UNCOATED)
        if self.back == "ground":
            back = back._replace(acts=Acts.OPAQUE)
        return plate_geometry(shape, (front, back), self.glass)

    def glass_of(self) -> Glass:
        """Return the substrate."""
        return self.glass
