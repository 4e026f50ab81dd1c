"""Gaps of the enclosure in one state, numbered, and where in beams a mirror would reach them."""

from __future__ import annotations

from typing import TypeAlias

from benchlay.checks import Context
from benchlay.coverage.enclosed import Enclosed
from benchlay.coverage.gaps import OPENING, SHEET, Gap, windows
from benchlay.coverage.places import Astray, sees
from benchlay.named import NamedTuple
from benchlay.sheets.contents import GapMark
from benchlay.sheets.layers import wavelength_words
from benchlay.sheets.primitives import Point
from benchlay.zones.words import number, with_unit

_Key: TypeAlias = tuple[str | None, str]
_Part: TypeAlias = tuple[Point, Point]


class Opened(NamedTuple):
    """What a plan shows of the gaps."""

    marks: tuple[GapMark, ...] = ()
    stretches: tuple[tuple[Point, Point], ...] = ()
    notes: tuple[str, ...] = ()


def opened(context: Context, variant: int, decimal: str) -> Opened:
    """Return the gaps that light could be sent or thrown to, and from which stretches of beams."""
    enclosed, gaps = context.gaps.of(variant)
    if enclosed is None:
        return Opened()
    places = context.gaps.astray(variant)
    thrown = _thrown(context, variant)
    marks: list[GapMark] = []
    words, told = [], set()
    # Openings that glass fills are gaps for what is thrown only.
    glazed = [one.gap for one in context.gaps.thrown(variant) if one.glass is not None]
    for gap in [*gaps, *glazed]:
        within = gap in gaps
        place = next((p for p in places if within and sees(enclosed, gap, p.at)), None)
        if gap.key in told or (place is None and gap.key not in thrown):
            continue
        told.add(gap.key)
        name = f"G{len(told)}"
        marks.append(_mark(name, gap, enclosed, decimal))
        light = f", {_light(context, place, decimal)}" if place is not None else ""
        words.append(f"{name} {_said(gap, decimal)}{light}")
    parts = dict.fromkeys(part for found in thrown.values() for part in found)
    notes = [f"Gaps that misdirected light could reach: {'; '.join(words)}."] if words else []
    if parts:
        notes.append(
            "Hatched along beams: where one flat mirror could throw light of class 3B or 4 out."
        )
    return Opened(tuple(marks), tuple(parts), tuple(notes))


def _said(gap: Gap, decimal: str) -> str:
    if gap.roofless:
        return "no lid"
    return f"{gap.through} ({number(gap.width_mm, 3, decimal)} mm)"


def _light(context: Context, place: Astray, decimal: str) -> str:
    power = with_unit(place.power_w, "W", decimal=decimal)
    light = wavelength_words(context.wavelength_nm(place.beam), decimal)
    return f"{power} of {light} from {place.name}"


def _mark(name: str, gap: Gap, enclosed: Enclosed, decimal: str) -> GapMark:
    label = f"{name} no lid" if gap.roofless else f"{name} {number(gap.width_mm, 3, decimal)} mm"
    if gap.roofless or (gap.kind == SHEET and gap.through.startswith("lid ")):
        return GapMark(name, label, gap.at[:2])
    side = enclosed.line.sides[gap.sides[0]]
    ends = (side.start, side.end)
    if gap.kind == OPENING:
        (window,) = (w for w in windows(enclosed, gap.sheets[0]) if w.name == gap.through)
        near, far = (window.place((along, 0.0))[:2] for along in window.box[:2])
        ends = (near, far)
    return GapMark(name, label, gap.at[:2], ends)


def _thrown(context: Context, variant: int) -> dict[_Key, list[_Part]]:
    """Return by gap the stretches of strong beams, in plan, that see it."""
    found: dict[_Key, list[_Part]] = {}
    for thrown in context.gaps.thrown(variant):
        for one, start, end in context.gaps.stretches(variant, thrown):
            part = (one.leg.at(start)[:2], one.leg.at(end)[:2])
            found.setdefault(thrown.gap.key, []).append(part)
    return found
