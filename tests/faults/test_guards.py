"""Panels, lids and windows as guards, against irradiances and densities worked out by hand."""

from math import log10, pi

import pytest

from benchlay.checks import Context, limits_of
from benchlay.faults import review_faults
from benchlay.pipeline import trace
from benchlay.report.faults_text import guard_lines, overloaded
from benchlay.results.faults import faults_result
from benchlay.results.panels import panels_of_states

BENCH = """\
elements:
  M1: {{kind: mirror, after: red, distance: 500, turn: left 90, diameter: 25.4,
       reflectance: 100 %}}
  D1: {{kind: dump, after: M1, distance: 200}}
{more}routes:
  main: [red, M1, D1]
materials:
  sheet: {{diffuse: 0.1, specular: 0{rating}}}
enclosure:
  material: sheet
  panels:
    south: {{from: [0, 0], to: [1000, 0], access: interlocked}}
    east: {{from: [1000, 0], to: [1000, 600]{opening}}}
    north: {{from: [1000, 600], to: [0, 600]}}
    west: {{from: [0, 600], to: [0, 0]}}
  lids:
    east: {{height: 300, outline: [[0, 0], [1000, 0], [1000, 600], [0, 600]], access: tool}}
"""
HEAD = {"size": "[1000, 600]", "at": "[100, 300]"}
RATED = ", withstands: {irradiance: 100 W/cm2, for: 100 s}"


def peak(distance):
    """On the axis of 100 mW that leave with a waist of 0.3 mm, W/cm2."""
    rayleigh = pi * 0.3**2 / 633e-6
    w2 = 0.3**2 * (1 + (distance / rayleigh) ** 2)
    return 2 * 0.1 / (pi * w2 * 0.01)


@pytest.fixture
def result(bench):
    def make(rating=RATED, opening="", more="", limits=""):
        placed = bench(BENCH.format(rating=rating, opening=opening, more=more) + limits, **HEAD)
        return faults_result(review_faults(placed), placed, "bench.yaml", "")

    return make


def panel(rows, name, sheet="panel"):
    (row,) = [row for row in rows if (row.panel, row.sheet) == (name, sheet)]
    return row


def test_a_fault_governs_the_panel_that_nothing_meets_at_rest(result):
    row = panel(result().panels, "east")
    assert (row.governs, row.state) == ("fault", "as drawn")
    assert row.fault == "M1 out"
    assert row.worst_irradiance_W_cm2 == pytest.approx(peak(900), rel=1e-6)
    assert row.withstands_W_cm2 == pytest.approx(100)
    assert row.margin == pytest.approx(100 / peak(900), rel=1e-6)
    assert (row.exposed_s, row.rated_s, row.shown, row.reason) == (100, 100, True, None)


def test_states_alone_are_what_a_check_speaks_of(bench):
    placed = bench(BENCH.format(rating=RATED, opening="", more=""), **HEAD)
    context = Context(trace(placed), limits_of(placed))
    rows = panels_of_states(context, ("as drawn",))
    assert panel(rows, "east").worst_irradiance_W_cm2 is None
    assert panel(rows, "east").reason == "no light ends on it"
    assert panel(rows, "east").margin is None


def test_no_rating_is_not_shown(result):
    row = panel(result(rating="").panels, "east")
    assert (row.shown, row.margin, row.withstands_W_cm2) == (False, None, None)
    assert row.reason == "its material states no rating"
    assert row.worst_irradiance_W_cm2 == pytest.approx(peak(900), rel=1e-6)


@pytest.mark.parametrize(("rated", "shown"), [(100, True), (99, False)])
def test_a_rating_holds_for_its_time_only(result, rated, shown):
    row = panel(
        result(rating=f", withstands: {{irradiance: 100 W/cm2, for: {rated} s}}").panels, "east"
    )
    assert row.shown == shown
    assert (row.margin is not None) == shown
    if not shown:
        assert row.reason == "it is rated for 99 s, and exposed for up to 100 s"


def test_a_rating_by_power(result):
    row = panel(result(rating=", withstands: {power: 50 mW}").panels, "east")
    assert row.unit == "W"
    assert row.value == pytest.approx(0.1, rel=1e-4)
    assert row.margin == pytest.approx(0.5, rel=1e-4)


def test_a_panel_and_a_lid_of_one_name_are_two(result):
    rows = result().panels
    assert panel(rows, "east", "lid").worst_irradiance_W_cm2 is None
    assert [row.sheet for row in rows if row.panel == "east"] == ["panel", "lid"]


def test_what_an_open_panel_gives_access_to(result):
    rows = {(row.panel, row.sheet): row for row in result().opened}
    assert set(rows) == {("south", "panel"), ("east", "lid")}
    south = rows["south", "panel"]
    assert (south.access, south.power_W) == ("interlocked", None)
    assert south.inside_W == pytest.approx(0.1, rel=1e-6)
    limit = 100 * 3.85e-6  # 10 W/m2 over 7 mm, for 100 s, and that again a hundred times
    assert south.inside_times_limit == pytest.approx(0.1 / limit, rel=2e-3)


@pytest.mark.parametrize(("density", "enough"), [(3.0, True), (2.0, False)])
def test_a_window_is_judged_by_its_density(result, density, enough):
    opening = ", openings: {view: {along: 250, width: 100, from_height: 50, to_height: 150}}"
    more = (
        "  VW: {kind: filter, in: east.view, size: [120, 120], thickness: 3, "
        f"density: {density}, front: 0 %, back: 0 %, mount: none}}\n"
    )
    result = result(opening=opening, more=more)
    (row,) = result.windows
    assert (row.window, row.opening, row.wavelength_nm) == ("VW", "east/view", 633.0)
    assert row.density == pytest.approx(density, abs=1e-9)
    needed = log10(0.1 / 3.85e-4)
    assert row.needed_density == pytest.approx(needed, abs=1e-3)
    assert row.needed_density_full == pytest.approx(needed, abs=1e-3)
    assert (row.fault, row.enough, row.enough_for_full) == ("M1 out", enough, enough)
    out = next(fault for fault in result.faults if fault.fault == "M1 out")
    assert (out.outcome == "escape") == (not enough)


def test_bare_glass_is_hardly_dense(result):
    opening = ", openings: {view: {along: 250, width: 100, from_height: 50, to_height: 150}}"
    more = (
        "  VW: {kind: window, in: east.view, size: [120, 120], glass: {index: 1.5}, mount: none}\n"
    )
    (row,) = result(opening=opening, more=more).windows
    assert row.density == pytest.approx(-2 * log10(0.96), abs=1e-9)
    assert row.enough is False


def test_what_withstands_too_little_comes_first_and_is_named(result):
    """15 W/cm2: less than what reaches north at 800, more than what reaches east at 900."""
    assert peak(900) < 15.0 < peak(800)
    found = result(RATED.replace("100 W", "15 W"))
    rows = [line.split()[0] for line in guard_lines(found)[2:7]]
    assert rows[:2] == ["north", "east"]
    marked = [line for line in guard_lines(found) if "(too little)" in line]
    assert [line.split()[0] for line in marked] == ["north"]
    (words,) = overloaded(found)
    assert words.startswith("north (takes ")
    assert words.endswith("withstands 15 W/cm2)")
    assert overloaded(result()) == []


def test_what_is_not_shown_comes_before_what_holds_and_the_unlit_last(result):
    rows = [line.split()[0] for line in guard_lines(result(rating=""))[2:7]]
    lit = [row.panel for row in result(rating="").panels if row.state is not None]
    assert set(rows[: len(lit)]) == set(lit)
