"""Cutting files, read back by two readers that did not write them."""

import io
import math
import os
import subprocess
import sys
from pathlib import Path

import ezdxf
import pyogrio
import pytest
import shapely
from ezdxf import path as ezpath

from benchlay import pipeline
from benchlay.making.parts import parts_of
from benchlay.sheets.shop.cutting import LAYERS, cut_sheet
from benchlay.writers import dxf

ROOT = Path(__file__).parents[3]
BENCHES = sorted((ROOT / "layouts").glob("*.yaml"))
EVERY = """
bench: {size: [1500, 900]}
sources:
  red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
materials: {sheet: {thickness: 2, density: 2700 kg/m3}}
enclosure:
  material: sheet
  panels:
    south:
      from: [0, 0]
      to: [1500, 0]
      ends: {start: butt, end: folded}
      fix: {hole: 6.6, pitch: 150, inset: 8}
      fold: {flange: 20, sense: in, radius: 2}
      openings:
        port: {along: 700, height: 100, diameter: 30}
        port2: {along: 800, height: 100, diameter: 12.345678}
        cable: {along: 300, width: 41, from_height: 0, to_height: 25}
        view: {along: 1000, width: 150, from_height: 150, to_height: 230}
    east: {from: [1500, 0], to: [1500, 900], fold: {flange: 20, sense: out}}
    north: {from: [1500, 900], to: [0, 900]}
  lids:
    main: {height: 300, outline: [[0, 0], [1500, 0], [1500, 900], [400.5, 900], [0, 400]]}
"""


def every_part():
    layout = pipeline.read("x.yaml", EVERY).as_drawn
    yield from parts_of(layout)
    for bench in BENCHES:
        yield from parts_of(pipeline.read(bench).as_drawn)


PARTS = list(every_part())


@pytest.mark.parametrize("part", PARTS, ids=lambda p: p.name)
def test_closed_loops_that_neither_cross_nor_repeat(part):
    doc = ezdxf.read(io.StringIO(dxf.write(cut_sheet(part)).decode()))
    audit = doc.audit()
    assert not audit.errors
    assert not audit.fixes
    assert doc.header["$INSUNITS"] == 4  # mm
    assert {layer.dxf.name for layer in doc.layers} - {"0", "Defpoints"} == {
        layer.name for layer in LAYERS
    }
    assert not [e for e in doc.layout("Layout1") if e.dxftype() != "VIEWPORT"]
    rings, circles = {"CUT_OUTER": [], "CUT_INNER": [], "DRILL": []}, []
    for entity in doc.modelspace():
        layer = entity.dxf.layer
        if layer.startswith("BEND"):
            assert entity.dxftype() == "LINE"
            continue
        points = list(ezpath.make_path(entity).flattening(1e-5))
        rings[layer].append(shapely.LinearRing([(p.x, p.y) for p in points]))
        if entity.dxftype() == "CIRCLE":
            circles.append(entity.dxf.radius)
        else:
            assert (entity.dxftype(), entity.closed) == ("LWPOLYLINE", True)
    (outer,) = rings["CUT_OUTER"]
    assert outer.is_simple
    inner = [*rings["CUT_INNER"], *rings["DRILL"]]
    for n, ring in enumerate(inner):
        assert ring.is_simple
        assert shapely.Polygon(outer).contains_properly(ring)
        assert not any(shapely.Polygon(ring).intersects(other) for other in inner[n + 1 :])
    # Lower left in the origin, extents those of the blank.
    low, high = doc.header["$EXTMIN"], doc.header["$EXTMAX"]
    assert outer.bounds == pytest.approx((0.0, 0.0, *part.blank.flat_mm), abs=1e-6)
    assert (*low[:2], *high[:2]) == pytest.approx(outer.bounds, abs=1e-6)
    # Area: loops of straight pieces by shapely, circles by their radii as read back.
    loops = [r for r in rings["CUT_INNER"] if len(r.coords) < 30]
    area = shapely.Polygon(outer).area - sum(shapely.Polygon(r).area for r in loops)
    area -= sum(math.pi * r * r for r in circles)
    assert area == pytest.approx(part.blank.area_mm2, rel=1e-8)


def test_a_second_reader_finds_layers_extents_and_holes(tmp_path):
    part = next(p for p in PARTS if p.name == "south")
    (tmp_path / "cut.dxf").write_bytes(dxf.write(cut_sheet(part)))
    _, _, shapes, (layers, *_) = pyogrio.raw.read(tmp_path / "cut.dxf", columns=["Layer"])
    shapes = shapely.from_wkb(shapes)
    found = sorted(zip(layers, shapes, strict=True), key=lambda pair: pair[0])
    assert {layer for layer, _ in found} == {"CUT_OUTER", "CUT_INNER", "DRILL", "BEND_DOWN"}
    assert shapely.total_bounds(shapes) == pytest.approx((0, 0, *part.blank.flat_mm), abs=1e-6)
    drilled = sorted(
        tuple((shape.bounds[k] + shape.bounds[k + 2]) / 2 for k in (0, 1))
        for layer, shape in found
        if layer == "DRILL"
    )
    assert len(drilled) == len(part.blank.holes) == 12
    assert drilled == [pytest.approx(h.centre, abs=1e-6) for h in part.blank.holes]
    (outer,) = (shape for layer, shape in found if layer == "CUT_OUTER")
    assert shapely.get_coordinates(outer)[0] == pytest.approx(shapely.get_coordinates(outer)[-1])


WRITE = """
import hashlib, sys
from benchlay import pipeline
files = pipeline.draw_files(open(sys.argv[1], "rb").read(), "x.yaml", sheet="cut", form=None)
print([(name, hashlib.sha256(data).hexdigest()) for name, data in sorted(files.items())])
"""


def test_the_same_bytes_whatever_the_hash_seed(tmp_path):
    (tmp_path / "x.yaml").write_text(EVERY)
    said = [
        subprocess.run(
            [sys.executable, "-c", WRITE, str(tmp_path / "x.yaml")],
            env={**os.environ, "PYTHONHASHSEED": seed, "PYTHONPATH": str(ROOT)},
            capture_output=True,
            text=True,
            check=True,
        ).stdout
        for seed in ("1", "2", "3")
    ]
    assert said[0] == said[1] == said[2]
    names = [f"cut-{n}.dxf" for n in ("east", "lid-main", "north", "south")]
    assert all(name in said[0] for name in names)
    assert ".svg" not in said[0]


def test_what_is_incomplete_is_not_cut():
    text = EVERY.replace("ends: {start: butt, end: folded}", "ends: {end: folded}").replace(
        "{flange: 20, sense: in, radius: 2}", "{flange: 7}"
    )
    files = pipeline.draw_files(text.encode(), "x.yaml", sheet="cut", form=None)
    assert "cut-south.dxf" not in files
    assert "cut-north.dxf" in files
