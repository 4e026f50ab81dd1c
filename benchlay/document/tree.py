"""Nodes of a document: text, lists and tables of keys, each with its place.

Scalars stay text. YAML's own guesses (`1:5` a number in base sixty, `no` a truth value) are
never made; what a text means is decided by the key that reads it.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator
from typing import TypeAlias

from benchlay.document.span import Span
from benchlay.document.words import format_choices, quote


class Scalar:
    """A piece of text; `quoted` tells whether it stood in quotes or in a block."""

    __slots__ = ("quoted", "span", "text")

    def __init__(self, text: str, span: Span, quoted: bool = False) -> None:
        self.text = text
        self.span = span
        self.quoted = quoted

    def __repr__(self) -> str:
        """Show text and place."""
        return f"Scalar({self.text!r}, {self.span})"


class Sequence:
    """A list of nodes."""

    __slots__ = ("items", "span")

    def __init__(self, items: Iterable[Node], span: Span) -> None:
        self.items: tuple[Node, ...] = tuple(items)
        self.span = span

    def __len__(self) -> int:
        """Count the items."""
        return len(self.items)

    def __repr__(self) -> str:
        """Show items and place."""
        return f"Sequence({list(self.items)!r}, {self.span})"


class Mapping:
    """A table of keys, in the order of the file; no key appears twice."""

    __slots__ = ("pairs", "span")

    def __init__(self, pairs: Iterable[tuple[Scalar, Node]], span: Span) -> None:
        self.pairs: tuple[tuple[Scalar, Node], ...] = tuple(pairs)
        self.span = span

    def __len__(self) -> int:
        """Count the keys."""
        return len(self.pairs)

    def __repr__(self) -> str:
        """Show keys, values and place."""
        return f"Mapping({list(self.pairs)!r}, {self.span})"

    def get(self, name: str) -> Node | None:
        """Return the value under `name`, or None."""
        return next((value for key, value in self.pairs if key.text == name), None)

    def span_of_key(self, name: str) -> Span | None:
        """Return where the key `name` itself is written, or None."""
        return next((key.span for key, _ in self.pairs if key.text == name), None)

    def names(self) -> Iterator[str]:
        """Give the keys in the order of the file."""
        return (key.text for key, _ in self.pairs)


class Broken:
    """Stands where something unreadable was written, which is reported already."""

    __slots__ = ("span",)

    def __init__(self, span: Span) -> None:
        self.span = span

    def __repr__(self) -> str:
        """Show the place."""
        return f"Broken({self.span})"


Node: TypeAlias = Scalar | Sequence | Mapping | Broken


class PathError(LookupError):
    """A path leads through something that has no keys.

    Attributes
    ----------
    depth : int
        How many parts of the path could be followed.
    node : Node
        What stands there instead of a table.
    """

    def __init__(self, depth: int, node: Node) -> None:
        super().__init__(f"part {depth} of the path is no table of keys")
        self.depth = depth
        self.node = node


def replace_at(node: Node, path: tuple[str, ...], new: Node) -> Node:
    """Return a copy of `node` with `new` at `path`; all else is shared with the original.

    Parameters
    ----------
    node : Node
        Left as it is.
    path : tuple of str
        Keys from the outside in; empty gives `new` itself. Tables that are missing on the
        way are made, at the place of `new`.
    new : Node
        The value to put there, replacing what is there.

    Raises
    ------
    PathError
        If the path leads through a scalar or a list.
    """
    return _replace(node, path, new, 0)


def _replace(node: Node, path: tuple[str, ...], new: Node, depth: int) -> Node:
    if depth == len(path):
        return new
    if not isinstance(node, Mapping):
        raise PathError(depth, node)
    name = path[depth]
    pairs = list(node.pairs)
    for k, (key, value) in enumerate(pairs):
        if key.text == name:
            pairs[k] = (key, _replace(value, path, new, depth + 1))
            break
    else:
        below = _replace(Mapping((), new.span), path, new, depth + 1)
        pairs.append((Scalar(name, new.span), below))
    return Mapping(pairs, node.span)


def describe(node: Node) -> str:
    """Say what is written there, for messages."""
    if isinstance(node, Scalar):
        return quote(node.text) if node.text or node.quoted else "nothing"
    if isinstance(node, Sequence):
        return f"a list of {len(node)}"
    if isinstance(node, Mapping):
        if not node.pairs:
            return "an empty table"
        return f"a table with {format_choices(node.names(), 'and')}"
    return "something unreadable"
