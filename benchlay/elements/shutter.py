"""A shutter: an opening in an opaque plate that can be closed.

.. code-block:: yaml

   S1: {kind: shutter, after: laser, distance: 60, opening: 8, closed: no}
Its plate is 2 mm thick. Closed, it ends on its front whatever meets it; a state may close or
open it.
"""

from __future__ import annotations

from typing import ClassVar

from benchlay.document.form import Reader
from benchlay.document.forms import Pair, YesNo
from benchlay.document.record import key
from benchlay.elements import _through
from benchlay.elements._kind import Branches, ElementKind, Geometry
from benchlay.elements._plates import (
    OPENING,
    PLATE_THICKNESS_MM,
    ask_for_margin,
    opening_geometry,
)
from benchlay.elements._sized import LENGTH, opaque_front
from benchlay.geometry.outline import Outline, circle, rectangle


class Shutter(ElementKind):
    """A shutter."""

    KIND = "shutter"
    BRANCHES: ClassVar[Branches] = _through.OPENING
    DEFAULT_BRANCH = "transmitted"
    BLOCKS = True

    opening: Outline = key(
        OPENING,
        default=circle(5.0),
        meaning="diameter, or width and height, of what opens",
    )
    size_mm: tuple[float, float] = key(
        Pair(LENGTH), default=(50.0, 50.0), name="size", meaning="plate"
    )
    closed: bool = key(YesNo(), default=False, meaning="whether it is closed")

    def after_read(self, reader: Reader) -> None:
        """Refuse an opening as large as the plate."""
        super().after_read(reader)
        ask_for_margin(self.opening, self.size_mm, self, reader)

    def geometry(self) -> Geometry:
        """Return the plate, open or closed."""
        opened = opening_geometry(self.opening, self.size_mm, PLATE_THICKNESS_MM)
        if not self.closed:
            return opened
        return opened._replace(faces=(opaque_front(rectangle(*self.size_mm), "screen"),))

    def interrupts(self) -> bool:
        """Whether it is closed."""
        return self.closed
