"""Running dimensions from the datum hole to every element, where the sheet has room for them.

They stand above the bench and at its right, one beside the other; where elements stand close,
their figures are drawn apart and a short line leads to each. What has no room stands in the
table of elements all the same.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator

from benchlay.sheets.contents import Picture
from benchlay.sheets.lettering import SMALL_MM, width_mm
from benchlay.sheets.plan.board import Board
from benchlay.sheets.primitives import RUNNING_OUT_MM, Axis, Dimension, figure

_AWAY_MM = 8.0  # of the line from the bench
_APART_MM = 3.6  # from figure to figure
_SAME_MM = 0.05  # places that differ by less have one figure


def setting_out(picture: Picture, board: Board) -> Iterator[Dimension]:
    """Yield a dimension for every place of an element along X, then along Y."""
    if picture.holes is None or not picture.items or not picture.set_out:
        return
    xs, ys = [p[0] for p in picture.outline], [p[1] for p in picture.outline]
    right, top = max(xs), max(ys)
    x0, y0 = picture.holes.first
    above = (board.field.high - board.on_paper((0.0, top))[1], right - min(xs))
    beside = (board.field.right - board.on_paper((right, 0.0))[0], top - min(ys))
    away = board.long(_AWAY_MM)
    for at, aside in _row([item.at[0] for item in picture.items], x0, above, picture, board):
        yield Dimension(
            "DIMENSIONS", Axis.HORIZONTAL, (x0, top), (at, top), (x0, top + away),
            height_mm=SMALL_MM, text=_signed(at - x0, picture),
            running=True, figure_aside_mm=aside,
        )  # fmt: skip
    for at, aside in _row([item.at[1] for item in picture.items], y0, beside, picture, board):
        yield Dimension(
            "DIMENSIONS", Axis.VERTICAL, (right, y0), (right, at), (right + away, y0),
            height_mm=SMALL_MM, text=_signed(at - y0, picture),
            running=True, figure_aside_mm=aside,
        )  # fmt: skip


def _signed(length: float, picture: Picture) -> str | None:
    """Return the figure of a place on the other side of the datum; others say it themselves."""
    return figure(length, 1, picture.decimal) if length < 0.0 else None


def _row(
    places: Iterable[float],
    origin: float,
    room: tuple[float, float],
    picture: Picture,
    board: Board,
) -> list[tuple[float, float]]:
    """Return the places of a row with how far each figure is moved; none where they do not fit."""
    wanted: list[float] = []
    for place in sorted(places):
        known = not wanted or place - wanted[-1] > _SAME_MM
        if known and abs(place - origin) > _SAME_MM:
            wanted.append(place)
    deep, length = room
    widest = max(
        (width_mm(figure(p - origin, 1, picture.decimal), SMALL_MM) for p in wanted), default=0.0
    )
    fits = len(wanted) * _APART_MM < length / board.scale
    if not fits or _AWAY_MM + RUNNING_OUT_MM + widest > deep:
        return []
    on_paper = [place / board.scale for place in wanted]
    return [(p, a - b) for p, a, b in zip(wanted, _apart(on_paper), on_paper, strict=True)]


def _apart(places: list[float]) -> list[float]:
    """Return places that keep apart, each as near to its own as the others let it be.

    Places that are too close become a group that is spread about its middle, and takes in
    the next where it comes too near to that.
    """
    groups: list[list[float]] = []  # middle, count
    for place in places:
        groups.append([place, 1.0])
        while len(groups) > 1:
            (a, n), (b, m) = groups[-2:]
            if b - a >= (n + m) / 2 * _APART_MM:
                break
            groups[-2:] = [[(n * a + m * b) / (n + m), n + m]]
    return [
        middle + (k - (count - 1) / 2) * _APART_MM
        for middle, count in groups
        for k in range(int(count))
    ]
