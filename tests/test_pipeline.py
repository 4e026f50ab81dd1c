"""The stages in a row, from Python and from the command line, on real layouts."""

import io
import json
import os
import random
import subprocess
import sys
from datetime import date
from pathlib import Path

import pytest
import yaml

import benchlay
from benchlay import cli, pipeline
from benchlay.sheets import SHEETS

TOP = Path(benchlay.__file__).parent.parent
CLEAN = """
title: Clean
bench: {size: [900, 600], beam_height: 100}
sources:
  red: {wavelength: 633, power: 8 mW, beam: {waist_radius: 0.5}, at: [100, 100], heading: 0}
elements:
  D1: {kind: dump, after: red, distance: 300}
routes:
  work: [red, D1]
"""
ESCAPES = """
title: Escapes
bench: {size: [900, 600], beam_height: 100}
sources:
  red: {wavelength: 633, power: 8 mW, beam: {waist_radius: 0.5}, polarization: vertical,
        at: [100, 100], heading: 0}
  blue: {wavelength: 450, power: 3 mW, beam: {waist_radius: 0.5}, at: [100, 450], heading: 0}
elements:
  M1: {kind: mirror, after: red, distance: 300, turn: left 90, diameter: 25.4,
       reflectance: 99 %}
  W1: {kind: window, after: M1, distance: 100, incidence: 30, diameter: 25.4}
  T1: {kind: target, after: W1, distance: 150}
  A1: {kind: aperture, after: blue, distance: 200, opening: 1.2}
  D1: {kind: dump, after: A1, distance: 200}
routes:
  work: [red, M1, W1, T1]
  aside: [blue, A1, D1]
enclosure:
  panels:
    east: {from: [900, 0], to: [900, 600]}
    north: {from: [900, 600], to: [0, 600]}
states:
  warm-up: {sources.red.power: 1 mW}
  alignment: {elements.M1.yaw_error: 1, enclosure.panels.east.open: yes}
"""
BROKEN = "bench: {size: [900, 600]}\nsources: {red: {wavelenth: 633}}\nelements: {}\n"


@pytest.fixture
def files(tmp_path, monkeypatch):
    monkeypatch.chdir(tmp_path)
    for name, text in (("clean", CLEAN), ("escapes", ESCAPES), ("broken", BROKEN)):
        Path(f"{name}.yaml").write_text(text, encoding="utf-8")
    return tmp_path


def is_a_drawing(name):
    """Whether a file is named after a kind of sheet."""
    stem, _, ending = name.rpartition(".")
    kind = stem.partition("-")[0]
    known = {sheet.partition("-")[0] for sheet in SHEETS}
    return name == "sheets.pdf" or (kind in known and ending in {"dxf", "svg", "pdf"})


def test_the_stages_from_python(files):
    layout = benchlay.read("escapes.yaml")
    placed = benchlay.place(layout)
    trace = benchlay.trace(placed)
    findings = benchlay.check(trace)
    assert "escape" in {finding.check for finding in findings}
    assert [f.check for f in benchlay.check(trace, states=["warm-up"])] != []
    drawn = benchlay.draw(trace)
    assert {"plan.dxf", "plan.svg", "sheets.pdf"} <= set(drawn)
    assert all(is_a_drawing(name) for name in drawn)


def test_a_broken_layout_raises_all_its_problems():
    with pytest.raises(benchlay.LayoutError, match="wavelenth") as caught:
        benchlay.read("broken.yaml", BROKEN)
    problems = caught.value.problems
    assert len(problems) > 1
    assert all(problem.span.file == "broken.yaml" for problem in problems)
    assert problems == tuple(sorted(problems))


def test_a_place_that_cannot_be_found_raises():
    text = CLEAN.replace("after: red", "after: D1")
    with pytest.raises(benchlay.LayoutError, match="D1"):
        benchlay.place(benchlay.read("x.yaml", text))


def test_a_missing_file_is_the_systems_error(tmp_path):
    with pytest.raises(FileNotFoundError):
        benchlay.read(tmp_path / "none.yaml")


def test_a_state_that_does_not_exist_names_those_that_do(files):
    found = pipeline.review(
        ESCAPES.encode(), "x.yaml", on=date(2027, 1, 1), state="alignmnt", in_full=False
    )
    (problem,) = found.errors
    assert problem.message == "the layout has no state 'alignmnt'"
    assert problem.expected == "one of its states: as drawn, alignment, warm-up"
    assert "'alignment'" in problem.remedy


