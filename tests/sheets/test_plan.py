"""The plan of a made-up bench: what a reviewer would look for, on every size of sheet."""

import itertools
import math

import numpy as np
import pytest
import shapely
import trial_bench

from benchlay.sheets.contents import Holes, Leg, Mark, Zone
from benchlay.sheets.dimensions import figure_box
from benchlay.sheets.lettering import width_mm
from benchlay.sheets.plan import compose, sheets
from benchlay.sheets.primitives import (
    Across,
    BlockUse,
    Circle,
    Dimension,
    Line,
    Polyline,
    Text,
    Up,
    to_paper,
)
from benchlay.sheets.scale import NothingFitsError, frame_of
from benchlay.writers import recorder

DESCENT = 0.33  # of the height of capitals, measured from the font: g, p, (
STRIP_MM = 5.0  # the zones' letters stand outside the frame
SHEETS = {"A2": compose(trial_bench.picture()), "A3": compose(trial_bench.picture(sheet="A3"))}


@pytest.fixture(params=SHEETS)
def sheet(request):
    return SHEETS[request.param]


def box_of(text):
    """Lower left and upper right corner of a line of lettering, from `text.at`, mm on paper."""
    width, height = width_mm(text.text, text.height_mm), text.height_mm
    x = {Across.LEFT: 0.0, Across.CENTRE: -width / 2, Across.RIGHT: -width}[text.across]
    y = {Up.BASELINE: 0.0, Up.MIDDLE: -height / 2, Up.TOP: -height}[text.up]
    return (x, y - DESCENT * height), (x + width, y + height)


def boxes(sheet):
    """Every piece of lettering on paper, with its words. Turned ones are dimensions."""
    for primitive in (*sheet.paper, *sheet.model):
        if isinstance(primitive, Text):
            at = primitive.at if primitive in sheet.paper else to_paper(sheet, primitive.at)
            (x0, y0), (x1, y1) = box_of(primitive)
            yield primitive.text, (at[0] + x0, at[1] + y0, at[0] + x1, at[1] + y1)
        elif isinstance(primitive, Dimension):
            yield "dimension", tuple(figure_box(primitive, sheet))


def on_layer(sheet, name, kind=object):
    return [p for p in (*sheet.model, *sheet.paper) if p.layer == name and isinstance(p, kind)]


def test_a_handy_sheet_and_a_listed_scale_are_chosen():
    assert (SHEETS["A2"].size_mm, SHEETS["A2"].scale) == ((594.0, 420.0), 5.0)
    assert (SHEETS["A3"].size_mm, SHEETS["A3"].scale) == ((420.0, 297.0), 10.0)


def test_no_two_texts_overlap(sheet):
    bad = [
        (a, b)
        for (a, p), (b, q) in itertools.combinations(boxes(sheet), 2)
        if p[0] < q[2] and q[0] < p[2] and p[1] < q[3] and q[1] < p[3]
    ]
    assert bad == []


def test_lettering_is_never_lower_than_two_and_a_half(sheet):
    heights = [p.height_mm for p in (*sheet.paper, *sheet.model) if isinstance(p, Text | Dimension)]
    assert min(heights) >= 2.5
    assert set(heights) <= {2.5, 3.5, 5.0}


def test_all_lettering_lies_in_the_frame(sheet):
    left, low, right, high = frame_of(sheet.size_mm)
    for words, (x0, y0, x1, y1) in boxes(sheet):
        if len(words) > 2:  # the sheet's own size and zones stand in the margin
            assert left <= x0 <= x1 <= right, words
            assert low <= y0 <= y1 <= high, words


def test_every_element_is_named_and_carries_its_data(sheet):
    tags = {p.text for p in on_layer(sheet, "TAGS", Text)}
    items = trial_bench.items()
    assert {item.name for item in items} <= tags
    uses = {dict(p.attributes)["TAG"]: p for p in sheet.model if isinstance(p, BlockUse)}
    for item in items:
        assert uses[item.name].at == item.at[:2]
        assert dict(uses[item.name].attributes)["KIND"] == item.kind


def test_outlines_are_the_elements_own():
    block = next(b for b in SHEETS["A2"].blocks if b.name == "E-M1")
    (glass,) = [p for p in block.primitives if p.layer == "OPTICS" and isinstance(p, Polyline)]
    assert glass.points == trial_bench.items()[2].outlines[0].points


