"""`review --state NAME`: every file of the review is of that state, and says so."""

import json
import re
from pathlib import Path

import pytest

from benchlay import cli

LAYOUT = """
bench: {size: [900, 600]}
sources:
  red: {wavelength: 633, power: 8 mW, beam: {waist_radius: 0.5}, at: [100, 100], heading: 0}
elements:
  F1: {kind: mirror, after: red, distance: 300, turn: left 90, diameter: 25.4, metal: silver,
       out: yes}
  T1: {kind: target, at: [400, 400], facing: 270, diffuse: 5 %}
  D1: {kind: dump, after: red, distance: 600}
  M9: {kind: mirror, at: [800, 500], facing: 0, diameter: 25.4, metal: silver}  # in the dark
routes:
  aside: [red, F1, T1]
  straight: [red, D1]
states:
  up: {elements.F1.out: no}
"""


def words_of(svg):
    return re.findall(r">([^<>]+)<", svg.read_text(encoding="utf-8"))


@pytest.fixture
def reviewed(tmp_path, monkeypatch, capsys):
    monkeypatch.chdir(tmp_path)
    Path("x.yaml").write_text(LAYOUT, encoding="utf-8")

    def review(*more):
        assert cli.run(["review", "x.yaml", "--fail-on", "never", "--force", *more]) == 0
        capsys.readouterr()
        return tmp_path / "exports" / "x"

    return review


@pytest.mark.parametrize(
    ("asked", "state", "counted"),
    [
        ((), "as drawn", "all states"),
        (("--state", "as drawn"), "as drawn", "state as drawn alone"),
        (("--state", "up"), "up", "state up alone"),
    ],
)
def test_plan_zones_and_beams_are_of_the_state_asked_for(reviewed, asked, state, counted):
    folder = reviewed(*asked)
    words = words_of(folder / "plan.svg")
    plan = re.sub(r"\s+", " ", " ".join(words))
    assert f"STATE: {state}" in plan
    assert f"Findings of the review, {counted}: " in plan
    assert json.loads((folder / "beams.json").read_text())["state"] == state
    (review,) = json.loads((folder / "findings.json").read_text())["reviews"]
    zones = [zone for zone in review["zones"] if zone["state"] == state]
    assert len(zones) == sum(bool(re.fullmatch(r"Z\d+", word)) for word in set(words)) > 0
    assert ("Taken out in this state: F1." in plan) == (state == "as drawn")


def test_the_state_as_drawn_is_the_one_drawn_where_none_is_named(reviewed):
    def strokes(*asked):
        text = (reviewed(*asked) / "plan.svg").read_text(encoding="utf-8")
        return re.findall(r"<(?:path|circle)[^>]*>", text)

    assert strokes() == strokes("--state", "as drawn")
    assert strokes() != strokes("--state", "up")
