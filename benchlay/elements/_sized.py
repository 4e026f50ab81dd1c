"""Keys and geometry that plate-like kinds share: sizes, glass, faces, edge."""

from __future__ import annotations

from math import atan, cos, tan
from typing import Any, NamedTuple

from benchlay.document.form import Form, Reader
from benchlay.document.forms import Choice, Pair, Quantity
from benchlay.document.nodes import Mapping, Node, Scalar
from benchlay.document.problems import nearest
from benchlay.document.quantity import Dimension
from benchlay.document.record import Record, key
from benchlay.elements._coating import SHARE, Coating
from benchlay.elements._kind import Acts, Face, Geometry, Glass, Inside, Stroke
from benchlay.geometry.outline import Outline, circle, rectangle
from benchlay.geometry.solid import Solid, Vector, disc, slab

LENGTH = Quantity(Dimension.LENGTH, above=0.0)
LENGTH_OR_ZERO = Quantity(Dimension.LENGTH, at_least=0.0)
INDEX = Quantity(Dimension.RATIO, at_least=1.0, at_most=10.0)
GLASS_NAMES = (
    "fused-silica",
    "BK7",
    "SF10",
    "SF11",
    "CaF2",
    "MgF2",
    "sapphire",
    "ZnSe",
    "quartz",
    "calcite",
    "water",
)
_GLASS_EXPECTED = "a material (" + ", ".join(GLASS_NAMES) + ") or `{index: 1.5}`"


class GlassForm(Form[Glass]):
    """Reads a glass: a name of the catalogue, or an index relative to the bench's medium."""

    def text(self) -> str:
        """Say what is expected."""
        return _GLASS_EXPECTED

    def example(self) -> str:
        """Give one that may be written."""
        return "BK7"

    def schema(self) -> dict[str, Any]:
        """Return the JSON Schema of a glass."""
        index = {
            "type": "object",
            "properties": {"index": INDEX.schema()},
            "required": ["index"],
            "additionalProperties": False,
        }
        return {"anyOf": [{"enum": list(GLASS_NAMES)}, index]}

    def read(self, node: Node, reader: Reader) -> Glass | None:
        """Read a glass, adding what is wrong to the reader's problems."""
        if isinstance(node, Scalar):
            return self._named(node, reader)
        value = node.get("index") if isinstance(node, Mapping) else None
        if value is None or not isinstance(node, Mapping) or len(node.pairs) != 1:
            reader.complain(
                node.span,
                "this is not a glass",
                expected=_GLASS_EXPECTED,
                remedy="name a material, or give its index",
            )
            return None
        index = INDEX.read(value, reader)
        return None if index is None else Glass(None, index, node.span)

    def _named(self, node: Scalar, reader: Reader) -> Glass | None:
        if node.text in GLASS_NAMES:
            return Glass(node.text, None, node.span)
        guess = nearest(node.text, GLASS_NAMES)
        reader.complain(
            node.span,
            f"unknown glass {node.text!r}",
            expected=_GLASS_EXPECTED,
            remedy=f"did you mean {guess!r}?"
            if guess
            else "name a material of the list, or give its index",
        )
        return None


GLASS = GlassForm()
SIDE = Choice("left", "right", "up", "down")
_MAX_WEDGE = Quantity(
    Dimension.ANGLE, at_least=0.0, at_most=0.35
)  # 20 degrees: beyond that it is a prism


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
    clear: float = key(SHARE, default=0.9, meaning="usable share of the diameter or sizes")

    def after_read(self, reader: Reader) -> None:
        """Ask for one size, and only one."""
        if (self.diameter_mm is None) == (self.size_mm is None):
            both = self.diameter_mm is not None
            reader.complain(
                self.spans["size"] if both else self.span,
                "both a diameter and a size are given" if both else "it has no size",
                expected="either `diameter` or `size: [width, height]`",
                remedy="remove one of the two"
                if both
                else "add `diameter: 25.4`, or `size: [25, 36]`",
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


class Wedged(Record):
    """A plate whose back may be inclined to its front."""

    wedge_rad: float = key(_MAX_WEDGE, default=0.0, name="wedge", meaning="angle between the faces")
    wedge_towards: str | None = key(
        SIDE,
        default=None,
        meaning="where the thick edge is, as seen by light that arrives at the front",
    )

    def ask_for_thick_edge(self, reader: Reader) -> None:
        """A wedge without its direction could go either way: ask."""
        if self.wedge_rad > 0.0 and self.wedge_towards is None:
            reader.complain(
                self.spans["wedge"],
                "a wedge needs its direction",
                expected="`wedge_towards: left|right|up|down`: where the thick edge is, seen by light that arrives",
                remedy="add `wedge_towards: right`",
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
        scale = cos(atan((a * a + b * b) ** 0.5))
        return (-scale, -a * scale, -b * scale)

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
                self.outline,
                self.clear,
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
        """Return the plan outline with its coated side marked."""
        half = self.outline.radii[0]
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
    **more: Any,
) -> Geometry:
    """Return the geometry of a plate with these faces."""
    return Geometry(
        faces,
        shape.edge(),
        shape.strokes(coated=coated),
        shape.extent(),
        glass=glass,
        **more,
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
