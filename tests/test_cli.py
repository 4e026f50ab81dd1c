"""The command line: exit statuses, streams and refusals, with a pipeline put in its place."""

import io
import json
import subprocess
import sys
import types
from datetime import date

import pytest

import benchlay
from benchlay import cli
from benchlay.document.problems import Problem
from benchlay.document.span import Span
from benchlay.report.details import TraceResult
from benchlay.report.model import LayoutErrors


@pytest.fixture
def pipeline(monkeypatch, make_finding, make_review):
    """Stand in for the real stages; what a command passes on is kept in `asked`."""
    module = types.ModuleType("benchlay.pipeline")
    module.asked = []

    def answer(data, file, **options):
        module.asked.append((data, file, options))
        if b"broken" in data:
            problem = Problem(Span(file, 1, 1), "'broken' is no key", "a key", "write one")
            return LayoutErrors(file, (problem,), ("broken: yes",))
        words = data.decode().split()
        found = [make_finding(word) for word in words if word != "clean"]
        return make_review(file, found)

    def files(data, file, **options):
        result = answer(data, file, **options)
        if isinstance(result, LayoutErrors):
            return result
        record = {"benchlay": "0", "reviews": [{"layout": file}]}
        return result, {"findings.json": json.dumps(record).encode(), "plan.svg": b"<svg/>"}

    def trace_result(data, file, **options):
        result = answer(data, file, **options)
        if isinstance(result, LayoutErrors):
            return result
        return TraceResult(file, options["state"] or "as drawn", (), {}, ())

    module.review = answer
    module.review_files = files
    module.trace_result = trace_result
    module.draw_files = lambda data, file, **_: {"plan.dxf": data}
    monkeypatch.setitem(sys.modules, "benchlay.pipeline", module)
    monkeypatch.setattr(benchlay, "pipeline", module, raising=False)
    return module


@pytest.fixture
def layout(tmp_path, monkeypatch):
    monkeypatch.chdir(tmp_path)

    def write(name, text):
        (tmp_path / name).write_text(text, encoding="utf-8")
        return name

    return write


@pytest.mark.parametrize(
    ("text", "fail_on", "status"),
    [
        ("clean", "fail", 0),
        ("note", "warn", 0),
        ("warn", "fail", 0),
        ("warn", "warn", 1),
        ("fail", "fail", 1),
        ("fail", "never", 0),
        ("broken", "never", 2),
    ],
)
def test_exit_status_follows_fail_on(pipeline, layout, text, fail_on, status):
    assert cli.run(["check", layout("x.yaml", text), "--fail-on", fail_on]) == status


def test_the_highest_status_of_several_layouts_counts(pipeline, layout, capsys):
    names = [layout("a.yaml", "fail"), layout("b.yaml", "broken"), layout("c.yaml", "clean")]
    assert cli.run(["check", *names, "--json"]) == 2
    reviews = json.loads(capsys.readouterr().out)["reviews"]
    assert [r["layout"] for r in reviews] == names
    assert [("errors" in r) for r in reviews] == [False, True, False]


def test_a_missing_file_is_an_error_in_its_place(pipeline, layout, capsys):
    layout("bench.yaml", "clean")
    assert cli.run(["check", "bensh.yaml", "--json"]) == 2
    (error,) = json.loads(capsys.readouterr().out)["reviews"][0]["errors"]
    assert error["file"] == "bensh.yaml"
    assert error["message"] == "the layout cannot be read: no such file or directory"
    assert "bench.yaml" in error["remedy"]


def test_standard_input(pipeline, monkeypatch, capsys):
    monkeypatch.setattr(sys, "stdin", io.TextIOWrapper(io.BytesIO(b"warn")))
    assert cli.run(["check", "-"]) == 0
    assert pipeline.asked[0][:2] == (b"warn", "-")
    assert "-: verdict warn" in capsys.readouterr().out


