"""The view from the side: bench, what stands on it, the beam, levels and the heights of eyes."""

from __future__ import annotations

from collections.abc import Iterator

from benchlay.sheets.elevation.board import Board, Strip, stations_of
from benchlay.sheets.elevation.contents import Band, Elevation, Station, Stretch
from benchlay.sheets.layers import beam_layer
from benchlay.sheets.lettering import SMALL_MM, shorten
from benchlay.sheets.primitives import (
    Axis,
    Dimension,
    Fill,
    Line,
    Point,
    Polyline,
    Primitive,
    Text,
    Up,
    figure,
)

_THINNEST_MM = 0.9  # of an optic on paper
_THICKEST_MM = 12.0  # of what the path does not run through: it stands askew to the path
_MARK_MM = 1.8  # of the ends of a clear region, beyond the optic on paper
_ARROW_MM = (4.0, 1.2)
_SHORTEST_ARROW_MM = 14.0
_BAND_MM = 5.0
_HATCH_MM = 2.0


def model(picture: Elevation, board: Board, strip: Strip) -> Iterator[Primitive]:
    """Draw what is true to size of a strip."""
    long = strip.s_out - strip.s
    first = board.model(strip, strip.s, 0.0)
    yield Line("BENCH", first, (first[0] + long, first[1]))
    for level in picture.levels:
        start = board.model(strip, strip.s, level.z)
        yield Line("PANELS", start, (start[0] + long, start[1]))
    for station in _standing(picture, strip):
        yield from _station(station, board, strip)
    for stretch in picture.stretches:
        yield from _beam(stretch, board, strip)
    if strip is board.strips[0]:
        yield from _dimensions(picture, board, strip)


def _standing(picture: Elevation, strip: Strip) -> list[Station]:
    """Return the stations that stand in a strip, those too that began before it."""
    before = [one for one in picture.stations if one.s < strip.s < one.s_out]
    return [*(one._replace(holders=()) for one in before), *stations_of(picture, strip)]


def _station(station: Station, board: Board, strip: Strip) -> Iterator[Primitive]:
    at = min(station.s, strip.s_out)
    for part, width, low, high in station.holders:
        middle = at - width / 2 if part == "body" else (station.s + station.s_out) / 2
        yield _box("BODIES", board, strip, (middle - width / 2, middle + width / 2), (low, high))
    if station.centre_z is None:
        return
    half = max(min(station.thickness, _THICKEST_MM), _THINNEST_MM * board.scale) / 2
    long = station.s_out - station.s
    across = (station.s - half, station.s + half)
    if long > 2.0 * half:  # what the path runs through is as long as that
        across = (max(station.s, strip.s), min(station.s_out, strip.s_out))
    z, tall = station.centre_z, station.half_height
    clear = station.clear_half
    if clear is None or clear >= tall:
        yield _box("OPTICS", board, strip, across, (z - tall, z + tall))
        return
    # The clear region stays open in the picture of an aperture, and is marked on all else.
    if station.kind in _OPEN:
        yield _box("OPTICS", board, strip, across, (z - tall, z - clear))
        yield _box("OPTICS", board, strip, across, (z + clear, z + tall))
        return
    yield _box("OPTICS", board, strip, across, (z - tall, z + tall))
    reach = half + _MARK_MM * board.scale
    for edge in (z - clear, z + clear):
        middle = (across[0] + across[1]) / 2
        ends = (board.model(strip, middle - reach, edge), board.model(strip, middle + reach, edge))
        yield Line("LEVELS", *ends)


_OPEN = ("aperture", "shutter", "tube", "opening")


def _box(
    layer: str, board: Board, strip: Strip, s: tuple[float, float], z: tuple[float, float]
) -> Polyline:
    corners: tuple[Point, ...] = (
        board.model(strip, s[0], z[0]),
        board.model(strip, s[1], z[0]),
        board.model(strip, s[1], z[1]),
        board.model(strip, s[0], z[1]),
    )
    return Polyline(layer, corners, closed=True)


def _beam(stretch: Stretch, board: Board, strip: Strip) -> Iterator[Primitive]:
    """Draw axis and envelope of the part of a stretch that lies in a strip."""
    low, high = max(stretch.s, strip.s), min(stretch.s_out, strip.s_out)
    if high <= low:
        return
    layer = beam_layer(stretch.wavelength_nm)
    start = board.model(strip, low, _height(stretch, low))
    end = board.model(strip, high, _height(stretch, high))
    yield Line(layer, start, end)
    if (high - low) / board.scale >= _SHORTEST_ARROW_MM:
        yield _arrow(layer, start, end, board.scale)
    if stretch.inside:
        return
    points = [(s, radius) for s, radius in _samples(stretch, stretch.up_mm) if low <= s <= high]
    points = [(low, _at(stretch, stretch.up_mm, low)), *points]
    points.append((high, _at(stretch, stretch.up_mm, high)))
    for sign in (1.0, -1.0):
        edge = tuple(board.model(strip, s, _height(stretch, s) + sign * r) for s, r in points)
        yield Polyline("ENVELOPE", edge)


