"""An absorbing sheet polarizer.

.. code-block:: yaml

   P1: {kind: polarizer, after: laser, distance: 80, diameter: 25.4, axis: 90, transmits: 88 %}

`axis` is the direction of the light that passes, from horizontal, anticlockwise to a viewer
looking at its back face. `extinction` is the share of the refused component that passes,
relative to that of the passed one. All is internal: the faces reflect besides.
"""

from __future__ import annotations

from typing import ClassVar

from benchlay.document.forms import Quantity
from benchlay.document.quantity import Dimension
from benchlay.document.record import key
from benchlay.elements._acting import ThinPlate
from benchlay.elements._glass import GLASS
from benchlay.elements._kind import Bulk, Glass
from benchlay.elements._shares import SHARE

_ANGLE = Quantity(Dimension.ANGLE)


class Polarizer(ThinPlate):
    """An absorbing sheet polarizer."""

    KIND = "polarizer"
    FAULTS: ClassVar[frozenset[str]] = frozenset(("out", "reversed", "wavelength", "rolled"))

    axis_rad: float = key(_ANGLE, name="axis", meaning="direction of the light that passes")
    transmits: float = key(
        SHARE, default=0.9, meaning="internal share of light along the axis that passes"
    )
    extinction: float = key(
        SHARE,
        default=1e-4,
        meaning="share of the refused component that passes, relative to that",
    )
    glass: Glass = key(GLASS, default=Glass(None, 1.5), meaning="what it is made of")

    def bulk(self) -> Bulk:
        """Return what happens inside."""
        return Bulk(
            "polarizer",
            axis_rad=self.axis_rad,
            passes=self.transmits,
            refused=self.transmits * self.extinction,
        )
