"""Where tags go: beside what they name, clear of other lettering, outlines and beams.

Greedy and in the order given, so that the same sheet always comes out the same. Each tag
tries places on rings round its element, near ones first, and takes the cheapest: on no other
lettering and on no beam at any price, then few lines crossed, then a short leader. Where no
ring has a place, it goes to the nearest free room on the sheet.
"""

from __future__ import annotations

import math
from collections.abc import Iterable, Sequence

import numpy as np
from numpy.typing import NDArray

from benchlay.named import NamedTuple
from benchlay.sheets.free_room import FreeRoom
from benchlay.sheets.primitives import Point
from benchlay.sheets.scale import Window

Floats = NDArray[np.float64]

_RINGS_MM = (1.5, 3.5, 6.0, 9.0, 13.0, 18.0, 24.0)
_DIRECTIONS = 24
_MARGIN_MM = 0.7  # ISO 128: lines keep at least this apart
_SAME_MM = 0.4
_OVERLAP = 1e4  # of two lines of lettering: never taken
_LINE_UNDER = 20.0  # a line that runs through the lettering
_LEADER_CROSSES = 2.0
_LEADER_PER_MM = 0.15
_LEADER_THROUGH = 60.0  # a leader through other lettering
_PER_MM = 0.25
_GOOD = 4.0  # cheap enough to stop looking further out
_MOST_FAR = 400  # free places that are looked at when no ring has one
_FAR_MM = 22.0  # a leader that is longer is hard to follow
_NEAR_LEADER_MM = 2.5  # nearer tags need no leader


class Place(NamedTuple):
    """Where a tag's box went, in mm on paper."""

    box: Window
    leader: tuple[Point, Point] | None  # from the thing to the box

    @property
    def middle(self) -> Point:
        """The middle of the box."""
        return (
            (self.box.left + self.box.right) / 2,
            (self.box.low + self.box.high) / 2,
        )


