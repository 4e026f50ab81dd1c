"""The command `faults`: its JSON by the contract, its text, its exit status."""

import json

import pytest

from benchlay.cli import run

OVERSHOT = """\
bench: {size: [3000, 3000]}
sources:
  red: {wavelength: 633, power: 100 mW, beam: {waist_radius: 0.5}, at: [500, 400], heading: 0}
elements:
  M1: {kind: mirror, after: red, distance: 500, turn: left 90, diameter: 25.4, metal: silver}
routes:
  main: [red, M1]
materials:
  black: {diffuse: 0.05, specular: 0}
enclosure:
  material: black
  panels:
    south: {from: [0, 0], to: [3000, 0]}
    east: {from: [3000, 0], to: [3000, 2700]}
    north: {from: [3000, 2700], to: [0, 2700]}
    west: {from: [0, 2700], to: [0, 0]}
"""
SHUT = (
    OVERSHOT
    + "  lids:\n    top: {height: 300, outline: [[0, 0], [3000, 0], [3000, 2700], [0, 2700]]}\n"
)


@pytest.fixture
def layout(tmp_path):
    def write(text):
        (tmp_path / "bench.yaml").write_text(text, encoding="utf-8")
        return str(tmp_path / "bench.yaml")

    return write


def test_json_by_the_contract(layout, capsys):
    assert run(["faults", layout(OVERSHOT), "--json"]) == 1
    captured = capsys.readouterr()
    assert captured.err == ""
    document = json.loads(captured.out)
    assert {"cases", "faults", "resolution", "tolerance", "cautions", "assumed"} <= set(document)
    keys = ("fault", "element", "kind", "state", "outcome", "power_W", "through", "at")
    for fault in document["faults"]:
        assert set(fault) >= {*keys, "direction", "findings", "range"}
    worst = document["faults"][0]
    assert (worst["fault"], worst["kind"], worst["state"]) == (
        "M1 pitch +4°",
        "knocked",
        "as drawn",
    )
    assert (worst["outcome"], worst["through"]) == ("escape", "over north")
    assert worst["at"][1] == pytest.approx(2700)
    assert worst["at"][2] > 300
    assert worst["range"][1] == pytest.approx(4.0)
    assert 3.3 < worst["range"][0] < 4.0
    assert worst["findings"][0]["check"] == "escape"
    assert worst["findings"][0]["power_W"] == pytest.approx(worst["power_W"], rel=1e-2)
    assert document["cases"] == sum(fault["cases"] for fault in document["faults"])


def test_the_exit_status_goes_by_the_gravest(layout, capsys):
    name = layout(SHUT)
    assert run(["faults", name]) == 0
    assert "escape" not in capsys.readouterr().out.partition("caution")[0].replace("0 escape", "")
    assert run(["faults", layout(OVERSHOT), "--fail-on", "never"]) == 0


def test_the_text_has_the_gravest_first_and_says_what_it_assumes(layout, capsys):
    assert run(["faults", layout(OVERSHOT)]) == 1
    out = capsys.readouterr().out
    lines = out.splitlines()
    assert lines[0] == "fail light gets out:"
    assert lines[2].split()[:4] == ["#1", "M1", "pitch", "+4°"]
    assert "over north" in lines[2]
    for word in ("resolution:", "assumed:", "caution:", "as drawn"):
        assert word in out
    assert "safe" not in out.lower().replace("laser safety officer", "")


def test_twice_the_same_bytes(layout, capsys):
    name = layout(OVERSHOT)
    run(["faults", name, "--json"])
    first = capsys.readouterr().out
    run(["faults", name, "--json"])
    assert capsys.readouterr().out == first


@pytest.mark.parametrize("option", ["--samples", "--seed", "--workers", "--cluster"])
def test_sampling_is_not_yet(layout, capsys, option):
    assert run(["faults", layout(OVERSHOT), option, "3"]) == 2
    captured = capsys.readouterr()
    assert captured.out == ""
    assert f"{option}: not yet" in captured.err


def test_a_layout_that_cannot_be_read(layout, capsys):
    assert run(["faults", layout("bench: {}\n"), "--json"]) == 2
    assert json.loads(capsys.readouterr().out)["errors"]
    assert run(["faults", layout("bench: {}\n")]) == 2
    assert "error" in capsys.readouterr().err


def test_a_state_that_there_is_not(layout, capsys):
    assert run(["faults", layout(OVERSHOT), "--state", "night"]) == 2
    assert "no state" in capsys.readouterr().err


def test_progress_only_on_a_terminal(layout, capsys, monkeypatch):
    name = layout(OVERSHOT)
    run(["faults", name])
    assert capsys.readouterr().err == ""
    monkeypatch.delenv("NO_COLOR", raising=False)
    monkeypatch.setenv("TERM", "xterm")
    monkeypatch.setattr("sys.stderr.isatty", lambda: True)
    run(["faults", name])
    assert "cases" in capsys.readouterr().err
    monkeypatch.setenv("NO_COLOR", "1")
    run(["faults", name])
    assert capsys.readouterr().err == ""


def test_a_review_runs_faults_and_says_the_worst(layout, capsys, tmp_path):
    run(["review", layout(OVERSHOT), "-o", str(tmp_path / "out"), "--on", "2026-12-01"])
    out = capsys.readouterr().out
    assert "single faults (" in out
    assert "the worst: fail M1 pitch +4° in as drawn" in out
    document = json.loads((tmp_path / "out" / "faults.json").read_text(encoding="ascii"))
    run(["faults", layout(OVERSHOT), "--json"])
    assert document == json.loads(capsys.readouterr().out)
    review = json.loads((tmp_path / "out" / "findings.json").read_text(encoding="ascii"))
    assert "faults" not in review["reviews"][0]