def test_the_day_is_the_given_one_else_today(pipeline, layout):
    name = layout("x.yaml", "clean")
    before = date.today()
    cli.run(["check", name, "--on", "2027-06-30"])
    cli.run(["check", name])
    given, default = (options["on"] for _, _, options in pipeline.asked)
    assert given == date(2027, 6, 30)
    assert before <= default <= date.today()


@pytest.mark.parametrize(
    "arguments",
    [
        ["check"],
        ["check", "x.yaml", "--on", "tomorrow"],
        ["check", "x.yaml", "--fail-on", "always"],
        ["nonsense"],
    ],
)
def test_a_wrong_command_line_exits_2_and_prints_no_result(arguments, capsys):
    with pytest.raises(SystemExit) as stop:
        cli.run(arguments)
    assert stop.value.code == 2
    captured = capsys.readouterr()
    assert captured.out == ""
    assert captured.err


@pytest.mark.parametrize("command", ["compare", "watch", "new"])
def test_what_comes_later_says_so(command, capsys):
    assert cli.run([command, "--anything", "x"]) == 2
    captured = capsys.readouterr()
    assert captured.out == ""
    assert captured.err.startswith(f"benchlay: {command}: not yet")


def test_a_crash_is_one_line_and_status_3(pipeline, layout, monkeypatch, capsys):
    def crash(*_, **__):
        msg = "deep\ninside"
        raise RuntimeError(msg)

    pipeline.review = crash
    monkeypatch.delenv("BENCHLAY_DEBUG", raising=False)
    assert cli.run(["check", layout("x.yaml", "clean")]) == 3
    captured = capsys.readouterr()
    assert captured.out == ""
    assert captured.err.count("\n") == 1
    assert "RuntimeError: deep inside" in captured.err
    monkeypatch.setenv("BENCHLAY_DEBUG", "1")
    with pytest.raises(RuntimeError):
        cli.run(["check", "x.yaml"])


def test_review_writes_a_folder_a_layout(pipeline, layout, tmp_path):
    names = [layout("a.yaml", "clean"), layout("b.yaml", "fail")]
    assert cli.run(["review", *names]) == 1
    for stem in ("a", "b"):
        folder = tmp_path / "exports" / stem
        assert sorted(p.name for p in folder.iterdir()) == ["findings.json", "plan.svg"]


def test_review_into_a_named_folder(pipeline, layout, tmp_path):
    assert cli.run(["review", layout("a.yaml", "clean"), "-o", "here"]) == 0
    assert (tmp_path / "here" / "plan.svg").read_bytes() == b"<svg/>"
    assert cli.run(["review", "a.yaml", layout("b.yaml", "clean"), "-o", "two"]) == 0
    assert (tmp_path / "two" / "b" / "plan.svg").exists()


def test_a_broken_layout_writes_nothing(pipeline, layout, tmp_path, capsys):
    assert cli.run(["review", layout("a.yaml", "broken")]) == 2
    assert not (tmp_path / "exports").exists()
    captured = capsys.readouterr()
    assert captured.out == ""
    assert "a.yaml:1:1: error: 'broken' is no key" in captured.err


def test_review_again_replaces_its_own_review(pipeline, layout):
    name = layout("a.yaml", "clean")
    assert [cli.run(["review", name]), cli.run(["review", name])] == [0, 0]


def test_review_spares_a_folder_of_other_things(pipeline, layout, tmp_path, capsys):
    (tmp_path / "thesis").mkdir()
    (tmp_path / "thesis" / "plan.svg").write_bytes(b"drawn by hand")
    name = layout("a.yaml", "clean")
    assert cli.run(["review", name, "-o", "thesis"]) == 2
    assert (tmp_path / "thesis" / "plan.svg").read_bytes() == b"drawn by hand"
    assert "--force" in capsys.readouterr().err
    assert cli.run(["review", name, "-o", "thesis", "--force"]) == 0
    assert (tmp_path / "thesis" / "plan.svg").read_bytes() == b"<svg/>"


