"""Elevations held against closed forms, and their lettering."""

import io
import itertools
import math
from pathlib import Path

import ezdxf
import pytest

from benchlay.checks import Context, limits_of
from benchlay.pipeline import place, read, trace
from benchlay.sheets import Subject, composed_sheets
from benchlay.sheets.drafting.elevations import elevation_of
from benchlay.sheets.elevation.board import lay_out
from benchlay.sheets.lettering import width_mm
from benchlay.sheets.primitives import Across, Dimension, Text, Up, measured
from benchlay.writers import dxf, svg
from benchlay.zones import Zones

NO_ZONES = Zones((), ())
LAYOUTS = Path(__file__).parents[3] / "layouts"
BENCH = """\
bench: {size: [1200, 600], surface_height: 900}
sources:
  red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.2}, polarization: vertical,
        at: [100, 200, 100], heading: 0, body: {length: 150, width: 50, height: 60}}
elements:
  A1: {kind: aperture, after: red, distance: 200, opening: 6}
  M1: {kind: mirror, after: A1, distance: 300, turn: left 90, pitch: 5, diameter: 25.4,
       metal: silver}
  T1: {kind: target, after: M1, distance: 200}
routes: {main: [red, A1, M1, T1]}
enclosure:
  to_height: 300
  panels:
    south: {from: [0, 0], to: [1200, 0]}
    east: {from: [1200, 0], to: [1200, 600], to_height: 280}
    north: {from: [1200, 600], to: [0, 600], open: yes}
"""


def context_of(trace):
    return Context(trace, limits_of(trace.placed))


def traced(text):
    return trace(place(read("bench.yaml", text)))


@pytest.fixture(scope="module")
def picture():
    return elevation_of(traced(BENCH), 0, 0, "0" * 64)


def test_stations_stand_at_their_path_and_height(picture):
    stations = {one.name: one for one in picture.stations}
    assert list(stations) == ["red", "A1", "M1", "T1"]
    assert [one.s for one in picture.stations] == pytest.approx([0.0, 200.0, 500.0, 700.0])
    # A mirror pitched by 5 degrees at 45 degrees in plan: sin of the climb is 2 sin p cos p
    # times the cosine of incidence over cos p, that is cos 45 sin 2p.
    climb = math.asin(math.cos(math.radians(45)) * math.sin(math.radians(10)))
    assert stations["T1"].z == pytest.approx(100.0 + 200.0 * math.sin(climb), abs=1e-9)
    assert stations["A1"].clear_half == pytest.approx(3.0)
    # The smaller way across a mirror of 25.4 at 45 degrees is its clear width foreshortened.
    seen = 0.9 * 12.7 * math.cos(math.radians(45)) * math.cos(math.radians(5))
    assert stations["M1"].clear_least == pytest.approx(seen)
    foot = next(one for one in stations["M1"].holders if one[0] == "post")
    assert foot[2] == 0.0


def test_the_radius_is_that_of_a_gaussian_beam(picture):
    # w(z) = w0 sqrt(1 + (z / zR)^2), zR = pi w0^2 n / wavelength in air (Siegman, Lasers, 1986)
    rayleigh = math.pi * 0.2**2 / 633e-6
    first = picture.stretches[0]
    for share, step in ((0.0, 0), (0.5, 12), (1.0, 24)):
        told = first.up_mm[step]
        w = 0.2 * math.hypot(1.0, share * 200.0 / rayleigh)
        assert told == pytest.approx(w, rel=3e-4)  # the index of air


def test_levels_and_bands_are_heights_above_the_bench(picture):
    assert [(one.words, one.z) for one in picture.levels] == [
        ("top of panel east", 280.0),
        ("top of panel south", 300.0),
    ]
    assert [(one.low, one.high) for one in picture.bands] == [(170.0, 480.0), (470.0, 1080.0)]


def test_dimensions_measure_heights_true_to_size(picture):
    traced_bench = traced(BENCH)
    (made,) = composed_sheets(Subject(context_of(traced_bench), NO_ZONES, (), ""), "elevation")
    found = [measured(p) for p in made.sheet.model if isinstance(p, Dimension)]
    assert found == pytest.approx([100.0, 300.0], abs=1e-9)
    document = ezdxf.read(io.StringIO(dxf.write(made.sheet).decode("utf-8")))
    audit = document.audit()
    assert not audit.errors
    assert not audit.fixes
    values = sorted(d.get_measurement() for d in document.modelspace().query("DIMENSION"))
    assert values == pytest.approx([100.0, 300.0], abs=1e-6)


