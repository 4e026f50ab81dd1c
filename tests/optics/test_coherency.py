import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from benchlay.optics import coherency, fresnel, rays

angles = st.floats(-np.pi, np.pi)
units = st.builds(rays.direction_from_angles, angles, st.floats(-1.57, 1.57))
parts = st.floats(-1.0, 1.0)


@st.composite
def lights(draw):
    """Partly polarized light of 1 W."""
    s1, s2, s3 = (draw(parts) for _ in range(3))
    length = max(1.0, np.sqrt(s1 * s1 + s2 * s2 + s3 * s3))
    return coherency.from_stokes(1.0, s1 / length, s2 / length, s3 / length)


fields = st.builds(complex, parts, parts)


def of_field(e1, e2):
    j12 = e1 * np.conj(e2)
    return np.array([abs(e1) ** 2, abs(e2) ** 2, j12.real, j12.imag])


def met(j, k, normal, rs, rp):
    """Light of the bench basis after a mirror, in the bench basis of the new beam."""
    out = rays.reflect(k, normal)
    s = rays.cross(k, normal)
    length = np.sqrt(rays.dot(s, s))
    e1, e2 = rays.bench_basis(k)
    s = np.where(length > 1e-9, s / np.maximum(length, 1e-300), e1)
    j = coherency.rotate(j, rays.dot(s, e1), rays.dot(s, e2))
    j = coherency.diagonal(j, rs, rp)
    f1, _ = rays.bench_basis(out)
    p = rays.cross(out, s)
    # The components of f1 in (s, p) are the cosine and sine of the basis to come.
    return coherency.rotate(j, rays.dot(f1, s), rays.dot(f1, p)), out


@settings(max_examples=200)
@given(units, units, fields, fields)
def test_perfect_mirror_turns_the_field_about_its_normal(k, normal, a, b):
    """E' = -E + 2 (N.E) N, whatever the directions and the field."""
    found, out = met(of_field(a, b), k, normal, -1.0, 1.0)
    e1, e2 = rays.bench_basis(k)
    field = a * e1 + b * e2
    field = -field + 2.0 * (normal @ field) * normal
    f1, f2 = rays.bench_basis(out)
    if np.hypot(out[0], out[1]) < 1e-6 or np.linalg.norm(np.cross(k, normal)) < 1e-6:
        return  # the axes themselves are known to 1e-16 over this length only
    assert found == pytest.approx(of_field(field @ f1, field @ f2), abs=1e-9)


@pytest.mark.parametrize("way", [0.0, 1.0, 2.5, 4.0])
@pytest.mark.parametrize("tilt", [0.0, 1e-7])
def test_mirror_at_normal_incidence_does_not_depend_on_the_axes(way, tilt):
    k = np.array([1.0, 0.0, 0.0])
    normal = np.array([-1.0, tilt * np.cos(way), tilt * np.sin(way)])
    light = coherency.from_stokes(1.0, 0.3, 0.5, 0.6)
    found, _ = met(light, k, normal, -1.0, 1.0)
    assert coherency.stokes(found) == pytest.approx([1.0, 0.3, -0.5, -0.6], abs=1e-6)


# Derived values: bare aluminium at 45 degrees, a beam along +x sent to -y, worked out
# apart from this program.
@pytest.mark.parametrize(
    ("stokes_in", "stokes_out"),
    [
        ((1, 0, 1, 0), (0.90333, -0.03078, -0.88824, -0.16151)),
        ((1, 0, 0, 1), (0.90333, -0.03078, 0.16151, -0.88824)),
        ((1, 1, 0, 0), (0.872554, 0.872554, 0.0, 0.0)),
    ],
)
def test_metal_mirror(stokes_in, stokes_out):
    normal = np.array([-1.0, -1.0, 0.0]) / np.sqrt(2.0)
    face = fresnel.amplitudes(1.0, 1.4484 + 7.5371j, np.sqrt(0.5))
    light = coherency.from_stokes(*stokes_in)
    found, out = met(light, np.array([1.0, 0.0, 0.0]), normal, face.rs, face.rp)
    assert out == pytest.approx([0.0, -1.0, 0.0], abs=1e-15)
    assert coherency.stokes(found) == pytest.approx(stokes_out, abs=1e-5)


