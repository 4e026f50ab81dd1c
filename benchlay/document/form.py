"""What a form is, and the reader it reports to."""

from __future__ import annotations

from typing import Any, Final, Protocol, TypeVar

from benchlay.document.nodes import Broken, Mapping, Node, Scalar, describe
from benchlay.document.problems import Problems
from benchlay.document.span import Span

T = TypeVar("T")
T_co = TypeVar("T_co", covariant=True)


class Failed:
    """The class of `FAILED`, which no value can be mistaken for."""


FAILED: Final = Failed()


class Reader:
    """Goes along while nodes are read: collects problems and knows the way to the node.

    Parameters
    ----------
    problems : Problems
        Receives all that is wrong.
    not_yet_is_note : bool
        Whether keys that are known but not acted on yet are noted in `not_yet` instead of
        being problems.

    Attributes
    ----------
    path : list of str
        The keys from the document to the node in hand; begins every message.
    not_yet : list of (Span, str)
        Keys that were written and are not acted on.
    """

    def __init__(self, problems: Problems, *, not_yet_is_note: bool = False) -> None:
        self.problems = problems
        self.path: list[str] = []
        self.not_yet: list[tuple[Span, str]] = []
        self.not_yet_is_note = not_yet_is_note
        self._silent = 0

    @property
    def failures(self) -> int:
        """Count what went wrong so far, also what had been reported before."""
        return len(self.problems) + self._silent

    def complain(self, where: Node | Span, what: str, *, expected: str, remedy: str) -> None:
        """Add a problem, named by the path of keys; `where` is a node or a place."""
        span = where if isinstance(where, Span) else where.span
        self.problems.add(span, self.named(what), expected=expected, remedy=remedy)

    def named(self, what: str) -> str:
        """Put the path of keys before a message."""
        return f"{self.where}: {what}" if self.path else what

    @property
    def where(self) -> str:
        """The path of keys, as it is written in states: ``elements.M1.thickness``."""
        return ".".join(self.path).replace(".[", "[")

    def refuse(self, node: Node, form: Form[Any]) -> None:
        """Say that a node has not the form wanted; what is broken was reported before."""
        if isinstance(node, Broken):
            self._silent += 1
            return
        if isinstance(node, Scalar) and not node.text.strip():
            what = "nothing is written"
        else:
            what = f"{describe(node)} is not what is read here"
        self.complain(
            node,
            what,
            expected=form.text(),
            remedy=f"write it in that form, such as {form.example()}",
        )

    def attempt(self, form: Form[T], node: Node, name: str) -> T | Failed:
        """Read a node one step down the path; `FAILED` after problems.

        A form may give None as a value: what tells failure is a problem, not the value.
        """
        before = self.failures
        self.path.append(name)
        value = form.read(node, self)
        self.path.pop()
        if value is None and self.failures > before:
            return FAILED
        return value  # type: ignore[return-value]  # None without a problem is a T


class Form(Protocol[T_co]):
    """How a value is written: reading, schema, and words for messages and reference.

    Own forms derive from this class and define the first three methods.
    """

    def read(self, node: Node, reader: Reader) -> T_co | None:
        """Return the value, or None after having added problems to the reader."""
        ...

    def schema(self) -> dict[str, Any]:
        """Return the JSON Schema (draft 2020-12) of what may be written."""
        ...

    def text(self) -> str:
        """Say what is expected, to follow 'expected:' or 'write'."""
        ...

    def example(self) -> str:
        """Return one thing that may be written, in YAML."""
        return "a value"

    def takes(self, node: Node) -> bool:
        """Tell whether the node has a shape this form reads; `OneOf` chooses by it."""
        return True

    def kinship(self, node: Mapping) -> int:
        """Count how many keys of a table this form knows; `OneOf` tells forms by it."""
        return 0

    def show(self, value: object) -> str:
        """Write a value as a user would, for the reference's defaults."""
        return show_plainly(value)


def show_plainly(value: object) -> str:
    """Write common values as a user would."""
    if value is None:
        return "none"
    if isinstance(value, bool):
        return "yes" if value else "no"
    if isinstance(value, float):
        return f"{value:.6g}"
    if isinstance(value, (tuple, list)):
        return f"[{', '.join(show_plainly(v) for v in value)}]"
    return str(value)
