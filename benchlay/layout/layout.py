"""Text to the typed layout, in every state; all that is wrong is reported in one go."""

from __future__ import annotations

from collections.abc import Callable
from typing import TypeVar

from benchlay.document.form import Form, Reader
from benchlay.document.forms import Entries, RecordForm, Table
from benchlay.document.nodes import Mapping, Node, Scalar, parse, parse_bytes, replace_at
from benchlay.document.problems import Problems
from benchlay.document.record import read_record
from benchlay.document.span import Span
from benchlay.layout.accept import Accept
from benchlay.layout.bench import Bench
from benchlay.layout.drawing import Drawing, Revision
from benchlay.layout.elements import Element, read_element
from benchlay.layout.enclosure import Enclosure
from benchlay.layout.facing import refuse_faceless
from benchlay.layout.header import SECTIONS, Header
from benchlay.layout.limits import Limits
from benchlay.layout.materials import Material
from benchlay.layout.names import AS_DRAWN, Later, names_in, read_entries
from benchlay.layout.paths import Cavity, Matched
from benchlay.layout.references import References
from benchlay.layout.rings import refuse_rings
from benchlay.layout.room import Room
from benchlay.layout.routes import Route, read_route
from benchlay.layout.sources import Source, read_source
from benchlay.layout.states import Item, State, read_states, replaced
from benchlay.layout.tolerances import Tolerances
from benchlay.named import NamedTuple

T = TypeVar("T")
_SOURCES: Form[object] = Table(Later("its keys", "{wavelength: 532}"))
_ELEMENTS: Form[object] = Table(Later("its keys", "{kind: mirror}"))
_ROUTES: Form[object] = Table(Later("a list of items", "[green, M1]"))
_ENCLOSURE = RecordForm(Enclosure)
_LIMITS = RecordForm(Limits)


class Layout(NamedTuple):
    """A bench in one state; tables are in the order of the file, on which nothing hangs.

    `spans` give the place of every source's and element's name. `overridden` gives, by the
    path of an item (``elements.M1``, ``limits``), the keys that the state sets.
    """

    title: str
    revision: str
    file: str
    state: str
    bench: Bench
    room: Room | None
    sources: dict[str, Source]
    elements: dict[str, Element]
    routes: dict[str, Route]
    matched: tuple[Matched, ...]
    cavities: Entries[Cavity]
    enclosure: Enclosure | None
    materials: dict[str, Material]
    states: dict[str, State]
    limits: Limits
    tolerances: Tolerances
    accept: tuple[Accept, ...]
    drawing: Drawing
    revisions: tuple[Revision, ...]
    spans: dict[str, Span]
    overridden: dict[str, frozenset[str]]
    not_yet: tuple[tuple[Span, str], ...]


class LayoutSource(NamedTuple):
    """A layout that could be read: one `Layout` a state, `as drawn` first."""

    file: str
    layouts: dict[str, Layout]

    @property
    def as_drawn(self) -> Layout:
        """The layout without any state's keys."""
        return self.layouts[AS_DRAWN]


class _Parts(NamedTuple):
    """What states may change."""

    sources: dict[str, Source]
    elements: dict[str, Element]
    enclosure: Enclosure | None
    limits: Limits | None


def read_layout(text: str | bytes, file: str) -> tuple[LayoutSource | None, Problems]:
    """Read a layout.

    Parameters
    ----------
    text : str or bytes
        The YAML text; bytes must be UTF-8.
    file : str
        Its name as the user gave it, for messages.

    Returns
    -------
    LayoutSource or None
        The layout in every state; None if anything at all is wrong.
    Problems
        All that is wrong, states included.
    """
    problems = Problems()
    if isinstance(text, bytes):
        root = parse_bytes(text, file, problems)
    else:
        root = parse(text, file, problems)
    if root is None:
        return None, problems
    reader = Reader(problems)
    if not isinstance(root, Mapping):
        reader.refuse(root, RecordForm(Header))
        return None, problems
    layouts = _Document(root, file, reader).layouts()
    return (None if problems else LayoutSource(file, layouts)), problems