class Crowd:
    """What already stands on the sheet; grows with every tag that is placed."""

    def __init__(self, window: Window) -> None:
        """Start with an empty window on the paper, outside which nothing may go."""
        self._window = window
        self._boxes: list[Window] = []
        self._segments: list[tuple[float, float, float, float]] = []
        self._beams: list[bool] = []  # of each segment, whether no tag may stand on it
        self._array: Floats = np.empty((0, 4))
        self._forbidden = np.empty(0, dtype=np.bool_)
        self._known: dict[tuple[tuple[int, int], ...], int] = {}
        self._stale = False
        self.far = 0  # tags with a leader longer than the widest ring
        self._room = FreeRoom(window)

    @property
    def boxes(self) -> tuple[Window, ...]:
        """Every box of lettering so far."""
        return tuple(self._boxes)

    def add_box(self, box: Window) -> None:
        """Keep a rectangle free of lettering."""
        self._boxes.append(box)
        self._room.take_box(box)

    def add_line(
        self, points: Sequence[Point], *, closed: bool = False, beam: bool = False
    ) -> None:
        """Let tags rather not stand on a line, nor leaders cross it; on a beam, never.

        Panels, dimensions and leaders count as beams do: lettering on them is not read.

        Lines that look like one, as light that runs to and fro, count once.
        """
        ends = [*points[1:], points[0]] if closed else points[1:]
        for a, b in zip(points, ends, strict=False):
            key = tuple(sorted((round(x / _SAME_MM), round(y / _SAME_MM)) for x, y in (a, b)))
            row = self._known.setdefault(key, len(self._segments))
            if row == len(self._segments):
                self._segments.append((*a, *b))
                self._beams.append(beam)
                self._room.take_line(a, b)
                self._stale = True
            elif beam and not self._beams[row]:
                self._beams[row] = self._stale = True

    def _gather(self) -> None:
        """Bring the lines into arrays, where any were added."""
        if self._stale:
            self._array = np.array(self._segments, dtype=np.float64).reshape(-1, 4)
            self._forbidden = np.array(self._beams, dtype=np.bool_)
            self._stale = False

    def lines_through(self, box: Window) -> int:
        """Return how many lines run through a box."""
        self._gather()
        return int(_runs_through(self._array, np.array([box])).sum())

    def take(self, box: Window) -> bool:
        """Take a box where nothing is in its way; return whether it was taken."""
        left, low, right, high = self._window
        inside = box.left >= left and box.low >= low and box.right <= right and box.high <= high
        boxes = np.array(self._boxes, dtype=np.float64).reshape(-1, 4)
        covers = _overlaps(np.array([box]), boxes).any()
        if not inside or covers or self.lines_through(box):
            return False
        self.add_box(box)
        return True

    def place(self, size_mm: Point, anchors: Iterable[tuple[Point, float]]) -> Place | None:
        """Find a place for a box of lettering and take it.

        Parameters
        ----------
        size_mm : tuple of float
            Width and height of the box, slack included.
        anchors : iterable of (point, radius)
            Where on the thing the leader may end, and how far round it the thing reaches.

        Returns
        -------
        Place or None
            None where every place on the sheet would cover other lettering or a beam.
        """
        self._gather()
        anchors = list(anchors)
        best: tuple[float, Place] | None = None
        for ring in _RINGS_MM:
            found = self._best_on_ring(size_mm, anchors, ring)
            if found is not None and (best is None or found[0] < best[0]):
                best = found
            if best is not None and best[0] < _GOOD + _PER_MM * ring:
                break
        if best is None and anchors:
            best = self._far(size_mm, anchors[0][0])
        if best is None:
            return None
        place = best[1]
        self.add_box(place.box)
        if place.leader is not None:
            self.add_line(place.leader, beam=True)
            self.far += math.dist(*place.leader) > _FAR_MM
        return place

    def _best_on_ring(
        self, size_mm: Point, anchors: Sequence[tuple[Point, float]], ring: float
    ) -> tuple[float, Place] | None:
        if not anchors:
            return None
        every = [_boxes_round(size_mm, anchor, radius + ring) for anchor, radius in anchors]
        boxes = np.concatenate(every)
        starts = np.repeat(np.array([anchor for anchor, _ in anchors]), _DIRECTIONS, axis=0)
        leaders = _leaders(boxes, starts)
        steps = leaders[:, 2:] - leaders[:, :2]
        cost = self._costs(boxes, leaders) + _PER_MM * ring
        cost += _LEADER_PER_MM * np.hypot(steps[:, 0], steps[:, 1])
        n = int(np.argmin(cost))
        if cost[n] >= _OVERLAP:
            return None
        left, low, right, high = boxes[n].tolist()
        near = ring < _NEAR_LEADER_MM
        x1, y1, x2, y2 = leaders[n].tolist()
        leader = None if near else ((x1, y1), (x2, y2))
        return float(cost[n]), Place(Window(left, low, right, high), leader)

    def _far(self, size_mm: Point, anchor: Point) -> tuple[float, Place] | None:
        """Return the best of the free places nearest to an anchor, wherever they are."""
        margin = 2.0 * _MARGIN_MM
        grown = (size_mm[0] + margin, size_mm[1] + margin)
        boxes = self._room.places(grown, anchor, _MOST_FAR)
        if not len(boxes):
            return None
        boxes = boxes + _MARGIN_MM * np.array([1.0, 1.0, -1.0, -1.0])
        leaders = _leaders(boxes, np.array([anchor]))
        cost = self._costs(boxes, leaders)
        cost += _LEADER_PER_MM * np.hypot(*(leaders[:, 2:] - leaders[:, :2]).T)
        n = int(np.argmin(cost))
        if cost[n] >= _OVERLAP:
            return None
        left, low, right, high = boxes[n].tolist()
        x1, y1, x2, y2 = leaders[n].tolist()
        return float(cost[n]), Place(Window(left, low, right, high), ((x1, y1), (x2, y2)))

    def _costs(self, boxes: Floats, leaders: Floats) -> Floats:
        grown = boxes + _MARGIN_MM * np.array([-1.0, -1.0, 1.0, 1.0])
        left, low, right, high = self._window
        inside = (grown[:, 0] >= left) & (grown[:, 2] <= right)
        inside &= (grown[:, 1] >= low) & (grown[:, 3] <= high)
        cost = np.where(inside, 0.0, _OVERLAP)
        others = self._boxes_near(grown, leaders)
        if len(others):
            cost += _OVERLAP * _overlaps(grown, others).any(axis=1)
            cost += _LEADER_THROUGH * _runs_through(leaders, others).sum(axis=1)
        # What is out of the question already is not held against the many lines.
        open_ = np.flatnonzero(cost < _OVERLAP)
        if len(open_):
            cost[open_] += self._line_costs(grown[open_], leaders[open_])
        return cost

    def _line_costs(self, grown: Floats, leaders: Floats) -> Floats:
        near = self._near(grown, leaders)
        lines, forbidden = self._array[near], self._forbidden[near]
        under = _runs_through(lines, grown)
        cost: Floats = _LINE_UNDER * under.sum(axis=0) + _OVERLAP * under[forbidden].any(axis=0)
        open_ = np.flatnonzero(cost < _OVERLAP)
        cost[open_] += _LEADER_CROSSES * _crosses(leaders[open_], lines).sum(axis=1)
        return cost

    def _boxes_near(self, boxes: Floats, leaders: Floats) -> Floats:
        """Return the boxes of lettering that could matter to any of the boxes and leaders."""
        others = np.array(self._boxes, dtype=np.float64).reshape(-1, 4)
        x0, y0 = np.minimum(boxes.min(axis=0)[:2], leaders[:, :2].min(axis=0))
        x1, y1 = np.maximum(boxes.max(axis=0)[2:], leaders[:, :2].max(axis=0))
        near = (others[:, 2] > x0) & (others[:, 0] < x1) & (others[:, 3] > y0) & (others[:, 1] < y1)
        return np.asarray(others[near], dtype=np.float64)

    def _near(self, boxes: Floats, leaders: Floats) -> NDArray[np.bool_]:
        """Return which lines could matter to any of the boxes and leaders."""
        xs = np.concatenate([boxes[:, [0, 2]], leaders[:, [0, 2]]], axis=None)
        ys = np.concatenate([boxes[:, [1, 3]], leaders[:, [1, 3]]], axis=None)
        x, y = self._array[:, [0, 2]], self._array[:, [1, 3]]
        near = (x.max(axis=1) >= xs.min()) & (x.min(axis=1) <= xs.max())
        near &= (y.max(axis=1) >= ys.min()) & (y.min(axis=1) <= ys.max())
        matter: NDArray[np.bool_] = near
        return matter