def test_the_coated_side_is_marked_before_the_face():
    block = next(b for b in SHEETS["A2"].blocks if b.name == "E-M1")
    (mark,) = [p for p in block.primitives if p.layer == "OPTICS" and isinstance(p, Line)]
    # The face is x = 0, the glass behind it; the mark is 0.9 mm off on paper at 1:5.
    assert {mark.start, mark.end} == {(4.5, -12.7), (4.5, 12.7)}


def test_beams_lie_on_the_layer_of_their_wavelength_true_to_size():
    lines = on_layer(SHEETS["A2"], "BEAM_532", Line)
    drawn = sum(math.dist(p.start, p.end) for p in lines if p in SHEETS["A2"].model)
    expected = sum(math.dist(a, b) for a, b in itertools.pairwise(trial_bench.B1))
    assert drawn == pytest.approx(expected)


def test_strays_are_on_a_layer_of_their_own(sheet):
    starts = {p.start for p in on_layer(sheet, "STRAY", Line)}
    assert (1150, 480) in starts
    beams = {p.start for p in on_layer(sheet, "BEAM_1064", Line)}
    assert (1150, 480) in beams


def test_light_that_leaves_the_sheet_ends_at_the_edge_of_the_field(sheet):
    (low, high) = sheet.window_mm
    for line in (p for p in sheet.model if p.layer == "STRAY" and isinstance(p, Line)):
        for x, y in (to_paper(sheet, line.start), to_paper(sheet, line.end)):
            assert low[0] - 1e-6 <= x <= high[0] + 1e-6
            assert low[1] - 1e-6 <= y <= high[1] + 1e-6


def test_envelope_is_to_scale():
    plain = trial_bench.picture(
        legs=(Leg("B1", 532.0, (0, 450, 100), (1000, 450, 100), radii_mm=((0, 1), (1000, 3))),)
    )
    edges = {p.points for p in on_layer(compose(plain), "ENVELOPE", Polyline)}
    assert edges == {((0.0, 451.0), (1000.0, 453.0)), ((0.0, 449.0), (1000.0, 447.0))}


def test_zones_are_hatched_at_the_rim_and_broken_for_their_label(sheet):
    words = {p.text for p in on_layer(sheet, "HAZARD", Text)}
    assert {"Z1", "Z2", "Z3", "MPE 10 W/m², to walls"} <= words
    labels = [box for text, box in boxes(sheet) if text in words]
    hatch = [p for p in sheet.model if p.layer == "HAZARD" and isinstance(p, Line)]
    assert len(hatch) > 100
    for line in hatch:
        x, y = to_paper(
            sheet, tuple((a + b) / 2 for a, b in zip(line.start, line.end, strict=True))
        )
        assert not any(b[0] < x < b[2] and b[1] < y < b[3] for b in labels)


def test_the_bench_is_dimensioned_overall_and_from_its_first_hole(sheet):
    texts = [d.text for d in sheet.model if isinstance(d, Dimension)]
    assert texts.count("58 × 25 (= 1450)") == texts.count("34 × 25 (= 850)") == 1
    spans = {
        (d.first, d.second) for d in sheet.model if isinstance(d, Dimension) and d.text is None
    }
    assert {((0.0, 0.0), (1500.0, 0.0)), ((0.0, 0.0), (0.0, 900.0))} <= spans


def test_heights_are_written_where_they_are_not_the_beams_own(sheet):
    assert [p.text for p in on_layer(sheet, "LEVELS", Text)].count("+125") == 1
    assert any("Beam height +100" in p.text for p in on_layer(sheet, "NOTES", Text))


def test_what_does_not_fit_is_counted_not_dropped(sheet):
    many = tuple(("A", "2026-01-01", f"change {n}", "wks") for n in range(60))
    full = compose(trial_bench.picture(revisions=many))
    rows = [p.text for p in on_layer(full, "REVISION", Text)]
    shown = sum(text.startswith("change") for text in rows)
    assert f"... and {60 - shown} more: see sheet plan-2" in rows


