"""What an element learns of the bench that it stands on, where its shape hangs on it."""

from __future__ import annotations

from math import dist
from typing import TYPE_CHECKING

from benchlay.elements._kind import Around, Glass, Goal
from benchlay.placing.complaints import no_ray
from benchlay.placing.points import goal_of
from benchlay.placing.pose import Pose
from benchlay.placing.standing import index_of

if TYPE_CHECKING:
    from benchlay.layout.elements import Element
    from benchlay.placing.solve import Solver


class Surroundings(Around):
    """Answers for one element from the nominal poses, its own being another in some states.

    All raise Unplaceable where they cannot answer; the problem has been reported.
    """

    def __init__(self, element: Element, solver: Solver, own: Pose | None = None) -> None:
        self._element, self._solver, self._own = element, solver, own

    def distance_mm(self, goal: Goal) -> float:
        """Return how far it is from the element's reference point to its goal."""
        at = (self._own or self._solver.pose(self._element.name)).at
        return dist(at, goal_of(goal, at, self._solver))

    def relative_index(self, glass: Glass) -> float:
        """Return the index of a glass in the bench's medium, for the light that arrives."""
        ray = self._solver.arrivals.at(self._element)
        if ray is None:
            no_ray(self._element, self._solver)
        inside = index_of(glass, ray, self._element, self._solver)
        return inside / self._solver.media.index(None, ray.wavelength_nm)
