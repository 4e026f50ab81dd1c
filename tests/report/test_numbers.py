"""The digits that are printed."""

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from benchlay.report.numbers import decimals_of, rounded, settled, shown

FINITE = st.floats(allow_nan=False, allow_infinity=False)


@given(FINITE)
def test_rounding_keeps_eleven_digits_and_is_settled(value):
    once = rounded(value)
    assert math.isclose(once, value, rel_tol=1e-11, abs_tol=0.0) or abs(value) < 1e-300
    assert rounded(once) == once


@given(st.floats(min_value=1e-6, max_value=1e6))
def test_the_last_bits_do_not_show(value):
    # A value that sits on the edge of two roundings may fall to either side; any other
    # prints alike. The edge is 1e-15 wide in a step of 1e-12, so ask for one step at most.
    step = 10.0 ** (math.floor(math.log10(value)) - 11)
    assert abs(rounded(value) - rounded(math.nextafter(value, math.inf))) <= 1.01 * step


def test_no_negative_zero():
    assert math.copysign(1.0, rounded(-0.0)) == 1.0
    assert math.copysign(1.0, rounded(-1e-15, 9)) == 1.0


@pytest.mark.parametrize("value", [math.nan, math.inf, -math.inf, np.float64("nan")])
def test_what_is_no_number_is_null(value):
    assert rounded(value) is None
    assert shown(value, "W") == "-"


@pytest.mark.parametrize(
    ("key", "decimals"),
    [("start", 9), ("path_mm", 9), ("direction", 12), ("angle_deg", 9), ("power_W", None),
     ("peak_irradiance_end_W_cm2", None), ("mpe_W_m2", None), ("area_m2", None)],
)  # fmt: skip
def test_only_lengths_angles_and_directions_have_a_floor(key, decimals):
    assert decimals_of(key) == decimals


def test_a_difference_that_is_noise_is_nothing():
    assert settled(-3e-17, 0.15) == 0.0
    assert settled(2e-12, 1.0) == 2e-12
