"""The line that light should not cross, and where legs cross it."""

import math

import pytest

from benchlay.layout import read_layout
from benchlay.zones.enclosure_line import enclosure_line, inside, leaving

SOURCE = "s: {wavelength: 532, power: 1 mW, beam: {waist_radius: 1}, at: [5, 5], heading: 0}"
PANELS = {
    "south": "{from: [0, 0], to: [100, 0]}",
    "east": "{from: [100, 0], to: [100, 60]}",
    "north": "{from: [100, 60], to: [0, 60], to_height: 400}",
    "west": "{from: [0, 60], to: [0, 0]}",
}


def line_of(*names):
    panels = "".join(f"    {name}: {PANELS[name]}\n" for name in names)
    text = f"bench: {{size: [120, 80]}}\nsources:\n  {SOURCE}\n"
    if names:
        text += f"enclosure:\n  panels:\n{panels}"
    layouts, problems = read_layout(text, "x.yaml")
    assert layouts is not None, problems.sorted()
    return enclosure_line(layouts.as_drawn)


@pytest.mark.parametrize(
    "names", [("south", "east", "north", "west"), ("west", "east", "south", "north")]
)
def test_a_closed_ring_has_its_panels_as_sides_in_any_order_of_the_file(names):
    line = line_of(*names)
    assert line.enclosed
    assert {side.panel for side in line.sides} == set(PANELS)
    assert set(line.corners) == {(0, 0), (100, 0), (100, 60), (0, 60)}
    assert line.top_mm == 400.0


def test_a_missing_side_is_closed_by_a_straight_line():
    line = line_of("south", "east", "north")
    assert [s for s in line.sides if s.panel is None] == [((0, 60), (0, 0), None)]


def test_two_panels_make_a_triangle():
    assert set(line_of("east", "south").corners) == {(0, 0), (100, 0), (100, 60)}


@pytest.mark.parametrize("names", [(), ("south",)])
def test_with_fewer_than_two_panels_it_is_the_bench(names):
    line = line_of(*names)
    assert not line.enclosed
    assert set(line.corners) == {(0, 0), (120, 0), (120, 80), (0, 80)}
    assert line.top_mm == math.inf


def test_inside_and_outside():
    line = line_of(*PANELS)
    assert inside(line, (50, 30))
    assert not inside(line, (101, 30))


def test_a_leg_that_crosses_leaves_there():
    crossing = leaving(line_of(*PANELS), (50, 30), (1.0, 0.0), 80.0)
    assert crossing.way_mm == pytest.approx(50.0, abs=1e-9)
    assert crossing.side.panel == "east"


def test_a_climbing_leg_is_measured_in_space():
    crossing = leaving(line_of(*PANELS), (50, 30), (0.5, 0.0), 160.0)
    assert crossing.way_mm == pytest.approx(100.0, abs=1e-9)


def test_a_leg_that_ends_on_the_inner_face_stays():
    assert leaving(line_of(*PANELS), (50, 30), (1.0, 0.0), 50.0) is None
    assert leaving(line_of(*PANELS), (50, 30), (1.0, 0.0), 50.0 + 1e-9) is None


def test_a_leg_that_starts_on_the_line_and_goes_out_leaves_at_once():
    crossing = leaving(line_of(*PANELS), (100, 30), (1.0, 0.0), 50.0)
    assert crossing.way_mm == 0.0
    assert crossing.side.panel == "east"


def test_a_leg_that_starts_on_the_line_and_goes_in_stays():
    assert leaving(line_of(*PANELS), (100, 30), (-1.0, 0.0), 50.0) is None


def test_a_leg_that_starts_beyond_does_not_leave_again():
    assert leaving(line_of(*PANELS), (110, 30), (1.0, 0.0), 50.0) is None


def test_a_leg_that_comes_in_and_goes_out_again_leaves_where_it_goes_out():
    crossing = leaving(line_of(*PANELS), (110, 30), (-1.0, 0.0), 150.0)
    assert crossing.way_mm == pytest.approx(110.0, abs=1e-9)
    assert crossing.side.panel == "west"


def test_a_vertical_leg_crosses_no_line():
    assert leaving(line_of(*PANELS), (50, 30), (0.0, 0.0), 50.0) is None


def test_through_a_corner_is_a_crossing():
    crossing = leaving(line_of(*PANELS), (50, 10), (0.8, 0.8 * 50 / 50), 90.0)
    assert crossing is not None
