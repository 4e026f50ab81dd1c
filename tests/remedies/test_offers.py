"""Remedies of benches with known faults, each applied and checked from outside."""

from datetime import date

import pytest
import yaml
from pasting import HEAD, merged

import benchlay
from benchlay import pipeline

DAY = date(2026, 12, 1)
PANELS = """\
enclosure:
  to_height: 150
  panels:
    south: {from: [0, 0], to: [800, 0]}
    north: {from: [800, 400], to: [0, 400]}
    west: {from: [0, 400], to: [0, 0]}
"""
EAST = "    east: {from: [800, 0], to: [800, 400]}\n"
RATED = """\
materials:
  sheet: {thickness: 2, specular: 0, withstands: {irradiance: 50 W/cm2, for: 30000 s}}
"""
GHOST = """\
elements:
  W1: {kind: window, after: red, distance: 200, incidence: 45, diameter: 25.4, back: 0.01 %}
  T1: {kind: target, after: W1, distance: 100}
routes: {main: [red, W1, T1]}
"""
UPWARDS = """\
elements:
  M1: {kind: mirror, after: red, distance: 300, turn: left 90, pitch: 20, diameter: 25.4,
       metal: silver}
routes: {main: [red, M1]}
"""
SQUARE = """\
elements:
  W1: {kind: window, after: red, distance: 300, diameter: 25.4, back: 0.01 %}
  T1: {kind: target, after: W1, distance: 100}
routes: {main: [red, W1, T1]}
"""


def in_sheet(panels):
    return RATED + panels.replace("enclosure:\n", "enclosure:\n  material: sheet\n")


BENCHES = {
    "a ghost over the edge": HEAD + GHOST,
    "a beam over a panel": HEAD + UPWARDS + in_sheet(PANELS + EAST),
    "a beam through an opening": HEAD
    + "elements:\n  T1: {kind: target, at: [400, 350], facing: 0}\n"
    + in_sheet(
        PANELS
        + EAST.replace(
            "400]}",
            "400], openings: {port: {along: 150, width: 100, from_height: 60, to_height: 140}}}",
        )
    ),
    "a side without panel": HEAD
    + "elements:\n  T1: {kind: target, at: [400, 350], facing: 0}\n"
    + in_sheet(PANELS),
    "a window square to the beam": HEAD.replace(
        "heading: 0", "heading: 0, body: {length: 80, width: 50, height: 50}"
    )
    + SQUARE,
}


def reviewed(text):
    return pipeline.review_files(text.encode(), "bench.yaml", on=DAY, state=None)[0]


@pytest.fixture(scope="module", params=BENCHES)
def bench(request):
    text = BENCHES[request.param]
    return request.param, text, reviewed(text)


def test_each_remedy_clears_its_finding_and_raises_no_other(bench):
    _, text, review = bench
    before = {f.id for f in review.findings}
    assert review.remedies.offered
    for remedy in review.remedies.offered:
        changed = yaml.safe_dump(merged(yaml.safe_load(text), yaml.safe_load(remedy.yaml)))
        traced = benchlay.trace(benchlay.place(benchlay.read("bench.yaml", changed)))
        after = {f.id for f in benchlay.check(traced, on=DAY)}
        assert remedy.finding not in after
        assert after <= before
        assert before - after == {remedy.finding, *remedy.clears_too}


def test_the_sorts_that_fit_the_fault_are_offered(bench):
    name, _, review = bench
    kinds = {remedy.kind for remedy in review.remedies.offered}
    expected = {
        "a ghost over the edge": {"screen", "coating"},
        "a beam over a panel": {"screen", "panel"},
        "a beam through an opening": {"screen", "panel"},
        "a side without panel": {"screen", "panel"},
        "a window square to the beam": {"coating", "tilt"},
    }[name]
    assert expected <= kinds


def test_a_finding_that_nothing_clears_is_told():
    """A mirror so near the edge that nothing can stand behind it."""
    text = HEAD + (
        "elements:\n"
        "  M1: {kind: mirror, after: red, distance: 698, facing: 180, yaw_error: 44,\n"
        "       diameter: 25.4, metal: silver, mount: none}\n"
        "routes: {main: [red, M1]}\n"
    )
    review = reviewed(text)
    remedies = review.remedies
    mended = {f.id for f in review.findings if f.check in ("escape", "stray-unstopped")}
    assert {r.finding for r in remedies.offered} | set(remedies.without) == mended
    assert mended


def test_a_bench_without_such_findings_costs_no_trial():
    text = HEAD + "elements:\n  T1: {kind: target, after: red, distance: 100}\n"
    assert reviewed(text + "routes: {main: [red, T1]}\n").remedies.tried == 0


def test_all_remedies_can_be_pasted_side_by_side():
    """Two windows send ghosts two ways: the screens that end them have names of their own."""
    second = (
        "  W2: {kind: window, after: W1, distance: 100, incidence: 45, side: right,\n"
        "       diameter: 25.4, back: 0.01 %}\n"
        "  T1: {kind: target, after: W2, distance: 100}\n"
    )
    text = HEAD + GHOST.replace("  T1: {kind: target, after: W1, distance: 100}\n", second).replace(
        "W1, T1", "W1, W2, T1"
    )
    remedies = reviewed(text).remedies.offered
    added = {}
    for remedy in remedies:
        for name in yaml.safe_load(remedy.yaml).get("elements", {}):
            if name in remedy.adds:
                assert added.setdefault(name, remedy.yaml) == remedy.yaml
    assert len(added) >= 2
