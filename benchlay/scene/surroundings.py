"""What stands round the optics: bench top, panels, lids, floor, walls, source bodies."""

from __future__ import annotations

from collections.abc import Iterator

from benchlay.geometry.polygon import convex_pieces
from benchlay.geometry.solid import Hole, Solid, Vector, box, prism
from benchlay.layout.enclosure import Enclosure, Opening, Panel
from benchlay.layout.layout import Layout
from benchlay.layout.materials import SHEET, Material
from benchlay.named import NamedTuple
from benchlay.placing.placed import PlacedSource
from benchlay.placing.pose import Axes

BENCH_THICKNESS_MM = 50.0  # the bench top's own depth hardly matters: light meets its surface first
_FAR_WALL_MM = 100.0
_LEVEL: Axes = ((1.0, 0.0, 0.0), (0.0, 1.0, 0.0), (0.0, 0.0, 1.0))
_ORIGIN: Vector = (0.0, 0.0, 0.0)


class Surrounding(NamedTuple):
    """A solid of the surroundings with its frame and what it is called."""

    solid: Solid
    axes: Axes
    origin: Vector
    name: str | None
    sink: str
    specular: float


def bench_and_room(layout: Layout) -> Iterator[Surrounding]:
    """Yield bench top, floor, walls and ceiling; the floor exists without a room."""
    for piece in convex_pieces(layout.bench.outline):
        yield _level(prism("bench", piece, (-BENCH_THICKNESS_MM, 0.0)), None, "bench")
    floor = -layout.bench.surface_height_mm
    xs, ys = zip(*layout.bench.outline, strict=True)
    far = layout.limits.reach_mm + max(xs) - min(xs) + max(ys) - min(ys)
    across = (min(xs) - far, max(xs) + far), (min(ys) - far, max(ys) + far)
    yield _level(box("floor", *across, (floor - _FAR_WALL_MM, floor)), "floor", "wall")
    if layout.room is None:
        return
    top = floor + layout.room.height_mm
    outline = layout.room.outline
    for start, end in zip(outline, outline[1:] + outline[:1], strict=True):
        wall, axes = _upright("wall", (start, end), (floor, top), _FAR_WALL_MM)
        yield Surrounding(wall, axes, (*start, 0.0), "wall", "wall", 0.0)
    yield _level(box("ceiling", *across, (top, top + _FAR_WALL_MM)), "ceiling", "wall")


def _level(solid: Solid, name: str | None, sink: str) -> Surrounding:
    return Surrounding(solid, _LEVEL, _ORIGIN, name, sink, 0.0)


def sheets(layout: Layout) -> Iterator[Surrounding]:
    """Yield the panels and lids that are not open."""
    enclosure = layout.enclosure
    if enclosure is None:
        return
    for name in sorted(enclosure.panels):
        panel = enclosure.panels[name]
        if not panel.open:
            yield panel_solid(
                name, panel, enclosure, material_of(layout, enclosure.material_of(panel))
            )
    for name in sorted(enclosure.lids):
        lid = enclosure.lids[name]
        material = material_of(layout, enclosure.material_of(lid))
        heights = (lid.height_mm, lid.height_mm + material.thickness_mm)
        for piece in convex_pieces(lid.outline) if not lid.open else ():
            solid = prism("lid", piece, heights)
            yield Surrounding(solid, _LEVEL, _ORIGIN, name, "panel", material.specular)


def material_of(layout: Layout, name: str | None, otherwise: Material = SHEET) -> Material:
    """Return a material by name; without one, what the language assumes."""
    return otherwise if name is None else layout.materials[name]


def panel_solid(name: str, panel: Panel, enclosure: Enclosure, material: Material) -> Surrounding:
    """Return a panel in its own frame: x along it, y to the inside, z up."""
    heights = enclosure.heights_mm(panel)
    ends = (panel.from_mm, panel.to_mm)
    solid, axes = _upright("panel", ends, heights, material.thickness_mm)
    holes = tuple(
        _hole(f"{name}.{key}", opening, material.thickness_mm)
        for key, opening in sorted(panel.openings.items())
    )
    return Surrounding(
        solid._replace(holes=holes), axes, (*panel.from_mm, 0.0), name, "panel", material.specular
    )


def _upright(
    part: str,
    ends: tuple[tuple[float, float], tuple[float, float]],
    heights: tuple[float, float],
    thickness: float,
) -> tuple[Solid, Axes]:
    """Return an upright sheet whose inner face is the line; its thickness goes outwards."""
    (x0, y0), (x1, y1) = ends
    length = ((x1 - x0) ** 2 + (y1 - y0) ** 2) ** 0.5
    c, s = (x1 - x0) / length, (y1 - y0) / length
    axes: Axes = ((c, s, 0.0), (-s, c, 0.0), (0.0, 0.0, 1.0))
    return box(part, (0.0, length), (-thickness, 0.0), heights), axes


def _hole(name: str, opening: Opening, thickness: float) -> Hole:
    start, end, low, high = opening.box_mm()
    return Hole(
        name,
        opening.round,
        ((start + end) / 2, 0.0, (low + high) / 2),
        (((end - start) / 2, 0.0, 0.0), (0.0, 0.0, (high - low) / 2)),
        (0.0, -thickness, 0.0),
    )


def source_body(placed: PlacedSource) -> Surrounding | None:
    """Return the body of a source; its beam leaves from the middle of its front face."""
    body = placed.source.body
    if body is None or placed.source.stand.out:
        return None
    half_width, half_height = body.width_mm / 2, body.height_mm / 2
    solid = box(
        "source", (-body.length_mm, 0.0), (-half_width, half_width), (-half_height, half_height)
    )
    pose = placed.pose
    return Surrounding(solid, pose.axes(), pose.at, placed.source.name, "body", 0.0)
