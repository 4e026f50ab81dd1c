"""Quantities: what is read, to which number, and every refusal in full."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from benchlay.document.quantity import Dimension, QuantityError, parse, show

# Exact by definition: 1 in = 25.4 mm (international inch, 1959), 1 deg = pi/180 rad,
# 1 deg = 60 arcmin, OD d = a share of 10^-d.
READ = [
    ("25", "LENGTH", 25.0),
    ("1 in", "LENGTH", 25.4),
    ("2 ft", "LENGTH", 609.6),
    ("1.5m", "LENGTH", 1500.0),
    ("3 µm", "LENGTH", 0.003),
    ("3 um", "LENGTH", 0.003),
    ("3 μm", "LENGTH", 0.003),
    ("-4 cm", "LENGTH", -40.0),
    ("+.5", "LENGTH", 0.5),
    ("7.", "LENGTH", 7.0),
    ("1e-4", "LENGTH", 1e-4),
    ("1E3", "LENGTH", 1000.0),
    ("010", "LENGTH", 10.0),
    (" 8  mm ", "LENGTH", 8.0),
    ("30", "ANGLE", math.radians(30)),
    ("30 deg", "ANGLE", math.radians(30)),
    ("30°", "ANGLE", math.radians(30)),
    ("30 arcmin", "ANGLE", math.radians(0.5)),
    ("36 arcsec", "ANGLE", math.radians(0.01)),
    ("0.5 mrad", "ANGLE", 0.0005),
    ("7 µrad", "ANGLE", 7e-6),
    ("1 rad", "ANGLE", 1.0),
    ("632.8 nm", "WAVELENGTH", 632.8),
    ("532", "WAVELENGTH", 532.0),
    ("10.6 um", "WAVELENGTH", 10600.0),
    ("1e-3 mm", "WAVELENGTH", 1000.0),
    ("99.5 %", "RATIO", 0.995),
    ("5%", "RATIO", 0.05),
    ("20 ppm", "RATIO", 2e-5),
    ("OD 3", "RATIO", 1e-3),
    ("OD3", "RATIO", 1e-3),
    ("1.1", "RATIO", 1.1),
    ("OD 3", "DENSITY", 3.0),
    ("0.3", "DENSITY", 0.3),
    ("35 mW", "POWER", 0.035),
    ("35 MW", "POWER", 35e6),
    ("2 mJ", "ENERGY", 0.002),
    ("8 ns", "DURATION", 8e-9),
    ("120 fs", "DURATION", 120e-15),
    ("2 min", "DURATION", 120.0),
    ("1 h", "DURATION", 3600.0),
    ("20 kHz", "RATE", 20e3),
    ("1.5 GHz", "FREQUENCY", 1.5e9),
    ("20 W/cm2", "IRRADIANCE", 2e5),
    ("1 kW / cm²", "IRRADIANCE", 1e7),
    ("10 mW/cm^2", "IRRADIANCE", 100.0),
    ("10 W/m2", "IRRADIANCE", 10.0),
    ("1 W/mm2", "IRRADIANCE", 1e6),
    ("1 J/cm2", "FLUENCE", 1e4),
    ("5 mJ/cm2", "FLUENCE", 50.0),
]


@pytest.mark.parametrize(("text", "dimension", "value"), READ)
def test_reads(text, dimension, value):
    assert parse(text, Dimension[dimension]) == value


A_LENGTH = "a length in mm or with its unit (nm um mm m cm in ft)"
A_POWER = "a power with its unit (mW W kW uW nW pW MW GW)"
A_RATIO = "a ratio, as '0.5', '50 %', '5 ppm' or 'OD 0.3'"
A_RATE = "a rate with its unit (Hz kHz MHz GHz THz mHz)"
AN_ANGLE = "an angle in deg or with its unit (deg ° arcmin arcsec mrad rad urad)"

REFUSED = [
    ("", "LENGTH", "nothing is written", A_LENGTH, "write a length, such as '25'"),
    ("abc", "LENGTH", "'abc' is not a number", A_LENGTH, "write a length, such as '25'"),
    ("nan", "LENGTH", "'nan' is not a number", A_LENGTH, "write a length, such as '25'"),
    ("-inf", "RATIO", "'-inf' is not a number", A_RATIO, "write a ratio, such as '50 %'"),
    ("1:5", "LENGTH", "'1:5' is not a number", A_LENGTH, "write a length, such as '25'"),
    ("0x1F", "LENGTH", "'0x1F' is not a number", A_LENGTH, "write a length, such as '25'"),
    ("1.2.3", "LENGTH", "'1.2.3' is not a number", A_LENGTH, "write a length, such as '25'"),
    ("٣", "LENGTH", "'٣' is not a number", A_LENGTH, "write a length, such as '25'"),
    ("OD x", "RATIO", "'OD x' is not a number", A_RATIO, "write a ratio, such as '50 %'"),
    ("1_000", "LENGTH", "'1_000' has a '_' in its number", A_LENGTH, "write '1000'"),
    ("1,5 mm", "LENGTH", "'1,5 mm' has a comma in its number", A_LENGTH, "write '1.5 mm'"),
    (
        "1,000",
        "LENGTH",
        "'1,000' has a comma in its number",
        A_LENGTH,
        "write '1.000', or '1000' if the comma groups thousands",
    ),
    ("−5", "LENGTH", "'−5' has a minus sign other than '-'", A_LENGTH, "write '-5'"),
    (
        "1e10",
        "LENGTH",
        "'1e10' is too large a number",
        A_LENGTH,
        "check the exponent and the unit",
    ),
    (
        "1e300 W",
        "POWER",
        "'1e300 W' is too large a number",
        A_POWER,
        "check the exponent and the unit",
    ),
    (
        "1e400",
        "LENGTH",
        "'1e400' is too large a number",
        A_LENGTH,
        "check the exponent and the unit",
    ),
    (
        "35",
        "POWER",
        "'35' has no unit",
        A_POWER,
        "write '35 mW', or whichever unit is meant",
    ),
    (
        "35 mw",
        "POWER",
        "'35 mw' has the unit 'mw', which is not known for a power",
        A_POWER,
        "write '35 mW' or '35 MW'",
    ),
    (
        "5 khz",
        "RATE",
        "'5 khz' has the unit 'khz', which is not known for a rate",
        A_RATE,
        "write '5 kHz'",
    ),
    (
        "5 dge",
        "ANGLE",
        "'5 dge' has the unit 'dge', which is not known for an angle",
        AN_ANGLE,
        "write '5 deg'",
    ),
    (
        "5 furlongs",
        "LENGTH",
        "'5 furlongs' has the unit 'furlongs', which is not known for a length",
        A_LENGTH,
        "write a length, such as '25'",
    ),
    (
        "35 mW",
        "LENGTH",
        "'35 mW' is a power, not a length",
        A_LENGTH,
        "write a length, such as '25'",
    ),
    (
        "OD 2",
        "POWER",
        "'OD 2' is an optical density, not a power",
        A_POWER,
        "write a power, such as '150 mW'",
    ),
    (
        "50 %",
        "DENSITY",
        "'50 %' is a ratio, not an optical density",
        "an optical density, as '2' or 'OD 2'",
        "write an optical density, such as '2'",
    ),
    (
        "9" * 400,
        "LENGTH",
        f"'{'9' * 59}…' is not a number",
        A_LENGTH,
        "write a length, such as '25'",
    ),
]


@pytest.mark.parametrize(("text", "dimension", "message", "expected", "remedy"), REFUSED)
def test_refuses(text, dimension, message, expected, remedy):
    with pytest.raises(QuantityError) as caught:
        parse(text, Dimension[dimension])
    error = caught.value
    assert (error.message, error.expected, error.remedy) == (message, expected, remedy)


@pytest.mark.parametrize("dimension", Dimension)
def test_examples_can_be_read(dimension):
    for example in dimension.examples:
        assert math.isfinite(parse(example, dimension))


@pytest.mark.parametrize("dimension", [d for d in Dimension if d.bare is not None])
def test_bare_number_has_the_bare_unit(dimension):
    with_unit = f"7 {dimension.bare}".strip()
    assert parse("7", dimension) == parse(with_unit, dimension)


finite = st.floats(min_value=-1e9, max_value=1e9, allow_nan=False)


@given(finite)
def test_own_unit_round_trips_exactly(value):
    for dimension in Dimension:
        if dimension is not Dimension.ANGLE:
            assert parse(f"{value!r} {dimension.shown}".strip(), dimension) == value
    assert parse(f"{value!r} rad", Dimension.ANGLE) == value
    assert parse(repr(value), Dimension.ANGLE) == math.radians(value)


@given(st.decimals(min_value=-(10**6), max_value=10**6, places=4, allow_nan=False))
def test_powers_of_ten_are_rounded_once(value):
    exact = float(value.scaleb(-3))
    assert parse(f"{value:f} mW", Dimension.POWER) == exact
    assert parse(f"{value:f} mrad", Dimension.ANGLE) == exact
    assert parse(f"{value:f} um", Dimension.LENGTH) == exact


@given(st.sampled_from(list(Dimension)), st.floats(min_value=-1e9, max_value=1e9))
def test_shown_values_read_back_to_six_figures(dimension, value):
    assert parse(show(value, dimension), dimension) == pytest.approx(value, rel=1e-5)


@given(st.text(max_size=70), st.sampled_from(list(Dimension)))
def test_any_text_gives_a_finite_number_or_a_refusal(text, dimension):
    try:
        value = parse(text, dimension)
    except QuantityError as refusal:
        parts = (refusal.message, refusal.expected, refusal.remedy)
    else:
        parts = (value,)
        assert math.isfinite(value)
    assert all(part or part == 0 for part in parts)


def test_negative_zero_is_not_shown():
    assert show(-0.0, Dimension.LENGTH) == "0 mm"
    assert show(0.25, Dimension.RATIO) == "0.25"
