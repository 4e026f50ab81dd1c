"""What became of routes, and beams that are handed over."""

import math

import pytest

from benchlay.results.beam_rows import beam_rows
from benchlay.results.handed_over import handed_over
from benchlay.results.ledger import ledgers
from benchlay.results.routes import route_results

PORT = """
bench: {size: [900, 600], beam_height: 100, medium: {index: 1.2}}
sources:
  red: {wavelength: 633, power: 8 mW, beam: {waist_radius: 0.5}, polarization: vertical,
        at: [100, 100], heading: 0}
elements:
  BS: {kind: splitter, after: red, distance: 200, turn: left 90, diameter: 25.4,
       reflectance: 40 %, thickness: 0, back: 0 %, glass: {index: 1}, mount: none}
  T1: {kind: target, after: BS.reflected, distance: 150}
routes:
  b-port: [red, BS.transmitted, east.port]
  a-target: [red, BS.reflected, T1]
enclosure:
  panels:
    east:
      from: [900, 0]
      to: [900, 600]
      openings: {port: {along: 100, height: 100, diameter: 20}}
states:
  shut: {enclosure.panels.east.open: yes}
  blocked: {elements.BS.out: yes}
"""


@pytest.fixture(scope="module")
def port(traced):
    return traced(PORT)


def test_routes_by_name_with_power_and_lengths(port):
    target, east = route_results(port, 0)
    assert (target.route, target.state, target.arrives) == ("a-target", "as drawn", True)
    assert target.power_W == pytest.approx(3.2e-3)
    assert target.transmission == pytest.approx(0.4)
    assert (target.path_mm, target.optical_path_mm) == pytest.approx((350.0, 420.0))
    assert target.polarization.angle_deg == pytest.approx(90.0)
    assert target.polarization.horizontal == pytest.approx((-1.0, 0.0, 0.0))
    assert (east.route, east.arrives) == ("b-port", True)
    assert east.transmission == pytest.approx(0.6)


def test_a_route_that_does_not_arrive_has_no_lengths(port):
    target = route_results(port, port.scene.variants.index("blocked"))[0]
    assert (target.arrives, target.power_W, target.transmission) == (False, 0.0, 0.0)
    assert math.isnan(target.path_mm)
    assert math.isnan(target.optical_path_mm)
    assert target.polarization is None


def test_a_beam_is_handed_over_in_the_opening(port):
    (beam,) = handed_over(port, 0)
    assert beam.through == "east.port"
    assert beam.axis.at == pytest.approx((900.0, 100.0, 100.0))
    assert beam.axis.direction == pytest.approx((1.0, 0.0, 0.0))
    w = 0.5 * math.hypot(1.0, 800.0 * 633e-6 / (1.2 * math.pi * 0.25))
    assert beam.w_mm == pytest.approx((w, w), rel=1e-9)
    assert beam.power_W == pytest.approx(4.8e-3)
    assert beam.state == "as drawn"


def test_it_is_handed_over_through_a_panel_that_stands_open_too(port):
    (beam,) = handed_over(port, port.scene.variants.index("shut"))
    assert beam.power_W == pytest.approx(4.8e-3)
    assert beam.state == "shut"


def test_no_beam_is_handed_over_that_misses_the_opening(traced):
    beside = PORT.replace("along: 100", "along: 300")
    assert handed_over(traced(beside), 0) == ()
    assert [r.arrives for r in route_results(traced(beside), 0)] == [True, False]


def test_lines_of_one_route_are_added_up(traced):
    text = """
bench: {size: [900, 600]}
sources:
  two: {lines: [{wavelength: 532, power: 3 mW}, {wavelength: 1064, power: 1 mW}],
        beam: {waist_radius: 0.4}, at: [100, 100], heading: 0}
elements:
  T1: {kind: target, after: two, distance: 150}
routes:
  green: [two.532, T1]
"""
    trace = traced(text)
    (green,) = route_results(trace, 0)
    assert green.power_W == pytest.approx(3e-3)
    assert green.transmission == pytest.approx(1.0)


def test_the_leg_ends_in_the_opening_and_nothing_goes_on(port):
    rows = beam_rows(port, 0)
    (leg,) = [row for row in rows if row.ends == "handed-over"]
    assert (leg.to, leg.to_face, leg.route) == ("east.port", None, "b-port")
    assert leg.end == pytest.approx((900.0, 100.0, 100.0))
    assert leg.power_at_end_W == pytest.approx(4.8e-3)
    assert [row for row in rows if row.parent == leg.beam] == []
    (ledger,) = ledgers(port, 0)
    (sink,) = [sink for sink in ledger.sinks if sink.kind == "handed-over"]
    assert (sink.name, sink.power_W) == ("east.port", pytest.approx(4.8e-3))
    assert ledger.unaccounted_W == pytest.approx(0.0, abs=1e-12)
