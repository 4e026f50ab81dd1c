"""Gaps and guilty stretches of a layout on its plan."""

import math

import pytest
import shapely

from benchlay.pipeline import place, read, trace
from benchlay.sheets.drafting import plan_picture
from benchlay.sheets.plan import compose
from benchlay.sheets.primitives import Line, Polyline, Text
from benchlay.zones import zones_of

# A slot 10 wide behind a duct of 100, 200 from the beam: it is seen from 20 to either side of it.
LAYOUT = """
bench: {size: [800, 400]}
sources:
  red: {wavelength: 633, power: 50 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
elements:
  T1: {kind: target, after: red, distance: 300}
routes: {main: [red, T1]}
enclosure:
  panels:
    south: {from: [0, 0], to: [788, 0]}
    east: {from: [800, 0], to: [800, 400]}
    north:
      from: [800, 400]
      to: [0, 400]
      openings: {slot: {along: 500, width: 10, from_height: 50, to_height: 150, depth: 100}}
    west: {from: [0, 400], to: [0, 0]}
  lids:
    main: {height: 300, outline: [[0, 0], [800, 0], [800, 400], [0, 400]]}
"""
WITHOUT_CORNER = LAYOUT.replace("[788, 0]", "[800, 0]")


def picture_of(text):
    traced = trace(place(read("bench.yaml", text)))
    return plan_picture(traced, zones_of(traced))


def test_every_gap_has_its_mark_and_is_told_in_the_notes():
    picture = picture_of(LAYOUT)
    assert [(gap.name, gap.label) for gap in picture.gaps] == [
        ("G1", "G1 10 mm"),
        ("G2", "G2 12 mm"),
    ]
    slot, corner = picture.gaps
    assert sorted(slot.ends) == [(290.0, 400.0), (300.0, 400.0)]
    assert sorted(corner.ends) == [(788.0, 0.0), (800.0, 0.0)]
    (note,) = (note for note in picture.notes if note.startswith("Gaps"))
    assert "G1 north.slot (10 mm); " in note  # no place sees it, only the beam between
    assert "G2 south/east corner (12 mm), 50 mW of 633 nm from" in note


def test_the_stretch_is_where_the_duct_lets_it_be_seen():
    picture = picture_of(WITHOUT_CORNER)
    ((start, end),) = picture.mirror_stretches
    assert start == pytest.approx((270.0, 200.0), abs=1e-3)
    assert end == pytest.approx((320.0, 200.0), abs=1e-3)


def test_the_sheet_shows_them():
    picture = picture_of(WITHOUT_CORNER)._replace(zones=())  # their limits are on that layer too
    sheet = compose(picture)
    hazard = [one for one in sheet.model if one.layer == "HAZARD"]
    (zigzag,) = (one for one in hazard if isinstance(one, Polyline))
    assert {zigzag.points[0], zigzag.points[-1]} == {(290.0, 400.0), (300.0, 400.0)}
    texts = {one.text for one in sheet.paper if isinstance(one, Text)}
    assert "G1 10 mm" in texts
    strokes = [
        one for one in hazard if isinstance(one, Line) and max(one.start[1], one.end[1]) < 300
    ]
    band = shapely.box(270, 200 - sheet.scale, 320, 200 + sheet.scale)
    assert len(strokes) > 50 / (1.2 * sheet.scale) - 2
    for stroke in strokes:
        line = shapely.LineString([stroke.start, stroke.end])
        assert shapely.covers(shapely.buffer(band, 1e-3), line)
        assert math.dist(stroke.start, stroke.end) > 0


def test_a_tight_enclosure_has_no_marks():
    shut = WITHOUT_CORNER.replace("openings: {slot", "access: none}\n").split("      access")[0]
    text = shut.rstrip() + WITHOUT_CORNER[WITHOUT_CORNER.index("\n    west") :]
    picture = picture_of(text)
    assert picture.gaps == ()
    assert picture.mirror_stretches == ()
    assert not any(note.startswith("Gaps") for note in picture.notes)
