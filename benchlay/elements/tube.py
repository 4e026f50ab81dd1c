"""An opaque beam tube between two points.

.. code-block:: yaml

   B1: {kind: tube, at: [300, 450], to: [700, 450], bore: 20}

Its reference point is the middle of its entry. `to` is where it ends: a point, at the height
of the entry, or the name of a source or element, whose reference point it reaches at that
item's own height. It lies along its own axis, so it takes no `facing`; its entry is `front`,
its exit `back`. Light inside that meets its wall ends on it, and so does light that meets it
from outside. Its wall is 2 mm thick; a post stands behind its entry.
"""

from __future__ import annotations

from typing import Any, ClassVar

from benchlay.document.forms import Fixed, OneOf, Quantity, Text
from benchlay.document.quantity import Dimension
from benchlay.document.record import key
from benchlay.elements import _through
from benchlay.elements._kind import (
    Around,
    Branches,
    ElementKind,
    Face,
    Geometry,
    Goal,
    Stroke,
)
from benchlay.elements._sized import LENGTH
from benchlay.geometry.outline import circle
from benchlay.geometry.solid import disc

WALL_MM = 2.0  # common practice
_POST_BEHIND_MM = 10.0
_ANY_LENGTH_MM = 100.0  # where its length is not asked for


class Tube(ElementKind):
    """An opaque beam tube."""

    KIND = "tube"
    FAULTS: ClassVar[frozenset[str]] = frozenset(("missing",))
    BRANCHES: ClassVar[Branches] = {"transmitted": _through.TRANSMITTED}
    DEFAULT_BRANCH = "transmitted"
    MOUNTED = False
    DARK_MATTERS = False
    BLOCKS = True

    bore_mm: float = key(LENGTH, name="bore", meaning="inner diameter")
    to: Any = key(
        OneOf(Fixed(Quantity(Dimension.LENGTH), 2), Text()),
        meaning="where it ends: a point, or the name of a source or element",
    )
    material: str | None = key(
        Text(), default=None, meaning="what it is made of (a name under `materials`)"
    )

    def leads_to(self) -> Goal:
        """Return where it ends."""
        goal: Goal = self.to
        return goal

    def geometry(self) -> Geometry:
        """Return a tube of some length: what holds it does not hang on how long it is."""
        return self._long(_ANY_LENGTH_MM)

    def geometry_on(self, around: Around) -> Geometry:
        """Return the tube as long as it is to its end."""
        return self._long(around.distance_mm(self.to))

    def _long(self, length_mm: float) -> Geometry:
        bore, outer = self.bore_mm / 2, self.bore_mm / 2 + WALL_MM
        ends = (("front", 0.0, 1.0), ("back", -length_mm, -1.0))
        # Its inside is of the bench's medium, so that its ends part nothing: mere openings.
        mouths = tuple(
            Face(name, (x, 0.0, 0.0), (way, 0.0, 0.0), circle(outer), circle(bore), beside="body")
            for name, x, way in ends
        )
        walls = tuple(
            Stroke(
                ((0.0, y), (0.0, z), (-length_mm, z), (-length_mm, y)),
                closed=True,
                role="outline",
            )
            for y, z in ((bore, outer), (-bore, -outer))
        )
        open_ends = tuple(
            Stroke(((x, -bore), (x, bore)), closed=False, role="opening") for _, x, _ in ends
        )
        return Geometry(
            mouths,
            (disc("edge", outer, (-length_mm, 0.0)),),
            (*walls, *open_ends),
            (-length_mm, 0.0, outer, outer),
            material=self.material,
            post_at=(-_POST_BEHIND_MM, 0.0),
            barrel="body",
        )
