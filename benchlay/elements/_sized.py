"""Keys and geometry that plate-like kinds share: sizes, wedge, faces, edge."""

from __future__ import annotations

from math import ceil, hypot, radians, tan

from benchlay.document.form import Reader
from benchlay.document.forms import Choice, Pair, Quantity
from benchlay.document.quantity import Dimension
from benchlay.document.record import Record, key
from benchlay.elements._coating import Coating
from benchlay.elements._kind import CLEAR, Acts, Bulk, Face, Geometry, Glass, Inside, Stroke
from benchlay.elements._shares import USABLE
from benchlay.geometry.outline import Outline, circle, rectangle
from benchlay.geometry.solid import Solid, Vector, disc, slab
from benchlay.named import NamedTuple

LENGTH = Quantity(Dimension.LENGTH, above=0.0)
LENGTH_OR_ZERO = Quantity(Dimension.LENGTH, at_least=0.0)
SIDE = Choice("left", "right", "up", "down")
# Beyond 20 degrees it is a prism, and its thickness at the centre says little.
_WEDGE = Quantity(Dimension.ANGLE, at_least=0.0, at_most=radians(20.0))


class Sized(Record):
    """Anything with a diameter or a width and height."""

    diameter_mm: float | None = key(
        LENGTH, default=None, name="diameter", meaning="diameter of a round one"
    )
    size_mm: tuple[float, float] | None = key(
        Pair(LENGTH),
        default=None,
        name="size",
        meaning="width and height of a rectangular one",
    )
    clear: float = key(USABLE, default=0.9, meaning="usable share of the diameter or sizes")

    def after_read(self, reader: Reader) -> None:
        """Ask for one size, and only one."""
        super().after_read(reader)
        if (self.diameter_mm is None) == (self.size_mm is None):
            both = self.diameter_mm is not None
            reader.complain(
                self.span_of("size"),
                "both a diameter and a size are given" if both else "no size is given",
                expected="either 'diameter' or 'size: [width, height]'",
                remedy="remove 'diameter' or 'size'"
                if both
                else "add 'diameter: 25.4' or 'size: [25, 36]', with the size that is meant",
            )

    def outline(self) -> Outline:
        """Return the outline of the front face."""
        if self.diameter_mm is not None:
            return circle(self.diameter_mm / 2)
        width, height = self.size_mm or (0.0, 0.0)
        return rectangle(width, height)

    def is_round(self) -> bool:
        """Whether it is given by a diameter."""
        return self.diameter_mm is not None


class Wedged(Sized):
    """A plate whose back may be inclined to its front; its kind says the key of `thickness_mm`."""

    thickness_mm: float
    wedge_rad: float = key(
        _WEDGE, default=0.0, name="wedge", meaning="angle between front and back"
    )
    wedge_towards: str | None = key(
        SIDE,
        default=None,
        meaning="where the thick edge is, as seen by light that arrives at the front",
    )

    def after_read(self, reader: Reader) -> None:
        """Ask where the thick edge is, and for some glass at the thin one."""
        super().after_read(reader)
        if self.wedge_rad == 0.0:
            return
        if self.wedge_towards is None:
            reader.complain(
                self.span_of("wedge"),
                "a wedge without its direction",
                expected="'wedge_towards' with 'left', 'right', 'up' or 'down': where the thick "
                "edge is, as seen by light that arrives at the front",
                remedy="add 'wedge_towards: right', with the side that is meant",
            )
        else:
            self._ask_for_thin_edge(reader)

    def _ask_for_thin_edge(self, reader: Reader) -> None:
        """Refuse a back that comes through the front."""
        half_width, half_height = self.outline().radii
        slope = self.slope()
        needed = abs(slope[0]) * half_width + abs(slope[1]) * half_height
        if needed == 0.0 or needed < self.thickness_mm:  # without a size there is nothing to say
            return
        reader.complain(
            self.span_of("wedge"),
            f"at the thin edge its thickness would be {self.thickness_mm - needed:.3g} mm",
            expected=f"a thickness above {needed:.4g} mm at the centre for this wedge",
            remedy=f"set 'thickness' to {ceil(10 * needed + 1) / 10:.6g} or more",
        )

    def slope(self) -> tuple[float, float]:
        """Return how the glass thickens along (left, up) of the element frame, in mm per mm."""
        rise = tan(self.wedge_rad)
        # Light that arrives at the front looks along -x: its left is the element's right.
        towards = {
            "left": (-rise, 0.0),
            "right": (rise, 0.0),
            "up": (0.0, rise),
            "down": (0.0, -rise),
        }
        return towards.get(self.wedge_towards or "", (0.0, 0.0))


