"""Functions of numbers take arrays, and give the same numbers."""

import subprocess
import sys

import numpy as np
import pytest

from benchlay.exposure import OutOfRange, eye_limit, skin_limit
from benchlay.exposure.apertures import circle_area_m2, eye_aperture_mm
from benchlay.exposure.distances import gaussian_fraction, nohd_exact_m
from benchlay.exposure.emission import Level, emission_limit
from benchlay.exposure.eyewear import optical_density
from benchlay.exposure.factors import c4, c6


@pytest.mark.parametrize("shape", [(), (1,), (3,), (2, 3), (2, 1, 3), (0,)])
def test_the_result_has_the_shape_of_the_arguments(shape):
    wl = np.full(shape, 850.0)
    assert c4(wl).shape == shape
    assert eye_limit(wl, 100.0).value.shape == shape
    assert np.all(c4(wl) == c4(850.0))


def test_arguments_broadcast_by_place_and_by_name():
    wl, t = np.array([[440.0], [532.0], [1064.0]]), [0.25, 100.0]
    found = eye_limit(wl, t, alpha_mrad=np.array(10.0))
    assert found.value.shape == found.unit.shape == (3, 2)
    for i, j in np.ndindex(3, 2):
        one = eye_limit(float(wl[i, 0]), t[j], alpha_mrad=10.0)
        assert (found.value[i, j], found.unit[i, j]) == (one.value, one.unit)
        assert (found.governs[i, j], found.source[i, j]) == (one.governs, one.source)
        assert found.dose_j_m2[i, j] == one.dose_j_m2
        assert found.irradiance_w_m2[i, j] == pytest.approx(one.irradiance_w_m2, rel=1e-15)


def test_what_is_assumed_is_told_once():
    notes = eye_limit(np.array([532.0, 533.0, 1064.0]), 1.0).assumptions
    assert len(notes) == len(set(notes)) == 2


def test_a_class_that_does_not_exist_is_no_number():
    found = emission_limit(Level.TWO, np.array([532.0, 1064.0]), 0.25)
    assert found.value[0] == 1e-3
    assert np.isnan(found.value[1])
    assert found.unit.tolist() == ["W", ""]


def test_one_point_out_of_range_refuses_them_all_and_is_named():
    with pytest.raises(OutOfRange, match="100 nm"):
        eye_limit(np.array([532.0, 100.0]), 1.0)
    with pytest.raises(OutOfRange, match="40000 s"):
        skin_limit(532.0, np.array([1.0, 4e4]))
    with pytest.raises(OutOfRange, match="nan"):
        eye_limit(np.array([532.0, np.nan]), 1.0)


def test_formulas_take_arrays_too():
    power = np.array([1e-4, 0.1, 1.0])
    beam = {"aperture_mm": 7.0, "waist_w_mm": 0.5, "half_angle_86_rad": 5e-4}
    far = nohd_exact_m(power, 25.0, **beam)
    assert far.tolist() == [nohd_exact_m(p, 25.0, **beam) for p in power.tolist()]
    assert gaussian_fraction([0.0, 1.0], 1.0).tolist() == [0.0, gaussian_fraction(1.0, 1.0)]
    assert optical_density([1.0, 10.0], 1.0).tolist() == [0.0, 1.0]
    assert c6([1.0, 15.0], 1.0).tolist() == [1.0, 10.0]
    assert eye_aperture_mm([355.0, 532.0], 1.0).tolist() == [1.0, 7.0]
    assert circle_area_m2(np.array([7.0]))[0] == circle_area_m2(7.0)


def test_numbers_of_numpy_are_numbers():
    assert type(c4(np.float64(850.0))) is float
    assert eye_limit(np.float64(532.0), np.float64(1.0)) == eye_limit(532.0, 1.0)
    assert isinstance(eye_limit.over(532.0, 1.0).value, np.ndarray)


def test_numbers_alone_load_no_numpy():
    code = (
        "import sys; from benchlay.exposure import eye_limit; eye_limit(532.0, 1.0)\n"
        "assert 'numpy' not in sys.modules"
    )
    ran = subprocess.run([sys.executable, "-c", code], check=False, capture_output=True)
    assert ran.returncode == 0, ran.stderr.decode()
