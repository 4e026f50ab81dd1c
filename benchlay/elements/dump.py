"""A beam dump: an absorbing trap behind an opening.

.. code-block:: yaml

   D1: {kind: dump, after: BS1.reflected, distance: 120, opening: 20, withstands: {power: 5 W}}
Its body is a box 5 mm wider than the opening on every side; light that misses the opening
lands on that box. Without `facing` it faces the beam squarely.
"""

from __future__ import annotations

from typing import ClassVar

from benchlay.document.record import key
from benchlay.elements._kind import ElementKind, Geometry, Stroke
from benchlay.elements._shares import SHARE
from benchlay.elements._sized import LENGTH, opaque_front
from benchlay.geometry.outline import circle
from benchlay.geometry.solid import box

WALL_MM = 5.0  # of the box round the opening: common practice


class Dump(ElementKind):
    """A beam dump."""

    KIND = "dump"
    FAULTS: ClassVar[frozenset[str]] = frozenset(("missing",))
    SQUARE = True
    MOUNTED = False
    DARK_MATTERS = False
    BLOCKS = True

    opening_mm: float = key(LENGTH, default=20.0, name="opening", meaning="diameter of the opening")
    length_mm: float = key(
        LENGTH, default=60.0, name="length", meaning="depth of the body behind it"
    )
    returns: float = key(SHARE, default=1e-4, meaning="share that comes back, scattered")

    def geometry(self) -> Geometry:
        """Return the opening in the front of a square box."""
        half = self.opening_mm / 2 + WALL_MM
        opening = opaque_front(circle(self.opening_mm / 2), "dump")._replace(name="opening")
        body = box("body", (-self.length_mm, 0.0), (-half, half), (-half, half))
        gap = self.opening_mm / 2
        strokes = (
            Stroke(
                (
                    (0.0, -half),
                    (0.0, half),
                    (-self.length_mm, half),
                    (-self.length_mm, -half),
                ),
                True,
                "outline",
            ),
            Stroke(((0.0, -gap), (-self.length_mm * 0.8, 0.0), (0.0, gap)), False, "hidden"),
            Stroke(((0.0, -gap), (0.0, gap)), False, "opening"),
        )
        extent = (-self.length_mm, 0.0, half, half)
        return Geometry((opening,), (body,), strokes, extent, post_at=(-self.length_mm / 2, 0.0))
