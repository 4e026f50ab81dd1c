"""The committed exports are what a review of the committed layouts writes today.

Findings and beams are compared number by number, drawings line by line: between two machines
the last digits of a number may differ, and nothing else may.
"""

import io
import json
import math
import re
from datetime import date
from functools import cache
from pathlib import Path

import pikepdf
import pytest

from benchlay import pipeline

ROOT = Path(__file__).parents[1]
BENCHES = sorted(path.stem for path in (ROOT / "layouts").glob("*.yaml"))
NUMBER = re.compile(r"[-+]?(?:\d+\.\d*|\.\d+|\d+)(?:[eE][-+]?\d+)?")
# Drawings carry three decimals of a millimetre; the last of them may be rounded otherwise.
DRAWN_MM = 2e-3
MOST_BYTES = 6_000_000


def committed(bench):
    return ROOT / "exports" / bench


@cache
def made(bench):
    """Review a layout as the command does, on the day its exports were made."""
    kept = json.loads((committed(bench) / "findings.json").read_text(encoding="utf-8"))
    as_of = kept["reviews"][0]["as_of"]
    layout = f"layouts/{bench}.yaml"
    reviewed = pipeline.review_files(
        (ROOT / layout).read_bytes(),
        layout,
        on=date.fromisoformat(as_of) if as_of else date(2000, 1, 1),
        state=None,
    )
    assert isinstance(reviewed, tuple), reviewed
    return reviewed[1]


def differences(kept, new, where="$"):
    """Tell where two documents differ; numbers as near as 1e-9 are the same."""
    if isinstance(kept, dict) and isinstance(new, dict):
        for key in sorted({*kept, *new}):
            if key not in kept or key not in new:
                yield f"{where}.{key} is in one of them only"
            else:
                yield from differences(kept[key], new[key], f"{where}.{key}")
    elif isinstance(kept, list) and isinstance(new, list):
        if len(kept) != len(new):
            yield f"{where} has {len(kept)} entries, now {len(new)}"
        for number, pair in enumerate(zip(kept, new, strict=False)):
            yield from differences(*pair, f"{where}[{number}]")
    elif not same(kept, new):
        yield f"{where} is {kept!r}, now {new!r}"


def same(kept, new):
    if type(kept) is float or type(new) is float:
        if None in (kept, new) or isinstance(kept, str) or isinstance(new, str):
            return False
        return math.isclose(kept, new, rel_tol=1e-9, abs_tol=1e-12)
    return type(kept) is type(new) and kept == new


def own_part(name, text):
    """What benchlay has drawn in a file; the rest of a DXF goes by the library's version."""
    if not name.endswith(".dxf"):
        return text
    _, tables, rest = text.partition("\n  2\nTABLES\n")
    drawn, objects, _ = rest.partition("\n  2\nOBJECTS\n")
    assert tables
    assert objects
    return drawn


def drawing_differences(kept, new):
    """Tell in which lines two drawings differ by more than the rounding of a number."""
    kept, new = kept.splitlines(), new.splitlines()
    if len(kept) != len(new):
        yield f"{len(kept)} lines, now {len(new)}"
    for number, (one, other) in enumerate(zip(kept, new, strict=False), start=1):
        if one != other and not same_line(one, other):
            yield f"line {number}: {one!r}, now {other!r}"


def same_line(one, other):
    if NUMBER.split(one) != NUMBER.split(other):
        return False
    pairs = zip(NUMBER.findall(one), NUMBER.findall(other), strict=True)
    return all(
        a == b
        or ("." in a and "." in b and math.isclose(float(a), float(b), rel_tol=0, abs_tol=DRAWN_MM))
        for a, b in pairs
    )


def test_every_bench_has_its_exports_and_no_other():
    folders = sorted(path.name for path in (ROOT / "exports").iterdir() if path.is_dir())
    assert folders == BENCHES


@pytest.mark.parametrize("bench", BENCHES)
def test_exports_hold_the_files_of_a_review(bench):
    kept = {path.relative_to(committed(bench)).as_posix() for path in committed(bench).rglob("*")}
    assert kept == set(made(bench))


@pytest.mark.parametrize("bench", BENCHES)
def test_a_review_stays_small_enough_to_be_kept(bench):
    # A change to a layout is read as a difference of these files.
    assert sum(map(len, made(bench).values())) < MOST_BYTES


@pytest.mark.parametrize("bench", BENCHES)
def test_the_verdict_is_that_of_the_comment_at_the_top(bench):
    text = " ".join((ROOT / f"layouts/{bench}.yaml").read_text(encoding="utf-8").split())
    verdict = json.loads(made(bench)["findings.json"])["reviews"][0]["verdict"]
    if "nothing that fails" in text:
        assert verdict in ("none", "note")
    else:
        assert "everything wrong" in text
        assert verdict == "fail"


@pytest.mark.parametrize("bench", BENCHES)
@pytest.mark.parametrize("ending", ["json", "svg", "dxf"])
def test_exports_are_current(bench, ending):
    names = sorted(name for name in made(bench) if name.endswith("." + ending))
    assert names
    for name in names:
        kept = (committed(bench) / name).read_text(encoding="utf-8")
        new = made(bench)[name].decode("utf-8")
        if ending == "json":
            found = list(differences(json.loads(kept), json.loads(new)))
        else:
            found = list(drawing_differences(own_part(name, kept), own_part(name, new)))
        assert not found, "\n".join([f"{name}: run `benchlay review` again", *found[:5]])


@pytest.mark.parametrize("bench", BENCHES)
def test_exports_of_other_kinds_are_current_to_the_byte(bench):
    for name, new in made(bench).items():
        if not name.endswith((".json", ".svg", ".dxf", ".pdf")):
            assert (committed(bench) / name).read_bytes() == new, name


def test_a_difference_is_seen():
    assert list(differences({"a": [1.0, "x"]}, {"a": [1.0 + 2e-9, "x"]}))
    assert list(differences({"a": 1}, {"a": 1, "b": 2}))
    assert list(differences([0.5], [None]))
    assert not list(differences({"a": 1.0}, {"a": 1.0 + 1e-10}))
    assert list(drawing_differences("<path d='M 1.000,2'/>", "<path d='M 1.010,2'/>"))
    assert list(drawing_differences("100\nAcDbLine", "100\nAcDbLine\n0"))
    assert not list(drawing_differences("M 1.000,2.5", "M 1.001,2.5"))


def pages(data):
    """What stands on each page of a PDF; the rest of it goes by the library's version."""
    with pikepdf.open(io.BytesIO(data)) as file:
        return [page.Contents.read_bytes().decode("latin-1") for page in file.pages]


@pytest.mark.parametrize("bench", BENCHES)
def test_exported_pages_are_current(bench):
    names = sorted(name for name in made(bench) if name.endswith(".pdf"))
    assert "sheets.pdf" in names
    for name in names:
        kept, new = pages((committed(bench) / name).read_bytes()), pages(made(bench)[name])
        assert len(kept) == len(new)
        for number, pair in enumerate(zip(kept, new, strict=True), start=1):
            found = list(drawing_differences(*pair))
            assert not found, f"{name}, page {number}: {found[:3]}"
