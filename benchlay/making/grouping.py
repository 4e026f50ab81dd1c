"""Holes in rows and columns of one pitch: stated once, as a shop reads them."""

from __future__ import annotations

from collections.abc import Iterable

from benchlay.making.blank import RoundHole
from benchlay.named import NamedTuple

_SAME_MM = 1e-6
_LEAST = 3  # holes to a row


class Group(NamedTuple):
    """Holes of one size and use, in a row along one axis or alone."""

    holes: tuple[RoundHole, ...]
    axis: int | None = None  # 0: along x, 1: along y, None: alone

    @property
    def pitch_mm(self) -> float:
        """From hole to hole; 0 for one alone."""
        if self.axis is None:
            return 0.0
        first, last = self.holes[0].centre[self.axis], self.holes[-1].centre[self.axis]
        return (last - first) / (len(self.holes) - 1)


def grouped(holes: Iterable[RoundHole]) -> list[Group]:
    """Return holes in rows along x, then in columns along y, then those that are left alone."""
    left, out = sorted(holes), []
    for axis in (0, 1):
        rows, left = _taken(left, axis)
        out += rows
    out += [Group((hole,)) for hole in left]
    return sorted(out, key=lambda group: group.holes[0].centre)


def _taken(holes: list[RoundHole], axis: int) -> tuple[list[Group], list[RoundHole]]:
    lines: dict[tuple[float, float, str], list[RoundHole]] = {}
    for hole in holes:
        across = (round(hole.centre[1 - axis], 6), hole.diameter_mm, hole.use)
        lines.setdefault(across, []).append(hole)
    rows, left = [], []
    for line in lines.values():
        line.sort(key=lambda h: h.centre[axis])
        if _even([h.centre[axis] for h in line]):
            rows.append(Group(tuple(line), axis))
        else:
            left += line
    return rows, sorted(left)


def _even(places: list[float]) -> bool:
    if len(places) < _LEAST:
        return False
    pitch = (places[-1] - places[0]) / (len(places) - 1)
    return all(abs(p - places[0] - n * pitch) < _SAME_MM for n, p in enumerate(places))
