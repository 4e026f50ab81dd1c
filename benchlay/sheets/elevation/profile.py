"""The ruler of the path, the profile of the beam's radius, and what each station says."""

from __future__ import annotations

from collections.abc import Iterator
from math import floor, log10

from benchlay.sheets.elevation.board import (
    PITCH_MM,
    PROFILE_MM,
    ROWS_MM,
    Board,
    Strip,
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
_TICK_MM = 16.0  # at the least between figures of the ruler
_HEADROOM = 1.25  # of the profile above the largest radius
_NEAR_MM = 0.05  # of a station's column to its place, on paper: no leader


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


def profile(picture: Elevation, board: Board, strip: Strip) -> Iterator[Primitive]:
    """Draw radius against path, with what is clear at each station, on paper."""
    most = _nice(_HEADROOM * max(max(one.most_mm) for one in picture.stretches))
    box = Window(
        strip.left,
        strip.profile,
        board.paper(strip, strip.s_out),
        strip.profile + PROFILE_MM,
    )
    up = PROFILE_MM / most
    yield rectangle("TABLES", box)
    for share in (0.0, 0.5, 1.0):
        y = box.low + share * PROFILE_MM
        yield Line("TABLES", (box.left - 1.0, y), (box.left, y))
        words = figure(share * most, 4, picture.decimal)
        yield Text("TABLES", (box.left - 1.8, y), words, SMALL_MM, Across.RIGHT, Up.MIDDLE)
    at = (board.form.window.left + 1.0 + SMALL_MM, box.low + PROFILE_MM / 2)
    yield Text("TABLES", at, "1/e2 radius", SMALL_MM, Across.CENTRE, rotation_deg=90.0)
    for stretch in picture.stretches:
        yield from _curves(stretch, board, strip, (box.low, up))
    for station in stations_of(picture, strip):
        if station.clear_least is None or station.clear_least >= most:
            continue
        x = board.paper(strip, min(station.s, strip.s_out))
        foot = box.low + station.clear_least * up
        yield Line("OPTICS", (x, foot), (x, box.high))
        yield Line("OPTICS", (x - 0.8, foot), (x + 0.8, foot))


def _curves(
    stretch: Stretch, board: Board, strip: Strip, axis: tuple[float, float]
) -> Iterator[Primitive]:
    low, high = max(stretch.s, strip.s), min(stretch.s_out, strip.s_out)
    if high <= low:
        return
    foot, up = axis
    round_one = stretch.least_mm == stretch.most_mm
    curves = [(beam_layer(stretch.wavelength_nm), stretch.most_mm)]
    if not round_one:
        curves.append(("ENVELOPE", stretch.least_mm))
    for layer, radii in curves:
        inner = [(s, r) for s, r in samples(stretch, radii) if low < s < high]
        ends = [(s, radius_at(stretch, radii, s)) for s in (low, high)]
        points = [ends[0], *inner, ends[1]]
        yield Polyline(layer, tuple((board.paper(strip, s), foot + r * up) for s, r in points))


def _nice(value: float) -> float:
    """Return the next of 1, 2, 3, 4, 5, 6, 8 or 10 times a power of ten."""
    size = 10.0 ** floor(log10(value))
    return next(n * size for n in (1, 2, 3, 4, 5, 6, 8, 10) if n * size >= value)


def columns(picture: Elevation, board: Board, strip: Strip) -> Iterator[Primitive]:
    """Write what each station says in a column below its place, on paper."""
    stations = stations_of(picture, strip)
    places = [board.paper(strip, min(one.s, strip.s_out)) for one in stations]
    right = board.form.window.right - PITCH_MM / 2
    spread = _spread(places, board.form.window.left + 22.0, right)
    edges = [strip.rows]
    for _, depth in ROWS_MM:
        edges.append(edges[-1] - depth)
    for n, (heading, depth) in enumerate(ROWS_MM):
        at = (board.form.window.left + 1.0, edges[n] - depth / 2)
        yield Text("TABLES", at, _HEADINGS[heading], SMALL_MM, up=Up.MIDDLE)
    for station, place, x in zip(stations, places, spread, strict=True):
        yield Line("TAGS", (place, strip.profile), (place, strip.profile - 2.0))
        yield Line("TAGS", (place, strip.profile - 2.0), (x, strip.rows + 1.0))
        for n, words in enumerate(_words(picture, station)):
            depth = ROWS_MM[n][1]
            fitted = shorten(words, depth - 1.0, SMALL_MM)
            at = (x + SMALL_MM / 2, edges[n + 1] + 0.8)
            yield Text("TAGS", at, fitted, SMALL_MM, rotation_deg=90.0)


_HEADINGS = {
    "element": "element",
    "path": "path, mm",
    "height": "height, mm",
    "radius": "w upright",
    "clear": "clear half-width",
}


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
        yield "-"
        return
    most = radius_at(stretch, stretch.most_mm, station.s)
    ratio = f" = {told(station.clear_least / most, 1)} w" if most > 0.0 else ""
    yield f"{told(station.clear_least, 2)}{ratio}"


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
