"""Beams of the ultraviolet and elliptical ones: width and area by Gaussian integrals of our own.

The share of a beam that a circle takes is integrated over polar coordinates of the circle, which
nothing in benchlay does.
"""

import math

import numpy as np
import pytest
import shapely
from scipy.optimize import brentq
from traced import area_of, traced

from benchlay.zones import zones_of

_R, _WR = np.polynomial.legendre.leggauss(60)
_T = 2.0 * np.pi * np.arange(300) / 300
_START = 100.0

# 266 nm over 30 000 s: 30 J/m2, so 1 mW/m2 through 1 mm; 532 nm: 10 W/m2 through 7 mm
# (ICNIRP 2013).
UV = (266, 5e-3, 1e-3, 0.5)
GREEN = (532, 0.15, 10.0, 3.5)
CASES = {
    "uv, waist at the exit": (UV, (0.4, 0.4), (0.0, 0.0), 3000.0),
    "uv, waist in the middle": (UV, (0.4, 0.4), (300.0, 300.0), 600.0),
    "uv, wide in plan": (UV, (1.2, 0.3), (0.0, 0.0), 2000.0),
    "green, wide in plan": (GREEN, (0.05, 1.0), (0.0, 0.0), 3000.0),
    "green, tall": (GREEN, (1.0, 0.05), (0.0, 0.0), 3000.0),
    "green, two waists": (GREEN, (0.6, 0.4), (1500.0, 200.0), 2500.0),
}


def bench(line, waists, ahead, length):
    nm, power, _, _ = line
    return f"""
    bench: {{size: [4000, 600], medium: vacuum}}
    sources:
      s:
        wavelength: {nm}
        power: {power} W
        beam: {{waist_radius_h: {waists[0]}, waist_radius_v: {waists[1]},
               waist_ahead_h: {ahead[0]}, waist_ahead_v: {ahead[1]}}}
        at: [{_START}, 300]
        heading: 0
        body: none
    elements:
      D: {{kind: dump, at: [{_START + length}, 300], facing: 180, opening: 60, returns: 0}}
    """


def radii(line, waists, ahead, z):
    return [
        w * math.hypot(1.0, (z - a) * line[0] * 1e-6 / (math.pi * w * w))
        for w, a in zip(waists, ahead, strict=True)
    ]


def taken_w(line, wide, aside):
    """Power through a circle whose centre is `aside` beside the axis."""
    _, power, _, a = line
    r, weight = 0.5 * a * (_R + 1.0), 0.5 * a * _WR
    x = aside + r[:, None] * np.cos(_T)
    y = r[:, None] * np.sin(_T)
    density = np.exp(-2.0 * (x / wide[0]) ** 2 - 2.0 * (y / wide[1]) ** 2)
    mean = density.mean(axis=1) * 2.0 * math.pi
    return 2.0 * power / (math.pi * wide[0] * wide[1]) * float((mean * r * weight).sum())


def half_mm(line, wide):
    limit = line[2] * math.pi * (line[3] * 1e-3) ** 2
    if taken_w(line, wide, 0.0) <= limit:
        return 0.0
    return brentq(lambda d: taken_w(line, wide, d) - limit, 0.0, 20.0 * max(*wide, line[3]))


@pytest.mark.parametrize("name", CASES)
def test_their_area_is_that_of_the_integral(name):
    line, waists, ahead, length = CASES[name]
    z = (np.arange(200) + 0.5) * length / 200
    halves = [half_mm(line, radii(line, waists, ahead, at)) for at in z]
    area = area_of(zones_of(traced(bench(*CASES[name]))), "direct").area
    assert area == pytest.approx(2.0 * sum(halves) * length / 200, rel=2e-3)


@pytest.mark.parametrize("name", CASES)
def test_an_eye_beside_them_is_in_the_zone_where_its_pupil_takes_too_much(name):
    line, waists, ahead, length = CASES[name]
    zone = area_of(zones_of(traced(bench(*CASES[name]))), "direct")
    limit = line[2] * math.pi * (line[3] * 1e-3) ** 2
    seen = set()
    for z in np.linspace(0.07, 0.93, 9) * length:
        wide = radii(line, waists, ahead, z)
        edge = half_mm(line, wide)
        for aside in (0.3 * edge, edge - 0.02, edge + 0.02, 1.5 * edge + 1.0):
            too_much = taken_w(line, wide, aside) > limit
            for side in (-1.0, 1.0):
                point = shapely.Point(_START + z, 300.0 + side * aside)
                assert zone.contains(point) == too_much, (z, aside)
            seen.add(too_much)
    assert seen == {True, False}
