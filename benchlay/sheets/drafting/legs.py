"""Beams as legs of a plan: all working ones, and strays down to a share of the limit."""

from __future__ import annotations

import numpy as np

from benchlay.elements._kind import Acts
from benchlay.named import NamedTuple
from benchlay.scene.tables import SINKS, Floats, Ints
from benchlay.sheets.contents import Leg
from benchlay.sheets.layers import wavelength_words
from benchlay.tracing.beams import FACE, HANDED, NOTHING
from benchlay.tracing.front import OUTSIDE, SPILLED
from benchlay.tracing.trace import Trace
from benchlay.zones.limits import LimitTable
from benchlay.zones.swept import envelope_radii, through_aperture
from benchlay.zones.words import number, with_unit

# A tag says how much power there is; it stands until that has changed by more.
_CHANGE = 0.1
# Weaker strays than this share of the limit say little, and there are many.
WEAKEST = 0.1
_MOST_WEAK = 80
_MOST_TAGS = 24  # on strays: with more, a sheet says less
_MOST_FULL_TAGS = 6  # that also say where the light comes from
_TOGETHER_MM = 10.0  # strays that start and end nearer to each other than this share a tag
_NO_LENGTH_MM = 1e-6  # the faces of a thin optic stand in one place, give or take rounding
_SAMPLES = 13
_DEPTHS = 5  # at which a stray's power through the aperture is looked at
_OFF_CLEAR = 0.01  # of the light reaches a face's clear region: it ends on the rim


class DrawnLegs(NamedTuple):
    """The legs of a state, and what was left out of them."""

    legs: tuple[Leg, ...]
    working: tuple[tuple[str, float], ...]  # beams in the order of their names: name, nm
    strays: int  # beams above the limit
    tags: int  # on them: those that run together share one
    weak: int  # drawn without a tag
    left_out: int
    left_out_below: float  # share of the limit


def legs_of(trace: Trace, limits: LimitTable, variant: int, decimal: str) -> DrawnLegs:
    """Return what of the light in a state is drawn.

    Every leg of a working beam is drawn, save those of no length inside thin elements. A
    stray counts by the power that passes the limiting aperture, where that is most along its
    way.
    """
    s = trace.beams.start
    rows = trace.of_variant(variant)
    rows = rows[trace.beams.length[rows] > _NO_LENGTH_MM]
    working = rows[s.node[rows] >= 0]
    strays = rows[(s.node[rows] < 0) & (s.within[rows] == OUTSIDE) & (s.power[rows] > 0.0)]
    share = _share_of_limit(trace, limits, strays)
    weakest = _weakest(share)
    strong, weak = strays[share > 1.0], strays[(share <= 1.0) & (share >= weakest)]
    names = _Names(trace, decimal)
    legs = [names.leg(int(beam), names.working(int(beam)), stray=False) for beam in working]
    named = [(int(beam), *names.stray(int(beam))) for beam in sorted(strong.tolist())]
    tags = _tags(trace, named, decimal)
    legs += [names.leg(beam, tag, stray=True) for beam, tag in tags]
    legs += [
        names.leg(int(beam), ("", ""), stray=True)._replace(weak=True, radii_mm=()) for beam in weak
    ]
    return DrawnLegs(
        tuple(legs),
        tuple(names.begun),
        names.strays,
        sum(bool(words) for _, (_, words) in tags),
        len(weak),
        len(strays) - len(strong) - len(weak),
        weakest,
    )


def _tags(
    trace: Trace, named: list[tuple[int, str, str]], decimal: str
) -> list[tuple[int, tuple[str, str]]]:
    """Return the tag of each stray leg; of many, only the strongest, in fewer words."""
    power = trace.beams.start.power
    groups = _together(trace, [beam for beam, _, words in named if words])
    full = len(groups) <= _MOST_FULL_TAGS
    shown = {group[0]: len(group) - 1 for group in groups[:_MOST_TAGS]}
    out = []
    for beam, name, words in named:
        tag = words if full else f"{name} {with_unit(float(power[beam]), 'W', decimal=decimal)}"
        more = f", {shown[beam]} weaker" if shown.get(beam) else ""
        out.append((beam, (name, tag + more if beam in shown else "")))
    return out


