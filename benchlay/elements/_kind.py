"""What a kind of element is: keys, faces, bodies, branches and outline, in its own frame.

The element frame has its origin at the reference point, x along the front normal, y to the
left of it and z up; lengths are in mm, angles in rad.
"""

from __future__ import annotations

from collections.abc import Mapping
from enum import IntEnum
from typing import ClassVar, Protocol, TypeAlias

from benchlay.document.record import Record
from benchlay.document.span import Span
from benchlay.elements._coating import UNCOATED, Coating
from benchlay.elements._polarization import Polarization
from benchlay.geometry.outline import Outline
from benchlay.geometry.solid import Solid, Vector
from benchlay.named import NamedTuple

Step: TypeAlias = tuple[str, str]
"""A face and what happens there: ``("front", "reflected")``."""

Branches: TypeAlias = Mapping[str, tuple[tuple[Step, ...], ...]]
"""By branch name, the ways through: one for each face at which light may enter."""


class Acts(IntEnum):
    """What a face does with light inside its clear outline."""

    INTERFACE = 0
    """Divides it between reflection and refraction."""
    OPAQUE = 1
    """Ends it, save for a specular share."""
    PASSES = 2
    """Lets it through: an opening in a plate."""
    LENS = 3
    """An interface of an ideal thin lens: bends by position, not by slope."""
    RETURNS = 4
    """Sends it back the way it came, on the other side of the middle: a corner of mirrors."""


class Inside(IntEnum):
    """On which side of a face the element's own medium lies."""

    NOWHERE = 0
    BEHIND = 1
    BOTH = 2


class Face(NamedTuple):
    """A plane optical face.

    `normal` points out of the element. `volumes` are the numbers of its volumes behind the
    face and, where the element lies on both sides, before it. `sink` is where light lands
    that an opaque face ends, and `beside` where light lands that meets the outline outside
    the clear region.
    """

    name: str
    origin: Vector
    normal: Vector
    outline: Outline
    clear: Outline
    acts: Acts = Acts.INTERFACE
    coating: Coating = UNCOATED
    inside: Inside = Inside.BEHIND
    sink: str = "body"
    beside: str = "rim"
    specular: float = 0.0
    material: str | None = None
    focal_mm: float = 0.0
    volumes: tuple[int, int] = (0, 0)


class Made(NamedTuple):
    """Light that a converter makes; its polarization is that of what makes it unless stated."""

    wavelength_nm: float
    share: float
    polarization: Polarization | None = None


class Bulk(NamedTuple):
    """What the inside of an element does on every passage from face to face.

    `kind` is ``clear``, ``absorber``, ``polarizer``, ``retarder``, ``rotator`` or
    ``converter``. For an absorber,
    `bands` are (from nm, to nm, share passed at normal incidence over `thickness_mm`) and
    light outside every band does not pass; without bands `passes` holds everywhere. For a
    polarizer `passes` and `refused` are the shares along the axis and across it. For a
    retarder `waves` is the retardance at `design_nm` (None: the wavelength of the route). A
    rotator turns the field by `turns_rad` about the back's outward normal, whichever way the
    light goes. A converter `makes` light of light that has entered from outside.
    """

    kind: str = "clear"
    axis_rad: float = 0.0
    passes: float = 1.0
    refused: float = 1.0
    waves: float = 0.0
    design_nm: float | None = None
    turns_rad: float = 0.0
    makes: tuple[Made, ...] = ()
    thickness_mm: float = 0.0
    bands: tuple[tuple[float, float, float], ...] = ()


CLEAR = Bulk()


class Glass(NamedTuple):
    """A medium: a material of the catalogue, or a plain index relative to the bench's medium."""

    name: str | None
    ratio: float | None
    span: Span | None = None


class Volume(NamedTuple):
    """A part of an element that light is inside of: its medium (None: the bench's own).

    `barrel` is where light lands that meets none of the faces round it.
    """

    glass: Glass | None
    bulk: Bulk = CLEAR
    barrel: str = "rim"


class Stroke(NamedTuple):
    """A line of the drawing of an element, in its own (x, y), mm.

    `role` is ``outline`` (visible edge), ``coated`` (the coated side of an edge),
    ``opening`` (what lets light through) or ``hidden``.
    """

    points: tuple[tuple[float, float], ...]
    closed: bool
    role: str


