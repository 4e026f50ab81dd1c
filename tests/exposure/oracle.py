"""The tables of exposure limits once more, written apart from the program.

Plain data (rows of from, to, number) instead of branches, put down from notes of the 2014
edition and never from the program's code, so that a slip in one of the two shows. It knows
neither units of the tables nor sources: doses in J/m2 and energies in J alone. Single
exposures, trains, classes' limits. Every interval is [from, to).
"""

import math
from bisect import bisect_right

INF = math.inf


def step(rows, x):
    """Value of the row that x lies in: rows of (from, value), ascending."""
    value = rows[bisect_right([r[0] for r in rows], x) - 1][1]
    return value(x) if callable(value) else value


C3_ROWS = [(400, 1.0), (450, lambda wl: 10 ** (0.02 * (wl - 450)))]
C4_ROWS = [(400, 1.0), (700, lambda wl: 10 ** (0.002 * (wl - 700))), (1050, 5.0)]
C7_ROWS = [
    (400, 1.0),
    (1150, lambda wl: 10 ** (0.018 * (wl - 1150))),
    (1200, lambda wl: 8 + 10 ** (0.04 * (wl - 1250))),
]
C2_ROWS = [(180, 30.0), (302.5, lambda wl: 10 ** (0.2 * (wl - 295)))]
TI_ROWS = [(400, 5e-6), (1050, 13e-6), (1400, 1e-3), (1500, 10.0), (1800, 1e-3), (2600, 1e-7)]
ALPHA_MAX_ROWS = [(0, 5.0), (625e-6, lambda t: 200 * math.sqrt(t)), (0.25, 100.0)]
GAMMA_ROWS = [(0, 11.0), (100, lambda t: 1.1 * math.sqrt(t)), (1e4, 110.0)]


def c6(alpha, t):
    return 1.0 if alpha <= 1.5 else min(alpha, step(ALPHA_MAX_ROWS, t)) / 1.5


def t2(alpha):
    if alpha <= 1.5:
        return 10.0
    return 100.0 if alpha > 100 else 10 * 10 ** ((alpha - 1.5) / 98.5)


# Power of t that a row's dose follows: a row is (from s, number, power).
UV_A = [(0, 3e10, 1), (1e-9, 5600, 0.25), (10, 1e4, 0), (1e3, 10, 1)]
IR = {
    1400: [(0, 1e12, 1), (1e-9, 1e3, 0), (1e-3, 5600, 0.25), (10, 1000, 1)],
    1500: [(0, 1e13, 1), (1e-9, 1e4, 0), (10, 1000, 1)],
    1800: [(0, 1e12, 1), (1e-9, 1e3, 0), (1e-3, 5600, 0.25), (10, 1000, 1)],
    2600: [(0, 1e11, 1), (1e-9, 100, 0), (1e-7, 5600, 0.25), (10, 1000, 1)],
}
NEAR = [(0, 1e-3, 0), (1e-11, 2e-3, 0), (5e-6, 18, 0.75)]
FAR = [(0, 1e-2, 0), (1e-11, 2e-2, 0), (13e-6, 90, 0.75)]
SKIN = [(0, 2e11, 1), (1e-9, 200, 0), (1e-7, 1.1e4, 0.25), (10, 2000, 1)]


def power_row(rows, t):
    _, number, power = rows[bisect_right([r[0] for r in rows], t) - 1]
    return number * t**power


def ultraviolet(wl, t):
    if wl >= 315:
        return power_row(UV_A, t)
    if t < 1e-9:
        return 3e10 * t
    dose = step(C2_ROWS, wl)
    if wl >= 302.5 and t < 10 and t <= 1e-15 * 10 ** (0.8 * (wl - 295)):  # T1
        return 5600 * t**0.25
    return dose


def infrared(wl, t):
    return power_row(IR[max(edge for edge in IR if edge <= wl)], t)


def skin(wl, t):
    if wl < 400:
        return ultraviolet(wl, t)
    return infrared(wl, t) if wl >= 1400 else power_row(SKIN, t) * step(C4_ROWS, wl)


