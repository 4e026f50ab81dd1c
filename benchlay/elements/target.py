"""What light is brought to: a sample, a plate, a camera, a meter.

.. code-block:: yaml

   plate: {kind: target, after: M4, distance: 300, size: [100, 125], diffuse: 60 %}
Light ends on its face, save for the specular share, which goes on as from a mirror, and the
diffuse share, which scatters in all directions. Without `facing` it faces the beam squarely.
"""

from __future__ import annotations

from typing import ClassVar

from benchlay.document.form import Reader
from benchlay.document.forms import Pair
from benchlay.document.record import key
from benchlay.elements._kind import ElementKind, Geometry
from benchlay.elements._plates import plate_behind, plate_stroke
from benchlay.elements._shares import SHARE, refuse_excess
from benchlay.elements._sized import LENGTH, opaque_front
from benchlay.geometry.outline import rectangle

BODY_THICKNESS_MM = 5.0  # there is no key for it: a plausible holder, common practice


class Target(ElementKind):
    """What light is brought to."""

    KIND = "target"
    FAULTS: ClassVar[frozenset[str]] = frozenset(("missing",))
    SQUARE = True
    MOUNTED = False
    BLOCKS = True

    size_mm: tuple[float, float] = key(
        Pair(LENGTH), default=(40.0, 40.0), name="size", meaning="width and height"
    )
    diffuse: float = key(SHARE, default=0.9, meaning="share scattered in all directions")
    specular: float = key(SHARE, default=0.0, meaning="share reflected as by a mirror")

    def after_read(self, reader: Reader) -> None:
        """Refuse a face that gives more than it gets."""
        super().after_read(reader)
        refuse_excess(self, ("specular", self.specular), ("diffuse", self.diffuse), reader)

    def geometry(self) -> Geometry:
        """Return the face and the body behind it."""
        outline = rectangle(*self.size_mm)
        return Geometry(
            (opaque_front(outline, "target", specular=self.specular),),
            (plate_behind("body", self.size_mm, BODY_THICKNESS_MM),),
            (plate_stroke(outline.radii[0], BODY_THICKNESS_MM),),
            (-BODY_THICKNESS_MM, 0.0, *outline.radii),
            post_at=(-BODY_THICKNESS_MM / 2, 0.0),
        )
