"""Benches without what light needs: elements, sources, a source that is in."""

import pytest

from benchlay import pipeline
from benchlay.results.beam_rows import beam_rows
from benchlay.results.ledger import ledgers

RED = "red: {wavelength: 633, power: 3 mW, beam: {waist_radius: 0.5}, at: [100, 100], heading: 0"


def trace(sources, elements=""):
    text = f"bench: {{size: [900, 600]}}\nsources: {sources}\n{elements}"
    return pipeline.trace(pipeline.place(pipeline.read("x.yaml", text)))


def test_without_elements_light_leaves():
    traced = trace(f"{{{RED}}}}}")
    (beam,) = beam_rows(traced, 0)
    assert beam.ends == "escaped"
    (entry,) = ledgers(traced, 0)
    assert [(sink.kind, sink.power_W) for sink in entry.sinks] == [("escaped", pytest.approx(3e-3))]


@pytest.mark.parametrize("elements", ["", "elements: {T1: {kind: target, at: [9, 9], facing: 0}}"])
def test_a_source_that_is_out_sends_no_light(elements):
    traced = trace(f"{{{RED}, out: yes}}}}", elements)
    assert beam_rows(traced, 0) == ()
    assert ledgers(traced, 0) == ()
