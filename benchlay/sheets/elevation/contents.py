"""What an elevation shows, as plain data: a route laid out straight along its path.

Lengths in mm; `s` runs along the chief ray from the source, `z` is height above the bench top.
"""

from __future__ import annotations

from benchlay.named import NamedTuple
from benchlay.sheets.title_block import TitleFields


class Station(NamedTuple):
    """What the route meets in one place."""

    name: str
    kind: str
    s: float  # where the chief ray first meets it
    s_out: float  # where it leaves it
    z: float
    centre_z: float | None = None  # of the optic's outline
    half_height: float = 0.0  # of the outline, upright
    clear_half: float | None = None  # of the clear region, upright
    clear_least: float | None = None  # of the clear region as the beam sees it, the smaller way
    thickness: float = 0.0  # along the path, for the picture
    holders: tuple[tuple[str, float, float, float], ...] = ()  # part, width, low, high


class Stretch(NamedTuple):
    """A straight piece of the route, with radii at even steps from its start to its end."""

    s: float
    s_out: float
    z: float
    z_out: float
    wavelength_nm: float
    inside: bool  # of an optic
    up_mm: tuple[float, ...]  # 1/e² radius upright
    least_mm: tuple[float, ...]  # the smaller and the larger 1/e² radius
    most_mm: tuple[float, ...]


class Level(NamedTuple):
    """A height that holds all along."""

    words: str
    z: float


class Band(NamedTuple):
    """Heights at which eyes may be."""

    words: str
    low: float
    high: float


class Elevation(NamedTuple):
    """An elevation of one route in one state."""

    route: str
    state: str
    fields: TitleFields
    stations: tuple[Station, ...]
    stretches: tuple[Stretch, ...]
    levels: tuple[Level, ...]
    bands: tuple[Band, ...]
    notes: tuple[str, ...]
    properties: tuple[tuple[str, str], ...]
    decimal: str

    @property
    def length(self) -> float:
        """The path from the source to the end."""
        return self.stretches[-1].s_out

    @property
    def top(self) -> float:
        """The highest of what stands, runs or is marked as a level."""
        heights = [level.z for level in self.levels]
        heights += [max(one.z, one.z_out) + max(one.up_mm) for one in self.stretches]
        heights += [s.centre_z + s.half_height for s in self.stations if s.centre_z is not None]
        heights += [high for s in self.stations for _, _, _, high in s.holders]
        return max(heights)
