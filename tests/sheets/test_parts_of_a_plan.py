"""A bench too long for one legible plan has its parts drawn larger."""

import io
import itertools

import ezdxf
import pytest

from benchlay.checks import Context, limits_of
from benchlay.pipeline import place, read, trace
from benchlay.sheets import Subject, composed_sheets
from benchlay.sheets.drafting import plan_picture
from benchlay.sheets.plan.parts import parts
from benchlay.sheets.primitives import BlockUse, Text
from benchlay.writers import dxf
from benchlay.zones import zones_of


def bench(length):
    places = range(800, length - 600, 550)
    names = [f"W{n}" for n, _ in enumerate(places)]
    before = ["red", *names]
    elements = [
        f"  {name}: {{kind: window, at: [{x}, 450], after: {last}, incidence: 5, "
        "diameter: 25.4, front: 0.1 %, back: 0.1 %}"
        for name, x, last in zip(names, places, before, strict=False)
    ]
    return "\n".join(
        [
            f"bench: {{size: [{length}, 900], holes: {{pitch: 25, first: [25, 25]}}}}",
            "sources:",
            "  red: {wavelength: 633, power: 20 mW, beam: {waist_radius: 1.5}, at: [300, 450],",
            "        heading: 0}",
            "elements:",
            *elements,
            f"  T1: {{kind: target, after: {names[-1]}, distance: 300}}",
            f"routes: {{main: [{', '.join([*before, 'T1'])}]}}",
            "enclosure:",
            "  to_height: 250",
            "  panels:",
            f"    south: {{from: [0, 0], to: [{length}, 0]}}",
            f"    north: {{from: [{length}, 900], to: [0, 900],",
            "            openings: {port: {along: 1000, width: 60, from_height: 0,",
            "                              to_height: 30}}}",
            "",
        ]
    )


@pytest.fixture(scope="module")
def drawn():
    traced = trace(place(read("x.yaml", bench(8000))))
    zones = zones_of(traced, states=["as drawn"])
    context = Context(traced, limits_of(traced.placed))
    return plan_picture(traced, zones), composed_sheets(Subject(context, zones, (), ""), "plan")


def test_every_element_stands_on_a_part_where_it_stands_on_the_plan(drawn):
    _, made = drawn
    whole, *pieces = [one.sheet for one in made]
    assert whole.scale > 10
    assert len(pieces) > 1
    assert all(piece.scale <= 10 for piece in pieces)

    def places(sheet):
        return {(use.block, use.at) for use in sheet.model if isinstance(use, BlockUse)}

    assert set().union(*map(places, pieces)) == places(whole)
    names = [dict(use.attributes)["TAG"] for use in whole.model if isinstance(use, BlockUse)]
    words = {
        p.text for piece in pieces for p in (*piece.paper, *piece.model) if isinstance(p, Text)
    }
    assert set(names) <= words


def test_parts_are_cut_where_they_should_be(drawn):
    picture, _ = drawn
    cut = list(parts(picture))
    windows = [(one.part.left, one.part.right) for one in cut]
    assert windows[0][0] == 0.0
    assert windows[-1][1] == 8000.0
    for (_, right), (left, _) in itertools.pairwise(windows):
        assert right - left == pytest.approx(100.0)  # each shows 50 mm of its neighbour
    for one in cut:
        for leg in one.legs:
            for end in (leg.start, leg.end):
                assert one.part.left - 1e-6 <= end[0] <= one.part.right + 1e-6
    # A port 1000 along a panel that runs from the right end lies at 7000 to 6940 across.
    (holder,) = [
        (panel, opening)
        for one in cut
        for panel in one.panels
        for opening in panel.openings
        if one.part.left < 6940.0 and one.part.right > 7000.0
    ]
    panel, opening = holder
    assert panel.start[0] - opening.start_mm == pytest.approx(7000.0)
    assert panel.start[0] - opening.end_mm == pytest.approx(6940.0)


def test_parts_are_sound_drawings_within_their_paper(drawn):
    _, made = drawn
    for sheet, _ in made[1:]:
        audit = ezdxf.read(io.StringIO(dxf.write(sheet).decode("utf-8"))).audit()
        assert not audit.errors
        assert not audit.fixes
        for p in sheet.paper:
            if isinstance(p, Text):
                assert 0.0 <= p.at[0] <= sheet.size_mm[0], p.text


def test_a_bench_that_is_legible_whole_has_no_parts():
    traced = trace(place(read("x.yaml", bench(2400))))
    context = Context(traced, limits_of(traced.placed))
    zones = zones_of(traced, states=["as drawn"])
    made = composed_sheets(Subject(context, zones, (), ""), "plan")
    assert not [one for one in made if "part" in one.sheet.name]
