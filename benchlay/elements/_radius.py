"""Radii of curvature in the words of ISO 10110: `51.5 CX`, `400 CC`, `flat`."""

from __future__ import annotations

from typing import Any

from benchlay.document.form import Form, Reader
from benchlay.document.forms import Quantity
from benchlay.document.nodes import Node, Scalar
from benchlay.document.quantity import Dimension
from benchlay.document.words import quote

FLAT = 0.0

_LENGTH = Quantity(Dimension.LENGTH, above=0.0)
_EXPECTED = "a radius with CX (convex) or CC (concave), as '51.5 CX', or 'flat'"
_SIGNS = {"CX": 1.0, "CC": -1.0}


class RadiusForm(Form[float]):
    """Reads a radius in mm; convex is positive, concave negative, `FLAT` is 0."""

    def text(self) -> str:
        """Say what is expected."""
        return _EXPECTED

    def example(self) -> str:
        """Give one that may be written."""
        return "'400 CC'"

    def schema(self) -> dict[str, Any]:
        """Return the JSON Schema of a radius."""
        return {"type": "string", "pattern": "^(flat|.+ C[XC])$"}

    def show(self, value: object) -> str:
        """Write the default as a user would."""
        return "flat" if value == FLAT else super().show(value)

    def takes(self, node: Node) -> bool:
        """Take text."""
        return isinstance(node, Scalar)

    def read(self, node: Node, reader: Reader) -> float | None:
        """Read a radius in mm, adding what is wrong to the reader's problems."""
        if not isinstance(node, Scalar) or not node.text.strip():
            reader.refuse(node, self)
            return None
        if node.text == "flat":
            return FLAT
        size, _, sign = node.text.strip().rpartition(" ")
        if sign in _SIGNS and size.strip():
            radius = _LENGTH.read(Scalar(size, node.span), reader)
            return None if radius is None else _SIGNS[sign] * radius
        reader.complain(
            node,
            f"{quote(node.text)} is not a radius of curvature",
            expected=_EXPECTED,
            remedy="write CX or CC after the radius, or 'flat'",
        )
        return None


RADIUS = RadiusForm()
