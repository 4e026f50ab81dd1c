"""One small sheet with every primitive, written and read back."""

import subprocess
import sys
import xml.etree.ElementTree as ET
from io import BytesIO, StringIO

import ezdxf
import pyogrio
import pytest

from benchlay.sheets.primitives import (
    Across,
    Arc,
    Axis,
    Block,
    BlockUse,
    Circle,
    Dimension,
    Fill,
    Layer,
    Line,
    Polyline,
    Sheet,
    Text,
    Up,
)
from benchlay.writers import dxf, recorder, svg

SVG = "{http://www.w3.org/2000/svg}"
HOSTILE = [
    "bell\x07 nul\x00 escape\x1b",
    '<script>alert(1)</script> & "quotes" ]]> <!-- -->',
    "%%d %%c %%u %%%%p 50 %",
    r"\P {\fArial;x} \U+0041 \M+1A1 ^J ^M",
    "lone \ud800 surrogate, \ufffe, \u202etxet",
    "line one\r\n  0\nEOF\n",
    "W" * 5000,
    "",
]

LAYERS = (
    Layer("HAZARD", "hatch", "#8a1c00", 0.25),
    Layer("BEAM_632_8", "a beam", "#a00000", 0.5, (8.4, 1.2, 0.35, 1.2)),
    Layer("OPTICS", "outlines", width_mm=0.5),
    Layer("DIMENSIONS", "dimensions"),
    Layer("TAGS", "tags"),
    Layer("SHEET", "frame", width_mm=0.7),
)
MIRROR = Block(
    "M1",
    (
        Polyline("OPTICS", ((0.0, -10.0), (0.0, 10.0), (-6.0, 10.0), (-6.0, -10.0)), closed=True),
        Line("OPTICS", (1.0, -10.0), (1.0, 10.0)),
    ),
)


def sheet(model=(), paper=(), blocks=(MIRROR,), **more):
    known = {
        "name": "plan",
        "title": "A bench",
        "description": "A mirror and a beam.",
        "size_mm": (420.0, 297.0),
        "scale": 5,
        "origin_mm": (50.0, 90.0),
        "window_mm": ((48.0, 84.0), (298.0, 270.0)),
        "layers": LAYERS,
    }
    return Sheet(model=tuple(model), paper=tuple(paper), blocks=tuple(blocks), **(known | more))


EVERYTHING = sheet(
    model=(
        BlockUse("OPTICS", "M1", (600.0, 450.0), 135.0, (("TAG", "M1"), ("KIND", "mirror"))),
        Line("BEAM_632_8", (100.0, 450.0), (600.0, 450.0)),
        Arc("OPTICS", (300.0, 300.0), 50.0, 0.0, 90.0),
        Circle("OPTICS", (300.0, 300.0), 25.0),
        Polyline("HAZARD", ((0.0, 0.0), (10.0, 0.0)), closed=True, bulges=(1.0, 1.0)),
        Fill("BEAM_632_8", ((350.0, 450.0), (330.0, 456.0), (330.0, 444.0))),
        Fill("OPTICS", ((0.0, 0.0), (10.0, 0.0), (10.0, 10.0), (0.0, 10.0))),
        Dimension("DIMENSIONS", Axis.HORIZONTAL, (0.0, 0.0), (1200.5, 0.0), (0.0, -50.0)),
        Dimension("DIMENSIONS", Axis.VERTICAL, (0.0, 0.0), (5.0, 900.0), (-50.0, 0.0)),
        Dimension(
            "DIMENSIONS", Axis.ALIGNED, (0.0, 0.0), (300.0, 400.0), (0.0, 0.0), text="<> {x}"
        ),
        Text("TAGS", (610.0, 470.0), "M1 λ 45° Ø25", across=Across.CENTRE, up=Up.TOP),
    ),
    paper=(
        Polyline(
            "SHEET", ((20.0, 10.0), (410.0, 10.0), (410.0, 287.0), (20.0, 287.0)), closed=True
        ),
    ),
    properties=(("layout sha256", "ab" * 32), ("revision", "A")),
)


def read_dxf(content):
    return ezdxf.read(StringIO(content.decode("utf-8")))


def by_type(doc, name):
    return doc.modelspace().query(name)


def test_dxf_is_clean_and_in_millimetres():
    doc = read_dxf(dxf.write(EVERYTHING))
    audit = doc.audit()
    assert (audit.errors, audit.fixes) == ([], [])
    assert (doc.header["$INSUNITS"], doc.header["$MEASUREMENT"]) == (4, 1)
    assert doc.dxfversion == "AC1024"


def test_dxf_model_is_true_to_size_and_the_frame_enlarged():
    doc = read_dxf(dxf.write(EVERYTHING))
    (beam,) = by_type(doc, 'LINE[layer=="BEAM_632_8"]')
    assert beam.dxf.start.distance(beam.dxf.end) == pytest.approx(500.0)
    (frame,) = by_type(doc, 'LWPOLYLINE[layer=="SHEET"]')
    corners = list(frame.get_points("xy"))
    # 20 mm on paper is 30 mm left of the origin's 50, five times.
    assert corners[0] == (-150.0, -400.0)
    assert corners[2][0] - corners[0][0] == pytest.approx(390.0 * 5)


