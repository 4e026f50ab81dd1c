"""Builds a layout, traces it, and reads out beams and sinks for comparison with a referee."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from benchlay.document.problems import Problems
from benchlay.layout import read_layout
from benchlay.placing import place
from benchlay.scene.tables import SINKS
from benchlay.tracing import trace
from benchlay.tracing.front import EVENTS


class Compared(NamedTuple):
    """A figure of the program beside the referee's, and by how much they may differ."""

    what: str
    got: float
    expected: float
    within: float

    @property
    def holds(self):
        return bool(abs(self.got - self.expected) <= self.within)


def power(what, got, expected, relative=1e-6):
    """Compare powers to 1e-6 of what is expected (1e-15 W where nothing is)."""
    return Compared(what, float(got), float(expected), relative * abs(expected) + 1e-15)


def below(what, got, limit):
    """Ask for a power between 0 and a limit."""
    return Compared(what, float(got), limit / 2, limit / 2)


def length(what, got, expected, within=1e-9):
    """Compare lengths in mm, angles in rad or components of unit vectors."""
    return Compared(what, float(got), float(expected), within)


def vectors(what, got, expected, within=1e-9):
    """Compare vectors, component by component."""
    got, expected = np.ravel(got), np.ravel(expected)
    assert got.shape == expected.shape
    for i, (a, b) in enumerate(zip(got, expected, strict=True)):
        yield Compared(f"{what}[{i}]", float(a), float(b), within)


class Seen(NamedTuple):
    """One beam of a trace."""

    number: int
    parent: int
    source: str
    wavelength_nm: float
    left: str  # what it left, "W.front", or "laser"
    event: str
    met: str | None  # the element of the face or solid it ends on
    start: np.ndarray
    end: np.ndarray
    k: np.ndarray
    power: float
    power_at_end: float
    core: float
    field: np.ndarray  # (3, 3) coherency at the start
    field_at_end: np.ndarray
    moments: np.ndarray  # (10,) at the start
    moments_at_end: np.ndarray
    axes: np.ndarray  # (2, 3) e1, e2
    index: float
    path: float  # optical, at the start
    kept: float