class _Document:
    """One reading of one document."""

    def __init__(self, root: Mapping, file: str, reader: Reader) -> None:
        self.root, self.file, self.reader = root, file, reader
        self.names = names_in(root)

    def layouts(self) -> dict[str, Layout]:
        """Return the layouts by state; empty after problems."""
        header = read_record(Header, self.root, self.reader, extra=SECTIONS)
        parts = self._parts(header)
        routes = read_entries(
            self.root.get("routes"), "routes", _ROUTES, read_route, self.reader, taken={}
        )
        states = read_states(self.root.get("states"), self.names, self.reader)
        references = References(self.names, parts.sources, parts.elements, self.reader)
        self._check(parts, references)
        routes = {name: references.route(route) for name, route in routes.items()}
        if header is not None:
            references.header(header)
        changed = {name: self._in_state(parts, state) for name, state in states.items()}
        if header is None or self.reader.problems:
            return {}
        base = self._assemble(header, parts, routes, states)
        layouts = {AS_DRAWN: base}
        for name, state in states.items():
            layouts[name] = _with_parts(base, changed[name], state)
        return layouts

    def _parts(self, header: Header | None) -> _Parts:
        taken: dict[str, Scalar] = {}
        sources, elements = self.root.get("sources"), self.root.get("elements")
        return _Parts(
            read_entries(sources, "sources", _SOURCES, read_source, self.reader, taken=taken),
            read_entries(elements, "elements", _ELEMENTS, read_element, self.reader, taken=taken),
            self._enclosure(self.root.get("enclosure")),
            None if header is None else header.limits,
        )

    def _enclosure(self, node: Node | None) -> Enclosure | None:
        if node is None:
            return None
        self.reader.path = ["enclosure"]
        enclosure = _ENCLOSURE.read(node, self.reader)
        self.reader.path = []
        return enclosure

    def _check(self, parts: _Parts, references: References) -> None:
        for source in parts.sources.values():
            references.source(source)
        for element in parts.elements.values():
            references.element(element)
        refuse_rings(parts.elements, references.reader)
        refuse_faceless(parts.elements, references.reader)
        if parts.enclosure is not None:
            references.enclosure(parts.enclosure)

    def _in_state(self, parts: _Parts, state: State) -> _Parts:
        """Read again what a state changes, and check what that refers to."""
        sources, elements = dict(parts.sources), dict(parts.elements)
        enclosure, limits = parts.enclosure, parts.limits
        touched = _Parts({}, {}, None, None)
        items = state.items()
        for item in items:
            if item[0] == "sources":
                source = self._again(item, state, read_source)
                if source is not None:
                    sources[item[1]] = touched.sources[item[1]] = source
            elif item[0] == "elements":
                element = self._again(item, state, read_element)
                if element is not None:
                    elements[item[1]] = touched.elements[item[1]] = element
        if any(item[0] == "enclosure" for item in items):
            enclosure = self._enclosure(self._enclosure_in(state))
            touched = touched._replace(enclosure=enclosure)
        if ("limits",) in items:
            limits = self._limits_in(state)
        self._check(touched, References(self.names, sources, elements, self.reader))
        return _Parts(sources, elements, enclosure, limits)

    def _again(
        self, item: Item, state: State, read: Callable[[Scalar, Node, Reader], T | None]
    ) -> T | None:
        """Read a source or element with the state's keys in it."""
        section = self.root.get(item[0])
        if not isinstance(section, Mapping):
            return None
        name, node = next(pair for pair in section.pairs if pair[0].text == item[1])
        changed = replaced(node, item, state, self.reader)
        if changed is None:
            return None
        self.reader.path = list(item)
        value = read(name, changed, self.reader)
        self.reader.path = []
        return value

    def _enclosure_in(self, state: State) -> Node | None:
        root: Node = self.root
        for item in state.items():
            if item[0] == "enclosure":
                sheet = _at(root, item)
                changed = None if sheet is None else replaced(sheet, item, state, self.reader)
                root = root if changed is None else replace_at(root, item, changed)
        return root.get("enclosure") if isinstance(root, Mapping) else None

    def _limits_in(self, state: State) -> Limits | None:
        node = self.root.get("limits") or Mapping((), state.span)
        changed = replaced(node, ("limits",), state, self.reader)
        if changed is None:
            return None
        self.reader.path = ["limits"]
        limits = _LIMITS.read(changed, self.reader)
        self.reader.path = []
        return limits

    def _assemble(
        self,
        header: Header,
        parts: _Parts,
        routes: dict[str, Route],
        states: dict[str, State],
    ) -> Layout:
        things: list[Source | Element] = [*parts.sources.values(), *parts.elements.values()]
        return Layout(
            title=header.title,
            revision=header.revision,
            file=self.file,
            state=AS_DRAWN,
            bench=header.bench,
            room=header.room,
            sources=parts.sources,
            elements=parts.elements,
            routes=routes,
            matched=header.matched,
            cavities=header.cavities,
            enclosure=parts.enclosure,
            materials=dict(header.materials),
            states=states,
            limits=header.limits,
            tolerances=header.tolerances,
            accept=header.accept,
            drawing=header.drawing,
            revisions=header.revisions,
            spans={thing.name: thing.span for thing in things},
            overridden={},
            not_yet=tuple(dict.fromkeys(self.reader.not_yet)),
        )


def _at(root: Node, path: Item) -> Node | None:
    """Follow a path of keys."""
    node: Node | None = root
    for name in path:
        node = node.get(name) if isinstance(node, Mapping) else None
    return node


def _with_parts(base: Layout, parts: _Parts, state: State) -> Layout:
    return base._replace(
        state=state.name,
        sources=parts.sources,
        elements=parts.elements,
        enclosure=parts.enclosure,
        limits=parts.limits or base.limits,
        overridden={".".join(item): state.keys_of(item) for item in state.items()},
    )
