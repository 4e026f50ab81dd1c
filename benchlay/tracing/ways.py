"""What the drafter means beams to do: routes as a tree of steps from face to face.

A beam carries its place in the tree (`node`). A step that no route makes leads off the tree,
for good: from there on the light is stray.
"""

from __future__ import annotations

from collections.abc import Mapping
from typing import TypeAlias

import numpy as np

from benchlay.elements._kind import Step
from benchlay.layout.elements import Element
from benchlay.layout.layout import Layout
from benchlay.layout.routes import Route, RouteItem
from benchlay.named import NamedTuple
from benchlay.placing.placed import Placed
from benchlay.scene.tables import Flags, Ints, Scene
from benchlay.tracing.front import CONVERTED, REFLECTED, TRANSMITTED

_Step: TypeAlias = tuple[int, int, int, int]  # node, element, face, event
SCATTERED = "scattered"
_EVENT = {"reflected": REFLECTED, "transmitted": TRANSMITTED}


class Place(NamedTuple):
    """A node of the tree."""

    routes: tuple[tuple[int, int], ...]  # that pass it: number of the route, and leg
    inside: bool  # whether it lies inside an optic


class Scattering(NamedTuple):
    """A route goes on with the diffuse light of an element's face: a straight ray."""

    node: int  # of the light that is scattered
    owner: int  # number of the element
    end: int  # node of the diffuse light
    to: str  # the next item


class Ways(NamedTuple):
    """The tree: `roots` by (source, wavelength); `steps` as sorted codes with their targets.

    `main` tells for each face row and event whether it is meant by the element's own kind.
    """

    names: tuple[str, ...]
    routes: tuple[Route, ...]
    roots: Mapping[tuple[str, float], int]
    places: tuple[Place, ...]
    codes: Ints
    targets: Ints
    main: Flags  # (F, 2) reflected, transmitted
    elements: Mapping[str, int]
    scatterings: tuple[Scattering, ...] = ()
    handing: tuple[tuple[int, str], ...] = ()  # node, and the opening in which it ends

    def follow(self, node: Ints, owner: Ints, face_name: Ints, event: Ints | int) -> Ints:
        """Return the nodes after events at faces; -1 off the tree."""
        if not len(self.codes):
            return np.full(len(node), -1)
        wanted = _code(node, owner, face_name, event)
        at = np.minimum(np.searchsorted(self.codes, wanted), len(self.codes) - 1)
        found = (self.codes[at] == wanted) & (node >= 0)
        return np.where(found, self.targets[at], -1)

    def expected(self, node: int, route: int) -> str | None:
        """Return the item that a route has next after a node; None after its last."""
        leg = dict(self.places[node].routes).get(route)
        items = self.routes[route].items
        if leg is None or leg + 1 >= len(items):
            return None
        return items[leg + 1].name


def _code(node: Ints, owner: Ints, face_name: Ints, event: Ints | int) -> Ints:
    """Return a number (N,) a step: elements below 2^20, faces below 2^8, events below 2^3."""
    code: Ints = ((node << 20 | owner) << 8 | face_name) << 3 | event
    return code


