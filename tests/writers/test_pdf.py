"""PDF, read back by two programs that did not write it, and held against the other formats."""

import re
import sys
import xml.etree.ElementTree as ET
from io import BytesIO, StringIO
from pathlib import Path

import ezdxf
import numpy as np
import pypdf
import pypdfium2
import pytest
import resvg_py
from fontTools.ttLib import TTFont
from PIL import Image

sys.path.insert(0, str(Path(__file__).parent))
sys.path.insert(0, str(Path(__file__).parents[1] / "sheets"))
import trial_bench
from test_formats import EVERYTHING, HOSTILE, LAYERS, sheet

from benchlay.sheets import font
from benchlay.sheets.lettering import plain
from benchlay.sheets.plan import compose
from benchlay.sheets.primitives import (
    Arc,
    BlockUse,
    Circle,
    Dimension,
    Line,
    Polyline,
    Space,
    Text,
    to_paper,
)
from benchlay.writers import dxf, pdf, recorder, svg

FONT_FILE = Path(font.__file__).parent / "fonts" / font.FILE
PLAN = compose(trial_bench.picture())
SVG = "{http://www.w3.org/2000/svg}"
MM = 72.0 / 25.4


def reader(content):
    return pypdf.PdfReader(BytesIO(content), strict=True)


def streams(content):
    (page,) = reader(content).pages
    return page.get_contents().get_data().decode("ascii")


def by_layer(content):
    """The operators of each layer, a line each."""
    found = re.findall(r"^/OC /L-(\S+) BDC\nq\n.*?\n(.*?)\nQ\nEMC$", streams(content), re.M | re.S)
    return {name: ink.split("\n") for name, ink in found}


@pytest.mark.parametrize("size", [(210.0, 297.0), (420.0, 297.0), (841.0, 594.0)])
def test_the_page_is_exactly_as_large_as_the_sheet(size):
    content = pdf.write(sheet(size_mm=size))
    (page,) = reader(content).pages
    assert [float(v) / MM for v in page.mediabox[2:]] == pytest.approx(size, abs=1e-6)
    drawn = pypdfium2.PdfDocument(content)[0].get_size()
    assert [v / MM for v in drawn] == pytest.approx(size, abs=1e-4)  # single precision there


def test_a_viewer_is_told_not_to_shrink_the_page():
    root = reader(pdf.write(EVERYTHING)).trailer["/Root"]
    assert root["/ViewerPreferences"]["/PrintScaling"] == "/None"


def test_text_can_be_searched():
    content = pdf.write(PLAN)
    wanted = {p.text for p in (*PLAN.paper, *PLAN.model) if isinstance(p, Text)}
    page = pypdfium2.PdfDocument(content)[0].get_textpage()
    for words in wanted:
        assert page.search(words).get_next() is not None, words
    words = reader(content).pages[0].extract_text()
    assert "Varnish fluorescence bench" in words
    assert "MPE 10 W/m², to walls" in words


def test_a_tag_stands_where_it_was_put():
    at = sheet(model=(Text("TAGS", (610.0, 470.0), "H", 2.5, rotation_deg=90.0),))
    page = pypdfium2.PdfDocument(pdf.write(at))[0].get_textpage()
    left, low, right, high = (v / MM for v in page.get_charbox(0))
    x, y = to_paper(at, (610.0, 470.0))
    # Upright to the right: the letter's foot is at x and its height runs to the left.
    assert right == pytest.approx(x, abs=0.02)
    assert right - left == pytest.approx(2.5, abs=0.06)  # of the whole point
    assert y <= low <= high <= y + 3.0


def test_layers_are_those_of_the_sheet():
    root = reader(pdf.write(EVERYTHING)).trailer["/Root"]
    groups = [group.get_object()["/Name"] for group in root["/OCProperties"]["/OCGs"]]
    assert groups == [layer.name for layer in LAYERS]
    order = [group.get_object()["/Name"] for group in root["/OCProperties"]["/D"]["/Order"]]
    assert order == groups
    assert set(by_layer(pdf.write(EVERYTHING))) <= set(groups)


