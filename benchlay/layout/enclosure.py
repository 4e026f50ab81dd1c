"""The enclosure: upright panels with their openings, and lids."""

from __future__ import annotations

from math import dist, hypot

from benchlay.document.form import Reader
from benchlay.document.forms import Choice, Entries, RecordForm, Table, YesNo
from benchlay.document.record import Record, key
from benchlay.document.span import Span
from benchlay.geometry.polygon import Point, Polygon
from benchlay.layout._forms import LENGTH, NOT_NEGATIVE, OUTLINE, POINT, POSITIVE, Ref, RefForm

ACCESS = Choice("none", "tool", "interlocked")
MATERIAL = RefForm("a material")
# Ends of openings may coincide with edges; decimal lengths that should do so are apart by
# rounding, which is below 1e-9 mm.
_ROUNDING_MM = 1e-6
# A rivet every 10 mm along ten metres: a longer row is a slip in the pitch.
_MOST_IN_A_ROW = 1000


class Opening(Record):
    """An opening in a panel: a rectangle, or round where a diameter is given."""

    along_mm: float = key(
        NOT_NEGATIVE,
        name="along",
        meaning="distance from the panel's start to the near edge, of a round one to its centre",
    )
    width_mm: float | None = key(
        POSITIVE, default=None, name="width", meaning="width of a rectangular one"
    )
    from_height_mm: float | None = key(
        LENGTH, default=None, name="from_height", meaning="lower edge above the bench"
    )
    to_height_mm: float | None = key(
        LENGTH, default=None, name="to_height", meaning="upper edge above the bench"
    )
    height_mm: float | None = key(
        LENGTH,
        default=None,
        name="height",
        meaning="height of a round one's centre above the bench",
    )
    diameter_mm: float | None = key(
        POSITIVE, default=None, name="diameter", meaning="diameter of a round one"
    )
    depth_mm: float = key(
        NOT_NEGATIVE,
        default=0.0,
        name="depth",
        meaning="length of the duct from the inner face outwards; 0: a hole in the sheet",
    )

    @property
    def round(self) -> bool:
        """Whether it is round."""
        return self.diameter_mm is not None

    def box_mm(self) -> tuple[float, float, float, float]:
        """Return start and end along the panel, lower and upper edge, in mm."""
        if self.diameter_mm is not None:
            half, height = self.diameter_mm / 2, self.height_mm or 0.0
            return (self.along_mm - half, self.along_mm + half, height - half, height + half)
        end = self.along_mm + (self.width_mm or 0.0)
        return (self.along_mm, end, self.from_height_mm or 0.0, self.to_height_mm or 0.0)

    def after_read(self, reader: Reader) -> None:
        """Ask for all keys of one shape, and none of the other."""
        rectangle, circle = ("width", "from_height", "to_height"), ("height", "diameter")
        wanted, other = (circle, rectangle) if self.round else (rectangle, circle)
        missing = [n for n in wanted if not self.written(n)]
        strange = [n for n in other if self.written(n)]
        if missing or strange:
            what = f"'{missing[0]}' is missing" if missing else f"'{strange[0]}' is not for"
            shape = "a round opening" if self.round else "a rectangular opening"
            reader.complain(
                self.span_of(strange[0]) if strange and not missing else self.span,
                f"{what} {'for ' if missing else ''}{shape}",
                expected="'along', 'width', 'from_height' and 'to_height', "
                "or 'along', 'height' and 'diameter'",
                remedy=f"add '{missing[0]}'" if missing else f"remove '{strange[0]}'",
            )
        elif not self.round and self.box_mm()[3] <= self.box_mm()[2]:
            reader.complain(
                self.spans["to_height"],
                "its upper edge is not above its lower edge",
                expected="'to_height' above 'from_height'",
                remedy=f"set 'to_height' above {self.from_height_mm:g}",
            )


class Ends(Record):
    """How a panel meets its neighbours."""

    start: str = key(Choice("butt", "folded"), default="butt", meaning="at its `from`")
    end: str = key(Choice("butt", "folded"), default="butt", meaning="at its `to`")


