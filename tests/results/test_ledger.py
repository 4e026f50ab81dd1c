"""Ledgers: each sink by itself, with figures worked out by hand."""

import pytest

from benchlay.results.ledger import ledgers

TWO_LINES = """
bench: {size: [900, 600]}
sources:
  b: {lines: [{wavelength: 532, power: 10 mW}, {wavelength: 1064, power: 20 mW}],
      beam: {waist_radius: 0.4}, at: [100, 100], heading: 0}
  a: {wavelength: 633, power: 1 mW, beam: {waist_radius: 0.4}, at: [100, 300], heading: 0}
  off: {wavelength: 405, power: 1 mW, beam: {waist_radius: 0.4}, at: [100, 500], heading: 0,
        out: yes}
elements:
  T2: {kind: target, at: [400, 100], facing: 180}
  D1: {kind: dump, at: [400, 300], facing: 180}
"""


def told(entry):
    return [(s.kind, s.name, s.wavelength_nm, s.power_W) for s in entry.sinks]


def test_each_sink_of_a_corner(corner):
    (entry,) = ledgers(corner, 0)
    assert (entry.state, entry.source, entry.emitted_W) == ("as drawn", "red", 8e-3)
    # 90 % to the target; 4 % stays in the coating, and the 6 % that leak in the ground back.
    assert told(entry) == [
        ("target", "T1", 633.0, pytest.approx(7.2e-3, rel=1e-12)),
        ("absorbed", "M1", 633.0, pytest.approx(0.8e-3, rel=1e-12)),
    ]
    assert abs(entry.unaccounted_W) < 1e-17


def test_a_state_has_its_own(corner):
    names = corner.scene.variants
    (low,) = ledgers(corner, names.index("low"))
    assert (low.state, low.emitted_W) == ("low", 1e-3)
    (away,) = ledgers(corner, names.index("away"))
    assert told(away) == [("escaped", None, 633.0, pytest.approx(8e-3, rel=1e-12))]


def test_sources_by_name_sinks_by_kind_name_and_wavelength(traced):
    entries = ledgers(traced(TWO_LINES), 0)
    assert [entry.source for entry in entries] == ["a", "b"]
    assert [told(entry) for entry in entries] == [
        [("dump", "D1", 633.0, pytest.approx(1e-3))],
        [
            ("target", "T2", 532.0, pytest.approx(1e-2)),
            ("target", "T2", 1064.0, pytest.approx(2e-2)),
        ],
    ]


def test_what_is_below_the_floor_names_its_largest_beam(traced):
    window = """
bench: {size: [900, 600]}
sources:
  red: {wavelength: 633, power: 8 mW, beam: {waist_radius: 0.5}, at: [100, 100], heading: 0}
elements:
  W1: {kind: window, after: red, distance: 200, incidence: 20, diameter: 25}
  T1: {kind: target, after: W1, distance: 200}
"""
    trace = traced(window)
    (entry,) = ledgers(trace, 0)
    (faint,) = (sink for sink in entry.sinks if sink.kind == "below-floor")
    floor = trace.floor_w[0]
    assert 0.0 < faint.largest_W < floor
    assert faint.largest_W <= faint.power_W
    others = [sink for sink in entry.sinks if sink is not faint]
    assert all(sink.largest_W is None for sink in others)
    total = sum(sink.power_W for sink in entry.sinks)
    assert total == pytest.approx(8e-3, rel=1e-12)
