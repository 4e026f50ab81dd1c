"""Filters in openings: what is seen through them, and what they stop."""

import math

import pytest
import shapely
from test_sampled import LID, bench, compared, filters_that_pass_nothing, ring
from traced import traced

from benchlay.exposure import Pulse, accessible_limit
from benchlay.zones import limits_of
from benchlay.zones.diffuse import spots

# The slot in the east panel is 80 wide and 120 high; the plate in it fits.
SLOT = ", openings: {slot: {along: 250, width: 80, from_height: 60, to_height: 180}}"
ROUND = ", openings: {slot: {along: 250, height: 110, diameter: 50}}"
BOX = shapely.box(0, 0, 1000, 600)
# A spot that scatters 60 % of 235 mJ ten times a second, through an aperture of 7 mm.
LIGHT_W = 0.6 * 2.35
ALLOWED_W = accessible_limit(1064, None, Pulse(0.235, 8e-9, 10)).accessible_w


def scene(plate, opening=SLOT, size="size: [80, 120]"):
    filter_ = f"F: {{kind: filter, in: e.slot, {size}, mount: none, {plate}}}"
    return traced(bench((filter_, ring(300, east=opening) + LID)))


def gets_out(trace):
    (spot,) = (s for s in spots(trace, limits_of(trace), 0, 0) if s.name == "S")
    return shapely.difference(spot.area, shapely.buffer(BOX, 3.0)).area


def test_the_slot_without_a_plate_lets_light_out():
    assert gets_out(traced(bench(ring(300, east=SLOT) + LID))) > 3e4


@pytest.mark.parametrize("thickness", [2, 6])
def test_a_plate_that_passes_nothing_stops_it(thickness):
    assert gets_out(scene(f"bands: [{{from: 500, to: 600, transmits: 90 %}}], "
                          f"thickness: {thickness}")) < 1.0  # fmt: skip


def test_a_round_plate_in_a_round_opening_stops_it():
    bands = "bands: [{from: 500, to: 600, transmits: 90 %}]"
    trace = scene(bands, ROUND, "diameter: 60")
    assert gets_out(trace) < 1.0


def test_a_plate_that_passes_this_wavelength_counts_as_no_plate():
    full = gets_out(traced(bench(ring(300, east=SLOT) + LID)))
    assert gets_out(scene("bands: [{from: 1000, to: 1100, transmits: 1 %}]")) == full


@pytest.mark.parametrize(("over", "out"), [(0.99, False), (1.01, True)])
def test_what_may_pass_is_what_an_aperture_may_take(over, out):
    density = -math.log10(over * ALLOWED_W / LIGHT_W)
    assert (gets_out(scene(f"density: {density}")) > 1.0) == out


def test_the_thin_edge_of_a_wedge_counts():
    # 3 mm in the middle, 1 degree over 120 mm: 1.95 mm at the thin edge, 0.65 of the density.
    density = -math.log10(0.5 * ALLOWED_W / LIGHT_W)
    wedge = "wedge: 1, wedge_towards: up, thickness: 3"
    assert gets_out(scene(f"density: {density}, {wedge}")) > 1.0
    assert gets_out(scene(f"density: {density / 0.64}, {wedge}")) < 1.0


def test_eyes_looked_at_one_by_one_say_the_same():
    trace = scene("bands: [{from: 500, to: 600, transmits: 90 %}]", size="size: [60, 100]")
    assert filters_that_pass_nothing(trace, 0, 0) == ["F"]
    for spot, missed, invented, sees in compared(trace):
        assert sees > 0
        assert len(missed) == 0, (spot.name, missed[:5])
        assert len(invented) == 0, (spot.name, invented[:5])