def test_the_only_font_is_embedded_in_part():
    (page,) = reader(pdf.write(PLAN)).pages
    (face,) = page["/Resources"]["/Font"].values()
    face = face.get_object()["/DescendantFonts"][0].get_object()
    program = face["/FontDescriptor"]["/FontFile2"].get_object().get_data()
    embedded, whole = TTFont(BytesIO(program), checkChecksums=2), TTFont(FONT_FILE)
    drawn = [
        n for n, g in enumerate(embedded.getGlyphOrder()) if embedded["glyf"][g].numberOfContours
    ]
    assert 40 < len(drawn) < 150
    assert len(program) < FONT_FILE.stat().st_size / 4
    order = whole.getGlyphOrder()
    for n, name in enumerate(embedded.getGlyphOrder()):
        if n in drawn:
            shape = embedded["glyf"][name].getCoordinates(embedded["glyf"])[0]
            assert shape == whole["glyf"][order[n]].getCoordinates(whole["glyf"])[0]


def test_neither_the_hour_nor_a_library_s_version_is_in_the_file():
    content = pdf.write(EVERYTHING)
    known = reader(content).metadata
    assert known["/Producer"] == "benchlay"
    assert not {"/CreationDate", "/ModDate", "/Creator"} & set(known)
    assert "/Metadata" not in reader(content).trailer["/Root"]
    assert not re.search(rb"pikepdf|qpdf|fontTools", content, re.I)


def test_a_file_is_known_by_what_is_in_it():
    def identity(content):
        return [bytes(part.original_bytes) for part in reader(content).trailer["/ID"]]

    first = identity(pdf.write(EVERYTHING))
    assert first == identity(pdf.write(EVERYTHING))
    assert first != identity(pdf.write(EVERYTHING._replace(title="Another bench")))


@pytest.mark.parametrize("text", [*HOSTILE, "世界", "a世b"], ids=range(len(HOSTILE) + 2))
def test_hostile_text_stays_text(text):
    bad = sheet(
        model=(Text("TAGS", (0.0, 0.0), text),),
        title=text,
        description=text,
        properties=((text or "empty", text),),
    )
    content = pdf.write(bad)
    assert len(reader(content).pages) == 1
    assert re.fullmatch(rb"%PDF-1\.7\n.*%%EOF\n", content, re.S)
    pypdfium2.PdfDocument(content)[0].render(scale=0.2)


def test_a_letter_that_the_font_lacks_is_a_box_that_copies_as_the_letter():
    ink = by_layer(pdf.write(sheet(model=(Text("TAGS", (0.0, 0.0), "a世b"),))))["TAGS"]
    assert "/actualtext <feff4e16>" in ink[0].lower()
    assert "<0000> Tj" in ink[0]


def test_several_sheets_are_pages_with_bookmarks():
    small = sheet(size_mm=(210.0, 297.0), name="drilling", title="Holes (M6)")
    book = reader(pdf.write_set([EVERYTHING, small]))
    sizes = [[float(v) / MM for v in page.mediabox[2:]] for page in book.pages]
    assert sizes == [pytest.approx((420.0, 297.0)), pytest.approx((210.0, 297.0))]
    assert [mark.title for mark in book.outline] == ["plan: A bench", "drilling: Holes (M6)"]
    assert [book.get_destination_page_number(mark) for mark in book.outline] == [0, 1]


def test_the_file_says_what_it_was_drawn_from():
    known = reader(pdf.write(EVERYTHING)).metadata
    assert (known["/Title"], known["/layout sha256"]) == ("A bench", "ab" * 32)


def test_nothing_is_no_file():
    with pytest.raises(ValueError, match="no pages"):
        pdf.write_set([])


# ------------------------------------------------------- the same picture in each format


def straight(sheet):
    """Every straight line that writers are given, on paper, by layer."""
    found = {}
    for space, one in recorder.record(sheet):
        if isinstance(one, Line):
            ends = (one.start, one.end)
            if space is Space.MODEL:
                ends = tuple(to_paper(sheet, p) for p in ends)
            found.setdefault(one.layer, []).append(ends)
    return {layer: in_order(lines) for layer, lines in found.items()}


def in_order(lines):
    return np.sort(np.array(lines).reshape(-1, 4), axis=0)


def lines_of_dxf(sheet):
    found = {}
    doc = ezdxf.read(StringIO(dxf.write(sheet).decode()))
    for one in doc.modelspace().query("LINE"):
        ends = [to_paper(sheet, (p.x, p.y)) for p in (one.dxf.start, one.dxf.end)]
        found.setdefault(one.dxf.layer, []).append(ends)
    return found


