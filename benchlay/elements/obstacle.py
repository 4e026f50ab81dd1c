"""Any other opaque body on the bench: a power supply, a camera, a stage.

.. code-block:: yaml

   supply:
     kind: obstacle
     at: [900, 200]
     facing: 0
     outline: [[0, 0], [200, 0], [200, 80], [0, 80]]
     to_height: 120

The outline is in the element's own frame (x along `facing`, y to its left); heights are
above the bench. It stands upright whatever its pitch; one that does not reach down to the
bench stands on a post under the middle of its largest convex part (`mount: none` takes the
post away).
"""

from __future__ import annotations

from typing import ClassVar

from benchlay.document.form import Reader
from benchlay.document.forms import Fixed, ListOf, Quantity, Text
from benchlay.document.quantity import Dimension
from benchlay.document.record import key
from benchlay.elements._kind import ElementKind, Geometry, Stroke
from benchlay.geometry.polygon import convex_pieces, middle, signed_area, simple
from benchlay.geometry.solid import prism

_COORDINATE = Quantity(Dimension.LENGTH)


class Obstacle(ElementKind):
    """Any other opaque body."""

    KIND = "obstacle"
    FAULTS: ClassVar[frozenset[str]] = frozenset(("missing",))
    MOUNTED = False
    DARK_MATTERS = False

    outline_mm: tuple[tuple[float, float], ...] = key(
        ListOf(Fixed(_COORDINATE, 2), min=3),
        name="outline",
        meaning="corners seen from above",
    )
    from_height_mm: float = key(
        _COORDINATE,
        default=0.0,
        name="from_height",
        meaning="its lower side, above the bench",
    )
    to_height_mm: float = key(
        _COORDINATE, name="to_height", meaning="its upper side, above the bench"
    )
    material: str | None = key(
        Text(), default=None, meaning="what it is made of (a name under `materials`)"
    )

    def after_read(self, reader: Reader) -> None:
        """Refuse outlines that cross themselves and bodies without height."""
        super().after_read(reader)
        if self.to_height_mm <= self.from_height_mm:
            reader.complain(
                self.span_of("to_height"),
                f"the upper side at {self.to_height_mm:g} mm is not above "
                f"the lower one at {self.from_height_mm:g} mm",
                expected="'to_height' above 'from_height'",
                remedy=f"set 'to_height' to {self.from_height_mm + 1:g} or more",
            )
        if not simple(self.outline_mm):
            reader.complain(
                self.span_of("outline"),
                "the outline crosses itself or encloses nothing",
                expected="corners in order round the body",
                remedy="put the corners in order",
            )

    def geometry(self) -> Geometry:
        """Return one prism for each convex piece of the outline."""
        outline = self.outline_mm
        if signed_area(outline) < 0:
            outline = tuple(reversed(outline))
        parts = convex_pieces(outline)
        heights = (self.from_height_mm, self.to_height_mm)
        xs = [x for x, _ in outline]
        half_width = max(abs(y) for _, y in outline)
        stands = self.from_height_mm <= 0.0
        return Geometry(
            (),
            tuple(prism("body", part, heights, upright=True) for part in parts),
            (Stroke(outline, closed=True, role="outline"),),
            (min(xs), max(xs), half_width, (heights[1] - heights[0]) / 2),
            material=self.material,
            post_at=None if stands else middle(max(parts, key=signed_area)),
            post_top_mm=self.from_height_mm,
        )
