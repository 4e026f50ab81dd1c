"""States: keys that a layout sets otherwise, and the items read again with them."""

from __future__ import annotations

from benchlay.document.form import Form, Reader
from benchlay.document.forms import Table
from benchlay.document.nodes import Mapping, Node, PathError, Scalar, replace_at
from benchlay.document.span import Span
from benchlay.document.words import format_choices, nearest, quote
from benchlay.layout.names import AS_DRAWN, Later, Names, claim, unknown
from benchlay.named import NamedTuple

ROOTS = ("sources", "elements", "enclosure", "limits")
_SHEETS = ("panels", "lids")
_FIXED = ("kind", "after", "part")
# Keys that stand in for one another: a state that sets one takes the others' place. A state
# has no way to take a key away, so without this none of them could be set in a state.
_INSTEAD = (
    ("turn", "aim", "incidence", "facing", "heading"),
    ("at", "hole", "in", "distance"),
    ("diameter", "size"),
    ("power", "pulse"),
)
_KEYS = Later("a table of key paths and the values they take", "{elements.M1.out: yes}")
STATES: Form[object] = Table(_KEYS)

Item = tuple[str, ...]
"""The path to what is read again as a whole: ``("elements", "M1")``, ``("limits",)``."""


class Override(NamedTuple):
    """One key that a state sets."""

    path: tuple[str, ...]
    value: Node
    span: Span


class State(NamedTuple):
    """A state by name."""

    name: str
    overrides: tuple[Override, ...]
    span: Span

    def keys_of(self, item: Item) -> frozenset[str]:
        """Return the first keys below an item that the state sets."""
        depth = len(item)
        return frozenset(o.path[depth] for o in self.overrides if o.path[:depth] == item)

    def items(self) -> tuple[Item, ...]:
        """Return the items that the state changes, in the order of the file."""
        return tuple(dict.fromkeys(item_of(o.path) for o in self.overrides))


def item_of(path: tuple[str, ...]) -> Item:
    """Return the path of the item that a key path leads into."""
    depth = {"limits": 1, "enclosure": 3}.get(path[0], 2)
    return path[:depth]


def read_states(node: Node | None, names: Names, reader: Reader) -> dict[str, State]:
    """Read the section `states`; the keys' values are read later, with their items."""
    found: dict[str, State] = {}
    if node is None:
        return found
    reader.path = ["states"]
    if not isinstance(node, Mapping):
        reader.refuse(node, STATES)
    taken: dict[str, Scalar] = {}
    for name, item in node.pairs if isinstance(node, Mapping) else ():
        reader.path = ["states"]
        if name.text.casefold() == AS_DRAWN:
            _refuse_as_drawn(name, reader)
        elif claim(name, taken, reader):
            reader.path = ["states", name.text]
            found[name.text] = State(name.text, _overrides(item, names, reader), name.span)
    reader.path = []
    return found


def _refuse_as_drawn(name: Scalar, reader: Reader) -> None:
    reader.complain(
        name,
        f"'{AS_DRAWN}' is the layout itself",
        expected="another name for a state",
        remedy="set these keys where they belong, or give the state another name",
    )


def _overrides(node: Node, names: Names, reader: Reader) -> tuple[Override, ...]:
    if not isinstance(node, Mapping):
        reader.refuse(node, _KEYS)
        return ()
    found = []
    for key, value in node.pairs:
        path = tuple(key.text.split("."))
        if _known(path, key, names, reader):
            found.append(Override(path, value, key.span))
    return tuple(found)


def _known(path: tuple[str, ...], key: Scalar, names: Names, reader: Reader) -> bool:
    """Check a key path down to the item; the keys below are checked when it is read again."""
    before = reader.failures
    if path[0] not in ROOTS:
        _unknown_root(path[0], key, reader)
    elif path[0] == "sources":
        _check_item(path, key, names.sources, reader)
    elif path[0] == "elements":
        _check_item(path, key, names.elements, reader)
    elif path[0] == "enclosure":
        _check_sheet(path, key, names, reader)
    elif len(path) < 2 or not path[1]:  # noqa: PLR2004 (limits and a key)
        _incomplete(key, "limits.KEY", reader)
    return reader.failures == before


def _unknown_root(name: str, key: Scalar, reader: Reader) -> None:
    guess = nearest(name, ROOTS)
    reader.complain(
        key,
        f"a state cannot set {quote(key.text)}",
        expected=f"a path of keys that begins with {format_choices(ROOTS)}",
        remedy=f"write '{key.text.replace(name, guess, 1)}'"
        if guess
        else "write the path as 'elements.M1.facing'",
    )


def _check_item(path: tuple[str, ...], key: Scalar, known: tuple[str, ...], reader: Reader) -> None:
    what = path[0].removesuffix("s")
    if len(path) < 3 or not all(path):  # noqa: PLR2004 (section, name, key)
        _incomplete(key, f"{path[0]}.NAME.KEY", reader)
    elif path[1] not in known:
        unknown(path[1], key.span, what, known, reader)
    elif path[2] in _FIXED:
        reader.complain(
            key,
            f"a state cannot set '{path[2]}'",
            expected="any key but 'kind' and 'after'",
            remedy=f"make a second {what}, and set 'out: yes' for one of the two in each state",
        )


def _check_sheet(path: tuple[str, ...], key: Scalar, names: Names, reader: Reader) -> None:
    if len(path) < 4 or path[1] not in _SHEETS or not all(path):  # noqa: PLR2004 (enclosure, panels, name, key)
        _incomplete(key, "enclosure.panels.NAME.KEY or enclosure.lids.NAME.KEY", reader)
        return
    known = tuple(names.panels) if path[1] == "panels" else names.lids
    if path[2] not in known:
        unknown(path[2], key.span, path[1].removesuffix("s"), known, reader)


def _incomplete(key: Scalar, form: str, reader: Reader) -> None:
    reader.complain(
        key,
        f"{quote(key.text)} is not the path of a key that a state may set",
        expected=form,
        remedy="write the whole path, as 'elements.M1.facing' or 'limits.time_base'",
    )


def replaced(item: Node, path: Item, state: State, reader: Reader) -> Node | None:
    """Return the node of an item with a state's keys in it; None after problems.

    Shorter paths go first, so that a whole table and a key in it may both be set.
    """
    own = [o for o in state.overrides if o.path[: len(path)] == path]
    node = _without(item, state.keys_of(path))
    for override in sorted(own, key=lambda o: len(o.path)):
        try:
            node = replace_at(node, override.path[len(path) :], override.value)
        except PathError as error:
            reader.path = ["states", state.name]
            whole = ".".join(override.path[: len(path) + error.depth])
            reader.complain(
                override.span,
                f"{quote('.'.join(override.path))} leads into a value that has no keys",
                expected=f"a path no longer than {quote(whole)}",
                remedy=f"set {quote(whole)} as a whole",
            )
            reader.path = []
            return None
    return node


def _without(node: Node, keys: frozenset[str]) -> Node:
    """Take away what the keys that a state sets stand in for."""
    if not isinstance(node, Mapping):
        return node
    gone: set[str] = set()
    for group in _INSTEAD:
        if keys.intersection(group):
            gone.update(set(group) - keys)
    if "incidence" in gone:
        gone.add("side")
    if "aim" in keys:
        gone.add("pitch")
    gone -= keys
    return Mapping(((k, v) for k, v in node.pairs if k.text not in gone), node.span)
