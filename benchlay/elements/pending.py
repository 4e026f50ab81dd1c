"""Kinds that the language knows and this version does not trace yet.

Their keys are read and checked like all others; a layout that uses one is told "not yet".
"""

from __future__ import annotations

from typing import Any, ClassVar

from benchlay.document.forms import (
    Choice,
    Deferred,
    Dimension,
    Fixed,
    ListOf,
    Pair,
    Quantity,
    YesNo,
)
from benchlay.document.record import key
from benchlay.elements._coating import COATING, METAL_NAMES, Coating
from benchlay.elements._glass import GLASS
from benchlay.elements._kind import Branches, ElementKind, Glass
from benchlay.elements._shares import USABLE
from benchlay.elements._sized import LENGTH, Sized

_ANGLE = Quantity(Dimension.ANGLE)
_COORDINATE = Quantity(Dimension.LENGTH)
_WAVELENGTH = Quantity(Dimension.WAVELENGTH, above=0.0)
_POINT = Fixed(_COORDINATE, 2)
_WHY = "this kind is read but cannot be traced by this version"


class Grating(Sized, ElementKind):
    """A plane grating, rulings upright."""

    KIND = "grating"
    PENDING = _WHY

    lines_per_mm: float = key(
        Quantity(Dimension.RATIO, above=0.0), name="lines", meaning="rulings per mm"
    )
    orders: Any = key(Deferred("share by order, `{-1: 70 %, 0: 15 %}`"), meaning="share by order")
    transmissive: bool = key(YesNo(), default=False, meaning="whether light goes through")


class Prism(ElementKind):
    """A prism over a convex outline."""

    KIND = "prism"
    BRANCHES: ClassVar[Branches] = {"transmitted": (), "reflected": ()}
    DEFAULT_BRANCH = "transmitted"
    PENDING = _WHY

    outline_mm: tuple[tuple[float, float], ...] = key(
        ListOf(_POINT, min=3), name="outline", meaning="corners seen from above"
    )
    glass: Glass = key(GLASS, default=Glass("BK7", None), meaning="the glass")
    depth_mm: float = key(
        LENGTH, default=25.0, name="depth", meaning="height, about the reference point"
    )
    faces: Any = key(
        Deferred("coatings by the number of the face"),
        default=None,
        meaning="coatings by face",
    )


class Parabola(ElementKind):
    """An off-axis parabolic mirror."""

    KIND = "parabola"
    BRANCHES: ClassVar[Branches] = {"reflected": ((("front", "reflected"),),)}
    DEFAULT_BRANCH = "reflected"
    PENDING = _WHY

    focal_mm: float = key(LENGTH, name="focal", meaning="focal length of the parent")
    off_axis_rad: float = key(_ANGLE, name="off_axis", meaning="angle by which it turns the beam")
    diameter_mm: float | None = key(LENGTH, default=None, name="diameter", meaning="of a round one")
    size_mm: tuple[float, float] | None = key(
        Pair(LENGTH), default=None, name="size", meaning="width and height"
    )
    reflectance: Coating | None = key(COATING, default=None, meaning="reflected share")
    metal: str | None = key(Choice(*METAL_NAMES), default=None, meaning="an opaque metal film")
    clear: float = key(USABLE, default=0.9, meaning="usable share of the diameter or sizes")
