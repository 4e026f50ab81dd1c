"""On which sheet and at which scale an elevation is drawn, and where its parts lie.

A route is drawn in strips, one below the other, each a piece of its path. A strip has the view
from the side, a ruler of the path, the profile of the beam's radius, and what each station says.
"""

from __future__ import annotations

from math import ceil, floor

from benchlay.named import NamedTuple
from benchlay.sheets.elevation.contents import Elevation, Station
from benchlay.sheets.form import Form, form_for
from benchlay.sheets.lettering import SMALL_MM, width_mm
from benchlay.sheets.primitives import Point
from benchlay.sheets.scale import NothingFitsError

LEFT_MM = 30.0  # of the view: headings of rows, and dimensions
RIGHT_MM = 52.0  # names of levels, and the bands of eyes
ABOVE_MM = 3.0
HEADING_MM = 8.0  # above the first strip
RULER_MM = 10.0
PROFILE_MM = 34.0
BELOW_PROFILE_MM = 8.0  # leaders to the stations' columns
ROWS_MM = (16.0, 12.0, 13.0, 13.0, 12.0)  # of a column below its name, see `profile.HEADINGS`
_NAMES_MM = (10.0, 24.0)  # of the row of names, at the least and at the most
PITCH_MM = 4.6  # of the stations' columns
BENCH_MM = 25.0  # shown of what lies under the bench top, true size
HEADROOM_MM = 25.0  # above the highest, true size

# Strips at 1:5 show an inch of glass 5 mm high; a larger sheet is taken before a smaller scale
# while people can print it.
_PREFERENCES = (
    ("A3", 5),
    ("A2", 5),
    ("A3", 10),
    ("A2", 10),
    ("A1", 5),
    ("A1", 10),
    ("A2", 20),
    ("A1", 20),
    ("A1", 50),
    ("A0", 50),
    ("A0", 100),
)


class Strip(NamedTuple):
    """A piece of the path and where its parts lie on the paper."""

    s: float
    s_out: float
    left: float  # paper: where `s` lies
    ground: float  # paper: the bench top
    ruler: float  # paper: the line of the ruler
    profile: float  # paper: the foot of the profile
    rows: float  # paper: the top of the stations' rows


class Board(NamedTuple):
    """The form, the scale and the strips."""

    form: Form
    scale: int
    strips: tuple[Strip, ...]
    height: float  # of the view above the bench, true size

    @property
    def origin_mm(self) -> Point:
        """Where the model's origin lies on paper: the first strip's start on the bench top."""
        return self.strips[0].left, self.strips[0].ground

    def model(self, strip: Strip, s: float, z: float) -> Point:
        """Return the place in the model of a point of a strip."""
        down = (self.strips[0].ground - strip.ground) * self.scale
        return s - strip.s, z - down

    def paper(self, strip: Strip, s: float) -> float:
        """Return where a place of the path lies on paper, across."""
        return strip.left + (s - strip.s) / self.scale


def lay_out(picture: Elevation) -> Board:
    """Choose sheet, scale and strips.

    Raises
    ------
    NothingFitsError
        If a route is too long for the largest sheet at the smallest scale.
    """
    height = picture.top + HEADROOM_MM
    for size, scale in _PREFERENCES:
        form = form_for(picture.fields._replace(scale=f"1:{scale}"), size=size)
        window = form.window
        long = (window.width - LEFT_MM - RIGHT_MM) * scale
        each = depth_mm(height, scale, sum(rows_mm(picture)))
        most = floor((window.height - HEADING_MM) / each)
        wanted = max(ceil(picture.length / long - 1e-9), _for_stations(picture, long, scale))
        if wanted <= most:
            return Board(form, scale, _strips(picture, form, scale, wanted, each), height)
    msg = f"a route {picture.length:.0f} mm long does not fit on any sheet as an elevation"
    raise NothingFitsError(msg)


def rows_mm(picture: Elevation) -> tuple[float, ...]:
    """Return the depths of the rows of the stations' columns: names first, as long as they are."""
    longest = max((width_mm(one.name or one.kind, SMALL_MM) for one in picture.stations), default=0)
    return (min(max(longest + 2.0, _NAMES_MM[0]), _NAMES_MM[1]), *ROWS_MM)


def depth_mm(height: float, scale: int, rows: float) -> float:
    """Return how much of the paper a strip takes, upwards, with rows of a depth."""
    view = (height + BENCH_MM) / scale
    return ABOVE_MM + view + RULER_MM + PROFILE_MM + BELOW_PROFILE_MM + rows


def stations_of(picture: Elevation, strip: Strip) -> list[Station]:
    """Return the stations of a strip; one on a border belongs to the strip that it begins."""
    last = strip.s_out >= picture.length - 1e-6
    return [
        one
        for one in picture.stations
        if strip.s <= one.s < strip.s_out or (last and one.s >= strip.s_out)
    ]


def _for_stations(picture: Elevation, long: float, scale: int) -> int:
    """Return how many strips give each station room for its column."""
    for count in range(1, 9):
        piece = max(picture.length / count, 1.0)
        room = floor(min(long, max(piece, long)) / scale / PITCH_MM)
        counts = [0] * count
        for one in picture.stations:
            counts[min(int(one.s / piece), count - 1)] += 1
        if max(counts) <= room:
            return count
    return 9  # more than any sheet has room for


def _strips(
    picture: Elevation, form: Form, scale: int, count: int, each: float
) -> tuple[Strip, ...]:
    piece = picture.length / count
    high = picture.top + HEADROOM_MM
    strips = []
    for n in range(count):
        top = form.window.high - HEADING_MM - n * each - ABOVE_MM
        ground = top - high / scale
        ruler = ground - BENCH_MM / scale - 2.0
        profile = ruler - RULER_MM - PROFILE_MM + 2.0
        rows = profile - BELOW_PROFILE_MM
        left = form.window.left + LEFT_MM
        strips.append(Strip(n * piece, (n + 1) * piece, left, ground, ruler, profile, rows))
    return tuple(strips)
