"""The command `exposure` from its arguments to its bytes."""

import json
from pathlib import Path

import pytest

from benchlay import cli

GOLDEN = Path(__file__).with_name("one_beam")
# What stands in these files was checked against published values and against numbers worked
# apart, one by one: see the tests below. Only then were the bytes kept.
CASES = {
    "green": (
        "--wavelength 532 --power 1W --exposure 0.25s --diameter 1 --divergence 1mrad"
    ),
    "train": (
        "--wavelength 1064nm --pulse-energy 1mJ --pulse-duration 10ns --rate 1kHz --exposure 10s"
    ),
}  # fmt: skip


@pytest.fixture
def run(capsys):
    def answer(words, status=0):
        assert cli.run(["exposure", *words.split()]) == status
        return capsys.readouterr()

    return answer


@pytest.mark.parametrize("name", CASES)
def test_the_text_to_the_byte(run, name):
    assert run(CASES[name]).out == (GOLDEN / f"{name}.txt").read_text("utf-8")


@pytest.mark.parametrize("name", CASES)
def test_the_document_to_the_byte(run, name):
    captured = run(CASES[name] + " --json")
    assert captured.out == (GOLDEN / f"{name}.json").read_text("utf-8")
    assert captured.err == ""


def test_the_green_beam_is_as_published():
    found = json.loads((GOLDEN / "green.json").read_text("utf-8"))
    assert found["mpe_eye"]["value"] == pytest.approx(25.5, rel=5e-3)  # published
    assert (found["mpe_eye"]["unit"], found["mpe_eye"]["aperture_mm"]) == ("W/m2", 7.0)
    assert found["mpe_skin"]["value"] == pytest.approx(1.1e4 * 0.25**-0.75)
    # Published: 1 mW and 5 mW, 0.5 W; recalled: 0.39 mW.
    assert found["ael"] == {"1": 3.9e-4, "2": 1e-3, "3R": 5e-3, "3B": 0.5, "unit": "W"}
    assert found["class"] == "4"
    # Worked apart: 316.20 m, with the two formulas beside it.
    assert found["nohd_m"] == pytest.approx(316.20, abs=0.01)
    assert found["hazardous_span_m"] == [0.0, found["nohd_m"]]
    assert found["nohd_far_field_m"]["quadratic"] == pytest.approx(316.28, abs=0.01)
    assert found["nohd_far_field_m"]["linear"] == pytest.approx(315.28, abs=0.01)
    # log10(1 W over 38.48 mm2 / 25.46 W/m2); 1 W over 0.393 mm2 lies between LB5 and LB6.
    assert found["eyewear_od"] == pytest.approx(3.009, abs=1e-3)
    assert found["eyewear_scale"] == "D LB6"
    assert found["diffuse_distance_m"] == 0.1


def test_the_train_is_as_worked_apart():
    found = json.loads((GOLDEN / "train.json").read_text("utf-8"))
    assert found["mpe_eye"]["value"] == 0.01
    assert (found["mpe_eye"]["unit"], found["mpe_eye"]["governs"]) == (
        "J/m2",
        "thermal, repeated",
    )
    # 7.7e-7 J recalled, halved by C5; class 3B 0.5 W shared by a thousand pulses a second.
    assert found["ael"] == {"1": 3.85e-7, "2": None, "3R": 1.9e-6, "3B": 5e-4, "unit": "J"}
    assert found["nohd_m"] is None
    assert any("cannot be computed" in note for note in found["assumptions"])
    assert found["eyewear_scale"] == "D LB4 + R LB5"


KEYS = (
    "wavelength_nm", "exposure_s", "mpe_eye", "mpe_skin", "class", "ael", "nohd_m",
    "eyewear_od", "eyewear_scale", "diffuse_distance_m", "source", "assumptions", "cautions",
)  # fmt: skip


@pytest.mark.parametrize("name", CASES)
def test_the_document_holds_what_is_promised(name):
    found = json.loads((GOLDEN / f"{name}.json").read_text("utf-8"))
    assert tuple(found)[: len(KEYS)] == KEYS
    for limit in ("mpe_eye", "mpe_skin"):
        assert {"value", "unit", "governs", "aperture_mm"} <= set(found[limit])
    assert set(found["ael"]) == {"1", "2", "3R", "3B", "unit"}
    assert isinstance(found["class"], str)
    assert found["source"].startswith("IEC 60825-1:2014, table ")
    assert found["assumptions"]
    assert any("laser safety officer" in caution for caution in found["cautions"])


def test_no_answer_calls_anything_safe_or_awards_a_class(run):
    for words in (*CASES.values(), "--wavelength 633 --power 1uW"):
        text = run(words).out
        assert "class: within the limit of class" in text or "class: above the limit" in text
        # The word stands in the cautions alone, and in the officer's name.
        body = text.split("\ncautions\n")[0].lower()
        assert "safe" not in body.replace("laser safety", "")


def test_two_words_are_one_figure(run):
    assert run("--wavelength 532 nm --power 5 mW").out == run("--wavelength 532nm --power 5mW").out


def test_a_wrong_command_line_says_everything_and_gives_no_result(run):
    captured = run("--wavelength 100 --power 5 --exposure 0.25 --json", status=2)
    assert captured.out == ""
    for option in ("--wavelength", "--power", "--exposure"):
        assert f"benchlay: exposure: {option}: " in captured.err
    assert captured.err.count("  expected: ") == captured.err.count("  to mend: ") == 3


def test_a_beam_within_its_limit(run):
    words = "--wavelength 633 --power 10uW --diameter 1 --divergence 1mrad"
    found = json.loads(run(words + " --json").out)
    assert (found["nohd_m"], found["eyewear_od"], found["class"]) == (0.0, 0.0, "1")
    assert found["hazardous_span_m"] is None
    assert "the limit is nowhere exceeded" in run(words).out


def test_a_density_is_never_rounded_down_for_people(run):
    found = run("--wavelength 532 --power 1W --exposure 0.25s").out
    assert "optical density  3.01 " in found  # 3.0088
