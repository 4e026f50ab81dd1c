"""How panels meet at their ends, so that what is cut fits together.

A panel's line is its inner face and its thickness lies outside, so two panels cut to the length
of their lines would meet in an edge only and leave a slit. At a right-angled corner:

* of two butt ends, the panel that ends there runs on over the edge of the one that starts;
* a folded end lies with its flange on the neighbour, which runs on to cover it, and which
  gets the flange's fixing holes;
* flanges along the lower edge would run into each other inside: that of the panel which ends
  there gives way.

The same rule for every corner keeps opposite panels alike. Other angles are left as drawn, and
the sheet says so.
"""

from __future__ import annotations

from math import atan2, degrees, dist

from benchlay.layout.enclosure import Panel
from benchlay.making.folding import Folded
from benchlay.named import NamedTuple

_SAME_MM = 1e-3  # a shop cannot tell them apart
_SQUARE = 1e-6  # sine of the angle off; under 2 um over the length of the longest panel
CLEAR_MM = 1.0  # between flanges that meet: common practice for sheet of some mm


class Sheet(NamedTuple):
    """What a neighbour needs to know of a panel."""

    name: str
    panel: Panel
    thickness_mm: float
    heights_mm: tuple[float, float]
    foot: Folded | None  # the flange along its lower edge, and of its folded ends

    def folded(self, ends: bool) -> bool:
        """Whether its start, or its end, is folded."""
        e = self.panel.ends
        return self.foot is not None and e is not None and (e.end if ends else e.start) == "folded"


class Meeting(NamedTuple):
    """What a panel's end does on account of its neighbour."""

    reach_mm: float = 0.0  # how far the sheet runs on beyond its line; negative: stops short
    foot_mm: float | None = None  # how far from the line's end its lower flange ends
    neighbour: Sheet | None = None  # whose folded end lies on this panel
    holes_mm: float | None = None  # where its fixings go through, from the line's end inwards
    lacks: str = ""
    remark: str = ""


def meeting(own: Sheet, others: list[Sheet], ends: bool) -> Meeting:
    """Return how a panel meets its neighbour at its end, or at its start."""
    found = _at(own, others, ends)
    if not found:
        return Meeting()
    word = "end" if ends else "start"
    if len(found) > 1 or found[0][1] == ends:
        names = ", ".join(sheet.name for sheet, _ in found)
        return Meeting(remark=f"its {word} meets {names} in a way whose fit is not worked out")
    other = found[0][0]
    (ax, ay), (bx, by) = _along(own.panel), _along(other.panel)
    if not ends:
        ax, ay, bx, by = bx, by, ax, ay
    sine, cosine = ax * by - ay * bx, ax * bx + ay * by
    if abs(sine) < _SQUARE and cosine > 0.0:
        return Meeting()  # in one line: edge to edge
    if abs(cosine) > _SQUARE:
        angle = degrees(atan2(sine, cosine))
        words = f"its {word} meets {other.name} at {angle:.4g} deg: cut square, fit not worked out"
        return Meeting(remark=words)
    return _square(own, other, left=sine > 0.0, ends=ends)


def _at(own: Sheet, others: list[Sheet], ends: bool) -> list[tuple[Sheet, bool]]:
    """Return whose start (False) or end (True) lies where a panel's end or start lies."""
    place = own.panel.to_mm if ends else own.panel.from_mm
    low, high = own.heights_mm
    return [
        (other, theirs)
        for other in others
        if other.name != own.name and other.heights_mm[0] < high and other.heights_mm[1] > low
        for theirs in (False, True)
        if dist(place, other.panel.to_mm if theirs else other.panel.from_mm) < _SAME_MM
    ]


def _along(panel: Panel) -> tuple[float, float]:
    x, y = panel.outward
    return -y, x


def _square(own: Sheet, other: Sheet, *, left: bool, ends: bool) -> Meeting:
    mine, theirs = own.folded(ends), other.folded(not ends)
    lacks = ""
    if mine and theirs:
        lacks = f"which end is folded where it meets {other.name}: both are"
    laid = other.foot if theirs and not mine else None
    return Meeting(
        reach_mm=_reach(own, other, left=left, ends=ends),
        foot_mm=_foot(own, other, left=left, ends=ends),
        neighbour=other if laid else None,
        holes_mm=None if laid is None else _holes(other, laid, left),
        lacks=lacks,
    )


def _reach(own: Sheet, other: Sheet, *, left: bool, ends: bool) -> float:
    mine, theirs = own.folded(ends), other.folded(not ends)
    if mine == theirs:
        if left:
            return other.thickness_mm if ends else 0.0
        return 0.0 if ends else -other.thickness_mm
    if mine:
        outward = own.foot is not None and own.foot.sense == "out"
        return -other.thickness_mm if outward and not left else 0.0
    inward = other.foot is None or other.foot.sense == "in"
    if left:
        return other.thickness_mm if inward or other.foot is None else other.foot.flange_mm
    return -other.thickness_mm if inward else 0.0


def _holes(other: Sheet, laid: Folded, left: bool) -> float | None:
    """Return where the fixings of a neighbour's flange come through, from the corner inwards."""
    fix = other.panel.fix
    if fix is None:
        return None
    if laid.sense == "in":
        return laid.flange_mm - other.thickness_mm - fix.inset_mm if left else None
    along = laid.flange_mm - fix.inset_mm
    return -along if left else along


def _foot(own: Sheet, other: Sheet, *, left: bool, ends: bool) -> float | None:
    """Return how far from the corner the lower flange keeps; None where nothing is in its way."""
    if own.foot is None:
        return None
    inside = left == (own.foot.sense == "in")
    if not inside:
        return CLEAR_MM if left else None
    same = other.foot is not None and other.foot.sense == own.foot.sense
    if not ends or other.foot is None or not same:
        return CLEAR_MM
    over = other.thickness_mm if own.foot.sense == "in" else 0.0
    return other.foot.flange_mm - over + CLEAR_MM
