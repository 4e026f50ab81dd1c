"""The figures of one beam on the command line: read, and everything wrong with them at once."""

from argparse import Namespace

import pytest

from benchlay.exposure import Pulse
from benchlay.exposure.questions import Exit, Question
from benchlay.results.one_beam import FORMS, read


def given(**words):
    """Parsed arguments as argparse leaves them."""
    return Namespace(**{name: [words[name].split()] if name in words else None for name in FORMS})


GREEN = {"wavelength": "532", "power": "5 mW"}
TRAIN = {"wavelength": "1064 nm", "pulse_energy": "1mJ", "pulse_duration": "8 ns", "rate": "10Hz"}


def test_continuous_light():
    asked = read(given(**GREEN, exposure="0.25 s", diameter="0.1 in", divergence="1 mrad"))
    assert asked == Question(532.0, 5e-3, 0.25, Exit(2.54, 1e-3))


def test_pulses():
    asked = read(given(**TRAIN))
    assert asked == Question(1064.0, Pulse(1e-3, 8e-9, 10.0), 100.0, None, time_by_default=True)


def test_a_single_pulse():
    assert read(given(**TRAIN | {"rate": "0 Hz"})).light.rate_hz == 0.0


def mistakes(**words):
    found = read(given(**words))
    assert not isinstance(found, Question)
    return {m.option: m for m in found}


@pytest.mark.parametrize(
    ("words", "option", "message", "remedy"),
    [
        (GREEN | {"power": "5"}, "--power", "has no unit", "5 mW"),
        (GREEN | {"power": "5 ms"}, "--power", "is a duration, not a power", "150 mW"),
        (GREEN | {"power": "0 W"}, "--power", "is zero", "such as"),
        (GREEN | {"wavelength": "100"}, "--wavelength", "no exposure limit exists", "unit"),
        (GREEN | {"wavelength": "1.1 mm"}, "--wavelength", "180 nm to 1 mm", "unit"),
        (GREEN | {"wavelength": "5,5"}, "--wavelength", "comma", "5.5"),
        (GREEN | {"exposure": "40000 s"}, "--exposure", "1e-13 s to 30000 s", "unit"),
        (GREEN | {"exposure": "50 fs"}, "--exposure", "1e-13 s to 30000 s", "unit"),
        (
            {"wavelength": "1064", "power": "1 W", "exposure": "0.25 s"},
            "--exposure",
            "only for accidental viewing of visible light",
            "leave it out",
        ),
        (TRAIN | {"power": "1 W"}, "--power", "either continuous or pulsed", "leave out"),
        ({"wavelength": "532"}, "--power", "nothing says how strong", "add"),
        ({"power": "1 W"}, "--wavelength", "missing", "--wavelength 532nm"),
        (GREEN | {"diameter": "1"}, "--divergence", "missing beside --diameter", "--divergence"),
        (GREEN | {"divergence": "1"}, "--diameter", "missing beside --divergence", "--diameter"),
        (GREEN | {"diameter": "-1", "divergence": "1"}, "--diameter", "is negative", "such as"),
        (TRAIN | {"rate": "200 MHz"}, "--rate", "overlap", "--power"),
        (TRAIN | {"rate": "-1 Hz"}, "--rate", "is negative", "such as"),
        (TRAIN | {"pulse_duration": "50 fs"}, "--pulse-duration", "1e-13 s", "unit"),
        (TRAIN | {"exposure": "8 ns"}, "--exposure", "fills the whole exposure", "--power"),
        (
            {**TRAIN, "pulse_duration": "200 s", "rate": "1 mHz"},
            "--pulse-duration",
            "fills the whole exposure",
            "--power",
        ),
    ],
)
def test_a_mistake_names_its_option_what_was_expected_and_the_remedy(
    words, option, message, remedy
):
    found = mistakes(**words)
    assert list(found) == [option]
    assert message in found[option].message
    assert remedy in found[option].remedy
    assert found[option].expected


@pytest.mark.parametrize("missing", ["pulse_energy", "pulse_duration", "rate"])
def test_pulses_need_all_three_figures(missing):
    words = {name: text for name, text in TRAIN.items() if name != missing}
    (option,) = mistakes(**words)
    assert option == "--" + missing.replace("_", "-")


def test_a_missing_rate_is_not_taken_for_a_single_pulse():
    found = mistakes(**{k: v for k, v in TRAIN.items() if k != "rate"})
    assert "--rate 0Hz for one single pulse" in found["--rate"].remedy


def test_everything_wrong_comes_out_at_once():
    found = mistakes(wavelength="100", power="5", pulse_energy="1 W", exposure="9 h", diameter="2")
    assert set(found) == {"--wavelength", "--power", "--pulse-energy", "--exposure", "--divergence"}


def test_a_figure_given_twice_is_refused():
    options = given(**GREEN)
    options.power = [["1", "mW"], ["2", "mW"]]
    (mistake,) = read(options)
    assert (mistake.option, mistake.message) == ("--power", "given more than once")


def test_a_mistake_reads_like_those_of_a_layout():
    text = str(mistakes(**GREEN | {"power": "5"})["--power"])
    first, second, third = text.splitlines()
    assert first == "benchlay: exposure: --power: '5' has no unit"
    assert second.startswith("  expected: a power")
    assert third.startswith("  to mend: write '5 mW'")
