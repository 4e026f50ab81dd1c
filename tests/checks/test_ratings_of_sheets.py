"""A sheet is held against its own rating, for as long as the exposure is taken to last."""

import pytest

import benchlay

BENCH = """\
bench: {{size: [800, 400]}}
sources:
  red: {{wavelength: 633, power: 1 W, beam: {{waist_radius: 1}}, at: [100, 200], heading: 0}}
elements:
  M1: {{kind: mirror, after: red, distance: 300, turn: up 90, diameter: 25.4, metal: silver}}
  B1: {{kind: splitter, after: red, distance: 100, incidence: 45, diameter: 25.4,
        reflectance: 50 %, back: 0.01 %, out: {out}}}
materials:
  strong: {{thickness: 2, specular: 0, withstands: {{irradiance: 500 W/cm2, for: {strong}}}}}
  weak: {{thickness: 2, specular: 0, withstands: {{irradiance: 1 W/cm2, for: 100 s}}}}
enclosure:
  material: strong
  to_height: 300
  panels:
    north: {{from: [800, 400], to: [0, 400], material: {panel}}}
    south: {{from: [0, 0], to: [800, 0]}}
  lids:
    north: {{height: 300, outline: [[0, 0], [800, 0], [800, 400], [0, 400]], material: {lid}}}
"""


def found(panel="strong", lid="strong", strong="100 s", out="yes"):
    text = BENCH.format(panel=panel, lid=lid, strong=strong, out=out)
    traced = benchlay.trace(benchlay.place(benchlay.read("x.yaml", text)))
    return [f for f in benchlay.check(traced) if f.check == "panel-overload"]


def test_a_lid_is_held_against_its_own_rating_and_not_that_of_a_panel_of_its_name():
    assert found(panel="weak", lid="strong") == []
    (finding,) = found(panel="strong", lid="weak")
    assert finding.severity == "fail"
    assert finding.message.startswith("lid 'north' takes ")
    # 2 P / (pi w²) of 1 W and 1 mm, silver and the way's spreading aside: 63.7 W/cm²
    assert finding.value == pytest.approx(63.7, rel=0.07)
    assert finding.limit == 1.0


def test_both_of_one_name_are_told_apart():
    findings = found(panel="weak", lid="weak", out="no")
    assert sorted(f.message.partition(" takes ")[0] for f in findings) == ["'north'", "lid 'north'"]
    assert len({f.id for f in findings}) == 2
    assert len({f.line for f in findings}) == 2


def test_a_rating_for_a_shorter_time_shows_nothing():
    (finding,) = found(strong="10 s")
    assert finding.severity == "warn"
    assert "is rated for 10 s, not for the 100 s assumed" in finding.message
    assert found(strong="100 s") == []
