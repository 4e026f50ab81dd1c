"""Points that items name or stand at without any ray: in plan, in openings, of other items."""

from __future__ import annotations

from typing import TYPE_CHECKING

from benchlay.elements._kind import Goal
from benchlay.layout._forms import Ref
from benchlay.layout.stand import Place
from benchlay.placing.pose import Vector

if TYPE_CHECKING:
    from benchlay.layout.enclosure import Panel
    from benchlay.layout.pose_forms import OpeningRef
    from benchlay.placing.solve import Solver

_IN_SPACE = 3  # coordinates of a point that says its own height


def fixed_point(stand: Place, solver: Solver) -> Vector | None:
    """Return where an item stands that says so itself; None where a ray or a hole tells."""
    height = solver.layout.bench.beam_height_mm if stand.height_mm is None else stand.height_mm
    if stand.at_mm is not None:
        x, y = stand.at_mm[0], stand.at_mm[1]
        if len(stand.at_mm) == _IN_SPACE and stand.height_mm is None:
            height = stand.at_mm[2]
        return (x, y, height)
    if stand.in_opening is not None:
        return _in_opening(stand.in_opening, stand.height_mm, solver)
    return None


def panel_of(opening: OpeningRef, solver: Solver) -> Panel:
    """Return the panel that an opening is in."""
    assert solver.layout.enclosure is not None  # an opening was found by its name in it
    return solver.layout.enclosure.panels[opening.panel]


def _in_opening(opening: OpeningRef, height_mm: float | None, solver: Solver) -> Vector:
    panel = panel_of(opening, solver)
    start, end, low, high = panel.openings[opening.opening].box_mm()
    share = (start + end) / 2 / panel.length_mm
    x = panel.from_mm[0] + share * (panel.to_mm[0] - panel.from_mm[0])
    y = panel.from_mm[1] + share * (panel.to_mm[1] - panel.from_mm[1])
    return (x, y, (low + high) / 2 if height_mm is None else height_mm)


def goal_of(goal: Goal, own: Vector, solver: Solver) -> Vector:
    """Return where something at a point leads to: level for a point, else the item's own height."""
    return _reference_point(goal, solver) if isinstance(goal, str) else (*goal, own[2])


def point_meant(meant: Ref | tuple[float, ...], solver: Solver) -> Vector:
    """Return a point that is named or written; one in plan is meant at beam height."""
    if isinstance(meant, Ref):
        return _reference_point(meant.name, solver)
    if len(meant) == _IN_SPACE:
        return (meant[0], meant[1], meant[2])
    return (meant[0], meant[1], solver.layout.bench.beam_height_mm)


def _reference_point(name: str, solver: Solver) -> Vector:
    """Return where something stands; what has a place of its own need not be turned first."""
    if name not in solver.poses:
        named = solver.layout.sources.get(name) or solver.layout.elements[name]
        fixed = fixed_point(named.stand, solver)
        if fixed is not None:
            return fixed
    return solver.pose(name).at
