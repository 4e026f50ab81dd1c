"""Objects read from tables of keys: one definition makes reader, schema and reference.

A class names its keys once, as attributes. From them come the constructor, reading with
all problems reported together, the JSON Schema and the page of the reference.
"""

from __future__ import annotations

from collections.abc import Collection
from collections.abc import Mapping as AbstractMapping
from typing import Any, ClassVar, NoReturn, Self, TypeVar, dataclass_transform

from benchlay.document.form import Failed, Form, Reader, show_plainly
from benchlay.document.keys import REQUIRED, Key, key
from benchlay.document.nodes import Mapping, Node, Scalar
from benchlay.document.span import NOWHERE, Span
from benchlay.document.words import format_choices, nearest, quote

__all__ = ["REQUIRED", "Key", "Record", "RecordForm", "key", "read_record"]


@dataclass_transform(kw_only_default=True, frozen_default=True, field_specifiers=(key,))
class _Transformed:
    """Carries the decorator: attributes of the decorated class itself would not count."""


class Record(_Transformed):
    """Base of all objects read from tables of keys; cannot be changed once made.

    Equality looks at the keys' values only: where and whether they were written makes no
    difference to what is meant.

    Attributes
    ----------
    span : Span
        Where the table starts.
    spans : mapping of str to Span
        By key as written in the file, where its value stands; only keys that were written.
    """

    span: Span = NOWHERE
    spans: AbstractMapping[str, Span] = {}

    KEYS: ClassVar[AbstractMapping[str, Key]] = {}
    """By attribute, in the order of the reference: the bases' first."""

    def __init_subclass__(cls) -> None:
        """Collect the keys of the class and its bases."""
        keys: dict[str, Key] = {}
        for base in reversed(cls.__mro__):
            for attribute, value in vars(base).items():
                if isinstance(value, Key):
                    keys[attribute] = value
        names = [k.name for k in keys.values()]
        if len(set(names)) != len(names):
            msg = f"{cls.__name__} has two keys of one name"
            raise TypeError(msg)
        cls.KEYS = keys

    def __init__(self, **values: Any) -> None:  # noqa: ANN401 - typed by dataclass_transform
        own = self.__dict__
        own["span"] = values.pop("span", NOWHERE)
        own["spans"] = values.pop("spans", {})
        for attribute, spec in self.KEYS.items():
            value = values.pop(attribute, spec.default)
            if value is REQUIRED:
                msg = f"{type(self).__name__} needs {attribute!r}"
                raise TypeError(msg)
            own[attribute] = value
        if values:
            msg = f"{type(self).__name__} has no {next(iter(values))!r}"
            raise TypeError(msg)

    def __setattr__(self, name: str, value: object) -> NoReturn:
        """Refuse: records are shared between stages."""
        msg = f"{type(self).__name__} cannot be changed; use replace({name}=…)"
        raise AttributeError(msg)

    def __delattr__(self, name: str) -> NoReturn:
        """Refuse: records are shared between stages."""
        msg = f"{type(self).__name__} cannot be changed"
        raise AttributeError(msg)

    def written(self, name: str) -> bool:
        """Tell whether the key was written in the file."""
        return name in self.spans

    def span_of(self, name: str) -> Span:
        """Return where the key's value is written; the table's place if it is not."""
        return self.spans.get(name, self.span)

    def replace(self, **changes: Any) -> Self:  # noqa: ANN401 - as the attributes are
        """Return a copy with some attributes changed."""
        same = {name: self.__dict__[name] for name in ("span", "spans", *self.KEYS)}
        return type(self)(**(same | changes))

    def after_read(self, reader: Reader) -> None:
        """Add the problems that only several keys together can have; none by default."""

    def _values(self) -> tuple[Any, ...]:
        return tuple(self.__dict__[name] for name in self.KEYS)

    def __eq__(self, other: object) -> bool:
        if self is other:
            return True
        if not isinstance(other, Record) or type(other) is not type(self):
            return NotImplemented
        return self._values() == other._values()

    def __hash__(self) -> int:
        return hash((type(self), self._values()))

    def __repr__(self) -> str:
        shown = ", ".join(f"{n}={self.__dict__[n]!r}" for n in self.KEYS)
        return f"{type(self).__name__}({shown})"


R = TypeVar("R", bound=Record)


