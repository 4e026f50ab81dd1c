"""Plans drawn from layouts, read back by a reader of DXF that knows nothing of benchlay."""

import re
from pathlib import Path

import numpy as np
import pyogrio
import pytest
import shapely

from benchlay.pipeline import place, read, trace
from benchlay.sheets import Planned, UnknownSheetError, composed_sheets, sheets_of
from benchlay.sheets.drafting import plan_picture
from benchlay.tracing.front import OUTSIDE
from benchlay.writers import dxf, svg
from benchlay.zones import limits_of, zones_of

LAYOUTS = Path(__file__).parents[3] / "layouts"
NAMES = ("hologram", "bad")


class Drawn:
    def __init__(self, name):
        self.trace = trace(place(read(LAYOUTS / f"{name}.yaml")))
        self.zones = zones_of(self.trace, states=["as drawn"])
        self.picture = plan_picture(self.trace, self.zones)
        self.sheet, *self.further = (
            one.sheet for one in sheets_of(self.trace, self.zones, only="plan")
        )


@pytest.fixture(scope="module", params=NAMES)
def drawn(request):
    return Drawn(request.param)


@pytest.fixture
def entities(drawn, tmp_path):
    """Layer, kind, words and geometry of every entity inside the view, as GDAL reads it."""
    file = tmp_path / "plan.dxf"
    file.write_bytes(dxf.write(drawn.sheet))
    options = {"DXF_ENCODING": "UTF-8", "DXF_INLINE_BLOCKS": "FALSE"}
    pyogrio.set_gdal_config_options(options)
    try:
        meta, _, shapes, fields = pyogrio.raw.read(file, layer="entities")
    finally:
        pyogrio.set_gdal_config_options(dict.fromkeys(options))
    columns = dict(zip(meta["fields"], fields, strict=True))
    return [
        {"layer": layer, "kind": kind, "block": block, "shape": shapely.from_wkb(shape)}
        for layer, kind, block, shape in zip(
            columns["Layer"], columns["SubClasses"], columns["BlockName"], shapes, strict=True
        )
    ]


def view_of(drawn):
    """What the sheet shows of the bench, a hair more."""
    (x0, y0), (x1, y1) = drawn.sheet.window_mm
    (ox, oy), n = drawn.sheet.origin_mm, drawn.sheet.scale
    view = shapely.box((x0 - ox) * n, (y0 - oy) * n, (x1 - ox) * n, (y1 - oy) * n)
    return shapely.buffer(view, 1e-3)


def on_bench(drawn, entities, layer):
    """Entities of a layer within the view: samples in the legend lie outside it."""
    view = view_of(drawn)
    return [e for e in entities if e["layer"] == layer and shapely.covers(view, e["shape"])]


def test_every_element_is_a_block_that_stands_where_it_was_placed(drawn, entities):
    state = drawn.trace.placed.base
    placed = {**state.sources, **{k: v for k, v in state.elements.items() if not v.out}}
    blocks = {e["block"]: e["shape"] for e in entities if e["block"]}
    assert set(blocks) == {f"E-{name}" for name in placed if state_has_outline(placed[name])}
    for name, item in placed.items():
        if f"E-{name}" in blocks:
            point = blocks[f"E-{name}"]
            assert (point.x, point.y) == pytest.approx(item.pose.at[:2], abs=1e-6)


def state_has_outline(item):
    return hasattr(item, "geometry") or item.source.body is not None


def test_every_working_leg_is_one_line_true_to_size(drawn, entities):
    s, b = drawn.trace.beams.start, drawn.trace.beams
    rows = np.flatnonzero((s.variant == 0) & (s.node >= 0) & (b.length > 1e-6))
    for wave, nm in enumerate(drawn.trace.scene.wavelengths_nm.tolist()):
        layer = "BEAM_" + re.sub(r"\.", "_", f"{nm:g}")
        lines = [
            e["shape"] for e in on_bench(drawn, entities, layer) if e["kind"].endswith("AcDbLine")
        ]
        own = rows[s.wave[rows] == wave]
        assert len(lines) == len(own)
        ends = {tuple(np.round(shapely.get_coordinates(line).ravel(), 5)) for line in lines}
        for beam in own:
            end = shapely.Point(b.end[beam, :2])
            if shapely.covers(view_of(drawn), end):  # longer ones end at the sheet's edge
                wanted = np.round([*s.position[beam, :2], *b.end[beam, :2]], 5)
                assert any(np.allclose(wanted, e, atol=2e-5) for e in ends)


def test_every_panel_is_drawn_with_gaps_for_its_openings(drawn, entities):
    panels = drawn.trace.placed.base.layout.enclosure.panels
    pieces = [e for e in on_bench(drawn, entities, "PANELS") if "Polyline" in e["kind"]]
    expected = sum(2 if p.open else 1 + len(p.openings) for p in panels.values())
    assert len(pieces) == expected


