import mpmath
import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from benchlay.optics import fresnel

BK7 = 1.5168

indices = st.floats(1.0, 4.0)
cosines = st.one_of(st.floats(0.0, 1.0), st.floats(0.0, 1e-6), st.just(1.0))
metals = st.builds(complex, st.floats(0.03, 6.0), st.floats(0.3, 90.0))


@settings(max_examples=300)
@given(indices, st.one_of(indices, metals), cosines)
def test_what_arrives_is_reflected_or_enters(n_in, n_out, cos_in):
    face = fresnel.powers(n_in, n_out, cos_in)
    # The cosine beyond a much thinner medium is the difference of larger numbers.
    bound = 1e-15 * (2.0 + (n_in / abs(n_out)) ** 2)
    assert face.rs + face.ts == pytest.approx(1.0, abs=bound)
    assert face.rp + face.tp == pytest.approx(1.0, abs=bound)
    assert min(face) >= 0.0
    assert face.rs <= 1.0 + 1e-15


@given(indices, indices, cosines)
def test_the_face_passes_the_same_both_ways(n_in, n_out, cos_in):
    forward = fresnel.powers(n_in, n_out, cos_in)
    squared = 1.0 - (n_in / n_out) ** 2 * (1.0 - cos_in**2)
    if squared < 1e-6 or cos_in < 1e-3:  # the way back is at the critical angle
        return
    back = fresnel.powers(n_out, n_in, np.sqrt(squared))
    assert list(forward) == pytest.approx(list(back), abs=1e-9)


@settings(max_examples=60)
@given(indices, st.one_of(st.floats(-1e-9, 1e-9), st.floats(-0.5, 2.0)), st.floats(0, 1))
def test_amplitudes_agree_with_forty_digits(n_in, step, cos_in):
    n_out = n_in + step
    found = fresnel.amplitudes(n_in, n_out, cos_in)
    with mpmath.workdps(40):
        n1, n2 = mpmath.mpf(n_in), mpmath.mpf(n_out)
        c1 = mpmath.mpf(max(cos_in, 1e-150))
        q = mpmath.sqrt(mpmath.mpc((n2 - n1) * (n2 + n1) + (n1 * c1) ** 2))
        exact = (
            (n1 * c1 - q) / (n1 * c1 + q),
            (n2**2 * c1 - n1 * q) / (n2**2 * c1 + n1 * q),
            2 * n1 * c1 / (n1 * c1 + q),
            2 * n1 * n2 * c1 / (n2**2 * c1 + n1 * q),
        )
        wanted = [complex(value) for value in exact]
    # At the critical angle the root magnifies the rounding of its argument.
    bound = 1e-14 + 1e-15 / max(abs(complex(q)), 1e-8)
    assert list(found[:4]) == pytest.approx(wanted, abs=bound)
    if abs(complex(q)) > 0.1:
        assert abs(complex(found.rs) - wanted[0]) <= 1e-13 * abs(wanted[0]) + 1e-30


# Derived values: the textbook formulas worked out apart from this program.
@pytest.mark.parametrize(
    ("angle_deg", "rs", "rp"),
    [
        (0.0, -0.205340, 0.205340),
        (45.0, -0.309804, 0.095978),
        (70.0, -0.553695, -0.204181),
    ],
)
def test_glass_amplitudes(angle_deg, rs, rp):
    face = fresnel.amplitudes(1.0, BK7, np.cos(np.radians(angle_deg)))
    assert (face.rs, face.rp) == (pytest.approx(rs, abs=1e-6), pytest.approx(rp, abs=1e-6))
    assert face.rs.imag == face.rp.imag == 0.0


@pytest.mark.parametrize(  # derived values
    ("angle_deg", "rs", "rp", "phase_deg"),
    [(45.0, 0.93411, 0.87255, -169.695), (75.0, 0.97544, 0.73229, -130.500)],
)
def test_metal_reflects_with_a_phase(angle_deg, rs, rp, phase_deg):
    face = fresnel.amplitudes(1.0, 1.4484 + 7.5371j, np.cos(np.radians(angle_deg)))
    assert abs(face.rs) ** 2 == pytest.approx(rs, abs=6e-6)
    assert abs(face.rp) ** 2 == pytest.approx(rp, abs=1e-5)
    assert np.degrees(np.angle(face.rp / face.rs)) == pytest.approx(phase_deg, abs=6e-4)


