"""A Faraday rotator: turns polarization in the same sense in space both ways.

.. code-block:: yaml

   F1: {kind: rotator, after: P1, distance: 40, diameter: 12.7, angle: 45}

The field of light that enters the front is turned by `angle` anticlockwise to a viewer
looking at its back face, so the viewer whom that light approaches; as `axis` is measured.
Light that comes back is turned on in the same sense in space: after a double pass by twice
the angle. Between a polarizer at 0 and one at 45 it lets light through one way only. The
angle holds at every wavelength: real ones turn shorter waves further.
"""

from __future__ import annotations

from math import radians

from benchlay.document.forms import Quantity
from benchlay.document.quantity import Dimension
from benchlay.document.record import key
from benchlay.elements._acting import ThinPlate
from benchlay.elements._glass import GLASS
from benchlay.elements._kind import Bulk, Glass

_ANGLE = Quantity(Dimension.ANGLE)


class Rotator(ThinPlate):
    """A Faraday rotator."""

    KIND = "rotator"

    angle_rad: float = key(
        _ANGLE,
        default=radians(45.0),
        name="angle",
        meaning="by which it turns the field, anticlockwise to a viewer looking at its back",
    )
    glass: Glass = key(GLASS, default=Glass("BK7", None), meaning="what it is made of")

    def bulk(self) -> Bulk:
        """Return what happens inside."""
        return Bulk("rotator", turns_rad=self.angle_rad)
