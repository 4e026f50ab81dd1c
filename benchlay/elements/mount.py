"""Mounts: an opaque box round an optic, from its front plane backwards, on a post."""

from __future__ import annotations

from math import radians
from typing import Any

from benchlay.document.form import Reader
from benchlay.document.forms import Choice, Fixed, ListOf, OneOf, Quantity, Words
from benchlay.document.quantity import Dimension
from benchlay.document.record import Record, RecordForm, key
from benchlay.elements._kind import ElementKind, Geometry
from benchlay.geometry.solid import Solid, box, post
from benchlay.named import NamedTuple

_LENGTH = Quantity(Dimension.LENGTH, above=0.0)
_COORDINATE = Quantity(Dimension.LENGTH)
# No adjuster turns its optic out of the beam's way altogether, and a sweep takes its time.
RANGE = Quantity(Dimension.ANGLE, at_least=0.0, at_most=radians(90.0))

# Common practice: what a plain mount of an optic up to 50 mm looks like.
ROUND_UP_TO_MM = 50.0
_RIM_MM = 14.0
_ROUNDING_MM = 1e-9  # of sizes converted from inches
_BEHIND_MM = 12.0
FOOT_MM = (50.0, 75.0)
FOOT_THICKNESS_MM = 10.0
POST_DIAMETER_MM = 12.7  # half an inch, the usual post


class Mount(Record):
    """What holds an optic. Keys left out follow from the optic's size."""

    width_mm: float | None = key(_LENGTH, default=None, name="width", meaning="of the box")
    depth_mm: float | None = key(
        _LENGTH, default=None, name="depth", meaning="of the box, front to back"
    )
    height_mm: float | None = key(_LENGTH, default=None, name="height", meaning="of the box")
    post_mm: tuple[float, float] | None = key(
        Fixed(_COORDINATE, 2),
        default=None,
        name="post",
        meaning="[along, left] of the post from the reference point",
    )
    post_diameter_mm: float = key(
        _LENGTH, default=POST_DIAMETER_MM, name="post_diameter", meaning="of the post"
    )
    foot_mm: tuple[float, float] | None = key(
        Fixed(_LENGTH, 2),
        default=FOOT_MM,
        name="foot",
        meaning="[width, depth] of the foot on the bench",
    )
    slots: Any = key(
        ListOf(Fixed(_COORDINATE, 2), min=0),
        default=None,
        meaning="where bolts go through the foot, [along, left]",
    )
    optic_height_mm: float | None = key(
        _LENGTH,
        default=None,
        name="optic_height",
        meaning="of the optical centre above the lower side of the box",
    )
    adjusters: str = key(
        Choice("back", "left", "right", "top"),
        default="back",
        meaning="where its knobs or driver holes are",
    )
    range_rad: float = key(
        RANGE,
        default=radians(4.0),
        name="range",
        meaning="tilt, both ways",
    )

    def after_read(self, reader: Reader) -> None:
        """Refuse a box that does not reach its own optical centre."""
        super().after_read(reader)
        if None in (self.height_mm, self.optic_height_mm):
            return
        height, optic = self.height_mm or 0.0, self.optic_height_mm or 0.0
        if optic >= height:
            reader.complain(
                self.span_of("optic_height"),
                f"the optical centre, {optic:g} mm up, lies above the box of {height:g} mm",
                expected="'optic_height' below 'height'",
                remedy=f"set 'optic_height' below {height:g}",
            )

    def refuse_within(self, extent: tuple[float, float, float, float], reader: Reader) -> None:
        """Refuse a box that does not go round its optic; `extent` is as in `Geometry`."""
        _, _, half_width, half_height = extent
        if self.width_mm is not None and self.width_mm < 2 * half_width - _ROUNDING_MM:
            self._too_small("width", self.width_mm, 2 * half_width, reader)
        if self.height_mm is not None and self.height_mm < 2 * half_height - _ROUNDING_MM:
            self._too_small("height", self.height_mm, 2 * half_height, reader)
        elif self.optic_height_mm is not None:
            height = self.height_mm or 2 * half_height + _RIM_MM
            low, high = half_height, height - half_height
            if not low - _ROUNDING_MM <= self.optic_height_mm <= high + _ROUNDING_MM:
                reader.complain(
                    self.span_of("optic_height"),
                    f"with its centre {self.optic_height_mm:g} mm up the optic sticks out of the "
                    f"box of {height:g} mm",
                    expected=f"'optic_height' from {low:g} to {high:g}",
                    remedy=f"set 'optic_height' to {height / 2:g}, the middle, or raise 'height'",
                )

    def _too_small(self, name: str, got_mm: float, least_mm: float, reader: Reader) -> None:
        reader.complain(
            self.span_of(name),
            f"the mount's {name} of {got_mm:g} mm is less than that of its optic, {least_mm:g} mm",
            expected=f"'{name}' of at least {least_mm:g}",
            remedy=f"set '{name}' to {least_mm + _RIM_MM:g}, or remove it: that is the default",
        )


