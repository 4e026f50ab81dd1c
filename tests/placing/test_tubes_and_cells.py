"""Tubes lie along their own axis; Brewster windows of cells stand for the light that arrives."""

import numpy as np
import pytest

MIRROR = (
    "  M: {kind: mirror, after: laser, distance: 300, turn: up 90, size: [60, 60], metal: gold}\n"
)


def _geometry(placed, name):
    return placed.placed.base.elements[name].geometry


def test_a_tube_faces_away_from_its_end_at_the_end_s_own_height(standing):
    placed = standing(
        "  B: {kind: tube, at: [200, 450, 80], to: T, bore: 20}\n"
        "  T: {kind: target, at: [500, 850, 205], facing: 180}\n"
    )
    way = np.array([300.0, 400.0, 125.0])
    np.testing.assert_allclose(placed.axes("B")[0], -way / np.linalg.norm(way), atol=1e-12)
    leave = _geometry(placed, "B").faces[1]
    assert leave.origin[0] == pytest.approx(-np.linalg.norm(way), abs=1e-9)


def test_a_tube_to_a_point_is_level(standing):
    placed = standing("  B: {kind: tube, at: [200, 450, 80], to: [500, 850], bore: 20}\n")
    assert placed.axes("B")[0] == pytest.approx([-0.6, -0.8, 0.0], abs=1e-12)
    assert _geometry(placed, "B").faces[1].origin[0] == pytest.approx(-500.0, abs=1e-9)


def test_the_beam_goes_on_from_a_tube_s_exit(standing):
    placed = standing(
        "  B: {kind: tube, after: laser, distance: 50, to: [400, 450], bore: 20}\n"
        "  T: {kind: target, after: B, distance: 100}\n"
    )
    np.testing.assert_allclose(placed.at("T"), [500, 450, 100], atol=1e-9)


def test_a_tube_that_leads_to_what_stands_behind_it_hangs_on_itself(complaints):
    problem = complaints(
        "  B: {kind: tube, after: laser, distance: 50, to: T, bore: 20}\n"
        "  T: {kind: target, after: B, distance: 100}\n"
    )[0]
    assert "hang on one another" in problem


@pytest.mark.parametrize("key", ["facing: 0", "incidence: 3", "pitch: 2"])
def test_a_tube_cannot_be_turned(complaints, key):
    (problem,) = complaints(f"  B: {{kind: tube, at: [200, 450], to: laser, bore: 20, {key}}}\n")
    assert f"'{key.split(':')[0]}' turns an element, but a tube lies along its own axis" in problem


@pytest.mark.parametrize(
    ("goal", "said"),
    [("B", "'to' names 'B' itself"), ("lasr", "no source or element named 'lasr'")],
)
def test_a_tube_leads_to_something_that_is_there(complaints, goal, said):
    (problem,) = complaints(f"  B: {{kind: tube, at: [200, 450], to: {goal}, bore: 20}}\n")
    assert said in problem


@pytest.mark.parametrize(("n", "way"), [(1.5, "mirrored"), (1.46, "parallel")])
def test_brewster_windows_are_tilted_in_plan_and_shift_the_beam(standing, n, way):
    windows = f"{{incidence: brewster, glass: {{index: {n}}}, thickness: 4, set: {way}}}"
    placed = standing(
        "  C: {kind: cell, after: laser, distance: 200, length: 250, bore: 15,"
        f" windows: {windows}}}\n"
        "  T: {kind: target, after: C, distance: 100}\n"
    )
    theta = np.arctan(n)
    entry = _geometry(placed, "C").faces[0]
    np.testing.assert_allclose(entry.normal, [np.cos(theta), -np.sin(theta), 0], atol=1e-12)
    shift = 4 * np.sin(theta) * (1 - np.cos(theta) / np.sqrt(n * n - np.sin(theta) ** 2))
    moved = 0.0 if way == "mirrored" else 2 * shift
    point, direction = placed.ray("T")
    np.testing.assert_allclose(direction, [1, 0, 0], atol=1e-12)
    assert point[1] == pytest.approx(450 - moved, abs=1e-9)


def test_brewster_windows_need_a_beam(complaints):
    (problem,) = complaints(
        "  C: {kind: cell, at: [400, 450], facing: 180, length: 250, bore: 15,"
        " windows: {incidence: brewster}}\n"
    )
    assert "no beam is known to arrive" in problem


def test_a_state_may_lead_a_tube_elsewhere_or_begin_it_elsewhere(standing):
    placed = standing(
        "  B: {kind: tube, at: [200, 450], to: [500, 450], bore: 20}\n"
        "states: {turned: {elements.B.to: [200, 550]}, moved: {elements.B.at: [100, 450]}}\n"
    )
    for state, way, long in (
        ("as drawn", [-1, 0, 0], 300),
        ("turned", [0, -1, 0], 100),
        ("moved", [-1, 0, 0], 400),
    ):
        np.testing.assert_allclose(placed.axes("B", state)[0], way, atol=1e-12)
        leave = placed.states[state].elements["B"].geometry.faces[1]
        assert leave.origin[0] == pytest.approx(-long, abs=1e-9)
