"""Tables as CSV: read back with the standard library's reader, and worked out by hand."""

import csv
import io
from collections import Counter
from pathlib import Path

import pytest

from benchlay import pipeline
from benchlay.results.tables import csv_bytes, tables
from benchlay.sheets.shop.rows import Heading, Rows

ROOT = Path(__file__).parents[2]
BENCHES = sorted((ROOT / "layouts").glob("*.yaml"))
TEXT = """
bench: {size: [900, 600], beam_height: 100, medium: vacuum,
        holes: {pitch: 25, first: [12.5, 12.5]}}
sources:
  red: {wavelength: 633, power: 8 mW, beam: {waist_radius: 0.5}, at: [100, 100], heading: 0}
elements:
  M1: {kind: mirror, after: red, distance: 300, turn: left 90, diameter: 25.4, metal: silver,
       mount: {post: [0, 0], optic_height: 25.4, height: 50}}
  M2: {kind: mirror, after: M1, distance: 200, turn: right 60, diameter: 25.4, metal: silver}
  M3: {kind: mirror, after: M2, distance: 100, turn: left 60, diameter: 25.4, metal: gold}
  BS: {kind: splitter, after: M3, distance: 50, turn: left 90, diameter: 25.4, reflectance: 50 %}
  T1: {kind: target, after: BS.reflected, distance: 50}
  W1: {kind: window, after: BS.transmitted, distance: 50, diameter: 25.4}
enclosure:
  panels:
    east: {from: [900, 0], to: [900, 600]}
    west: {from: [0, 600], to: [0, 0]}
"""


def read(data):
    rows = list(csv.DictReader(io.StringIO(data.decode("utf-8"), newline="")))
    return rows, {row.get("name", row.get("item")): row for row in rows}


@pytest.fixture(scope="module")
def made():
    placed = pipeline.place(pipeline.read("x.yaml", TEXT))
    return tables(placed)


def test_setting_out_by_hand(made):
    _, row = read(made["setting-out.csv"])
    m1 = row["M1"]
    assert [float(m1[k]) for k in ("x (mm)", "y (mm)", "height (mm)")] == [400, 100, 100]
    assert [float(m1[f"{k} from datum (mm)"]) for k in "XY"] == [387.5, 87.5]
    assert (float(m1["facing (deg)"]), float(m1["turn (deg)"])) == (135, 90)
    assert (m1["after"], float(m1["distance (mm)"])) == ("red", 300)
    # The post stands under the reference point. Holes are at 12.5 + 25 n: 387.5 and 412.5 in x
    # are as near; 87.5 and 112.5 in y likewise.
    column, line = int(m1["hole column"]), int(m1["hole row"])
    x, y = 12.5 + 25 * (column - 1), 12.5 + 25 * (line - 1)
    assert x + float(m1["hole to post x (mm)"]) == pytest.approx(400, abs=1e-6)
    assert y + float(m1["hole to post y (mm)"]) == pytest.approx(100, abs=1e-6)
    assert abs(x - 400) == abs(y - 100) == 12.5
    # 100 above the bench, the optic's centre 25.4 above the mount's lower side; 75 is to be had.
    assert float(m1["post (mm)"]) == pytest.approx(74.6)
    assert (float(m1["stock post (mm)"]), float(m1["stock raises (mm)"])) == (75, 0.4)
    assert float(row["M2"]["turn (deg)"]) == pytest.approx(-60)
    assert float(row["M2"]["y (mm)"]) == pytest.approx(300)
    assert float(row["BS"]["turn (deg)"]) == pytest.approx(90)
    assert row["W1"]["turn (deg)"] == row["red"]["distance (mm)"] == ""


def test_parts_that_are_alike_share_an_item(made):
    rows, _ = read(made["parts.csv"])
    by_names = {row["names"]: row for row in rows if row["what"] == "mirror"}
    # M3 differs from the others in its coating only.
    assert {names: row["quantity"] for names, row in by_names.items()} == {"M1, M2": "2", "M3": "1"}
    assert by_names["M1, M2"]["data"] != by_names["M3"]["data"]  # who orders them sees why
    (panel,) = (row for row in rows if row["what"] == "panel")
    assert (panel["quantity"], panel["names"]) == ("2", "east, west")
    assert [int(row["item"]) for row in rows] == list(range(1, len(rows) + 1))


@pytest.mark.parametrize("bench", BENCHES, ids=lambda b: b.stem)
def test_counts_equal_the_model(bench):
    placed = pipeline.place(pipeline.read(bench))
    base = placed.base
    rows, _ = read(tables(placed)["parts.csv"])
    counted = Counter()
    for row in rows:
        counted[row["what"]] += int(row["quantity"])
        assert len(row["names"].split(", ")) == int(row["quantity"])
    kinds = Counter(item.element.kind for item in base.elements.values())
    upright = [s.part for item in base.elements.values() for s in item.holder.upright]
    wanted = kinds + Counter({"source": len(base.sources)})
    wanted += Counter(upright)
    wanted["mount"] = sum(item.holder.box is not None for item in base.elements.values())
    enclosure = base.layout.enclosure
    wanted["panel"], wanted["lid"] = len(enclosure.panels), len(enclosure.lids)
    assert counted == +wanted
    _, row = read(tables(placed)["setting-out.csv"])
    assert set(row) == set(base.sources) | set(base.elements)


@pytest.mark.parametrize("text", ["=cmd()", "+1", "-1", "@SUM(A1)", "\t=1", "\r=1"])
def test_no_cell_is_a_formula(text):
    rows = Rows("x", "X", (Heading("name", 10.0), Heading("y", 10.0, "mm")), ((text, -0.4),))
    ((_, _), (first, second)) = csv.reader(io.StringIO(csv_bytes(rows).decode(), newline=""))
    assert first == "'" + text
    assert second == "-0.4"  # a number stays one


def test_rows_end_as_the_standard_says_and_quotes_are_doubled():
    rows = Rows("x", "X", (Heading("name", 10.0),), (('two "names", µ',),))
    assert csv_bytes(rows) == 'name\r\n"two ""names"", µ"\r\n'.encode()
