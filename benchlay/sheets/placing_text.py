"""Where tags go: beside what they name, clear of other lettering, outlines and beams.

Greedy and in the order given, so that the same sheet always comes out the same. Each tag
tries places on rings round its element, near ones first, and takes the cheapest: no overlap
with other lettering at any price, then few lines crossed, then a short leader.
"""

from __future__ import annotations

import math
from collections.abc import Iterable, Sequence

import numpy as np
from numpy.typing import NDArray

from benchlay.named import NamedTuple
from benchlay.sheets.primitives import Point
from benchlay.sheets.scale import Window

Floats = NDArray[np.float64]

_RINGS_MM = (1.5, 3.5, 6.0, 9.0, 13.0, 18.0, 24.0, 32.0, 42.0, 54.0)
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
        self._array: Floats = np.empty((0, 4))
        self._known: set[tuple[tuple[int, int], ...]] = set()

    @property
    def boxes(self) -> tuple[Window, ...]:
        """Every box of lettering so far."""
        return tuple(self._boxes)

    def add_box(self, box: Window) -> None:
        """Keep a rectangle free of lettering."""
        self._boxes.append(box)

    def add_line(self, points: Sequence[Point], *, closed: bool = False) -> None:
        """Let tags rather not stand on a line, nor leaders cross it.

        Lines that look like one, as light that runs to and fro, count once.
        """
        ends = [*points[1:], points[0]] if closed else points[1:]
        for a, b in zip(points, ends, strict=False):
            key = tuple(sorted((round(x / _SAME_MM), round(y / _SAME_MM)) for x, y in (a, b)))
            if key not in self._known:
                self._known.add(key)
                self._segments.append((*a, *b))

    def lines_through(self, box: Window) -> int:
        """Return how many lines run through a box."""
        lines = np.array(self._segments, dtype=np.float64).reshape(-1, 4)
        return int(_runs_through(lines, np.array([box])).sum())

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
            None where every place would cover other lettering or leave the window.
        """
        self._array = np.array(self._segments, dtype=np.float64).reshape(-1, 4)
        anchors = list(anchors)
        best: tuple[float, Place] | None = None
        for ring in _RINGS_MM:
            for anchor, radius in anchors:
                found = self._best_on_ring(size_mm, anchor, radius, ring)
                if found is not None and (best is None or found[0] < best[0]):
                    best = found
            if best is not None and best[0] < _GOOD + _PER_MM * ring:
                break
        if best is None:
            return None
        place = best[1]
        self.add_box(place.box)
        if place.leader is not None:
            self.add_line(place.leader)
        return place

    def _best_on_ring(
        self, size_mm: Point, anchor: Point, radius: float, ring: float
    ) -> tuple[float, Place] | None:
        boxes = _boxes_round(size_mm, anchor, radius + ring)
        leaders = _leaders(boxes, anchor)
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

    def _costs(self, boxes: Floats, leaders: Floats) -> Floats:
        grown = boxes + _MARGIN_MM * np.array([-1.0, -1.0, 1.0, 1.0])
        left, low, right, high = self._window
        inside = (grown[:, 0] >= left) & (grown[:, 2] <= right)
        inside &= (grown[:, 1] >= low) & (grown[:, 3] <= high)
        cost = np.where(inside, 0.0, _OVERLAP)
        if self._boxes:
            others = np.array(self._boxes)
            cost += _OVERLAP * _overlaps(grown, others).sum(axis=1)
            cost += _LEADER_THROUGH * _runs_through(leaders, others).sum(axis=1)
        near = self._near(grown, leaders)
        if len(near):
            cost += _LINE_UNDER * _runs_through(near, grown).sum(axis=0)
            cost += _LEADER_CROSSES * _crosses(leaders, near).sum(axis=1)
        return cost

    def _near(self, boxes: Floats, leaders: Floats) -> Floats:
        """Return the lines that could matter to any of the boxes and leaders."""
        xs = np.concatenate([boxes[:, [0, 2]], leaders[:, [0, 2]]], axis=None)
        ys = np.concatenate([boxes[:, [1, 3]], leaders[:, [1, 3]]], axis=None)
        x, y = self._array[:, [0, 2]], self._array[:, [1, 3]]
        near = (x.max(axis=1) >= xs.min()) & (x.min(axis=1) <= xs.max())
        near &= (y.max(axis=1) >= ys.min()) & (y.min(axis=1) <= ys.max())
        matter: Floats = self._array[near]
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


def _leaders(boxes: Floats, anchor: Point) -> Floats:
    """Return leaders (K, 4) from an anchor to the nearest point of each box."""
    x = np.clip(anchor[0], boxes[:, 0], boxes[:, 2])
    y = np.clip(anchor[1], boxes[:, 1], boxes[:, 3])
    start = np.full((len(boxes), 2), anchor)
    return np.concatenate([start, np.stack([x, y], axis=1)], axis=1)


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

    Clipping in each axis in turn: the piece of the parameter that lies between the two
    edges; the segment is inside where both pieces have a length in common.
    """
    start, step = segments[:, None, :2], segments[:, None, 2:] - segments[:, None, :2]
    low, high = boxes[None, :, :2], boxes[None, :, 2:]
    with np.errstate(divide="ignore", invalid="ignore"):
        a, b = (low - start) / step, (high - start) / step
    enter, leave = np.minimum(a, b), np.maximum(a, b)
    still = step == 0.0
    within = (start > low) & (start < high)
    enter = np.where(still, np.where(within, -np.inf, np.inf), enter)
    leave = np.where(still, np.where(within, np.inf, -np.inf), leave)
    first = np.maximum(enter.max(axis=-1), 0.0)
    last = np.minimum(leave.min(axis=-1), 1.0)
    found: NDArray[np.bool_] = first < last
    return found


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
