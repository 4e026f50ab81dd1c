"""Forms made of other forms: lists and tables of names."""

from __future__ import annotations

from collections.abc import Iterator
from collections.abc import Mapping as AbstractMapping
from typing import Any, Generic, TypeVar

from benchlay.document.form import Failed, Form, Reader, show_plainly
from benchlay.document.nodes import Mapping, Node, Scalar, Sequence
from benchlay.document.span import Span
from benchlay.document.texts import Name
from benchlay.document.words import format_choices, quote

T = TypeVar("T")
_MANY = 1_000


class Listed(Form[tuple[T, ...]]):
    """What all lists share: every item is read, and every problem reported."""

    form: Form[T]

    def items(self, node: Sequence, reader: Reader) -> tuple[T, ...] | None:
        """Read the items; None if one of them failed."""
        values: list[T] = []
        for k, item in enumerate(node.items, start=1):
            value = reader.attempt(self.form, item, f"[{k}]")
            if not isinstance(value, Failed):
                values.append(value)
        return tuple(values) if len(values) == len(node.items) else None

    def takes(self, node: Node) -> bool:
        """Take lists."""
        return isinstance(node, Sequence)

    def show(self, value: object) -> str:
        """Write the items in brackets."""
        if isinstance(value, tuple):
            return f"[{', '.join(self.form.show(item) for item in value)}]"
        return show_plainly(value)


class Fixed(Listed[T]):
    """A list of exactly `n` items."""

    def __init__(self, form: Form[T], n: int) -> None:
        self.form = form
        self.n = n

    def read(self, node: Node, reader: Reader) -> tuple[T, ...] | None:
        """Read a list of the right length."""
        if not isinstance(node, Sequence) or len(node) != self.n:
            reader.refuse(node, self)
            return None
        return self.items(node, reader)

    def text(self) -> str:
        """Say how many of what."""
        return f"a list of {self.n}, each {self.form.text()}"

    def example(self) -> str:
        """Repeat the item's example."""
        return f"[{', '.join([self.form.example()] * self.n)}]".replace("'", "")

    def schema(self) -> dict[str, Any]:
        """Fix the number of items."""
        return {
            "type": "array",
            "items": self.form.schema(),
            "minItems": self.n,
            "maxItems": self.n,
        }


class Pair(Form[tuple[T, T]]):
    """A list of two."""

    def __init__(self, form: Form[T]) -> None:
        self._fixed = Fixed(form, 2)

    def read(self, node: Node, reader: Reader) -> tuple[T, T] | None:
        """Read both."""
        values = self._fixed.read(node, reader)
        return None if values is None else (values[0], values[1])

    def text(self) -> str:
        """Say two of what."""
        return self._fixed.text()

    def example(self) -> str:
        """Give two."""
        return self._fixed.example()

    def takes(self, node: Node) -> bool:
        """Take lists."""
        return self._fixed.takes(node)

    def schema(self) -> dict[str, Any]:
        """Fix two items."""
        return self._fixed.schema()

    def show(self, value: object) -> str:
        """Write both in brackets."""
        return self._fixed.show(value)


class ListOf(Listed[T]):
    """A list of `min` to `max` items."""

    def __init__(self, form: Form[T], min: int = 0, max: int = _MANY) -> None:
        self.form = form
        self.min, self.max = min, max

    def read(self, node: Node, reader: Reader) -> tuple[T, ...] | None:
        """Read a list of a length allowed."""
        if not isinstance(node, Sequence) or not self.min <= len(node) <= self.max:
            reader.refuse(node, self)
            return None
        return self.items(node, reader)

    def text(self) -> str:
        """Say how many of what."""
        many = ""
        if self.max != _MANY:
            many = f" of {self.min} to {self.max}"
        elif self.min:
            many = f" of at least {self.min}"
        return f"a list{many}, each item {self.form.text()}"

    def example(self) -> str:
        """Repeat the item's example as often as needed."""
        times = max(self.min, 1)
        return f"[{', '.join([self.form.example()] * times)}]".replace("'", "")

    def schema(self) -> dict[str, Any]:
        """Bound the number of items."""
        return {
            "type": "array",
            "items": self.form.schema(),
            "minItems": self.min,
            "maxItems": self.max,
        }


class Entries(AbstractMapping[str, T], Generic[T]):
    """Values by name, in the order of the file; cannot be changed.

    Attributes
    ----------
    spans : dict of str to Span
        Where each name is written.
    """

    __slots__ = ("_values", "spans")

    def __init__(
        self,
        values: AbstractMapping[str, T] | None = None,
        spans: AbstractMapping[str, Span] | None = None,
    ) -> None:
        self._values = dict(values or {})
        self.spans = dict(spans or {})

    def __getitem__(self, name: str) -> T:
        return self._values[name]

    def __iter__(self) -> Iterator[str]:
        return iter(self._values)

    def __len__(self) -> int:
        return len(self._values)

    def __hash__(self) -> int:
        return hash(tuple(self._values.items()))

    def __repr__(self) -> str:
        return f"Entries({self._values!r})"


class Table(Form[Entries[T]]):
    """Values by names the user gives, unique without regard to case."""

    def __init__(self, form: Form[T], name: Form[str] | None = None) -> None:
        self.form = form
        self.name: Form[str] = Name() if name is None else name

    def read(self, node: Node, reader: Reader) -> Entries[T] | None:
        """Read all names and all values."""
        if not isinstance(node, Mapping):
            reader.refuse(node, self)
            return None
        values: dict[str, T] = {}
        spans: dict[str, Span] = {}
        folded: dict[str, Scalar] = {}
        for key, item in node.pairs:
            name = self.name.read(key, reader)
            value = reader.attempt(self.form, item, key.text)
            if name is None or not self._unique(key, folded, reader):
                continue
            if not isinstance(value, Failed):
                values[name] = value
                spans[name] = key.span
        return Entries(values, spans) if len(values) == len(node) else None

    @staticmethod
    def _unique(key: Scalar, folded: dict[str, Scalar], reader: Reader) -> bool:
        first = folded.setdefault(key.text.casefold(), key)
        if first is key:
            return True
        line, column = first.span.line, first.span.column
        reader.complain(
            key,
            f"{quote(key.text)} differs from {quote(first.text)} only in capitals; "
            f"that one stands in line {line}, column {column}",
            expected="names that differ in more than capitals",
            remedy=f"give one of the two another name, such as '{key.text}-2'",
        )
        return False

    def text(self) -> str:
        """Say that names are given, and to what."""
        return f"a table of names, each with {self.form.text()}"

    def example(self) -> str:
        """Give one entry."""
        return "{NAME: " + self.form.example().replace("'", "") + "}"

    def takes(self, node: Node) -> bool:
        """Take tables."""
        return isinstance(node, Mapping)

    def show(self, value: object) -> str:
        """Write an empty table as none."""
        if isinstance(value, Entries):
            return format_choices(value, "and") if value else "none"
        return show_plainly(value)

    def schema(self) -> dict[str, Any]:
        """Bound names by their pattern."""
        return {
            "type": "object",
            "propertyNames": self.name.schema(),
            "additionalProperties": self.form.schema(),
        }
