"""How poses are written: paths, turns, headings and openings."""

from __future__ import annotations

import re
from math import radians
from typing import Any

from benchlay.document.form import Form, Reader
from benchlay.document.forms import ListOf, Quantity
from benchlay.document.nodes import Node, Scalar, Sequence
from benchlay.document.quantity import Dimension
from benchlay.document.span import Span
from benchlay.geometry.polygon import Point
from benchlay.layout._forms import ANGLE, POINT, DottedForm, Ref, RefForm
from benchlay.named import NamedTuple

_TURN = Quantity(Dimension.ANGLE, above=0.0, at_most=radians(180))
_NUMBER = re.compile(r"[+-]?\.?[0-9]")
_DIRECTIONS = ("left", "right", "up", "down")


class PathItem(NamedTuple):
    """An item on the way of a beam, the branch by which it is left (None: its default)."""

    item: str
    branch: str | None
    span: Span


class Turn(NamedTuple):
    """How the front face is to turn the beam: ``left``, ``right``, ``up`` or ``down``."""

    direction: str
    angle_rad: float


class PathItemForm(Form[PathItem]):
    """Reads `M1` or `BS1.reflected`."""

    _dotted = DottedForm("an item of a path", "M1", "BS1.reflected")

    def read(self, node: Node, reader: Reader) -> PathItem | None:
        """Read one item."""
        found = self._dotted.read(node, reader)
        return None if found is None else PathItem(found[0], found[1] or None, found[2])

    def takes(self, node: Node) -> bool:
        """Take text."""
        return isinstance(node, Scalar)

    def text(self) -> str:
        """Say what it names."""
        return self._dotted.text()

    def example(self) -> str:
        """Give a sample."""
        return "'M1'"

    def schema(self) -> dict[str, Any]:
        """Give the pattern."""
        return self._dotted.schema()


class AfterForm(Form[tuple[PathItem, ...]]):
    """Reads the tail of a path: one item, or a list of them."""

    _item = PathItemForm()
    _items = ListOf(_item, min=1, max=100)

    def read(self, node: Node, reader: Reader) -> tuple[PathItem, ...] | None:
        """Read one item or several; always a tuple."""
        if isinstance(node, Sequence):
            return self._items.read(node, reader)
        item = self._item.read(node, reader)
        return None if item is None else (item,)

    def text(self) -> str:
        """Say what it names."""
        return (
            "the item a beam comes from, 'M1' or 'BS1.reflected', "
            "or the list of a path's last items"
        )

    def example(self) -> str:
        """Give a sample."""
        return "'M1'"

    def schema(self) -> dict[str, Any]:
        """Allow one or a list."""
        return {"anyOf": [self._item.schema(), self._items.schema()]}


class TurnForm(Form[Turn]):
    """Reads `left 90`, `right 30 deg`, `up 90`, `down 90`."""

    def read(self, node: Node, reader: Reader) -> Turn | None:
        """Read a direction and an angle."""
        words = node.text.split(None, 1) if isinstance(node, Scalar) else []
        if len(words) != 2 or words[0] not in _DIRECTIONS:  # noqa: PLR2004 (two words)
            reader.refuse(node, self)
            return None
        angle = _TURN.read(Scalar(words[1], node.span), reader)
        return None if angle is None else Turn(words[0], angle)

    def text(self) -> str:
        """Say how it is written."""
        return "a turn of the beam, 'left', 'right', 'up' or 'down' and an angle up to 180 deg"

    def example(self) -> str:
        """Give a sample."""
        return "'left 90'"

    def schema(self) -> dict[str, Any]:
        """Give the pattern."""
        return {"type": "string", "pattern": "^(left|right|up|down) .+$"}


class FacingForm(Form[Any]):
    """Reads a heading, a point `[x, y]`, or the name of something to look at."""

    _name = RefForm("a source or element")

    def read(self, node: Node, reader: Reader) -> float | Point | Ref | None:
        """Tell numbers, names and points apart."""
        if isinstance(node, Sequence):
            return POINT.read(node, reader)
        if isinstance(node, Scalar) and _NUMBER.match(node.text.strip()):
            return ANGLE.read(node, reader)
        if isinstance(node, Scalar) and node.text.strip():
            return self._name.read(node, reader)
        reader.refuse(node, self)
        return None

    def text(self) -> str:
        """Say what may be written."""
        return "a heading in deg, a name, or a point [x, y]"

    def example(self) -> str:
        """Give a sample."""
        return "'90'"

    def schema(self) -> dict[str, Any]:
        """Allow all three."""
        return {"anyOf": [ANGLE.schema(), POINT.schema()]}


class OpeningRef(NamedTuple):
    """An opening of a panel."""

    panel: str
    opening: str
    span: Span


class OpeningForm(Form[OpeningRef]):
    """Reads `east.port`."""

    _dotted = DottedForm("a panel and its opening", "east.port", both=True)

    def read(self, node: Node, reader: Reader) -> OpeningRef | None:
        """Read both names."""
        found = self._dotted.read(node, reader)
        return None if found is None else OpeningRef(*found)

    def text(self) -> str:
        """Say what it names."""
        return self._dotted.text()

    def example(self) -> str:
        """Give a sample."""
        return "'east.port'"

    def schema(self) -> dict[str, Any]:
        """Give the pattern."""
        return self._dotted.schema()