def _height(stretch: Stretch, s: float) -> float:
    share = (s - stretch.s) / (stretch.s_out - stretch.s)
    return stretch.z + share * (stretch.z_out - stretch.z)


def _samples(stretch: Stretch, radii: tuple[float, ...]) -> list[tuple[float, float]]:
    step = (stretch.s_out - stretch.s) / (len(radii) - 1)
    return [(stretch.s + n * step, radius) for n, radius in enumerate(radii)]


def _at(stretch: Stretch, radii: tuple[float, ...], s: float) -> float:
    """Return a radius at a place of the path, straight between the samples."""
    place = (s - stretch.s) / (stretch.s_out - stretch.s) * (len(radii) - 1)
    n = min(int(place), len(radii) - 2)
    return radii[n] + (place - n) * (radii[n + 1] - radii[n])


def radius_at(stretch: Stretch, radii: tuple[float, ...], s: float) -> float:
    """Return the radius of a stretch at a place of the path, mm."""
    return _at(stretch, radii, min(max(s, stretch.s), stretch.s_out))


def samples(stretch: Stretch, radii: tuple[float, ...]) -> list[tuple[float, float]]:
    """Return the places of the path at which radii are known, with them."""
    return _samples(stretch, radii)


def _arrow(layer: str, start: Point, end: Point, scale: int) -> Fill:
    """Return an arrowhead in the middle of a leg."""
    dx, dy = end[0] - start[0], end[1] - start[1]
    size = (dx * dx + dy * dy) ** 0.5
    ux, uy = dx / size, dy / size
    x, y = (start[0] + end[0]) / 2, (start[1] + end[1]) / 2
    long, half = _ARROW_MM[0] * scale, _ARROW_MM[1] * scale
    back = (x - ux * long, y - uy * long)
    return Fill(
        layer,
        (
            (x, y),
            (back[0] - uy * half, back[1] + ux * half),
            (back[0] + uy * half, back[1] - ux * half),
        ),
    )


def _dimensions(picture: Elevation, board: Board, strip: Strip) -> Iterator[Dimension]:
    """Measure the beam's height where it begins, and the highest level."""
    left = strip.s
    heights = [picture.stretches[0].z]
    if picture.levels:
        heights.append(max(level.z for level in picture.levels))
    for n, height in enumerate(heights):
        x = left - (10.0 + 9.0 * n) * board.scale
        first, second = board.model(strip, left, 0.0), board.model(strip, left, height)
        through = board.model(strip, x, 0.0)
        yield Dimension(
            "DIMENSIONS", Axis.VERTICAL, first, second, through, decimals=1, height_mm=SMALL_MM
        )


def margin(picture: Elevation, board: Board, strip: Strip) -> Iterator[Primitive]:
    """Name the levels and draw the bands of eyes at the right of a strip, on paper."""
    right = board.paper(strip, strip.s_out)
    heights: list[tuple[float, str]] = [(0.0, "\u00b10 bench top")]
    for level in picture.levels:
        heights.append((level.z, f"+{figure(level.z, 1, picture.decimal)} {level.words}"))
    for band in picture.bands:
        if _in_view(band, board):
            low, high = (
                f"{'+' if z >= 0.0 else ''}{figure(z, 0, picture.decimal)}"
                for z in (band.low, band.high)
            )
            heights.append((max(band.low, 0.0), f"{band.words} from {low} to {high}"))
    lowest = strip.ground - 2.0 * SMALL_MM
    for z, words in sorted(heights):
        y = max(strip.ground + z / board.scale, lowest + 1.5 * SMALL_MM)
        lowest = y
        room = board.form.window.right - right - 2.0 * _BAND_MM - 4.0
        at = (right + 2.0 * _BAND_MM + 2.0, y)
        yield Text("LEVELS", at, shorten(words, room, SMALL_MM), SMALL_MM, up=Up.MIDDLE)
        yield Line("LEVELS", (right, strip.ground + z / board.scale), (at[0] - 0.8, y))
    for n, band in enumerate(picture.bands):
        yield from _band(band, board, strip, right + 1.0 + n * _BAND_MM)


def _in_view(band: Band, board: Board) -> bool:
    return band.low < board.height and band.high > 0.0


def _band(band: Band, board: Board, strip: Strip, left: float) -> Iterator[Primitive]:
    """Draw a band of eye heights as far as the view reaches."""
    if not _in_view(band, board):
        return
    top = board.height
    low = strip.ground + max(band.low, 0.0) / board.scale
    high = strip.ground + min(band.high, top) / board.scale
    right = left + _BAND_MM - 1.0
    corners = ((left, low), (right, low), (right, high), (left, high))
    yield Polyline("HAZARD", corners, closed=band.high <= top)
    y = low + _HATCH_MM
    while y < high:
        yield Line("HAZARD", (left, y), (right, min(y + right - left, high)))
        y += _HATCH_MM