@pytest.mark.parametrize(
    ("arguments", "status"),
    [
        (["check", "clean.yaml"], 0),
        (["check", "escapes.yaml"], 1),
        (["check", "escapes.yaml", "--fail-on", "never"], 0),
        (["check", "broken.yaml"], 2),
        (["check", "clean.yaml", "broken.yaml", "escapes.yaml"], 2),
        (["check", "escapes.yaml", "--state", "nowhere"], 2),
        (["trace", "clean.yaml"], 0),
        (["trace", "broken.yaml", "--json"], 2),
        (["trace", "escapes.yaml", "--state", "warm-up"], 0),
        (["draw", "clean.yaml", "--format", "pdf"], 0),
        (["draw", "clean.yaml", "--sheet", "attic"], 2),
        (["review", "broken.yaml"], 2),
    ],
)
def test_exit_statuses(files, arguments, status, capsys):
    assert cli.run(arguments) == status
    captured = capsys.readouterr()
    assert "mistake of the program" not in captured.err


def test_several_layouts_are_all_reported_whatever_is_wrong_with_one(files, capsys):
    assert cli.run(["check", "--json", "escapes.yaml", "broken.yaml", "clean.yaml"]) == 2
    reviews = json.loads(capsys.readouterr().out)["reviews"]
    assert [review.get("verdict") for review in reviews] == ["fail", None, "none"]
    assert len(reviews[1]["errors"]) > 1


def test_standard_input(files, monkeypatch, capsys):
    monkeypatch.setattr(sys, "stdin", io.TextIOWrapper(io.BytesIO(CLEAN.encode())))
    assert cli.run(["check", "-", "--json"]) == 0
    (review,) = json.loads(capsys.readouterr().out)["reviews"]
    assert (review["layout"], review["title"]) == ("-", "Clean")


@pytest.mark.parametrize("ending", ["\n", "\r\n", "\r"])
def test_a_finding_quotes_its_own_line_whatever_ends_lines(files, ending, capsys):
    Path("odd.yaml").write_bytes(ESCAPES.replace("\n", ending).encode())
    cli.run(["check", "odd.yaml"])
    out = capsys.readouterr().out
    at = next(line for line in out.splitlines() if "escape: " in line)
    number = int(at.split(":")[1])
    assert f"  {number} |   W1: {{kind: window" in out


def test_a_review_writes_its_files(files, capsys):
    assert cli.run(["review", "escapes.yaml"]) == 1
    capsys.readouterr()
    folder = files / "exports" / "escapes"
    names = {path.name for path in folder.iterdir()}
    assert {
        "beams.json",
        "faults.json",
        "findings.json",
        "plan.dxf",
        "plan.svg",
        "sheets.pdf",
    } <= names
    data = (".json", ".csv")
    assert all(is_a_drawing(name) for name in names if not name.endswith(data))
    record = json.loads((folder / "findings.json").read_text(encoding="ascii"))
    cli.run(["check", "--json", "escapes.yaml"])
    printed = json.loads(capsys.readouterr().out)
    assert record["reviews"][0].pop("remedies")  # tried out by a review only
    # A check's panels speak of the states only, a review's of faults too.
    taken = [review["reviews"][0].pop("panels") for review in (record, printed)]
    assert [row["panel"] for row in taken[0]] == [row["panel"] for row in taken[1]]
    assert all(row["governs"] != "fault" for row in taken[1])
    assert record == printed
    beams = json.loads((folder / "beams.json").read_text(encoding="ascii"))
    assert beams["state"] == "as drawn"


def test_a_findings_beam_has_its_number_in_the_trace(files, capsys):
    cli.run(["check", "--json", "escapes.yaml", "--fail-on", "never"])
    (review,) = json.loads(capsys.readouterr().out)["reviews"]
    for finding in review["findings"]:
        if finding["check"] != "escape" or finding["beam"] is None:
            continue
        cli.run(["trace", "--json", "escapes.yaml", "--state", finding["worst_state"]])
        beams = json.loads(capsys.readouterr().out)["beams"]
        beam = beams[finding["beam"]]
        assert beam["power_W"] >= finding["value"] * (1.0 - 1e-9)
        assert finding["element"] in (beam["from"], None)