def thermal(wl, t, alpha=1.5):
    four, seven = step(C4_ROWS, wl), step(C7_ROWS, wl)
    if t < 10:
        return power_row(NEAR, t) * four * c6(alpha, t) if wl < 1050 else (
            power_row(FAR, t) * seven * c6(alpha, t)
        )  # fmt: skip
    if alpha <= 1.5:
        return 10 * four * seven * t
    whole = 18 * four * seven * c6(alpha, t)
    return whole * t**0.75 if t <= t2(alpha) else whole * t2(alpha) ** -0.25 * t


def blue(wl, t, alpha=1.5):
    first = 1 if wl < 484 and 1.5 < alpha <= 82 else 10
    if not 400 <= wl < 600 or t < first:
        return INF
    return step(C3_ROWS, wl) * (100 if t < 100 else t)


def eye(wl, t, alpha=1.5):
    if wl < 400:
        return ultraviolet(wl, t)
    if wl >= 1400:
        return infrared(wl, t)
    front = skin(wl, t) if wl >= 1250 else INF
    return min(thermal(wl, t, alpha), blue(wl, t, alpha), front)


def eye_aperture(wl, t):
    if wl < 400:
        return 1.0
    if wl < 1400:
        return 7.0
    if wl >= 1e5:
        return 11.0
    return 1.0 if t <= 0.35 else 3.5 if t >= 10 else 1.5 * t ** (3 / 8)


# ---------------------------------------------------------------- trains


def factor_c5(count, pulse, wl, whole, alpha):
    if alpha > 100:
        return 1.0
    if pulse <= step(TI_ROWS, wl):
        if whole <= 0.25 or count <= 600:
            return 1.0
        return min(1.0, max(0.4, 5 * count**-0.25))
    if alpha <= 5:
        return 1.0
    moderate = alpha <= step(ALPHA_MAX_ROWS, pulse)
    return max(0.4 if moderate else 0.2, min(1.0, count**-0.25))


def count_in(rate, t):
    """Pulses that can begin in a time that is open at its end; at least one."""
    return max(1, math.ceil(rate * t - 1e-9 * rate * t))


def train(wl, whole, pulse, rate, alpha=1.5, *, dose=eye, heat=thermal):
    """Most that one pulse may carry; the shorter groups one by one."""

    def of(t):
        return dose(wl, t, alpha) if dose is eye else dose(wl, t)

    least = min(of(pulse), of(whole) / count_in(rate, whole))
    if heat is None or not 400 <= wl < 1400:
        return least
    if pulse <= 0.25:
        ti, counted = step(TI_ROWS, wl), min(whole, t2(alpha))
        if rate * ti > 1 and whole > ti:
            share = heat(wl, ti, alpha) / (rate * ti)
            least = min(least, share * factor_c5(max(1, counted / ti), ti, wl, whole, alpha))
        else:
            factor = factor_c5(count_in(rate, counted), pulse, wl, whole, alpha)
            least = min(least, heat(wl, pulse, alpha) * factor)
    if alpha > 5:
        for n in range(1, count_in(rate, whole) + 1):
            lasts = (n - 1) / rate + pulse
            if lasts <= whole:
                least = min(least, of(lasts) / n)
    return least


# ---------------------------------------------------------------- classes

AEL_IR = {
    1: {
        1400: [(0, 8e5, 1), (1e-9, 8e-4, 0), (1e-3, 4.4e-3, 0.25), (0.35, 1e-2, 1)],
        1500: [(0, 8e6, 1), (1e-9, 8e-3, 0), (0.35, 1.8e-2, 0.75), (10, 1e-2, 1)],
        1800: [(0, 8e5, 1), (1e-9, 8e-4, 0), (1e-3, 4.4e-3, 0.25), (0.35, 1e-2, 1)],
        2600: [(0, 8e4, 1), (1e-9, 8e-5, 0), (1e-7, 4.4e-3, 0.25), (0.35, 1e-2, 1)],
    },
    5: {
        1400: [(0, 4e6, 1), (1e-9, 4e-3, 0), (1e-3, 2.2e-2, 0.25), (0.35, 5e-2, 1)],
        1500: [(0, 4e7, 1), (1e-9, 4e-2, 0), (0.35, 9e-2, 0.75), (10, 5e-2, 1)],
        1800: [(0, 4e6, 1), (1e-9, 4e-3, 0), (1e-3, 2.2e-2, 0.25), (0.35, 5e-2, 1)],
        2600: [(0, 4e5, 1), (1e-9, 4e-4, 0), (1e-7, 2.2e-2, 0.25), (0.35, 5e-2, 1)],
    },
}
AEL_UV_A = {
    1: [(0, 2.4e4, 1), (1e-9, 7.9e-7 * 5600, 0.25), (10, 7.9e-3, 0), (1e3, 7.9e-6, 1)],
    5: [(0, 1.2e5, 1), (1e-9, 4e-6 * 5600, 0.25), (10, 4e-2, 0), (1e3, 4e-5, 1)],
}
AEL_NEAR = {
    1: [(0, 3.8e-8, 0), (1e-11, 7.7e-8, 0), (5e-6, 7e-4, 0.75)],
    5: [(0, 1.9e-7, 0), (1e-11, 3.8e-7, 0), (5e-6, 3.5e-3, 0.75)],
}
AEL_FAR = {
    1: [(0, 3.8e-7, 0), (1e-11, 7.7e-7, 0), (13e-6, 3.5e-3, 0.75)],
    5: [(0, 1.9e-6, 0), (1e-11, 3.8e-6, 0), (13e-6, 1.8e-2, 0.75)],
}


