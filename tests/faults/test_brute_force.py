"""Sweeps against many settings traced one by one, from the sources on."""

import numpy as np
import pytest

from benchlay.faults import review_faults
from benchlay.faults.batches import Tracer, Variant
from benchlay.faults.verdicts import Judge

BEHIND_A_MIRROR = """\
elements:
  M1: {kind: mirror, after: red, distance: 400, turn: left 90, diameter: 25.4, metal: silver,
       mount: {range: 1}}
  M2: {kind: mirror, after: M1, distance: 300, turn: right 90, diameter: 25.4, metal: silver,
       mount: none}
  T1: {kind: target, after: M2, distance: 300, size: [10, 10]}
routes:
  main: [red, M1, M2, T1]
materials: {black: {diffuse: 0.05, specular: 0}}
enclosure:
  material: black
  panels:
    south: {from: [0, 0], to: [1500, 0]}
    east: {from: [1500, 0], to: [1500, 900],
           openings: {slot: {along: 580, width: 3, from_height: 50, to_height: 150}}}
    north: {from: [1500, 900], to: [0, 900]}
    west: {from: [0, 900], to: [0, 0]}
"""
ROLLED = """\
elements:
  HW: {kind: waveplate, after: red, distance: 100, diameter: 25.4, retardance: half, axis: 20,
       front: 0.2 %, back: 0.2 %}
  PBS: {kind: cube, after: HW, distance: 200, reflectance: {s: 99.9 %, p: 1 %}, faces: 0.2 %}
  D1: {kind: dump, after: PBS.reflected, distance: 100}
  T1: {kind: target, after: PBS.transmitted, distance: 300}
routes:
  main: [red, HW, PBS.transmitted, T1]
enclosure:
  to_height: 150
  panels:
    south: {from: [0, 0], to: [1500, 0]}
    east: {from: [1500, 0], to: [1500, 900]}
    north: {from: [1500, 900], to: [0, 900]}
    west: {from: [0, 900], to: [0, 0]}
"""
HEAD = {"size": "[1500, 900]", "at": "[200, 300]"}


@pytest.mark.parametrize(
    ("body", "words", "count"), [(BEHIND_A_MIRROR, "M1 yaw", 400), (ROLLED, "PBS rolled", 300)]
)
def test_between_settings_nothing_is_missed(bench, body, words, count):
    placed = bench(body, **HEAD)
    (fault,) = [one for one in review_faults(placed).faults if words in one.name]
    assert fault.outcome == "escape"
    sweep, own = fault.family.sweep, len(placed.states)
    settings = np.linspace(sweep.low_rad, sweep.high_rad, count + 2)[1:-1] + 1.7e-5
    tracer, judge = Tracer(placed), Judge()
    rest = judge.verdict(tracer.rest, 0)
    known = [case.setting_rad for case in fault.cases]
    told = [{light.through for light in case.verdict.escapes} for case in fault.cases]
    # Traced whole, so that the legs from which sweeps are traced are held to it as well.
    for which, context in tracer.contexts([Variant(fault.family.made(s), None) for s in settings]):
        for number in which:
            found = judge.verdict(context, own + number - which.start).beside(rest)
            after = int(np.searchsorted(known, settings[number]))
            ways = {light.through for light in found.escapes}
            assert ways in (told[after - 1], told[after]), fault.family.name(settings[number])


def test_a_slot_behind_a_second_mirror_is_found(reviewed, named):
    fault = named(reviewed(BEHIND_A_MIRROR, **HEAD), "M1", "yaw")
    assert (fault.outcome, fault.worst.through) == ("escape", "east/slot")

    # By hand: the beam leaves M1 at 90 + 2 y, meets M2's plane x - y = 0 (about its middle at
    # (600, 600)), and leaves it at -2 y, towards the panel at x = 1500.
    def height(yaw):
        lean = np.tan(2 * yaw)
        x = -300 * lean / (1 + lean)  # where x = -(300 + y) lean and y = x
        return 600 + x - (900 - x) * lean

    low, high = fault.range_of_worst
    # Ends of ranges are known to 5e-6 rad, which turns the beam by twice that: 0.012 mm at 1.2 m.
    # It comes in by the upper edge of the slot and goes out, 2 mm on and lower, by the lower one.
    assert height(low) == pytest.approx(583.0, abs=0.012)
    assert height(high) - 2 * np.tan(2 * high) == pytest.approx(580.0, abs=0.012)
