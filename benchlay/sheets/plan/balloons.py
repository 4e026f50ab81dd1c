"""Findings on the plan: a balloon with its number at each place, a table of what they say.

Findings at one place share a balloon. The numbers are those of the review's own order.
"""

from __future__ import annotations

import itertools
import math
from collections.abc import Iterable, Iterator

from benchlay.named import NamedTuple
from benchlay.sheets.contents import Mark, Picture
from benchlay.sheets.lettering import SMALL_MM, width_mm
from benchlay.sheets.plan.beams import clipped
from benchlay.sheets.plan.board import Board
from benchlay.sheets.primitives import (
    Across,
    Circle,
    Line,
    Point,
    Polyline,
    Primitive,
    Text,
    Up,
)
from benchlay.sheets.scale import Window
from benchlay.sheets.tables import Column, Table

_HIGH_MM = 6.0
_DOT_MM = 0.5
_TOGETHER_MM = 4.0  # findings nearer to each other on paper share a balloon
_LAYERS = {"fail": "HAZARD"}  # the others are on that of tags
_COLUMNS = (Column("No.", 11.0), Column("Finding", 97.0))


class Balloons(NamedTuple):
    """What was drawn on paper, and the numbers for which there was no room."""

    paper: tuple[Primitive, ...]
    left_out: tuple[str, ...]


def balloons(picture: Picture, board: Board) -> Balloons:
    """Place and draw the balloons of the findings that hold in the state drawn."""
    out: list[Primitive] = []
    left_out: list[str] = []
    for at, marks in _together(picture.findings, board):
        words = _numbers(mark.number for mark in marks)
        size = (max(_HIGH_MM, width_mm(words, SMALL_MM) + 2.4), _HIGH_MM)
        place = board.crowd.place(size, ((at, 0.0),))
        if place is None:
            left_out.append(f"finding {words}")
            continue
        layer = next((_LAYERS[m.severity] for m in marks if m.severity in _LAYERS), "TAGS")
        out += _drawn(words, at, place.box, layer)
        board.crowd.add_line((at, _near(at, place.box)), beam=True)
    return Balloons(tuple(out), tuple(left_out))


def findings_table(marks: Iterable[Mark]) -> Table:
    """Return what the findings say, those of other states too."""
    rows = tuple(
        (str(mark.number), f"{mark.severity}: {mark.words}{'' if mark.here else ' (other states)'}")
        for mark in marks
    )
    return Table("FINDINGS", _COLUMNS, rows, "the report", most_lines=2)


def _together(marks: Iterable[Mark], board: Board) -> list[tuple[Point, list[Mark]]]:
    """Return the findings by their places on the sheet."""
    groups: list[tuple[Point, list[Mark]]] = []
    field = board.field
    middle = ((field.left + field.right) / 2, (field.low + field.high) / 2)
    for mark in marks:
        if mark.at is None or not mark.here:
            continue
        # What lies beyond the sheet is marked where the way to it leaves the field.
        inside = clipped(middle, board.on_paper(mark.at), field)
        at = middle if inside is None else inside[1]
        group = next((g for g in groups if math.dist(g[0], at) < _TOGETHER_MM), None)
        if group is None:
            groups.append((at, [mark]))
        else:
            group[1].append(mark)
    return groups


def _numbers(numbers: Iterable[int]) -> str:
    """Write numbers shortly.

    >>> _numbers([1, 2, 3, 7, 9, 10])
    '1-3, 7, 9-10'
    """
    runs = itertools.groupby(enumerate(sorted(numbers)), key=lambda pair: pair[1] - pair[0])
    parts = [[number for _, number in run] for _, run in runs]
    return ", ".join(f"{p[0]}-{p[-1]}" if len(p) > 1 else str(p[0]) for p in parts)


def _near(at: Point, box: Window) -> Point:
    return (min(max(at[0], box.left), box.right), min(max(at[1], box.low), box.high))


def _drawn(words: str, at: Point, box: Window, layer: str) -> Iterator[Primitive]:
    half = _HIGH_MM / 2
    left, right = box.left + half, box.right - half
    middle = ((box.left + box.right) / 2, (box.low + box.high) / 2)
    if right - left < half / 2:
        yield Circle(layer, middle, half)
    else:
        corners = ((left, box.low), (right, box.low), (right, box.high), (left, box.high))
        yield Polyline(layer, corners, closed=True, bulges=(0.0, 1.0, 0.0, 1.0))
    yield Text(layer, middle, words, SMALL_MM, Across.CENTRE, Up.MIDDLE)
    foot = _towards(middle, at, (max(left, min(right, at[0])), middle[1]), half)
    yield Line(layer, at, foot)
    yield Circle(layer, at, _DOT_MM)


def _towards(middle: Point, at: Point, core: Point, half: float) -> Point:
    """Return where a leader from outside meets a balloon's edge: towards its core line."""
    away = math.dist(core, at)
    if away <= half:
        return middle
    return (
        core[0] + half * (at[0] - core[0]) / away,
        core[1] + half * (at[1] - core[1]) / away,
    )
