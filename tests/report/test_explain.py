import json

import pytest
from jsonschema import Draft202012Validator

from benchlay import cli
from benchlay.checks import CHECKS
from benchlay.elements import KINDS
from benchlay.layout.reference import SECTIONS
from benchlay.layout.schema import schema
from benchlay.layout.states import ROOTS


@pytest.mark.parametrize("name", [check.NAME for check in CHECKS])
def test_every_check_is_explained_with_its_limits_and_source(name, capsys):
    assert cli.run(["explain", name]) == 0
    page = capsys.readouterr().out
    assert page.startswith(f"check {name}\n")
    for heading in ("Why it matters", "Fails", "Passes", "What it does not see", "Source"):
        assert f"\n{heading}\n" in page
    assert "::" not in page
    assert "``" not in page


@pytest.mark.parametrize("name", list(KINDS))
def test_every_kind_is_explained_with_all_its_keys(name, capsys):
    assert cli.run(["explain", name]) == 0
    page = capsys.readouterr().out
    assert page.startswith(f"kind {name}\n")
    for key in KINDS[name].KEYS.values():
        assert f"\n  {key.name} (default " in page
    assert ".. code-block" not in page


@pytest.mark.parametrize(("path", "cls"), SECTIONS, ids=[path for path, _ in SECTIONS])
def test_every_part_of_a_layout_is_explained_with_all_its_keys(path, cls, capsys):
    word = path.partition(",")[0].removeprefix("a ").replace("[]", "").removesuffix(".NAME")
    assert cli.run(["explain", word.rpartition(".")[2]]) == 0
    page = capsys.readouterr().out
    assert page.startswith(f"{path}\n")
    for key in cls.KEYS.values():
        assert f"\n  {key.name} (default " in page
    assert "``" not in page
    assert "|---" not in page


def test_a_part_is_explained_with_what_is_below_it(capsys):
    assert cli.run(["explain", "enclosure"]) == 0
    page = capsys.readouterr().out
    for path in ("enclosure", "enclosure.panels.NAME", "enclosure.lids.NAME"):
        assert f"{path}\n\n" in page
    assert "limits.faults" not in page


def test_the_example_of_states_sets_what_a_state_may_set(capsys):
    assert cli.run(["explain", "states"]) == 0
    page = capsys.readouterr().out
    example = page[page.index("states:\n") : page.index("\n\nA state may")]
    paths = [line.partition(":")[0].strip() for line in example.splitlines()[2:]]
    assert {path.partition(".")[0] for path in paths} == set(ROOTS)


def test_without_a_name_all_are_listed(capsys):
    assert cli.run(["explain"]) == 0
    listed = capsys.readouterr().out
    for name in (*(check.NAME for check in CHECKS), *KINDS, "enclosure", "states", "mount"):
        assert f"\n  {name} " in listed


def test_an_unknown_name_gets_the_nearest(capsys):
    assert cli.run(["explain", "stray-unstoped"]) == 2
    captured = capsys.readouterr()
    assert captured.out == ""
    assert "'stray-unstopped'" in captured.err
    assert cli.run(["explain", "\u2603"]) == 2


def test_the_schema_is_one_document_and_valid(capsys):
    assert cli.run(["schema"]) == 0
    written = json.loads(capsys.readouterr().out)
    Draft202012Validator.check_schema(written)
    assert written == json.loads(json.dumps(schema()))
