"""The blank of one panel: outline, openings, holes and bends, laid flat and seen from outside."""

from __future__ import annotations

from collections.abc import Iterator

from benchlay.geometry.polygon import Point
from benchlay.layout.enclosure import Fix, Opening
from benchlay.making.blank import Bend, Blank, Draft, Folding, RoundHole
from benchlay.making.clearances import circles_meet, in_opening, lies_in, meets, round_box
from benchlay.making.corners import Meeting, Sheet, meeting
from benchlay.making.folding import Folded
from benchlay.making.rectilinear import Rectangle, outlines
from benchlay.making.rows import row
from benchlay.named import NamedTuple

FIX = "fixing"
_ROUNDING_MM = 1e-6  # as for openings in the layout


class _Flat(NamedTuple):
    """Where a panel's places lie on its blank: along from its start, up from its lower edge."""

    own: Sheet
    start: Meeting
    end: Meeting

    @property
    def formed(self) -> Point:
        low, high = self.own.heights_mm
        return self.own.panel.length_mm + self.start.reach_mm + self.end.reach_mm, high - low

    def flange(self, ends: bool) -> Folded | None:
        """Return the flange of its end, or of its start."""
        return self.own.foot if self.own.folded(ends) else None

    @property
    def shift(self) -> Point:
        """How much farther places lie from the blank's corner than from the folded sheet's."""
        at_start, foot = self.flange(False), self.own.foot
        return (at_start.shift_mm if at_start else 0.0, foot.shift_mm if foot else 0.0)

    @property
    def size(self) -> Point:
        """The extent of the blank."""
        at_end = self.flange(True)
        width = self.formed[0] + self.shift[0] + (at_end.shift_mm if at_end else 0.0)
        return width, self.formed[1] + self.shift[1]

    def x(self, along_mm: float) -> float:
        """From a distance along the panel's line."""
        return along_mm + self.start.reach_mm + self.shift[0]

    def y(self, height_mm: float) -> float:
        """From a height above the bench."""
        return height_mm - self.own.heights_mm[0] + self.shift[1]

    @property
    def straight(self) -> Rectangle:
        """The flat part of the sheet between its bends, on the blank."""
        first, last, foot = self.flange(False), self.flange(True), self.own.foot
        return Rectangle(
            first.zone_end_mm if first else 0.0,
            foot.zone_end_mm if foot else 0.0,
            self.size[0] - (last.zone_end_mm if last else 0.0),
            self.size[1],
        )


def panel_draft(own: Sheet, others: list[Sheet]) -> Draft:
    """Return the blank of a panel.

    Parameters
    ----------
    own : Sheet
    others : list of Sheet
        All panels of the enclosure; those that it meets decide how its ends are cut.
    """
    flat = _Flat(own, meeting(own, others, False), meeting(own, others, True))
    body = _body(flat)
    named, rounds, troubles = _openings(flat)
    boxes = list(named.values())
    outer, inner = outlines(body, boxes)
    lacks = [m.lacks for m in (flat.start, flat.end) if m.lacks]
    lacks += _unfolded(own)
    corners = [corner for loop in (*outer, *inner) for corner in loop]
    if len(outer) != 1 or len(set(corners)) < len(corners):
        lacks.append("openings that leave the sheet in one piece")
    holes = list(_holes(flat))
    kept = [hole for hole in holes if not in_opening(hole, boxes, rounds)]
    remarks = [m.remark for m in (flat.start, flat.end) if m.remark]
    if len(kept) < len(holes):
        remarks.append(f"{len(holes) - len(kept)} of its fixing holes left out: in an opening")
    bends = tuple(_bends(flat, boxes))
    near = [hole for hole in kept if any(_near(hole, bend, own.thickness_mm) for bend in bends)]
    if near:
        remarks.append(
            f"{len(near)} holes are nearer to a bend than 2.5 t + R: drill them after bending"
        )
    foot = own.foot
    blank = Blank(
        outer=max(outer, key=_extent, default=()),
        inner=inner,
        rounds=rounds,
        holes=tuple(sorted(kept)),
        bends=bends,
        flat_mm=flat.size,
        formed_mm=flat.formed,
        folding=foot
        and Folding(foot.allowance_mm, foot.k, foot.radius_mm, foot.flange_mm, foot.sense),
        named=tuple(named.items()),
    )
    return Draft(blank, (*lacks, *troubles), tuple(remarks))


