"""What is written on the view of a blank: bends, openings with their sizes, holes by name."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from benchlay.making.blank import Bend, Blank, RoundHole
from benchlay.making.grouping import Group, grouped
from benchlay.sheets.lettering import SMALL_MM, width_mm
from benchlay.sheets.primitives import Across, Line, Point, Primitive, Text, Up, figure
from benchlay.sheets.shop.numbering import numbered

MOST_BESIDE = 12  # holes; more of them stand in a table
_CLEAR_MM = 1.0  # of lettering, from lines


def tags(blank: Blank, scale: int, decimal: str) -> Iterator[Primitive]:
    """Name bends and openings, and the first and last hole of each row where they are listed."""
    inside = [*_bend_labels(blank, scale, decimal)]
    beside: list[tuple[RoundHole, str]] = []
    if len(blank.holes) > MOST_BESIDE:
        beside += [pair for group in named(blank) for pair in ends(*group)]
    for hole in blank.rounds:
        beside.append((hole, f"{hole.use} Ø{figure(hole.diameter_mm, 2, decimal)}"))
    for use, box in blank.named:
        wide, tall = box.right - box.left, box.high - box.low
        words = f"{use} {figure(wide, 2, decimal)} x {figure(tall, 2, decimal)}"
        x, y = (box.left + box.right) / 2, (box.low + box.high) / 2
        room = (width_mm(words, SMALL_MM) + 2.0 * _CLEAR_MM, SMALL_MM + 2.0 * _CLEAR_MM)
        if wide >= room[0] * scale and tall >= room[1] * scale:
            inside.append(Text("TAGS", (x, y), words, SMALL_MM, Across.CENTRE, Up.MIDDLE))
        else:
            beside.append((RoundHole((x, box.high), 0.0, use), words))
    yield from inside
    (width, height), off = blank.flat_mm, _CLEAR_MM * scale
    yield from numbered(
        [hole for hole, _ in beside],
        ((off, off), (width - off, height - off)),
        scale,
        [words for _, words in beside],
        lines=_lines(blank, scale),
        lettering=inside,
    )


def _lines(blank: Blank, scale: int) -> Iterator[Sequence[Point]]:
    """Give the lines that no name may stand on."""
    yield from ((*loop, loop[0]) for loop in (blank.outer, *blank.inner))
    yield from ((bend.start, bend.end) for bend in blank.bends)
    for hole in (*blank.rounds, *blank.holes):
        yield from ((line.start, line.end) for line in cross(hole, scale))


def _bend_labels(blank: Blank, scale: int, decimal: str) -> Iterator[Text]:
    for bend in blank.bends:
        yield _bend_label(bend, scale, decimal)


def _bend_label(bend: Bend, scale: int, decimal: str) -> Text:
    words = f"{'UP' if bend.up else 'DOWN'} 90° R{figure(bend.radius_mm, 2, decimal)}"
    (ax, ay), (bx, by) = bend.start, bend.end
    x, y = (ax + bx) / 2, (ay + by) / 2
    if ax != bx:
        return Text("TAGS", (x, y + 6.0 * scale), words, SMALL_MM, Across.CENTRE)
    inward = 12.0 * scale * (-1.0 if x > 100.0 * scale else 1.0)
    return Text("TAGS", (x + inward, y), words, SMALL_MM, Across.CENTRE, Up.MIDDLE, 90.0)


def cross(hole: RoundHole, scale: int) -> list[Line]:
    """Return the axes of a hole."""
    (x, y), reach = hole.centre, hole.diameter_mm / 2 + 1.5 * scale
    return [
        Line("AXIS", (x - reach, y), (x + reach, y)),
        Line("AXIS", (x, y - reach), (x, y + reach)),
    ]


def named(blank: Blank) -> list[tuple[str, Group]]:
    """Return the groups of holes with their letters: A, B, ..., Z, AA, ..."""
    return [(_letter(n), group) for n, group in enumerate(grouped(blank.holes))]


def _letter(n: int) -> str:
    return (_letter(n // 26 - 1) if n >= 26 else "") + chr(ord("A") + n % 26)  # noqa: PLR2004


def ends(letter: str, group: Group) -> list[tuple[RoundHole, str]]:
    """Return the holes of a group with what is written beside them: at its ends only."""
    last = len(group.holes) - 1
    return [
        (hole, f"{letter}{n + 1}" if n in (0, last) else "") for n, hole in enumerate(group.holes)
    ]
