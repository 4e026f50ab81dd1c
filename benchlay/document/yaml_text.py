"""YAML text to nodes: a plain subset, and every refusal with its place and its mend.

The parser's events are used, not its trees: an event tells of anchors, aliases and tags,
and depth and number of nodes are bounded while reading, before anything can blow up.
"""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any

import yaml

from benchlay.document.problems import Problems
from benchlay.document.span import Span
from benchlay.document.tree import Broken, Mapping, Node, Scalar, Sequence
from benchlay.document.unseen import UNSEEN, has_tabs, place, without_unseen
from benchlay.document.words import quote

MAX_DEPTH = 50
MAX_NODES = 200_000
MAX_SCALAR = 10_000
MAX_FILE = 4_000_000
"""Characters; far above any layout, far below what hurts."""

# The C parser is a dozen times faster; where PyYAML was built without it, the other will do.
_LOADER: Any = getattr(yaml, "CSafeLoader", yaml.SafeLoader)


def parse_bytes(data: bytes, file: str, problems: Problems) -> Node | None:
    """Parse the bytes of a file, which must be UTF-8; see `parse`."""
    try:
        text = data.decode("utf-8")
    except UnicodeDecodeError as error:
        before = data[: error.start].decode("utf-8", errors="replace")
        problems.add(
            place(before, len(before), file),
            f"byte 0x{data[error.start]:02x} is not part of any UTF-8 character",
            expected="a text file in UTF-8",
            remedy="save the file as UTF-8 in your editor",
        )
        return None
    return parse(text, file, problems)


def parse(text: str, file: str, problems: Problems) -> Node | None:
    """Turn YAML text into nodes.

    Parameters
    ----------
    text : str
        One document.
    file : str
        The name to put in places, as the user gave it.
    problems : Problems
        Receives all that is wrong; nothing is raised.

    Returns
    -------
    Node or None
        None if there is no document to go on with. Otherwise what could be read; a part that
        could not is a `Broken` node, so that the rest is read and reported too.
    """
    text = text.removeprefix("\ufeff")
    if len(text) > MAX_FILE:
        problems.add(
            Span(file, 1, 1),
            f"the file is {len(text)} characters long",
            expected=f"at most {MAX_FILE} characters",
            remedy="check that this is a layout; move shared parts to files of their own",
        )
        return None
    text = without_unseen(text, file, problems)
    if has_tabs(text, file, problems):
        return None
    builder = _Builder(file, problems)
    try:
        builder.run(yaml.parse(text, Loader=_LOADER))
    except yaml.YAMLError as error:
        from benchlay.document.yaml_errors import explain

        explain(error, file, problems, MAX_DEPTH)
        return None
    if builder.stopped:
        return None
    if builder.root is None:
        problems.add(
            Span(file, 1, 1),
            "the file is empty",
            expected="a table of keys",
            remedy="write the layout into it; 'benchlay explain layout' says what there may be",
        )
    return builder.root


def _short(tag: str) -> str:
    """Return a tag as it is usually written."""
    standard = "tag:yaml.org,2002:"
    return f"!!{tag.removeprefix(standard)}" if tag.startswith(standard) else tag


class _Frame:
    """A list or table whose end has not come yet."""

    __slots__ = ("is_table", "items", "key", "seen", "span")

    def __init__(self, span: Span, *, is_table: bool) -> None:
        self.span = span
        self.is_table = is_table
        self.items: list[Any] = []
        self.key: Node | None = None
        self.seen: dict[str, Span] = {}

    def finish(self) -> Node:
        if self.is_table:
            return Mapping(self.items, self.span)
        return Sequence(self.items, self.span)


