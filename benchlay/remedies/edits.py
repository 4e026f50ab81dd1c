"""Changes of a layout's text: an entry more in a mapping, or a key with another value.

The text stays the drafter's: only what changes is touched, comments and order remain.
"""

from __future__ import annotations

from collections.abc import Sequence

import yaml

from benchlay.named import NamedTuple

# The one of libyaml is much the quicker, and marks the same places.
_LOADER = getattr(yaml, "CSafeLoader", yaml.SafeLoader)


class Edit(NamedTuple):
    """A key with its value in the mapping at `path`; the value is written as one line of YAML."""

    path: tuple[str, ...]
    key: str
    value: str

    def as_yaml(self) -> str:
        """Return it as it is to be pasted, with the keys that lead to it."""
        lines = [f"{'  ' * depth}{key}:" for depth, key in enumerate(self.path)]
        return "\n".join([*lines, f"{'  ' * len(self.path)}{self.key}: {self.value}"])


def pasted(edits: Sequence[Edit]) -> str:
    """Return several edits as YAML, those of one mapping under one heading."""
    lines: list[str] = []
    above: tuple[str, ...] = ()
    for edit in edits:
        shared = 0
        while shared < min(len(above), len(edit.path)) and above[shared] == edit.path[shared]:
            shared += 1
        lines += edit.as_yaml().split("\n")[shared:]
        above = edit.path
    return "\n".join(lines)


def apply(text: str, edits: Sequence[Edit]) -> str | None:
    """Return a layout's text with edits made in turn; None where one cannot be written.

    Only mappings that stand in the text as such can be written into: not those behind an
    alias or merged from elsewhere.
    """
    for edit in edits:
        changed = _apply(text, edit)
        if changed is None:
            return None
        text = changed
    return text


def _apply(text: str, edit: Edit) -> str | None:
    root = yaml.compose(text, Loader=_LOADER)
    path = list(edit.path)
    if not isinstance(root, yaml.MappingNode):
        return None
    node = root
    while path:
        found = _value(node, path[0])
        if found is None:
            return _added(text, node, path[0], _nested([*path[1:]], edit))
        if not isinstance(found, yaml.MappingNode):
            return None
        node = found
        path.pop(0)
    old = _value(node, edit.key)
    if old is None:
        return _added(text, node, edit.key, edit.value)
    if old.end_mark.index > len(text) or not isinstance(
        old, (yaml.ScalarNode, yaml.CollectionNode)
    ):
        return None
    end = old.start_mark.index + len(text[old.start_mark.index : old.end_mark.index].rstrip())
    return text[: old.start_mark.index] + edit.value + text[end:]


def _nested(path: Sequence[str], edit: Edit) -> str:
    """Return a value as flow mappings within those of a path that is not there yet."""
    value = f"{{{edit.key}: {edit.value}}}"
    for key in reversed(path):
        value = f"{{{key}: {value}}}"
    return value


def _value(node: yaml.MappingNode, key: str) -> yaml.Node | None:
    for name, value in node.value:
        if isinstance(name, yaml.ScalarNode) and name.value == key:
            found: yaml.Node = value
            return found
    return None


def _added(text: str, node: yaml.MappingNode, key: str, value: str) -> str | None:
    """Write one entry more into a mapping, behind the last one."""
    if node.flow_style:
        close = node.end_mark.index - 1
        if text[close] != "}":
            return None
        inner = text[node.start_mark.index + 1 : close].rstrip()
        comma = ", " if node.value and not inner.endswith(",") else " " if node.value else ""
        return f"{text[: node.start_mark.index + 1]}{inner}{comma}{key}: {value}{text[close:]}"
    if not node.value:
        return None
    last = node.value[-1][1]
    column = node.value[0][0].start_mark.column
    end = _end_of_line(text, _last_index(last))
    glue = "" if text[:end].endswith("\n") else "\n"
    return f"{text[:end]}{glue}{' ' * column}{key}: {value}\n{text[end:]}"


def _last_index(node: yaml.Node) -> int:
    """Return where the last thing written of a node ends.

    A block mapping's own end lies behind the blank lines and comments that follow it.
    """
    while isinstance(node, yaml.CollectionNode) and not node.flow_style and node.value:
        last = node.value[-1]
        node = last[1] if isinstance(last, tuple) else last
    index: int = node.end_mark.index
    return index


def _end_of_line(text: str, index: int) -> int:
    """Return the place behind the line that holds what ends at an index."""
    # A block scalar ends at the start of a later line already.
    if index and text[index - 1] == "\n":
        return index
    found = text.find("\n", index)
    return len(text) if found < 0 else found + 1
