"""Which faults are credible, and what becomes of them on small benches."""

import pytest

from benchlay.faults import KINDS, batches, families, review_faults
from benchlay.layout import read_layout
from benchlay.pipeline import place, read

SHUT = """\
enclosure:
  panels:
    south: {from: [0, 0], to: [1000, 0], access: interlocked}
    east: {from: [1000, 0], to: [1000, 600]}
    north: {from: [1000, 600], to: [0, 600], access: tool}
    west: {from: [0, 600], to: [0, 0]}
  lids:
    top: {height: 300, outline: [[0, 0], [1000, 0], [1000, 600], [0, 600]], access: interlocked}
"""
ELEMENTS = """\
elements:
  S1: {kind: shutter, after: red, distance: 50}
  HW: {kind: waveplate, after: S1, distance: 100, diameter: 25.4, retardance: half, axis: 45,
       front: 0.2 %, back: 0.2 %}
  PBS: {kind: cube, after: HW, distance: 100, reflectance: {s: 99.9 %, p: 1 %}, faces: 0.2 %}
  M1: {kind: mirror, after: PBS.transmitted, distance: 200, turn: left 90, diameter: 25.4,
       reflectance: 99.5 %, mount: {range: 2}}
  D1: {kind: dump, after: PBS.reflected, distance: 100}
  T1: {kind: target, after: M1, distance: 100}
routes:
  main: [red, S1, HW, PBS.transmitted, M1, T1]
"""
HEAD = {"size": "[1000, 600]", "at": "[100, 300]"}


def names(placed):
    return {(one.kind, one.element, one.name(0.0)) for one in families(placed, (0,))}


def test_every_credible_fault_is_there(bench):
    assert names(bench(ELEMENTS + SHUT, **HEAD)) == {
        ("knocked", "HW", "HW yaw +0°"),
        ("knocked", "HW", "HW pitch +0°"),
        ("knocked", "M1", "M1 yaw +0°"),
        ("knocked", "M1", "M1 pitch +0°"),
        ("out", "HW", "HW out"),
        ("out", "PBS", "PBS out"),
        ("out", "M1", "M1 out"),
        ("reversed", "HW", "HW reversed"),
        ("reversed", "PBS", "PBS reversed"),
        ("reversed", "M1", "M1 reversed"),
        ("turned", "HW", "HW turned +0°"),
        ("rolled", "PBS", "PBS rolled +0°"),
        ("stuck", "S1", "S1 stuck closed"),
        ("stuck", "S1", "S1 stuck half way"),
        ("missing", "D1", "D1 missing"),
        ("missing", "T1", "T1 missing"),
        ("opened", "south", "south open, its interlock failed"),
        ("opened", "north", "north left open"),
        ("opened", "top", "lid top open, its interlock failed"),
        ("wavelength", "HW", "HW met by light its coatings are not for"),
        ("wavelength", "PBS", "PBS met by light its coatings are not for"),
        ("wavelength", "M1", "M1 met by light its coatings are not for"),
    }


@pytest.mark.parametrize("kind", KINDS)
def test_a_family_can_be_turned_off(bench, kind):
    off = f"limits: {{faults: {{{kind}: no}}}}\n"
    kinds = {one.kind for one in families(bench(ELEMENTS + SHUT + off, **HEAD), (0,))}
    assert kinds == set(KINDS) - {kind}


def test_mounts_are_knocked_through_their_range_or_farther(bench):
    def reach(limits):
        found = families(bench(ELEMENTS + SHUT + limits, **HEAD), (0,))
        return {
            one.element: one.sweep.high_rad * 57.29577951308232
            for one in found
            if one.kind == "knocked"
        }

    assert reach("") == pytest.approx({"HW": 4.0, "M1": 2.0})
    assert reach("limits: {faults: {range: 3}}\n") == pytest.approx({"HW": 4.0, "M1": 3.0})


@pytest.mark.parametrize("word", ["perhaps", "{range: -1}", "{knocks: no}", "{rolled: 3}"])
def test_what_is_no_setting_is_refused(word):
    text = f"bench: {{size: [100, 100]}}\nlimits: {{faults: {word}}}\n"
    layout, problems = read_layout(text, "bench.yaml")
    assert layout is None
    (problem,) = problems.sorted()
    assert "faults" in problem.message
    assert problem.span.line == 2


@pytest.mark.parametrize(
    ("element", "words"),
    [("M1", "out"), ("D1", "missing"), ("south", "open"), ("top", "open"), ("PBS", "rolled")],
)
def test_a_closed_bench_lets_nothing_out(reviewed, named, element, words):
    assert named(reviewed(ELEMENTS + SHUT, **HEAD), element, words).outcome in ("none", "stray")


def test_without_a_lid_the_rolled_cube_sends_its_beam_out(reviewed, named):
    walls = SHUT.partition("  lids:")[0]
    fault = named(reviewed(ELEMENTS + walls, **HEAD), "PBS", "rolled")
    assert fault.outcome == "escape"
    assert fault.kind == "rolled"
    assert fault.worst.direction[2] > 0.0


