"""Forms of single values."""

from __future__ import annotations

import math
import re
from collections.abc import Mapping as AbstractMapping
from enum import Enum
from typing import Any, ClassVar, Generic, TypeVar

from benchlay.document.form import Form, Reader, show_plainly
from benchlay.document.nodes import Node, Scalar
from benchlay.document.quantity import QuantityError, describe_dimension, parse, show
from benchlay.document.units import Dimension
from benchlay.document.words import format_choices, nearest, quote

T = TypeVar("T")
E = TypeVar("E", bound=Enum)


class Single(Form[T]):
    """A form of one piece of text; own ones define `value`, `schema` and `text`."""

    def read(self, node: Node, reader: Reader) -> T | None:
        """Hand the text to `value`; anything else is refused."""
        if not isinstance(node, Scalar) or not (node.text.strip() or node.quoted):
            reader.refuse(node, self)
            return None
        return self.value(node, reader)

    def value(self, node: Scalar, reader: Reader) -> T | None:
        """Return the value of a piece of text, or None after a problem."""
        raise NotImplementedError

    def takes(self, node: Node) -> bool:
        """Take any piece of text."""
        return isinstance(node, Scalar)


class Quantity(Single[float]):
    """A number of one dimension, within bounds given in the program's unit (angles in rad)."""

    def __init__(
        self,
        dimension: Dimension,
        *,
        above: float | None = None,
        at_least: float | None = None,
        below: float | None = None,
        at_most: float | None = None,
    ) -> None:
        self.dimension = dimension
        self.above, self.at_least = above, at_least
        self.below, self.at_most = below, at_most

    def value(self, node: Scalar, reader: Reader) -> float | None:
        """Read the number and hold it against the bounds."""
        try:
            number = parse(node.text, self.dimension)
        except QuantityError as error:
            expected = self.text()
            reader.complain(node, error.message, expected=expected, remedy=self._remedy(error))
            return None
        wrong = self._beyond(number)
        if wrong:
            reader.complain(
                node,
                f"{quote(node.text)} is too {wrong}",
                expected=self.text(),
                remedy=f"write a value within the bounds, such as {self.example()}",
            )
            return None
        return number

    def _remedy(self, error: QuantityError) -> str:
        return error.remedy.replace(
            f"such as '{self.dimension.examples[0]}'", f"such as {self.example()}"
        )

    def _beyond(self, number: float) -> str:
        """Say on which side of the bounds a number lies; empty if it lies within."""
        if (self.above is not None and number <= self.above) or (
            self.at_least is not None and number < self.at_least
        ):
            return "small"
        if (self.below is not None and number >= self.below) or (
            self.at_most is not None and number > self.at_most
        ):
            return "large"
        return ""

    def bounds(self) -> str:
        """Say the bounds: `` above 0 mm and of at most 5 mm``; empty without any."""
        pairs = (
            ("above", self.above),
            ("of at least", self.at_least),
            ("below", self.below),
            ("of at most", self.at_most),
        )
        said = [f"{w} {show(v, self.dimension)}" for w, v in pairs if v is not None]
        return f" {' and '.join(said)}" if said else ""

    def text(self) -> str:
        """Name dimension, bounds and units."""
        return describe_dimension(self.dimension, self.bounds())

    def example(self) -> str:
        """Return a value within the bounds."""
        for text in self.dimension.examples:
            if not self._beyond(parse(text, self.dimension)):
                return f"'{text}'"
        return f"'{show(self._inside(), self.dimension)}'"

    def _inside(self) -> float:
        low = self.above if self.above is not None else self.at_least
        high = self.below if self.below is not None else self.at_most
        if low is None:
            return (high or 0.0) - abs(high or 0.0) / 2
        return low + abs(low) / 2 if high is None else (low + high) / 2

    def schema(self) -> dict[str, Any]:
        """Allow text always, and numbers where one may stand without unit."""
        if self.dimension.bare is None:
            return {"type": "string"}
        numbers: dict[str, Any] = {"type": "number"}
        names = (
            ("exclusiveMinimum", self.above),
            ("minimum", self.at_least),
            ("exclusiveMaximum", self.below),
            ("maximum", self.at_most),
        )
        for name, bound in names:
            if bound is not None:
                angle = self.dimension is Dimension.ANGLE
                numbers[name] = math.degrees(bound) if angle else bound
        return {"anyOf": [numbers, {"type": "string"}]}

    def show(self, value: object) -> str:
        """Write the value with its unit."""
        if isinstance(value, (int, float)):
            return show(value, self.dimension)
        return show_plainly(value)


