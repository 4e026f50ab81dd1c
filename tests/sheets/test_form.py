"""The form of a sheet: what every sheet bears, and the window that is left for its content."""

import itertools

import pytest

from benchlay.sheets.form import CAUTION, form_for
from benchlay.sheets.lettering import width_mm
from benchlay.sheets.primitives import Across, Line, Polyline, Text, Up
from benchlay.sheets.scale import SIZES_MM, NothingFitsError, Window, frame_of
from benchlay.sheets.title_block import TitleFields
from benchlay.writers import recorder

FIELDS = TitleFields(
    owner="Town museum, conservation workshop",
    title="Varnish fluorescence bench",
    document_type="Drilling sheet",
    number="CW-014-02",
    tolerance="ISO 2768-m",
    sha256="0123456789abcdef" * 4,
    sheet="2/7",
)
REVISIONS = tuple((f"{n}", "2026-05-04", f"change {n}", "wks") for n in range(5))


def words(form):
    return [p.text for p in form.primitives if isinstance(p, Text)]


def boxes(primitives):
    for p in primitives:
        if isinstance(p, Text):
            width, height = width_mm(p.text, p.height_mm), p.height_mm
            x = {Across.LEFT: 0.0, Across.CENTRE: -width / 2, Across.RIGHT: -width}[p.across]
            y = {Up.BASELINE: 0.0, Up.MIDDLE: -height / 2, Up.TOP: -height}[p.up]
            low = p.at[1] + y - 0.33 * height  # descenders, measured from the font
            yield p.text, (p.at[0] + x, low, p.at[0] + x + width, p.at[1] + y + height)


@pytest.mark.parametrize("size", SIZES_MM)
@pytest.mark.parametrize("revisions", [(), REVISIONS])
def test_nothing_of_the_form_lies_in_its_window(size, revisions):
    form = form_for(FIELDS, size=size, revisions=revisions)
    for window in (form.window, *([form.beside] if form.beside else [])):
        for text, (x0, y0, x1, y1) in boxes(form.primitives):
            apart = x1 <= window.left or x0 >= window.right or y1 <= window.low or y0 >= window.high
            assert apart, text


@pytest.mark.parametrize("size", SIZES_MM)
def test_lettering_of_the_form_overlaps_nowhere(size):
    form = form_for(FIELDS, size=size, revisions=REVISIONS)
    for (a, p), (b, q) in itertools.combinations(boxes(form.primitives), 2):
        assert not (p[0] < q[2] and q[0] < p[2] and p[1] < q[3] and q[1] < p[3]), (a, b)


def test_a_form_says_what_every_sheet_says():
    text = words(form_for(FIELDS, size="A4", revisions=REVISIONS))
    assert {"A4", "2/7", "ISO 2768-m", "CW-014-02", "0123456789abcdef", "change 4"} <= set(text)
    assert {"Do not scale", "General tolerance", "Projection"} <= set(text)
    assert "change 1" not in text  # the last three
    assert CAUTION in " ".join(text)


def test_the_sizes_are_those_of_the_standard_within_its_frame():
    # ISO 5457: trimmed sizes, and drawing spaces of 180 by 277, 390 by 277, 564 by 400, 811 by 574.
    spaces = {"A4": (180, 277), "A3": (390, 277), "A2": (564, 400), "A1": (811, 574)}
    for name, space in spaces.items():
        inner = frame_of(SIZES_MM[name])
        assert (inner.width, inner.height) == space
        assert min(p.at[0] for p in form_for(FIELDS, size=name).primitives if isinstance(p, Text))
        outline = form_for(FIELDS, size=name).primitives[0]
        assert isinstance(outline, Polyline)
        assert outline.points[0] == (20.0, 10.0)


def test_the_smallest_sheet_that_holds_the_content_is_taken():
    assert form_for(FIELDS, content_mm=(170.0, 100.0)).size == "A4"
    assert form_for(FIELDS, content_mm=(190.0, 100.0)).size == "A3"
    assert form_for(FIELDS, content_mm=(500.0, 300.0)).size == "A2"
    with pytest.raises(NothingFitsError, match="5000 by 10 mm"):
        form_for(FIELDS, content_mm=(5000.0, 10.0))


def test_a_view_is_put_in_the_middle_at_a_listed_scale():
    form = form_for(FIELDS, size="A3")
    view = Window(-100.0, 0.0, 1400.0, 600.0)
    n = form.scale_for((view.width, view.height))
    assert n == 5
    x, y = form.middle(view, n)
    assert x + 650.0 / n == pytest.approx((form.window.left + form.window.right) / 2)
    assert y + 300.0 / n == pytest.approx((form.window.low + form.window.high) / 2)
    with pytest.raises(NothingFitsError, match="at any scale"):
        form.scale_for((1e6, 1.0))


def test_a_filled_in_form_can_be_written():
    form = form_for(FIELDS, size="A4")
    sheet = form.sheet("drilling", "holes", model=[Line("BENCH", (0.0, 0.0), (1.0, 0.0))])
    assert sheet.title == "Varnish fluorescence bench - Drilling sheet"
    assert any(r.primitive.layer == "BENCH" for r in recorder.record(sheet))


def test_cautions_leave_room_for_wider_letters():
    """Readers of DXF put stroke fonts in place of ours, up to a fifth wider (as measured)."""
    form = form_for(FIELDS, size="A3")
    (box,) = [
        p
        for p in form.primitives
        if isinstance(p, Polyline)
        and p.layer == "TITLE"
        and p.closed
        and any(abs(y - form.window.low + 2.0) < 1e-6 for _, y in p.points)
    ]
    right = max(x for x, _ in box.points)
    texts = [p for p in form.primitives if isinstance(p, Text)]
    lines = [
        p
        for p in texts
        if len(p.text) > 3 and p.text in CAUTION and p.at[1] > max(y for _, y in box.points) - 12
    ]
    assert " ".join(p.text for p in lines) == CAUTION
    for p in lines:
        assert p.at[0] + 1.2 / 1.1 * width_mm(p.text, p.height_mm) < right