def test_dxf_layers_carry_width_and_pattern():
    layer = read_dxf(dxf.write(EVERYTHING)).layers.get("BEAM_632_8")
    assert layer.dxf.lineweight == 50
    pattern = layer.doc.linetypes.get(layer.dxf.linetype)
    lengths = [tag.value for tag in pattern.pattern_tags.tags if tag.code == 49]
    assert lengths == [8.4, -1.2, 0.35, -1.2]


def test_dxf_takes_every_look_from_the_layer():
    doc = read_dxf(dxf.write(EVERYTHING))
    for entity in [*doc.modelspace(), *(e for b in doc.blocks for e in b)]:
        assert not entity.dxf.hasattr("color") or entity.dxf.color == 256
        assert not entity.dxf.hasattr("linetype") or entity.dxf.linetype == "BYLAYER"
        assert not entity.dxf.hasattr("lineweight") or entity.dxf.lineweight == -1


def test_dxf_dimensions_measure_what_they_span():
    dims = by_type(read_dxf(dxf.write(EVERYTHING)), "DIMENSION")
    assert [d.get_measurement() for d in dims] == pytest.approx([1200.5, 900.0, 500.0])
    shown = [t.dxf.text for d in dims for t in d.virtual_entities() if t.dxftype() == "TEXT"]
    assert shown[:2] == ["1200,5", "900"]


def test_dxf_blocks_carry_their_data_unseen():
    doc = read_dxf(dxf.write(EVERYTHING))
    (insert,) = by_type(doc, "INSERT")
    assert insert.get_attrib_text("KIND") == "mirror"
    assert all(a.is_invisible for a in insert.attribs)
    assert (insert.dxf.rotation, insert.dxf.insert.x) == (135.0, 600.0)


def test_dxf_says_where_the_drawing_lies():
    doc = read_dxf(dxf.write(EVERYTHING))
    assert doc.header["$EXTMIN"][:2] == (-250.0, -450.0)
    assert doc.header["$EXTMAX"][:2] == (1850.0, 1035.0)
    (view,) = [v for v in doc.viewports.get("*Active")]
    assert view.dxf.height == pytest.approx(297 * 5, rel=0.05)


def test_dxf_paper_space_holds_one_viewport_to_scale():
    entities = list(read_dxf(dxf.write(EVERYTHING)).paperspace())
    ports = [e for e in entities if e.dxftype() == "VIEWPORT" and e.dxf.id != 1]
    assert len(entities) - len(ports) <= 1
    assert ports[0].get_scale() == pytest.approx(1 / 5)
    assert ports[0].dxf.layer == "VIEWPORT"


def test_dxf_lettering_is_enlarged():
    (text,) = by_type(read_dxf(dxf.write(EVERYTHING)), 'TEXT[layer=="TAGS"]')
    assert text.dxf.height == pytest.approx(12.5)


def test_dxf_keeps_the_layout_fingerprint():
    variables = read_dxf(dxf.write(EVERYTHING)).header.custom_vars
    assert variables.get("layout sha256") == "ab" * 32


def test_an_independent_reader_sees_the_same(tmp_path):
    path = tmp_path / "plan.dxf"
    path.write_bytes(dxf.write(EVERYTHING))
    frame = pyogrio.raw.read(path)
    fields = dict(zip(frame[0]["fields"], frame[3], strict=True))
    assert {"OPTICS", "BEAM_632_8", "DIMENSIONS", "SHEET"} <= set(fields["Layer"])
    assert any("1200,5" in str(text) for text in fields["Text"])


@pytest.mark.parametrize("text", HOSTILE, ids=range(len(HOSTILE)))
def test_hostile_text_stays_text(text):
    bad = sheet(
        model=(
            Text("TAGS", (0.0, 0.0), text),
            Dimension("DIMENSIONS", Axis.HORIZONTAL, (0.0, 0.0), (9.0, 0.0), (0.0, 9.0), text=text),
            BlockUse("OPTICS", "M1", (0.0, 0.0), 0.0, (("NOTE", text),)),
        ),
        title=text,
        description=text,
        properties=((text or "empty", text),),
    )
    doc = read_dxf(dxf.write(bad))
    audit = doc.audit()
    assert (audit.errors, audit.fixes) == ([], [])
    assert len(by_type(doc, "TEXT")) == len(by_type(doc, "DIMENSION")) == 1
    root = ET.fromstring(svg.write(bad))
    assert {e.tag.removeprefix(SVG) for e in root.iter()} <= {
        *("svg", "title", "desc", "defs", "style", "rect", "g", "path", "text", "circle"),
    }


def test_per_cent_signs_and_carets_are_read_back_as_written():
    for text in (r"a %%d b", "2^3", r"\U+0041"):
        doc = read_dxf(dxf.write(sheet(model=(Text("TAGS", (0.0, 0.0), text),))))
        (entity,) = by_type(doc, "TEXT")
        assert entity.plain_text().replace("\N{THIN SPACE}", "") == text