class Bench:
    """A traced layout."""

    def __init__(self, text, *, floor=1e-13):
        source, problems = read_layout(text, "scene.yaml")
        assert source is not None, [str(p) for p in problems.sorted()]
        problems = Problems()
        placed = place(source, problems)
        assert placed is not None, [str(p) for p in problems.sorted()]
        waves = placed.wavelengths_nm
        self.placed = placed
        self.trace = trace(placed, dict.fromkeys(waves, floor))
        self.states = [state.name for state in placed.states]

    def _number(self, state):
        return 0 if state is None else self.states.index(state)

    def emitted(self, state=None):
        """Power of all sources in a state, W."""
        return sum(self.trace.emitted_w(self._number(state)).values())

    def sinks(self, state=None, wavelength_nm=None):
        """Power by (sink, name), W."""
        ledger, scene = self.trace.ledger, self.trace.scene
        start = self.trace.beams.start
        found: dict[tuple[str, str | None], float] = {}
        for row in self.trace.landings_of(self._number(state)):
            wave = scene.wavelengths_nm[start.wave[ledger.beam[row]]]
            if wavelength_nm is not None and wave != wavelength_nm:
                continue
            name = ledger.name[row]
            key = (SINKS[ledger.sink[row]], scene.names[name] if name >= 0 else None)
            found[key] = found.get(key, 0.0) + float(ledger.power[row])
        return found

    def sink(self, kind, name=None, **which):
        """Power in one sink; of all names where `name` is "*"."""
        found = self.sinks(**which)
        if name == "*":
            return sum(value for (sink, _), value in found.items() if sink == kind)
        return found.get((kind, name), 0.0)

    def beams(self, state=None):
        """All beams of a state."""
        return [self._seen(i) for i in self.trace.of_variant(self._number(state))]

    def from_(self, left, event=None, state=None):
        """Beams that left a face (`W.front`) or source, strongest first."""
        found = [
            beam for beam in self.beams(state) if beam.left == left and event in (None, beam.event)
        ]
        return sorted(found, key=lambda beam: -beam.power)

    def outside(self, element, state=None):
        """Beams that leave an element into the open, by face, in the order of their making."""
        return [
            beam
            for beam in self.beams(state)
            if beam.left.startswith(element + ".")
            and self.trace.beams.start.within[beam.number] < 0
        ]

    def reaching(self, element, state=None):
        """Beams that end on an element, strongest first."""
        found = [beam for beam in self.beams(state) if beam.met == element]
        return sorted(found, key=lambda beam: -beam.power_at_end)

    def _seen(self, i):
        b, scene = self.trace.beams, self.trace.scene
        s = b.start
        e1 = s.axis[i]
        axes = np.stack((e1, np.cross(s.direction[i], e1)))
        return Seen(
            int(i),
            int(s.parent[i]),
            scene.sources[s.source[i]],
            float(scene.wavelengths_nm[s.wave[i]]),
            self._left(i),
            EVENTS[s.event[i]],
            self._met(i),
            s.position[i],
            b.end[i],
            s.direction[i],
            float(s.coherency[0, i] + s.coherency[1, i]),
            float(b.end_coherency[0, i] + b.end_coherency[1, i]),
            float(b.end_core[i]),
            _tensor(s.coherency[:, i], axes),
            _tensor(b.end_coherency[:, i], axes),
            s.moments[:, i],
            b.end_moments[:, i],
            axes,
            float(s.index[i]),
            float(s.optical_path[i]),
            float(b.end_kept[i]),
        )

    def _face(self, row):
        scene = self.trace.scene
        owner = scene.elements[scene.faces.owner[row]]
        return f"{owner}.{scene.face_names[scene.faces.name[row]]}"

    def _left(self, i):
        start, scene = self.trace.beams.start, self.trace.scene
        if start.face[i] >= 0:
            return self._face(start.face[i])
        return (*scene.elements, *scene.sources, "body")[start.owner[i]]

    def _met(self, i):
        b, scene = self.trace.beams, self.trace.scene
        if b.end_kind[i] == 1:
            return self._face(b.end_row[i]).split(".")[0]
        if b.end_kind[i] == 2:
            name = scene.solids.name[b.end_row[i]]
            return scene.names[name] if name >= 0 else "bench"
        return None


SCENES = {}
"""By name, functions without arguments that yield what is to be compared."""


def scene(function):
    """Enter a function of comparisons in the list of scenes."""
    assert function.__name__ not in SCENES
    SCENES[function.__name__] = function
    return function


def _tensor(j, axes):
    j12 = j[2] + 1j * j[3]
    two = np.array([[j[0], j12], [np.conj(j12), j[1]]])
    return axes.T @ two @ axes


def layout(elements, **more):
    """A bench in vacuum with one 632.8 nm source of 1 W along +x from (100, 450, 100).

    `elements` is the text of the table, two spaces in; `more` overrides the parts.
    """
    parts = {
        "medium": "vacuum",
        "wavelength": "632.8",
        "beam": "{waist_radius: 0.5}",
        "polarization": "vertical",
        "at": "[100, 450]",
        "heading": "0",
        "also": "",
        "source": "",
        "size": "[1500, 900]",
    }
    parts.update({key: str(value) for key, value in more.items()})
    return (
        (
            "bench: {{size: {size}, medium: {medium}}}\n"
            "sources:\n"
            "  laser: {{wavelength: {wavelength}, power: 1 W, beam: {beam},"
            " polarization: {polarization}, at: {at}, heading: {heading}, body: none{source}}}\n"
            "elements:\n"
        ).format(**parts)
        + elements
        + parts["also"]
    )