def test_an_entry_as_printed_accepts_its_finding(files, capsys):
    cli.run(["check", "escapes.yaml"])
    out = capsys.readouterr().out
    entries = [
        line.removeprefix("  to accept: ") for line in out.splitlines() if "to accept" in line
    ]
    assert entries
    filled = "\n".join(entries).replace("YYYY-MM-DD", "2027-06-30")
    Path("accepted.yaml").write_text(f"{ESCAPES}accept:\n{filled}\n", encoding="utf-8")
    assert cli.run(["check", "accepted.yaml", "--on", "2027-06-30", "--fail-on", "warn"]) == 0
    assert f"{len(entries)} accepted" in capsys.readouterr().out
    assert cli.run(["check", "accepted.yaml", "--on", "2027-07-01"]) == 1
    assert "accept-expired" in capsys.readouterr().out


def shuffled(text, seed):
    """Reorder every table of a layout whose order means nothing."""
    order = random.Random(seed)

    def mixed(node):
        if not isinstance(node, dict):
            return node
        names = list(node)
        order.shuffle(names)
        return {name: mixed(node[name]) for name in names}

    return yaml.safe_dump(mixed(yaml.load(text, Loader=yaml.BaseLoader)), sort_keys=False)


PLACES = {"line", "column", "sha256", "related"}


def without_places(node):
    if isinstance(node, dict):
        return {k: without_places(v) for k, v in node.items() if k not in PLACES}
    return [without_places(v) for v in node] if isinstance(node, list) else node


@pytest.mark.parametrize("seed", [1, 2])
def test_reordering_the_file_changes_no_result(files, seed, capsys):
    def results(name):
        cli.run(["check", "--json", name])
        found = without_places(json.loads(capsys.readouterr().out))
        found["reviews"][0].pop("layout")
        for finding in found["reviews"][0]["findings"]:
            finding.pop("file")
        traces = []
        for state in ("as drawn", "alignment", "warm-up"):
            cli.run(["trace", "--json", name, "--state", state])
            traces.append(json.loads(capsys.readouterr().out))
        return found, traces

    Path("mixed.yaml").write_text(shuffled(ESCAPES, seed), encoding="utf-8")
    assert results("mixed.yaml") == results("escapes.yaml")


def test_the_same_bytes_in_any_surroundings(files):
    def run(command, **surroundings):
        environment = {**os.environ, "PYTHONPATH": str(TOP), **surroundings}
        code = "from benchlay.cli import main; main()"
        done = subprocess.run(
            [sys.executable, "-c", code, *command, "escapes.yaml"],
            check=False,
            capture_output=True,
            env=environment,
        )
        assert done.stderr == b""
        return done.stdout

    def everything(out, **surroundings):
        run(["review", "-o", out], **surroundings)
        written = {path.name: path.read_bytes() for path in Path(out).iterdir()}
        return written, run(["check"], **surroundings)

    first = everything("one", PYTHONHASHSEED="1", TZ="UTC", LC_ALL="C")
    second = everything("two", PYTHONHASHSEED="77", TZ="Pacific/Auckland", LC_ALL="tr_TR.UTF-8")
    assert first == second


def test_a_plain_check_loads_no_library_that_it_does_not_need(files):
    code = (
        "import sys; from benchlay import cli\n"
        "cli.run(['check', 'clean.yaml'])\n"
        "unwanted = {'ezdxf', 'svgwrite', 'pikepdf', 'fontTools', 'json',\n"
        "            'hashlib', 'pathlib', 'shutil',\n"
        "            'numpy.ma', 'numpy.polynomial', 'scipy', 'dataclasses',\n"
        "            'benchlay.elements.cell', 'benchlay.document.describe',\n"
        "            'benchlay.exposure.trains', 'benchlay.optics.metals',\n"
        "            'benchlay.tracing.scattering'}\n"
        "print(sorted(unwanted & set(sys.modules)), file=sys.stderr)"
    )
    done = subprocess.run(
        [sys.executable, "-c", code],
        check=False,
        capture_output=True,
        text=True,
        cwd=os.getcwd(),
        env={**os.environ, "PYTHONPATH": str(TOP)},
    )
    assert done.stderr == "[]\n"
