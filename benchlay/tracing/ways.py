"""What the drafter means beams to do: routes as a tree of steps from face to face.

A beam carries its place in the tree (`node`). A step that no route makes leads off the tree,
for good: from there on the light is stray.
"""

from __future__ import annotations

from collections.abc import Mapping
from typing import NamedTuple

import numpy as np

from benchlay.layout.elements import Element
from benchlay.layout.layout import Layout
from benchlay.layout.routes import Route, RouteItem
from benchlay.scene.tables import Flags, Ints, Scene
from benchlay.tracing.front import CONVERTED, REFLECTED, TRANSMITTED

_EVENT = {"reflected": REFLECTED, "transmitted": TRANSMITTED}


class Place(NamedTuple):
    """A node: the routes that pass it, as (number of the route, leg), and whether it lies
    inside an optic.
    """

    routes: tuple[tuple[int, int], ...]
    inside: bool


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
    code: Ints = ((node * 4096 + owner) * 16 + face_name) * 8 + event
    return code


class _Tree:
    def __init__(self) -> None:
        self.routes: list[dict[int, int]] = []
        self.inside: list[bool] = []
        self.steps: dict[tuple[int, int, int, int], int] = {}
        self.ends: dict[tuple[int, str, str], int] = {}
        self.roots: dict[tuple[str, float], int] = {}

    def new(self, *, inside: bool) -> int:
        self.routes.append({})
        self.inside.append(inside)
        return len(self.routes) - 1


def ways_of(layout: Layout, scene: Scene) -> Ways:
    """Return the tree of all routes of a layout, in name order."""
    tree = _Tree()
    names = tuple(sorted(layout.routes))
    number = {name: i for i, name in enumerate(scene.elements)}
    for i, name in enumerate(names):
        for wavelength in _lines(layout.routes[name], layout):
            root = tree.roots.setdefault((layout.routes[name].items[0].name, wavelength), -1)
            if root < 0:
                root = tree.new(inside=False)
                tree.roots[layout.routes[name].items[0].name, wavelength] = root
            _grow(tree, root, i, layout.routes[name], layout, number, scene)
    steps = sorted(
        (int(_code(*(np.int64(v) for v in key[:3]), key[3])), t) for key, t in tree.steps.items()
    )
    return Ways(
        names,
        tuple(layout.routes[name] for name in names),
        tree.roots,
        tuple(
            Place(tuple(sorted(routes.items())), inside)
            for routes, inside in zip(tree.routes, tree.inside, strict=True)
        ),
        np.array([code for code, _ in steps], dtype=np.int64),
        np.array([target for _, target in steps], dtype=np.int64),
        _main_events(layout, scene),
        number,
    )


def _lines(route: Route, layout: Layout) -> list[float]:
    first = route.items[0]
    if first.wavelength_nm is not None:
        return [first.wavelength_nm]
    return [line.wavelength_nm for line in layout.sources[first.name].lines]


def _grow(
    tree: _Tree,
    root: int,
    route: int,
    what: Route,
    layout: Layout,
    number: Mapping[str, int],
    scene: Scene,
) -> None:
    node = root
    tree.routes[node][route] = 0
    for leg, item in enumerate(what.items[1:-1], start=1):
        element = layout.elements.get(item.name)
        if element is None:
            return
        branch = item.branch or element.record.DEFAULT_BRANCH or ""
        ways = element.record.branches().get(branch, ())
        if not ways:
            return
        product = _product(element, item)
        left = (node, item.name, branch if product is None else f"{branch} {product}")
        end = tree.ends.get(left)
        if end is None:
            end = tree.ends[left] = tree.new(inside=False)
        for way in ways:
            at = node
            steps = [(scene.face_names.index(face), _EVENT[event]) for face, event in way]
            if product is not None:
                steps.insert(1, (product, CONVERTED))  # between entry and exit
            for step, (face, event) in enumerate(steps):
                key = (at, number[item.name], face, event)
                last = step == len(steps) - 1
                at = tree.steps.setdefault(key, end if last else -1)
                if at < 0:
                    at = tree.steps[key] = tree.new(inside=True)
                tree.routes[at].setdefault(route, leg if last else leg - 1)
        node = end


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
