"""Beams that are handed over: a route whose last item is an opening ends at the panel's line.

What the panel's edge takes of such a beam is the panel's, as of any other; what stands beyond
its line takes nothing, since the beam ends before it.
"""

from __future__ import annotations

import numpy as np

from benchlay.named import NamedTuple
from benchlay.optics.rays import dot
from benchlay.placing.placed import Placed
from benchlay.scene.tables import SINK, Flags, Floats, Ints, Scene
from benchlay.tracing.bodies import in_holes
from benchlay.tracing.frames import frame_of, gradient, inverse_roots, plane_depth, unit_vectors
from benchlay.tracing.front import Front
from benchlay.tracing.hits import HANDED, SKIN_MM, Hits
from benchlay.tracing.outlines import HOLE, Outlines
from benchlay.tracing.run_state import RunState
from benchlay.tracing.ways import Ways

_BEYOND_MM = 1e-6  # what stands in the panel's own plane is not beyond it


class Handing(NamedTuple):
    """Which beams end in which openings; K rows of a place in the tree and an opening."""

    node: Ints  # (K,)
    hole: Ints  # (K,)
    counts: Flags  # (V, K) whether this is the opening of that name in a variant
    fills: Flags  # (V, K, owners) what stands in it: its light starts there

    def end(self, front: Front, hits: Hits, scene: Scene) -> None:
        """End beams outside optics in their openings, where nothing is met before."""
        for k, hole in enumerate(self.hole.tolist()):
            rows = np.flatnonzero((front.node == self.node[k]) & self.counts[front.variant, k])
            if not len(rows):
                continue
            distance, passes = _crossing(front.take(rows), scene, hole)
            filled = self.fills[front.variant[rows], k, front.owner[rows]]
            passes &= (distance >= -SKIN_MM) | filled
            passes &= distance <= hits.distance[rows] + SKIN_MM
            rows, distance = rows[passes], distance[passes]
            hits.kind[rows], hits.row[rows], hits.plane[rows] = HANDED, hole, -1
            hits.distance[rows] = np.maximum(distance, 0.0)


def handing_of(ways: Ways, scene: Scene, placed: Placed) -> Handing | None:
    """Return which beams are handed over; None where no route ends in an opening.

    A panel that stands open in every state has no openings.
    """
    s = scene.solids
    found = [
        (node, hole)
        for node, name in ways.handing
        for hole, number in enumerate(s.hole_name.tolist())
        if scene.names[number] == name
    ]
    if not found:
        return None
    node, hole = (np.array(column) for column in zip(*found, strict=True))
    # A panel that a state moves has an opening for each of its places; one that stands open
    # is looked through where it would stand.
    stands = s.present[:, s.hole_solid[hole]]
    same = (node[:, None] == node) & (s.hole_name[hole][:, None] == s.hole_name[hole])
    counts: Flags = stands | ~((stands[:, None, :] & same).any(axis=2))
    return Handing(node, hole, counts, _fillers(scene, placed, hole))


def _fillers(scene: Scene, placed: Placed, hole: Ints) -> Flags:
    owners = len(scene.elements) + len(scene.sources) + 1
    fills = np.zeros((len(placed.states), len(hole), owners), dtype=np.bool_)
    for variant, state in enumerate(placed.states):
        for number, name in enumerate(scene.elements):
            opening = state.elements[name].element.stand.in_opening
            if opening is None:
                continue
            full = f"{opening.panel}.{opening.opening}"
            holes = [scene.names[n] == full for n in scene.solids.hole_name[hole].tolist()]
            fills[variant, holes, number] = True
    return fills


def _crossing(front: Front, scene: Scene, hole: int) -> tuple[Floats, Flags]:
    """Return how far the inner side of an opening is, and which beams pass it outwards."""
    s = scene.solids
    through = s.hole_through[hole]
    onward = front.direction @ through
    outwards = onward > 0.0
    gap = (s.hole_centre[hole] - front.position) @ through
    distance = np.where(outwards, gap, np.inf) / np.where(outwards, onward, 1.0)
    return distance, outwards & in_holes(front, scene)[:, hole]


def hand_over(core: Front, hits: Hits, state: RunState) -> None:
    """Book what ends in openings."""
    rows = np.flatnonzero(hits.kind == HANDED)
    name = state.scene.solids.hole_name[hits.row[rows]]
    state.book(rows, SINK["handed-over"], name, core.power[rows])


def this_side(outlines: Outlines, front: Front, hits: Hits, scene: Scene) -> Flags:
    """Tell which outlines (S,) do not lie beyond the line at which their beam is handed over."""
    kept = np.ones(len(outlines.problem), dtype=np.bool_)
    rows = np.flatnonzero(hits.kind[outlines.problem] == HANDED)
    if not len(rows):
        return kept
    s, some = scene.solids, outlines.problem[rows]
    hole = hits.row[some]
    place = _nearest(outlines, rows)
    normal = unit_vectors(s.hole_through[hole])
    frame = frame_of(front, some)
    crossing, slope = plane_depth(frame, s.hole_centre[hole], normal)
    rise = gradient(frame, normal, slope, inverse_roots(frame, np.maximum(crossing, 0.0)))
    line = crossing + dot(rise, place)
    depth = outlines.depth[rows, 0] + dot(outlines.depth[rows, 1:], place)
    own = outlines.name[rows] == s.name[s.hole_solid[hole]]
    kept[rows] = own | (depth <= line + _BEYOND_MM)
    holes = np.flatnonzero(outlines.role == HOLE)
    kept[holes] = kept[outlines.hole_of[holes]]
    return kept


def _nearest(outlines: Outlines, rows: Ints) -> Floats:
    """Return the places (n, 2) of the boxes round outlines that are nearest to the axis."""
    vertices, centre = outlines.vertices[rows], outlines.centre[rows]
    half = np.sqrt((outlines.axes[rows] ** 2).sum(axis=2))
    is_round = (outlines.corners[rows] == 0)[:, None]
    low = np.where(is_round, centre - half, vertices.min(axis=1))
    high = np.where(is_round, centre + half, vertices.max(axis=1))
    nearest: Floats = np.clip(0.0, low, high)
    return nearest