def test_total_reflection_delays_s_behind_p():  # derived value
    face = fresnel.amplitudes(BK7, 1.0, np.cos(np.pi / 4))
    assert abs(face.rs) == pytest.approx(1.0, abs=1e-15)
    assert abs(face.rp) == pytest.approx(1.0, abs=1e-15)
    assert np.degrees(np.angle(face.rp / face.rs)) == pytest.approx(-39.7513, abs=5e-5)
    assert face.transmitted_flux == 0.0
    assert abs(face.ts) > 1.0


@pytest.mark.parametrize("n_out", [1.0, complex(1.0, 0.0), complex(1.0, -0.0)])
def test_negative_zero_does_not_choose_the_growing_field(n_out):
    face = fresnel.amplitudes(1.5, n_out, 0.5)
    assert np.abs(face.rs) == pytest.approx(1.0, abs=1e-15)
    assert face.rs.imag < 0.0


def test_transmitted_power_is_not_the_squared_field():
    face = fresnel.amplitudes(1.0, 1.5, 1.0)
    assert abs(face.ts) ** 2 == pytest.approx(0.64)
    assert face.transmitted_flux * abs(face.ts) ** 2 == pytest.approx(0.96)
    at = np.cos(fresnel.brewster_angle_rad(1.0, 1.5))
    face = fresnel.amplitudes(1.0, 1.5, at)
    assert abs(face.tp) ** 2 == pytest.approx(4.0 / 9.0)
    assert face.transmitted_flux * abs(face.tp) ** 2 == pytest.approx(1.0)


@given(indices, indices, cosines)
def test_flux_turns_fields_into_powers(n_in, n_out, cos_in):
    face = fresnel.amplitudes(n_in, n_out, cos_in)
    shares = fresnel.powers(n_in, n_out, cos_in)
    found = [face.transmitted_flux * abs(t) ** 2 for t in (face.ts, face.tp)]
    assert found == pytest.approx([shares.ts, shares.tp], abs=1e-13)


def test_equal_media_are_no_face_even_at_grazing_incidence():
    face = fresnel.powers(1.5, 1.5, np.array([0.0, 1e-200, 1e-9, 0.3, 1.0]))
    assert (face.rs == 0.0).all()
    assert (face.rp == 0.0).all()
    assert face.ts == pytest.approx(np.ones(5), abs=1e-15)


def test_grazing_light_is_reflected_whole():
    face = fresnel.amplitudes(1.0, 1.5, 0.0)
    assert (face.rs, face.rp) == (pytest.approx(-1.0), pytest.approx(-1.0))
    assert fresnel.powers(1.0, 0.2 + 3.0j, 0.0).rp == pytest.approx(1.0)


@given(indices)
def test_brewster_angle_extinguishes_p(n):
    at = np.cos(fresnel.brewster_angle_rad(1.0, n))
    assert fresnel.powers(1.0, n, at).rp == pytest.approx(0.0, abs=1e-30)


@given(indices)
def test_at_45_degrees_p_is_the_square_of_s(n):
    face = fresnel.powers(1.0, n, np.sqrt(0.5))
    assert face.rp == pytest.approx(face.rs**2, abs=1e-15)


# Derived values: unpolarized light through two faces at 70 degrees.
def test_polarization_is_averaged_last():
    face = fresnel.powers(1.0, BK7, np.cos(np.radians(70.0)))
    assert (face.ts**2 + face.tp**2) / 2 == pytest.approx(0.69960, abs=6e-6)


def test_the_sign_of_the_cosine_is_ignored():
    assert fresnel.powers(1.0, BK7, -0.6) == fresnel.powers(1.0, BK7, 0.6)


def test_rows_broadcast_and_bad_ones_stay_alone():
    face = fresnel.amplitudes(1.0, [[1.5], [2.0 + 3.0j]], [1.0, np.nan, 0.5])
    assert face.rs.shape == face.transmitted_flux.shape == (2, 3)
    assert np.isnan(face.rp).tolist() == [[False, True, False]] * 2