@pytest.mark.parametrize(  # derived values: horizontal light through a periscope
    ("azimuth_deg", "stokes_out"),
    [
        (90.0, (1.0, -1.0, 0.0, 0.0)),
        (30.0, (1.0, 0.5, 0.8660, 0.0)),
        (180.0, (1.0, 1.0, 0.0, 0.0)),
    ],
)
def test_periscope_turns_the_polarization(azimuth_deg, stokes_out):
    first = np.array([-1.0, 0.0, 1.0]) / np.sqrt(2.0)
    last = rays.direction_from_angles(np.radians(azimuth_deg), 0.0)
    second = (last - [0.0, 0.0, 1.0]) / np.sqrt(2.0)
    light, up = met(coherency.linear(0.0, 1.0), np.array([1.0, 0, 0]), first, -1.0, 1.0)
    light, out = met(light, up, second, -1.0, 1.0)
    assert out == pytest.approx(last, abs=1e-15)
    assert coherency.stokes(light) == pytest.approx(stokes_out, abs=5e-5)


def test_perfect_mirror_changes_the_hand():
    normal = np.array([-1.0, 1.0, 0.0]) / np.sqrt(2.0)
    right = coherency.circular(True, 1.0)
    found, _ = met(right, np.array([1.0, 0.0, 0.0]), normal, -1.0, 1.0)
    assert found == pytest.approx(coherency.circular(False, 1.0), abs=1e-15)


@given(lights())
def test_stokes_return(j):
    assert coherency.from_stokes(*coherency.stokes(j)) == pytest.approx(j, abs=1e-15)


@given(lights(), angles)
def test_turning_the_basis_keeps_power_degree_and_hand(j, angle):
    turned = coherency.rotate(j, np.cos(angle), np.sin(angle))
    before, after = coherency.describe(j), coherency.describe(turned)
    assert coherency.power(turned) == pytest.approx(1.0, abs=1e-14)
    assert after.degree == pytest.approx(before.degree, abs=1e-14)
    assert turned[3] == pytest.approx(j[3], abs=1e-15)
    back = coherency.rotate(turned, np.cos(angle), -np.sin(angle))
    assert back == pytest.approx(j, abs=1e-14)


@given(angles)
def test_a_field_along_the_new_axis_has_no_other_component(angle):
    j = coherency.rotate(coherency.linear(angle, 2.0), np.cos(angle), np.sin(angle))
    assert j == pytest.approx([2.0, 0.0, 0.0, 0.0], abs=1e-15)


@given(st.tuples(fields, fields), st.tuples(fields, fields))
def test_factors_act_on_the_field(field, factors):
    (a, b), (along, across) = field, factors
    found = coherency.diagonal(of_field(a, b), along, across)
    assert found == pytest.approx(of_field(along * a, across * b), abs=1e-14)


def test_quarter_wave_makes_right_circular_light():
    j = coherency.retarder(coherency.linear(0.0, 1.0), np.pi / 4, np.pi / 2)
    assert coherency.stokes(j) == pytest.approx([1.0, 0.0, 0.0, 1.0], abs=1e-15)


def test_retarder_at_an_angle():  # derived value
    j = coherency.retarder(coherency.linear(0.0, 1.0), np.radians(20), np.radians(100))
    assert coherency.stokes(j) == pytest.approx([1.0, 0.515077, 0.577909, 0.633022], abs=1e-6)


@given(lights(), angles, angles)
def test_retarder_absorbs_nothing_and_undoes_itself(j, axis, phase):
    there = coherency.retarder(j, axis, phase)
    assert coherency.power(there) == pytest.approx(1.0, abs=1e-14)
    assert coherency.retarder(there, axis, -phase) == pytest.approx(j, abs=1e-13)