def test_what_does_not_fit_stands_in_full_on_a_further_sheet():
    many = tuple(("A", "2026-01-01", f"change {n}", "wks") for n in range(60))
    notes = tuple(f"note {n}: " + "words that take up room " * 4 for n in range(40))
    findings = tuple(
        Mark(n, "fail", f"escape: light number {n} gets out", (10.0 * n, 400.0, 100.0))
        for n in range(1, 61)
    )
    made = sheets(trial_bench.picture(revisions=many, notes=notes, findings=findings))
    names = [name for name, _ in made]
    assert names == ["plan", *(f"plan-{n}" for n in range(2, len(names) + 1))]
    drawn = [make(f"{n}/9") for n, (_, make) in enumerate(made, start=1)]
    texts = [[p.text for p in one.paper if isinstance(p, Text)] for one in drawn]
    further = " ".join(words for page in texts[1:] for words in page)
    for n in range(60):
        assert f"change {n}" in further
        assert f"light number {n + 1} gets out" in further
    for n in range(40):
        assert f"note {n}:" in further
    assert all(f"{n}/9" in page for n, page in enumerate(texts, start=1))
    for one in drawn:
        assert overlapping(boxes(one)) == []


def test_where_all_fits_there_is_no_further_sheet():
    assert [name for name, _ in sheets(trial_bench.picture(zones=()))] == ["plan"]


def test_findings_stand_in_balloons_at_their_places():
    marks = (
        Mark(1, "fail", "escape: light gets out", (1200.0, 800.0, 100.0)),
        Mark(2, "warn", "clipped: a rim", (1201.0, 801.0, 100.0)),
        Mark(3, "warn", "off-centre: aside", (300.0, 250.0, 100.0)),
        Mark(4, "note", "as-modelled: a lens", None),
        Mark(5, "warn", "dark-element: elsewhere", (700.0, 550.0, 100.0), here=False),
    )
    sheet = compose(trial_bench.picture(findings=marks))
    text = {p.text: p for p in sheet.paper if isinstance(p, Text)}
    assert {"1-2", "fail: escape: light gets out", "4", "5"} <= set(text)
    assert text["1-2"].layer == "HAZARD"
    dots = {tuple(p.centre) for p in sheet.paper if isinstance(p, Circle) and p.radius == 0.5}
    assert dots == {to_paper(sheet, (1200.0, 800.0)), to_paper(sheet, (300.0, 250.0))}
    leaders = {p.start for p in sheet.paper if isinstance(p, Line)}
    assert dots <= leaders
    assert overlapping(boxes(sheet)) == []


def test_a_finding_beyond_the_sheet_is_marked_at_its_edge():
    far = Mark(1, "fail", "at-door: light reaches the door", (-90_000.0, 450.0, 100.0))
    sheet = compose(trial_bench.picture(findings=(far,)))
    (dot,) = (p for p in sheet.paper if isinstance(p, Circle) and p.radius == 0.5)
    assert dot.centre[0] == pytest.approx(sheet.window_mm[0][0])


def test_the_hazard_in_reach_is_written_large():
    lines = ("LASER CLASS 4 IN REACH, as modelled", "Eyewear inside: 1064 nm OD 5")
    sheet = compose(trial_bench.picture(warning=lines, signs=(("LB1", "105×52", "at M1"),)))
    text = {p.text: p for p in sheet.paper if isinstance(p, Text)}
    assert [text[line].height_mm for line in lines] == [3.5, 3.5]
    assert {"SIGNS AND LABELS", "LB1", "105×52", "at M1"} <= set(text)
    assert overlapping(boxes(sheet)) == []


def test_every_layer_of_the_drawing_is_used():
    used = {r.primitive.layer for r in recorder.record(SHEETS["A2"])}
    for block in SHEETS["A2"].blocks:
        used |= {p.layer for p in block.primitives}
    assert {layer.name for layer in SHEETS["A2"].layers} - used == {"VIEWPORT"}


def test_what_fits_nowhere_says_so():
    with pytest.raises(NothingFitsError, match="do not fit on A3 at 1:2"):
        compose(trial_bench.picture(sheet="A3", scale=2))


def test_a_bare_bench_is_drawn_too():
    bare = trial_bench.picture(
        items=(), legs=(), panels=(), zones=(), legend=(), revisions=(), holes=None, notes=()
    )
    sheet = compose(bare)
    assert on_layer(sheet, "BENCH", Polyline)


def test_a_leg_seen_end_on_is_a_ring():
    up = trial_bench.picture(legs=(Leg("B1", 532.0, (500, 450, 100), (500, 450, 200)),))
    rings = [p for p in compose(up).model if p.layer == "LEVELS"]
    assert {p.centre for p in rings} == {(500, 450)}


# ------------------------------------------------------------- full sheets


