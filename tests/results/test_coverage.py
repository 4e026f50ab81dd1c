"""The rows of coverage in a review: which places, how much, and the id of the finding."""

import math
from datetime import date

import pytest

from benchlay import pipeline

LAYOUT = """
bench: {outline: [[0, 0], [1000, 0], [1000, 800], [0, 800]]}
sources:
  red: {wavelength: 633, power: 50 mW, beam: {waist_radius: 0.5}, at: [300, 400], heading: 0}
elements:
  W1:
    {kind: window, after: red, distance: 100, incidence: 10, diameter: 25.4, front: 1 %, back: 1 %}
  T1: {kind: target, after: W1, distance: 300}
  K1: {kind: screen, at: [500, 600], facing: 0}
  F1: {kind: mirror, at: [200, 100], facing: 0, diameter: 25.4, metal: silver, out: yes}
  M9: {kind: mirror, at: [900, 900], facing: 0, diameter: 25.4, metal: silver}
routes: {main: [red, W1, T1]}
enclosure:
  panels:
    south: {from: [0, 0], to: [988, 0]}
    east: {from: [1000, 0], to: [1000, 800]}
    north: {from: [1000, 800], to: [0, 800]}
    west: {from: [0, 800], to: [0, 0]}
  lids:
    main: {height: 300, outline: [[0, 0], [1000, 0], [1000, 800], [0, 800]]}
states:
  dim: {sources.red.power: 0.1 mW}
"""


@pytest.fixture(scope="module")
def review():
    return pipeline.review(
        LAYOUT.encode(), "x.yaml", on=date(2026, 12, 1), state=None, in_full=True
    )


@pytest.fixture(scope="module")
def rows(review):
    return {(row.state, row.from_): row for row in review.coverage}


def test_every_source_optic_and_target_that_stands_there_has_a_row_in_every_state(rows):
    assert {place for state, place in rows if state == "as drawn"} == {"M9", "T1", "W1", "red"}
    assert {state for state, _ in rows} == {"as drawn", "dim"}


def test_what_is_covered_is_what_is_not_open(rows):
    row = rows["as drawn", "red"]
    (gap,) = row.gaps
    assert gap.through == "south/east corner"
    assert row.covered == pytest.approx(1 - gap.solid_angle_sr / (4 * math.pi), rel=1e-12)
    expected = [math.degrees(math.atan2(-400, x)) for x in (688, 700)]
    assert gap.azimuth == pytest.approx(expected, abs=1e-9)
    assert (gap.width_mm, gap.at) == (pytest.approx(12.0), pytest.approx((994, 0, 150)))


def test_the_power_is_that_of_the_place_and_state(rows):
    assert rows["as drawn", "red"].gaps[0].power_W == pytest.approx(0.05)
    assert rows["as drawn", "T1"].gaps[0].power_W == pytest.approx(0.05 * 0.99**2, rel=1e-3)
    assert rows["dim", "red"].gaps[0].power_W == pytest.approx(1e-4)


def test_a_gap_has_the_id_of_its_finding(review, rows):
    (finding,) = (one for one in review.findings if one.check == "open-side")
    assert finding.states == ("as drawn",)  # the dim light is within the limit
    assert {gap.id for row in rows.values() if row.from_ != "M9" for gap in row.gaps} == {
        finding.id
    }


def test_what_stands_outside_is_not_enclosed(rows):
    row = rows["as drawn", "M9"]
    assert row.covered == 0.0
    assert [gap.through for gap in row.gaps] == ["outside the enclosure"]
