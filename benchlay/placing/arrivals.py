"""Which nominal beam arrives at an item, and which one leaves it."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from typing import TYPE_CHECKING

from benchlay.document.span import Span
from benchlay.named import NamedTuple
from benchlay.placing.nominal import Lost, NominalRay, Standing, scattered, through
from benchlay.placing.pose import add, unit

if TYPE_CHECKING:
    from benchlay.layout.elements import Element
    from benchlay.placing.solve import Solver

_SAME_MM = 1e-6  # nominal rays nearer than this, and as parallel, are one ray
_SAME_DIRECTION = 1e-9
SCATTERED = "scattered"
_DEEPEST = 400  # items of a path looked back along; a longer chain is a fault in the layout


class Unplaceable(Exception):  # a signal between stages, never shown
    """An item has no place; the problem was reported where it arose."""


class Item(NamedTuple):
    """One item of a path with the branch by which it is left."""

    name: str
    branch: str | None
    wavelength_nm: float | None = None


class Choice(NamedTuple):
    """A ray that could be meant, and the path that brings it."""

    path: tuple[Item, ...]
    ray: NominalRay


class Arrivals:
    """Finds nominal rays; remembers them by path."""

    def __init__(self, solver: Solver) -> None:
        self._solver = solver
        self._leaving: dict[tuple[Item, ...], tuple[Choice, ...]] = {}
        self.known: dict[str, NominalRay] = {}
        self.trying = 0

    def at(self, element: Element) -> NominalRay | None:
        """Return the nominal ray that arrives at an element; None if nothing says which.

        Raises
        ------
        Unplaceable
            Where the ray is ambiguous or cannot be found; the problem has been reported.
        """
        choices = list(self._arriving(element))
        if not choices:
            return None
        wanted = element.stand.wavelength_nm
        if wanted is not None:
            everything = choices
            choices = [choice for choice in choices if choice.ray.wavelength_nm == wanted]
            if not choices:
                self._report_no_line(element, wanted, everything)
                raise Unplaceable(element.name)
        distinct = _distinct(choices)
        needs_one_line = element.stand.incidence == "brewster" or element.record.needs_line()
        lines = sorted({choice.ray.wavelength_nm for choice in choices})
        if len(distinct) > 1 or (needs_one_line and len(lines) > 1):
            self._report_ambiguous(element, choices, distinct)
            raise Unplaceable(element.name)
        ray = distinct[0].ray
        self.known[element.name] = ray
        return ray

    def _arriving(self, element: Element) -> Iterator[Choice]:
        stand = element.stand
        if stand.after:
            path = tuple(Item(item.item, item.branch) for item in stand.after)
            found = self.leaving(path)
            if not found:
                self._report_unreachable(element, path)
                raise Unplaceable(element.name)
            for choice in found:
                yield self._aimed(choice, element)
            return
        for prefix in self._prefixes(element.name, None):
            for choice in self._try(prefix):
                yield self._aimed(choice, element)

    def _aimed(self, choice: Choice, element: Element) -> Choice:
        """Send scattered light on to the reference point of what comes next."""
        ray = choice.ray
        if ray.aimed:
            return choice
        at = self._solver.place_of(element)
        way = None if at is None else unit(add(at, ray.point, -1.0))
        if way is None:
            self._report_nowhere(element, choice.path[-1])
            raise Unplaceable(element.name)
        return choice._replace(ray=ray._replace(direction=way, aimed=True))

    def _try(self, path: tuple[Item, ...]) -> tuple[Choice, ...]:
        """Follow a route's path if it can be followed without what is being solved."""
        if any(item.name in self._solver.busy for item in path):
            return ()
        self.trying += 1
        failed = set(self._solver.failed)
        try:
            return self.leaving(path)
        except Unplaceable:
            return ()
        finally:
            self.trying -= 1
            if self.trying:
                self._solver.failed = failed

    def _prefixes(self, name: str, branch: str | None) -> Iterator[tuple[Item, ...]]:
        """Return the ways of routes up to an item, left by a branch (None: any)."""
        for key in sorted(self._solver.layout.routes):
            items = self._solver.layout.routes[key].items
            for i, item in enumerate(items):
                if (
                    i
                    and item.name == name
                    and (branch is None or self._branch(item.name, item.branch) == branch)
                ):
                    yield tuple(Item(o.name, o.branch, o.wavelength_nm) for o in items[:i])

    def _branch(self, name: str, branch: str | None) -> str | None:
        element = self._solver.layout.elements.get(name)
        return branch or (None if element is None else element.record.DEFAULT_BRANCH)

    def leaving(self, path: tuple[Item, ...]) -> tuple[Choice, ...]:
        """Return the rays that leave the last item of a path's tail.

        Raises
        ------
        Unplaceable
            Where an item on the way has no place.
        """
        known = self._leaving.get(path)
        if known is None:
            if len(path) > _DEEPEST:
                raise Unplaceable(path[-1].name)
            known = tuple(self._leave(path))
            self._leaving[path] = known
        return known

    def _leave(self, path: tuple[Item, ...]) -> Iterator[Choice]:
        last = path[-1]
        solver = self._solver
        source = solver.layout.sources.get(last.name)
        if source is not None:
            pose = solver.pose(last.name)
            for line in source.lines:
                if last.wavelength_nm in (None, line.wavelength_nm):
                    yield Choice(path, NominalRay(pose.at, pose.axes()[0], line.wavelength_nm))
            return
        element = solver.layout.elements[last.name]
        standing = Standing(last.name, solver.pose(last.name), solver.geometry(last.name))
        ways = element.record.branches().get(self._branch(last.name, last.branch) or "", ())
        if last.branch == SCATTERED:
            for choice in self._before(path):
                ray = scattered(choice.ray, standing)
                if not isinstance(ray, Lost):
                    yield Choice((*choice.path, last), ray)
            return
        made = [light.wavelength_nm for light in element.record.makes()]
        for choice in self._before(path):
            for nm in (None, *made):
                ray = through(choice.ray, ways, standing, solver.media, nm)
                if isinstance(ray, Lost) or (made and not _leaves_as(last, ray)):
                    continue
                yield Choice((*choice.path, last), ray)

    def _before(self, path: tuple[Item, ...]) -> Iterator[Choice]:
        """Return the rays that arrive at the last item of a path."""
        element = self._solver.layout.elements[path[-1].name]
        for choice in self._to_last(path):
            yield self._aimed(choice, element)

    def _to_last(self, path: tuple[Item, ...]) -> Iterator[Choice]:
        if len(path) > 1:
            yield from self.leaving(path[:-1])
            return
        last = path[0]
        element = self._solver.layout.elements[last.name]
        own: tuple[Item, ...] = ()
        if element.stand.after:
            own = tuple(Item(item.item, item.branch) for item in element.stand.after)
            yield from self.leaving(own)
        for prefix in self._prefixes(last.name, self._branch(last.name, last.branch)):
            if not self._same_tail(prefix, own):
                yield from self._try(prefix)

    def _same_tail(self, prefix: tuple[Item, ...], own: tuple[Item, ...]) -> bool:
        """Tell whether a route comes by the very items that `after` names: the same beam."""
        if not own or len(prefix) < len(own):
            return False
        pairs = zip(prefix[len(prefix) - len(own) :], own, strict=True)
        return all(
            a.name == b.name and self._branch(a.name, a.branch) == self._branch(b.name, b.branch)
            for a, b in pairs
        )

    def _report_no_line(self, element: Element, wanted: float, choices: Sequence[Choice]) -> None:
        lines = sorted({choice.ray.wavelength_nm for choice in choices})
        which = "; ".join(f"wavelength: {line:g}" for line in lines)
        self._solver.problems.add(
            _where(element, "wavelength"),
            f"no light of {wanted:g} nm arrives at {element.name!r}",
            expected=f"one of these: {which}",
            remedy=f"write the line that is meant, such as `wavelength: {lines[0]:g}`",
        )

    def _report_ambiguous(
        self, element: Element, choices: Sequence[Choice], distinct: Sequence[Choice]
    ) -> None:
        paths = sorted({_written(choice.path) for choice in distinct})
        lines = sorted({choice.ray.wavelength_nm for choice in choices})
        if len(paths) > 1:
            which = "; ".join(f"after: {path}" for path in paths)
            remedy = f"write the path that is meant, such as `after: {paths[0]}`"
        else:
            which = "; ".join(f"wavelength: {line:g}" for line in lines)
            remedy = f"add the line that is meant, such as `wavelength: {lines[0]:g}`"
        self._solver.problems.add(
            _where(element, "after"),
            f"more than one beam could be meant to arrive at {element.name!r}",
            expected=f"one of these: {which}",
            remedy=remedy,
        )

    def _report_nowhere(self, element: Element, last: Item) -> None:
        if self.trying:
            return
        self._solver.problems.add(
            _where(element, "after"),
            f"light scattered by {last.name!r} goes everywhere: it does not say where "
            f"{element.name!r} stands",
            expected="a place of its own, away from where the light is scattered",
            remedy="give `at` beside `after`, instead of `distance`",
        )

    def _report_unreachable(self, element: Element, path: tuple[Item, ...]) -> None:
        last = path[-1]
        lost = self._why_lost(path)
        self._solver.problems.add(
            _where(element, "after"),
            f"no nominal beam leaves {_label(last)!r} towards {element.name!r}: {lost.why}",
            expected="an item that a beam reaches and leaves by that branch",
            remedy=lost.mend
            or "name another item or branch in `after`, or see that a beam arrives at "
            f"{last.name!r}",
        )

    def _why_lost(self, path: tuple[Item, ...]) -> Lost:
        last = path[-1]
        element = self._solver.layout.elements.get(last.name)
        if element is None:
            return Lost("it emits nothing of that wavelength")
        standing = Standing(
            last.name, self._solver.pose(last.name), self._solver.geometry(last.name)
        )
        branch = self._branch(last.name, last.branch)
        ways = element.record.branches().get(branch or "", ())
        if not ways:
            none = f"it has no branch {branch!r}" if branch else "it does not say by which branch"
            return Lost(none)
        reasons = [
            through(choice.ray, ways, standing, self._solver.media) for choice in self._before(path)
        ]
        lost = next((reason for reason in reasons if isinstance(reason, Lost)), None)
        return lost or Lost(
            f"nothing says which beam arrives at {last.name!r}: "
            "give it `after`, or name it in a route"
        )


def _leaves_as(item: Item, ray: NominalRay) -> bool:
    """Tell whether light of a converter is what a path goes on with."""
    return item.wavelength_nm in (None, ray.wavelength_nm)


def _distinct(choices: Sequence[Choice]) -> list[Choice]:
    found: list[Choice] = []
    for choice in choices:
        if not any(_same(choice.ray, other.ray) for other in found):
            found.append(choice)
    return found


def _same(a: NominalRay, b: NominalRay) -> bool:
    turned = max(abs(x - y) for x, y in zip(a.direction, b.direction, strict=True))
    moved = max(abs(x - y) for x, y in zip(a.point, b.point, strict=True))
    return turned < _SAME_DIRECTION and moved < _SAME_MM


def _label(item: Item) -> str:
    if item.branch:
        return f"{item.name}.{item.branch}"
    return item.name if item.wavelength_nm is None else f"{item.name}.{item.wavelength_nm:g}"


def _written(path: tuple[Item, ...]) -> str:
    return "[" + ", ".join(_label(item) for item in path) + "]"


def _where(element: Element, key: str) -> Span:
    return element.spans.get(key, element.span)