def _together(trace: Trace, beams: list[int]) -> list[list[int]]:
    """Return strays that run side by side, either way, the strongest of each group first."""
    s, b = trace.beams.start, trace.beams
    groups: list[list[int]] = []
    for beam in sorted(beams, key=lambda one: (-s.power[one], one)):
        ends = s.position[beam], b.end[beam]
        for group in groups:
            first = s.position[group[0]], b.end[group[0]]
            if any(_near(ends, way) for way in (first, first[::-1])):
                group.append(beam)
                break
        else:
            groups.append([beam])
    return groups


def _near(one: tuple[Floats, ...], other: tuple[Floats, ...]) -> bool:
    return all(
        float(np.hypot.reduce(a - b)) < _TOGETHER_MM for a, b in zip(one, other, strict=True)
    )


def _share_of_limit(trace: Trace, limits: LimitTable, beams: Ints) -> Floats:
    allowed = limits.of(trace, beams)[0]
    depth = trace.beams.length[beams, None] * np.linspace(0.0, 1.0, _DEPTHS)
    most = through_aperture(trace, limits, beams, depth).max(axis=1, initial=0.0)
    share: Floats = np.divide(most, allowed, out=np.full_like(most, np.inf), where=allowed > 0.0)
    return share


def _weakest(share: Floats) -> float:
    """Return from which share on strays are drawn: the strongest of them, where many are weak."""
    weak = np.sort(share[(share <= 1.0) & (share >= WEAKEST)])
    return WEAKEST if len(weak) <= _MOST_WEAK else float(weak[-_MOST_WEAK])


class _Names:
    """Names of beams: a leg keeps its parent's, until the power has changed or another has it."""

    def __init__(self, trace: Trace, decimal: str) -> None:
        self.trace = trace
        self.decimal = decimal
        self.begun: list[tuple[str, float]] = []
        self.strays = 0
        self._named: dict[int, tuple[str, float]] = {}  # by beam: name, power at its tag
        self._continued: set[int] = set()  # beams whose name went on to a leg outside
        self._scattered = trace.diffuse()
        # An element may be called S1: no beam is then, in the field or on the sheet.
        owners = (*trace.scene.elements, *trace.scene.sources)
        self._taken = {name.upper() for name in owners}
        self._last = {"B": 0, "S": 0}

    def _new(self, letter: str) -> str:
        while True:
            self._last[letter] += 1
            name = f"{letter}{self._last[letter]}"
            if name not in self._taken:
                return name

    def leg(self, beam: int, tag: tuple[str, str], *, stray: bool) -> Leg:
        """Return a leg of a beam under its tag: name and words."""
        scattered = bool(self._scattered[beam])
        return _leg(self.trace, beam, tag, stray=stray, decimal=self.decimal, scattered=scattered)

    def working(self, beam: int) -> tuple[str, str]:
        """Return name and words of a leg; no words where its name was met before."""
        s = self.trace.beams.start
        if s.within[beam] != OUTSIDE:
            before = self._named.get(int(s.parent[beam]), ("", 0.0))
            self._named[beam] = before
            return before[0], ""
        kept = self._kept(beam)
        if kept is not None:
            return kept, ""
        name = self._new("B")
        nm = float(self.trace.scene.wavelengths_nm[s.wave[beam]])
        self.begun.append((name, nm))
        self._named[beam] = (name, float(s.power[beam]))
        return name, f"{name} {self._words(beam, first=s.parent[beam] < 0)}"

    def stray(self, beam: int) -> tuple[str, str]:
        """Return name and words of a stray leg."""
        kept = self._kept(beam)
        if kept is not None:
            return kept, ""
        s, scene = self.trace.beams.start, self.trace.scene
        self.strays += 1
        name = self._new("S")
        self._named[beam] = (name, float(s.power[beam]))
        owners = (*scene.elements, *scene.sources)
        owner = int(s.owner[beam])
        place = owners[owner] if owner < len(owners) else self._surroundings(beam)
        way = "beside" if s.event[beam] == SPILLED else "from"
        return name, f"{name} {way} {place}\n{self._words(beam, first=False)}"

    def _surroundings(self, beam: int) -> str:
        solid = int(self.trace.beams.start.body[beam])
        name = -1 if solid < 0 else int(self.trace.scene.solids.name[solid])
        return "bench" if name < 0 else self.trace.scene.names[name]

    def _kept(self, beam: int) -> str | None:
        s = self.trace.beams.start
        line = self._line(beam)
        if not line:
            return None
        name, tagged = self._named[line[-1]]
        power = float(s.power[beam])
        taken = any(b in self._continued for b in line)
        if not name or taken or abs(power - tagged) > _CHANGE * tagged:
            return None
        self._continued.add(line[-1])
        self._named[beam] = (name, tagged)
        return name

    def _line(self, beam: int) -> list[int]:
        """Return the named beams back to the last leg outside an optic, that one last."""
        s = self.trace.beams.start
        at = int(s.parent[beam])
        stray = s.node[beam] < 0
        line: list[int] = []
        while at >= 0:
            if at in self._named and (s.node[at] < 0) == stray:
                line.append(at)
            if s.within[at] == OUTSIDE:
                return line if line and line[-1] == at else []
            at = int(s.parent[at])
        return []

    def _words(self, beam: int, *, first: bool) -> str:
        s, scene = self.trace.beams.start, self.trace.scene
        power = with_unit(float(s.power[beam]), "W", decimal=self.decimal)
        if self._scattered[beam]:  # how much of it goes that way nobody knows
            power = "scattered"
        several = len(scene.wavelengths_nm) > 1
        nm = wavelength_words(float(scene.wavelengths_nm[s.wave[beam]]), self.decimal)
        if first:
            return f"{scene.sources[s.source[beam]]} {nm} {power}"
        return f"{nm} {power}" if several else power


