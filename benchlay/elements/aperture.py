"""An opening in an opaque plate: a pinhole, an iris, a slit.

.. code-block:: yaml

   A1: {kind: aperture, after: laser, distance: 50, opening: 3}
The opening is in the middle of the front; light beside it ends on the plate.
"""

from __future__ import annotations

from typing import ClassVar

from benchlay.document.form import Reader
from benchlay.document.forms import Pair
from benchlay.document.record import key
from benchlay.elements import _through
from benchlay.elements._kind import Branches, ElementKind, Geometry
from benchlay.elements._plates import OPENING, ask_for_margin, opening_geometry
from benchlay.elements._sized import LENGTH
from benchlay.geometry.outline import Outline


class Aperture(ElementKind):
    """An opening in an opaque plate."""

    KIND = "aperture"
    FAULTS: ClassVar[frozenset[str]] = frozenset(("out",))
    BRANCHES: ClassVar[Branches] = _through.OPENING
    DEFAULT_BRANCH = "transmitted"

    opening: Outline = key(OPENING, meaning="diameter, or width and height, of what is open")
    size_mm: tuple[float, float] = key(
        Pair(LENGTH), default=(50.0, 50.0), name="size", meaning="plate"
    )
    thickness_mm: float = key(
        LENGTH, default=2.0, name="thickness", meaning="of the plate, behind its front"
    )

    def after_read(self, reader: Reader) -> None:
        """Refuse an opening as large as the plate."""
        super().after_read(reader)
        ask_for_margin(self.opening, self.size_mm, self, reader)

    def geometry(self) -> Geometry:
        """Return the plate with its opening."""
        return opening_geometry(self.opening, self.size_mm, self.thickness_mm)
