"""States of polarization, as they are written."""

from __future__ import annotations

from math import pi
from typing import Any

from benchlay.document.form import Form, Reader
from benchlay.document.forms import Choice, OneOf, Quantity, RecordForm, Words
from benchlay.document.nodes import Node
from benchlay.document.quantity import Dimension
from benchlay.document.record import Record, key
from benchlay.named import NamedTuple

_ANGLE = Quantity(Dimension.ANGLE)


class Polarization(NamedTuple):
    """`kind` is ``none``, ``angle`` (from horizontal) or ``circular`` (with its hand)."""

    kind: str
    angle_rad: float = 0.0
    hand: str = ""


UNPOLARIZED = Polarization("none")


class _Inclined(Record):
    angle_rad: float = key(
        _ANGLE,
        name="angle",
        meaning="from horizontal, anticlockwise to a viewer whom the beam approaches",
    )


class _Circular(Record):
    circular: str = key(Choice("left", "right"), meaning="`right` turns clockwise to that viewer")


class PolarizationForm(Form[Polarization]):
    """Reads `horizontal`, `vertical`, `none`, `{angle: 30}` or `{circular: left}`."""

    _form = OneOf(
        Words(
            {
                "horizontal": Polarization("angle", 0.0),
                "vertical": Polarization("angle", pi / 2),
                "none": UNPOLARIZED,
            }
        ),
        RecordForm(_Inclined),
        RecordForm(_Circular),
    )

    def read(self, node: Node, reader: Reader) -> Polarization | None:
        """Read a state of polarization."""
        value = self._form.read(node, reader)
        if isinstance(value, _Inclined):
            return Polarization("angle", value.angle_rad)
        if isinstance(value, _Circular):
            return Polarization("circular", hand=value.circular)
        return value if isinstance(value, Polarization) else None

    def text(self) -> str:
        """Say what may be written."""
        return "'horizontal', 'vertical', 'none', '{angle: 30}' or '{circular: left|right}'"

    def example(self) -> str:
        """Give a sample."""
        return "'vertical'"

    def schema(self) -> dict[str, Any]:
        """Allow all ways."""
        return self._form.schema()

    def show(self, value: object) -> str:
        """Write a state as a user would."""
        return "none" if value == UNPOLARIZED else str(value)
