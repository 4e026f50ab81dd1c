"""Enclosures as text, read and made into parts."""

import pytest

from benchlay import pipeline
from benchlay.making.parts import parts_of

BENCH = """
bench: {{size: [1500, 900], holes: {{pitch: 25, first: [25, 25]}}}}
sources:
  red: {{wavelength: 633, power: 5 mW, beam: {{waist_radius: 0.5}}, at: [100, 200], heading: 0}}
materials: {{sheet: {{thickness: 2, density: 2700 kg/m3}}}}
enclosure:
  material: sheet
{enclosure}
"""


@pytest.fixture(scope="session")
def parts():
    """Return the parts by name of an enclosure's text."""

    def make(enclosure):
        layout = pipeline.read("x.yaml", BENCH.format(enclosure=enclosure)).as_drawn
        return {part.name: part for part in parts_of(layout)}

    return make
