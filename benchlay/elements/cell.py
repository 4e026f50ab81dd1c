"""A cell: a tube closed by two windows, filled with a gas or a liquid.

.. code-block:: yaml

   C1:
     kind: cell
     after: laser
     distance: 200
     length: 300
     bore: 20
     windows: {incidence: 5, glass: fused-silica, thickness: 3}

Its reference point is the middle of the entry window's outer face; `length` runs from there
to the middle of the exit window's outer face. The windows are tilted in plan: the entry sends
its reflection to the left of the light, the exit stands as its mirror image (so that the
shifts of the two cancel) or, with `set: parallel`, parallel to it. `brewster` is the angle of
their glass for the light that arrives. Without `fill` it holds the bench's own medium. Faces
are `entry.front`, `entry.back`, `exit.front` (inside) and `exit.back`. Light inside the fill
ends on the tube's wall (2 mm thick) where it meets no window; the unused annulus of a window
is its rim.
"""

from __future__ import annotations

from math import atan, cos, radians, sin, tan
from typing import ClassVar

from benchlay.document.form import Reader
from benchlay.document.forms import Choice, OneOf, Quantity, RecordForm
from benchlay.document.quantity import Dimension
from benchlay.document.record import Record, key
from benchlay.elements._coating import COATING, UNCOATED, Coating
from benchlay.elements._glass import GLASS
from benchlay.elements._kind import (
    Around,
    Branches,
    ElementKind,
    Face,
    Geometry,
    Glass,
    Inside,
    Stroke,
    Volume,
)
from benchlay.elements._shares import USABLE
from benchlay.elements._sized import LENGTH
from benchlay.elements.tube import WALL_MM
from benchlay.geometry.outline import Outline, circle
from benchlay.geometry.solid import Solid, Vector, disc

_MOST_RAD = radians(80.0)
_TILT = Quantity(Dimension.ANGLE, at_least=0.0, at_most=_MOST_RAD)
_ANY_RAD = radians(56.0)  # Brewster's angle of glass, near enough where nobody asks for it
_ENTRY, _FILL, _EXIT = range(3)
_FORTH = (
    ("entry.front", "transmitted"),
    ("entry.back", "transmitted"),
    ("exit.front", "transmitted"),
    ("exit.back", "transmitted"),
)


class CellWindows(Record):
    """The two windows of a cell."""

    incidence: float | str = key(
        OneOf(Choice("brewster"), _TILT),
        default=0.0,
        meaning="angle, or `brewster`; tilted in plan",
    )
    glass: Glass = key(GLASS, default=Glass("fused-silica", None), meaning="their glass")
    thickness_mm: float = key(LENGTH, default=3.0, name="thickness", meaning="of each")
    diameter_mm: float | None = key(
        LENGTH,
        default=None,
        name="diameter",
        meaning="of each; by default its usable part covers the bore",
    )
    front: Coating = key(COATING, default=UNCOATED, meaning="coating of the outer faces")
    back: Coating = key(COATING, default=UNCOATED, meaning="coating of the inner faces")
    set: str = key(
        Choice("mirrored", "parallel"),
        default="mirrored",
        meaning="how the two are tilted",
    )


