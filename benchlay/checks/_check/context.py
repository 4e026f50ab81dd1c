"""What every check is given: the trace, the limits, and quantities worked out once for all."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from functools import cached_property
from math import nan
from typing import TYPE_CHECKING

import numpy as np

from benchlay.checks._check.bodies import Bodies
from benchlay.checks._check.limits import LineLimit
from benchlay.checks._check.meetings import Meetings
from benchlay.checks._check.power import accessible_w, peak_irradiance_w_m2
from benchlay.checks._check.routes import Routes
from benchlay.checks._check.words import place_words, wavelength_text
from benchlay.document.span import Span
from benchlay.findings import KeyPart
from benchlay.layout.layout import Layout
from benchlay.placing.placed import PlacedState
from benchlay.scene.tables import PARTS, SINKS, Flags, Floats, Ints
from benchlay.tracing import Trace
from benchlay.tracing.beams import FACE, SOLID
from benchlay.tracing.front import EMITTED, EVENTS, OUTSIDE

if TYPE_CHECKING:
    from benchlay.checks._check.gaps import Gaps


class Context:
    """A trace of all states with the limits it is held against; never changed.

    N beams of all states, K landings. Quantities are worked out when first asked for.
    `limits` are by state (number), source (name) and wavelength (nm), from `limits_of`.
    """

    def __init__(self, trace: Trace, limits: Mapping[tuple[int, str, float], LineLimit]) -> None:
        self.trace = trace
        self.limits = limits

    # ------------------------------------------------------------------ states

    def state(self, variant: int) -> PlacedState:
        """Return a state as placed."""
        return self.trace.placed.states[variant]

    def layout(self, variant: int) -> Layout:
        """Return the layout of a state."""
        return self.state(variant).layout

    def beams_of(self, variant: int) -> Ints:
        """Return the beams of a state, in the order of their making."""
        return self._by_variant[variant]

    @cached_property
    def _by_variant(self) -> tuple[Ints, ...]:
        return tuple(self.trace.of_variant(v) for v in range(len(self.trace.placed.states)))

    @cached_property
    def numbers(self) -> Ints:
        """The number of each beam within its own state's trace (N,)."""
        number = np.zeros(len(self.trace.beams.start.variant), dtype=np.int64)
        for rows in self._by_variant:
            number[rows] = np.arange(len(rows))
        return number

    @cached_property
    def routes(self) -> Routes:
        """What became of every route in every state."""
        return Routes(self.trace)

    @cached_property
    def meetings(self) -> Meetings:
        """Where working beams meet their optics, and what they lose on the way."""
        return Meetings(self.trace, self.routes)

    @cached_property
    def bodies(self) -> Bodies:
        """What stands on the bench, seen from above."""
        return Bodies(self.trace.scene)

    @cached_property
    def gaps(self) -> Gaps:
        """What the enclosure leaves open; loaded where there is one."""
        from benchlay.checks._check.gaps import Gaps

        return Gaps(self)

    # ------------------------------------------------------------------ limits

    @cached_property
    def _limit_tables(self) -> tuple[Floats, Floats]:
        """Accessible limit (W) and aperture (mm) by state, source and wavelength; NaN for none."""
        scene = self.trace.scene
        shape = (len(scene.variants), len(scene.sources), len(scene.wavelengths_nm))
        limit, aperture = np.full(shape, np.nan), np.full(shape, np.nan)
        number = {name: i for i, name in enumerate(scene.sources)}
        wave = {nm: i for i, nm in enumerate(scene.wavelengths_nm.tolist())}
        for (variant, source, nm), line in self.limits.items():
            if line.limit is not None and nm in wave:
                at = variant, number[source], wave[nm]
                limit[at], aperture[at] = line.limit.accessible_w, line.limit.aperture_mm
        return limit, aperture

    @cached_property
    def limit_w(self) -> Floats:
        """The accessible limit of each beam, W (N,); NaN where it could not be computed."""
        start = self.trace.beams.start
        limit: Floats = self._limit_tables[0][start.variant, start.source, start.wave]
        return limit

    @cached_property
    def aperture_mm(self) -> Floats:
        """The diameter of the limiting aperture of each beam (N,); NaN for none."""
        start = self.trace.beams.start
        aperture: Floats = self._limit_tables[1][start.variant, start.source, start.wave]
        return aperture

    @cached_property
    def outside(self) -> Flags:
        """Which beams run outside optics, where an eye could meet them (N,)."""
        outside: Flags = self.trace.beams.start.within == OUTSIDE
        return outside

    @cached_property
    def accessible_w(self) -> Floats:
        """The power an eye could meet of each beam, at the worst place of its leg, W (N,).

        Zero inside optics. Where the whole power is within the limit, or there is no limit,
        it is the whole power: no aperture passes more.
        """
        power = self.trace.beams.start.power
        accessible = np.where(self.outside, power, 0.0)
        with np.errstate(invalid="ignore"):
            rows = np.flatnonzero(accessible > self.limit_w)
        if len(rows):
            accessible[rows] = self.beyond_w(rows, np.zeros(len(rows)))
        return accessible

    def beyond_w(self, rows: Ints, start_mm: Floats) -> Floats:
        """Return the accessible power of beams from some way along their legs onwards, W."""
        return accessible_w(self.trace.beams, rows, self.aperture_mm[rows], start_mm)

    @cached_property
    def hazardous(self) -> Flags:
        """Which beams exceed their accessible limit outside optics (N,)."""
        with np.errstate(invalid="ignore"):
            over: Flags = self.accessible_w > self.limit_w * (1.0 + 1e-9)
        return over

    def unjudged(self, variant: int) -> dict[tuple[str, float], str]:
        """Return why lines that emit in a state have no limit, by source and wavelength."""
        rows = self.beams_of(variant)
        missing = rows[np.isnan(self.limit_w[rows])]
        start, scene = self.trace.beams.start, self.trace.scene
        pairs = zip(start.source[missing].tolist(), start.wave[missing].tolist(), strict=True)
        found = {}
        for source, wave in sorted(set(pairs)):
            name, nm = scene.sources[source], float(scene.wavelengths_nm[wave])
            line = self.limits.get((variant, name, nm), LineLimit(None, "no limit was computed"))
            found[name, nm] = line.reason or "no limit was computed"
        return found

    def peak_w_m2(self, rows: Ints) -> Floats:
        """Return the irradiance on the axis of beams where they end, across them, W/m²."""
        return peak_irradiance_w_m2(self.trace.beams, rows)

    def pulse_rate_hz(self, beam: int) -> float | None:
        """Return the rate of the pulses that a beam is made of; None for continuous light."""
        variant = int(self.trace.beams.start.variant[beam])
        lines = self.state(variant).sources[self.source_of(beam)].source.lines
        own = [line for line in lines if line.wavelength_nm == self.wavelength_nm(beam)]
        pulses = [line.pulse for line in own or lines if line.pulse is not None]
        return pulses[0].rate_hz if pulses else None

    # ------------------------------------------------------------------ beams in words

    def source_of(self, beam: int) -> str:
        """Return the name of the source of a beam."""
        return self.trace.scene.sources[int(self.trace.beams.start.source[beam])]

    def wavelength_nm(self, beam: int) -> float:
        """Return the wavelength of a beam."""
        return float(self.trace.scene.wavelengths_nm[self.trace.beams.start.wave[beam]])

    def face_text(self, face: int) -> str:
        """Return ``element.face`` of a face row."""
        f, scene = self.trace.scene.faces, self.trace.scene
        return f"{scene.elements[f.owner[face]]}.{scene.face_names[f.name[face]]}"

    def left_at(self, beam: int) -> str:
        """Return what a beam left: ``element.face``, or the name of a source, panel or body."""
        start = self.trace.beams.start
        if start.event[beam] == EMITTED:
            return self.source_of(beam)
        if start.face[beam] >= 0:
            return self.face_text(int(start.face[beam]))
        return self.left_name(beam)

    def left_name(self, beam: int) -> str:
        """Return the name of the element, source or panel that a beam left."""
        start, scene = self.trace.beams.start, self.trace.scene
        if start.event[beam] == EMITTED:
            return self.source_of(beam)
        if start.face[beam] >= 0:
            return scene.elements[int(scene.faces.owner[start.face[beam]])]
        name = int(scene.solids.name[start.body[beam]])
        return scene.names[name] if name >= 0 else "bench"

    def ancestors(self, beam: int) -> list[int]:
        """Return a beam and those it came from, the source's own last."""
        parent = self.trace.beams.start.parent
        chain = [beam]
        while parent[chain[-1]] >= 0:
            chain.append(int(parent[chain[-1]]))
        return chain

    def from_words(self, beam: int) -> str:
        """Say whose light a beam is and what it left last.

        The wavelength comes first, as in "633 nm from 'red', last at 'M1'".
        """
        light = f"{wavelength_text(self.wavelength_nm(beam))} from '{self.source_of(beam)}'"
        if self.trace.beams.start.event[beam] == EMITTED:
            return f"{light} itself"
        return f"{light}, last at '{self.left_name(beam)}',"

    def chain(self, beam: int) -> tuple[KeyPart, ...]:
        """Return source, wavelength and what was met in turn: the same from run to run."""
        start = self.trace.beams.start
        steps = [
            f"{self.left_at(b)} {EVENTS[start.event[b]]}"
            for b in reversed(self.ancestors(beam))
            if start.event[b] != EMITTED
        ]
        return (self.source_of(beam), self.wavelength_nm(beam), *steps)

    def astray_since(self, beam: int) -> int:
        """Return the first beam off every route among a beam and those it came from."""
        return int(self._astray[beam])

    @cached_property
    def _astray(self) -> Ints:
        """Of each stray the first beam of its line that follows no route, else itself (N,)."""
        start = self.trace.beams.start
        own = np.arange(len(start.node))
        parent = np.maximum(start.parent, 0)
        led = (start.node < 0) & (start.parent >= 0) & (start.node[parent] < 0)
        first = np.where(led, parent, own)
        # Each step doubles how far back is looked: the number of steps goes as its logarithm.
        while not np.array_equal(further := first[first], first):
            first = further
        return first

    def end_words(self, beam: int) -> str:
        """Say what the chief ray of a beam meets."""
        beams, scene = self.trace.beams, self.trace.scene
        row = int(beams.end_row[beam])
        if (opening := self.routes.handed_at(beam)) is not None:
            return place_words("handed-over", opening)
        if beams.end_kind[beam] == FACE:
            face = scene.face_names[scene.faces.name[row]]
            name = scene.elements[scene.faces.owner[row]]
            return f"'{name}'" if face == "front" else f"the {face} of '{name}'"
        if beams.end_kind[beam] == SOLID:
            s = scene.solids
            name = scene.names[s.name[row]] if s.name[row] >= 0 else None
            return place_words(SINKS[s.sink[row]], name, PARTS[s.part[row]])
        return place_words("escaped", None)

    def end_name(self, beam: int) -> str | None:
        """Return the name of the element, source, panel or lid that the chief ray meets."""
        beams, scene = self.trace.beams, self.trace.scene
        row = int(beams.end_row[beam])
        if beams.end_kind[beam] == FACE:
            return scene.elements[int(scene.faces.owner[row])]
        if beams.end_kind[beam] == SOLID and scene.solids.name[row] >= 0:
            return scene.names[int(scene.solids.name[row])]
        return None

    def end_at(self, beam: int) -> tuple[float, float, float]:
        """Return where a beam ends, mm."""
        return self.point(self.trace.beams.end[beam])

    @staticmethod
    def point(at: Floats | Sequence[float]) -> tuple[float, float, float]:
        """Return a place as plain numbers."""
        x, y, z = (float(value) for value in at)
        return x, y, z

    # ------------------------------------------------------------------ places in the file

    def span_of(self, name: str | None, variant: int = 0) -> Span | None:
        """Return where a source, element, panel or lid is written."""
        layout = self.layout(variant)
        if name is None:
            return None
        if name in layout.spans:
            return layout.spans[name]
        enclosure = layout.enclosure
        if enclosure is not None:
            for sheets in (enclosure.panels, enclosure.lids):
                if name in sheets:
                    return sheets.spans.get(name)
        return None

    def source_power_w(self, variant: int, source: str, wavelength_nm: float) -> float:
        """Return what a line emits in a state, W; NaN if there is no such line."""
        lines = self.state(variant).sources[source].source.lines
        return next((li.power_w for li in lines if li.wavelength_nm == wavelength_nm), nan)
