"""Forms that several parts of the language share: lengths, points, outlines, references."""

from __future__ import annotations

from typing import Any

from benchlay.document.form import Form, Reader
from benchlay.document.forms import Fixed, ListOf, Pair, Quantity
from benchlay.document.nodes import Node, Scalar
from benchlay.document.quantity import Dimension
from benchlay.document.span import Span
from benchlay.document.texts import NAME_PATTERN
from benchlay.document.words import format_choices, quote
from benchlay.geometry.polygon import Polygon, signed_area, simple
from benchlay.named import NamedTuple

LENGTH = Quantity(Dimension.LENGTH)
POSITIVE = Quantity(Dimension.LENGTH, above=0.0)
NOT_NEGATIVE = Quantity(Dimension.LENGTH, at_least=0.0)
ANGLE = Quantity(Dimension.ANGLE)
SPREAD = Quantity(Dimension.ANGLE, at_least=0.0)
WAVELENGTH = Quantity(Dimension.WAVELENGTH, above=0.0)
POWER = Quantity(Dimension.POWER, above=0.0)
SHARE = Quantity(Dimension.RATIO, at_least=0.0, at_most=1.0)
POINT = Pair(LENGTH)
TRIPLE = Fixed(LENGTH, 3)
PLACE = ListOf(LENGTH, min=2, max=3)


class OutlineForm(Form[Polygon]):
    """Reads corners in order; the value runs anticlockwise whichever way they were written."""

    _corners = ListOf(POINT, min=3)

    def read(self, node: Node, reader: Reader) -> Polygon | None:
        """Read the corners, and refuse outlines that enclose nothing or meet themselves."""
        corners = self._corners.read(node, reader)
        if corners is None:
            return None
        if not simple(corners):
            reader.complain(
                node,
                "the outline crosses or touches itself, or encloses nothing",
                expected="corners in order round an area, each of them once",
                remedy="put the corners in order; do not repeat the first one at the end",
            )
            return None
        return corners if signed_area(corners) > 0.0 else corners[::-1]

    def text(self) -> str:
        """Say that corners are wanted."""
        return "a list of at least 3 corners [x, y] in order"

    def example(self) -> str:
        """Give a triangle."""
        return "[[0, 0], [100, 0], [100, 100]]"

    def takes(self, node: Node) -> bool:
        """Take lists."""
        return self._corners.takes(node)

    def schema(self) -> dict[str, Any]:
        """Give the schema of a list of points."""
        return self._corners.schema()


OUTLINE = OutlineForm()


class Ref(NamedTuple):
    """The name of something defined elsewhere, and where it was written."""

    name: str
    span: Span


class RefForm(Form[Ref]):
    """Reads a name that must be defined elsewhere; whether it is, is asked later."""

    def __init__(self, what: str) -> None:
        self.what = what

    def read(self, node: Node, reader: Reader) -> Ref | None:
        """Keep the text and its place."""
        if isinstance(node, Scalar) and node.text.strip():
            return Ref(node.text.strip(), node.span)
        reader.refuse(node, self)
        return None

    def takes(self, node: Node) -> bool:
        """Take text."""
        return isinstance(node, Scalar)

    def text(self) -> str:
        """Say what it names."""
        return f"the name of {self.what}"

    def example(self) -> str:
        """Give a name."""
        return "'M1'"

    def schema(self) -> dict[str, Any]:
        """Give the pattern of names."""
        return {"type": "string", "pattern": f"^{NAME_PATTERN}$"}


class DottedForm(Form[tuple[str, str, Span]]):
    """Reads `NAME` or `NAME.PART` (or only the latter, with `both`)."""

    def __init__(self, what: str, *samples: str, both: bool = False) -> None:
        self.what, self.samples, self.both = what, samples, both

    def read(self, node: Node, reader: Reader) -> tuple[str, str, Span] | None:
        """Return name, part (empty if there is none) and place."""
        if not isinstance(node, Scalar) or not node.text.strip():
            reader.refuse(node, self)
            return None
        name, dot, part = node.text.strip().partition(".")
        if not name or bool(dot) != bool(part) or (self.both and not part):
            reader.complain(
                node,
                f"{quote(node.text)} is not {self.what}",
                expected=self.text(),
                remedy=f"write {self.text()}",
            )
            return None
        return name, part, node.span

    def takes(self, node: Node) -> bool:
        """Take text."""
        return isinstance(node, Scalar)

    def text(self) -> str:
        """Say what it names."""
        return f"{self.what}, as {format_choices(self.samples)}"

    def example(self) -> str:
        """Give a sample."""
        return quote(self.samples[0])

    def schema(self) -> dict[str, Any]:
        """Give the pattern."""
        tail = r"\..+$" if self.both else r"(\..+)?$"
        return {"type": "string", "pattern": f"^{NAME_PATTERN}{tail}"}