def read_record(
    cls: type[R],
    node: Node,
    reader: Reader,
    *,
    extra: Collection[str] = (),
    ignore: Collection[str] = (),
) -> R | None:
    """Read a record from a table of keys, reporting all that is wrong with it together.

    Parameters
    ----------
    cls : type of Record
        Says the keys.
    node : Node
        The table.
    reader : Reader
        Receives the problems.
    extra : collection of str
        Keys that someone else reads; listed among the known ones.
    ignore : collection of str
        Keys to pass over in silence; a key of `cls` among them keeps its default.

    Returns
    -------
    Record or None
        None after problems.
    """
    if not isinstance(node, Mapping):
        _refuse_shape(cls, node, reader)
        return None
    before = reader.failures
    by_name = {k.name: k for k in cls.KEYS.values() if k.name not in ignore}
    values: dict[str, Any] = {}
    for name, item in node.pairs:
        spec = by_name.get(name.text)
        if spec is not None:
            value = _read_key(spec, item, reader)
            if not isinstance(value, Failed):
                values[spec.attribute] = value
        elif name.text not in extra and name.text not in ignore:
            _refuse_key(name, [*by_name, *extra], reader)
    _complain_missing(by_name.values(), node, reader)
    if reader.failures > before:
        return None
    spans = {name.text: item.span for name, item in node.pairs}
    record = cls(span=node.span, spans=spans, **values)
    record.after_read(reader)
    return record if reader.failures == before else None


def _read_key(spec: Key, item: Node, reader: Reader) -> Any:  # noqa: ANN401 - whatever the form reads
    value = reader.attempt(spec.form, item, spec.name)
    if spec.not_yet is None or isinstance(value, Failed) or value == spec.default:
        return value
    what = f"not yet: {spec.not_yet}"
    reader.path.append(spec.name)
    if spec.not_yet_is_note or reader.not_yet_is_note:
        reader.not_yet.append((item.span, reader.named(what)))
    else:
        reader.complain(
            item,
            what,
            expected=f"a layout without {quote(spec.name)} here",
            remedy=f"remove {quote(spec.name)}",
        )
    reader.path.pop()
    return value


def _refuse_shape(cls: type[Record], node: Node, reader: Reader) -> None:
    form: Form[Any] = RecordForm(cls)
    reader.refuse(node, form)


def _refuse_key(name: Scalar, known: list[str], reader: Reader) -> None:
    problems = reader.problems
    guess = None if problems.full else nearest(name.text, known)
    reader.complain(
        name,
        f"{quote(name.text)} is not a key here",
        expected=f"the keys {format_choices(known)}" if known else "no keys",
        remedy=f"write '{guess}', or remove the key" if guess else "remove the key",
    )


def _complain_missing(specs: Collection[Key], node: Mapping, reader: Reader) -> None:
    there = set(node.names())
    for spec in specs:
        if spec.required and spec.name not in there:
            example = spec.form.example().replace("'", "")
            reader.complain(
                node,
                f"{quote(spec.name)} is missing",
                expected=f"{quote(spec.name)} with {spec.form.text()}",
                remedy=f"add '{spec.name}: {example}', with the value that is meant",
            )


class RecordForm(Form[R]):
    """A table of the keys of a record class."""

    def __init__(self, cls: type[R], *, extra: Collection[str] = ()) -> None:
        self.cls = cls
        self.extra = extra

    def read(self, node: Node, reader: Reader) -> R | None:
        """Read the record."""
        return read_record(self.cls, node, reader, extra=self.extra)

    def takes(self, node: Node) -> bool:
        """Take tables."""
        return isinstance(node, Mapping)

    def kinship(self, node: Mapping) -> int:
        """Count the keys that are the record's."""
        known = {spec.name for spec in self.cls.KEYS.values()}
        return sum(name in known for name in node.names())

    def text(self) -> str:
        """List the keys."""
        names = [k.name for k in self.cls.KEYS.values()]
        keys = "key" if len(names) == 1 else "keys"
        return f"a table with the {keys} {format_choices(names, 'and')}"

    def example(self) -> str:
        """Give what is required, or the first key."""
        keys = list(self.cls.KEYS.values())
        shown = [k for k in keys if k.required] or keys[:1]
        inner = (f"{k.name}: {k.form.example()}".replace("'", "") for k in shown)
        return "{" + ", ".join(inner) + "}"

    def show(self, value: object) -> str:
        """Say that a default record is what its own keys' defaults make it."""
        return "as its keys" if isinstance(value, Record) else show_plainly(value)

    def schema(self) -> dict[str, Any]:
        """Give the schema of the record."""
        from benchlay.document.describe import schema_of

        return schema_of(self.cls, extra=self.extra)
