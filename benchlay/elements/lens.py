"""An ideal thin lens, with the face reflections of an equi-convex or equi-concave one.

.. code-block:: yaml

   L1: {kind: lens, after: laser, distance: 100, diameter: 25.4, focal: 200}

It has no path of its own; its two faces stand in one place, and their reflections are those
of a lens of `glass` whose two radii are equal (an assumption that the notes repeat).
"""

from __future__ import annotations

from math import copysign, inf, sqrt
from typing import ClassVar

from benchlay.document.form import Reader
from benchlay.document.forms import Choice, Pair, Quantity
from benchlay.document.quantity import Dimension
from benchlay.document.record import key
from benchlay.elements._coating import COATING, UNCOATED, Coating
from benchlay.elements._glass import GLASS
from benchlay.elements._kind import Acts, Branches, ElementKind, Geometry, Glass, Stroke
from benchlay.elements._radius import RADIUS
from benchlay.elements._sized import LENGTH, PlateShape, Sized
from benchlay.elements._through import TRANSMITTED

_FOCAL = Quantity(Dimension.LENGTH)
_DRAWN_INDEX = 1.5  # for the picture only: radii of the drawn lens are 2 (n - 1) f
_ARC_STEPS = 12
_STRONGEST = 1.05  # a drawn radius is at least this many times the half width
# By the sine condition no lens in air has a focal length below half of what it takes in. An
# outline may be wider than that, so half of it again is read; below, it is a slip.
_SHORTEST = 0.5  # of half the outline
_EDGE_MM = 0.8  # of a drawn convex lens, at least


class Lens(Sized, ElementKind):
    """A thin lens."""

    KIND = "lens"
    BRANCHES: ClassVar[Branches] = {"transmitted": TRANSMITTED}
    DEFAULT_BRANCH = "transmitted"

    focal_mm: float | None = key(
        _FOCAL, default=None, name="focal", meaning="focal length; negative diverges"
    )
    radii_mm: tuple[float, float] | None = key(
        Pair(RADIUS),
        default=None,
        name="radii",
        meaning="radii of front and back",
        not_yet="lenses given by radii",
    )
    thickness_mm: float = key(
        LENGTH, default=4.0, name="thickness", meaning="thickness at the middle"
    )
    glass: Glass = key(GLASS, default=Glass("BK7", None), meaning="the glass")
    front: Coating = key(COATING, default=UNCOATED, meaning="coating of the front face")
    back: Coating = key(COATING, default=UNCOATED, meaning="coating of the back face")
    acts: str = key(
        Choice("both", "across", "up"),
        default="both",
        meaning="in which directions it bends",
        not_yet="cylindrical lenses",
    )

    def after_read(self, reader: Reader) -> None:
        """Ask for a focal length that is not nought."""
        super().after_read(reader)
        if self.focal_mm is None:
            reader.complain(
                self.span,
                "'focal' is missing",
                expected="'focal' with a length other than 0; negative for a diverging lens",
                remedy="add 'focal: 200', with the length that is meant",
            )
        if self.focal_mm == 0.0:
            reader.complain(
                self.span_of("focal"),
                "a focal length of 0 mm",
                expected="a length other than 0; negative for a diverging lens",
                remedy="write the focal length, such as 'focal: 200'",
            )
        elif self.focal_mm is not None and (self.diameter_mm or self.size_mm):
            shortest = _SHORTEST * min(self.outline().radii)
            if abs(self.focal_mm) < shortest:
                reader.complain(
                    self.span_of("focal"),
                    f"no lens this wide has a focal length of {self.focal_mm:g} mm",
                    expected=f"at least {shortest:g} mm, a quarter of its width",
                    remedy="check the unit: a bare number is in mm",
                )

    def geometry(self) -> Geometry:
        """Return two bending faces in one place."""
        outline = self.outline()
        shape = PlateShape(outline, outline.scaled(self.clear), 0.0)
        focal = self.focal_mm or inf
        faces = tuple(
            face._replace(acts=Acts.LENS, focal_mm=focal)
            for face in shape.faces(self.front, self.back)
        )
        half_width, half_height = outline.radii
        # The mount's front plane is the plane in which the ideal lens acts, so that its ring
        # stands beside the lens and not before it.
        extent = (-self.thickness_mm, 0.0, half_width, half_height)
        return Geometry(faces, (), (self._picture(half_width),), extent, glass=self.glass)

    def _picture(self, half: float) -> Stroke:
        """Return the section of an equi-convex or equi-concave lens of this focal length.

        Where that is too strong to be drawn, arcs just below half a circle stand for it; a
        convex one keeps an edge, if need be by more thickness in the middle.
        """
        focal = self.focal_mm or inf
        radius = max(2 * (_DRAWN_INDEX - 1) * abs(focal), _STRONGEST * half)
        steps = [half * (2 * i / _ARC_STEPS - 1) for i in range(_ARC_STEPS + 1)]
        sags = [copysign(radius - sqrt(radius * radius - y * y), focal) for y in steps]
        middle = max(self.thickness_mm / 2, sags[0] + _EDGE_MM / 2)
        front = [(middle - sag, y) for y, sag in zip(steps, sags, strict=True)]
        back = [(-x, y) for x, y in reversed(front)]
        return Stroke((*front, *back), closed=True, role="outline")

    def glass_of(self) -> Glass:
        """Return the glass."""
        return self.glass