def test_svg_is_true_to_size():
    root = ET.fromstring(svg.write(EVERYTHING))
    assert (root.get("width"), root.get("height")) == ("420mm", "297mm")
    assert root.get("viewBox") == "0 0 420 297"
    beam = root.find(f".//{SVG}g[@id='BEAM_632_8']/{SVG}path")
    assert beam.get("d") == "M70 117L170 117"


def test_svg_has_a_group_a_layer_in_the_order_of_inking():
    root = ET.fromstring(svg.write(EVERYTHING))
    ids = [g.get("id") for g in root.findall(f"{SVG}g")]
    assert ids == [layer.name for layer in LAYERS]


def test_svg_speaks_to_those_who_cannot_see_it():
    root = ET.fromstring(svg.write(EVERYTHING))
    assert root.find(f"{SVG}title").text == "A bench"
    assert root.find(f"{SVG}desc").text == "A mirror and a beam."
    group = root.find(f".//{SVG}g[@data-tag='M1']")
    assert (group.get("data-kind"), group.find(f"{SVG}title").text) == ("mirror", "M1, mirror")


def test_svg_tells_the_pointer_what_a_line_is():
    drawn = sheet(model=(Line("TAGS", (0.0, 0.0), (9.0, 0.0), "B1, 5 mW <a>"),))
    (path,) = ET.fromstring(svg.write(drawn)).findall(f".//{SVG}g[@id='TAGS']/{SVG}path")
    assert path.find(f"{SVG}title").text == "B1, 5 mW <a>"


def test_svg_turns_a_block_into_its_place():
    root = ET.fromstring(svg.write(sheet(model=(BlockUse("OPTICS", "M1", (100.0, 0.0), 90.0),))))
    line = root.findall(f".//{SVG}g[@id='OPTICS']//{SVG}path")[1]
    # The coated side's mark, 1 mm before the face: above it now, 2 mm to each side.
    assert line.get("d") == "M72 206.8L68 206.8"


def test_svg_lettering_is_text_of_the_stated_height():
    root = ET.fromstring(svg.write(EVERYTHING))
    (tag,) = root.findall(f".//{SVG}g[@id='TAGS']/{SVG}text")
    assert tag.text == "M1 λ 45° Ø25"
    # Height of capitals is 0.729 of the em in the font named.
    assert float(tag.get("font-size")) * 0.729 == pytest.approx(2.5, rel=1e-3)


def test_arcs_turn_the_same_way_in_both_formats():
    quarter = sheet(model=(Arc("OPTICS", (0.0, 0.0), 50.0, 0.0, 90.0),))
    path = ET.fromstring(svg.write(quarter)).find(f".//{SVG}g[@id='OPTICS']/{SVG}path")
    assert path.get("d") == "M60 207A10 10 0 0 0 50 197"
    (arc,) = by_type(read_dxf(dxf.write(quarter)), "ARC")
    assert (arc.dxf.start_angle, arc.dxf.end_angle) == (0.0, 90.0)


def test_unknown_layer_or_block_is_an_error():
    for bad in (Line("NOWHERE", (0.0, 0.0), (1.0, 0.0)), BlockUse("OPTICS", "M2", (0.0, 0.0))):
        with pytest.raises(ValueError, match="the sheet has no"):
            recorder.record(sheet(model=(bad,)))


def test_a_layer_may_not_smuggle_anything_into_its_name():
    with pytest.raises(ValueError, match="cannot name a layer"):
        dxf.write(sheet(layers=(*LAYERS, Layer("A\n0\nEOF", "bad"))))


def test_recorder_keeps_the_order_of_inking():
    kinds = [r.primitive.layer for r in recorder.record(EVERYTHING)]
    assert kinds[0] == "HAZARD"
    assert kinds[-1] == "SHEET"


def test_same_sheet_same_bytes_whatever_the_hash_seed(tmp_path):
    code = (
        "import sys; sys.path.insert(0, sys.argv[1]); import test_formats as t, hashlib;"
        "from benchlay.writers import dxf, pdf, svg;"
        "print([hashlib.sha256(w.write(t.EVERYTHING)).hexdigest() for w in (dxf, svg, pdf)])"
    )
    folder = __file__.rpartition("/")[0]
    seen = set()
    for seed in ("1", "2"):
        run = subprocess.run(
            [sys.executable, "-c", code, folder],
            env={"PYTHONHASHSEED": seed, "TZ": f"UTC{seed}", "PATH": "", "HOME": str(tmp_path)},
            capture_output=True,
            text=True,
            check=True,
        )
        seen.add(run.stdout)
    assert len(seen) == 1


def test_ezdxf_can_read_its_bytes_as_a_binary_stream():
    assert (
        ezdxf.filemanagement.dxf_stream_info(StringIO(dxf.write(EVERYTHING).decode())).version
        == "AC1024"
    )
    assert BytesIO(svg.write(EVERYTHING)).read().startswith(b"<?xml")
