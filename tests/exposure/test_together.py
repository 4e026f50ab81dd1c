"""Several wavelengths at once."""

import itertools
import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from benchlay.exposure import OutOfRange, Pulse, eye_limit, skin_limit
from benchlay.exposure.together import (
    Tissue,
    densities,
    eye_ratios,
    skin_ratios,
    sums,
    worst,
)
from benchlay.exposure.trains import Train, pulse_limit


def below(x):
    return math.nextafter(x, 0.0)


@pytest.mark.parametrize(
    ("wavelength", "seconds", "tissues"),
    [
        (below(315.0), 100.0, {Tissue.CORNEA_SHORT}),
        (315.0, 100.0, {Tissue.CORNEA}),
        (below(400.0), 100.0, {Tissue.CORNEA}),
        (400.0, 100.0, {Tissue.RETINA_HEAT, Tissue.RETINA_BLUE}),
        (400.0, 1.0, {Tissue.RETINA_HEAT}),
        (below(600.0), 100.0, {Tissue.RETINA_HEAT, Tissue.RETINA_BLUE}),
        (600.0, 100.0, {Tissue.RETINA_HEAT}),
        (below(1250.0), 100.0, {Tissue.RETINA_HEAT}),
        (1250.0, 100.0, {Tissue.RETINA_HEAT, Tissue.CORNEA}),
        (1400.0, 100.0, {Tissue.CORNEA}),
    ],
)
def test_tissues_of_a_wavelength(wavelength, seconds, tissues):
    assert set(eye_ratios(wavelength, seconds, 1.0)) == tissues


def test_the_worst_ratio_of_one_wavelength_is_that_to_its_limit():
    for wl, t in itertools.product(
        (250.0, 308.0, 355.0, 440.0, 532.0, 850.0, 1064.0, 1320.0, 1390.0, 1550.0, 10600.0),
        (1e-8, 1e-3, 0.25, 10.0, 100.0, 1e4),
    ):
        limit = eye_limit(wl, t).irradiance_w_m2
        assert worst([eye_ratios(wl, t, limit)]).ratio == pytest.approx(1.0)
        skin = skin_limit(wl, t).irradiance_w_m2
        assert worst([skin_ratios(wl, t, skin)]).ratio == pytest.approx(1.0)


def test_the_same_for_trains():
    for wl, rate in itertools.product(
        (355.0, 440.0, 532.0, 1064.0, 1320.0, 1390.0), (1.0, 1e3, 1e6)
    ):
        pulse = Pulse(1.0, 1e-8, rate)
        limit, _ = pulse_limit(wl, 100.0, Train(1e-8, rate))
        assert worst([eye_ratios(wl, 100.0, limit.value, pulse)]).ratio == pytest.approx(1.0)


def test_green_and_red_add_on_the_retina():
    each = 0.6 * eye_limit(532.0, 0.25).irradiance_w_m2
    total = worst([eye_ratios(532.0, 0.25, each), eye_ratios(633.0, 0.25, each)])
    assert total == (Tissue.RETINA_HEAT, pytest.approx(1.2))


def test_heat_and_photochemistry_do_not_add():
    blue, red = eye_ratios(440.0, 1e4, 0.9), eye_ratios(633.0, 1e4, 8.0)
    assert sums([blue, red]) == {
        Tissue.RETINA_HEAT: pytest.approx(0.09 + 0.8),
        Tissue.RETINA_BLUE: pytest.approx(0.9),
    }


def test_retina_and_cornea_stand_apart():
    near, far = eye_ratios(1064.0, 100.0, 45.0), eye_ratios(10600.0, 100.0, 900.0)
    assert worst([near, far]).ratio == pytest.approx(0.9)


def test_ultraviolet_a_adds_to_the_far_infrared_and_not_to_the_shorter():
    a, far, short = (
        eye_ratios(355.0, 1e4, 6.0),
        eye_ratios(10600.0, 1e4, 600.0),
        eye_ratios(266.0, 1e4, 0.6 * 30.0 / 1e4),
    )
    assert worst([a, far]) == (Tissue.CORNEA, pytest.approx(1.2))
    assert worst([a, short]).ratio == pytest.approx(0.6)


@pytest.mark.parametrize(("first", "adds"), [(below(315.0), False), (315.0, True)])
def test_skin_adds_from_315_nm_up(first, adds):
    parts = [
        skin_ratios(wl, 1.0, 0.6 * skin_limit(wl, 1.0).irradiance_w_m2) for wl in (first, 1064.0)
    ]
    assert worst(parts).ratio == pytest.approx(1.2 if adds else 0.6)


def test_no_light_no_sum():
    assert worst([]) is None


def test_what_cannot_be_is_refused():
    with pytest.raises(OutOfRange):
        eye_ratios(100.0, 1.0, 1.0)
    with pytest.raises(OutOfRange):
        skin_ratios(532.0, 1e5, 1.0)


def test_a_single_wavelength_needs_what_it_needs_alone():
    assert densities([{Tissue.RETINA_HEAT: 1000.0}]) == (pytest.approx(3.0),)
    assert densities([{Tissue.RETINA_HEAT: 0.5}]) == (0.0,)


def test_each_tissue_asks_for_itself():
    blue = {Tissue.RETINA_HEAT: 10.0, Tissue.RETINA_BLUE: 100.0}
    red = {Tissue.RETINA_HEAT: 10.0}
    assert densities([blue, red]) == (pytest.approx(2.0), pytest.approx(math.log10(20.0)))


@given(
    st.lists(
        st.dictionaries(
            st.sampled_from([Tissue.CORNEA, Tissue.RETINA_HEAT, Tissue.RETINA_BLUE]),
            st.floats(-4.0, 8.0).map(lambda x: 10.0**x),
            min_size=1,
        ),
        min_size=1,
        max_size=6,
    )
)
def test_behind_the_eyewear_no_tissue_gets_too_much(parts):
    needed = densities(parts)
    behind = [
        {tissue: ratio * 10.0**-density for tissue, ratio in part.items()}
        for part, density in zip(parts, needed, strict=True)
    ]
    assert all(ratio <= 1.0 + 1e-9 for ratio in sums(behind).values())


@given(st.lists(st.floats(-4.0, 8.0).map(lambda x: 10.0**x), min_size=1, max_size=6))
def test_no_density_is_there_for_nothing(ratios):
    needed = densities([{Tissue.SKIN: ratio} for ratio in ratios])
    behind = [ratio * 10.0**-density for ratio, density in zip(ratios, needed, strict=True)]
    for i, density in enumerate(needed):
        if density > 0.0:
            others = math.fsum(behind) - behind[i]
            assert others + 1.01 * behind[i] > 1.0
