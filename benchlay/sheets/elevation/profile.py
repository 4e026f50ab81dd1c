"""The ruler of the path, the profile of the beam's radius, and what each station says."""

from __future__ import annotations

from collections.abc import Iterator
from math import ceil, floor, log10

from benchlay.named import NamedTuple
from benchlay.sheets.elevation.board import (
    PITCH_MM,
    PROFILE_MM,
    Board,
    Strip,
    rows_mm,
    stations_of,
)
from benchlay.sheets.elevation.contents import Elevation, Station, Stretch
from benchlay.sheets.elevation.view import radius_at, samples
from benchlay.sheets.frame import rectangle
from benchlay.sheets.layers import beam_layer
from benchlay.sheets.lettering import SMALL_MM, shorten
from benchlay.sheets.primitives import Across, Line, Polyline, Primitive, Text, Up, figure
from benchlay.sheets.scale import Window

_STEPS_MM = (10, 20, 50, 100, 200, 500, 1000, 2000, 5000)
_PAD_MM = 0.6  # of the words in a row, from its lines
_TICK_MM = 16.0  # at the least between figures of the ruler
_HEADROOM = 1.25  # of the profile above the largest radius
_EVEN_UP_TO = 12.0  # of largest to smallest radius: beyond, an even scale hides the small ones
_GLASS_MM = 20.0  # a beam's shape in a plate as thick as this or thinner says nothing
_FAINTEST = 1e-5  # of the largest radius: what is smaller lies at the foot


def ruler(picture: Elevation, board: Board, strip: Strip) -> Iterator[Primitive]:
    """Draw a ruler of the path below the view, on paper."""
    left, right = strip.left, board.paper(strip, strip.s_out)
    yield Line("TABLES", (left, strip.ruler), (right, strip.ruler))
    step = next((n for n in _STEPS_MM if n / board.scale >= _TICK_MM), _STEPS_MM[-1])
    fine = step / 5 if str(step)[0] in "15" else step / 4
    n = 0
    while n * fine <= strip.s_out + 1e-6:
        s = n * fine
        if s >= strip.s - 1e-6:
            x = board.paper(strip, s)
            full = abs(s / step - round(s / step)) < 1e-6  # noqa: PLR2004 (rounding)
            tall = 2.0 if full else 1.0
            yield Line("TABLES", (x, strip.ruler), (x, strip.ruler - tall))
            if full:
                words = figure(s, 0, picture.decimal)
                at = (x, strip.ruler - tall - 0.8)
                yield Text("TABLES", at, words, SMALL_MM, Across.CENTRE, Up.TOP)
        n += 1
    at = (left - 2.0, strip.ruler - 0.8)
    yield Text("TABLES", at, "path, mm", SMALL_MM, Across.RIGHT, Up.TOP)


class _Scale(NamedTuple):
    """How radii are laid off upwards: evenly, or by their logarithm where they differ much."""

    least: float  # at the foot
    most: float  # at the top
    even: bool

    def share(self, radius: float) -> float:
        """Return how far up the box a radius lies, from 0 to 1."""
        if self.even:
            return radius / self.most
        inside = min(max(radius, self.least), self.most)
        return log10(inside / self.least) / log10(self.most / self.least)

    def marks(self) -> list[float]:
        """Return the radii that are written at the left."""
        if self.even:
            return [0.0, self.most / 2, self.most]
        decades = round(log10(self.most / self.least))
        return [self.least * 10.0**n for n in range(decades + 1)]


def _scale_of(picture: Elevation) -> _Scale:
    most = max(max(one.most_mm) for one in picture.stretches)
    least = min(min(one.least_mm) for one in picture.stretches)
    if most <= _EVEN_UP_TO * least:
        clear = [one.clear_least for one in picture.stations if one.clear_least is not None]
        tightest = min(clear, default=0.0)
        # An aperture that is near enough to the beam to matter is shown.
        top = max(most, tightest if tightest <= _EVEN_UP_TO * most else 0.0)
        return _Scale(0.0, _nice(_HEADROOM * top), even=True)
    low = 10.0 ** floor(log10(max(least, most * _FAINTEST)))
    return _Scale(low, 10.0 ** ceil(log10(_HEADROOM * most)), even=False)


def profile(picture: Elevation, board: Board, strip: Strip) -> Iterator[Primitive]:
    """Draw radius against path, with what is clear at each station, on paper."""
    scale = _scale_of(picture)
    right = board.paper(strip, strip.s_out)
    box = Window(strip.left, strip.profile, right, strip.profile + PROFILE_MM)
    yield rectangle("TABLES", box)
    for mark in scale.marks():
        y = box.low + scale.share(mark) * PROFILE_MM
        yield Line("TABLES", (box.left - 1.0, y), (box.left, y))
        words = figure(mark, 4, picture.decimal)
        yield Text("TABLES", (box.left - 1.8, y), words, SMALL_MM, Across.RIGHT, Up.MIDDLE)
        if 0.0 < scale.share(mark) < 1.0:
            yield Line("HOLES", (box.left, y), (box.right, y))
    at = (board.form.window.left + 1.0 + SMALL_MM, box.low + PROFILE_MM / 2)
    words = "1/e2 radius, mm" if scale.even else "1/e2 radius, mm (log)"
    yield Text("TABLES", at, words, SMALL_MM, Across.CENTRE, rotation_deg=90.0)
    for stretch in picture.stretches:
        yield from _curves(stretch, board, strip, scale)
    for station in stations_of(picture, strip):
        clear = station.clear_least
        if clear is None or scale.share(clear) >= 1.0:
            continue
        x = board.paper(strip, min(station.s, strip.s_out))
        foot = box.low + scale.share(clear) * PROFILE_MM
        yield Line("OPTICS", (x, foot), (x, box.high))
        yield Line("OPTICS", (x - 0.8, foot), (x + 0.8, foot))


