"""Where something stands and how it is turned: as written, before anything is placed."""

from __future__ import annotations

from math import radians
from typing import Any

from benchlay.document.form import Reader
from benchlay.document.forms import Choice, OneOf, Pair, Quantity, Whole, YesNo
from benchlay.document.quantity import Dimension
from benchlay.document.record import Record, key
from benchlay.geometry.polygon import Point
from benchlay.layout._forms import (
    ANGLE,
    LENGTH,
    NOT_NEGATIVE,
    PLACE,
    POINT,
    TRIPLE,
    WAVELENGTH,
    RefForm,
)
from benchlay.layout.pose_forms import (
    AfterForm,
    FacingForm,
    OpeningForm,
    OpeningRef,
    PathItem,
    Turn,
    TurnForm,
)

_PITCH = Quantity(Dimension.ANGLE, at_least=radians(-90), at_most=radians(90))
_INCIDENCE = Quantity(Dimension.ANGLE, at_least=0.0, below=radians(90))
BREWSTER = "brewster"
_AIM = OneOf(RefForm("a source or element"), PLACE)


class Place(Record):
    """What sources and elements share: where they stand and where they look."""

    at_mm: tuple[float, ...] | None = key(
        PLACE, default=None, name="at", meaning="reference point, [x, y] or [x, y, z]"
    )
    hole: tuple[int, int] | None = key(
        Pair(Whole(1, 10_000)), default=None, meaning="column and row of its post's hole, from 1"
    )
    in_opening: OpeningRef | None = key(
        OpeningForm(), default=None, name="in", meaning="in the middle of a panel's opening"
    )
    height_mm: float | None = key(
        LENGTH, default=None, name="height", meaning="z of the reference point, whatever else says"
    )
    offset_mm: tuple[float, ...] = key(
        TRIPLE,
        default=(0.0, 0.0, 0.0),
        name="offset",
        meaning="[along, left, up] from its solved pose; never re-solves the beam",
    )
    yaw_error_rad: float = key(
        ANGLE, default=0.0, name="yaw_error", meaning="turned from its solved pose, seen from above"
    )
    pitch_error_rad: float = key(
        ANGLE, default=0.0, name="pitch_error", meaning="tilted up from its solved pose"
    )
    facing: Any = key(
        FacingForm(), default=None, meaning="where its outward normal points: heading, name, point"
    )
    pitch_rad: float | None = key(
        _PITCH, default=None, name="pitch", meaning="tilts the front face up from horizontal"
    )
    out: bool = key(YesNo(), default=False, meaning="takes it out of the bench")


class Stand(Place):
    """How an element stands and is turned; `facing` of a source is its heading."""

    after: tuple[PathItem, ...] = key(
        AfterForm(), default=(), meaning="what the beam comes from that arrives here"
    )
    distance_mm: float | None = key(
        NOT_NEGATIVE,
        default=None,
        name="distance",
        meaning="along the nominal ray from what is named by `after`",
    )
    wavelength_nm: float | None = key(
        WAVELENGTH,
        default=None,
        name="wavelength",
        meaning="chooses the line where several leave the item before",
    )
    turn: Turn | None = key(
        TurnForm(), default=None, meaning="the front face reflects the beam by that much"
    )
    aim: Any = key(
        _AIM, default=None, meaning="the front face reflects the beam to that point or name"
    )
    incidence: Any = key(
        OneOf(Choice(BREWSTER), _INCIDENCE),
        default=None,
        meaning="angle of incidence in plan, or Brewster's angle of its own material",
    )
    side: str = key(
        Choice("left", "right"), default="left", meaning="to which side the front then reflects"
    )
    beam_at_mm: Point = key(
        POINT,
        default=(0.0, 0.0),
        name="beam_at",
        meaning="[left, up] on the front face where the nominal beam is meant to meet it",
    )

    def after_read(self, reader: Reader) -> None:
        """Ask for one place and at most one way of turning."""
        check_one_place(self, reader, with_after=True)
        self._check_distance(reader)
        self._check_turning(reader)

    def _check_distance(self, reader: Reader) -> None:
        fixed = next((n for n in ("at", "hole", "in") if self.written(n)), None)
        if self.written("distance") and not self.after:
            reader.complain(
                self.spans["distance"],
                "a distance needs the item it is counted from",
                expected="'after' beside 'distance'",
                remedy="add 'after' with the name of the item the beam comes from",
            )
        elif self.written("distance") and fixed:
            reader.complain(
                self.spans["distance"],
                f"it stands where both '{fixed}' and 'distance' say",
                expected=f"'after' with 'distance', or '{fixed}' (where 'after' only "
                "says which beam arrives)",
                remedy=f"remove 'distance' or '{fixed}'",
            )
        elif self.after and not self.written("distance") and not fixed:
            reader.complain(
                self.spans["after"],
                "'after' does not say how far along the beam",
                expected="'distance' beside 'after', or 'at', 'hole' or 'in'",
                remedy="add 'distance: 100', with the length that is meant",
            )

    def _check_turning(self, reader: Reader) -> None:
        ways = [n for n in ("turn", "aim", "incidence", "facing") if self.written(n)]
        if len(ways) > 1:
            reader.complain(
                self.spans[ways[1]],
                f"it is turned by '{ways[0]}' (line {self.spans[ways[0]].line}) and by '{ways[1]}'",
                expected="at most one of 'turn', 'aim', 'incidence' and 'facing'",
                remedy=f"remove '{ways[0]}' or '{ways[1]}'",
            )
        if self.written("side") and not self.written("incidence"):
            reader.complain(
                self.spans["side"],
                "'side' says nothing without 'incidence'",
                expected="'side' only beside 'incidence'",
                remedy="remove 'side', or add 'incidence'",
            )
        if self.written("pitch") and self.written("aim"):
            reader.complain(
                self.spans["pitch"],
                f"'aim' (line {self.spans['aim'].line}) fixes the pitch already",
                expected="'aim' without 'pitch'",
                remedy="remove 'pitch'; a small deviation is an 'offset' or 'pitch_error'",
            )


def check_one_place(place: Place, reader: Reader, *, with_after: bool) -> None:
    """Ask for one of the ways to stand; `after` may go with another one."""
    ways = [n for n in ("at", "hole", "in") if place.written(n)]
    known = "'at', 'hole' or 'in'" + (", or 'after' with 'distance'" if with_after else "")
    if len(ways) > 1:
        reader.complain(
            place.spans[ways[1]],
            f"it stands in two places: '{ways[0]}' (line {place.spans[ways[0]].line}) "
            f"and '{ways[1]}'",
            expected=f"one of {known}",
            remedy=f"remove '{ways[0]}' or '{ways[1]}'",
        )
    elif not ways and not (with_after and (place.written("after") or place.written("distance"))):
        reader.complain(
            place.span,
            "nothing says where it stands",
            expected=known,
            remedy="add 'at: [x, y]'" + (", or 'after' and 'distance'" if with_after else ""),
        )
