"""What the plan shows of single parts: each against sizes worked out by hand."""

import math
import textwrap

import pytest
import shapely

from benchlay.pipeline import place, read, trace
from benchlay.sheets.drafting import plan_picture
from benchlay.sheets.drafting.legs import WEAKEST
from benchlay.zones import zones_of

BENCH = """
bench: {size: [1000, 600], holes: {pitch: 25, first: [12.5, 25], thread: M6}}
sources:
  B1:
    wavelength: 633
    power: 20 mW
    beam: {waist_radius: 0.5}
    at: [100, 300]
    heading: 0
    body: {length: 60, width: 40, height: 50}
"""


def picture(text, bench=BENCH):
    traced = trace(place(read("bench.yaml", bench + textwrap.dedent(text))))
    return plan_picture(traced, zones_of(traced))


def item(text, name):
    return next(i for i in picture(text).items if i.name == name)


def corners(shape):
    return sorted((round(x, 6) + 0.0, round(y, 6) + 0.0) for x, y in shape.points)


def test_a_mirror_has_glass_coated_side_mount_foot_and_post():
    m = item(
        "elements: {M: {kind: mirror, after: B1, distance: 200, turn: left 90, diameter: 25.4,"
        " reflectance: 99 %}}",
        "M",
    )
    assert (m.at, m.facing_deg) == ((300.0, 300.0, 100.0), pytest.approx(135.0))
    (glass,) = m.outlines
    assert corners(glass) == [(-6.0, -12.7), (-6.0, 12.7), (0.0, -12.7), (0.0, 12.7)]
    assert m.coated == (((0.0, -12.7), (0.0, 12.7)),)
    box, foot, post = m.bodies  # diameter + 14 wide, thickness + 12 deep, from the front plane
    assert corners(box) == [(-18.0, -19.7), (-18.0, 19.7), (0.0, -19.7), (0.0, 19.7)]
    assert corners(foot) == [(-46.5, -25.0), (-46.5, 25.0), (28.5, -25.0), (28.5, 25.0)]
    assert post.bulges == (1.0, 1.0)
    assert math.dist(*post.points) == pytest.approx(12.7)
    assert sum(x for x, _ in post.points) / 2 == pytest.approx(-9.0)


def test_a_source_shows_its_body_behind_its_exit():
    (shape,) = item("", "B1").bodies
    assert corners(shape) == [(-60.0, -20.0), (-60.0, 20.0), (0.0, -20.0), (0.0, 20.0)]


def test_the_diagonal_of_a_cube_is_a_line_of_its_own():
    cube = item(
        "elements: {C: {kind: cube, after: B1, distance: 200, side: 20, reflectance: 50 %}}", "C"
    )
    assert cube.lines == (((-10.0, -10.0), (10.0, 10.0)),)
    assert cube.coated == ()


def test_a_plate_without_thickness_is_a_line():
    plate = item(
        "elements: {W: {kind: waveplate, after: B1, distance: 200, diameter: 20,"
        " retardance: half, axis: 45}}",
        "W",
    )
    assert plate.lines == (((0.0, -10.0), (0.0, 10.0)),)
    assert plate.outlines == ()


def test_a_tilted_disc_is_seen_at_its_slant():
    disc = item(
        "elements: {M: {kind: mirror, after: B1, distance: 200, turn: up 90, diameter: 20,"
        " thickness: 6, reflectance: 99 %, mount: none}}",
        "M",
    )
    (seen,) = disc.outlines
    x, y = zip(*seen.points, strict=True)
    # A disc of diameter 20 and thickness 6, tilted by 45 degrees: (20 + 6) / sqrt 2 deep.
    assert max(x) - min(x) == pytest.approx(26.0 / math.sqrt(2.0), rel=1e-6)
    assert max(y) - min(y) == pytest.approx(20.0, rel=1e-6)


def test_what_is_taken_out_is_not_drawn_but_named():
    drawn = picture("elements: {K: {kind: screen, at: [500, 300], facing: 180, out: yes}}")
    assert [i.name for i in drawn.items] == ["B1"]
    assert "Taken out in this state: K." in drawn.notes


def test_holes_fill_the_bench_but_not_its_edge():
    holes = picture("").holes
    assert (holes.columns, holes.rows) == (40, 23)  # to x = 987.5 and y = 575