class NoMount:
    """The class of `NO_MOUNT`: no box, post or foot."""

    def __repr__(self) -> str:
        return "NO_MOUNT"


NO_MOUNT = NoMount()
DEFAULT_MOUNT = Mount()
MOUNT = OneOf(Words({"none": NO_MOUNT}), RecordForm(Mount))
"""Reads a mount: `none`, or a table of its sizes. The value is NO_MOUNT or a Mount."""


class Holder(NamedTuple):
    """The solids that hold an element: the box in its own frame, post and foot upright."""

    box: Solid | None
    upright: tuple[Solid, ...]
    post_mm: tuple[float, float] | None


NOTHING = Holder(None, (), None)


def holder(
    record: ElementKind,
    geometry: Geometry,
    mount: Mount | NoMount | None,
    height_mm: float,
) -> Holder:
    """Return what holds an element whose reference point is `height_mm` above the bench.

    Where the layout says nothing (`mount` is None), a round optic up to 50 mm has the default
    mount, and targets, dumps and obstacles have a post without a foot; nothing else is held.
    """
    if isinstance(mount, NoMount):
        return NOTHING
    if not record.MOUNTED:
        return _bare(geometry, mount or DEFAULT_MOUNT, height_mm)
    if mount is None and not _default_fits(record, geometry):
        return NOTHING
    return _boxed(geometry, mount or DEFAULT_MOUNT, height_mm)


def _default_fits(record: ElementKind, geometry: Geometry) -> bool:
    return record.is_round() and 2 * geometry.extent[2] <= ROUND_UP_TO_MM


def _boxed(geometry: Geometry, mount: Mount, height_mm: float) -> Holder:
    back, front, half_width, half_height = geometry.extent
    width = mount.width_mm or 2 * half_width + _RIM_MM
    height = mount.height_mm or 2 * half_height + _RIM_MM
    depth = mount.depth_mm or (front - back) + _BEHIND_MM
    lower = -(mount.optic_height_mm or height / 2)
    at = mount.post_mm or (front - depth / 2, 0.0)
    shell = box(
        "mount",
        (front - depth, front),
        (-width / 2, width / 2),
        (lower, lower + height),
    )
    return Holder(shell, _stand(at, mount, height_mm + lower), at)


def _bare(geometry: Geometry, mount: Mount, height_mm: float) -> Holder:
    at = mount.post_mm or geometry.post_at
    if at is None:
        return NOTHING
    top = geometry.post_top_mm
    if top is None:
        top = height_mm - geometry.extent[3]
    without_foot = mount.replace(foot_mm=None) if not mount.written("foot") else mount
    return Holder(None, _stand(at, without_foot, top), at)


def _stand(at: tuple[float, float], mount: Mount, top_mm: float) -> tuple[Solid, ...]:
    """Return post and foot from the bench (height 0) up to the lower side of the box."""
    if top_mm <= 0.0:
        return ()
    thickness = min(FOOT_THICKNESS_MM, top_mm)
    solids = [post(mount.post_diameter_mm / 2, at, (0.0, top_mm))]
    if mount.foot_mm is not None:
        x, y = at
        width, depth = mount.foot_mm
        across = (x - depth / 2, x + depth / 2), (y - width / 2, y + width / 2)
        solids.append(box("foot", *across, (0.0, thickness), upright=True))
    return tuple(solids)