def test_a_beam_on_an_access_panel_gets_out_where_it_is_open(reviewed, named):
    turned = (
        ELEMENTS.replace("turn: left 90", "turn: right 90")
        .replace("  T1: {kind: target, after: M1, distance: 100}\n", "")
        .replace("M1, T1]", "M1]")
    )
    fault = named(reviewed(turned + SHUT, **HEAD), "south", "open")
    assert (fault.outcome, fault.worst.through) == ("escape", "open south")
    # Half-wave plate at 45 degrees: all of it is level, of which the cube passes 99 %.
    assert fault.worst.power_w == pytest.approx(0.1 * 0.996**2 * 0.998**2 * 0.99 * 0.995, rel=0.01)
    assert fault.worst.at[1] == pytest.approx(0.0, abs=1e-6)


def test_a_shutter_that_sticks_open_in_a_state_that_closes_it(bench, named):
    states = "states: {loading: {elements.S1.closed: yes, enclosure.panels.south.open: yes}}\n"
    turned = (
        ELEMENTS.replace("turn: left 90", "turn: right 90")
        .replace("  T1: {kind: target, after: M1, distance: 100}\n", "")
        .replace("M1, T1]", "M1]")
    )
    review = review_faults(bench(turned + SHUT + states, **HEAD))
    fault = named(review, "S1", "stuck open", state=1)
    assert (fault.outcome, fault.worst.through) == ("escape", "open south")
    assert named(review, "S1", "half way", state=1).outcome == "escape"
    # With the shutter shut no hazardous light comes near the mirror.
    assert named(review, "M1", "out", state=1).cases == ()


def test_full_power_in_a_state_of_low_power(bench, named):
    states = "states: {align: {sources.red.power: 0.1 mW, enclosure.panels.south.open: yes}}\n"
    turned = (
        ELEMENTS.replace("turn: left 90", "turn: right 90")
        .replace("  T1: {kind: target, after: M1, distance: 100}\n", "")
        .replace("M1, T1]", "M1]")
    )
    fault = named(review_faults(bench(turned + SHUT + states, **HEAD)), "red", "full power", 1)
    assert (fault.outcome, fault.kind) == ("escape", "stuck")
    assert fault.worst.power_w > 0.09


def test_a_flip_mirror_that_sticks_in(bench, named):
    body = """\
elements:
  F1: {kind: mirror, at: [500, 300], facing: -135, diameter: 25.4, metal: silver}
  D1: {kind: dump, after: red, distance: 700}
routes:
  main: [red, D1]
states: {through: {elements.F1.out: yes, enclosure.panels.south.open: yes}}
"""
    fault = named(review_faults(bench(body + SHUT, **HEAD)), "F1", "stuck in", state=1)
    assert (fault.outcome, fault.worst.through) == ("escape", "open south")


def test_a_bare_mirror_lets_the_beam_through(reviewed, named):
    body = """\
elements:
  M1: {kind: mirror, after: red, distance: 300, turn: left 90, diameter: 25.4, reflectance: 100 %,
       back: polished, thickness: 2}
routes:
  main: [red, M1]
enclosure:
  panels:
    north: {from: [1000, 600], to: [0, 600]}
    west: {from: [0, 600], to: [0, 0]}
    south: {from: [0, 0], to: [1000, 0]}
"""
    fault = named(reviewed(body, **HEAD), "M1", "coatings")
    assert (fault.outcome, fault.worst.through) == ("escape", "south/north corner")
    # Two bare faces of BK7 (1.515) at 45 degrees, s light: 1 - R each.
    n = 1.5151
    c = (1 - 0.5 / n**2) ** 0.5
    r = ((0.5**0.5 - n * c) / (0.5**0.5 + n * c)) ** 2
    assert fault.worst.power_w == pytest.approx(0.1 * (1 - r) ** 2, rel=1e-3)


def test_light_without_a_limit_is_not_evaluated(named):
    text = """\
bench: {size: [1000, 600], medium: vacuum}
sources:
  deep: {wavelength: 150, power: 10 mW, beam: {waist_radius: 0.3}, at: [100, 300], heading: 0}
elements:
  D1: {kind: dump, after: deep, distance: 300}
"""
    fault = named(review_faults(place(read("bench.yaml", text))), "D1", "missing")
    assert fault.outcome == "not evaluated"
    assert "has no accessible limit" in fault.reasons[0]


def test_several_blocks_give_what_one_does(bench, monkeypatch):
    placed = bench(ELEMENTS + SHUT, **HEAD)
    one = review_faults(placed)
    monkeypatch.setattr(batches, "BLOCK", 7)
    other = review_faults(placed)
    assert [(f.name, f.outcome, f.worst) for f in one.faults] == [
        (f.name, f.outcome, f.worst) for f in other.faults
    ]


def test_light_that_goes_up_by_an_open_lid_says_by_which(reviewed, named):
    body = """\
elements:
  M1: {kind: mirror, after: red, distance: 300, turn: up 90, diameter: 25.4, metal: silver}
routes:
  main: [red, M1]
"""
    fault = named(reviewed(body + SHUT, **HEAD), "top", "open")
    assert (fault.outcome, fault.worst.through) == ("escape", "open lid top")
    assert fault.worst.direction == pytest.approx((0.0, 0.0, 1.0), abs=1e-9)


@pytest.mark.parametrize(
    "body",
    ["elements: {}\n", "elements:\n  B: {kind: obstacle, outline: [[0, 0], [50, 0], [0, 50]],\n"
     "      at: [400, 280], facing: 0, from_height: 0, to_height: 200}\n"],
)  # fmt: skip
def test_benches_without_optics(reviewed, body):
    review = reviewed(body, **HEAD)
    assert {fault.kind for fault in review.faults} <= {"missing"}
    assert all(fault.outcome in ("escape", "none") for fault in review.faults)