class PlateShape(NamedTuple):
    """A plate of glass: front at x = 0, back at x = -thickness, perhaps inclined."""

    outline: Outline
    clear: Outline
    thickness_mm: float
    slope: tuple[float, float] = (0.0, 0.0)

    def back_normal(self) -> Vector:
        """Return the outward normal of the back."""
        a, b = self.slope
        length = hypot(1.0, a, b)
        return (-1.0 / length, -a / length, -b / length)

    def back_stretch(self) -> tuple[float, float]:
        """Return how much wider and higher the inclined back is than the front."""
        return (hypot(1.0, self.slope[0]), hypot(1.0, self.slope[1]))

    def faces(self, front: Coating, back: Coating) -> tuple[Face, Face]:
        """Return two refracting faces."""
        return (
            Face(
                "front",
                (0.0, 0.0, 0.0),
                (1.0, 0.0, 0.0),
                self.outline,
                self.clear,
                coating=front,
            ),
            Face(
                "back",
                (-self.thickness_mm, 0.0, 0.0),
                self.back_normal(),
                self.outline.stretched(self.back_stretch()),
                self.clear.stretched(self.back_stretch()),
                coating=back,
            ),
        )

    def edge(self) -> tuple[Solid, ...]:
        """Return the solid of the plate, which stops light at its edge (none if it is thin)."""
        if self.thickness_mm <= 0.0:
            return ()
        across = (-self.thickness_mm, 0.0)
        if self.outline.round:
            return (disc("edge", self.outline.radii[0], across, self.slope),)
        return (slab("edge", self.outline.corners, across, self.slope),)

    def strokes(self, *, coated: str = "front") -> tuple[Stroke, ...]:
        """Return the section at the height of its middle, with its coated side marked."""
        half = self.outline.radii[0]
        if self.thickness_mm <= 0.0:
            role = "coated" if coated else "outline"
            return (Stroke(((0.0, -half), (0.0, half)), closed=False, role=role),)
        t = self.thickness_mm
        tilt = self.slope[0] * half
        corners = ((0.0, -half), (0.0, half), (-t - tilt, half), (-t + tilt, -half))
        outline = Stroke(corners, closed=True, role="outline")
        if not coated:
            return (outline,)
        side = corners[0:2] if coated == "front" else corners[2:4]
        return (outline, Stroke(side, closed=False, role="coated"))

    def extent(self) -> tuple[float, float, float, float]:
        """Return x of back and front, half width and half height."""
        return (-self.thickness_mm, 0.0, *self.outline.radii)


def plate_geometry(
    shape: PlateShape,
    faces: tuple[Face, ...],
    glass: Glass | None,
    *,
    coated: str = "front",
    bulk: Bulk = CLEAR,
) -> Geometry:
    """Return the geometry of a plate with these faces."""
    return Geometry(
        faces,
        shape.edge(),
        shape.strokes(coated=coated),
        shape.extent(),
        glass=glass,
        bulk=bulk,
    )


def opaque_front(
    outline: Outline, sink: str, *, specular: float = 0.0, material: str | None = None
) -> Face:
    """Return a front face on which light ends."""
    return Face(
        "front",
        (0.0, 0.0, 0.0),
        (1.0, 0.0, 0.0),
        outline,
        outline,
        acts=Acts.OPAQUE,
        inside=Inside.NOWHERE,
        sink=sink,
        specular=specular,
        material=material,
    )


def opening_front(plate: Outline, opening: Outline, beside: str) -> Face:
    """Return a front face that light passes through an opening."""
    return Face(
        "front",
        (0.0, 0.0, 0.0),
        (1.0, 0.0, 0.0),
        plate,
        opening,
        acts=Acts.PASSES,
        inside=Inside.NOWHERE,
        beside=beside,
    )
