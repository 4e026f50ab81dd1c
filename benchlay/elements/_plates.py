"""Opaque plates: keys and geometry shared by apertures, shutters, screens and targets."""

from __future__ import annotations

from typing import Any

from benchlay.document.form import Form, Reader
from benchlay.document.forms import OneOf, Pair
from benchlay.document.nodes import Node, Scalar, Sequence
from benchlay.document.record import Record
from benchlay.elements._kind import Geometry, Stroke
from benchlay.elements._sized import LENGTH, opening_front
from benchlay.geometry.outline import Outline, circle, rectangle
from benchlay.geometry.solid import Solid, box

PLATE_THICKNESS_MM = 2.0  # of plates that have no key for it: common practice


class OpeningForm(Form[Outline]):
    """Reads an opening: a diameter, or `[width, height]`."""

    _forms = OneOf(LENGTH, Pair(LENGTH))

    def text(self) -> str:
        """Say what is expected."""
        return f"a diameter, {LENGTH.text()}; or '[width, height]'"

    def example(self) -> str:
        """Give one that may be written."""
        return "'5'"

    def takes(self, node: Node) -> bool:
        """Take a diameter or a list."""
        return self._forms.takes(node)

    def show(self, value: object) -> str:
        """Write the default as a user would."""
        if not isinstance(value, Outline):
            return super().show(value)
        width, height = (2 * radius for radius in value.radii)
        return LENGTH.show(width) if value.round else f"[{width:g}, {height:g}] mm"

    def schema(self) -> dict[str, Any]:
        """Return the JSON Schema of an opening."""
        return self._forms.schema()

    def read(self, node: Node, reader: Reader) -> Outline | None:
        """Read an opening, adding what is wrong to the reader's problems."""
        if isinstance(node, Scalar) and node.text.strip():
            diameter = LENGTH.read(node, reader)
            return None if diameter is None else circle(diameter / 2)
        if not isinstance(node, Sequence):
            reader.refuse(node, self)
            return None
        size = Pair(LENGTH).read(node, reader)
        return None if size is None else rectangle(*size)


OPENING = OpeningForm()


def ask_for_margin(
    opening: Outline, size_mm: tuple[float, float], record: Record, reader: Reader
) -> None:
    """Refuse an opening that is no smaller than its plate."""
    for i, what in ((0, "width"), (1, "height")):
        if 2 * opening.radii[i] >= size_mm[i]:
            reader.complain(
                record.span_of("opening" if record.written("opening") else "size"),
                f"the opening is {2 * opening.radii[i]:g} mm in {what}, "
                f"its plate {size_mm[i]:g} mm",
                expected="an opening smaller than its plate",
                remedy=f"write a larger 'size', or an 'opening' below {size_mm[i]:g}",
            )
            return


def plate_behind(part: str, size_mm: tuple[float, float], thickness_mm: float) -> Solid:
    """Return the box of a plate behind its front face."""
    half_width, half_height = size_mm[0] / 2, size_mm[1] / 2
    return box(
        part,
        (-thickness_mm, 0.0),
        (-half_width, half_width),
        (-half_height, half_height),
    )


def plate_stroke(half_width_mm: float, thickness_mm: float) -> Stroke:
    """Return the plan outline of a plate behind x = 0."""
    half = half_width_mm
    return Stroke(
        ((0.0, -half), (0.0, half), (-thickness_mm, half), (-thickness_mm, -half)),
        closed=True,
        role="outline",
    )


def opening_strokes(
    opening: Outline, half_width_mm: float, thickness_mm: float
) -> tuple[Stroke, ...]:
    """Return the two halves of a plate with an opening, as a section at beam height shows it."""
    gap, half, t = opening.radii[0], half_width_mm, thickness_mm
    left = Stroke(((0.0, gap), (0.0, half), (-t, half), (-t, gap)), closed=True, role="outline")
    right = Stroke(
        ((0.0, -gap), (0.0, -half), (-t, -half), (-t, -gap)),
        closed=True,
        role="outline",
    )
    middle = Stroke(((0.0, -gap), (0.0, gap)), closed=False, role="opening")
    return (left, right, middle)


def opening_geometry(
    opening: Outline, size_mm: tuple[float, float], thickness_mm: float
) -> Geometry:
    """Return a plate that lets light through its opening."""
    plate = rectangle(*size_mm)
    return Geometry(
        (opening_front(plate, opening, "rim"),),
        (plate_behind("plate", size_mm, thickness_mm),),
        opening_strokes(opening, size_mm[0] / 2, thickness_mm),
        (-thickness_mm, 0.0, *plate.radii),
        post_at=(-thickness_mm / 2, 0.0),
    )
