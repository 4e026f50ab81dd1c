import numpy as np
import pytest

from benchlay.optics import fresnel
from benchlay.optics.materials import MATERIALS, air_index
from benchlay.optics.metals import METALS

NAMED = ["fused-silica", "BK7", "SF10", "SF11", "CaF2", "MgF2", "sapphire", "ZnSe"]
NAMED += ["quartz", "calcite", "water"]


def test_every_name_of_the_layout_language_is_there():
    assert list(MATERIALS) == NAMED
    assert sorted(METALS) == ["aluminium", "gold", "silver"]
    for name, material in (MATERIALS | METALS).items():
        assert material.name == name
        assert material.source


# Remembered values (handbooks and catalogues), each to the digits it is quoted with.
@pytest.mark.parametrize(
    ("name", "wavelength_nm", "index", "bound"),
    [
        ("SF10", 587.5618, 1.72825, 6e-6),
        ("CaF2", 587.5618, 1.43384, 2e-5),
        ("ZnSe", 10_600.0, 2.4028, 1e-4),
        ("ZnSe", 632.8, 2.5907, 1e-3),
        ("quartz", 589.3, 1.5442, 1e-4),
        ("calcite", 589.3, 1.6584, 1e-4),
        ("fused-silica", 1064.0, 1.4496, 5e-5),
        ("BK7", 1064.0, 1.5066, 5e-5),
        ("water", 589.3, 1.33335, 1e-5),
    ],
)
def test_remembered_index(name, wavelength_nm, index, bound):
    assert MATERIALS[name].index_at(wavelength_nm) == pytest.approx(index, abs=bound)


@pytest.mark.parametrize("material", MATERIALS.values(), ids=MATERIALS)
def test_index_is_sound_over_the_whole_range_and_refused_outside(material):
    low, high = material.range_nm
    index = material.index_at(np.linspace(low, high, 500))
    assert (index > 1.0).all()
    assert (np.diff(index) < 0.0).all()  # normal dispersion: no resonance inside
    assert np.isnan(material.index_at([low - 0.1, high + 0.1, np.nan])).all()
    assert material.index_at(low) == index[0]


def test_only_water_is_absolute_and_birefringence_is_said():
    assert [n for n in NAMED if not MATERIALS[n].relative_to_air] == ["water"]
    said = [n for n in NAMED if "ordinary" in MATERIALS[n].note]
    assert said == ["MgF2", "sapphire", "quartz", "calcite"]


def test_absolute_index_counts_air_once():
    glass, water = MATERIALS["BK7"], MATERIALS["water"]
    assert glass.absolute_index(632.8) == glass.index_at(632.8) * air_index(632.8)
    assert water.absolute_index(632.8) == water.index_at(632.8)


def test_air_is_held_beyond_its_formula_and_rises_towards_the_blue():
    assert air_index(10_600.0) == air_index(1690.0)
    assert air_index(100.0) == air_index(185.0)
    visible = air_index(np.array([400.0, 550.0, 700.0]))
    assert (np.diff(visible) < 0.0).all()
    # Mathar (2007), dry air at 15 degrees C: 1.00027275 at 10.5 um, as tabulated in a
    # public-domain collection; the difference is what holding the end costs.
    held = air_index(10_500.0, temperature_c=15.0)
    assert held - 1.0 == pytest.approx(2.7275e-4, abs=5e-7)


# Spread of good sources at these wavelengths, by which sound data may differ.
@pytest.mark.parametrize(
    ("name", "wavelength_nm", "low", "high"),
    [
        ("aluminium", 632.8, 0.9066, 0.9078),
        ("silver", 632.8, 0.9884, 0.9896),
        ("gold", 632.8, 0.944, 0.960),
        ("gold", 532.0, 0.704, 0.772),
        ("silver", 325.0, 0.14, 0.20),
    ],
)
def test_mirror_lies_within_the_spread_of_sources(name, wavelength_nm, low, high):
    index = METALS[name].index_at(wavelength_nm)
    assert low <= fresnel.powers(1.0, index, 1.0).rs <= high


@pytest.mark.parametrize("metal", METALS.values(), ids=METALS)
def test_metal_table_is_in_order_and_refused_outside(metal):
    wavelength_um, n, k = np.array(metal.table).T
    assert (np.diff(wavelength_um) > 0.0).all()
    assert (n > 0.0).all()
    assert (k > 0.0).all()
    low, high = metal.range_nm
    assert np.isfinite(metal.index_at([low, high])).all()
    outside = metal.index_at([low - 1.0, high + 1.0])
    assert np.isnan(outside.real).all()
    assert np.isnan(outside.imag).all()


@pytest.mark.parametrize("name", ["silver", "gold"])
def test_joined_tables_differ_by_less_than_films_do(name):
    ends = METALS[name].index_at(np.array([1937.0, 2066.0]))
    shares = fresnel.powers(1.0, ends, 1.0).rs
    assert np.ptp(shares) < 0.016
    assert shares.min() > 0.97


@pytest.mark.parametrize("shape", [(), (0,), (3,), (2, 2)])
def test_any_shape_of_wavelengths(shape):
    wavelength = np.full(shape, 600.0)
    assert MATERIALS["BK7"].index_at(wavelength).shape == shape
    assert METALS["gold"].index_at(wavelength).shape == shape
    assert air_index(wavelength).shape == shape
