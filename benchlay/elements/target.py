"""What light is brought to: a sample, a plate, a camera, a meter.

.. code-block:: yaml

   plate: {kind: target, after: M4, distance: 300, size: [100, 125], diffuse: 60 %}
"""

from __future__ import annotations

from benchlay.document.form import Reader
from benchlay.document.forms import Pair
from benchlay.document.record import key
from benchlay.elements._coating import SHARE
from benchlay.elements._kind import ElementKind, Geometry
from benchlay.elements._plates import plate_behind, plate_stroke
from benchlay.elements._sized import LENGTH, opaque_front
from benchlay.geometry.outline import rectangle

BODY_THICKNESS_MM = (
    5.0  # the language gives a target no thickness: a plausible holder, common practice
)


class Target(ElementKind):
    """What light is brought to."""

    KIND = "target"
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
        if self.diffuse + self.specular > 1.0:
            where = self.spans.get("specular", self.spans.get("diffuse", self.span))
            reader.complain(
                where,
                f"diffuse and specular add up to {self.diffuse + self.specular:.6g}",
                expected="at most 1 together",
                remedy=f"set `diffuse` to {1 - self.specular:.6g} or less",
            )

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
