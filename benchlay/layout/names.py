"""Which names a document defines, taken from its nodes, so that mistakes elsewhere hide none."""

from __future__ import annotations

from collections.abc import Callable, Iterable
from typing import TypeVar

from benchlay.document.form import Form, Reader
from benchlay.document.nodes import Mapping, Node, Scalar
from benchlay.document.span import Span
from benchlay.document.texts import Deferred, Name
from benchlay.document.words import format_choices, nearest, quote
from benchlay.named import NamedTuple

T = TypeVar("T")
AS_DRAWN = "as drawn"


class Names(NamedTuple):
    """Names by what they stand for, in the order of the file."""

    sources: tuple[str, ...]
    elements: tuple[str, ...]
    routes: tuple[str, ...]
    materials: tuple[str, ...]
    panels: dict[str, tuple[str, ...]]  # with the names of their openings
    lids: tuple[str, ...]

    @property
    def things(self) -> tuple[str, ...]:
        """What stands on the bench: sources and elements share one set of names."""
        return self.sources + self.elements


def names_in(root: Node) -> Names:
    """Collect the names that a document defines."""
    enclosure = _value(root, "enclosure")
    panels = _value(enclosure, "panels")
    return Names(
        keys_of(_value(root, "sources")),
        keys_of(_value(root, "elements")),
        keys_of(_value(root, "routes")),
        keys_of(_value(root, "materials")),
        {name: keys_of(_value(_value(panels, name), "openings")) for name in keys_of(panels)},
        keys_of(_value(enclosure, "lids")),
    )


def keys_of(node: Node | None) -> tuple[str, ...]:
    """Return the keys of a table, none of anything else."""
    return tuple(node.names()) if isinstance(node, Mapping) else ()


def _value(node: Node | None, name: str) -> Node | None:
    return node.get(name) if isinstance(node, Mapping) else None


class Later(Deferred):
    """Entries that are read one by one: their form in words only."""

    def __init__(self, text: str, sample: str) -> None:
        super().__init__(text)
        self.sample = sample

    def example(self) -> str:
        """Return the sample."""
        return self.sample


def a(noun: str) -> str:
    """Put the article before a noun.

    >>> a("element")
    'an element'
    """
    return f"an {noun}" if noun[0] in "aeiou" else f"a {noun}"


def unknown(name: str, where: Span, what: str, known: Iterable[str], reader: Reader) -> None:
    """Say that a name refers to nothing, and which one comes nearest."""
    choices = list(known)
    guess = nearest(name, choices)
    listed = format_choices(choices) if choices else "there is none in this layout"
    reader.complain(
        where,
        f"there is no {what} named {quote(name)}",
        expected=f"the name of {a(what)}: {listed}",
        remedy=f"write '{guess}'" if guess else f"correct the name, or add the {what}",
    )


_NAME = Name()


def claim(name: Scalar, taken: dict[str, Scalar], reader: Reader) -> bool:
    """Take a name, unless it is none or, without regard to case, taken already."""
    if _NAME.read(name, reader) is None:
        return False
    first = taken.setdefault(name.text.casefold(), name)
    if first is name:
        return True
    same = first.text == name.text
    reader.complain(
        name,
        f"{quote(name.text)} is used already in line {first.span.line}"
        if same
        else f"{quote(name.text)} differs only in capitals from {quote(first.text)} "
        f"in line {first.span.line}",
        expected="names that differ in more than capitals; sources and elements share one set",
        remedy=f"give one of the two another name, such as '{name.text}-2'",
    )
    return False


def read_entries(
    node: Node | None,
    section: str,
    form: Form[object],
    read: Callable[[Scalar, Node, Reader], T | None],
    reader: Reader,
    *,
    taken: dict[str, Scalar],
) -> dict[str, T]:
    """Read a section entry by entry; what could be read is returned, whatever else is wrong."""
    found: dict[str, T] = {}
    if node is None:
        return found
    reader.path.append(section)
    if not isinstance(node, Mapping):
        reader.refuse(node, form)
    for name, item in node.pairs if isinstance(node, Mapping) else ():
        good = claim(name, taken, reader)
        reader.path.append(name.text)
        value = read(name, item, reader)
        reader.path.pop()
        if good and value is not None:
            found[name.text] = value
    reader.path.pop()
    return found
