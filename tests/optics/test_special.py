import mpmath
import numpy as np
import pytest
from scipy.stats import ncx2

from benchlay.optics.special import circle_share


def by_mpmath(w1, w2, a, o1, o2):
    """Chords of the opening by erf at 30 digits, Gauss-Legendre over arcsin of the chord."""
    with mpmath.workdps(30):
        root2 = mpmath.sqrt(2)

        def chord(t):
            x, half = o1 + a * mpmath.sin(t), a * mpmath.cos(t)
            strip = mpmath.erf(root2 * (o2 + half) / w2) - mpmath.erf(root2 * (o2 - half) / w2)
            return mpmath.exp(-2 * (x / w1) ** 2) * strip * half

        scale = mpmath.sqrt(2 / mpmath.pi) / w1 / 2
        limits = mpmath.linspace(-mpmath.pi / 2, mpmath.pi / 2, 9)
        return float(scale * mpmath.quad(chord, limits))


def test_round_and_central_keeps_all_digits_of_a_pinhole():
    a = np.array([1e-9, 1e-3, 1.0, 3.0])
    np.testing.assert_allclose(circle_share(2.0, 2.0, a), -np.expm1(-a * a / 2), rtol=1e-15)


# Gaussian beam, decentred: 2-D quadrature, `physics.md` figures checked below by ncx2.
@pytest.mark.parametrize(
    ("a", "w", "d", "expected"),
    [(5, 5, 2.5, 0.730988), (2, 1, 1, 0.965865), (1, 1, 2, 0.0147235)],
)
def test_decentred_round(a, w, d, expected):
    share = circle_share(w, w, a, 0.6 * d, -0.8 * d)
    assert share == pytest.approx(expected, rel=5e-6)
    assert share == pytest.approx(ncx2.cdf((2 * a / w) ** 2, 2, (2 * d / w) ** 2), rel=1e-9)


@pytest.mark.parametrize(
    "case",
    [
        (2.0, 1.0, 3.0, 1.0, 0.5),
        (1.0, 4.0, 2.0, 0.0, 0.0),
        (1.0, 1.2, 0.5, 3.0, 0.4),
        (1.0, 1.0, 1e-3, 1.5, 0.0),
        (1.0, 3.0, 0.25, -2.9, 0.7),
        (0.5, 5.0, 6.0, 5.9, 0.0),
        (8.0, 10.0, 0.01, 0.01, 0.0),
        (1.0, 1.001, 1.2, 0.0, 0.0),
        (1.9, 1.0, 1e-3, 0.0, 0.0),
        (2.0, 1.0, 3.5, 0.0, 0.0),
        (1.0, 1.1, 1.0, 3.2, 0.0),
    ],
)
def test_elliptical_against_high_precision(case):
    assert circle_share(*case) == pytest.approx(by_mpmath(*case), rel=1e-9)


def test_broadcasts_and_takes_scalars_and_nothing():
    assert circle_share(1.0, 2.0, np.ones((3, 1)), np.zeros(4)).shape == (3, 4)
    assert circle_share(1.0, 2.0, 1.0).shape == ()
    assert circle_share([], [], []).shape == (0,)


def test_bad_rows_are_nan_and_leave_the_others_alone():
    share = circle_share([1.0, 0.0, 1.0, np.nan, 1.0], 2.0, [1.0, 1.0, -1.0, 1.0, np.inf])
    np.testing.assert_array_equal(np.isnan(share), [False, True, True, True, False])
    assert share[4] == 1.0


def test_a_closed_opening_passes_nothing():
    np.testing.assert_array_equal(circle_share(1.0, [1.0, 2.0], 0.0, [0.0, 0.3]), [0.0, 0.0])
