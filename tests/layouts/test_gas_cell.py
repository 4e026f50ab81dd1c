"""The gas cell, worked out by hand from the figures in its layout."""

from functools import cache
from math import asin, atan, cos, dist, exp, hypot, pi, radians, sin, sqrt, tan

import pytest

# Fused silica against air: Malitson, J. Opt. Soc. Am. 55, 1205 (1965), from its table between
# 1.6606 and 1.5295 um, and at the helium-neon line (from memory).
INFRARED, RED = 1.44276, 1.45702
AIR = 1.00027
ANGLE = atan(4 / 560)  # of the fold: 8 on from hit to hit of a mirror, two ways of 560
BREWSTER = atan(INFRARED)
PASSES = 7


def bare_p(incidence, index):
    """Reflectance of a bare face for light polarized in its plane of incidence."""
    beyond = asin(sin(incidence) / index)
    return (tan(incidence - beyond) / tan(incidence + beyond)) ** 2


def through_windows(index):
    """Return what two plates of two faces pass, met as much above the angle as below it."""
    above, below = (1 - bare_p(BREWSTER + off, index) for off in (ANGLE, -ANGLE))
    return above**2 * below**2


def filtered(inside=0.9):
    """Return what a bare filter passes at 5 degrees."""
    incidence = radians(5)
    longer = 1 / cos(asin(sin(incidence) / INFRARED))
    return (1 - bare_p(incidence, INFRARED)) ** 2 * inside**longer


def test_the_gas_is_passed_by_what_all_faces_leave(bench):
    combined = 0.995 * 0.99
    straight_on = 0.95 * 0.997
    folded = through_windows(INFRARED) ** PASSES * 0.99**6
    power = 15e-3 * combined * straight_on * 0.99**2 * folded * 0.99 * filtered()
    arrived = bench("gas-cell").route("gas")
    assert arrived.power_W == pytest.approx(power, rel=2e-5)
    assert arrived.polarization.angle_deg % 180 == pytest.approx(0, abs=1e-6)
    assert power > 8e-3, "what the detector needs"


def test_the_reference_gets_a_twentieth(bench):
    power = 15e-3 * 0.995 * 0.99 * 0.05 * filtered()
    assert bench("gas-cell").route("line").power_W == pytest.approx(power, rel=2e-5)


def test_the_pilot_goes_the_same_way_when_both_filters_are_out(bench):
    gas = bench("gas-cell")
    to_fold = 0.99 * 0.97 * 0.92 * 0.99 * 0.95**2
    folded = through_windows(RED) ** PASSES * 0.95**6
    power = 0.8e-3 * to_fold * folded * 0.95
    guide = gas.route("guide", "alignment")
    # Red meets the windows a quarter of a degree off its own angle; that is in `folded`.
    assert guide.power_W == pytest.approx(power, rel=1e-3)
    assert gas.route("guide-line", "alignment").power_W == pytest.approx(
        0.8e-3 * 0.99 * 0.97 * 0.08 * (1 - bare_p(BREWSTER, RED)) ** 4, rel=1e-3
    )
    assert not gas.route("guide").arrives
    assert not gas.route("gas", "alignment").arrives


def bent(direction, normal, ratio):
    """Refract a direction in plan at a face whose normal is given on either side."""
    along = direction[0] * normal[0] + direction[1] * normal[1]
    if along > 0:
        normal, along = (-normal[0], -normal[1]), -along
    turn = ratio * -along - sqrt(1 - ratio**2 * (1 - along**2))
    return tuple(ratio * k + turn * n for k, n in zip(direction, normal, strict=True))


def on(point, direction, place, normal):
    """Go straight on to a line in plan."""
    gap = sum((b - a) * n for a, b, n in zip(point, place, normal, strict=True))
    way = gap / sum(k * n for k, n in zip(direction, normal, strict=True))
    return tuple(a + way * k for a, k in zip(point, direction, strict=True))


@cache
def folded():
    """Follow the light through the fold in plan: y at the mirrors, way in air, and path."""
    c, s = cos(BREWSTER), sin(BREWSTER)
    faces = [  # from west to east, with the factor by which the index falls
        ((650, 250), (c, -s), 1 / INFRARED),
        ((650 + 5 * c, 250 - 5 * s), (c, -s), INFRARED),
        ((1110 - 5 * c, 250 - 5 * s), (c, s), 1 / INFRARED),
        ((1110, 250), (c, s), INFRARED),
    ]
    point, direction = (600.0, 236.0), (cos(ANGLE), sin(ANGLE))
    met, inside, path = [], [], 0.0
    for k in range(PASSES):
        east = k % 2 == 0
        for number, (place, normal, _) in enumerate(faces if east else faces[::-1]):
            landed = on(point, direction, place, normal)
            way = dist(point, landed)
            path += way * (INFRARED if number in (1, 3) else 1)
            if number == 2:
                inside.append(way)
            direction = bent(direction, normal, INFRARED if number in (1, 3) else 1 / INFRARED)
            point = landed
        landed = on(point, direction, (1160 if east else 600, 0), (1, 0))
        path += dist(point, landed)
        met.append(landed[1])
        if k < PASSES - 1:
            direction = (-direction[0], direction[1])
        point = landed
    return met, inside, path


