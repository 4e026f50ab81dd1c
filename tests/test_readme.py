"""What the README shows is what happens."""

import re
from pathlib import Path

import pytest

import benchlay
from benchlay import cli

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


def test_it_opens_with_one_paragraph_that_states_the_job():
    first = README.split("\n\n")[1]
    assert first.startswith("benchlay reviews a laser bench")