def test_a_beam_is_tagged_where_it_starts_and_where_its_power_changes():
    drawn = picture(
        """
        elements:
          M: {kind: mirror, after: B1, distance: 200, turn: left 90, diameter: 25,
              reflectance: 99 %}
          S: {kind: splitter, after: M, distance: 100, incidence: 45, diameter: 25,
              reflectance: 30 %, back: 0 %}
          T: {kind: target, after: S.transmitted, distance: 100}
        routes: {r: [B1, M, S.transmitted, T]}
        """
    )
    # B1 is a source's name here: beams begin with B2. A mirror that takes 1 % starts no new one.
    words = [leg.words for leg in drawn.legs if leg.words and not leg.stray]
    assert words == ["B2 B1 633 nm 20 mW", "B3 13.9 mW"]
    assert {leg.name for leg in drawn.legs if not leg.stray} == {"B2", "B3"}


def test_weak_strays_bear_no_tag_and_the_weakest_are_only_counted():
    drawn = picture(
        """
        elements:
          W: {kind: window, after: B1, distance: 200, incidence: 20, diameter: 25, thickness: 5,
              front: 2.5 %, back: 0.5 %}
          T: {kind: target, after: W, distance: 100, diffuse: 0}
        routes: {r: [B1, W, T]}
        """
    )
    strays = [leg for leg in drawn.legs if leg.stray]
    assert [(leg.words, leg.weak) for leg in strays] == [("S1 from W\n0.5 mW", False), ("", True)]
    (note,) = [n for n in drawn.notes if n.startswith("Stray beams above the limit")]
    assert "limit: 1, each tagged. Below it, 1 leg from 10 %" in note
    assert WEAKEST == 0.1


def test_the_ends_of_strays_are_told_apart():
    drawn = picture(
        """
        elements:
          W: {kind: window, after: B1, distance: 200, incidence: 45, diameter: 25, thickness: 5}
          D: {kind: dump, after: W.reflected, distance: 100, opening: 40}
          T: {kind: target, after: W, distance: 100, diffuse: 0}
        routes: {r: [B1, W, T]}
        """
    )
    ends = [leg.ends for leg in drawn.legs if leg.stray and not leg.weak]
    assert ends[0] == "dump"


def test_lids_and_panels_say_how_they_open():
    drawn = picture(
        """
        enclosure:
          panels:
            s: {from: [0, 0], to: [1000, 0], access: interlocked, open: yes}
            n: {from: [1000, 600], to: [0, 600],
                openings: {port: {along: 100, height: 100, diameter: 30}}}
          lids:
            l: {height: 300, outline: [[0, 0], [1000, 0], [1000, 600], [0, 600]], access: tool}
        """
    )
    north, south = drawn.panels
    assert north.openings == (("port", 85.0, 115.0),)
    assert (south.is_open, south.access, south.thickness_mm) == (True, "interlocked", 2.0)
    (lid,) = drawn.lids
    assert (lid.height_mm, lid.access, lid.is_open) == (300.0, "tool", False)


def test_zones_are_numbered_the_largest_first_and_listed():
    drawn = picture("elements: {T: {kind: target, at: [500, 300], facing: 180}}")
    areas = [shapely.Polygon(zone.rings[0]).area for zone in drawn.zones]
    assert [zone.name for zone in drawn.zones] == ["Z1", "Z2"]
    assert areas == sorted(areas, reverse=True)
    assert drawn.zones[0].schedule == (
        "direct beam 633 nm",
        "limit 0.385 mW through Ø7 mm, 100 s",
        "52 times the limit: eyewear OD 1.8",
        f"reach 0.4 m, {areas[0] * 1e-6:.2g} m²",
        "up to 20 mW: stray light of B1 from B1",
    )


def test_wishes_that_cannot_be_met_are_told():
    drawn = picture("drawing: {sheet: A4, scale: '2:3'}")
    assert (drawn.sheet, drawn.scale) == (None, None)
    told = [note for note in drawn.notes if "was asked for" in note]
    assert len(told) == 2
    kept = picture("drawing: {sheet: A2, scale: '1:5', decimal: comma}")
    assert (kept.sheet, kept.scale, kept.decimal) == ("A2", 5, ",")
