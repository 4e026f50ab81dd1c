"""How an element is turned: turn, aim, incidence, facing, and what stands for them."""

import numpy as np
import pytest

EXACT = {"abs": 1e-9, "rel": 0}
MIRROR = "  M: {kind: mirror, after: laser, distance: 300, size: [60, 60], metal: gold, "
T = "  T: {kind: target, after: M, distance: 100}\n"


def leaving(s):
    """Direction in which the nominal ray leaves M for T."""
    away = s.at("T") - s.at("M")
    return away / np.linalg.norm(away)


def heading(degrees):
    return [np.cos(np.radians(degrees)), np.sin(np.radians(degrees)), 0]


@pytest.mark.parametrize("arriving", [0, 70, 225])
@pytest.mark.parametrize("by", [90, 30, 123.4])
@pytest.mark.parametrize(("way", "sense"), [("left", 1), ("right", -1)])
def test_turn_in_plan(standing, arriving, by, way, sense):
    s = standing(MIRROR + f"turn: {way} {by}}}\n" + T, heading=arriving)
    assert leaving(s) == pytest.approx(heading(arriving + sense * by), **EXACT)
    expected = arriving + sense * (90 + by / 2)
    assert s.facing("M") == pytest.approx((expected % 360, 0), abs=1e-9)


@pytest.mark.parametrize(("way", "sense"), [("up", 1), ("down", -1)])
@pytest.mark.parametrize("by", [90, 20])
def test_turn_in_height(standing, way, sense, by):
    s = standing(MIRROR + f"turn: {way} {by}}}\n" + T, heading=30)
    flat = np.array(heading(30)) * np.cos(np.radians(by))
    assert leaving(s) == pytest.approx([*flat[:2], sense * np.sin(np.radians(by))], **EXACT)


def test_a_periscope_by_aim(standing):
    s = standing(
        MIRROR + "turn: up 90}\n"
        "  N: {kind: mirror, after: M, distance: 150, aim: [600, 700, 250], size: [40, 40],"
        " metal: gold}\n"
        "  T: {kind: target, after: N, distance: 80}\n"
    )
    assert s.at("N") == pytest.approx([400, 450, 250], **EXACT)
    away = np.array([200, 250, 0]) / np.hypot(200, 250)
    assert s.at("T") == pytest.approx(s.at("N") + 80 * away, **EXACT)


@pytest.mark.parametrize(
    ("aim", "point"),
    [("[700, 800]", (700, 800, 100)), ("[700, 800, 40]", (700, 800, 40)), ("P", (250, 700, 130))],
)
def test_aim_reflects_to_a_point_with_its_height(standing, aim, point):
    p = "  P: {kind: target, at: [250, 700, 130], facing: 270}\n"
    s = standing(MIRROR + f"aim: {aim}}}\n" + T + p)
    towards = np.array(point) - s.at("M")
    assert leaving(s) == pytest.approx(towards / np.linalg.norm(towards), **EXACT)


@pytest.mark.parametrize(("side", "sense"), [("left", 1), ("right", -1)])
def test_incidence_reflects_to_its_side(standing, side, sense):
    s = standing(MIRROR + f"incidence: 30, side: {side}}}\n" + T, heading=10)
    assert leaving(s) == pytest.approx(heading(10 + sense * 120), **EXACT)
    assert s.facing("M") == pytest.approx(((10 + 180 - sense * 30) % 360, 0), abs=1e-9)


def test_brewster_takes_its_own_glass_at_the_wavelength_in_hand(standing):
    s = standing(
        "  W: {kind: window, after: laser, distance: 100, incidence: brewster,"
        " glass: {index: 1.5}, size: [40, 40]}\n"
    )
    assert s.facing("W") == pytest.approx((180 - np.degrees(np.arctan(1.5)), 0), abs=1e-9)


def test_facing_an_angle_a_name_and_a_point(standing):
    s = standing(
        "  A: {kind: target, at: [400, 300], facing: 33}\n"
        "  B: {kind: target, at: [400, 400], facing: A}\n"
        "  C: {kind: target, at: [400, 400], facing: [500, 500]}\n"
        "  D: {kind: target, at: [400, 400, 150], facing: laser}\n"
        "  E: {kind: window, after: laser, distance: 100, size: [9, 9], facing: 170}\n"
    )
    assert s.facing("A") == pytest.approx((33, 0), abs=1e-9)
    assert s.facing("B") == pytest.approx((270, 0), abs=1e-9)
    assert s.facing("C") == pytest.approx((45, 0), abs=1e-9)
    towards = np.array([100, 450, 100]) - [400, 400, 150]
    assert s.axes("D")[0] == pytest.approx(towards / np.linalg.norm(towards), **EXACT)
    assert s.facing("E") == pytest.approx((170, 0), abs=1e-9)


