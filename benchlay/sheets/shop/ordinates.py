"""Running dimensions from one datum corner, after ISO 129-1 (from memory).

Each place stands at the end of its own line, square to the edge it is measured along; where
places lie closer than their figures are high, lines are led apart. Figures are rounded to a
hundredth of a millimetre; the lines stand at the exact places.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence

from benchlay.sheets.lettering import SMALL_MM
from benchlay.sheets.primitives import (
    Across,
    Circle,
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
_GAP_MM, _LED_FROM_MM, _LED_TO_MM, _END_MM = 1.0, 4.0, 10.0, 12.0
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


def running(
    values: Iterable[float],
    *,
    across: bool,
    datum: Point,
    edge: float,
    scale: float,
    decimal: str,
) -> list[Primitive]:
    """Draw running dimensions below an edge (across), or left of one.

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
    ends = [p * scale for p in spread([v / scale for v in places], _APART_MM)]
    out: list[Primitive] = []
    base = datum[0] if across else datum[1]

    def at(along: float, below_mm: float) -> Point:
        off = edge - below_mm * scale
        return (base + along, off) if across else (off, base + along)

    for place, end in zip(places, ends, strict=True):
        path = (
            at(place, _GAP_MM),
            at(place, _LED_FROM_MM),
            at(end, _LED_TO_MM),
            at(end, _END_MM),
        )
        out.append(Polyline("DIMENSIONS", path))
        out.append(
            Text(
                "DIMENSIONS",
                at(end, _END_MM + 1.0),
                figure(place, DECIMALS, decimal),
                SMALL_MM,
                Across.RIGHT,
                Up.MIDDLE,
                90.0 if across else 0.0,
            )
        )
    return out


def datum_mark(datum: Point, scale: float) -> list[Primitive]:
    """Ring the datum corner."""
    return [Circle("DATUM", datum, radius * scale) for radius in (1.5, 2.2)]