def test_no_beam_has_the_name_of_an_element(drawn):
    names = {item.name.upper() for item in drawn.picture.items}
    assert names.isdisjoint(leg.name for leg in drawn.picture.legs)


def test_only_strays_above_the_limit_bear_tags(drawn):
    s = drawn.trace.beams.start
    limit = limits_of(drawn.trace).accessible_w[0]
    rows = np.flatnonzero((s.variant == 0) & (s.within == OUTSIDE))
    for leg in drawn.picture.legs:
        if leg.stray and not leg.weak:
            here = np.abs(s.position[rows] - leg.start).max(axis=1) < 1e-6
            assert s.power[rows[here]].max() > np.nanmin(limit)
        if leg.weak:
            assert not leg.words


def test_strays_above_the_limit_are_all_drawn(drawn):
    s = drawn.trace.beams.start
    rows = np.flatnonzero((s.variant == 0) & (s.node < 0) & (s.within == OUTSIDE))
    strong = [leg for leg in drawn.picture.legs if leg.stray and not leg.weak]
    limits = limits_of(drawn.trace)
    # At most this many: some are too wide for the aperture to take it all.
    assert 0 < len(strong) <= int((s.power[rows] > limits.of(drawn.trace, rows)[0]).sum())


def test_the_notes_say_what_is_assumed_and_who_decides(drawn):
    notes = " ".join(drawn.picture.notes)
    assert "the laser safety officer decide" in notes
    assert "to the first opaque thing" in notes
    assert "of the limit" in notes
    assert not re.search(r"\bsafe\b|[Cc]lass 1\b", notes)


def test_no_note_is_lost_on_the_demo_sheets(drawn):
    words = [p.text for p in drawn.sheet.paper if hasattr(p, "text")]
    cut = [w for w in words if w.startswith("... and")]
    assert all(w.endswith("see sheet plan-2") for w in cut)
    # What is cut here stands in full there: every table that says so has its heading there.
    there = {p.text for one in drawn.further for p in one.paper if hasattr(p, "text")}
    promised = [w for w in words if w.startswith("In full on sheet plan-2: ")]
    assert bool(cut) == bool(drawn.further)
    for note in promised:
        heads = note.rstrip(".").partition(": ")[2].split(", ")
        assert {head.upper() for head in heads} <= {words.upper() for words in there}
    assert "see the report" not in " ".join(words)


def test_sheets_come_out_byte_by_byte_alike(drawn):
    again = sheets_of(drawn.trace, drawn.zones, only="plan")[0].sheet
    assert svg.write(again) == svg.write(drawn.sheet)
    assert dxf.write(again) == dxf.write(drawn.sheet)


def test_what_there_is_no_sheet_of_is_refused(drawn):
    with pytest.raises(UnknownSheetError, match="no sheet 'attic'"):
        sheets_of(drawn.trace, drawn.zones, only="attic")


def test_sheets_are_numbered_in_the_order_of_the_set_and_cutting_files_are_not(monkeypatch):
    def shown(name, numbered=True):
        return Planned(name, lambda number: (name, number), numbered)

    kinds = {
        "plan": lambda _: [shown("plan")],
        "cut": lambda _: [shown("cut-east", numbered=False), shown("cut-west", numbered=False)],
        "panel": lambda _: [shown("panel-east"), shown("panel-west")],
        "room": lambda _: [],
    }
    monkeypatch.setattr("benchlay.sheets.SHEETS", kinds)
    of = lambda only: [one.sheet for one in composed_sheets(None, only)]  # noqa: E731
    assert of(None) == [
        ("plan", "1/3"),
        ("cut-east", ""),
        ("cut-west", ""),
        ("panel-east", "2/3"),
        ("panel-west", "3/3"),
    ]
    assert of("panel") == [("panel-east", "2/3"), ("panel-west", "3/3")]
    assert of("panel-west") == [("panel-west", "3/3")]
    assert of("room") == []
    with pytest.raises(UnknownSheetError, match="panel-east"):
        of("panel-north")


def test_beams_say_what_they_are_to_the_pointer(drawn):
    text = svg.write(drawn.sheet).decode("utf-8")
    beams = [p for p in drawn.sheet.model if p.layer.startswith("BEAM_") and hasattr(p, "start")]
    assert beams
    assert all("1/e² radius" in p.note or "scattered" in p.note for p in beams)
    assert f"<title>{beams[0].note}</title>" in text


def test_the_holes_ringed_are_holes_of_the_grid(drawn):
    holes = drawn.trace.placed.base.layout.bench.holes
    rings = [p.centre for p in drawn.sheet.model if p.layer == "HOLES" and hasattr(p, "centre")]
    assert rings
    for x, y in rings:
        for value, first in zip((x, y), holes.first_mm, strict=True):
            steps = (value - first) / holes.pitch_mm
            assert steps == pytest.approx(round(steps), abs=1e-9)
