"""Scattered light goes on as a straight ray to the next item, wherever that stands."""

import numpy as np
import pytest

SAMPLE = "  S: {kind: target, after: laser, distance: 300, facing: 135}\n"
AT = np.array([400.0, 450.0, 100.0])


def test_the_next_item_is_what_it_is_aimed_at(standing):
    placed = standing(
        SAMPLE
        + "  L: {kind: lens, after: S.scattered, at: [300, 650, 150], focal: 80, diameter: 40}\n"
        "  C: {kind: target, after: L, distance: 120}\n"
    )
    way = np.array([-100.0, 200.0, 50.0])
    way /= np.linalg.norm(way)
    point, direction = placed.ray("L")
    np.testing.assert_allclose(point, AT, atol=1e-9)
    np.testing.assert_allclose(direction, way, atol=1e-12)
    # Through the middle of a thin lens it goes straight on.
    np.testing.assert_allclose(placed.at("C"), [300, 650, 150] + 120 * way, atol=1e-9)
    heading = np.degrees(np.arctan2(-way[1], -way[0])) % 360
    assert placed.facing("L")[0] == pytest.approx(heading)


def test_it_says_no_distance(complaints):
    (problem,) = complaints(SAMPLE + "  C: {kind: target, after: S.scattered, distance: 90}\n")
    assert "light scattered by 'S' goes everywhere" in problem
    assert "give `at` beside `after`" in problem


def test_light_that_meets_the_back_is_not_scattered_on(complaints):
    back = SAMPLE.replace("facing: 135", "facing: 20")
    (problem,) = complaints(back + "  C: {kind: target, after: S.scattered, at: [300, 650]}\n")
    assert "no nominal beam leaves 'S.scattered'" in problem