class Whole(Single[int]):
    """A whole number from `low` to `high`, both included."""

    _PATTERN = re.compile(r"[+-]?[0-9]{1,9}")

    def __init__(self, low: int, high: int) -> None:
        self.low, self.high = low, high

    def value(self, node: Scalar, reader: Reader) -> int | None:
        """Read the number and hold it against the bounds."""
        text = node.text.strip()
        if self._PATTERN.fullmatch(text) and self.low <= int(text) <= self.high:
            return int(text)
        wrong = "out of range" if self._PATTERN.fullmatch(text) else "not a whole number"
        reader.complain(
            node,
            f"{quote(node.text)} is {wrong}",
            expected=self.text(),
            remedy=f"write {self.text()}, such as {self.example()}",
        )
        return None

    def text(self) -> str:
        """Name the bounds."""
        return f"a whole number from {self.low} to {self.high}"

    def example(self) -> str:
        """Return the lowest, or 1 where it lies within."""
        return f"'{1 if self.low <= 1 <= self.high else self.low}'"

    def schema(self) -> dict[str, Any]:
        """Give the bounds."""
        return {"type": "integer", "minimum": self.low, "maximum": self.high}


class Words(Single[T]):
    """Certain words, each standing for a value."""

    def __init__(self, values: AbstractMapping[str, T]) -> None:
        self.values = dict(values)

    def value(self, node: Scalar, reader: Reader) -> T | None:
        """Look the word up."""
        if node.text in self.values:
            return self.values[node.text]
        guess = nearest(node.text, self.values)
        reader.complain(
            node,
            f"{quote(node.text)} is not known here",
            expected=self.text(),
            remedy=f"write '{guess}'" if guess else f"write {self.text()}",
        )
        return None

    def text(self) -> str:
        """List the words."""
        listed = format_choices(self.values)
        return listed if len(self.values) == 1 else f"one of {listed}"

    def example(self) -> str:
        """Return the first word."""
        return f"'{next(iter(self.values))}'"

    def takes(self, node: Node) -> bool:
        """Take text."""
        return isinstance(node, Scalar)

    def schema(self) -> dict[str, Any]:
        """List the words."""
        return {"enum": list(self.values)}

    def show(self, value: object) -> str:
        """Write the word that stands for the value."""
        same = (word for word, v in self.values.items() if v is value or v == value)
        return next(same, show_plainly(value))


class Choice(Words[str]):
    """One of several words, kept as text."""

    def __init__(self, *words: str) -> None:
        super().__init__({word: word for word in words})


class ChoiceOf(Words[E], Generic[E]):
    """A member of an enum whose values are the words."""

    def __init__(self, members: type[E]) -> None:
        super().__init__({str(member.value): member for member in members})


class YesNo(Words[bool]):
    """Yes or no, also as true or false, on or off, in any case of letters."""

    def __init__(self) -> None:
        super().__init__({"yes": True, "no": False})

    _ALSO: ClassVar[dict[str, bool]] = {"true": True, "false": False, "on": True, "off": False}

    def value(self, node: Scalar, reader: Reader) -> bool | None:
        """Look the word up, whatever its case."""
        word = node.text.lower()
        if word in self._ALSO:
            return self._ALSO[word]
        return super().value(Scalar(word, node.span, node.quoted), reader)

    def text(self) -> str:
        """Name the two words."""
        return "'yes' or 'no'"

    def schema(self) -> dict[str, Any]:
        """Allow what editors make of the words."""
        return {"enum": [True, False, "yes", "no", "on", "off"]}