class Fix(Record):
    """The rows of fixing holes of a panel: along its lower edge, and along each folded end."""

    hole_mm: float = key(POSITIVE, name="hole", meaning="diameter of the holes")
    pitch_mm: float = key(
        POSITIVE, name="pitch", meaning="distance between them; the row lies in the middle"
    )
    inset_mm: float = key(
        POSITIVE,
        name="inset",
        meaning="distance from the edge (the free one of a flange), and the least from its ends",
    )

    def after_read(self, reader: Reader) -> None:
        """Refuse holes that run into one another."""
        if self.pitch_mm <= self.hole_mm:
            reader.complain(
                self.spans["pitch"],
                f"holes of {self.hole_mm:g} mm every {self.pitch_mm:g} mm run into one another",
                expected=f"a pitch above {self.hole_mm:g} mm",
                remedy="make the pitch larger, or the holes smaller",
            )


class Fold(Record):
    """The flange along a panel's lower edge, and along each end that is folded."""

    flange_mm: float = key(
        POSITIVE, name="flange", meaning="width of the flange over its outer faces"
    )
    sense: str = key(Choice("in", "out"), default="in", meaning="to which side it is folded")
    radius_mm: float = key(POSITIVE, default=2.0, name="radius", meaning="inner bending radius")

    def after_read(self, reader: Reader) -> None:
        """Refuse a flange that is all bend: outside, a bend is wider than its inner radius."""
        if self.flange_mm <= self.radius_mm:
            reader.complain(
                self.spans["flange"],
                f"a flange of {self.flange_mm:g} mm has no room for a bend of "
                f"{self.radius_mm:g} mm",
                expected=f"a flange wider than {self.radius_mm:g} mm and the sheet together",
                remedy="make the flange wider, or the radius smaller",
            )


class Panel(Record):
    """An upright sheet; the inside is on its left going from `from` to `to`."""

    from_mm: Point = key(POINT, name="from", meaning="where its inner face starts")
    to_mm: Point = key(POINT, name="to", meaning="where its inner face ends")
    material: Ref | None = key(MATERIAL, default=None, meaning="default: the enclosure's")
    from_height_mm: float | None = key(
        LENGTH, default=None, name="from_height", meaning="default: the enclosure's"
    )
    to_height_mm: float | None = key(
        LENGTH, default=None, name="to_height", meaning="default: the enclosure's"
    )
    access: str = key(ACCESS, default="none", meaning="whether and how it may be opened")
    open: bool = key(YesNo(), default=False, meaning="whether it is taken off or stands open")
    openings: Entries[Opening] = key(
        Table(RecordForm(Opening)), default=Entries(), meaning="openings by name"
    )
    ends: Ends | None = key(
        RecordForm(Ends),
        default=None,
        meaning="how it meets its neighbours",
    )
    fix: Fix | None = key(
        RecordForm(Fix),
        default=None,
        meaning="its rows of fixing holes",
    )
    fold: Fold | None = key(
        RecordForm(Fold),
        default=None,
        meaning="its folded flanges, at right angles",
    )

    @property
    def length_mm(self) -> float:
        """Its length in plan."""
        return dist(self.from_mm, self.to_mm)

    @property
    def outward(self) -> Point:
        """The unit vector in plan to its outside, on the right going from `from` to `to`."""
        x, y = self.to_mm[0] - self.from_mm[0], self.to_mm[1] - self.from_mm[1]
        return (y / hypot(x, y), -x / hypot(x, y))

    def after_read(self, reader: Reader) -> None:
        """Refuse a panel without length, and rows of holes without end."""
        if self.from_mm == self.to_mm:
            reader.complain(
                self.spans["to"],
                "the panel starts and ends in the same point",
                expected="two different points",
                remedy="move one of the two",
            )
        elif self.fix is not None and self.length_mm > _MOST_IN_A_ROW * self.fix.pitch_mm:
            reader.complain(
                self.fix.spans["pitch"],
                f"a hole every {self.fix.pitch_mm:g} mm makes "
                f"{self.length_mm / self.fix.pitch_mm:.0f} holes in a row",
                expected=f"at most {_MOST_IN_A_ROW} holes in a row",
                remedy="make the pitch larger; a bare number is in mm",
            )


