"""One key of a record: how it is written, its default, its meaning."""

from __future__ import annotations

from collections.abc import Mapping as AbstractMapping
from typing import Any, ClassVar, Final, Protocol

from benchlay.document.form import Form


class Required:
    """The class of `REQUIRED`: there is no default, the key must be written."""

    def __repr__(self) -> str:
        return "REQUIRED"


REQUIRED: Final = Required()


class Key:
    """One key of a record; made by `key`."""

    __slots__ = (
        "attribute",
        "default",
        "form",
        "meaning",
        "name",
        "not_yet",
        "not_yet_is_note",
    )

    def __init__(
        self,
        form: Form[Any],
        *,
        default: object,
        name: str | None,
        meaning: str,
        not_yet: str | None,
        not_yet_is_note: bool,
    ) -> None:
        self.form = form
        self.default = default
        self.name = name or ""
        self.meaning = meaning
        self.not_yet = not_yet
        self.not_yet_is_note = not_yet_is_note
        self.attribute = ""

    def __set_name__(self, owner: type, attribute: str) -> None:
        self.attribute = attribute
        self.name = self.name or attribute

    @property
    def required(self) -> bool:
        """Whether the key must be written."""
        return self.default is REQUIRED


def key(
    form: Form[Any],
    *,
    default: Any = REQUIRED,  # noqa: ANN401 - as the attribute's own annotation says
    name: str | None = None,
    meaning: str,
    not_yet: str | None = None,
    not_yet_is_note: bool = False,
) -> Any:  # noqa: ANN401 - stands for a value of the attribute's own type
    """Declare a key of a record.

    Parameters
    ----------
    form : Form
        How the value is written.
    default
        The value where the key is not written; without one it must be.
    name : str, optional
        The key as written in the file; the attribute's name where not given.
    meaning : str
        One sentence for the reference.
    not_yet : str, optional
        Why the key is not acted on yet; writing anything but the default is then an error,
        or with `not_yet_is_note` a note in the reader.
    """
    return Key(
        form,
        default=default,
        name=name,
        meaning=meaning,
        not_yet=not_yet,
        not_yet_is_note=not_yet_is_note,
    )


class Keyed(Protocol):
    """A class that says its keys, by attribute, in the order of the reference."""

    KEYS: ClassVar[AbstractMapping[str, Key]]