def test_without_a_word_it_is_met_squarely(standing):
    s = standing("  W: {kind: window, after: laser, distance: 100, size: [9, 9]}\n", heading=65)
    assert s.facing("W") == pytest.approx((245, 0), abs=1e-9)


def test_on_a_vertical_beam_everything_stands_squarely(standing):
    s = standing(
        MIRROR + "turn: up 90}\n"
        "  W: {kind: window, after: M, distance: 50, size: [20, 20]}\n"
        "  T: {kind: target, after: W, distance: 50}\n"
    )
    for name in ("W", "T"):
        assert s.axes(name)[0] == pytest.approx([0, 0, -1], **EXACT)
    assert s.at("T") == pytest.approx([400, 450, 100 + 50 + 5 + 50], **EXACT)


@pytest.mark.parametrize("by", ["turn: left 90", "incidence: 45"])
def test_pitch_tilts_the_front_up(standing, by):
    s = standing(MIRROR + by + ", pitch: 2}\n" + T)
    assert s.facing("M") == pytest.approx((135, 2), abs=1e-9)
    # Yaw 45 and pitch 2 of a +x beam: (0.001218, 0.998782, 0.049325).
    assert leaving(s) == pytest.approx([0.001218, 0.998782, 0.049325], abs=5e-7)


def test_twenty_folds_stay_on_the_intended_line(standing):
    """The traced chief ray meets every mirror where it was meant to, to 1e-9 mm."""
    from tests.tracing.bench import Bench

    rows = []
    before = "laser"
    for i in range(20):
        way = "left" if i % 4 in (0, 1) else "right"
        length = 150 if i % 2 else 40
        rows.append(
            f"  M{i}: {{kind: mirror, after: {before}, distance: {length}, turn: {way} 90,"
            " size: [10, 10], reflectance: 100 %, mount: none,"
            " thickness: 1}\n"
        )
        before = f"M{i}"
    head = (
        "bench: {size: [3000, 3000]}\nsources:\n"
        "  laser: {wavelength: 633, power: 1 W, beam: {waist_radius: 0.5}, at: [300, 300],"
        " heading: 0, body: none}\nelements:\n"
    )
    text = head + "".join(rows) + f"  T: {{kind: target, after: {before}, distance: 77}}\n"
    s = standing(text, whole=True)
    bench = Bench(text, floor=1e-4)
    for i in range(20):
        beam = bench.from_(f"M{i}.front", "reflected")[0]
        assert beam.start == pytest.approx(s.at(f"M{i}"), **EXACT)
    assert bench.reaching("T")[0].end == pytest.approx(s.at("T"), **EXACT)


def test_twenty_oblique_folds_and_tilted_plates(standing):
    from tests.tracing.bench import Bench

    rows = []
    before = "laser"
    for i in range(20):
        # A spiral that opens, so that no leg meets an earlier mirror.
        rows.append(
            f"  M{i}: {{kind: mirror, after: {before}, distance: {60 + 30 * i}, turn: left 88,"
            f" pitch: {0.1 if i % 2 else -0.1}, size: [10, 10], reflectance: 100 %, mount: none,"
            " thickness: 1}\n"
        )
        before = f"M{i}"
        if i % 5 == 2:
            rows.append(
                f"  W{i}: {{kind: window, after: {before}, distance: 25, incidence: 30,"
                " size: [10, 10], thickness: 2, wedge: 0.5, wedge_towards: up, mount: none}\n"
            )
            before = f"W{i}"
    head = (
        "bench: {size: [3000, 3000]}\nsources:\n"
        "  laser: {wavelength: 633, power: 1 W, beam: {waist_radius: 0.1}, at: [1500, 1500],"
        " heading: 0, body: none}\nelements:\n"
    )
    text = head + "".join(rows)
    s = standing(text, whole=True)
    bench = Bench(text, floor=1e-1)
    for i in range(20):
        beam = bench.from_(f"M{i}.front", "reflected")[0]
        assert beam.start == pytest.approx(s.at(f"M{i}"), **EXACT)
    assert np.ptp([s.at(f"M{i}")[2] for i in range(20)]) > 1, "it climbs and falls on the way"
