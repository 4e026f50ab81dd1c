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

# Twenty times the holes of the largest bench in the trade (5 m x 1.5 m, a hole every 25 mm):
# more is a slip in the pitch, and would take minutes to draw.
_MOST_HOLES = 250_000
_ROUNDING_MM = 1e-6


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
        """Ask for size or outline, and only one of them, and for holes that the bench can have."""
        if (self.size_mm is None) != (self.outline_mm is None):
            if self.holes is not None:
                self._check_holes(self.holes, reader)
            return
        both = self.size_mm is not None
        reader.complain(
            self.span_of("outline"),
            "both size and outline are given" if both else "the bench has no size",
            expected="either 'size' or 'outline'",
            remedy="remove one of the two" if both else "add 'size: [1500, 900]', x by y",
        )

    def _check_holes(self, holes: Holes, reader: Reader) -> None:
        xs, ys = zip(*self.outline, strict=True)
        low, high = (min(xs), min(ys)), (max(xs), max(ys))
        count = (high[0] - low[0]) / holes.pitch_mm * (high[1] - low[1]) / holes.pitch_mm
        if count > _MOST_HOLES:
            reader.complain(
                holes.spans["pitch"],
                f"a hole every {holes.pitch_mm:g} mm makes {count:.3g} holes",
                expected=f"at most {_MOST_HOLES} holes in a bench",
                remedy="check the unit of the pitch (a bare number is in mm), or leave 'holes' out",
            )
        if not all(
            a - _ROUNDING_MM <= c <= b + _ROUNDING_MM
            for a, b, c in zip(low, high, holes.first_mm, strict=True)
        ):
            reader.complain(
                holes.spans["first"],
                "the first hole is not on the bench",
                expected=f"a point from {list(low)} to {list(high)}",
                remedy="give the hole that is nearest to the bench's near left corner",
            )
