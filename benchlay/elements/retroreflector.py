"""A corner cube: sends light back the way it came.

.. code-block:: yaml

   R1: {kind: retroreflector, after: M1, distance: 400, diameter: 25.4, reflectance: 98 %}

It is taken as ideal: three plane mirrors at right angles, whatever way they are turned about
the axis. Light leaves antiparallel to how it came, on the opposite side of the apex and as
far from it. The opening is met in the apex plane, which is where the light turns as far as
paths and places go; its reference point is the apex. Each of the three mirrors reflects
`reflectance` (the mean of s and p; without it, or for light of which it says nothing, all),
and what they lose is absorbed. Three ideal mirrors at right angles leave the field as it was
in space, so linear light keeps its direction and circular light changes its hand; a solid
cube without coating alters polarization by total reflection, by sectors, which is not
followed, no more than the reflection of its entry and the longer way in its `glass`.
"""

from __future__ import annotations

from typing import ClassVar

from benchlay.document.record import key
from benchlay.elements._coating import COATING, Coating
from benchlay.elements._glass import GLASS
from benchlay.elements._kind import (
    Acts,
    Branches,
    ElementKind,
    Face,
    Geometry,
    Glass,
    Inside,
    Stroke,
)
from benchlay.elements._shares import USABLE
from benchlay.elements._sized import LENGTH
from benchlay.geometry.outline import circle
from benchlay.geometry.solid import disc

_DEPTH = 0.7  # of the body in diameters: a corner of 45 degrees' slope and its holder
_UNCOATED = Coating("uncoated")


class Retroreflector(ElementKind):
    """A corner cube."""

    KIND = "retroreflector"
    BRANCHES: ClassVar[Branches] = {"reflected": ((("front", "reflected"),),)}
    DEFAULT_BRANCH = "reflected"
    STEERS = False

    diameter_mm: float = key(LENGTH, name="diameter", meaning="of its opening")
    glass: Glass | None = key(GLASS, default=None, meaning="the glass; hollow without")
    reflectance: Coating | None = key(
        COATING, default=None, meaning="of each of its three faces; all without"
    )
    clear: float = key(USABLE, default=0.9, meaning="usable share of the diameter")

    def geometry(self) -> Geometry:
        """Return the opening and the body behind it."""
        half, depth = self.diameter_mm / 2, _DEPTH * self.diameter_mm
        front = Face(
            "front",
            (0.0, 0.0, 0.0),
            (1.0, 0.0, 0.0),
            circle(half),
            circle(half).scaled(self.clear),
            acts=Acts.RETURNS,
            coating=self.reflectance or _UNCOATED,
            inside=Inside.NOWHERE,
        )
        corner = ((0.0, -half), (0.0, half), (-depth, half), (-depth, -half))
        roof = ((0.0, half), (-half, 0.0), (0.0, -half))
        return Geometry(
            (front,),
            (disc("edge", half, (-depth, 0.0)),),
            (
                Stroke(corner, closed=True, role="outline"),
                Stroke(roof, closed=False, role="coated"),
            ),
            (-depth, 0.0, half, half),
        )

    def simplified(self) -> tuple[tuple[str, str], ...]:
        """Tell that a solid cube acts as a hollow one."""
        if self.glass is None:
            return ()
        return (
            (
                "acts as a hollow corner cube: its entry reflects nothing, its glass makes no way "
                "longer, and total reflection turns no polarization",
                "end what its entry sends back, and judge path and polarization by hand",
            ),
        )

    def is_round(self) -> bool:
        """Whether the default mount for round optics fits: it does."""
        return True
