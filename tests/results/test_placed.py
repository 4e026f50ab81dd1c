"""Poses in degrees."""

import pytest

from benchlay.results.placed import poses


def test_poses_of_sources_and_elements_by_name(corner):
    told = poses(corner.placed.base)
    assert list(told) == ["M1", "T1", "red"]
    assert told["M1"].at == pytest.approx((400.0, 100.0, 100.0))
    assert told["M1"].facing == pytest.approx(135.0)
    assert told["T1"].facing == pytest.approx(270.0)
    assert told["red"].facing == 0.0


@pytest.mark.parametrize(("written", "told"), [("-90", 270.0), ("360", 0.0), ("-1e-13", 0.0)])
def test_facing_lies_from_0_to_360(traced, written, told):
    text = f"""
bench: {{size: [900, 600]}}
sources:
  red: {{wavelength: 633, power: 8 mW, beam: {{waist_radius: 0.5}}, at: [100, 100], heading: 0}}
elements:
  T1: {{kind: target, at: [400, 300], facing: {written}, pitch: -3}}
"""
    pose = poses(traced(text).placed.base)["T1"]
    assert pose.facing == pytest.approx(told, abs=1e-9)
    assert 0.0 <= round(pose.facing, 9) < 360.0
    assert pose.pitch == pytest.approx(-3.0)