class Cell(ElementKind):
    """A tube with two windows."""

    KIND = "cell"
    BRANCHES: ClassVar[Branches] = {
        "transmitted": (_FORTH, tuple(reversed(_FORTH))),
        "reflected": ((("entry.front", "reflected"),), (("exit.back", "reflected"),)),
    }
    DEFAULT_BRANCH = "transmitted"

    length_mm: float = key(LENGTH, name="length", meaning="between the outer faces")
    bore_mm: float = key(LENGTH, name="bore", meaning="inner diameter")
    windows: CellWindows = key(
        RecordForm(CellWindows), default=CellWindows(), meaning="the two windows"
    )
    fill: Glass | None = key(
        GLASS,
        default=None,
        meaning="what it is filled with; the bench's medium without",
    )
    clear: float = key(USABLE, default=0.9, meaning="usable share of the windows")

    def after_read(self, reader: Reader) -> None:
        """Ask for windows that cover the bore, and for some room between them."""
        super().after_read(reader)
        tilt = self._stated_tilt()
        if tilt is not None:
            self._ask_for_room(tilt, reader)

    def _ask_for_room(self, tilt: float, reader: Reader) -> None:
        w = self.windows
        needed = self.bore_mm / cos(tilt)
        if w.diameter_mm is not None and w.diameter_mm < needed:
            reader.complain(
                self.span_of("windows"),
                f"windows of {w.diameter_mm:g} mm do not cover a bore of {self.bore_mm:g} mm",
                expected=f"a 'diameter' of {needed:.4g} mm or more at this tilt",
                remedy="write a larger 'diameter', or leave it out",
            )
        least = 2 * w.thickness_mm / cos(tilt) + self.bore_mm * tan(tilt)
        if self.length_mm <= least:
            reader.complain(
                self.span_of("length"),
                "the two windows would meet inside",
                expected=f"a length above {least:.4g} mm for these windows",
                remedy=f"set 'length' to {least + 1:.0f} or more",
            )

    def needs_line(self) -> bool:
        """Whether its windows stand at Brewster's angle."""
        return self._stated_tilt() is None

    def _stated_tilt(self) -> float | None:
        """Return the angle of the windows; None for Brewster's, which hangs on the light."""
        incidence = self.windows.incidence
        return None if isinstance(incidence, str) else incidence

    def glass_of(self) -> Glass:
        """Return the glass of the windows."""
        return self.windows.glass

    def geometry(self) -> Geometry:
        """Return the cell, as if nobody asked for the very angle of Brewster windows."""
        tilt = self._stated_tilt()
        return self._tilted(_ANY_RAD if tilt is None else tilt)

    def geometry_on(self, around: Around) -> Geometry:
        """Return the cell with its windows at their angle for the light that arrives."""
        if self.needs_line():
            return self._tilted(atan(around.relative_index(self.windows.glass)))
        return self.geometry()

    def _tilted(self, tilt: float) -> Geometry:
        w = self.windows
        diameter = w.diameter_mm or self.bore_mm / cos(tilt) / self.clear
        window = circle(diameter / 2)
        mirrored = w.set == "mirrored"
        # The front's normal turned clockwise: the reflection goes to the light's own left.
        entry = _Window((0.0, 0.0, 0.0), (cos(tilt), -sin(tilt), 0.0), w.thickness_mm)
        leaning = -sin(tilt) if mirrored else sin(tilt)
        leave = _Window((-self.length_mm, 0.0, 0.0), (-cos(tilt), leaning, 0.0), w.thickness_mm)
        clear = window.scaled(self.clear)
        bore = self._bore(tilt, clear)
        faces = (
            entry.outer("entry.front", (window, clear), w.front, _ENTRY),
            entry.inner("entry.back", (window, bore), w.back, _ENTRY),
            leave.inner("exit.front", (window, bore), w.back, _EXIT),
            leave.outer("exit.back", (window, clear), w.front, _EXIT),
        )
        wall = self.bore_mm / 2 + WALL_MM
        # Its ends lie wholly behind the windows.
        end = min(w.thickness_mm / cos(tilt) + wall * tan(tilt), 0.45 * self.length_mm)
        body = disc("body", wall, (end - self.length_mm, -end))
        strokes = self._strokes((entry, leave), diameter / 2, wall, end)
        half_width = max(wall, *(abs(y) for stroke in strokes for _, y in stroke.points))
        return Geometry(
            faces,
            (body, entry.edge(diameter / 2), leave.edge(diameter / 2)),
            strokes,
            (-self.length_mm, 0.0, half_width, max(wall, diameter / 2)),
            glass=w.glass,
            further=(Volume(self.fill, barrel="body"), Volume(w.glass)),
        )

    def _bore(self, tilt: float, clear: Outline) -> Outline:
        """Return the bore as it stands on a tilted window, no larger than its usable part."""
        across, up = self.bore_mm / 2 / cos(tilt), self.bore_mm / 2
        return circle(1.0).stretched((min(across, clear.radii[0]), min(up, clear.radii[1])))

    def _strokes(
        self, windows: tuple[_Window, _Window], half: float, wall: float, end: float
    ) -> tuple[Stroke, ...]:
        sides = tuple(
            Stroke(((-end, y), (end - self.length_mm, y)), closed=False, role="outline")
            for y in (wall, -wall)
        )
        return (*(window.stroke(half) for window in windows), *sides)


class _Window:
    """One window: the middle of its outer face, that face's outward normal, its thickness."""

    def __init__(self, middle: Vector, normal: Vector, thickness_mm: float) -> None:
        self.middle, self.normal, self.thickness_mm = middle, normal, thickness_mm

    def _inside(self) -> tuple[Vector, Vector]:
        (x, y, z), (a, b, c), t = self.middle, self.normal, self.thickness_mm
        return (x - t * a, y - t * b, z - t * c), (-a, -b, -c)

    def outer(
        self, name: str, outlines: tuple[Outline, Outline], coating: Coating, glass: int
    ) -> Face:
        """Return the outer face: (outline, clear region) and the number of its volume."""
        return Face(
            name, self.middle, self.normal, *outlines, coating=coating, volumes=(glass, glass)
        )

    def inner(
        self, name: str, outlines: tuple[Outline, Outline], coating: Coating, glass: int
    ) -> Face:
        """Return the face between glass and fill."""
        return Face(
            name,
            *self._inside(),
            *outlines,
            coating=coating,
            inside=Inside.BOTH,
            volumes=(glass, _FILL),
        )

    def edge(self, radius_mm: float) -> Solid:
        """Return the solid of the glass."""
        upright = disc("edge", radius_mm, (-self.thickness_mm, 0.0))
        (ox, oy, oz), (c, s, _) = self.middle, self.normal
        points = tuple(
            (ox + c * x - s * y, oy + s * x + c * y, oz + z) for x, y, z in upright.points
        )
        return upright._replace(points=points)

    def stroke(self, half_mm: float) -> Stroke:
        """Return the outline of the glass in plan."""
        (a, b, _), t = self.normal, self.thickness_mm
        x, y, _ = self.middle
        corners = ((0.0, -half_mm), (0.0, half_mm), (-t, half_mm), (-t, -half_mm))
        points = tuple((x + a * u - b * v, y + b * u + a * v) for u, v in corners)
        return Stroke(points, closed=True, role="outline")
