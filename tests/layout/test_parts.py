"""The smaller parts of a layout: bench, materials, limits, room, accept, tolerances, drawing."""

from math import radians

import pytest

from benchlay.document.quantity import Dimension
from benchlay.geometry.polygon import signed_area
from benchlay.layout.materials import BODY, SHEET

BENCH = "bench: {size: [1500, 900]}\n"


def test_bench_defaults(layout_of):
    bench = layout_of(BENCH).bench
    assert bench.outline == ((0.0, 0.0), (1500.0, 0.0), (1500.0, 900.0), (0.0, 900.0))
    assert (bench.surface_height_mm, bench.beam_height_mm) == (900.0, 100.0)
    assert (bench.holes, bench.medium) == (None, "air")


def test_bench_outline_runs_anticlockwise_whichever_way_it_is_written(layout_of):
    for corners in ("[[0, 0], [9, 0], [0, 9]]", "[[0, 9], [9, 0], [0, 0]]"):
        outline = layout_of(f"bench: {{outline: {corners}}}\n").bench.outline
        assert signed_area(outline) == 40.5


def test_bench_holes_and_medium(layout_of):
    text = "bench: {size: [9, 9], holes: {pitch: 1 in, first: [1, 2]}, medium: {index: 1.33}}\n"
    bench = layout_of(text).bench
    assert (bench.holes.pitch_mm, bench.holes.first_mm, bench.holes.thread) == (
        25.4,
        (1.0, 2.0),
        "M6",
    )
    assert bench.medium.index == 1.33


def test_materials(layout_of):
    text = BENCH + (
        "materials: {m: {thickness: 3, withstands: {irradiance: 20 "
        "W/cm2, for: 100 s}}, full: {diffuse: 0.9, specular: 0.1}}\n"
    )
    found = layout_of(text).materials["m"]
    assert (found.thickness_mm, found.diffuse, found.specular) == (3.0, 0.1, 0.05)
    assert (found.withstands.irradiance_w_m2, found.withstands.for_s) == (2e5, 100.0)


def test_built_in_materials():
    assert (SHEET.thickness_mm, SHEET.diffuse, SHEET.specular, SHEET.withstands) == (
        2.0,
        0.1,
        0.05,
        None,
    )
    assert (BODY.diffuse, BODY.specular) == (0.1, 0.0)


def test_limits_defaults(layout_of):
    limits = layout_of(BENCH).limits
    assert limits.time_base_s is None
    assert (limits.eyes.seated_mm, limits.eyes.standing_mm) == ((1070.0, 1380.0), (1370.0, 1980.0))
    assert (limits.clip, limits.off_height_mm, limits.off_centre_mm) == (0.01, 0.5, 0.5)
    assert (limits.clearance_mm, limits.reach_mm, limits.floor) == (3.0, 20_000.0, 0.01)
    assert (limits.driver.diameter_mm, limits.driver.length_mm) == (25.0, 100.0)
    assert limits.back_reflection_w is None
    assert limits.overridden == ()


def test_limits_say_what_they_override(layout_of):
    limits = layout_of(BENCH + "limits: {reach: 5 m, back_reflection: 1 uW}\n").limits
    assert (limits.reach_mm, limits.back_reflection_w) == (5000.0, 1e-6)
    assert limits.overridden == ("reach", "back_reflection")


def test_room(layout_of):
    text = BENCH + (
        "room:\n"
        "  outline: [[0, 0], [0, 9], [9, 9]]\n"
        "  doors: {d: {from: [0, 0], to: [0, 1]}}\n"
        "  windows: {w: {from: [0, 2], to: [0, 3]}}\n"
        "  people: {p: {at: [1, 1]}}\n"
    )
    room = layout_of(text).room
    assert (room.height_mm, room.doors["d"].height_mm) == (2700.0, 2000.0)
    assert (room.windows["w"].from_height_mm, room.people["p"].eyes) == (900.0, "standing")


def test_accept(layout_of, laser):
    text = laser + (
        "accept: [{finding: escape/W1/g7f3, reason: "
        "known, by: LSO, until: 2027-06-30, at_most: 2 mW,"
        " bound: {green: {at: [450, 450, 100], within: 0.5}}}]\n"
    )
    (entry,) = layout_of(text).accept
    assert (entry.finding, entry.reason, entry.by, entry.until) == (
        "escape/W1/g7f3",
        "known",
        "LSO",
        "2027-06-30",
    )
    assert entry.at_most == (0.002, Dimension.POWER, "2 mW")
    assert entry.bound["green"].at_mm == (450.0, 450.0, 100.0)


@pytest.mark.parametrize(
    ("text", "value", "dimension"),
    [
        ("3", 3.0, None),
        ("3.", 3.0, None),
        ("2 W/cm2", 2e4, Dimension.IRRADIANCE),
        ("1 mm", 1.0, Dimension.LENGTH),
        ("5 %", 0.05, Dimension.RATIO),
    ],
)
def test_amounts_take_their_dimension_from_the_unit(layout_of, text, value, dimension):
    entry = f"accept: [{{finding: x, reason: y, by: z, until: 2027-06-30, at_most: {text}}}]\n"
    assert layout_of(BENCH + entry).accept[0].at_most == (pytest.approx(value), dimension, text)


def test_tolerances(layout_of, laser):
    text = laser + (
        "tolerances: {mirror: {yaw: 0.5 mrad, spread: uniform}, thickness: 0.1, wedge: 1 arcmin}\n"
    )
    layout = layout_of(text)
    assert layout.tolerances.by_name["mirror"].yaw_rad == 0.5e-3
    assert layout.tolerances.thickness_mm == 0.1
    assert layout.tolerances.wedge_rad == pytest.approx(radians(1 / 60))
    assert [text for _, text in layout.not_yet] == [
        "tolerances: not yet: tolerances are sampled by a later version"
    ]


def test_drawing_and_revisions(layout_of):
    text = BENCH + (
        "drawing: {owner: workshop, scale: 1:5, sheet: A3, notes: [a, "
        "b]}\nrevisions: [{rev: A, date: 2026-01-31, what: first, by: BD}]\n"
    )
    layout = layout_of(text)
    assert (layout.drawing.scale, layout.drawing.sheet, layout.drawing.notes) == (
        "1:5",
        "A3",
        ("a", "b"),
    )
    assert layout.revisions[0].what == "first"


def test_withstands_of_an_element(layout_of, laser):
    text = laser + (
        "elements:\n  D: {kind: dump, after: green, distance: "
        "9, withstands: {fluence: 2 J/cm2, at: 10 ns}}\n"
    )
    rating = layout_of(text).elements["D"].withstands
    assert (rating.fluence_j_m2, rating.at_s) == (2e4, 1e-8)