def lines_of_svg(sheet):
    found = {}
    for group in ET.fromstring(svg.write(sheet)).findall(f"{SVG}g"):
        for path in group.findall(f"{SVG}path"):
            match = re.fullmatch(r"M(\S+) (\S+)L(\S+) (\S+)", path.get("d"))
            if match:
                a, b, c, d = map(float, match.groups())
                high = sheet.size_mm[1]
                found.setdefault(group.get("id"), []).append(((a, high - b), (c, high - d)))
    return found


def lines_of_pdf(sheet):
    found = {}
    for layer, ink in by_layer(pdf.write(sheet)).items():
        for operators in ink:
            match = re.fullmatch(r"(\S+) (\S+) m (\S+) (\S+) l S", operators)
            if match:
                a, b, c, d = map(float, match.groups())
                found.setdefault(layer, []).append(((a, b), (c, d)))
    return found


@pytest.mark.parametrize("read", [lines_of_dxf, lines_of_svg, lines_of_pdf])
def test_every_line_is_in_every_format(read):
    # Dimensions, blocks and chains of two points hold lines beside those that are counted here.
    bare = PLAN._replace(
        model=tuple(p for p in PLAN.model if not isinstance(p, Dimension | BlockUse | Polyline))
    )
    found, wanted = read(bare), straight(bare)
    assert set(found) == set(wanted)
    for layer, lines in wanted.items():
        # Formats in text round to a tenth of a micrometre on paper; halves may go either way.
        assert in_order(found[layer]) == pytest.approx(lines, abs=1.01e-4), layer


def grey(png):
    """Return how dark each pixel is, 0 to 1."""
    return 1.0 - np.asarray(Image.open(BytesIO(png)).convert("L"), dtype=float) / 255.0


def both_drawn(sheet, dots_per_inch):
    page = pypdfium2.PdfDocument(pdf.write(sheet))[0]
    first = BytesIO()
    page.render(scale=dots_per_inch / 72.0).to_pil().save(first, "png")
    second = resvg_py.svg_to_bytes(
        svg_string=svg.write(sheet).decode(),
        dpi=dots_per_inch,
        font_files=[str(FONT_FILE)],
        skip_system_fonts=True,
    )
    one, other = grey(first.getvalue()), grey(bytes(second))
    rows, columns = (min(a, b) for a, b in zip(one.shape, other.shape, strict=True))
    return one[:rows, :columns], other[:rows, :columns]


def blurred(picture, size=8):
    """Means over squares: two programs smooth edges in their own ways."""
    rows, columns = (n // size * size for n in picture.shape)
    parts = picture[:rows, :columns].reshape(rows // size, size, columns // size, size)
    return parts.mean(axis=(1, 3))


def rows_of(count):
    """Every letter of the font that leaves ink on a sheet; SVG joins blanks, PDF does not."""
    letters = "".join(c for c in font.font().glyphs if plain(c) == c and not c.isspace())
    return [letters[n : n + count] for n in range(0, len(letters), count)]


@pytest.mark.parametrize(
    "drawn",
    [
        PLAN,
        EVERYTHING,
        sheet(
            model=(
                Arc("OPTICS", (500.0, 300.0), 250.0, 30.0, 300.0),
                Circle("BEAM_632_8", (500.0, 300.0), 100.0),
                Polyline(
                    "HAZARD",
                    ((0.0, 0.0), (400.0, 0.0), (400.0, 400.0)),
                    closed=True,
                    bulges=(0.4, -0.7, 2.0),
                ),
            )
        ),
    ],
    ids=["plan", "everything", "arcs"],
)
def test_a_viewer_of_pdf_and_one_of_svg_draw_the_same(drawn):
    one, other = (blurred(picture) for picture in both_drawn(drawn, 100))
    assert one.max() > 0.1
    # A line of 0.5 mm moved by its own width would change a square by 0.2 and more.
    assert np.abs(one - other).max() < 0.12
    assert np.corrcoef(one.ravel(), other.ravel())[0, 1] > 0.99


def test_every_letter_is_drawn_as_a_viewer_of_svg_draws_it():
    rows = enumerate(rows_of(60))
    letters = sheet(paper=tuple(Text("TAGS", (20.0, 280.0 - 8.0 * n), row, 5.0) for n, row in rows))
    one, other = (blurred(picture) for picture in both_drawn(letters, 200))
    # Smoothed edges differ by up to 0.26; two accents in each other's place by 0.5.
    assert np.abs(one - other).max() < 0.35