class Lid(Record):
    """A level sheet on top."""

    height_mm: float = key(LENGTH, name="height", meaning="its lower face above the bench")
    outline: Polygon = key(OUTLINE, meaning="its corners in plan")
    material: Ref | None = key(MATERIAL, default=None, meaning="default: the enclosure's")
    access: str = key(ACCESS, default="none", meaning="whether and how it may be opened")
    open: bool = key(YesNo(), default=False, meaning="whether it is taken off or stands open")


class Enclosure(Record):
    """All panels and lids, with what holds for those that say nothing else."""

    material: Ref | None = key(
        MATERIAL,
        default=None,
        meaning="default of panels and lids; without one thickness 2, diffuse 0.1, specular 0.05",
    )
    from_height_mm: float = key(
        LENGTH, default=0.0, name="from_height", meaning="lower edge of panels above the bench"
    )
    to_height_mm: float = key(
        LENGTH, default=300.0, name="to_height", meaning="upper edge of panels above the bench"
    )
    panels: Entries[Panel] = key(
        Table(RecordForm(Panel)), default=Entries(), meaning="upright sheets by name"
    )
    lids: Entries[Lid] = key(
        Table(RecordForm(Lid)), default=Entries(), meaning="level sheets by name"
    )

    def heights_mm(self, panel: Panel) -> tuple[float, float]:
        """Return lower and upper edge of a panel above the bench."""
        low, high = panel.from_height_mm, panel.to_height_mm
        return (
            self.from_height_mm if low is None else low,
            self.to_height_mm if high is None else high,
        )

    def material_of(self, sheet: Panel | Lid) -> str | None:
        """Return the name of a sheet's material; None for the built-in one."""
        ref = sheet.material or self.material
        return None if ref is None else ref.name

    def after_read(self, reader: Reader) -> None:
        """Hold every panel's heights and openings against each other."""
        if self.to_height_mm <= self.from_height_mm:
            where = "to_height" if self.written("to_height") else "from_height"
            own = (self.from_height_mm, self.to_height_mm)
            _upside_down(self.span_of(where), own, reader)
            return
        for name, panel in self.panels.items():
            reader.path += ["panels", name]
            heights = self.heights_mm(panel)
            if heights[1] <= heights[0]:
                edge = "to_height" if panel.written("to_height") else "from_height"
                _upside_down(panel.span_of(edge), heights, reader)
            else:
                _check_openings(panel, heights, reader)
            del reader.path[-2:]


def _upside_down(span: Span, heights: tuple[float, float], reader: Reader) -> None:
    low, high = heights
    reader.complain(
        span,
        f"its upper edge ({high:g} mm) is not above its lower edge ({low:g} mm)",
        expected="'to_height' above 'from_height'",
        remedy=f"set 'to_height' above {low:g}",
    )


def _check_openings(panel: Panel, heights: tuple[float, float], reader: Reader) -> None:
    low, high = heights
    for name, opening in panel.openings.items():
        start, end, bottom, top = opening.box_mm()
        reader.path += ["openings", name]
        if start < -_ROUNDING_MM or end > panel.length_mm + _ROUNDING_MM:
            reader.complain(
                opening.spans["along"],
                f"the opening runs from {start:g} mm to {end:g} mm along the panel, "
                f"which is {panel.length_mm:.6g} mm long",
                expected=f"an opening between 0 and {panel.length_mm:.6g} mm",
                remedy="move it, or make it smaller",
            )
        if bottom < low - _ROUNDING_MM or top > high + _ROUNDING_MM:
            where = "height" if opening.round else "from_height"
            reader.complain(
                opening.spans[where],
                f"the opening reaches from height {bottom:g} mm to {top:g} mm, "
                f"the panel from {low:g} mm to {high:g} mm",
                expected=f"an opening between {low:g} and {high:g} mm",
                remedy="move it, or make it smaller",
            )
        del reader.path[-2:]
