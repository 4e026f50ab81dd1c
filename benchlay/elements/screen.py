"""A beam block: an opaque plate.

.. code-block:: yaml

   K1: {kind: screen, at: [400, 300], facing: 180, size: [50, 75]}
It ends what meets its front on purpose; its thickness is 2 mm.
"""

from __future__ import annotations

from typing import ClassVar

from benchlay.document.forms import Pair, Text
from benchlay.document.record import key
from benchlay.elements._kind import ElementKind, Geometry
from benchlay.elements._plates import PLATE_THICKNESS_MM, plate_behind, plate_stroke
from benchlay.elements._sized import LENGTH, opaque_front
from benchlay.geometry.outline import rectangle


class Screen(ElementKind):
    """A beam block."""

    KIND = "screen"
    FAULTS: ClassVar[frozenset[str]] = frozenset(("missing",))
    DARK_MATTERS = False
    BLOCKS = True

    size_mm: tuple[float, float] = key(
        Pair(LENGTH), default=(50.0, 75.0), name="size", meaning="width and height"
    )
    material: str | None = key(
        Text(), default=None, meaning="what it is made of (a name under `materials`)"
    )

    def geometry(self) -> Geometry:
        """Return the plate: its front stops light as a screen, its back as a body."""
        outline = rectangle(*self.size_mm)
        return Geometry(
            (opaque_front(outline, "screen", material=self.material),),
            (plate_behind("body", self.size_mm, PLATE_THICKNESS_MM),),
            (plate_stroke(self.size_mm[0] / 2, PLATE_THICKNESS_MM),),
            (-PLATE_THICKNESS_MM, 0.0, *outline.radii),
            material=self.material,
            post_at=(-PLATE_THICKNESS_MM / 2, 0.0),
        )
