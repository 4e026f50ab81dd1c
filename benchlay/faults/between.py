"""Looks between two settings of a sweep for what a moving leg meets on the way.

Of a leg that both settings have, the rays between are laid as closely as the beam is wide, and
each is held against everything that stands there. Where what is met changes, the place is
halved down to where it changes. That costs no tracing; what is found is then traced.
"""

from __future__ import annotations

import numpy as np

from benchlay.faults.legs import Labels, Legs, ends
from benchlay.named import NamedTuple
from benchlay.placing.placed import Placed
from benchlay.scene.compile import compile_scene
from benchlay.scene.tables import SINK, Flags, Floats, Ints
from benchlay.tracing.beams import NOTHING, SOLID
from benchlay.tracing.front import OUTSIDE, Front
from benchlay.tracing.hits import nearest
from benchlay.zones.enclosure_line import enclosure_line

CLOSEST_MM = 0.1  # a narrower beam is not followed in steps of its own: nor is a gap found
WIDEST_MM = 1.0  # however wide the beam is: a gap of this size is found
MOST_STEPS = 1500  # between two settings
_HALVINGS = 14  # of a step: down to a ten-thousandth of it
_STILL_MM = 1e-6
_BEFORE_MM = 0.01  # a panel's inner face lies on the line: what ends on it has not crossed it
_RAYS = 4096  # at a time


class Moving(NamedTuple):
    """K legs of a pair of settings, each at both."""

    pair: Ints  # (K,) number of the pair
    state: Ints  # (K,) number of the layout's state
    legs: tuple[Legs, Legs]  # K each, at the lower setting and at the upper one


class Change(NamedTuple):
    """A place between two settings where what is met changes, as shares of the way."""

    pair: int
    before: float
    after: float
    edge: bool  # whether light gets out on one side only, so that the place itself matters


class Looked(NamedTuple):
    """What was seen: changes, middles of what is met on the way, and the widest step left."""

    changes: list[Change]
    middles: list[tuple[int, float]]
    step_mm: float


def moving(pairs: list[tuple[int, Legs, Legs]], states: list[int]) -> Moving | None:
    """Return the legs of pairs of settings that are there at both and not in one place."""
    number, state, first, second = [], [], [], []
    for (pair, a, b), own in zip(pairs, states, strict=True):
        _, at, to = np.intersect1d(a.chain, b.chain, return_indices=True)
        moved = np.abs(a.position[at] - b.position[to]).max(axis=1, initial=0.0) > _STILL_MM
        turned = np.abs(a.direction[at] - b.direction[to]).max(axis=1, initial=0.0)
        moved |= turned * np.maximum(a.length[at], b.length[to]) > _STILL_MM
        number.append(np.full(int(moved.sum()), pair))
        state.append(np.full(int(moved.sum()), own))
        first.append(Legs(*(column[at[moved]] for column in a)))
        second.append(Legs(*(column[to[moved]] for column in b)))
    if not number or not sum(len(part) for part in number):
        return None
    return Moving(
        np.concatenate(number),
        np.concatenate(state),
        (_joined(first), _joined(second)),
    )


def _joined(parts: list[Legs]) -> Legs:
    return Legs(*(np.concatenate(columns) for columns in zip(*parts, strict=True)))


