"""What the README shows is what happens."""

import json
import re
import sys
from pathlib import Path

import pytest

import benchlay
from benchlay import cli
from benchlay.elements import KINDS
from benchlay.layout.header import Header

sys.path.insert(0, str(Path(__file__).parent / "hazards"))
from judged import BOX, reviewed

TOP = Path(benchlay.__file__).parent.parent
README = (TOP / "README.md").read_text(encoding="utf-8")
BLOCK = re.compile(r"^(?:<!-- (.+?) -->\n)?```(\w+)\n(.*?)^```$", re.M | re.S)
BLOCKS = [match.groups() for match in BLOCK.finditer(README)]


def marked(kind):
    """Find the blocks whose comment begins with these words, by what follows in it."""
    found = {}
    for mark, _, text in BLOCKS:
        if mark and mark.startswith(kind + ": "):
            found[mark.removeprefix(kind + ": ")] = text
    return found


LAYOUTS = marked("run")
OUTPUTS = marked("output of")


@pytest.fixture(scope="module")
def reviewed_box():
    holes = "holes: {pitch: 25, first: [25, 25]}"
    # The shutter may stick while the panel is open: light gets out, and that makes a sheet.
    loading = "  loading: {enclosure.panels.east.open: yes}\nroutes: {light: [green, S1]}\n"
    return reviewed(BOX.replace("medium: vacuum", holes) + loading)


def test_every_layout_and_output_is_marked_to_be_run():
    assert all(mark for mark, language, _ in BLOCKS if language in {"yaml", "text", "sh"})
    assert set(OUTPUTS) <= set(LAYOUTS)
    assert LAYOUTS


def test_the_two_commands_for_ci_are_there():
    commands = marked("ci")
    assert "benchlay review layouts/" in commands["review"]
    assert "pytest" in commands["tests"]
    assert all(text.startswith("python3 -m venv") for text in commands.values())


@pytest.mark.parametrize("name", sorted(LAYOUTS))
def test_a_layout_is_read_and_says_what_is_shown(name, tmp_path, monkeypatch, capsys):
    monkeypatch.chdir(tmp_path)
    (tmp_path / name).write_text(LAYOUTS[name], encoding="utf-8")
    assert cli.run(["check", name]) in {0, 1}, capsys.readouterr()
    printed = capsys.readouterr().out.splitlines()
    shown = OUTPUTS.get(name, "").splitlines()
    missing = [line for line in shown if not any(_agrees(line, p) for p in printed)]
    assert not missing, printed


@pytest.mark.parametrize("name", sorted(marked("command")))
def test_a_command_prints_what_is_shown(name, capsys):
    (line,) = marked("command")[name].splitlines()
    program, *arguments = line.split()
    assert program == "benchlay"
    assert cli.run(arguments) == 0
    printed = capsys.readouterr().out.splitlines()
    shown = marked("prints")[name].splitlines()
    assert shown
    assert [line for line in shown if not any(_agrees(line, p) for p in printed)] == []


def _agrees(shown, printed):
    """Compare a line; an ellipsis in the README stands for anything."""
    pattern = ".*".join(re.escape(part) for part in shown.split("…"))
    return re.fullmatch(pattern, printed) is not None


def test_every_command_of_the_table_is_one(capsys):
    table = re.findall(r"^\| `benchlay (\w+) ", README, re.M)
    assert table
    for command in table:
        with pytest.raises(SystemExit) as stop:
            cli.run([command, "--help"])
        assert stop.value.code == 0
        assert command in capsys.readouterr().out


def test_each_file_of_a_review_is_told_once(reviewed_box):
    """A row names files by stem and endings: `panel-NAME.svg`, `.dxf`."""
    table = README[README.index("## What a review writes") :].split("\n\n")[1]
    told = [
        (stem, ending)
        for row in table.splitlines()[2:]
        for stem, ending in re.findall(r"`([\w-]*)(\.\w+)`", row.split(" | ")[0])
    ]
    patterns, named = [], ""
    for stem, ending in told:
        named = stem or named
        some = re.sub("NAME|ROUTE", ".+", named) + r"(-\d+)?"
        patterns.append(re.compile(some + re.escape(ending)))
    written = sorted(reviewed_box[1])
    for name in written:
        assert sum(bool(one.fullmatch(name)) for one in patterns) == 1, name
    for one in patterns:
        assert any(one.fullmatch(name) for name in written), one.pattern


def test_each_key_of_a_review_is_told(reviewed_box):
    keys = set(json.loads(reviewed_box[1]["findings.json"])["reviews"][0])
    assert {"findings", "hazards", "remedies", "matrix"} <= keys
    part = README[README.index("## Eyewear, distances") : README.index("## Benches to look at")]
    assert [key for key in sorted(keys) if f"`{key}`" not in part] == []


def test_what_is_not_yet_is_what_the_program_refuses(capsys):
    part = " ".join(README[README.index("## Not yet") :].split("\n## ")[0].split())
    later = [key.name for key in Header.KEYS.values() if key.not_yet is not None]
    pending = [name for name, kind in KINDS.items() if kind.PENDING]
    assert later
    assert pending
    for name in later:
        assert f"`{name}`" in part
    for name in pending:
        assert re.search(rf"\b{name}s?\b", part)
    for command in cli._LATER:
        assert f"`{command}`" in part
        assert cli.run([command]) == 2


def test_it_opens_with_one_paragraph_that_states_the_job():
    first = README.split("\n\n")[1]
    assert first.startswith("benchlay reviews a laser bench")