class Geometry(NamedTuple):
    """Everything of an element that light and ink may meet, in its own frame.

    `extent` is the box round the optic as (x back, x front, half width, half height), from
    which a mount is made; `post_at` is where the post of a bare body stands, and
    `post_top_mm` how far above the bench it reaches (None: to the lower side of the extent).
    """

    faces: tuple[Face, ...]
    solids: tuple[Solid, ...]
    strokes: tuple[Stroke, ...]
    extent: tuple[float, float, float, float]
    glass: Glass | None = None
    bulk: Bulk = CLEAR
    material: str | None = None
    post_at: tuple[float, float] | None = None
    post_top_mm: float | None = None
    barrel: str = "rim"
    further: tuple[Volume, ...] = ()

    def volumes(self) -> tuple[Volume, ...]:
        """Return what light can be inside of: number 0 is of `glass`, `bulk` and `barrel`."""
        return (Volume(self.glass, self.bulk, self.barrel), *self.further)


Goal: TypeAlias = tuple[float, float] | str
"""Where something leads to: a point of the plan, at its own height, or the name of an item."""


class Around(Protocol):
    """What an element may ask of the bench that it stands on."""

    def distance_mm(self, goal: Goal) -> float:
        """Return how far it is from the element's reference point to its goal."""

    def relative_index(self, glass: Glass) -> float:
        """Return the index of a glass in the bench's medium, for the light that arrives."""


class ElementKind(Record):
    """A kind of element: one class a kind, one file a class, one line in the registry."""

    KIND: ClassVar[str]
    BRANCHES: ClassVar[Branches] = {}
    DEFAULT_BRANCH: ClassVar[str | None] = None
    PENDING: ClassVar[str | None] = None
    """For a kind that is read but not traced yet: what to tell the user."""
    TURNS_FRONT: ClassVar[bool] = False
    """Whether `turn` and `aim` make sense: the front reflects what is meant to go on."""
    STEERS: ClassVar[bool] = True
    """Whether turning it turns what it reflects (a corner cube's stays as it was)."""
    SQUARE: ClassVar[bool] = False
    """Whether it faces the ray squarely by default, pitch included (targets and dumps)."""
    MOUNTED: ClassVar[bool] = True
    """Whether a mount box may be put round it; other kinds have bodies of their own."""
    DARK_MATTERS: ClassVar[bool] = True
    """Whether an element of this kind that no beam reaches is worth a finding."""
    BLOCKS: ClassVar[bool] = False
    """Whether a stray is properly ended here."""

    FAULTS: ClassVar[frozenset[str]] = frozenset(("out", "reversed", "wavelength"))
    """What may credibly go wrong with one of this kind by itself, beside a knock to its mount.

    ``out`` (fallen out or forgotten), ``missing`` (taken away: of what stops light),
    ``reversed``, ``turned`` (about its axis, in its holder), ``rolled`` (about the beam),
    ``stuck`` (see `stuck`), ``wavelength`` (its coatings are not for the light that comes).
    """

    def stuck(self) -> tuple[tuple[str, Geometry], ...]:
        """Return the shapes in which what moves of it may stick, each with a word for it."""
        return ()

    def branches(self) -> Branches:
        """Return the ways through this very element (a cube's depend on how it is turned)."""
        return self.BRANCHES

    def geometry(self) -> Geometry:
        """Return faces, bodies and outline in the element's own frame."""
        raise NotImplementedError

    def geometry_on(self, around: Around) -> Geometry:
        """Return the geometry where it hangs on what stands around; `geometry` does not ask."""
        del around
        return self.geometry()

    def leads_to(self) -> Goal | None:
        """Return where it leads to, if its front faces away from there (a tube)."""
        return None

    def makes(self) -> tuple[Made, ...]:
        """Return the light of other wavelengths that it makes."""
        return ()

    def simplified(self) -> tuple[tuple[str, str], ...]:
        """Return what of it is modelled more simply than it is, each with what to do about it."""
        return ()

    def needs_line(self) -> bool:
        """Whether its shape hangs on the wavelength that arrives."""
        return False

    def is_round(self) -> bool:
        """Whether the default mount for round optics fits."""
        return False

    def glass_of(self) -> Glass | None:
        """Return the medium between the faces, where there is one (for Brewster's angle)."""
        return None

    def interrupts(self) -> bool:
        """Whether it is drawn so that it stops its route on purpose (a closed shutter)."""
        return False
