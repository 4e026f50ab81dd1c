"""Glasses: a name of the catalogue, or an index."""

from __future__ import annotations

from typing import Any

from benchlay.document.form import Form, Reader
from benchlay.document.forms import OneOf, Quantity, RecordForm, Words
from benchlay.document.nodes import Node, Scalar
from benchlay.document.quantity import Dimension
from benchlay.document.record import Record, key
from benchlay.document.words import format_choices, nearest, quote
from benchlay.elements._kind import Glass

INDEX = Quantity(Dimension.RATIO, at_least=1.0, at_most=10.0)
GLASS_NAMES = (
    "fused-silica",
    "BK7",
    "SF10",
    "SF11",
    "CaF2",
    "MgF2",
    "sapphire",
    "ZnSe",
    "quartz",
    "calcite",
    "water",
)


class PlainIndex(Record):
    """A medium of one index at every wavelength."""

    index: float = key(INDEX, meaning="refractive index, relative to the bench's medium")


class GlassForm(Form[Glass]):
    """Reads a glass: a name of the catalogue, or an index relative to the bench's medium."""

    _forms = OneOf(Words({name: name for name in GLASS_NAMES}), RecordForm(PlainIndex))

    def text(self) -> str:
        """Say what is expected."""
        return f"{format_choices(GLASS_NAMES)}, or an index as '{{index: 1.5}}'"

    def example(self) -> str:
        """Give one that may be written."""
        return "'BK7'"

    def takes(self, node: Node) -> bool:
        """Take what may be a glass."""
        return self._forms.takes(node)

    def schema(self) -> dict[str, Any]:
        """Return the JSON Schema of a glass."""
        return self._forms.schema()

    def show(self, value: object) -> str:
        """Write the default as a user would."""
        if not isinstance(value, Glass):
            return super().show(value)
        return value.name or f"{{index: {value.ratio:g}}}"

    def read(self, node: Node, reader: Reader) -> Glass | None:
        """Read a glass, adding what is wrong to the reader's problems."""
        empty = isinstance(node, Scalar) and not node.text.strip()
        if empty or not self.takes(node):
            reader.refuse(node, self)
            return None
        if isinstance(node, Scalar) and node.text not in GLASS_NAMES:
            self._refuse_name(node, reader)
            return None
        value = self._forms.read(node, reader)
        if isinstance(value, PlainIndex):
            return Glass(None, value.index, node.span)
        return None if value is None else Glass(value, None, node.span)

    def _refuse_name(self, node: Scalar, reader: Reader) -> None:
        guess = nearest(node.text, GLASS_NAMES)
        if node.text.strip()[0].isdigit():
            remedy = f"write '{{index: {node.text.strip()}}}' if the index is meant"
        elif guess:
            remedy = f"write '{guess}'"
        else:
            remedy = "write a material of the list, or its index"
        reader.complain(
            node, f"{quote(node.text)} is not a known glass", expected=self.text(), remedy=remedy
        )


GLASS = GlassForm()
