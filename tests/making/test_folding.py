"""Bend allowances against tables of the trade, worked by hand."""

from math import log10, pi

import pytest

from benchlay.making.folding import Folded, k_factor


def test_a_flat_length_by_hand():
    # Flange 20 and sheet 100 over the outer faces, 2 mm thick, inner radius 2: straight parts
    # 16 and 96, neutral fibre at 0.33 of the thickness.
    fold = Folded(20.0, "in", 2.0, 2.0)
    assert fold.allowance_mm == pytest.approx(pi / 2 * 2.66)
    assert 100.0 + fold.shift_mm == pytest.approx(16.0 + 96.0 + pi / 2 * 2.66)
    assert fold.line_mm == pytest.approx(16.0 + pi / 4 * 2.66)


@pytest.mark.parametrize(
    ("radius", "thickness", "k"),
    [
        (0.5, 2.0, 0.33),
        (2.0, 2.0, 0.33),
        (4.0, 2.0, 0.33 + 0.25 * log10(2)),
        (10.0, 2.0, 0.5),
    ],
)
def test_where_the_neutral_fibre_lies(radius, thickness, k):
    assert k_factor(radius, thickness) == pytest.approx(k)


def test_a_wide_bend_is_bent_in_its_middle():
    # With k = 1/2 the allowance is a quarter of the circle through the sheet's middle.
    fold = Folded(60.0, "out", 20.0, 1.0)
    assert fold.allowance_mm == pytest.approx(2 * pi * 20.5 / 4)
