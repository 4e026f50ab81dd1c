"""Any other opaque body on the bench: a power supply, a camera, a stage.

.. code-block:: yaml

   supply: {kind: obstacle, at: [900, 200], facing: 0, outline: [[0, 0], [200, 0], [200, 80], [0, 80]], to_height: 120}

The outline is in the element's own frame (x along `facing`, y to its left); heights are
above the bench. It stands upright whatever its pitch.
"""

from __future__ import annotations

from benchlay.document.form import Reader
from benchlay.document.forms import Fixed, ListOf, Quantity, Text
from benchlay.document.quantity import Dimension
from benchlay.document.record import key
from benchlay.elements._kind import ElementKind, Geometry, Stroke
from benchlay.geometry.polygon import convex_pieces, signed_area, simple
from benchlay.geometry.solid import prism

_COORDINATE = Quantity(Dimension.LENGTH)


class Obstacle(ElementKind):
    """Any other opaque body."""

    KIND = "obstacle"
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
        if self.to_height_mm <= self.from_height_mm:
            reader.complain(
                self.spans["to_height"],
                f"its upper side ({self.to_height_mm:g} mm) is not above its lower side ({self.from_height_mm:g} mm)",
                expected="`to_height` above `from_height`",
                remedy=f"set `to_height` above {self.from_height_mm:g}",
            )
        if not simple(self.outline_mm):
            reader.complain(
                self.spans["outline"],
                "the outline crosses itself or encloses nothing",
                expected="corners in order round the body",
                remedy="put the corners in order",
            )

    def geometry(self) -> Geometry:
        """Return one prism for each convex piece of the outline."""
        outline = (
            self.outline_mm
            if signed_area(self.outline_mm) > 0
            else tuple(reversed(self.outline_mm))
        )
        heights = (self.from_height_mm, self.to_height_mm)
        pieces = tuple(
            prism("body", piece, heights, upright=True) for piece in convex_pieces(outline)
        )
        xs = [x for x, _ in outline]
        half_width = max(abs(y) for _, y in outline)
        half_height = (self.to_height_mm - self.from_height_mm) / 2
        return Geometry(
            (),
            pieces,
            (Stroke(outline, closed=True, role="outline"),),
            (min(xs), max(xs), half_width, half_height),
            material=self.material,
        )
