"""Running dimensions from one datum corner, after ISO 129-1 (from memory).

All of a row share one line, with a ring where they count from; each is a true dimension with
its arrow and figure at its place. Where places lie closer than their figures are high, figures
are led apart. They are rounded to a hundredth of a millimetre; what is measured is exact.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable, Iterator, Sequence

from benchlay.sheets.lettering import SMALL_MM
from benchlay.sheets.primitives import (
    RUNNING_OUT_MM,
    Across,
    Axis,
    Circle,
    Dimension,
    Point,
    Polyline,
    Primitive,
    Text,
    Up,
    figure,
)

DECIMALS = 2
ROOM_MM = 30.0  # that a row takes on paper, figures included
_APART_MM = 4.2  # from figure to figure: their height and a gap
_GAP_MM, _LINE_MM, _RING_MM = 1.0, 8.0, 1.0
SAME_MM = 5e-3  # half of what the last decimal says


def distinct(values: Iterable[float]) -> list[float]:
    """Return values in order, those once that read the same."""
    out: list[float] = []
    for value in sorted(values):
        if not out or value - out[-1] > SAME_MM:
            out.append(value)
    return out


def spread(places: Sequence[float], apart: float) -> list[float]:
    """Move places as little as need be to be some distance apart, their order kept.

    Examples
    --------
    >>> spread([0.0, 1.0, 20.0], 4.0)
    [-1.5, 2.5, 20.0]
    """
    groups: list[tuple[float, int]] = []  # middle, how many
    for place in places:
        groups.append((place, 1))
        while len(groups) > 1:
            (a, m), (b, n) = groups[-2:]
            if b - (n - 1) * apart / 2 >= a + (m - 1) * apart / 2 + apart:
                break
            groups[-2:] = [((a * m + b * n) / (m + n), m + n)]
    return [
        middle + (k - (count - 1) / 2) * apart for middle, count in groups for k in range(count)
    ]


def fits(count: int, length: float, scale: float) -> bool:
    """Return whether so many figures find room along a length, model mm."""
    return count * _APART_MM <= length / scale


def running(
    values: Iterable[float],
    *,
    across: bool,
    datum: Point,
    edge: float,
    scale: float,
    decimal: str,
) -> list[Primitive]:
    """Give running dimensions below an edge (across), or left of one.

    Parameters
    ----------
    values : iterable of float
        Places from the datum, model mm.
    across : bool
        Along x, with the row below; else along y, with the row at the left.
    datum : tuple of float
        Where both count from, in the model.
    edge : float
        y (or x) in the model from which the lines start.
    scale : float
        N of 1:N.
    decimal : str
        Between units and tenths.
    """
    places = distinct(values)
    on_paper = [v / scale for v in places]
    axis = Axis.HORIZONTAL if across else Axis.VERTICAL
    out: list[Primitive] = []

    def at(along: float, off_mm: float) -> Point:
        off = edge - off_mm * scale
        return (datum[0] + along, off) if across else (off, datum[1] + along)

    for place, end, own in zip(places, spread(on_paper, _APART_MM), on_paper, strict=True):
        figured = figure(place, DECIMALS, decimal)
        if abs(place) <= SAME_MM:
            out += _origin(at, end * scale, figured, scale, across=across)
            continue
        out.append(
            Dimension(
                "DIMENSIONS",
                axis,
                at(0.0, 0.0),
                at(place, 0.0),
                at(0.0, _LINE_MM),
                text=figured if place < 0.0 else None,
                decimals=DECIMALS,
                height_mm=SMALL_MM,
                running=True,
                figure_aside_mm=end - own,
            )
        )
    return out


def _origin(
    at: Callable[[float, float], Point], end: float, words: str, scale: float, *, across: bool
) -> Iterator[Primitive]:
    """Draw where the row counts from: a ring on its line, and its nought."""
    beyond = at(end, _LINE_MM + RUNNING_OUT_MM)
    yield Polyline("DIMENSIONS", (at(0.0, _GAP_MM), at(0.0, _LINE_MM), beyond))
    yield Circle("DIMENSIONS", at(0.0, _LINE_MM), _RING_MM * scale)
    turned = 90.0 if across else 0.0
    figure_at = at(end, _LINE_MM + RUNNING_OUT_MM + _GAP_MM / 2)
    yield Text("DIMENSIONS", figure_at, words, SMALL_MM, Across.RIGHT, Up.MIDDLE, turned)


def datum_mark(datum: Point, scale: float) -> list[Primitive]:
    """Ring the datum corner."""
    return [Circle("DATUM", datum, radius * scale) for radius in (1.5, 2.2)]
