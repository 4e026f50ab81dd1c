"""Layouts in a few lines, with the hazards of their states."""

from datetime import date

from benchlay import pipeline


def reviewed(text):
    result, files = pipeline.review_files(
        text.encode(), "bench.yaml", on=date(2026, 12, 1), state=None
    )
    return result, files


def review(text):
    return pipeline.review(
        text.encode(), "bench.yaml", on=date(2026, 12, 1), state=None, in_full=True
    )


def hazards(text):
    """Return the hazards by state."""
    return {one.state: one for one in review(text).hazards}


OPEN = """
bench: {size: [1000, 600], medium: vacuum}
sources:
  green: {wavelength: 532, power: 150 mW, beam: {waist_radius: 0.5}, at: [100, 300], heading: 0}
elements:
  D1: {kind: dump, at: [700, 300], facing: 180}
"""

PULSED = """
bench: {size: [1000, 600], medium: vacuum}
sources:
  ir:
    wavelength: 1064
    pulse: {energy: 2 mJ, duration: 8 ns, rate: 10 Hz}
    beam: {waist_radius: 1}
    at: [100, 300]
    heading: 0
elements:
  D1: {kind: dump, at: [700, 300], facing: 180}
"""

TWO = """
bench: {size: [1000, 600], medium: vacuum}
sources:
  both:
    lines: [{wavelength: 532, power: 100 mW}, {wavelength: 1064, power: 200 mW}]
    beam: {waist_radius: 0.5}
    at: [100, 300]
    heading: 0
elements:
  D1: {kind: dump, at: [700, 300], facing: 180}
"""

BOX = """
title: Box
bench: {size: [1000, 600], medium: vacuum}
room:
  outline: [[-1000, -1500], [3000, -1500], [3000, 2000], [-1000, 2000]]
  doors: {corridor: {from: [3000, 0], to: [3000, 600]}}
  people: {desk: {at: [2000, -900], eyes: seated}, path: {at: [2000, 300], eyes: standing}}
sources:
  green: {wavelength: 532, power: 150 mW, beam: {waist_radius: 0.5}, at: [100, 300], heading: 0}
elements:
  S1: {kind: shutter, after: green, distance: 400, closed: yes}
enclosure:
  material: black
  panels:
    south: {from: [0, 0], to: [1000, 0]}
    east: {from: [1000, 0], to: [1000, 600], access: interlocked}
    north: {from: [1000, 600], to: [0, 600]}
    west: {from: [0, 600], to: [0, 0]}
  lids:
    top: {height: 300, outline: [[0, 0], [1000, 0], [1000, 600], [0, 600]]}
materials: {black: {thickness: 2, diffuse: 0, specular: 0}}
states:
  alignment: {sources.green.power: 0.3 mW, enclosure.panels.east.open: yes}
  service: {elements.S1.closed: no, enclosure.panels.east.open: yes}
"""
