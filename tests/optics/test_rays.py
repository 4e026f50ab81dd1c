import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from benchlay.optics import rays

angles = st.floats(-np.pi, np.pi)
pitches = st.floats(-np.pi / 2, np.pi / 2)
units = st.builds(rays.direction_from_angles, angles, pitches)
indices = st.floats(1.0, 4.0)


@given(units, units)
def test_reflecting_twice_returns(k, normal):
    once = rays.reflect(k, normal)
    assert once @ once == pytest.approx(1.0, abs=1e-14)
    assert rays.reflect(once, normal) == pytest.approx(k, abs=1e-14)
    assert rays.reflect(k, -normal) == pytest.approx(once, abs=1e-15)


# Derived values: worked out with the textbook formula apart from this program.
@pytest.mark.parametrize(
    ("incidence_deg", "expected_mrad"),
    [(0.0, 2.0000), (30.0, 1.7320), (45.0, 1.4142), (60.0, 1.0000)],
)
def test_pitched_mirror_lifts_a_level_beam_by_twice_the_cosine(incidence_deg, expected_mrad):
    normal = rays.direction_from_angles(np.pi - np.radians(incidence_deg), 1e-3)
    _, pitch = rays.angles_from_direction(rays.reflect([1.0, 0.0, 0.0], normal))
    assert 1e3 * pitch == pytest.approx(expected_mrad, abs=1e-4)


def test_pitched_mirror_turns_the_heading_too():  # derived value
    normal = rays.direction_from_angles(np.radians(-135.0), np.radians(2.0))
    out = rays.reflect([1.0, 0.0, 0.0], normal)
    assert out == pytest.approx([0.001218, -0.998782, 0.049325], abs=1e-6)
    incidence = np.degrees(np.arccos(-rays.dot(np.array([1.0, 0.0, 0.0]), normal)))
    assert incidence == pytest.approx(45.0349, abs=1e-4)


@given(units, units, indices, indices)
def test_snell_holds_and_the_way_back_is_the_same(k, normal, n_in, n_out):
    out, total = rays.refract(k, normal, n_in, n_out)
    sine_in, sine_out = rays.cross(k, normal), rays.cross(out, normal)
    if total:
        assert np.isnan(out).all()
        assert n_in * np.linalg.norm(sine_in) > n_out
        return
    assert out @ out == pytest.approx(1.0, abs=1e-13)
    assert n_out * sine_out == pytest.approx(n_in * sine_in, abs=1e-13)
    assert (out @ normal) * (k @ normal) >= 0.0
    back, none = rays.refract(-out, normal, n_out, n_in)
    if not none:  # a ray along the face may be lost to rounding
        # Near grazing the angle is the root of a rounding error.
        assert back == pytest.approx(-k, abs=1e-7)


@given(units, units, indices)
def test_equal_media_change_no_direction(k, normal, n):
    out, total = rays.refract(k, normal, n, n)
    assert not total
    assert out == pytest.approx(k, abs=1e-15)


def test_total_reflection_begins_at_the_critical_angle():
    critical = np.arcsin(1.0 / 1.5)
    k = rays.direction_from_angles(critical + np.array([-1e-9, 1e-9]), 0.0)
    _, total = rays.refract(k, [1.0, 0.0, 0.0], 1.5, 1.0)
    assert total.tolist() == [False, True]


def test_one_bad_ray_does_not_spoil_the_others():
    k = np.array([[1.0, 0.0, 0.0], [np.nan, 0.0, 0.0]])
    out, total = rays.refract(k, [-1.0, 0.0, 0.0], 1.0, 1.5)
    assert out[0].tolist() == [1.0, 0.0, 0.0]
    assert np.isnan(out[1]).all()
    assert not total.any()


# Derived values: 6 mm of index 1.5168 met at 45 degrees.
def test_plate_shifts_and_spreads_ghosts():
    k = rays.direction_from_angles(np.pi / 4, 0.0)
    inside, _ = rays.refract(k, [1.0, 0.0, 0.0], 1.0, 1.5168)
    path = 6.0 / inside[0] * inside
    assert np.linalg.norm(rays.cross(path, k)) == pytest.approx(2.006996, abs=1e-6)
    spacing = 2.0 * path[1] * np.cos(np.pi / 4)
    assert spacing == pytest.approx(4.471289, abs=1e-6)


