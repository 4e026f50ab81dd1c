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

_HALF = 0.5


class Shutter(ElementKind):
    """A shutter."""

    KIND = "shutter"
    FAULTS: ClassVar[frozenset[str]] = frozenset(("stuck",))
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
        return self._closed() if self.closed else self._opened(1.0)

    def _opened(self, share: float) -> Geometry:
        opening = self.opening.stretched((1.0, share))
        return opening_geometry(opening, self.size_mm, PLATE_THICKNESS_MM)

    def _closed(self) -> Geometry:
        front = opaque_front(rectangle(*self.size_mm), "screen")
        return self._opened(1.0)._replace(faces=(front,))

    def stuck(self) -> tuple[tuple[str, Geometry], ...]:
        """Return it open or closed, as it is not, and half way: two blades over half the height."""
        other = ("open", self._opened(1.0)) if self.closed else ("closed", self._closed())
        return (other, ("half way", self._opened(_HALF)))

    def interrupts(self) -> bool:
        """Whether it is closed."""
        return self.closed