def test_a_route_that_its_light_does_not_follow_to_its_end_says_so():
    text = BENCH.replace("pitch: 5", "yaw_error: 20")
    picture = elevation_of(traced(text), 0, 0, "")
    assert any("does not reach T1" in note for note in picture.notes)
    assert picture.stations[-1].name != "T1"


def test_a_long_route_is_drawn_in_strips(picture):
    longer = picture.stretches[-1]._replace(s=700.0, s_out=9000.0)
    board = lay_out(picture._replace(stretches=(*picture.stretches[:-1], longer)))
    assert len(board.strips) > 1
    ends = [(strip.s, strip.s_out) for strip in board.strips]
    assert ends[0][0] == 0.0
    assert ends[-1][1] == pytest.approx(9000.0)
    assert all(a[1] == pytest.approx(b[0]) for a, b in itertools.pairwise(ends))
    for one, other in itertools.pairwise(board.strips):
        assert other.ground < one.rows


def boxes(sheet):
    for p in sheet.paper:
        if not isinstance(p, Text):
            continue
        width, height = width_mm(p.text, p.height_mm), p.height_mm
        along = {Across.LEFT: 0.0, Across.CENTRE: -width / 2, Across.RIGHT: -width}[p.across]
        up = {Up.BASELINE: 0.0, Up.MIDDLE: -height / 2, Up.TOP: -height}[p.up]
        if p.rotation_deg == 90.0:
            left, low = p.at[0] - up - height, p.at[1] + along
            yield p.text, (left, low, left + height, low + width)
        else:
            left, low = p.at[0] + along, p.at[1] + up
            yield p.text, (left, low, left + width, low + height)


@pytest.mark.parametrize("name", ["hologram", "gas-cell", "stone-cleaning", "fluorescence", "bad"])
def test_lettering_overlaps_nowhere_and_stays_in_the_frame(name):
    traced_bench = trace(place(read(LAYOUTS / f"{name}.yaml")))
    made = composed_sheets(Subject(context_of(traced_bench), NO_ZONES, (), ""), "elevation")
    assert {one.sheet.name for one in made} <= {f"elevation-{r}" for r in traced_bench.ways.names}
    assert made
    for sheet, _ in made:
        for (a, p), (b, q) in itertools.combinations(boxes(sheet), 2):
            apart = p[2] <= q[0] or q[2] <= p[0] or p[3] <= q[1] or q[3] <= p[1]
            assert apart, (sheet.name, a, b)
        for text, (x0, y0, x1, y1) in boxes(sheet):
            assert x0 >= 0.0 <= y0, (sheet.name, text)
            assert x1 <= sheet.size_mm[0], (sheet.name, text)
            assert y1 <= sheet.size_mm[1], (sheet.name, text)


def test_elevations_come_out_byte_by_byte_alike():
    first, again = (
        composed_sheets(Subject(context_of(traced(BENCH)), NO_ZONES, (), ""), "elevation")
        for _ in range(2)
    )
    assert first
    for one, other in zip(first, again, strict=True):
        assert svg.write(one.sheet) == svg.write(other.sheet)
        assert dxf.write(one.sheet) == dxf.write(other.sheet)


def test_a_route_is_drawn_in_a_state_in_which_it_arrives():
    traced_bench = trace(place(read(LAYOUTS / "stone-cleaning.yaml")))
    assert traced_bench.scene.variants[0] == "as drawn"
    (made,) = composed_sheets(
        Subject(context_of(traced_bench), NO_ZONES, (), ""), "elevation-green"
    )
    words = [p.text for p in made.sheet.paper if isinstance(p, Text)]
    assert "ELEVATION OF ROUTE green, 1:10, STATE: green" in words
    assert not any("does not reach" in one for one in words)
    (alone,) = composed_sheets(
        Subject(context_of(traced_bench), NO_ZONES, (), "", state="as drawn"), "elevation-green"
    )
    assert any(p.text.endswith("STATE: as drawn") for p in alone.sheet.paper if hasattr(p, "text"))


def test_bands_of_eyes_are_named_and_figures_never_shortened():
    far = BENCH.replace("M1, distance: 200", "M1, distance: 212.345").replace("pitch: 5, ", "")
    longer = far.replace("1200", "9000").replace("distance: 300", "distance: 8123.47")
    (made,) = composed_sheets(Subject(context_of(traced(longer)), NO_ZONES, (), ""), "elevation")
    words = [p.text for p in made.sheet.paper if isinstance(p, Text)]
    assert "seated eyes from +170 to +480" in words
    assert "8323.5" in [one.replace(",", ".") for one in words]
    assert not any("\u2026" in one for one in words if one[:1].isdigit())
