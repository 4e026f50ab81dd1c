"""Shop drawings: what they say, what they lack, and that they can be read."""

import io
import itertools
import math
import re
from pathlib import Path

import ezdxf
import pytest

from benchlay import pipeline
from benchlay.making.parts import parts_of
from benchlay.sheets.primitives import Axis, Circle, Dimension, label_of, measured
from benchlay.sheets.shop.ordinates import spread
from benchlay.sheets.shop.panel import panel_sheet
from benchlay.writers import dxf

ROOT = Path(__file__).parents[3]
BENCHES = sorted((ROOT / "layouts").glob("*.yaml"))
TEXT = """
title: Bench
bench: {size: [1500, 900]}
sources:
  red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
materials: {sheet: {thickness: 2, density: 2700 kg/m3}, other: {}}
enclosure:
  material: sheet
  panels:
    south: {from: [0, 0], to: [1500, 0], fold: {flange: 20}, fix: {hole: 6.6, pitch: 150, inset: 8},
            openings: {port: {along: 712.5, height: 100, diameter: 30}}}
    north: {from: [1500, 900], to: [0, 900], access: interlocked}
drawing: {number: N-1, date: 2026-11-30, drawn_by: wks}
"""


def sheets_of(text):
    layout = pipeline.read("x.yaml", text).as_drawn
    return {p.name: panel_sheet(p, layout, "0" * 64, "1/1") for p in parts_of(layout)}


@pytest.mark.parametrize("bench", BENCHES, ids=lambda b: b.stem)
def test_every_panel_of_every_bench_can_be_read(bench, legible):
    layout = pipeline.read(bench).as_drawn
    for part in parts_of(layout):
        legible(panel_sheet(part, layout, "0" * 64, "12/15"))


def test_lines_of_running_dimensions_stand_where_their_figures_say():
    sheet = sheets_of(TEXT)["south"]
    row = [p for p in sheet.model if isinstance(p, Dimension) and p.running]
    assert len(row) >= 10
    for one in row:
        place = one.second[0] if one.axis is Axis.HORIZONTAL else one.second[1]
        assert one.first[0] == 0.0 or one.axis is Axis.VERTICAL
        assert float(label_of(one, ".")) == pytest.approx(place, abs=0.005001)
    # The port's centre is at its distance along the panel; the blank starts at the panel's start.
    assert 712.5 in {one.second[0] for one in row if one.axis is Axis.HORIZONTAL}
    # Each is a true dimension to who reads the file, with its figure beyond its line: below.
    found = list(ezdxf.read(io.StringIO(dxf.write(sheet).decode())).modelspace().query("DIMENSION"))
    measures = sorted(d.get_measurement() for d in found)
    assert measures == pytest.approx(sorted(measured(p) for p in dimensions(sheet)), abs=1e-6)
    below = [d for d in found if d.dxf.defpoint3[1] == 0.0 and d.dxf.defpoint[1] < 0.0]
    assert below
    assert all(d.dxf.text_midpoint[1] < d.dxf.defpoint[1] for d in below)


def dimensions(sheet):
    return [p for p in sheet.model if isinstance(p, Dimension)]


def test_the_same_contours_as_the_cutting_file_and_true_dimensions():
    sheet = sheets_of(TEXT)["south"]
    doc = ezdxf.read(io.StringIO(dxf.write(sheet).decode()))
    assert not doc.audit().errors
    circles = {
        (round(c.dxf.center.x, 6), round(c.dxf.center.y, 6))
        for c in doc.modelspace().query("CIRCLE[layer=='PANELS']")
    }
    drawn = {
        tuple(round(v, 6) for v in p.centre)
        for p in sheet.model
        if isinstance(p, Circle) and p.layer == "PANELS"
    }
    assert circles == drawn
    assert len(circles) == 1 + 10
    # The whole blank: 1500 long; 300 high and a flange of 20, less what the bend saves.
    found = doc.modelspace().query("DIMENSION")
    said = sorted(d.get_measurement() for d in found if max(d.dxf.defpoint2) > 0.0)
    assert said == pytest.approx([300 + 20 - 8 + math.pi / 2 * 2.66, 1500], abs=1e-6)


def test_what_a_shop_is_told(words_of):
    said = " ".join(words_of(sheets_of(TEXT)["south"]))
    assert "NOT FOR MANUFACTURE" not in said
    for words in (
        "Material sheet, t = 2. Quantity 1.",
        "Formed 1500 x 300",
        "K 0.33",
        "ISO 2768-m; hole positions ±0.2",
        "Deburr",
        "DOWN 90° R2",
        "port Ø30",
        "Cut from cut-south.dxf",
    ):
        assert words in said
    mass = float(re.search(r"Mass ([0-9.]+) kg", said)[1])
    assert mass == pytest.approx(1.5 * 0.3162 * 0.002 * 2700, abs=0.06)


@pytest.mark.parametrize(
    ("old", "new", "missing"),
    [
        ("number: N-1, ", "", "drawing number"),
        ("date: 2026-11-30, ", "", "date"),
        (", drawn_by: wks", "", "drawn by"),
        ("  material: sheet\n", "", "material; thickness"),
        ("  material: sheet\n", "  material: other\n", "thickness"),
        ("{flange: 20}", "{flange: 5}", "a flange of at least 8 (it is 5, drawn unfolded)"),
    ],
)
def test_what_is_missing_is_named_on_the_sheet(words_of, old, new, missing):
    said = words_of(sheets_of(TEXT.replace(old, new))["south"])
    assert "NOT FOR MANUFACTURE" in said
    assert f"Missing: {missing}." in said


def test_a_mass_without_density_is_not_computed(words_of):
    said = " ".join(words_of(sheets_of(TEXT.replace(", density: 2700 kg/m3", ""))["south"]))
    assert "Mass not computed: no density is stated for sheet." in said


def test_switches_are_named(words_of):
    assert "Interlock switch and actuator on north" in " ".join(words_of(sheets_of(TEXT)["north"]))


def test_figures_are_led_apart_and_keep_their_order():
    places = [0.0, 1.0, 2.0, 2.5, 30.0, 31.0, 100.0]
    led = spread(places, 4.0)
    assert all(b - a >= 4.0 - 1e-12 for a, b in itertools.pairwise(led))
    assert led[-1] == 100.0
    assert sum(led[:4]) == pytest.approx(sum(places[:4]))


def test_rectangular_openings_are_named_with_their_size(words_of):
    text = TEXT.replace(
        "diameter: 30}}}",
        "diameter: 30}, view: {along: 300, from_height: 100, to_height: 200, width: 200},"
        " slit: {along: 1200, from_height: 100, to_height: 104, width: 3}}}",
    )
    said = words_of(sheets_of(text)["south"])
    assert {"view 200 x 100", "slit 3 x 4"} <= set(said)


def test_a_sheet_without_fixing_holes_says_so(words_of):
    made = sheets_of(TEXT)
    said = {name: " ".join(words_of(made[name])) for name in ("north", "south")}
    assert "No fixing holes" in said["north"]
    assert "No fixing holes" not in said["south"]