def crowded_bench(columns, rows, step):
    """Rows of plates, each with a beam of its own that runs through them all."""
    items, legs = [], []
    for row in range(rows):
        y = 100.0 + row * step[1]
        at = [(140.0 + n * step[0], y) for n in range(columns)]
        for n, place in enumerate(at):
            far = (place[0] + 9.0, y)
            near = (place[0] - 9.0, y)
            items.append(trial_bench.mirror(f"A{row}-{n}", place, near, far, kind="aperture"))
        ends = [(40.0, y), *at]
        legs += [
            trial_bench.leg(f"B{row}", 532.0, a, b, words=f"B{row} {n} mW")
            for n, (a, b) in enumerate(itertools.pairwise(ends))
        ]
    width, depth = 240.0 + columns * step[0], 200.0 + rows * step[1]
    outline = ((0.0, 0.0), (width, 0.0), (width, depth), (0.0, depth))
    return trial_bench.picture(
        outline=outline,
        items=tuple(items),
        legs=tuple(legs),
        panels=(),
        zones=(),
        holes=Holes((25.0, 25.0), 25.0, int(width // 25), int(depth // 25), "M6"),
    )


def overlapping(boxes):
    return [
        (a, b)
        for (a, p), (b, q) in itertools.combinations(boxes, 2)
        if p[0] < q[2] and q[0] < p[2] and p[1] < q[3] and q[1] < p[3]
    ]


def on_beams(sheet, legs):
    """Tags on the sheet that a beam runs through, by sampling the beams."""
    tags = [t for t in sheet.paper if isinstance(t, Text) and t.layer in ("TAGS", "LEVELS")]
    boxes = np.array(
        [[(t.at[n] + corner[n]) for corner in box_of(t) for n in (0, 1)] for t in tags]
    )
    found = set()
    for leg in legs:
        (ax, ay), (bx, by) = to_paper(sheet, leg.start), to_paper(sheet, leg.end)
        share = np.linspace(0.0, 1.0, max(2, math.ceil(math.dist((ax, ay), (bx, by)) / 0.2)))
        x, y = ax + share * (bx - ax), ay + share * (by - ay)
        inside = (x[:, None] > boxes[:, 0]) & (x[:, None] < boxes[:, 2])
        inside &= (y[:, None] > boxes[:, 1]) & (y[:, None] < boxes[:, 3])
        found |= {tags[n].text for n in np.flatnonzero(inside.any(axis=0))}
    return found


@pytest.mark.parametrize(
    ("columns", "rows", "step"),
    [(10, 6, (100.0, 100.0)), (20, 15, (55.0, 50.0)), (30, 2, (150.0, 250.0))],
    ids=["60", "300", "long"],
)
def test_a_full_bench_has_every_tag_and_none_on_another_or_on_a_beam(columns, rows, step):
    picture = crowded_bench(columns, rows, step)
    sheet = compose(picture)
    said = [p.text for p in sheet.paper if isinstance(p, Text)]
    assert {item.name for item in picture.items} <= set(said)
    assert {leg.words for leg in picture.legs} <= set(said)
    assert not any(words.startswith("Not tagged") for words in said)
    assert overlapping(boxes(sheet)) == []
    assert on_beams(sheet, picture.legs) == set()
    # Beyond 1:10 an inch of glass is a speck.
    assert sheet.scale <= 10.0


def test_tags_of_the_made_up_bench_lie_on_no_beam(sheet):
    assert on_beams(sheet, trial_bench.legs()) == set()


def test_what_lies_beyond_the_sheet_is_said_to():
    far = shapely.box(9000.0, 9000.0, 9100.0, 9100.0)
    zone = Zone("Z9", "direct", trial_bench.rings(far), ("direct",), ("far",))
    sheet = compose(trial_bench.picture(zones=(zone,)))
    said = [p.text for p in sheet.paper if isinstance(p, Text)]
    assert "Beyond the edge of this sheet: Z9." in said


def test_holes_that_are_used_are_ringed_and_explained():
    at = ((225.0, 425.0), (600.0, 300.0))
    sheet = compose(trial_bench.picture(used_holes=at))
    rings = {
        p.centre: p.radius for p in sheet.model if isinstance(p, Circle) and p.layer == "HOLES"
    }
    assert rings == {place: pytest.approx(1.1 * sheet.scale) for place in at}
    said = {p.text for p in sheet.paper if isinstance(p, Text)}
    assert "mounting hole that something is held by" in said
