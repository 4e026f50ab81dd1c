"""Scattered light in a box: a lid on the panels keeps it in, and whatever leaves a gap does not."""

import pytest
import shapely
from traced import area_of, traced

from benchlay.zones import zones_of

# What a white spot at [200, 200, 100] scatters is hazardous out to 0.69 m, the panels are
# 200 high: without a lid it passes over all of them.
BOX = """
    bench: {size: [800, 400]}
    sources:
      ir:
        wavelength: 1064
        pulse: {energy: 50 mJ, duration: 8 ns, rate: 10 Hz}
        beam: {waist_radius: 0.3, waist_ahead: 400}
        at: [600, 200]
        heading: 180
    elements:
      stone: {kind: target, after: ir, distance: 400, size: [100, 100], diffuse: 60 %}
    enclosure:
      to_height: 200
      panels:
        south: {from: [0, 0], to: [800, 0]}
        east: {from: [800, 0], to: [800, 400]}
        north: {from: [800, 400], to: [0, 400]}
        west: {from: [0, 400], to: [0, 0]}
      lids: {LIDS}
    """
INSIDE = shapely.box(200, 0, 800, 400)  # of the box, what the stone faces
WHOLE = "main: {height: 200, outline: [[0, 0], [800, 0], [800, 400], [0, 400]]}"


def scattered(lids, text=BOX):
    return area_of(zones_of(traced(text.replace("{LIDS}", lids))), "diffuse")


# Strips along the outside of the panels, where light is that went past them.
STRIPS = {
    "south": shapely.box(210, -20, 790, -1),
    "east": shapely.box(801, 10, 820, 390),
    "north": shapely.box(210, 401, 790, 420),
    "west": shapely.box(-20, 10, -1, 390),
}


def leaves(lids, text=BOX):
    """Names of the sides past which there is a zone."""
    zone = scattered(lids, text)
    return {side for side, strip in STRIPS.items() if shapely.intersects(zone, strip)}


OUT = {"south", "east", "north"}  # the stone faces east


def test_a_closed_box_keeps_it_all_in():
    zone = scattered(f"{{{WHOLE}}}")
    assert shapely.symmetric_difference(zone, INSIDE).area < 1e-3


def test_two_lids_that_meet_keep_it_in_like_one():
    west = "w: {height: 200, outline: [[0, 0], [500, 0], [500, 400], [0, 400]]}"
    east = "e: {height: 200, outline: [[500, 0], [800, 0], [800, 400], [500, 400]]}"
    assert leaves(f"{{{west}, {east}}}") == set()
    assert leaves(f"{{{west}}}") == OUT  # over the rest of each panel
    # Between lids of two heights there is a gap.
    assert leaves(f"{{{west}, {east.replace('height: 200', 'height: 180')}}}") == OUT
    # Of two lids, one stands open.
    assert leaves(f"{{{west}, {east.replace('}', ', open: yes}')}}}") == OUT


def test_a_lid_shades_only_the_panels_up_to_which_it_reaches():
    """From the spot to the north panel all is covered; before the others there is a gap."""
    north = "n: {height: 200, outline: [[0, 190], [800, 190], [800, 400], [0, 400]]}"
    assert leaves(f"{{{north}}}") == {"south", "east"}


@pytest.mark.parametrize(
    ("height", "kept"),
    [
        (150, True),  # within the panels
        (200, True),  # on their edges
        (201, False),  # a gap of 1 mm under it
        (90, False),  # the spot lies above it
    ],
)
def test_a_lid_counts_between_the_spot_and_the_panels_edge(height, kept):
    assert leaves(f"{{{WHOLE.replace('200', str(height), 1)}}}") == (set() if kept else OUT)


def test_a_lid_helps_no_panel_that_lets_light_through():
    view = "openings: {view: {along: 300, width: 150, from_height: 50, to_height: 150}}"
    for open_way in (view, "open: yes", "from_height: 110"):
        text = BOX.replace("south: {", f"south: {{{open_way}, ")
        assert leaves(f"{{{WHOLE}}}", text) == {"south"}


def test_what_leaves_downwards_meets_no_eye():
    """Through a gap of 90 mm at the foot of a panel light only falls from a spot 100 mm up."""
    text = BOX.replace("south: {", "south: {from_height: 90, ")
    assert leaves(f"{{{WHOLE}}}", text) == set()
