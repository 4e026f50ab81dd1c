"""A beam-splitter cube: a dividing diagonal between two prisms.

.. code-block:: yaml

   PBS: {kind: cube, after: laser, distance: 100, reflectance: {s: 99.5 %, p: 2 %}, sends: left}

Its reference point is its centre. The length of its edges is `side`, or `edge`: a cube that is
turned by `incidence` to a given `side` (a word, left or right) gives its length as `edge`.
`sends` is where light that enters the front is reflected
to, as that light sees it; faces are named in the element's own frame, where left is
anticlockwise of the front normal seen from above. Top and bottom are ground and end what
reaches them. Say `PBS.reflected` or `PBS.transmitted` where a beam goes on from it.
"""

from __future__ import annotations

from math import sqrt
from typing import ClassVar

from benchlay.document.form import Reader
from benchlay.document.forms import Choice
from benchlay.document.record import key
from benchlay.elements._coating import COATING, REFLECTANCE, UNCOATED, Coating
from benchlay.elements._glass import GLASS
from benchlay.elements._kind import (
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
from benchlay.geometry.outline import rectangle
from benchlay.geometry.solid import box

_ACROSS = {"front": "back", "back": "front", "left": "right", "right": "left"}
_TURNED = {
    # Light into the front travels along -x; its left is the element's right.
    "left": {"front": "right", "right": "front", "back": "left", "left": "back"},
    "right": {"front": "left", "left": "front", "back": "right", "right": "back"},
}


def _ways(exits: dict[str, str], event: str) -> tuple[tuple[tuple[str, str], ...], ...]:
    return tuple(
        ((entry, "transmitted"), ("diagonal", event), (leave, "transmitted"))
        for entry, leave in exits.items()
    )


class Cube(ElementKind):
    """A beam-splitter cube."""

    KIND = "cube"
    FAULTS: ClassVar[frozenset[str]] = frozenset(("out", "reversed", "wavelength", "rolled"))
    BRANCHES: ClassVar[Branches] = {
        "transmitted": _ways(_ACROSS, "transmitted"),
        "reflected": (),
    }

    side_mm: float = key(LENGTH, default=25.4, name="side", meaning="length of its edges")
    edge_mm: float | None = key(
        LENGTH, default=None, name="edge", meaning="the same, where `side` is that of `incidence`"
    )
    reflectance: Coating = key(
        REFLECTANCE, meaning="reflected share of the diagonal; the rest goes straight on"
    )
    sends: str = key(
        Choice("left", "right"),
        default="left",
        meaning="where light into the front is reflected to",
    )
    faces: Coating = key(COATING, default=UNCOATED, meaning="coating of the outer faces")
    glass: Glass = key(GLASS, default=Glass("BK7", None), meaning="the two prisms")
    clear: float = key(USABLE, default=0.9, meaning="usable share of the outer faces")

    def after_read(self, reader: Reader) -> None:
        """Refuse two lengths."""
        super().after_read(reader)
        if self.written("side") and self.written("edge"):
            reader.complain(
                self.span_of("edge"),
                "the length of the cube's edges is given twice",
                expected="a number as 'side' or as 'edge'",
                remedy="remove one of them",
            )

    def length_mm(self) -> float:
        """Return the length of its edges."""
        return self.side_mm if self.edge_mm is None else self.edge_mm

    def branches(self) -> Branches:
        """Return the ways through this cube, which hang on where it sends the light."""
        return {**self.BRANCHES, "reflected": _ways(_TURNED[self.sends], "reflected")}

    def geometry(self) -> Geometry:
        """Return four outer faces, the diagonal and the block."""
        edge = self.length_mm()
        half, outline = edge / 2, rectangle(edge, edge)
        clear = outline.scaled(self.clear)
        outer = tuple(
            Face(
                name,
                (half * x, half * y, 0.0),
                (x, y, 0.0),
                outline,
                clear,
                coating=self.faces,
            )
            for name, x, y in (
                ("front", 1.0, 0.0),
                ("back", -1.0, 0.0),
                ("left", 0.0, 1.0),
                ("right", 0.0, -1.0),
            )
        )
        slant = -1.0 if self.sends == "left" else 1.0
        long = rectangle(edge * sqrt(2), edge)
        diagonal = Face(
            "diagonal",
            (0.0, 0.0, 0.0),
            (1 / sqrt(2), slant / sqrt(2), 0.0),
            long,
            long,
            coating=self.reflectance,
            inside=Inside.BOTH,
        )
        block = box("edge", (-half, half), (-half, half), (-half, half))
        square = ((half, -half), (half, half), (-half, half), (-half, -half))
        cut = ((-half, -half), (half, half)) if slant < 0 else ((-half, half), (half, -half))
        strokes = (
            Stroke(square, closed=True, role="outline"),
            Stroke(cut, closed=False, role="coated"),
        )
        return Geometry(
            (*outer, diagonal),
            (block,),
            strokes,
            (-half, half, half, half),
            glass=self.glass,
        )

    def glass_of(self) -> Glass:
        """Return the glass of the prisms."""
        return self.glass