def _boxes_round(size_mm: Point, anchor: Point, reach: float) -> Floats:
    """Return boxes (K, 4) whose nearest edge or corner is `reach` from an anchor."""
    angles = 2.0 * math.pi * np.arange(_DIRECTIONS) / _DIRECTIONS
    ux, uy = np.cos(angles).round(12), np.sin(angles).round(12)
    half_width, half_height = size_mm[0] / 2, size_mm[1] / 2
    # The middle goes out along the ray until the box is `reach` away: its half size in the
    # ray's own sense is added, edge by edge.
    x = anchor[0] + reach * ux + half_width * np.clip(2.0 * ux, -1.0, 1.0)
    y = anchor[1] + reach * uy + half_height * np.clip(2.0 * uy, -1.0, 1.0)
    return np.stack([x - half_width, y - half_height, x + half_width, y + half_height], axis=1)


def _leaders(boxes: Floats, anchors: Floats) -> Floats:
    """Return leaders (K, 4) from anchors (K, 2), or from one for all, to the boxes' near points."""
    starts = np.broadcast_to(anchors, (len(boxes), 2))
    return np.concatenate([starts, np.clip(starts, boxes[:, :2], boxes[:, 2:])], axis=1)


def _overlaps(boxes: Floats, others: Floats) -> NDArray[np.bool_]:
    a, b = boxes[:, None], others[None]
    return (
        (a[..., 0] < b[..., 2])
        & (a[..., 2] > b[..., 0])
        & (a[..., 1] < b[..., 3])
        & (a[..., 3] > b[..., 1])
    )


def _runs_through(segments: Floats, boxes: Floats) -> NDArray[np.bool_]:
    """Return whether each segment (S, 4) has a piece inside each box (K, 4): (S, K).

    By separating axes: their extents overlap in x and in y, and the box does not lie on one
    side of the segment's line.
    """
    x0, y0, x1, y1 = segments.T[:, :, None]
    left, low, right, high = boxes.T[:, None, :]
    found = (np.minimum(x0, x1) < right) & (np.maximum(x0, x1) > left)
    found &= (np.minimum(y0, y1) < high) & (np.maximum(y0, y1) > low)
    dx, dy = x1 - x0, y1 - y0
    off = np.abs(dx * ((low + high) / 2 - y0) - dy * ((left + right) / 2 - x0))
    reach = np.abs(dx) * (high - low) / 2 + np.abs(dy) * (right - left) / 2
    return np.asarray(found & (off < reach), dtype=np.bool_)


def _crosses(leaders: Floats, lines: Floats) -> NDArray[np.bool_]:
    """Return whether each leader (K, 4) crosses each line (S, 4): (K, S)."""
    p, r = leaders[:, None, :2], leaders[:, None, 2:] - leaders[:, None, :2]
    q, s = lines[None, :, :2], lines[None, :, 2:] - lines[None, :, :2]

    def turn(u: Floats, v: Floats) -> Floats:
        product: Floats = u[..., 0] * v[..., 1] - u[..., 1] * v[..., 0]
        return product

    across = turn(r, s)
    with np.errstate(divide="ignore", invalid="ignore"):
        t, u = turn(q - p, s) / across, turn(q - p, r) / across
    # A leader starts on its own thing: that touch is no crossing.
    near = 0.05
    found: NDArray[np.bool_] = (t > near) & (t < 1.0) & (u >= 0.0) & (u <= 1.0)
    return found