def _near(hole: RoundHole, bend: Bend, thickness_mm: float) -> bool:
    """Whether bending would draw a hole out of round (common practice: 2.5 t + R from its edge)."""
    axis = 0 if bend.start[0] == bend.end[0] else 1
    off = abs(hole.centre[axis] - bend.start[axis]) - hole.diameter_mm / 2
    return off < 2.5 * thickness_mm + bend.radius_mm - _ROUNDING_MM


def _unfolded(own: Sheet) -> list[str]:
    """Say which folds were asked for and cannot be made."""
    fold, ends = own.panel.fold, own.panel.ends
    if own.foot is not None:
        return []
    if fold is not None:
        least = 2 * (fold.radius_mm + own.thickness_mm)
        return [f"a flange of at least {least:g} (it is {fold.flange_mm:g}, drawn unfolded)"]
    if ends is not None and "folded" in (ends.start, ends.end):
        return ["the flange of its folded end ('fold'; drawn unfolded)"]
    return []


def _extent(outline: tuple[Point, ...]) -> float:
    xs, ys = zip(*outline, strict=True)
    return float((max(xs) - min(xs)) * (max(ys) - min(ys)))


def _foot_span(flat: _Flat) -> tuple[float, float]:
    """Return where the lower flange starts and ends, on the blank."""
    straight, thick = flat.straight, flat.own.thickness_mm
    left, right = straight.left, straight.right
    if flat.flange(False):
        left += thick  # relief of the corner, as wide as the sheet is thick
    if flat.flange(True):
        right -= thick
    if flat.start.foot_mm is not None:
        left = max(left, flat.x(flat.start.foot_mm))
    if flat.end.foot_mm is not None:
        right = min(right, flat.x(flat.own.panel.length_mm - flat.end.foot_mm))
    return left, right


def _body(flat: _Flat) -> list[Rectangle]:
    """Return the rectangles that make up the blank before anything is cut out of it."""
    straight, (width, height) = flat.straight, flat.size
    foot, thick = flat.own.foot, flat.own.thickness_mm
    parts = [straight]
    above = 0.0
    if foot:
        left, right = _foot_span(flat)
        above = straight.low + thick
        parts.append(Rectangle(left, 0.0, right, straight.low))
        # Beside the flange the sheet goes down to the bench: no light gets out below.
        low = flat.y(flat.own.heights_mm[0])
        if not flat.flange(False):
            parts.append(Rectangle(0.0, low, left - thick, straight.low))
        if not flat.flange(True):
            parts.append(Rectangle(right + thick, low, width, straight.low))
    if flat.flange(False):
        parts.append(Rectangle(0.0, above, straight.left, height))
    if flat.flange(True):
        parts.append(Rectangle(straight.right, above, width, height))
    return parts


def _openings(flat: _Flat) -> tuple[dict[str, Rectangle], tuple[RoundHole, ...], list[str]]:
    """Return rectangles by name and round openings on the blank, and what is wrong with them."""
    boxes: dict[str, Rectangle] = {}
    rounds: list[RoundHole] = []
    troubles = []
    straight = flat.straight
    for name, opening in sorted(flat.own.panel.openings.items()):
        box = _box(flat, opening)
        if opening.round:
            near = [r for r in rounds if circles_meet(r, box)]
            if near or not lies_in(box, straight) or any(meets(box, b) for b in boxes.values()):
                troubles.append(f"a place for opening {name} clear of bends and other openings")
                continue
            centre = ((box.left + box.right) / 2, (box.low + box.high) / 2)
            rounds.append(RoundHole(centre, opening.diameter_mm or 0.0, name))
            continue
        if any(meets(Rectangle(*round_box(r)), box) for r in rounds):
            troubles.append(f"a place for opening {name} clear of bends and other openings")
            continue
        if box.left < straight.left or box.right > straight.right:
            troubles.append(f"a place for opening {name} clear of the bend at the panel's end")
        if 0.0 < box.low < straight.low - _ROUNDING_MM:
            troubles.append(f"a place for opening {name} clear of the bend at the lower edge")
        boxes[name] = box
    return boxes, tuple(rounds), troubles