# Derived values: faces 30 arcmin apart, index 1.51509, normal incidence.
def test_wedge_and_its_ghost():
    alpha = np.radians(0.5)
    first, second = [-1.0, 0.0, 0.0], rays.direction_from_angles(alpha, 0.0)
    k = np.array([1.0, 0.0, 0.0])
    main, _ = rays.refract(k, second, 1.51509, 1.0)
    folded = rays.reflect(rays.reflect(k, second), first)
    ghost, _ = rays.refract(folded, second, 1.51509, 1.0)
    headings = np.degrees(rays.angles_from_direction(np.array([main, ghost]))[0])
    assert abs(headings) == pytest.approx([0.257557, 1.772970], abs=2e-6)


def test_distance_is_signed_and_infinite_along_the_plane():
    k = np.array([[1.0, 0.0, 0.0], [-1.0, 0.0, 0.0], [0.0, 1.0, 0.0]])
    found = rays.distance_to_plane([1.0, 2.0, 3.0], k, [4.0, 0.0, 0.0], [2.0, 0.0, 0.0])
    assert found.tolist() == [3.0, -3.0, np.inf]
    within = rays.distance_to_plane([4.0, 0.0, 0.0], k[2], [4.0, 9.0, 0.0], k[0])
    assert within == np.inf


@given(units, units, units, units)
def test_distance_leads_onto_the_plane(start, k, point, normal):
    length = rays.distance_to_plane(start, k, point, normal)
    if np.isfinite(length) and abs(length) < 1e6:
        hit = start + length * k
        assert (hit - point) @ normal == pytest.approx(0.0, abs=1e-9)


@given(angles, st.floats(-1.57, 1.57))
def test_angles_return(heading, pitch):
    found = rays.angles_from_direction(rays.direction_from_angles(heading, pitch))
    assert np.cos(found[0] - heading) == pytest.approx(1.0, abs=1e-12)
    assert found[1] == pytest.approx(pitch, abs=1e-9)


def test_heading_has_no_negative_pi_nor_negative_zero():
    heading, pitch = rays.angles_from_direction([[-1.0, -0.0, -0.0], [1.0, -0.0, -0.0]])
    assert heading.tolist() == [np.pi, 0.0]
    assert not np.signbit(heading).any()
    assert not np.signbit(pitch).any()


@settings(max_examples=200)
@given(units)
def test_bench_basis_is_right_handed_level_and_upright(k):
    e1, e2 = rays.bench_basis(k)
    frame = np.array([e1, e2, k])
    assert frame @ frame.T == pytest.approx(np.eye(3), abs=1e-9)
    assert np.linalg.det(frame) == pytest.approx(1.0, abs=1e-9)
    if np.hypot(k[0], k[1]) > 1e-9:
        assert e1[2] == 0.0
        assert e2[2] >= 0.0


@pytest.mark.parametrize("way", [1.0, -1.0])
@pytest.mark.parametrize("noise", [0.0, 1e-16, -1e-12])
def test_vertical_beam_has_the_basis_of_heading_zero_whatever_its_rounding(way, noise):
    e1, e2 = rays.bench_basis([noise, 3.0 * noise, way])
    assert e1 == pytest.approx([0.0, 1.0, 0.0], abs=1e-11)
    assert e2 == pytest.approx([-way, 0.0, 0.0], abs=1e-11)
    near, _ = rays.bench_basis(rays.direction_from_angles(0.0, way * 1.5707))
    assert near == pytest.approx(e1, abs=1e-9)


@pytest.mark.parametrize("shape", [(), (0,), (4,), (2, 3)])
def test_any_leading_shape(shape):
    k = np.broadcast_to([0.6, 0.0, 0.8], (*shape, 3))
    n = [0.0, 0.0, 1.0]
    assert rays.reflect(k, n).shape == (*shape, 3)
    out, total = rays.refract(k, n, 1.0, np.full(shape, 1.5))
    assert (out.shape, total.shape) == ((*shape, 3), shape)
    assert rays.distance_to_plane(k, k, n, n).shape == shape
    assert rays.bench_basis(k)[1].shape == (*shape, 3)


def test_wrong_shape_names_the_argument():
    with pytest.raises(ValueError, match=r"normal must have shape \(\.\.\., 3\), got \(2,\)"):
        rays.reflect([1.0, 0.0, 0.0], [1.0, 0.0])