@given(angles, angles)
def test_polarizer_follows_malus(field, axis):
    j = coherency.polarizer(coherency.linear(field, 1.0), axis, 0.9, 1e-4)
    wanted = 0.9 * np.cos(field - axis) ** 2 + 1e-4 * np.sin(field - axis) ** 2
    assert coherency.power(j) == pytest.approx(wanted, abs=1e-15)


def test_crossed_polarizers_pass_the_product():
    j = coherency.polarizer(coherency.unpolarized(1.0), 0.0, 0.9, 9e-5)
    j = coherency.polarizer(j, np.pi / 2, 0.9, 9e-5)
    assert coherency.power(j) == pytest.approx(0.9 * 9e-5, rel=1e-12)


@given(angles, angles)
def test_rotator_turns_the_field(field, angle):
    found = coherency.rotator(coherency.linear(field, 1.0), angle)
    assert found == pytest.approx(coherency.linear(field + angle, 1.0), abs=1e-15)


@given(st.floats(0.0, 3.14), st.floats(-0.78, 0.78), st.floats(0.01, 1.0))
def test_description_returns_the_ellipse(angle, ellipticity, degree):
    j = coherency.from_stokes(
        1.0,
        degree * np.cos(2 * ellipticity) * np.cos(2 * angle),
        degree * np.cos(2 * ellipticity) * np.sin(2 * angle),
        degree * np.sin(2 * ellipticity),
    )
    found = coherency.describe(j)
    assert found.degree == pytest.approx(degree, abs=1e-12)
    assert found.angle_rad == pytest.approx(angle, abs=1e-9)
    assert found.ellipticity_rad == pytest.approx(ellipticity, abs=1e-9)


def test_description_is_settled_where_it_means_nothing():
    tiny = 1e-14
    j = np.array(
        [
            coherency.unpolarized(1.0),
            coherency.from_stokes(1.0, tiny, -tiny, tiny),
            coherency.circular(True, 1.0),
            coherency.from_stokes(1.0, -tiny, -tiny, -1.0),
            coherency.linear(-tiny, 1.0),
            np.zeros(4),
        ]
    ).T
    found = coherency.describe(j)
    assert found.angle_rad.tolist() == [0.0] * 6
    quarter = np.pi / 4
    assert found.ellipticity_rad[:3].tolist() == [0.0, 0.0, quarter]
    assert found.ellipticity_rad[3:] == pytest.approx([-quarter, 0.0, 0.0])
    assert found.degree == pytest.approx([0.0, 0.0, 1.0, 1.0, 1.0, 0.0], abs=1e-13)
    assert not np.signbit(found.angle_rad).any()


@pytest.mark.parametrize("shape", [(), (0,), (5,), (2, 3)])
def test_any_number_of_beams(shape):
    j = coherency.linear(0.3, np.ones(shape))
    assert j.shape == (4, *shape)
    assert coherency.rotate(j, 0.6, 0.8).shape == j.shape
    assert coherency.diagonal(j, 1.0, 1j).shape == j.shape
    assert coherency.retarder(j, 0.1, 0.2).shape == j.shape
    assert coherency.polarizer(j, 0.1, 0.9, 0.0).shape == j.shape
    assert coherency.describe(j).angle_rad.shape == shape


def test_one_bad_beam_does_not_spoil_the_others():
    j = coherency.linear(0.3, np.array([1.0, np.nan]))
    for values in coherency.describe(j):
        assert np.isfinite(values).tolist() == [True, False]


def test_arguments_are_left_alone():
    j = coherency.linear(0.3, np.ones(3))
    before = j.copy()
    coherency.polarizer(j, 0.0, 0.5, 0.0)
    coherency.retarder(j, 0.0, 0.5)
    assert (j == before).all()
