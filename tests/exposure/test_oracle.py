"""The program's tables against those of `oracle`, over the whole range and at every edge."""

import itertools
import math
import random

import numpy as np
import pytest

from benchlay.exposure import factors
from benchlay.exposure.apertures import eye_aperture_mm, skin_aperture_mm
from benchlay.exposure.emission import Level, emission_limit
from benchlay.exposure.limits import eye_limit, eye_thermal_limit_j_m2, skin_limit
from benchlay.exposure.trains import Train, eye_pulse_limit_j_m2, eye_rules, skin_pulse_limit_j_m2
from tests.exposure import oracle

# Both sides reckon in doubles, by other orders of the same few products and powers.
SAME = 1e-12

EDGES_NM = (
    180, 302.5, 315, 400, 450, 484, 500, 600, 700, 1050, 1150, 1200, 1250, 1400, 1500,
    1800, 2600, 4000, 1e5, 1e6,
)  # fmt: skip
EDGES_S = (
    1e-13, 1e-11, 1e-9, 1e-7, 5e-6, 13e-6, 625e-6, 1e-3, 0.06, 0.25, 0.3, 0.35, 1, 10,
    100, 1e3, 1e4, 3e4,
)  # fmt: skip
EDGES_MRAD = (0, 1.5, 5, 11, 50, 82, 100, 110)


def both_sides(edges, low, high):
    near = [f(float(e)) for e in edges for f in (below, float, above)]
    return sorted({x for x in near if low <= x <= high})


def below(x):
    return math.nextafter(x, -math.inf)


def above(x):
    return math.nextafter(x, math.inf)


NM = both_sides(EDGES_NM, 180.0, 1e6)
S = both_sides(EDGES_S, 1e-13, 3e4)
MRAD = both_sides(EDGES_MRAD, 0.0, 200.0)
# A boundary that lies a little off is seen a little off it.
BESIDE_S = sorted({*S, *(t * f for t in EDGES_S for f in (0.99, 1.01) if 1e-13 <= t * f <= 3e4)})
# Of the three axes together, the last point before each edge and the edge itself.
JUST_NM = [x for e in EDGES_NM for x in (below(e), float(e)) if 400.0 <= x < 1400.0]
JUST_S = [x for e in EDGES_S for x in (below(e), float(e)) if x >= 1e-13]
JUST_MRAD = [x for e in EDGES_MRAD for x in (float(e), above(e))]


def scattered(count, seed):
    dice = random.Random(seed)
    for _ in range(count):
        # The parts of the spectrum with the most rows get most of the points.
        low, high = dice.choice(((180, 400), (400, 1400), (400, 1400), (1400, 1e6)))
        yield (
            math.exp(dice.uniform(math.log(low), math.log(high * (1 - 1e-12)))),
            10 ** dice.uniform(-13, math.log10(3e4)),
            dice.choice((1.5, dice.uniform(0, 10), dice.uniform(10, 150))),
        )


POINTS = [
    *scattered(6000, 1),
    *itertools.product(NM, BESIDE_S, (1.5,)),
    *itertools.product(JUST_NM, JUST_S, JUST_MRAD),
]
WL, T, ALPHA = (np.array(column) for column in zip(*POINTS, strict=True))


def differences(found, expected):
    """List the points that differ, for a message that shows them."""
    expected = np.array(expected, dtype=float)
    far = ~np.isclose(found, expected, rtol=SAME, atol=0.0, equal_nan=True)
    return [(POINTS[i], found[i], expected[i]) for i in np.flatnonzero(far)][:10]


def test_eye_over_the_whole_range():
    found = eye_limit(WL, T, alpha_mrad=ALPHA).dose_j_m2
    assert differences(found, [oracle.eye(*p) for p in POINTS]) == []


def test_skin_over_the_whole_range():
    found = skin_limit(WL, T).dose_j_m2
    assert differences(found, [oracle.skin(wl, t) for wl, t, _ in POINTS]) == []


def test_heat_of_the_retina_alone():
    inside = (WL >= 400.0) & (WL < 1400.0)
    found = np.full(WL.shape, np.nan)
    found[inside] = eye_thermal_limit_j_m2.over(WL[inside], T[inside], alpha_mrad=ALPHA[inside])
    expected = [oracle.thermal(*p) if 400 <= p[0] < 1400 else math.nan for p in POINTS]
    assert differences(found, expected) == []


@pytest.mark.parametrize("level", list(Level))
def test_emission_of_every_class_over_the_whole_range(level):
    found = emission_limit(level, WL, T, alpha_mrad=ALPHA)
    energy = np.where(found.unit == "W", found.value * T, found.value)
    expected = [oracle.ael(str(level), *p) for p in POINTS]
    assert differences(energy, [math.nan if e is None else e for e in expected]) == []


def test_apertures_over_the_whole_range():
    found = eye_aperture_mm(WL, T)
    assert differences(found, [oracle.eye_aperture(wl, t) for wl, t, _ in POINTS]) == []
    assert differences(skin_aperture_mm(WL), np.where(WL < 1e5, 3.5, 11.0)) == []