def ael_thermal(times, wl, t, alpha):
    four, seven = step(C4_ROWS, wl), step(C7_ROWS, wl)
    if t < 10:
        if wl < 1050:
            return power_row(AEL_NEAR[times], t) * four * c6(alpha, t)
        return power_row(AEL_FAR[times], t) * seven * c6(alpha, t)
    if alpha <= 1.5:
        return (3.9e-4 if times == 1 else 2e-3) * four * seven * t
    whole = (7e-4 if times == 1 else 3.5e-3) * four * c6(alpha, t) * seven
    return whole * (t**0.75 if t <= t2(alpha) else t2(alpha) ** -0.25 * t)


def ael_outside(times, wl, t):
    """Classes 1 and 3R where light does not reach the retina."""
    if wl < 315:
        if t < 1e-9:
            return (2.4e4 if times == 1 else 1.2e5) * t
        if wl < 302.5:
            return 2.4e-5 if times == 1 else None
        return (7.9e-7 if times == 1 else 4e-6) * ultraviolet(wl, t)
    if wl < 400:
        return power_row(AEL_UV_A[times], t)
    if wl >= 4000:
        return times * infrared(wl, t) * math.pi / 4e6 * eye_aperture(wl, t) ** 2
    return power_row(AEL_IR[times][max(edge for edge in AEL_IR[times] if edge <= wl)], t)


def ael_3b(wl, t):
    if wl < 302.5:
        rows = [(0, 3.8e5, 1), (1e-9, 3.8e-4, 0), (0.25, 1.5e-3, 1)]
    elif wl < 315:
        two = step(C2_ROWS, wl)
        rows = [(0, 1.25e4 * two, 1), (1e-9, 1.25e-5 * two, 0), (0.25, 5e-5 * two, 1)]
    elif wl < 400 or wl >= 1400:
        rows = [(0, 1.25e8, 1), (1e-9, 0.125, 0), (0.25, 0.5, 1)]
    elif wl < 1050:
        four = step(C4_ROWS, wl)
        rows = [(0, 3e7 * four, 1), (1e-9, 0.03 * four, 0), (0.06 * four, 0.5, 1)]
    else:
        rows = [(0, 1.5e8, 1), (1e-9, 0.15, 0), (0.25, 0.5, 1)]
    return power_row(rows, t)


def ael(level, wl, t, alpha=1.5):
    """Energy in J that a class allows in a time; None where there is no such class."""
    if level == "3B":
        return ael_3b(wl, t)
    if level == "2":
        if not 400 <= wl < 700:
            return None
        return ael("1", wl, t, alpha) if t < 0.25 else 1e-3 * c6(alpha, t) * t
    times = 1 if level == "1" else 5
    if not 400 <= wl < 1400:
        return None if level == "3R" and wl < 302.5 else ael_outside(times, wl, t)
    if level == "3R" and wl < 700 and t >= 0.25:
        return 5e-3 * c6(alpha, t) * t
    least = ael_thermal(times, wl, t, alpha)
    if level == "1" and wl < 600 and t >= (1 if wl < 484 and 1.5 < alpha <= 82 else 10):
        least = min(least, step(C3_ROWS, wl) * (3.9e-3 if t < 100 else 3.9e-5 * t))
    return min(least, ael_3b(wl, t)) if wl >= 1250 else least
