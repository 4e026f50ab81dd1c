"""Panels and lids as read, and what holds for those that say nothing."""

import pytest

TEXT = """\
bench: {size: [1500, 900]}
materials: {black: {}, steel: {specular: 30 %}}
enclosure:
  material: black
  to_height: 250
  panels:
    south:
      from: [0, 0]
      to: [100, 0]
      openings:
        whole: {along: 0, width: 100, from_height: 0, to_height: 250}
        round: {along: 15, height: 15, diameter: 30}
    east: {from: [100, 0], to: [100, 50], material: steel, from_height: 20, to_height: 90}
  lids: {top: {height: 250, outline: [[0, 0], [0, 50], [100, 50]]}}
"""


def test_defaults_and_what_overrides_them(layout_of):
    enclosure = layout_of(TEXT).enclosure
    south, east = enclosure.panels["south"], enclosure.panels["east"]
    assert enclosure.heights_mm(south) == (0.0, 250.0)
    assert enclosure.heights_mm(east) == (20.0, 90.0)
    assert (enclosure.material_of(south), enclosure.material_of(east)) == ("black", "steel")
    assert (south.access, south.open) == ("none", False)


def test_the_inside_is_on_the_left(layout_of):
    panels = layout_of(TEXT).enclosure.panels
    assert panels["south"].outward == pytest.approx((0.0, -1.0))
    assert panels["east"].outward == pytest.approx((1.0, 0.0))


def test_openings_may_touch_the_edges(layout_of):
    openings = layout_of(TEXT).enclosure.panels["south"].openings
    assert openings["whole"].box_mm() == (0.0, 100.0, 0.0, 250.0)
    assert openings["round"].box_mm() == (0.0, 30.0, 0.0, 30.0)
    assert openings["round"].round


@pytest.mark.parametrize(("along", "count"), [("70", 0), ("70.0000001", 0), ("70.00001", 1)])
def test_an_opening_may_reach_the_end_but_not_beyond(complaints, along, count):
    text = TEXT.replace("{along: 0, width: 100,", f"{{along: {along}, width: 30,")
    assert len(complaints(text)) == count


def test_lids_run_anticlockwise(layout_of):
    assert layout_of(TEXT).enclosure.lids["top"].outline == ((100.0, 50.0), (0.0, 50.0), (0.0, 0.0))


def test_shop_drawing_keys_are_read(layout_of):
    text = TEXT.replace(
        "to_height: 90}", "to_height: 90, ends: {start: butt, end: folded}, fold: {flange: 20}}"
    )
    layout = layout_of(text)
    assert layout.enclosure.panels["east"].fold.radius_mm == 2.0
    assert (layout.enclosure.panels["east"].ends.end, layout.not_yet) == ("folded", ())
