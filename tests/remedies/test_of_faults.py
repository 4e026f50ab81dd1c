"""Remedies for what only single faults send out, each applied and reviewed from outside."""

from datetime import date

import pytest
import yaml
from pasting import HEAD, merged

import benchlay
from benchlay import pipeline
from benchlay.report.text import check_text

DAY = date(2026, 12, 1)
LOW = HEAD.replace("[100, 200]", "[100, 100]")
MIRROR = """\
elements:
  M1: {kind: mirror, after: red, distance: 300, turn: left 90, diameter: 25.4, reflectance: 100 %}
  D1: {kind: dump, after: M1, distance: 220}
routes: {main: [red, M1, D1]}
"""
BOX = """\
materials: {sheet: {specular: 0, withstands: {irradiance: 50 W/cm2, for: 30000 s}}}
enclosure:
  material: sheet
  to_height: 150
  panels:
    south: {from: [0, 0], to: [800, 0]}
    east: {from: [800, 0], to: [800, 400]}
    north: {from: [800, 400], to: [0, 400]%s}
    west: {from: [0, 400], to: [0, 0]}
"""
LID = "  lids: {top: {height: 150, outline: [[0, 0], [800, 0], [800, 400], [0, 400]]}}\n"
SLOT = ", openings: {slot: {along: 361, width: 3, from_height: 50, to_height: 140}}"
BENCHES = {
    # 4 degrees lift the beam by 5.65: 30 on 300, over a panel that tops it by 15.
    "over a panel": (LOW + MIRROR + (BOX % "").replace("150", "115"), "M1 pitch", "panel"),
    # The slot lies 36 to 39 beside the beam's own place, 300 away: 3.5 degrees of yaw.
    "through a slot of 3": (LOW + MIRROR + BOX % SLOT + LID, "M1 yaw", "panel"),
    "a mirror that is out": (
        LOW + MIRROR + (BOX % "").replace("    east: {from: [800, 0], to: [800, 400]}\n", ""),
        "M1 out",
        "screen",
    ),
}


def reviewed(text):
    return pipeline.review_files(text.encode(), "bench.yaml", on=DAY, state=None)[0]


def escapes(text):
    result = pipeline.faults_result(text.encode(), "bench.yaml", state=None, progress=None)
    return {fault.fault for fault in result.faults if fault.outcome == "escape"}


def findings(text):
    traced = benchlay.trace(benchlay.place(benchlay.read("bench.yaml", text)))
    return {finding.id for finding in benchlay.check(traced, on=DAY)}


@pytest.fixture(scope="module", params=BENCHES)
def bench(request):
    text, fault, kind = BENCHES[request.param]
    return text, fault, kind, reviewed(text)


def test_each_remedy_keeps_its_fault_in_and_raises_nothing(bench):
    text, fault, kind, review = bench
    before, own = escapes(text), findings(text)
    offered = review.remedies.of_faults
    assert any(one.fault.startswith(fault) and one.kind == kind for one in offered)
    for one in offered:
        changed = yaml.safe_dump(merged(yaml.safe_load(text), yaml.safe_load(one.yaml)))
        after = escapes(changed)
        assert one.fault in before
        assert not any(name.split(" +")[0] in one.fault for name in after)
        assert len(after) <= len(before) - 1 - len(one.clears_too)
        assert findings(changed) <= own


def test_all_faults_that_let_light_out_are_accounted_for(bench):
    text, _, _, review = bench
    remedies = review.remedies
    told = {f"{one.fault} in {one.state}" for one in remedies.of_faults}
    told |= {name for one in remedies.of_faults for name in one.clears_too}
    told |= set(remedies.faults_without)
    assert len(told) + remedies.faults_left == len(escapes(text))


def test_the_text_gives_what_is_to_be_pasted(bench):
    review = bench[-1]
    said = check_text([review])
    for one in review.remedies.of_faults:
        assert one.words in said
        assert one.yaml.split("\n")[-1].strip() in said
