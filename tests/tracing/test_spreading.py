import numpy as np
import pytest

from benchlay.tracing.spreading import growth, perspective, perspective_plate


def test_growth_is_the_slope_of_the_radius_over_the_radius():
    # w = hypot(1, z / 500) along e1 and e2, in a medium of index 1.5: z counts as z / 1.5.
    xx, uu = 0.25, 0.25 / 500.0**2
    m = np.array([xx, 0, xx, 0, 0, 0, 0, uu, 0, uu])[:, None]
    z = 300.0
    w = np.hypot(1.0, z / 1.5 / 500)
    expected = z / (1.5 * 500) ** 2 / w**2
    assert growth(m, np.array([1.5]), np.array([z]))[0] == pytest.approx(expected, rel=1e-12)


def test_a_circle_aslant_is_seen_as_the_ellipse_through_its_points():
    centre, first, second = np.array([[0.4, -0.2], [1, 0]]), np.array([[0.7, 0.1]] * 2), None
    second = np.array([[-0.1, 0.9], [0.2, 0.5]])
    of_centre, p, q = np.array([0.1, -0.2]), np.array([0.15, 0.0]), np.array([-0.2, 0.1])
    _, c, a, b = perspective_plate(centre, first, second, (of_centre, p, q))
    t = np.linspace(0, 2 * np.pi, 7)[:, None, None]
    seen = (centre + np.cos(t) * first + np.sin(t) * second) / (
        1 + of_centre + np.cos(t[..., 0]) * p + np.sin(t[..., 0]) * q
    )[..., None]
    for i in range(2):
        inverse = np.linalg.inv(np.stack((a[i], b[i]), axis=1))
        on_circle = (seen[:, i] - c[i]) @ inverse.T
        assert np.hypot(*on_circle.T) == pytest.approx(1.0, rel=1e-12)


def test_square_to_the_beam_nothing_changes():
    centre, first, second = (np.array([v]) for v in ([0.4, -0.2], [0.7, 0.1], [-0.1, 0.9]))
    none = np.zeros(1)
    corners, c, a, b = perspective_plate(centre, first, second, (none, none, none))
    assert (c == centre).all()
    assert (a == first).all()
    assert (b == second).all()
    assert corners[0, 2] == pytest.approx((centre + first + second)[0])


def test_corners_are_drawn_in_only_where_the_tangent_still_tells():
    square = np.array([[[1.0, 0.0], [0.0, 1.0], [-1.0, 0.0]]] * 2)
    seen = perspective(square, np.array([[0.25, 0.0, -0.2], [0.25, 0.0, -0.9]]))
    assert seen[0].tolist() == [[0.8, 0.0], [0.0, 1.0], [-1.25, 0.0]]
    assert (seen[1] == square[1]).all()