def _curves(stretch: Stretch, board: Board, strip: Strip, scale: _Scale) -> Iterator[Primitive]:
    low, high = max(stretch.s, strip.s), min(stretch.s_out, strip.s_out)
    if high <= low or (stretch.inside and stretch.s_out - stretch.s < _GLASS_MM):
        return
    curves = [(beam_layer(stretch.wavelength_nm), stretch.most_mm)]
    if stretch.least_mm != stretch.most_mm:
        curves.append(("ENVELOPE", stretch.least_mm))
    for layer, radii in curves:
        inner = [(s, r) for s, r in samples(stretch, radii) if low < s < high]
        ends = [(s, radius_at(stretch, radii, s)) for s in (low, high)]
        points = tuple(
            (board.paper(strip, s), strip.profile + scale.share(r) * PROFILE_MM)
            for s, r in (ends[0], *inner, ends[1])
        )
        yield Polyline(layer, points)


def _nice(value: float) -> float:
    """Return the next of 1, 2, 3, 4, 5, 6, 8 or 10 times a power of ten."""
    size = 10.0 ** floor(log10(value))
    return next(n * size for n in (1, 2, 3, 4, 5, 6, 8, 10) if n * size >= value * (1.0 - 1e-9))


def columns(picture: Elevation, board: Board, strip: Strip) -> Iterator[Primitive]:
    """Write what each station says in a column below its place, on paper."""
    stations = stations_of(picture, strip)
    places = [board.paper(strip, min(one.s, strip.s_out)) for one in stations]
    right = board.form.window.right - PITCH_MM / 2
    spread = _spread(places, board.form.window.left + 22.0, right)
    depths = rows_mm(picture)
    edges = [strip.rows]
    for depth in depths:
        edges.append(edges[-1] - depth)
    ends = (board.form.window.left + 1.0, max([board.paper(strip, strip.s_out), *spread]) + 3.0)
    for heading, high, low in zip(HEADINGS, edges[:-1], edges[1:], strict=True):
        at = (ends[0] + _PAD_MM, (high + low) / 2)
        yield Text("TABLES", at, heading, SMALL_MM, up=Up.MIDDLE)
        yield Line("TABLES", (ends[0], low), (ends[1], low))
    for station, place, x in zip(stations, places, spread, strict=True):
        yield Line("TAGS", (place, strip.profile), (place, strip.profile - 2.0))
        yield Line("TAGS", (place, strip.profile - 2.0), (x, strip.rows + 1.0))
        for words, depth, high in zip(_words(picture, station), depths, edges, strict=False):
            fitted = shorten(words, depth - 2.0 * _PAD_MM, SMALL_MM)
            at = (x + SMALL_MM / 2, high - _PAD_MM)
            yield Text("TAGS", at, fitted, SMALL_MM, Across.RIGHT, rotation_deg=90.0)


HEADINGS = ("element", "path, mm", "height, mm", "radius upright", "clear half-width", "of radii")
"""What the rows of a station's column hold; their depths are `rows_mm`."""


def _words(picture: Elevation, station: Station) -> Iterator[str]:
    def told(value: float, digits: int) -> str:
        return figure(value, digits, picture.decimal)

    yield station.name or station.kind
    yield told(station.s, 1)
    yield told(station.z, 2)
    stretch = next((one for one in picture.stretches if one.s_out >= station.s - 1e-6), None)
    stretch = stretch or picture.stretches[-1]
    yield told(radius_at(stretch, stretch.up_mm, station.s), 3)
    if station.clear_least is None:
        yield from ("none", "none")  # a dash would look like a 1 when it stands upright
        return
    yield told(station.clear_least, 2)
    most = radius_at(stretch, stretch.most_mm, station.s)
    yield told(station.clear_least / most, 1) if most > 0.0 else "none"


def _spread(places: list[float], left: float, right: float) -> list[float]:
    """Move places apart to the pitch of columns, as little as that takes, within bounds."""
    moved: list[float] = []
    for place in places:
        moved.append(max(place, left, moved[-1] + PITCH_MM if moved else left))
    limit = right
    for n in range(len(moved) - 1, -1, -1):
        moved[n] = min(moved[n], limit)
        limit = moved[n] - PITCH_MM
    return moved
