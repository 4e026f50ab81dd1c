"""Parts of a plan that is drawn so small that its elements are specks, at a larger scale.

A part is a picture of its own: what lies between two lines across the bench, cut there.
Places are told from the same datum as on the whole plan.
"""

from __future__ import annotations

import math
from collections.abc import Iterator

import shapely

from benchlay.sheets.contents import Leg, LidOutline, Opening, PanelLine, Picture, Zone
from benchlay.sheets.primitives import Point, figure
from benchlay.sheets.scale import Window

SMALLEST = 10  # N of 1:N up to which an inch of glass can be told from a speck
_LONGEST_MM = 1900.0  # of a part: at 1:5 it stands on A2
_LAP_MM = 50.0  # shown of the neighbours at either side
_LITTLE_MM = 1e-6


def parts(picture: Picture) -> Iterator[Picture]:
    """Give the parts of a plan, from the left to the right."""
    xs, ys = [p[0] for p in picture.outline], [p[1] for p in picture.outline]
    left, right = min(xs), max(xs)
    count = math.ceil((right - left) / _LONGEST_MM - _LITTLE_MM)
    for n in range(count):
        low = left + n * (right - left) / count
        high = left + (n + 1) * (right - left) / count
        yield _part(
            picture,
            Window(low - _LAP_MM * (n > 0), min(ys), high + _LAP_MM * (n < count - 1), max(ys)),
            (n + 1, count),
        )


def _part(picture: Picture, window: Window, which: tuple[int, int]) -> Picture:
    number, count = which
    name = f"{picture.name}-part-{number}"
    low, high = window.left, window.right
    words = f"part {number} of {count}"
    kind = picture.fields.document_type
    edges = [figure(edge, 1, picture.decimal) for edge in (low, high)]
    outline = shapely.Polygon(picture.outline).intersection(_band(low, high))
    note = (
        f"Part {number} of {count}: the bench from X {edges[0]} to {edges[1]} of its near left "
        f"corner, at a larger scale than on the plan. Places are told from the datum of the whole."
    )
    return picture._replace(
        name=name,
        fields=picture.fields._replace(document_type=f"{kind}, {words}"),
        part=window,
        outline=_ring(outline) or picture.outline,
        items=tuple(item for item in picture.items if low <= item.at[0] <= high),
        legs=tuple(cut for leg in picture.legs for cut in _leg(leg, low, high)),
        panels=tuple(cut for one in picture.panels for cut in _panel(one, low, high)),
        lids=tuple(cut for one in picture.lids for cut in _lid(one, low, high)),
        gaps=tuple(gap for gap in picture.gaps if low <= gap.at[0] <= high),
        mirror_stretches=(),
        zones=tuple(cut for zone in picture.zones for cut in _zone(zone, low, high)),
        used_holes=tuple(at for at in picture.used_holes if low <= at[0] <= high),
        findings=tuple(m for m in picture.findings if m.at is not None and low <= m.at[0] <= high),
        set_out=False,
        sheet=None,
        scale=None,
        notes=(note, *picture.notes),
    )


def _band(low: float, high: float) -> shapely.Polygon:
    """Return what lies between two lines across the bench, however far."""
    return shapely.box(low, -1e7, high, 1e7)


def _ring(area: shapely.Geometry) -> tuple[Point, ...]:
    """Return the outline of the largest piece of an area."""
    pieces = [one for one in shapely.get_parts(area) if one.geom_type == "Polygon" and one.area]
    if not pieces:
        return ()
    largest = max(pieces, key=lambda one: (one.area, one.bounds))
    return tuple((float(x), float(y)) for x, y in largest.exterior.coords[:-1])


def _shares(a: float, b: float, low: float, high: float) -> tuple[float, float] | None:
    """Return which shares of the way from a to b lie between two bounds; None where none does."""
    if abs(b - a) < _LITTLE_MM:
        return (0.0, 1.0) if low <= a <= high else None
    first, last = sorted(((low - a) / (b - a), (high - a) / (b - a)))
    first, last = max(first, 0.0), min(last, 1.0)
    return (first, last) if last - first > _LITTLE_MM else None


def _leg(leg: Leg, low: float, high: float) -> Iterator[Leg]:
    """Give the part of a leg; its tag stays with its beginning, or goes to where it comes in."""
    shares = _shares(leg.start[0], leg.end[0], low, high)
    if shares is None:
        return
    first, last = shares
    x, y, z = (b - a for a, b in zip(leg.start, leg.end, strict=True))
    sx, sy, sz = leg.start
    long = math.sqrt(x * x + y * y + z * z)
    inner = tuple(
        (way - first * long, radius)
        for way, radius in leg.radii_mm
        if first * long - _LITTLE_MM <= way <= last * long + _LITTLE_MM
    )
    yield leg._replace(
        start=(sx + first * x, sy + first * y, sz + first * z),
        end=(sx + last * x, sy + last * y, sz + last * z),
        radii_mm=inner if len(inner) > 1 else (),
        words=leg.words or (leg.name if first > 0.0 else ""),
        ends=leg.ends if last == 1.0 else "optic",
    )


def _panel(panel: PanelLine, low: float, high: float) -> Iterator[PanelLine]:
    shares = _shares(panel.start[0], panel.end[0], low, high)
    if shares is None:
        return
    (ax, ay), (bx, by) = panel.start, panel.end
    first, last = shares
    before, length = first * math.dist(panel.start, panel.end), math.dist(panel.start, panel.end)
    openings = tuple(
        Opening(one.name, max(one.start_mm - before, 0.0), min(one.end_mm, last * length) - before)
        for one in panel.openings
        if one.end_mm > before and one.start_mm < last * length
    )
    yield panel._replace(
        start=(ax + first * (bx - ax), ay + first * (by - ay)),
        end=(ax + last * (bx - ax), ay + last * (by - ay)),
        openings=openings,
    )


def _lid(lid: LidOutline, low: float, high: float) -> Iterator[LidOutline]:
    ring = _ring(shapely.Polygon(lid.corners).intersection(_band(low, high)))
    if ring:
        yield lid._replace(corners=ring)


def _zone(zone: Zone, low: float, high: float) -> Iterator[Zone]:
    """Give a zone's largest piece that lies in a part, with its holes."""
    area = shapely.Polygon(zone.rings[0], zone.rings[1:]).intersection(_band(low, high))
    pieces = [one for one in shapely.get_parts(area) if one.geom_type == "Polygon" and one.area]
    for piece in sorted(pieces, key=lambda one: (-one.area, one.bounds)):
        rings = (piece.exterior, *piece.interiors)
        yield zone._replace(
            rings=tuple(tuple((float(x), float(y)) for x, y in ring.coords[:-1]) for ring in rings)
        )
