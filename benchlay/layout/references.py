"""Names that refer to something: whether it exists, and has the branch that is named."""

from __future__ import annotations

from collections.abc import Iterable, Mapping

from benchlay.document.form import Reader
from benchlay.document.quantity import Dimension, QuantityError, parse
from benchlay.document.span import Span
from benchlay.document.words import format_choices, nearest, quote
from benchlay.elements import KINDS
from benchlay.layout._forms import Ref
from benchlay.layout.elements import Element
from benchlay.layout.enclosure import Enclosure
from benchlay.layout.header import Header
from benchlay.layout.names import Names, unknown
from benchlay.layout.pose_forms import PathItem
from benchlay.layout.routes import Route, RouteItem
from benchlay.layout.sources import Source
from benchlay.layout.stand import Stand

THING = "source or element"
SCATTERED = "scattered"
"""The branch of whatever scatters light in all directions: a target's face."""


class References:
    """Looks up what names refer to, in one document.

    `elements` and `sources` are those that could be read; a name that is written but could
    not be read is known all the same, and nothing further is asked about it.
    """

    def __init__(
        self,
        names: Names,
        sources: Mapping[str, Source],
        elements: Mapping[str, Element],
        reader: Reader,
    ) -> None:
        self.names = names
        self.sources = sources
        self.elements = elements
        self.reader = reader

    def source(self, source: Source) -> None:
        """Check what a source refers to."""
        self.reader.path = ["sources", source.name]
        self._stand(source.name, source.stand)
        if source.fed_by is not None:
            target = source.fed_by.target
            if target.name not in self.names.elements:
                unknown(target.name, target.span, "element", self.names.elements, self.reader)
            elif target.name in self.elements and self.elements[target.name].kind != "target":
                self.reader.complain(
                    target.span,
                    f"{quote(target.name)} is a {self.elements[target.name].kind}: no light is "
                    "coupled in there",
                    expected="the name of a target",
                    remedy="put a target where the light is coupled in, and name that",
                )
        self.reader.path = []

    def element(self, element: Element) -> None:
        """Check what an element refers to."""
        self.reader.path = ["elements", element.name]
        self._stand(element.name, element.stand)
        for item in element.stand.after:
            self._path_item(item)
        goal = element.record.leads_to()
        if isinstance(goal, str):
            self._another(
                "to", element.name, Ref(goal, element.record.span_of("to")), "name what it leads to"
            )
        material = getattr(element.record, "material", None)
        if isinstance(material, str):
            self._material(Ref(material, element.record.span_of("material")))
        self.reader.path = []

    def enclosure(self, enclosure: Enclosure) -> None:
        """Check the materials of an enclosure."""
        self.reader.path = ["enclosure"]
        self._material(enclosure.material)
        for section, sheets in (("panels", enclosure.panels), ("lids", enclosure.lids)):
            for name, sheet in sheets.items():
                self.reader.path = ["enclosure", section, name]
                self._material(sheet.material)
        self.reader.path = []

    def header(self, header: Header) -> None:
        """Check what the smaller parts of a layout refer to."""
        for k, pair in enumerate(header.matched, start=1):
            self._all(("matched", f"[{k}]"), pair.routes, "route", self.names.routes)
        for name, cavity in header.cavities.items():
            items = cavity.between + cavity.through
            self._all(("cavities", name), items, "element", self.names.elements)
        for k, entry in enumerate(header.accept, start=1):
            refs = [Ref(name, span) for name, span in entry.bound.spans.items()]
            self._all(("accept", f"[{k}]", "bound"), refs, THING, self.names.things)
        by_name = header.tolerances.by_name
        refs = [Ref(name, by_name.spans[name]) for name in by_name]
        kinds = (*KINDS, *self.names.elements)
        self._all(("tolerances",), refs, "kind or element", kinds)

    def route(self, route: Route) -> Route:
        """Check a route and return it with the meaning of each part."""
        self.reader.path = ["routes", route.name]
        last = len(route.items) - 1
        items = tuple(self._route_item(k, item, last) for k, item in enumerate(route.items))
        self.reader.path = []
        return route._replace(items=items)

    def _all(
        self, path: tuple[str, ...], refs: Iterable[Ref], what: str, known: tuple[str, ...]
    ) -> None:
        self.reader.path = list(path)
        for ref in refs:
            if ref.name not in known:
                unknown(ref.name, ref.span, what, known, self.reader)
        self.reader.path = []

    def _stand(self, own: str, stand: Stand) -> None:
        for key, target in (("facing", stand.facing), ("aim", stand.aim)):
            if isinstance(target, Ref):
                self._another(key, own, target, "name what it is to look at")
        if stand.in_opening is not None:
            self._opening(*stand.in_opening)

    def _another(self, key: str, own: str, ref: Ref, remedy: str) -> None:
        """Check the name of a source or element that may not be the item's own."""
        if ref.name == own:
            self.reader.complain(
                ref.span,
                f"'{key}' names {quote(own)} itself",
                expected=f"another {THING}, or a point",
                remedy=remedy,
            )
        elif ref.name not in self.names.things:
            unknown(ref.name, ref.span, THING, self.names.things, self.reader)

    def _opening(self, panel: str, opening: str, span: Span) -> None:
        panels = self.names.panels
        if panel not in panels:
            unknown(panel, span, "panel", panels, self.reader)
        elif opening not in panels[panel]:
            unknown(opening, span, f"opening of panel '{panel}'", panels[panel], self.reader)

    def _material(self, ref: Ref | None) -> None:
        if ref is not None and ref.name not in self.names.materials:
            unknown(ref.name, ref.span, "material", self.names.materials, self.reader)

    def _path_item(self, item: PathItem) -> None:
        if item.item in self.names.sources:
            if item.branch is not None:
                self.reader.complain(
                    item.span,
                    f"{quote(item.item)} is a source: it has no branches",
                    expected=f"'{item.item}', with 'wavelength' where a line must be chosen",
                    remedy=f"write 'after: {item.item}'",
                )
        elif item.item not in self.names.elements:
            unknown(item.item, item.span, THING, self.names.things, self.reader)
        else:
            self._branch(item.item, item.branch or "", item.span, followed=True)

    def _branch(self, name: str, branch: str, span: Span, *, followed: bool) -> None:
        """Check that an element has a branch; where something follows one must be known."""
        element = self.elements.get(name)
        if element is None:
            return
        branches = branches_of(element)
        choices = format_choices(f"{name}.{b}" for b in branches)
        if not branches and (branch or followed):
            self.reader.complain(
                span,
                f"no beam goes on from {quote(name)}: a {element.kind} has no branches",
                expected="an item that sends light on",
                remedy="end the route here, or name another item",
            )
        elif branch and branch not in branches:
            guess = nearest(branch, branches)
            self.reader.complain(
                span,
                f"{quote(name)} has no branch {quote(branch)}",
                expected=f"one of {choices}",
                remedy=f"write '{name}.{guess or branches[0]}'",
            )
        elif not branch and followed and element.record.DEFAULT_BRANCH is None:
            self.reader.complain(
                span,
                f"{quote(name)} does not say by which branch the beam goes on",
                expected=f"one of {choices}",
                remedy=f"write '{name}.{branches[0]}', or whichever is meant",
            )

    def _route_item(self, k: int, item: RouteItem, last: int) -> RouteItem:
        if k == 0:
            return self._head(item)
        if item.name in self.names.elements and not self._is_opening(item, last=k == last):
            if self._wavelength_part(item):
                return item._replace(wavelength_nm=_wavelength(item.part))
            self._branch(item.name, item.part, item.span, followed=k < last)
            return item._replace(branch=item.part or None)
        if item.part and item.name in self.names.panels:
            return self._handed_over(item, last=k == last)
        if item.name in self.names.sources:
            self.reader.complain(
                item.span,
                f"{quote(item.name)} is a source: only the first item of a route can be one",
                expected="elements after the first item",
                remedy="remove it, or start a route of its own with it",
            )
        else:
            unknown(item.name, item.span, "element", self.names.elements, self.reader)
        return item

    def _head(self, item: RouteItem) -> RouteItem:
        """Check the first item: a source, with the line that is followed."""
        if item.name not in self.names.sources:
            if item.name in self.names.elements:
                self.reader.complain(
                    item.span,
                    f"the route starts at {quote(item.name)}, which is no source",
                    expected=f"a source first: {format_choices(self.names.sources)}",
                    remedy="put the source before it",
                )
            else:
                unknown(item.name, item.span, "source", self.names.sources, self.reader)
            return item
        source = self.sources.get(item.name)
        if not item.part or source is None:
            return item
        wavelength = _wavelength(item.part)
        lines = [line.wavelength_nm for line in source.lines]
        if wavelength not in lines:
            choices = [f"{item.name}.{nm:g}" for nm in lines]
            self.reader.complain(
                item.span,
                f"{quote(item.name)} has no line {quote(item.part)}",
                expected=f"one of {format_choices(choices)}",
                remedy=f"write '{choices[0]}'",
            )
        return item._replace(wavelength_nm=wavelength)

    def _is_opening(self, item: RouteItem, *, last: bool) -> bool:
        """Tell whether a name that is both element and panel stands for the panel here."""
        element = self.elements.get(item.name)
        openings = self.names.panels.get(item.name, ())
        known = element is not None and item.part in branches_of(element)
        return last and item.part in openings and not known

    def _wavelength_part(self, item: RouteItem) -> bool:
        """Tell whether the part is a wavelength that an element makes, not a branch."""
        element = self.elements.get(item.name)
        known = element is not None and item.part in branches_of(element)
        return bool(item.part) and not known and item.part[0].isdigit()

    def _handed_over(self, item: RouteItem, *, last: bool) -> RouteItem:
        self._opening(item.name, item.part, item.span)
        if not last:
            self.reader.complain(
                item.span,
                f"the beam is handed over at '{item.name}.{item.part}': nothing follows",
                expected="an opening only as the last item",
                remedy="end the route here",
            )
        return item._replace(opening=(item.name, item.part))


def branches_of(element: Element) -> tuple[str, ...]:
    """Return the branches of an element, the diffuse light of its face among them."""
    branches = tuple(element.record.branches())
    scatters = getattr(element.record, "diffuse", 0.0)
    return (*branches, SCATTERED) if scatters and SCATTERED not in branches else branches


def _wavelength(part: str) -> float | None:
    try:
        return parse(part, Dimension.WAVELENGTH)
    except QuantityError:
        return None