def _leg(
    trace: Trace,
    beam: int,
    tag: tuple[str, str],
    *,
    stray: bool,
    decimal: str,
    scattered: bool,
) -> Leg:
    s, b = trace.beams.start, trace.beams
    start, end = (tuple(map(float, p)) for p in (s.position[beam], b.end[beam]))
    depth = np.linspace(0.0, float(b.length[beam]), _SAMPLES)
    radii = envelope_radii(trace, beam, depth)
    inside = bool(s.within[beam] != OUTSIDE)
    pairs = zip(depth.tolist(), radii.tolist(), strict=True)
    ends = float(radii[0]), float(radii[-1])
    return Leg(
        tag[0],
        float(trace.scene.wavelengths_nm[s.wave[beam]]),
        (start[0], start[1], start[2]),
        (end[0], end[1], end[2]),
        stray,
        tag[1],
        _ends(trace, beam),
        () if inside else tuple(pairs),
        inside=inside,
        note=_note(trace, beam, tag[0], ends, decimal, scattered=scattered),
    )


def _note(
    trace: Trace,
    beam: int,
    name: str,
    radii_mm: tuple[float, float],
    decimal: str,
    *,
    scattered: bool,
) -> str:
    """Return what is said of a leg where the pointer rests on it."""
    s = trace.beams.start
    nm = wavelength_words(float(trace.scene.wavelengths_nm[s.wave[beam]]), decimal)
    if scattered:
        return f"{name or 'stray light'}, {nm}, scattered"
    power = with_unit(float(s.power[beam]), "W", decimal=decimal)
    first, last = (number(radius, 3, decimal) for radius in radii_mm)
    return f"{name or 'stray light'}, {nm}, {power}, 1/e² radius {first} to {last} mm"


def _ends(trace: Trace, beam: int) -> str:
    """Return the sink that a leg ends in, or optic."""
    b, scene = trace.beams, trace.scene
    kind, row = int(b.end_kind[beam]), int(b.end_row[beam])
    if kind == NOTHING:
        return "escaped"
    if kind == HANDED:
        return "handed-over"
    if kind != FACE:
        return SINKS[int(scene.solids.sink[row])]
    if scene.faces.acts[row] == Acts.OPAQUE:
        return SINKS[int(scene.faces.sink[row])]
    arrived = float(b.end_core[beam])
    if arrived < _OFF_CLEAR * float(b.start.power[beam]):
        return SINKS[int(scene.faces.beside[row])]
    return "optic"


def limit_words(limit_w: float, aperture_mm: float, time_s: float, decimal: str) -> str:
    """Return an accessible limit as it stands in tables and notes."""
    if not limit_w > 0.0:
        return "no limit known"
    power = with_unit(limit_w, "W", decimal=decimal)
    return f"{power} through Ø{number(aperture_mm, 3, decimal)} mm, {number(time_s, 3, decimal)} s"