@pytest.mark.parametrize("command", ["review", "draw"])
def test_a_folder_that_cannot_be_written_is_a_wrong_command_line(
    pipeline, layout, tmp_path, capsys, command
):
    (tmp_path / "taken").write_bytes(b"a file")
    assert cli.run([command, layout("a.yaml", "clean"), "-o", "taken/here"]) == 2
    captured = capsys.readouterr()
    assert captured.out == ""
    assert "taken/here cannot be written: not a directory" in captured.err
    assert "\n  to mend: choose another folder" in captured.err


def test_a_review_names_what_an_earlier_one_left(pipeline, layout, tmp_path, capsys):
    name = layout("a.yaml", "clean")
    assert cli.run(["review", name]) == 0
    assert capsys.readouterr().err == ""
    (tmp_path / "exports" / "a" / "cut-old.dxf").write_bytes(b"an old panel")
    assert cli.run(["review", name]) == 0
    assert "cut-old.dxf" in capsys.readouterr().err
    assert (tmp_path / "exports" / "a" / "cut-old.dxf").exists()


def test_two_layouts_may_not_share_a_folder(pipeline, layout, tmp_path, capsys):
    (tmp_path / "sub").mkdir()
    names = [layout("a.yaml", "clean"), layout("sub/a.yaml", "clean")]
    assert cli.run(["review", *names]) == 2
    assert "would be written into" in capsys.readouterr().err
    assert not (tmp_path / "exports").exists()


def test_trace_json_is_one_document(pipeline, layout, capsys):
    assert cli.run(["trace", layout("a.yaml", "clean"), "--json", "--state", "alignment"]) == 0
    document = json.loads(capsys.readouterr().out)
    assert document.pop("cautions")
    assert document == {"state": "alignment", "beams": [], "placed": {}, "ledger": []}


def test_draw_writes_what_was_asked_for(pipeline, layout, tmp_path, capsys):
    assert cli.run(["draw", layout("a.yaml", "clean"), "-o", "d", "--format", "dxf"]) == 0
    assert (tmp_path / "d" / "plan.dxf").read_bytes() == b"clean"
    assert capsys.readouterr().out.strip().endswith("plan.dxf")


class Terminal(io.StringIO):
    encoding = "utf-8"

    def isatty(self):
        return True


@pytest.mark.parametrize(("no_color", "coloured"), [("", True), ("1", False)])
def test_colour_only_on_a_terminal_that_wants_it(pipeline, layout, monkeypatch, no_color, coloured):
    monkeypatch.setenv("NO_COLOR", no_color)
    monkeypatch.setenv("TERM", "xterm")
    screen = Terminal()
    monkeypatch.setattr(sys, "stdout", screen)
    cli.run(["check", layout("a.yaml", "fail")])
    assert ("\x1b[" in screen.getvalue()) is coloured


def test_no_colour_into_a_file(pipeline, layout, monkeypatch, capsys):
    monkeypatch.delenv("NO_COLOR", raising=False)
    cli.run(["check", layout("a.yaml", "fail")])
    assert "\x1b" not in capsys.readouterr().out


def test_the_help_is_answered_without_numpy():
    code = (
        "import sys; from benchlay import cli\n"
        "try: cli.run(['--help'])\n"
        "except SystemExit: pass\n"
        "assert not {'numpy', 'yaml', 'shapely', 'ezdxf'} & set(sys.modules)"
    )
    ran = subprocess.run([sys.executable, "-c", code], check=False, capture_output=True)
    assert ran.returncode == 0, ran.stderr.decode()


def test_a_reader_that_leaves_early_is_no_failure():
    code = (
        "import sys, types; import benchlay; from benchlay import cli\n"
        "sys.modules['benchlay.pipeline'] = benchlay.pipeline = types.ModuleType('p')\n"
        "cli.main()"
    )
    missing = [f"missing-{n}.yaml" for n in range(2000)]  # far more than a pipe holds
    with subprocess.Popen(
        [sys.executable, "-c", code, "check", *missing],
        stdout=subprocess.PIPE,
        stderr=subprocess.PIPE,
    ) as process:
        process.stdout.read(1)
        process.stdout.close()
        err = process.stderr.read()
    assert (process.returncode, err) == (2, b"")
