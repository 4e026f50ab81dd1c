"""Escape fans: their directions by hand, and the sheet that shows them."""

from math import atan2, cos, degrees, radians, sin

import pytest
import shapely

from benchlay.faults import fans_of, review_faults
from benchlay.pipeline import trace
from benchlay.results.faults import faults_result
from benchlay.sheets import sheets_of
from benchlay.sheets.drafting.faults import faults_picture
from benchlay.sheets.primitives import Text
from benchlay.zones import zones_of

SIDES = """\
elements:
  M1: {kind: mirror, after: red, distance: 500, turn: left 90, diameter: 25.4, reflectance: 100 %,
       back: polished, thickness: 2}
  D1: {kind: dump, after: M1, distance: 250}
routes:
  main: [red, M1, D1]
materials:
  black: {diffuse: 0.1, specular: 0}
enclosure:
  material: black
  panels:
    south: {from: [0, 0], to: [1000, 0]}
    east: {from: [1000, 0], to: [1000, 600]}
    west: {from: [0, 600], to: [0, 0]}
  lids:
    top: {height: 300, outline: [[0, 0], [1000, 0], [1000, 600], [0, 600]]}
"""
HEAD = {"size": "[1000, 600]", "at": "[100, 300]"}
OFF = "limits: {faults: {out: no, reversed: no, missing: no, wavelength: no}}\n"


@pytest.fixture
def knocked(bench):
    placed = bench(SIDES + OFF, **HEAD)
    review = review_faults(placed)
    return placed, review


def test_a_yawed_mirror_fans_out_on_both_sides_of_the_dump(knocked):
    _, review = knocked
    yaw = next(fan for fan in fans_of(review.faults) if "yaw" in fan.fault.name)
    # The dump, 250 away, stops the beam until it passes beside its body; then 8 degrees are free.
    low, high = (degrees(a) for a in yaw.azimuth_rad)
    assert (low, high) == pytest.approx((82.0, 98.0), abs=1e-6)
    assert yaw.elevation_rad == pytest.approx((0.0, 0.0), abs=1e-9)
    assert len(yaw.strands) == 2
    for strand in yaw.strands:
        headings = [atan2(b[1] - a[1], b[0] - a[0]) for a, b in strand]
        assert all(abs(degrees(h) - 90.0) > 2.0 for h in headings)


def test_numbers_and_figures_are_those_of_the_table(knocked):
    placed, review = knocked
    result = faults_result(review, placed, "bench.yaml", "")
    escapes = [row for row in result.faults if row.outcome == "escape"]
    assert [row.number for row in escapes] == [f"#{n}" for n in range(1, len(escapes) + 1)]
    assert all(row.number is None and row.fan is None for row in result.faults[len(escapes) :])
    row = next(row for row in escapes if "yaw" in row.fault)
    assert row.fan.azimuth == pytest.approx((82.0, 98.0), abs=1e-6)
    # By the middle of the front face, wherever it is turned to.
    assert row.fan.origin == pytest.approx((600.0, 300.0, 100.0), abs=1e-6)


def test_the_plan_shows_each_fan_where_its_rays_go(knocked):
    placed, review = knocked
    traced = trace(placed)
    picture = faults_picture(traced, zones_of(traced), review)
    fans = fans_of(review.faults)
    assert [zone.name for zone in picture.zones] == [fan.number for fan in fans]
    at = next(n for n, fan in enumerate(fans) if "yaw" in fan.fault.name)
    outer, *holes = picture.zones[at].rings
    area = shapely.Polygon(outer, holes)
    for heading, there in (
        (82.5, True),
        (97.5, True),
        (90.0, False),
        (80.0, False),
        (100.0, False),
    ):
        way = radians(heading)
        point = shapely.Point(600 + 900 * cos(way), 300 + 900 * sin(way))
        assert bool(area.contains(point)) == there, heading
    assert "M1 yaw" in picture.zones[at].schedule[0]


def test_the_sheet_is_in_the_set_where_light_gets_out(knocked):
    placed, review = knocked
    (composed,) = sheets_of(trace(placed), only="faults", faults=review)
    words = {p.text for p in composed.sheet.paper if isinstance(p, Text)}
    assert "ESCAPE FANS" in words
    assert "#1" in words


def test_there_is_no_sheet_where_nothing_gets_out(bench):
    body = SIDES.replace("    west:", "    north: {from: [1000, 600], to: [0, 600]}\n    west:")
    placed = bench(body + OFF, **HEAD)
    review = review_faults(placed)
    assert fans_of(review.faults) == ()
    assert sheets_of(trace(placed), only="faults", faults=review) == []