class _Builder:
    """Builds nodes from events, with a stack of its own: depth cannot exhaust Python's."""

    def __init__(self, file: str, problems: Problems) -> None:
        self.file = file
        self.problems = problems
        self.root: Node | None = None
        self.stopped = False
        self._stack: list[_Frame] = []
        self._count = 0
        self._documents = 0

    def run(self, events: Iterator[object]) -> None:
        """Build until the events end or a bound is met."""
        for event in events:
            if isinstance(event, yaml.ScalarEvent):
                self._scalar(event)
            elif isinstance(event, yaml.CollectionStartEvent):
                self._open(event)
            elif isinstance(event, yaml.CollectionEndEvent):
                self._put(self._stack.pop().finish())
            elif isinstance(event, yaml.AliasEvent):
                self._alias(event)
            elif isinstance(event, yaml.DocumentStartEvent):
                self._document(event)
            if self.stopped:
                return

    def _span(self, event: yaml.Event) -> Span:
        mark: Any = event.start_mark  # there in every event of a parser
        return Span(self.file, mark.line + 1, mark.column + 1)

    def _stop(self, span: Span, message: str, expected: str, remedy: str) -> None:
        self.problems.add(span, message, expected=expected, remedy=remedy)
        self.stopped = True

    def _document(self, event: yaml.Event) -> None:
        self._documents += 1
        if self._documents > 1:
            self._stop(
                self._span(event),
                "a second document begins here",
                "one document in a file",
                "remove the line '---', or move what follows to a file of its own",
            )

    def _counted(self, event: yaml.ScalarEvent | yaml.CollectionStartEvent) -> Span:
        """Return the event's place, having counted it and refused its anchor and tag."""
        span = self._span(event)
        self._count += 1
        if self._count > MAX_NODES:
            self._stop(
                span,
                f"the file holds more than {MAX_NODES} values",
                f"at most {MAX_NODES} values",
                "check that this is a layout",
            )
        if event.tag is not None:
            self.problems.add(
                span,
                f"the tag {quote(_short(event.tag))} stands before this value",
                expected="values without tags: the key decides how a value is read",
                remedy="remove the tag",
            )
        if event.anchor is not None:
            self.problems.add(
                span,
                f"the anchor {quote('&' + event.anchor)} stands before this value",
                expected="values without anchors: each is written where it belongs",
                remedy="remove the anchor; share keys between elements with 'parts'",
            )
        return span

    def _scalar(self, event: yaml.ScalarEvent) -> None:
        span = self._counted(event)
        text: str = event.value
        if len(text) > MAX_SCALAR:
            self.problems.add(
                span,
                f"this text is {len(text)} characters long",
                expected=f"at most {MAX_SCALAR} characters",
                remedy="shorten it, or check that a closing quote is not missing",
            )
            self._put(Broken(span))
            return
        # Only double quotes can bring in by escapes what the text itself may not hold.
        if event.style == '"' and (unseen := UNSEEN.search(text)):
            self.problems.add(
                span,
                f"this text holds the character U+{ord(unseen[0]):04X}, which cannot be seen",
                expected="characters that can be seen, spaces and line ends",
                remedy="remove the escape that stands for it",
            )
            self._put(Broken(span))
            return
        self._put(Scalar(text, span, quoted=bool(event.style)))

    def _open(self, event: yaml.CollectionStartEvent) -> None:
        span = self._counted(event)
        if len(self._stack) >= MAX_DEPTH:
            from benchlay.document.yaml_errors import too_deep

            self._stop(span, *too_deep(MAX_DEPTH))
            return
        frame = self._stack[-1] if self._stack else None
        if frame is not None and frame.is_table and frame.key is None:
            self._bad_key(span)
        is_table = isinstance(event, yaml.MappingStartEvent)
        self._stack.append(_Frame(span, is_table=is_table))

    def _alias(self, event: yaml.AliasEvent) -> None:
        span = self._span(event)
        self.problems.add(
            span,
            f"the alias {quote(f'*{event.anchor}')} stands for something written elsewhere",
            expected="values written where they belong",
            remedy="write the value out here; share keys between elements with 'parts'",
        )
        self._put(Broken(span))

    def _put(self, node: Node) -> None:
        """Put a finished node where it belongs: item, key, value or the whole document."""
        if not self._stack:
            self.root = node
            return
        frame = self._stack[-1]
        if not frame.is_table:
            frame.items.append(node)
        elif frame.key is None:
            frame.key = node
        else:
            key, frame.key = frame.key, None
            if isinstance(key, Scalar) and self._new_key(frame, key):
                frame.items.append((key, node))

    def _bad_key(self, span: Span) -> None:
        self.problems.add(
            span,
            "a list or table stands where a key is expected",
            expected="a word as key",
            remedy="write 'key: value'; put text that starts with a bracket in quotes",
        )

    def _new_key(self, frame: _Frame, key: Scalar) -> bool:
        """Tell whether to keep the key; merge keys and repeated ones are reported."""
        if key.text == "<<" and not key.quoted:
            self.problems.add(
                key.span,
                "the merge key '<<' stands here",
                expected="keys written where they belong",
                remedy="write the keys out here; share keys between elements with 'parts'",
            )
            return False
        first = frame.seen.setdefault(key.text, key.span)
        if first is not key.span:
            self.problems.add(
                key.span,
                f"the key {quote(key.text)} is written twice; "
                f"first in line {first.line}, column {first.column}",
                expected="each key once in a table",
                remedy="remove one of the two",
            )
            return False
        return True
