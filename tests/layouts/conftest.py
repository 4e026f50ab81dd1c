"""The committed benches, as written and with something about them changed."""

from functools import lru_cache
from pathlib import Path

import pytest

from benchlay import pipeline
from benchlay.results.routes import last_legs, route_results
from benchlay.scene.tables import SINKS

ROOT = Path(__file__).parents[2]


class Bench:
    """A layout that was placed, traced and checked."""

    def __init__(self, name, text):
        source = pipeline.read(f"layouts/{name}.yaml", text)
        self.text = text
        self.trace = pipeline.trace(pipeline.place(source))
        self.scene, self.beams = self.trace.scene, self.trace.beams

    def every(self, on=None):
        """Tell all findings, notes among them."""
        return pipeline.check(self.trace, on=on)

    def findings(self):
        """Tell the findings that are more than a note."""
        return [one for one in self.every() if one.severity != "note"]

    def found(self):
        """Tell which check found something at which element."""
        return {(one.check, one.element) for one in self.findings()}

    def variant(self, state):
        return self.scene.variants.index(state)

    def route(self, name, state="as drawn"):
        results = route_results(self.trace, self.variant(state))
        (found,) = (one for one in results if one.route == name)
        return found

    def end(self, name, state="as drawn"):
        """Tell by which beam a route ends."""
        legs = last_legs(self.trace, self.variant(state), self.trace.ways.names.index(name))
        (beam,) = legs.tolist()
        return beam

    def way(self, name, state="as drawn"):
        """Give the beams of a route from its source to its end."""
        beam, found = self.end(name, state), []
        while beam >= 0:
            found.append(beam)
            beam = int(self.beams.start.parent[beam])
        return found[::-1]

    def face(self, beam):
        """Name the face that a beam ends on."""
        row = int(self.beams.end_row[beam])
        faces = self.scene.faces
        return f"{self.scene.elements[faces.owner[row]]}.{self.scene.face_names[faces.name[row]]}"

    def landed(self, state):
        """Give what landed where: (wavelength, kind of sink, name, power), beam by beam."""
        ledger, start = self.trace.ledger, self.beams.start
        return [
            (
                float(self.scene.wavelengths_nm[start.wave[ledger.beam[row]]]),
                SINKS[ledger.sink[row]],
                self.scene.names[ledger.name[row]] if ledger.name[row] >= 0 else None,
                float(ledger.power[row]),
            )
            for row in self.trace.landings_of(self.variant(state)).tolist()
        ]

    def elements(self):
        return self.trace.placed.base.elements


@lru_cache(maxsize=32)
def _made(name, changes):
    text = (ROOT / f"layouts/{name}.yaml").read_text(encoding="utf-8")
    for old, new in changes:
        assert text.count(old) == 1, f"{old!r} stands {text.count(old)} times in {name}"
        text = text.replace(old, new)
    return Bench(name, text)


@pytest.fixture
def bench():
    """Make a bench from its name, with some texts of its layout replaced by others."""
    return lambda name, *changes: _made(name, changes)
