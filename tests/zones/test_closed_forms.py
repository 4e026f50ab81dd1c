"""Scattered light in plan against areas that can be written down."""

import math

import pytest
import shapely
from test_sampled import BENCH
from traced import area_of, traced

from benchlay.exposure import Pulse, accessible_limit
from benchlay.zones import zones_of

LIMIT = accessible_limit(1064.0, None, Pulse(0.235, 8e-9, 10.0))
# 2.35 W mean on the spot at [300, 250, 100], 60 % scattered. A point: its 1/e2 radius is 0.1 mm.
FAR = 1e3 * math.sqrt(0.6 * 2.35 / (math.pi * LIMIT.mpe_w_m2))
POINT = BENCH.replace("{waist_radius: 2}", "{waist_radius: 0.1, waist_ahead: 250}")
POINT = POINT.replace("at: [700, 250]", "at: [550, 250]").replace("4 m", "9 m").rstrip(" ")
BLACK = "    materials: {black: {thickness: 0.01, diffuse: 0, specular: 0}}\n"


def scattered(panels="", text=POINT):
    text = text.replace("      MORE\n", "")
    if panels:
        text += (
            BLACK + f"    enclosure: {{material: black, to_height: 2500, panels: {{{panels}}}}}\n"
        )
    return area_of(zones_of(traced(text)), "diffuse")


def beyond(y):
    """Area of a half disc's part behind a line parallel to its axis, at a distance."""
    quarter = 0.5 * FAR**2 * math.acos(y / FAR) - 0.5 * y * math.sqrt(FAR**2 - y**2)
    return quarter


def test_a_half_disc_in_the_open():
    area = scattered().area
    assert area == pytest.approx(0.5 * math.pi * FAR**2, rel=2e-3)
    assert area >= 0.5 * math.pi * FAR**2 * (1.0 - 1e-6)


def test_a_whole_disc_over_a_level_surface():
    text = POINT.replace("facing: 0, size", "facing: 0, pitch: 90, size")
    text = text.replace("at: [550, 250]", "at: [300.001, 250, 600]")
    text = text.replace("heading: 180", "heading: 180\n        pitch: -89.9998")
    area = scattered(text=text).area
    assert area == pytest.approx(math.pi * FAR**2, rel=5e-3)


@pytest.mark.parametrize("y", [35.0, 60.0, 400.0, 1000.0])
def test_half_a_plane_behind_a_wall(y):
    """A wall along the spot's normal, longer than the light goes."""
    wall = f"p: {{from: [-3000, {250 + y}], to: [9000, {250 + y}]}}"
    hidden = scattered().area - scattered(wall).area
    assert hidden == pytest.approx(beyond(y), rel=5e-3)


@pytest.mark.parametrize("height", [150, 300, 900])
def test_a_low_wall_hides_what_is_below_the_line_over_its_edge(height):
    """Half way to an eye at y, whose height may be up to 1.08 m above the bench: see `eyes`."""
    y, top = 200.0, 1980.0 - 900.0
    wall = f"p: {{from: [-9000, {250 + y}], to: [9000, {250 + y}], to_height: {height}}}"
    found = scattered(wall)
    slope = (height - 100.0) / y  # of the lowest way over it, straight across
    for share in (1.2, 2.0, 3.5):
        for aside in (0.05, 0.5):
            p = (300.0 + aside * y, 250.0 + share * y)
            rise = slope * share * y  # the same for all points at this distance from the wall
            near = math.hypot(aside * y, share * y, rise) < FAR
            assert shapely.contains(found, shapely.Point(p)) == (near and 100.0 + rise < top)


@pytest.mark.parametrize(("along", "width"), [(3000, 50), (3200, 120), (3600, 20)])
def test_a_wedge_through_a_slot(along, width):
    slot = f"{{along: {along}, width: {width}, from_height: 0, to_height: 2500}}"
    wall = f"p: {{from: [600, -2750], to: [600, 3250], openings: {{slot: {slot}}}}}"
    found = scattered(wall)
    behind = shapely.intersection(found, shapely.box(600.01, -9000, 9000, 9000)).area
    start, end = (along + a - 3000.0 for a in (0.0, width))  # from the spot's axis
    angle = math.atan2(end, 300.0) - math.atan2(start, 300.0)
    expected = 0.5 * FAR**2 * angle - 0.5 * 300.0 * width
    assert behind == pytest.approx(expected, rel=5e-3)


@pytest.mark.parametrize("diameter", [20, 60, 150])
def test_a_wedge_through_a_round_port(diameter):
    """An eye at the height of the spot sees through the port's full width."""
    port = f"{{along: 3000, height: 100, diameter: {diameter}}}"
    wall = f"p: {{from: [600, -2750], to: [600, 3250], openings: {{port: {port}}}}}"
    behind = shapely.intersection(scattered(wall), shapely.box(600.01, -9000, 9000, 9000)).area
    angle = 2.0 * math.atan2(0.5 * diameter, 300.0)
    expected = 0.5 * FAR**2 * angle - 0.5 * 300.0 * diameter
    assert behind == pytest.approx(expected, rel=5e-3)


def test_two_colours_have_zones_of_their_own():
    more = """
      red:
        {wavelength: 694, pulse: {energy: 235 mJ, duration: 8 ns, rate: 10 Hz}, at: [700, 250, 101],
         beam: {waist_radius: 0.1, waist_ahead: 400}, heading: 180, body: none}
"""
    text = POINT.replace("      MORE\n", "").replace(
        "    elements:", f"{more.rstrip()}\n    elements:"
    )
    zones = [z for z in zones_of(traced(text)).zones if z.kind == "diffuse"]
    assert [z.wavelength_nm for z in zones] == [694.0, 1064.0]
    red = accessible_limit(694.0, None, Pulse(0.235, 8e-9, 10.0)).mpe_w_m2
    assert zones[0].reach_m == pytest.approx(math.sqrt(0.6 * 2.35 / (math.pi * red)), rel=1e-6)
