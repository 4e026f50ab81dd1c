"""The room round the bench: walls, doors, windows and people."""

from __future__ import annotations

from benchlay.document.form import Reader
from benchlay.document.forms import Choice, Entries, RecordForm, Table
from benchlay.document.record import Record, key
from benchlay.geometry.polygon import Point, Polygon, holds
from benchlay.layout._forms import NOT_NEGATIVE, OUTLINE, POINT, POSITIVE
from benchlay.layout.bench import Bench


class _InWall(Record):
    """Something in a wall, between two points of it."""

    from_mm: Point = key(POINT, name="from", meaning="one end, in the wall's line")
    to_mm: Point = key(POINT, name="to", meaning="the other end, in the wall's line")

    def after_read(self, reader: Reader) -> None:
        """Refuse what has no width."""
        if self.from_mm == self.to_mm:
            reader.complain(
                self.spans["to"],
                "it starts and ends in the same point",
                expected="two different points",
                remedy="move one of the two",
            )


class Door(_InWall):
    """A door, from the floor up."""

    height_mm: float = key(
        POSITIVE, default=2000.0, name="height", meaning="height above the floor"
    )


class Window(_InWall):
    """A window; heights above the floor."""

    from_height_mm: float = key(
        NOT_NEGATIVE, default=900.0, name="from_height", meaning="sill above the floor"
    )
    to_height_mm: float = key(
        POSITIVE, default=2000.0, name="to_height", meaning="upper edge above the floor"
    )

    def after_read(self, reader: Reader) -> None:
        """Refuse what has neither width nor height."""
        super().after_read(reader)
        if self.to_height_mm <= self.from_height_mm:
            reader.complain(
                self.span_of("to_height"),
                f"its upper edge ({self.to_height_mm:g} mm) is not above its sill "
                f"({self.from_height_mm:g} mm)",
                expected="'to_height' above 'from_height'",
                remedy=f"set 'to_height' above {self.from_height_mm:g}",
            )


class Person(Record):
    """A place where someone is."""

    at_mm: Point = key(POINT, name="at", meaning="x and y on the plan")
    eyes: str = key(
        Choice("seated", "standing"), default="standing", meaning="which band of eye height"
    )


class Room(Record):
    """The room: its walls are opaque from the floor to `height`."""

    outline: Polygon = key(OUTLINE, meaning="corners of the walls' inner faces")
    height_mm: float = key(
        POSITIVE, default=2700.0, name="height", meaning="of the walls above the floor"
    )
    doors: Entries[Door] = key(Table(RecordForm(Door)), default=Entries(), meaning="doors by name")
    windows: Entries[Window] = key(
        Table(RecordForm(Window)), default=Entries(), meaning="windows by name"
    )
    people: Entries[Person] = key(
        Table(RecordForm(Person)), default=Entries(), meaning="where people are, by name"
    )

    def hold(self, bench: Bench, reader: Reader) -> None:
        """Refuse a room in which the bench does not stand, or lower than its surface."""
        if not any(holds(self.outline, corner) for corner in bench.outline):
            reader.complain(
                self.spans["outline"],
                "no corner of the bench lies in the room",
                expected="an outline round the bench, in the bench's own coordinates",
                remedy="count the room's corners from the bench's near left corner",
            )
        if self.height_mm <= bench.surface_height_mm:
            reader.complain(
                self.span_of("height"),
                f"the room is {self.height_mm:g} mm high, the bench's surface "
                f"{bench.surface_height_mm:g} mm",
                expected=f"a height above {bench.surface_height_mm:g} mm, from the floor",
                remedy="give the height of the walls above the floor in mm",
            )

    def after_read(self, reader: Reader) -> None:
        """Refuse people outside the walls: nothing would be said of what reaches them."""
        for name, person in self.people.items():
            if not holds(self.outline, person.at_mm):
                reader.path += ["people", name]
                reader.complain(
                    person.spans["at"],
                    "this place lies outside the room",
                    expected="a point within the room's outline",
                    remedy="correct the place, or draw the room round it",
                )
                del reader.path[-2:]