def hits(gas, mirror):
    ends = [beam for beam in gas.way("gas") if gas.face(beam) == f"{mirror}.front"]
    return [gas.beams.end[beam][1] for beam in ends]


def test_the_fold_steps_on_by_eight_and_leaves_beside_its_mirrors(bench):
    gas = bench("gas-cell")
    met, _, _ = folded()
    # The windows are met a little off their angle, one above and one below it: each pass steps
    # on by 0.05 less than the 4 of a fold without them.
    assert met == pytest.approx([240 + 4 * k for k in range(PASSES)], abs=0.4)
    assert hits(gas, "FAR") == pytest.approx(met[0:6:2], abs=5e-3)
    assert hits(gas, "NEAR") == pytest.approx(met[1:6:2], abs=5e-3)
    for mirror, width in (("FAR", 1.25), ("NEAR", 1.25)):
        half, middle = 28 / 2 * 0.96, gas.elements()[mirror].pose.at[1]
        assert all(abs(y - middle) < half - 1.5 * width for y in hits(gas, mirror))
    assert gas.elements()["NEAR"].pose.at[1] - 14 - 236 > 3 * 1.45
    assert met[-1] - gas.elements()["FAR"].pose.at[1] - 14 > 3 * 1.25


def test_the_light_goes_through_three_metres_of_air_from_the_tanks(bench):
    gas = bench("gas-cell")
    _, inside, _ = folded()
    # Each window is a step into the cell whose other side is slanted as well: hence the pairs.
    ways = [
        float(gas.beams.length[beam])
        for beam in gas.way("gas")
        if gas.face(beam) in ("C1.exit.front", "C1.entry.back")
        and gas.beams.length[beam] > 100  # a window itself is 5 thick
    ]
    assert ways == pytest.approx(inside, abs=1e-2)
    assert sum(inside) == pytest.approx(3140, abs=5)


def test_the_optical_path_is_that_of_the_legs_and_the_glass(bench):
    gas = bench("gas-cell")
    m1, m2 = (gas.elements()[name].pose.at for name in ("M1", "M2"))
    end = gas.beams.end[gas.end("gas")]
    met, _, fold = folded()
    # M3 stands at 45 degrees to the beam: the way along and the way up make the same sum
    # wherever on it the beam is turned.
    after = (end[0] - 1160) + (end[1] - met[-1])
    legs = (1150 - m1[0]) + hypot(m1[0] - m2[0], m1[1] - m2[1]) + (600 - m2[0]) / cos(ANGLE)

    def longer(thickness, incidence):
        beyond = asin(sin(incidence) / INFRARED)
        return thickness * (INFRARED * cos(beyond) - cos(incidence))

    glass = longer(3, pi / 4) + longer(5, pi / 4) + longer(2, radians(5))
    path = gas.route("gas").optical_path_mm
    assert path == pytest.approx(AIR * (legs + fold + after + glass), abs=1.5)


def test_the_waist_lies_in_the_middle_of_the_fold(bench):
    gas = bench("gas-cell")
    spread = 1653.7e-6 / (pi * 0.95)
    narrowest = min(gas.way("gas"), key=lambda beam: gas.beams.end_moments[0, beam])
    assert gas.face(narrowest).startswith(("C1", "FAR", "NEAR"))
    last = gas.end("gas")
    # Glass shortens the way that a beam spreads over by some 2 mm a plate.
    beyond = 5923 - 3500
    w = sqrt(0.95**2 + (spread * beyond) ** 2)
    assert 2 * sqrt(gas.beams.end_moments[2, last]) == pytest.approx(w, rel=0.02)
    assert exp(-2 * (4.5 / 1.5) ** 2) < 1e-6, "the iris A1 cuts nothing"


def test_light_polarized_upright_is_sent_aside_by_every_window(bench):
    upright = bench(
        "gas-cell",
        (
            "waist_ahead: 3500}\n    polarization: horizontal",
            "waist_ahead: 3500}\n    polarization: vertical",
        ),
    )
    assert {("off-brewster", "C1"), ("off-brewster", "C2"), ("needs-unmet", "detector")} <= (
        upright.found()
    )


def test_mirrors_one_wider_by_the_beam_cut_it(bench):
    moved = bench("gas-cell", ("at: [600, 255]", "at: [600, 250]"))
    assert ("beam-blocked", "NEAR") in moved.found()


def test_without_its_mark_the_first_hit_is_off_it(bench):
    """Each of the three by itself: the others are where they are meant to be."""
    for name, mark in (("C1", "[14, 0]"), ("NEAR", "[-11.5, 0]"), ("FAR", "[5.3, 0]")):
        unmarked = bench("gas-cell", (f"    beam_at: {mark}\n", ""))
        assert unmarked.found() == {("off-centre", name)}


def test_red_leaves_the_fold_beside_the_infrared(bench):
    strict = bench("gas-cell", ("    limits.off_centre: 3\n", ""))
    assert strict.found() == {("off-centre", name) for name in ("A2", "M3", "detector")}
