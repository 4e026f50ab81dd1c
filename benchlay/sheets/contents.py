"""What a plan shows, as plain data: the one thing between the traced bench and the drawing.

Lengths in mm in the plan frame (x right, y away, z up from the bench top), headings in degrees
anticlockwise from +x. Outlines are the kinds' own, true to size; an element's are in its own
frame, x along the front normal.
"""

from __future__ import annotations

from benchlay.named import NamedTuple
from benchlay.sheets.primitives import Point
from benchlay.sheets.scale import Window
from benchlay.sheets.title_block import TitleFields

Place = tuple[float, float, float]

SOURCE = "source"  # the kind of an item that light starts from


class Shape(NamedTuple):
    """A closed outline; `bulges` as in `primitives.Polyline`."""

    points: tuple[Point, ...]
    bulges: tuple[float, ...] = ()


class Item(NamedTuple):
    """An element or a source: what it is, where it stands, what it looks like from above."""

    name: str
    kind: str
    at: Place
    facing_deg: float
    outlines: tuple[Shape, ...] = ()  # of glass, metal, plates: what light meets
    coated: tuple[tuple[Point, Point], ...] = ()  # the outline's edges that bear a coating
    bodies: tuple[Shape, ...] = ()  # mounts, posts, feet, housings
    lines: tuple[tuple[Point, ...], ...] = ()  # of glass or metal that encloses nothing
    hidden: tuple[tuple[Point, ...], ...] = ()  # what lies inside a body


class Leg(NamedTuple):
    """A straight piece of a beam, working or stray."""

    name: str  # B1, S3; a tag of its own is drawn where `words` are given
    wavelength_nm: float
    start: Place
    end: Place
    stray: bool = False
    words: str = ""  # at the source, and where power or polarization change; lines by \n
    ends: str = ""  # the sink, or optic
    radii_mm: tuple[tuple[float, float], ...] = ()  # (distance along the leg, 1/e2 radius)
    weak: bool = False  # a stray below the limit: a line, and nothing that draws the eye
    inside: bool = False  # within an optic
    note: str = ""  # for the pointer that rests on it: name, wavelength, power, radius


class Opening(NamedTuple):
    """A gap in a panel, by distance along it."""

    name: str
    start_mm: float
    end_mm: float


class PanelLine(NamedTuple):
    """An upright sheet seen from above: its inner face from start to end."""

    name: str
    start: Point
    end: Point
    thickness_mm: float
    openings: tuple[Opening, ...] = ()
    is_open: bool = False
    access: str = "none"


class LidOutline(NamedTuple):
    """A level sheet above the bench, seen from above."""

    name: str
    corners: tuple[Point, ...]
    height_mm: float
    is_open: bool = False
    access: str = "none"


class GapMark(NamedTuple):
    """A gap of the enclosure, in plan; `ends` are those of the part of a side that it takes."""

    name: str  # G1
    label: str
    at: Point
    ends: tuple[Point, Point] | None = None


class Zone(NamedTuple):
    """A hazard zone: one polygon with holes, its label and its row of the schedule."""

    name: str  # Z1
    kind: str  # direct | diffuse | over
    rings: tuple[tuple[Point, ...], ...]  # outer, holes
    label: tuple[str, ...]  # lines that stand in the zone
    schedule: tuple[str, ...]  # source of it, wavelength, reach, what it assumes


class ZoneWords(NamedTuple):
    """What the zones of a plan are called: over their table, in its head, and in the legend."""

    title: str = "HAZARD ZONES"
    head: str = "Zone, and what it assumes"
    legend: str = "hazard zone: limit, ticks and hatching inside"


class BeamEntry(NamedTuple):
    """A row of the legend: how a wavelength is drawn and what it is."""

    wavelength_nm: float
    width_mm: float
    words: str


class Holes(NamedTuple):
    """The mounting holes: a regular grid."""

    first: Point
    pitch_mm: float
    columns: int
    rows: int
    thread: str = ""


class Mark(NamedTuple):
    """A finding of the review, and where it is."""

    number: int  # in the review's own order
    severity: str  # fail | warn | note
    words: str  # its check and its message
    at: Place | None
    here: bool = True  # it holds in the state that is drawn


class Picture(NamedTuple):
    """All that the plan of one state shows."""

    name: str
    fields: TitleFields
    outline: tuple[Point, ...]
    state: str = "as drawn"
    holes: Holes | None = None
    beam_height_mm: float = 0.0
    items: tuple[Item, ...] = ()
    legs: tuple[Leg, ...] = ()
    panels: tuple[PanelLine, ...] = ()
    lids: tuple[LidOutline, ...] = ()
    gaps: tuple[GapMark, ...] = ()
    mirror_stretches: tuple[tuple[Point, Point], ...] = ()  # of beams: see `drafting.gaps`
    zones: tuple[Zone, ...] = ()
    used_holes: tuple[Point, ...] = ()  # mounting holes that something is held by
    findings: tuple[Mark, ...] = ()
    warning: tuple[str, ...] = ()  # in large letters: the hazard in reach, eyewear
    signs: tuple[tuple[str, str, str], ...] = ()  # number, least size, what and where
    zones_are: ZoneWords = ZoneWords()
    set_out: bool = True  # running dimensions to every element
    part: Window | None = None  # of the bench, where this shows one of its parts
    legend: tuple[BeamEntry, ...] = ()
    revisions: tuple[tuple[str, str, str, str], ...] = ()  # rev, date, what, by
    notes: tuple[str, ...] = ()
    properties: tuple[tuple[str, str], ...] = ()
    sheet: str | None = None
    scale: int | None = None
    decimal: str = ","

    def shows(self, x: float) -> bool:
        """Whether a place across lies in the part of the bench that is drawn."""
        return self.part is None or self.part.left <= x <= self.part.right