@pytest.mark.parametrize(
    ("factor", "rows", "low", "high"),
    [
        (factors.c2_j_m2, oracle.C2_ROWS, 180, 315),
        (factors.c3, oracle.C3_ROWS, 400, 600),
        (factors.c4, oracle.C4_ROWS, 400, 1400),
        (factors.c7, oracle.C7_ROWS, 400, 1400),
        (factors.ti_s, oracle.TI_ROWS, 400, 1e6),
    ],
)
def test_factors_of_wavelength(factor, rows, low, high):
    at = [wl for wl in [*NM, *np.linspace(low, high, 301)] if low <= wl < high]
    expected = [oracle.step(rows, wl) for wl in at]
    np.testing.assert_allclose(factor(np.array(at)), expected, rtol=SAME)


@pytest.mark.parametrize(
    ("factor", "rows"),
    [
        (factors.alpha_max_mrad, oracle.ALPHA_MAX_ROWS),
        (factors.gamma_ph_mrad, oracle.GAMMA_ROWS),
    ],
)
def test_factors_of_time(factor, rows):
    expected = [oracle.step(rows, t) for t in BESIDE_S]
    np.testing.assert_allclose(factor(np.array(BESIDE_S)), expected, rtol=SAME)


def test_t2_and_c6_on_both_sides_of_their_angles():
    np.testing.assert_allclose(
        factors.t2_s(np.array(MRAD)), [oracle.t2(a) for a in MRAD], rtol=SAME
    )
    grid = np.array(list(itertools.product(MRAD, BESIDE_S)))
    expected = [oracle.c6(a, t) for a, t in grid]
    np.testing.assert_allclose(factors.c6(grid[:, 0], grid[:, 1]), expected, rtol=SAME)


COUNTS = both_sides((1, 40, 600, 625, 1e4, 15625, 1e6), 1.0, 1e7)


def test_c5_on_both_sides_of_its_counts_times_and_angles():
    pulses = [t for t in JUST_S if 1e-7 <= t <= 0.25]
    wholes = [below(0.25), 0.25, above(0.25), 100.0]
    grid = itertools.product(COUNTS, pulses, (400.0, below(1050.0), 1050.0), wholes, JUST_MRAD)
    for count, pulse, wl, whole, alpha in grid:
        found = factors.c5(count, pulse, wl, whole, alpha_mrad=alpha)
        assert found == pytest.approx(oracle.factor_c5(count, pulse, wl, whole, alpha), rel=SAME), (
            count,
            pulse,
            wl,
            whole,
            alpha,
        )


def trains(count, seed):
    """Trains whose every group of pulses the oracle can go through one by one."""
    dice = random.Random(seed)
    for wl, _, alpha in scattered(count, seed + 1):
        whole = 10 ** dice.uniform(-3, 4)
        pulse = 10 ** dice.uniform(-13, math.log10(whole) - 0.01)
        rate = 10 ** min(dice.uniform(-1, 10), math.log10(0.99 / pulse))
        most = 1000 if alpha > 5 and 400 <= wl < 1400 else math.inf
        yield wl, whole, pulse, min(rate, most / whole), alpha


def test_trains_to_the_eye():
    wl, whole, pulse, rate, alpha = (np.array(c) for c in zip(*trains(2000, 7), strict=True))
    found = eye_pulse_limit_j_m2(wl, whole, pulse, rate, alpha_mrad=alpha)
    expected = [oracle.train(*one) for one in zip(wl, whole, pulse, rate, alpha, strict=True)]
    np.testing.assert_allclose(found, expected, rtol=1e-9)


def test_trains_to_the_skin():
    for wl, whole, pulse, rate, _ in trains(1000, 9):
        found = skin_pulse_limit_j_m2(wl, whole, pulse, rate)
        expected = oracle.train(wl, whole, pulse, rate, dose=oracle.skin, heat=None)
        assert found == pytest.approx(expected, rel=SAME)


@pytest.mark.parametrize("wl", [532.0, 850.0, 1064.0])
@pytest.mark.parametrize("alpha", [1.5, 5.0, above(5.0), 50.0, 100.0, above(100.0)])
@pytest.mark.parametrize("whole", [below(0.25), 0.25, above(0.25), 10.0, 20.0])
def test_trains_on_both_sides_of_ti(wl, alpha, whole):
    ti = factors.ti_s(wl)
    for rate in (below(1 / ti), 1 / ti, above(1 / ti), 100.0):
        if alpha > 5.0 and rate > 100.0:
            continue  # more groups than can be gone through
        for pulse in (1e-9, below(ti), ti, above(ti)):
            if pulse * rate < 0.99:
                rules = eye_rules(wl, whole, Train(pulse, rate), alpha_mrad=alpha)
                expected = oracle.train(wl, whole, pulse, rate, alpha)
                assert min(r.per_pulse for r in rules) == pytest.approx(expected, rel=1e-9)