def _box(flat: _Flat, opening: Opening) -> Rectangle:
    """Return an opening's box on the blank; one down to the lower edge goes through the flange."""
    start, end, low, high = opening.box_mm()
    bottom = flat.y(low)
    if low <= flat.own.heights_mm[0] + _ROUNDING_MM:
        bottom = 0.0
    left, right, top = flat.x(start), flat.x(end), flat.y(high)
    if start <= _ROUNDING_MM and flat.start.reach_mm <= 0.0 and not flat.flange(False):
        left = 0.0
    if high >= flat.own.heights_mm[1] - _ROUNDING_MM:
        top = flat.size[1]
    return Rectangle(left, bottom, right, top)


def _holes(flat: _Flat) -> Iterator[RoundHole]:
    """Yield the fixing holes: its own, and those for the folded ends of neighbours."""
    own = flat.own
    if own.panel.fix is not None:
        yield from _own_holes(flat, own.panel.fix)
    for ends, meet in ((False, flat.start), (True, flat.end)):
        if meet.neighbour is None or meet.holes_mm is None:
            continue
        theirs = meet.neighbour.panel.fix
        x = flat.x(own.panel.length_mm - meet.holes_mm if ends else meet.holes_mm)
        for height in end_heights(meet.neighbour):
            if theirs and own.heights_mm[0] < height < own.heights_mm[1]:
                yield RoundHole((x, flat.y(height)), theirs.hole_mm, f"to {meet.neighbour.name}")


def _own_holes(flat: _Flat, fix: Fix) -> Iterator[RoundHole]:
    """Yield the holes along the lower edge and along folded ends."""
    own, length = flat.own, flat.own.panel.length_mm
    left, right = _foot_span(flat) if own.foot else (flat.x(0.0), flat.x(length))
    for along in row(0.0, length, fix.pitch_mm, fix.inset_mm):
        x = flat.x(along)
        if left + fix.inset_mm - _ROUNDING_MM <= x <= right - fix.inset_mm + _ROUNDING_MM:
            yield RoundHole((x, fix.inset_mm), fix.hole_mm, FIX)
    for ends in (False, True):
        if own.folded(ends):
            x = flat.size[0] - fix.inset_mm if ends else fix.inset_mm
            for height in end_heights(own):
                yield RoundHole((x, flat.y(height)), fix.hole_mm, FIX)


def end_heights(sheet: Sheet) -> list[float]:
    """Return at what heights above the bench a folded end has its fixing holes."""
    fix, foot = sheet.panel.fix, sheet.foot
    if fix is None or foot is None:
        return []
    low, high = sheet.heights_mm
    return row(low + foot.setback_mm + foot.thickness_mm, high, fix.pitch_mm, fix.inset_mm)


def _bends(flat: _Flat, boxes: list[Rectangle]) -> Iterator[Bend]:
    """Yield the bends' middle lines, each only where there is sheet."""
    foot = flat.own.foot
    if foot is None:
        return
    up, radius = foot.sense == "out", foot.radius_mm
    left, right = _foot_span(flat)
    cuts = sorted((b.left, b.right) for b in boxes if b.low <= 0.0)
    for start, end in _between(left, right, cuts):
        yield Bend((start, foot.line_mm), (end, foot.line_mm), up, radius)
    low, high = flat.straight.low + flat.own.thickness_mm, flat.size[1]
    for ends in (False, True):
        if flat.own.folded(ends):
            x = flat.size[0] - foot.line_mm if ends else foot.line_mm
            yield Bend((x, low), (x, high), up, radius)


def _between(
    left: float, right: float, cuts: list[tuple[float, float]]
) -> Iterator[tuple[float, float]]:
    here = left
    for start, end in cuts:
        if start > here:
            yield here, min(start, right)
        here = max(here, end)
    if here < right:
        yield here, right
