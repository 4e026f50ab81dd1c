"""Radii of curvature in the words of ISO 10110: `51.5 CX`, `400 CC`, `flat`."""

from __future__ import annotations

from typing import Any

from benchlay.document.form import Form, Reader
from benchlay.document.forms import Quantity
from benchlay.document.nodes import Node, Scalar
from benchlay.document.quantity import Dimension

_LENGTH = Quantity(Dimension.LENGTH, above=0.0)
_EXPECTED = "a radius with CX (convex) or CC (concave), as `51.5 CX`, or `flat`"
FLAT = 0.0


class RadiusForm(Form[float]):
    """Reads a radius; convex is positive, concave negative, `FLAT` is 0."""

    def text(self) -> str:
        """Say what is expected."""
        return _EXPECTED

    def example(self) -> str:
        """Give one that may be written."""
        return "400 CC"

    def schema(self) -> dict[str, Any]:
        """Return the JSON Schema of a radius."""
        return {"type": "string", "pattern": "^(flat|.+ C[XC])$"}

    def read(self, node: Node, reader: Reader) -> float | None:
        """Read a radius in mm, adding what is wrong to the reader's problems."""
        words = node.text.rsplit(" ", 1) if isinstance(node, Scalar) else []
        if words == ["flat"]:
            return FLAT
        if len(words) == 2 and words[1] in ("CX", "CC") and isinstance(node, Scalar):  # noqa: PLR2004
            size = _LENGTH.read(Scalar(words[0], node.span, quoted=True), reader)
            return None if size is None else size if words[1] == "CX" else -size
        reader.complain(
            node.span,
            "this is not a radius of curvature",
            expected=_EXPECTED,
            remedy="add CX or CC after the radius",
        )
        return None


RADIUS = RadiusForm()


def refuse_curved(radius_mm: float | None, name: str, record: Any, reader: Reader) -> None:
    """Curved faces are read but not traced yet: say so where they are written."""
    if radius_mm not in (None, FLAT):
        reader.complain(
            record.spans[name],
            "not yet: curved faces are read but cannot be traced by this version",
            expected="`flat`",
            remedy="leave it flat; nothing curved is computed as if it were flat",
        )
