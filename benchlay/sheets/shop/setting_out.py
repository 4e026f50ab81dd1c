"""Setting-out table: where everything stands, how it looks, in which hole its post stands."""

from __future__ import annotations

from collections.abc import Iterator
from math import acos, atan2, degrees, pi, sqrt

from benchlay.elements.mount import Holder
from benchlay.layout.bench import Holes
from benchlay.named import NamedTuple
from benchlay.placing.nominal import NominalRay
from benchlay.placing.placed import Placed, PlacedElement, PlacedSource
from benchlay.placing.pose import Pose, Vector, dot
from benchlay.sheets.primitives import Point
from benchlay.sheets.shop.rows import Cell, Heading, Rows

STOCK_MM = (20.0, 30.0, 40.0, 50.0, 75.0, 100.0, 150.0, 200.0, 250.0, 300.0)
"""Lengths in which posts are commonly to be had (common practice)."""

_REFLECTED = "reflected"
_LEVEL = 1e-9
_HEADINGS = (
    Heading("name", 26.0),
    Heading("kind", 24.0),
    Heading("x", 17.0, "mm"),
    Heading("y", 17.0, "mm"),
    Heading("X from datum", 17.0, "mm"),
    Heading("Y from datum", 17.0, "mm"),
    Heading("height", 17.0, "mm"),
    Heading("facing", 18.0, "deg"),
    Heading("pitch", 14.0, "deg"),
    Heading("turn", 18.0, "deg"),
    Heading("after", 38.0),
    Heading("distance", 20.0, "mm"),
    Heading("hole column", 15.0),
    Heading("hole row", 13.0),
    Heading("hole to post x", 17.0, "mm"),
    Heading("hole to post y", 17.0, "mm"),
    Heading("post", 16.0, "mm"),
    Heading("stock post", 14.0, "mm"),
    Heading("stock raises", 15.0, "mm"),
    Heading("remark", 20.0),
)


class Footing(NamedTuple):
    """What an element stands on: the axis of its post, and how long that is."""

    at: Point
    length_mm: float
    foot: tuple[Point, ...] = ()  # corners of its foot in the plan
    slots: tuple[Point, ...] = ()  # where bolts go through it


def footing(placed: PlacedElement) -> Footing | None:
    """Return what an element stands on in the plan; None where nothing holds it."""
    holder: Holder = placed.holder
    posts = [s for s in holder.upright if s.part == "post"]
    if not posts or holder.post_mm is None:
        return None
    pose = placed.pose._replace(pitch_rad=0.0, rolled=None)
    low, high = (z for z in _ends([p[2] for p in posts[0].points]))
    feet = [s for s in holder.upright if s.part == "foot"]
    corners: tuple[Point, ...] = ()
    if feet:
        (x0, x1), (y0, y1) = (_ends([p[k] for p in feet[0].points]) for k in (0, 1))
        around = ((x0, y0), (x1, y0), (x1, y1), (x0, y1))
        corners = tuple(_plan(pose, corner) for corner in around)
    slots = getattr(placed.element.mount, "slots", None) or ()
    return Footing(
        _plan(pose, holder.post_mm),
        high - low,
        corners,
        tuple(_plan(pose, (float(x), float(y))) for x, y in slots),
    )


def _ends(values: list[float]) -> tuple[float, float]:
    return min(values), max(values)


def _plan(pose: Pose, local: Point) -> Point:
    x, y, _ = pose.point((local[0], local[1], 0.0))
    return x, y


def nearest_hole(grid: Holes, at: Point) -> tuple[int, int]:
    """Return column and row, from 1, of the hole of an endless grid that is nearest."""
    column, row = (round((at[k] - grid.first_mm[k]) / grid.pitch_mm) + 1 for k in (0, 1))
    return max(column, 1), max(row, 1)


def hole_at(grid: Holes, column: int, row: int) -> Point:
    """Return where a hole is."""
    x, y = grid.first_mm
    return x + (column - 1) * grid.pitch_mm, y + (row - 1) * grid.pitch_mm


def setting_out(placed: Placed) -> Rows:
    """Return the setting-out table of the bench as drawn, sources first, by name."""
    base = placed.base
    grid = base.layout.bench.holes
    rows = [_source(base.sources[name], grid) for name in sorted(base.sources)]
    reflecting = {
        item.item
        for element in base.elements.values()
        for item in element.element.stand.after
        if item.branch == _REFLECTED
    }
    for name in sorted(base.elements):
        element = base.elements[name]
        turns = name in reflecting or element.element.record.DEFAULT_BRANCH == _REFLECTED
        rows.append(_element(element, placed.arrivals.get(name), grid, turns=turns))
    return Rows("setting-out", "Setting-out table", _HEADINGS, tuple(rows), tuple(_notes()))


