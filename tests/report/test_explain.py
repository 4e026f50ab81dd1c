import json

import pytest
from jsonschema import Draft202012Validator

from benchlay import cli
from benchlay.checks import CHECKS
from benchlay.elements import KINDS
from benchlay.layout.schema import schema


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


def test_without_a_name_all_are_listed(capsys):
    assert cli.run(["explain"]) == 0
    listed = capsys.readouterr().out
    for name in (*(check.NAME for check in CHECKS), *KINDS):
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
