"""The bench: its outline, its heights, its holes, and the medium round it."""

from __future__ import annotations

from typing import Any

from benchlay.document.form import Reader
from benchlay.document.forms import Choice, OneOf, Pair, Quantity, RecordForm, Text
from benchlay.document.quantity import Dimension
from benchlay.document.record import Record, key
from benchlay.geometry.polygon import Point, Polygon
from benchlay.layout._forms import NOT_NEGATIVE, OUTLINE, POINT, POSITIVE

SURFACE_HEIGHT_MM = 900.0  # common practice: a bench to stand at
BEAM_HEIGHT_MM = 100.0  # common practice: the height most posts are made for


class Holes(Record):
    """The grid of mounting holes."""

    pitch_mm: float = key(POSITIVE, name="pitch", meaning="distance between holes")
    first_mm: Point = key(
        POINT, name="first", meaning="x and y of hole [1, 1], the datum of all dimensions"
    )
    thread: str = key(Text(20, sample="M6"), default="M6", meaning="thread of the holes")


class Index(Record):
    """A medium known by its refractive index alone."""

    index: float = key(
        Quantity(Dimension.RATIO, at_least=1.0, at_most=10.0),
        meaning="absolute refractive index, at every wavelength",
    )


class Bench(Record):
    """The bench; `outline` runs anticlockwise, whichever way it was written."""

    size_mm: tuple[float, float] | None = key(
        Pair(POSITIVE), default=None, name="size", meaning="x by y of a rectangular bench"
    )
    outline_mm: Polygon | None = key(
        OUTLINE, default=None, name="outline", meaning="corners of any other bench"
    )
    surface_height_mm: float = key(
        NOT_NEGATIVE,
        default=SURFACE_HEIGHT_MM,
        name="surface_height",
        meaning="height of the bench surface above the floor; eye levels hang on it",
    )
    beam_height_mm: float = key(
        POSITIVE,
        default=BEAM_HEIGHT_MM,
        name="beam_height",
        meaning="z of every optical centre that states none",
    )
    holes: Holes | None = key(RecordForm(Holes), default=None, meaning="the grid of mounting holes")
    medium: Any = key(
        OneOf(Choice("air", "vacuum"), RecordForm(Index)),
        default="air",
        meaning="what the light runs in; air is dry, at 20 °C and 101 325 Pa",
    )

    @property
    def outline(self) -> Polygon:
        """The corners in anticlockwise order, in mm."""
        if self.outline_mm is not None:
            return self.outline_mm
        width, depth = self.size_mm or (0.0, 0.0)
        return ((0.0, 0.0), (width, 0.0), (width, depth), (0.0, depth))

    def after_read(self, reader: Reader) -> None:
        """Ask for size or outline, and only one of them."""
        if (self.size_mm is None) != (self.outline_mm is None):
            return
        both = self.size_mm is not None
        reader.complain(
            self.span_of("outline"),
            "both size and outline are given" if both else "the bench has no size",
            expected="either 'size' or 'outline'",
            remedy="remove one of the two" if both else "add 'size: [1500, 900]', x by y",
        )
