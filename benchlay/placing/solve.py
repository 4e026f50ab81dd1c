"""Solves every pose once, along the nominal chief ray."""

from __future__ import annotations

from benchlay.document.problems import Problems
from benchlay.elements._kind import Geometry
from benchlay.elements.mount import holder
from benchlay.layout.elements import Element
from benchlay.layout.layout import Layout, LayoutSource
from benchlay.layout.names import AS_DRAWN
from benchlay.layout.sources import Source
from benchlay.placing.arrivals import Arrivals, Unplaceable
from benchlay.placing.media import Media
from benchlay.placing.nominal import NominalRay
from benchlay.placing.placed import Placed, PlacedElement, PlacedSource, PlacedState
from benchlay.placing.points import fixed_point
from benchlay.placing.pose import Pose, Vector
from benchlay.placing.standing import stand_element, stand_source
from benchlay.placing.surroundings import Surroundings

POSE_KEYS = frozenset(
    (
        "at",
        "hole",
        "in",
        "distance",
        "height",
        "facing",
        "heading",
        "pitch",
        "turn",
        "aim",
        "incidence",
        "side",
        "beam_at",
        "wavelength",
        "to",
    )
)
"""Keys that, set by a state, re-solve the pose of their item alone."""


class Solver:
    """Poses by name, each solved when it is first asked for."""

    def __init__(self, layout: Layout, problems: Problems) -> None:
        self.layout = layout
        self.problems = problems
        medium = layout.bench.medium
        self.media = Media(medium if isinstance(medium, str) else float(medium.index))
        self.poses: dict[str, Pose] = {}
        self.failed: set[str] = set()
        self.busy: list[str] = []
        self.geometries: dict[str, Geometry] = {}
        self.arrivals = Arrivals(self)

    def geometry(self, name: str) -> Geometry:
        """Return the geometry of an element, made once."""
        found = self.geometries.get(name)
        if found is None:
            element = self.layout.elements[name]
            found = element.record.geometry_on(Surroundings(element, self))
            self.geometries[name] = found
        return found

    def pose(self, name: str) -> Pose:
        """Return the nominal pose of a source or element.

        Raises
        ------
        Unplaceable
            Where it cannot be solved; the problem has been reported.
        """
        known = self.poses.get(name)
        if known is not None:
            return known
        if name in self.failed:
            raise Unplaceable(name)
        if name in self.busy:
            self._report_cycle(name)
            raise Unplaceable(name)
        self.busy.append(name)
        try:
            solved = self.solve(name)
        except Unplaceable:
            self.failed.add(name)
            raise
        finally:
            self.busy.pop()
        self.poses[name] = solved
        return solved

    def place_of(self, element: Element) -> Vector | None:
        """Return where an element stands, if that does not hang on a ray; None otherwise."""
        known = self.poses.get(element.name)
        return known.at if known is not None else fixed_point(element.stand, self)

    def solve(self, name: str) -> Pose:
        """Solve one pose, whatever is known of it already."""
        source = self.layout.sources.get(name)
        if source is not None:
            return stand_source(source, self)
        return stand_element(self.layout.elements[name], self)

    def _item(self, name: str) -> Source | Element:
        return self.layout.sources.get(name) or self.layout.elements[name]

    def _report_cycle(self, name: str) -> None:
        ring = [*self.busy[self.busy.index(name) :], name]
        self.failed.update(ring)
        if self.arrivals.trying:
            return
        self.problems.add(
            self._item(name).span,
            "these places hang on one another: " + " → ".join(ring),
            expected="places that lead back to a source, or to `at` with `facing`",
            remedy=f"give one of them, such as {name!r}, a place of its own: `at` and `facing`",
        )

    def solve_all(self) -> None:
        """Solve every pose, reporting all that cannot be solved."""
        for name in (*sorted(self.layout.sources), *sorted(self.layout.elements)):
            try:
                self.pose(name)
                if name in self.layout.elements:
                    self.geometry(name)
            except Unplaceable:
                self.failed.add(name)


def place(layouts: LayoutSource, problems: Problems) -> Placed | None:
    """Place every source and element in every state; None after problems.

    Poses are solved once, for the bench as drawn and with offsets and errors at rest. A
    state that sets a pose key re-solves that item alone, from the nominal ray.
    """
    base_layout = layouts.as_drawn
    solver = Solver(base_layout, problems)
    solver.solve_all()
    if problems:
        return None
    base = _state(AS_DRAWN, base_layout, solver, None)
    states = [base]
    for name, layout in layouts.layouts.items():
        if name != AS_DRAWN:
            states.append(_state(name, layout, solver, base))
    if problems:
        return None
    return Placed(layouts, tuple(states), _nominal_arrivals(solver), solver.media)


def _nominal_arrivals(solver: Solver) -> dict[str, NominalRay]:
    found = ((name, solver.arrivals.known.get(name)) for name in sorted(solver.layout.elements))
    return {name: ray for name, ray in found if ray is not None}


def _state(name: str, layout: Layout, solver: Solver, base: PlacedState | None) -> PlacedState:
    sources: dict[str, PlacedSource] = {}
    for key in sorted(layout.sources):
        touched = layout.overridden.get(f"sources.{key}", frozenset())
        if base is not None and not touched:
            sources[key] = base.sources[key]
            continue
        source = layout.sources[key]
        pose = _pose_in_state(source, touched, solver)
        sources[key] = PlacedSource(source, _moved(pose, source))
    elements: dict[str, PlacedElement] = {}
    for key in sorted(layout.elements):
        touched = layout.overridden.get(f"elements.{key}", frozenset())
        if base is not None and not touched:
            elements[key] = base.elements[key]
            continue
        element = layout.elements[key]
        nominal = _pose_in_state(element, touched, solver)
        geometry = solver.geometry(key) if not touched else _geometry(element, nominal, solver)
        pose = _moved(nominal, element)
        held = holder(element.record, geometry, element.mount, pose.at[2])
        elements[key] = PlacedElement(element, pose, geometry, held)
    return PlacedState(name, layout, sources, elements)


def _geometry(element: Element, nominal: Pose, solver: Solver) -> Geometry:
    try:
        return element.record.geometry_on(Surroundings(element, solver, nominal))
    except Unplaceable:
        return solver.geometry(element.name)  # the problem has been reported


def _pose_in_state(item: Source | Element, touched: frozenset[str], solver: Solver) -> Pose:
    if not touched & POSE_KEYS:
        return solver.poses[item.name]
    try:
        if isinstance(item, Source):
            return stand_source(item, solver)
        return stand_element(item, solver)
    except Unplaceable:
        return solver.poses[item.name]  # the problem has been reported


def _moved(pose: Pose, item: Source | Element) -> Pose:
    stand = item.stand
    along, left, up = stand.offset_mm
    return pose.moved((along, left, up), stand.yaw_error_rad, stand.pitch_error_rad)