class Looker:
    """Holds rays against the bench at rest in each of its states."""

    def __init__(self, placed: Placed, labels: Labels) -> None:
        self._scene = compile_scene(placed)
        self._tables = labels.of_scene(self._scene)
        self._nothing = labels.nothing
        self._outlines = [np.array(enclosure_line(state.layout).corners) for state in placed.states]
        self._bench_mm = max(
            float(np.ptp(np.array(state.layout.bench.outline), axis=0).sum())
            for state in placed.states
        )

    def look(self, legs: Moving) -> Looked:
        """Return where what is met changes between the two settings of each leg."""
        counts, step_mm = self._counts(legs)
        leg = np.repeat(np.arange(len(counts)), counts + 1)
        place = np.arange(len(leg)) - np.repeat(np.cumsum(counts + 1) - counts - 1, counts + 1)
        share = place / np.repeat(counts, counts + 1)
        met, gone = self._met(legs, leg, share)
        same = leg[1:] == leg[:-1]
        at = np.flatnonzero(same & (met[1:] != met[:-1]))
        low, high = self._halved(legs, leg[at], share[at], share[at + 1], met[at])
        changes = [
            Change(int(legs.pair[k]), float(a), float(b), bool(e))
            for k, a, b, e in zip(leg[at], low, high, gone[at] != gone[at + 1], strict=True)
        ]
        return Looked(changes, self._middles(legs, leg, share, met), step_mm)

    def _counts(self, legs: Moving) -> tuple[Ints, float]:
        a, b = legs.legs
        reach = np.minimum(np.maximum(a.length, b.length), self._bench_mm)[:, None]
        way = np.abs((b.position + reach * b.direction) - (a.position + reach * a.direction))
        way = np.sqrt((way**2).sum(axis=1))
        step = np.clip(np.minimum(a.radius, b.radius), CLOSEST_MM, WIDEST_MM)
        wanted = np.ceil(way / step).astype(np.int64)
        counts: Ints = np.clip(wanted, 1, MOST_STEPS)
        return counts, float((way / counts).max(initial=0.0))

    def _met(self, legs: Moving, leg: Ints, share: Floats) -> tuple[Ints, Flags]:
        parts = [
            self._met_by(legs, leg[i : i + _RAYS], share[i : i + _RAYS])
            for i in range(0, len(leg), _RAYS)
        ]
        if not parts:
            return np.zeros(0, dtype=np.int64), np.zeros(0, dtype=np.bool_)
        return np.concatenate([p[0] for p in parts]), np.concatenate([p[1] for p in parts])

    def _met_by(self, legs: Moving, leg: Ints, share: Floats) -> tuple[Ints, Flags]:
        a, b = legs.legs
        part = share[:, None]
        position = (1.0 - part) * a.position[leg] + part * b.position[leg]
        direction = (1.0 - part) * a.direction[leg] + part * b.direction[leg]
        direction /= np.sqrt((direction**2).sum(axis=1))[:, None]
        front = Front.made(
            len(leg),
            variant=legs.state[leg],
            source=a.source[leg],
            wave=a.wave[leg],
            parent=-1,
            node=-1,
            face=-1,
            body=-1,
            owner=a.owner[leg],
            within=OUTSIDE,
            index=a.medium[leg],
            kept=1.0,
            position=position,
            direction=direction,
        )
        hits = nearest(front, self._scene)[0]
        met = ends(hits.kind, hits.row, self._tables, self._nothing)
        end = position + (hits.distance - _BEFORE_MM)[:, None] * direction
        return met, self._gone(hits.kind, hits.row, end, legs.state[leg])

    def _gone(self, kind: Ints, row: Ints, end: Floats, state: Ints) -> Flags:
        """Tell which rays end beyond the enclosure's line, or where nothing encloses them."""
        solid = np.where(kind == SOLID, row, 0)
        gone: Flags = (kind == NOTHING) | (
            (kind == SOLID) & (self._scene.solids.sink[solid] == SINK["wall"])
        )
        for number, outline in enumerate(self._outlines):
            here = state == number
            gone[here] |= ~_within(outline, end[here])
        return gone

    def _halved(
        self, legs: Moving, leg: Ints, low: Floats, high: Floats, first: Ints
    ) -> tuple[Floats, Floats]:
        """Return the shares between which what is met changes, as near as rounding allows."""
        for _ in range(_HALVINGS if len(leg) else 0):
            middle = 0.5 * (low + high)
            same = self._met(legs, leg, middle)[0] == first
            low, high = np.where(same, middle, low), np.where(same, high, middle)
        return low, high

    def _middles(
        self, legs: Moving, leg: Ints, share: Floats, met: Ints
    ) -> list[tuple[int, float]]:
        """Return the middle of each stretch on which one thing is met, ends left out."""
        if not len(leg):
            return []
        breaks = np.flatnonzero((leg[1:] != leg[:-1]) | (met[1:] != met[:-1])) + 1
        starts, stops = np.append(0, breaks), np.append(breaks, len(leg)) - 1
        inner = (share[starts] > 0.0) & (share[stops] < 1.0) & (leg[starts] == leg[stops])
        middle = 0.5 * (share[starts] + share[stops])
        pair = legs.pair[leg[starts]]
        return [(int(p), float(m)) for p, m in zip(pair[inner], middle[inner], strict=True)]


def _within(outline: Floats, points: Floats) -> Flags:
    """Tell which points lie within a polygon, seen from above, its edge included by a little."""
    x, y = points[:, 0], points[:, 1]
    inside = np.zeros(len(x), dtype=np.bool_)
    for (ax, ay), (bx, by) in zip(outline, np.roll(outline, -1, axis=0), strict=True):
        if ay == by:
            continue
        crosses = (ay > y) != (by > y)
        inside ^= crosses & (x < ax + (y - ay) * (bx - ax) / (by - ay))
    return inside