def _notes() -> Iterator[str]:
    yield (
        "x and y of the reference point from the bench's near left corner; X and Y from the datum, "
        "hole column 1, row 1, as on the plan (from the corner where there are no holes); height "
        "above the bench's top; facing of the front normal, anticlockwise from +x."
    )
    yield (
        "Turn: of the nominal chief ray reflected at the front, positive to the left; distance: "
        "along it from where it leaves what stands under 'after'."
    )
    yield (
        "Hole: nearest to the post's axis, column and row from 1; the post stands the given "
        "distance from it. Check under the foot that a slot reaches it."
    )
    yield (
        "Post: from the bench's top to the lower side of the mount, the foot included. Stock: "
        "the nearest common length, and by how much it raises the optic: shim, or move the beam."
    )


def _source(placed: PlacedSource, grid: Holes | None) -> tuple[Cell, ...]:
    remark = "out as drawn" if placed.source.stand.out else ""
    return (
        *_pose(placed.source.name, "source", placed.pose, grid),
        None, "", None, None, None, None, None, None, None, None, remark,
    )  # fmt: skip


def _pose(name: str, kind: str, pose: Pose, grid: Holes | None) -> tuple[Cell, ...]:
    x, y, z = (_clean(v) for v in pose.at)
    x0, y0 = grid.first_mm if grid is not None else (0.0, 0.0)
    return (
        name, kind, x, y, _clean(x - x0), _clean(y - y0), z,
        _clean(degrees(pose.facing_rad) % 360.0) % 360.0, _clean(degrees(pose.pitch_rad)),
    )  # fmt: skip


def _clean(value: float) -> float:
    return round(value, 9) + 0.0


def _element(
    placed: PlacedElement, ray: NominalRay | None, grid: Holes | None, *, turns: bool
) -> tuple[Cell, ...]:
    element = placed.element
    after = ", ".join(
        item.item + (f".{item.branch}" if item.branch else "") for item in element.stand.after
    )
    turn = distance = None
    if ray is not None and ray.aimed:
        distance = _clean(dot(_less(placed.pose.at, ray.point), ray.direction))
        if turns:
            turn = _turn(ray.direction, placed.pose.axes()[0])
    remark = "out as drawn" if placed.out else ""
    stands = footing(placed)
    where: tuple[Cell, ...] = (None,) * 7
    if stands is not None:
        where = (*_hole(stands, grid), *_post(stands.length_mm))
    return (
        *_pose(element.name, element.kind, placed.pose, grid),
        turn, after, distance, *where, remark,
    )  # fmt: skip


def _less(a: Vector, b: Vector) -> Vector:
    return (a[0] - b[0], a[1] - b[1], a[2] - b[2])


def _turn(direction: Vector, normal: Vector) -> float | None:
    """Return by how much a ray is turned in plan at a front, to the left positive, degrees.

    Where it runs or goes on upright there is no such angle; then the angle in space.
    """
    away = 2.0 * dot(direction, normal)
    out = tuple(d - away * n for d, n in zip(direction, normal, strict=True))
    flat = sqrt((direction[0] ** 2 + direction[1] ** 2) * (out[0] ** 2 + out[1] ** 2))
    if flat < _LEVEL:
        cosine = sum(a * b for a, b in zip(direction, out, strict=True))
        return _clean(degrees(acos(min(1.0, max(-1.0, cosine)))))
    angle = atan2(out[1], out[0]) - atan2(direction[1], direction[0])
    turned = _clean(degrees((angle + pi) % (2.0 * pi) - pi))
    return 180.0 if turned == -180.0 else turned  # noqa: PLR2004 (a half turn)


def _hole(stands: Footing, grid: Holes | None) -> tuple[Cell, ...]:
    if grid is None:
        return (None,) * 4
    column, row = nearest_hole(grid, stands.at)
    x, y = hole_at(grid, column, row)
    return column, row, _clean(stands.at[0] - x), _clean(stands.at[1] - y)


def _post(length_mm: float) -> tuple[Cell, ...]:
    stock = min(STOCK_MM, key=lambda one: (abs(one - length_mm), one))
    return _clean(length_mm), stock, _clean(stock - length_mm)