class _Tree:
    """Grows route by route: what routes share from their source on is one stem."""

    def __init__(self, layout: Layout, scene: Scene) -> None:
        self.layout = layout
        self.face_names = scene.face_names
        self.number = {name: i for i, name in enumerate(scene.elements)}
        self.routes: list[dict[int, int]] = []
        self.inside: list[bool] = []
        self.steps: dict[_Step, int] = {}
        self.ends: dict[tuple[int, str, str], int] = {}
        self.roots: dict[tuple[str, float], int] = {}
        self.scatterings: list[Scattering] = []
        self.handing: dict[tuple[int, str], None] = {}

    def new(self, *, inside: bool) -> int:
        """Add a node."""
        self.routes.append({})
        self.inside.append(inside)
        return len(self.routes) - 1

    def root(self, source: str, wavelength_nm: float) -> int:
        """Return where the light of one line of a source begins."""
        found = self.roots.get((source, wavelength_nm))
        if found is None:
            found = self.roots[source, wavelength_nm] = self.new(inside=False)
        return found

    def grow(self, root: int, number: int, route: Route) -> None:
        """Add a route, leg by leg, as far as its items let light go on."""
        node = root
        self.routes[node][number] = 0
        for leg, item in enumerate(route.items[1:-1], start=1):
            element = self.layout.elements.get(item.name)
            if element is None:
                return
            branch = item.branch or element.record.DEFAULT_BRANCH or ""
            if branch == SCATTERED:
                node = self._scatter(node, item.name, route.items[leg + 1], (number, leg))
                continue
            ways = element.record.branches().get(branch, ())
            if not ways:
                return
            product = _product(element, item)
            left = (node, item.name, branch if product is None else f"{branch} {product}")
            end = self.ends.get(left)
            if end is None:
                end = self.ends[left] = self.new(inside=False)
            for way in ways:
                self._pass(node, self._steps(item.name, way, product), end, (number, leg))
            node = end
        if (opening := route.items[-1].opening) is not None:
            self.handing[node, ".".join(opening)] = None

    def _scatter(self, node: int, name: str, after: RouteItem, passing: tuple[int, int]) -> int:
        """Add diffuse light on its way from an element to the next item."""
        left = (node, name, f"{SCATTERED} {after.name}.{after.part}")
        end = self.ends.get(left)
        if end is None:
            end = self.ends[left] = self.new(inside=False)
            if after.opening is None:
                self.scatterings.append(Scattering(node, self.number[name], end, after.name))
        self.routes[end].setdefault(*passing)
        return end

    def _steps(
        self, name: str, way: tuple[Step, ...], product: int | None
    ) -> list[tuple[int, int, int]]:
        """Return element, face and event of each step of a way through an element."""
        steps = [(self.face_names.index(face), _EVENT[event]) for face, event in way]
        if product is not None:
            steps.insert(1, (product, CONVERTED))  # between entry and exit
        return [(self.number[name], face, event) for face, event in steps]

    def _pass(
        self, start: int, steps: list[tuple[int, int, int]], end: int, passing: tuple[int, int]
    ) -> None:
        """Add one way through an element; `passing` is the number of the route, and the leg."""
        route, leg = passing
        at = start
        for count, step in enumerate(steps, start=1):
            last = count == len(steps)
            key = (at, *step)
            at = self.steps.setdefault(key, end if last else -1)
            if at < 0:
                at = self.steps[key] = self.new(inside=True)
            self.routes[at].setdefault(route, leg if last else leg - 1)


def ways_of(placed: Placed, scene: Scene) -> Ways:
    """Return the tree of all routes of a layout, in name order.

    A state may give a source other wavelengths: routes are meant for those too.
    """
    layout = placed.base.layout
    tree = _Tree(layout, scene)
    names = tuple(sorted(layout.routes))
    for number, name in enumerate(names):
        route = layout.routes[name]
        for wavelength in _lines(route, placed):
            tree.grow(tree.root(route.items[0].name, wavelength), number, route)
    codes, targets = _sorted_steps(tree.steps)
    return Ways(
        names,
        tuple(layout.routes[name] for name in names),
        tree.roots,
        tuple(
            Place(tuple(sorted(routes.items())), inside)
            for routes, inside in zip(tree.routes, tree.inside, strict=True)
        ),
        codes,
        targets,
        _main_events(layout, scene),
        tree.number,
        tuple(tree.scatterings),
        tuple(tree.handing),
    )


def _sorted_steps(steps: Mapping[_Step, int]) -> tuple[Ints, Ints]:
    """Return codes of steps in rising order, and the nodes that they lead to."""
    node, owner, face, event = np.array(list(steps), dtype=np.int64).reshape(-1, 4).T
    code = _code(node, owner, face, event)
    order = np.argsort(code)
    return code[order], np.array(list(steps.values()), dtype=np.int64)[order]


def _lines(route: Route, placed: Placed) -> list[float]:
    first = route.items[0]
    if first.wavelength_nm is not None:
        return [first.wavelength_nm]
    sources = (state.layout.sources[first.name] for state in placed.states)
    return sorted({line.wavelength_nm for source in sources for line in source.lines})


def _product(element: Element, item: RouteItem) -> int | None:
    """Return the number of the product that a route goes on with, None for what passes."""
    made = [light.wavelength_nm for light in element.record.makes()]
    return made.index(item.wavelength_nm) if item.wavelength_nm in made else None


def _main_events(layout: Layout, scene: Scene) -> Flags:
    """Tell which events at which faces an element's kind is made for (no unintended splitting)."""
    meant: dict[int, set[tuple[str, str]]] = {}
    for number, name in enumerate(scene.elements):
        record = layout.elements[name].record
        branches = record.branches()
        named = [record.DEFAULT_BRANCH] if record.DEFAULT_BRANCH else list(branches)
        meant[number] = {
            step for key in named for way in branches.get(key or "", ()) for step in way
        }
    table = np.zeros((len(scene.faces.owner), 2), dtype=np.bool_)
    for row, (owner, face) in enumerate(
        zip(scene.faces.owner.tolist(), scene.faces.name.tolist(), strict=True)
    ):
        for column, event in enumerate(("reflected", "transmitted")):
            table[row, column] = (scene.face_names[face], event) in meant[owner]
    return table
