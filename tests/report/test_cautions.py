"""Every output carries its cautions, and their words stand in one place."""

import io
import json
import sys
from pathlib import Path

import ezdxf
import pypdf
import pytest

from benchlay import cli
from benchlay.exposure.cautions import CAUTIONS as OF_EXPOSURE
from benchlay.exposure.cautions import SHORT
from benchlay.report.cautions import CAUTIONS

sys.path.insert(0, str(Path(__file__).parents[1] / "hazards"))
from judged import BOX, reviewed


@pytest.fixture
def printed(tmp_path, monkeypatch, capsys):
    monkeypatch.chdir(tmp_path)
    Path("x.yaml").write_text(BOX, encoding="utf-8")

    def run(*command):
        cli.run([*command])
        return capsys.readouterr().out

    return run


@pytest.mark.parametrize("command", ["check", "trace", "review"])
def test_what_is_printed(printed, command):
    out = printed(command, "x.yaml")
    assert all(f"caution: {words}" in out for words in CAUTIONS)


@pytest.mark.parametrize("command", ["check", "trace", "review", "faults"])
def test_nothing_is_said_twice(printed, command):
    lines = [x for x in printed(command, "x.yaml").splitlines() if x.startswith("caution: ")]
    assert len(lines) == len(set(lines))
    assert sum("laser safety officer" in line for line in lines) == 1


def test_what_is_said_of_exposure(printed):
    out = printed("review", "x.yaml")
    assert all(f"caution: {words}" in out for words in OF_EXPOSURE)
    one = " ".join(printed("exposure", "--wavelength", "532", "--power", "5 mW").split())
    assert all(words in one for words in OF_EXPOSURE)


@pytest.mark.parametrize("command", ["check", "trace"])
def test_what_programs_read(printed, command):
    document = json.loads(printed(command, "--json", "x.yaml"))
    assert set(document["cautions"]) >= set(CAUTIONS)


def test_every_file_of_a_review():
    _, files = reviewed(BOX)
    for name, data in files.items():
        if name.endswith(".json"):
            assert set(json.loads(data)["cautions"]) >= set(CAUTIONS), name
        elif name.endswith(".svg"):
            words = " ".join(data.decode().split())
            assert "A calculation aid, not an approval" in words, name
        elif name.endswith(".dxf") and not name.startswith("cut-"):
            document = ezdxf.read(io.StringIO(data.decode()))
            words = " ".join(e.dxf.text for e in document.modelspace() if e.dxftype() == "TEXT")
            assert "A calculation aid, not an approval" in words, name


def test_every_page_of_the_set():
    _, files = reviewed(BOX)
    for page in pypdf.PdfReader(io.BytesIO(files["sheets.pdf"])).pages:
        assert "A calculation aid, not an approval" in " ".join(page.extract_text().split())


def test_the_short_form_says_who_decides():
    assert "laser safety officer" in SHORT
    assert "standard in force" in SHORT
