"""The rooms of the house are all under the contracts of import, and the papers agree."""

import importlib
import re
import sys
import tomllib
from pathlib import Path

import pytest

import benchlay

TOP = Path(benchlay.__file__).parent.parent
PACKAGE = TOP / "benchlay"
PROJECT = tomllib.loads((TOP / "pyproject.toml").read_text(encoding="utf-8"))
CONTRACTS = {c["name"]: c for c in PROJECT["tool"]["importlinter"]["contracts"]}
LAYERS = [
    re.findall(r"benchlay\.(\w+)", layer)
    for layer in CONTRACTS["one way through the house"]["layers"]
]


def rooms():
    packages = {p.parent.name for p in PACKAGE.glob("*/__init__.py")}
    modules = {p.stem for p in PACKAGE.glob("*.py")} - {"__init__"}
    return packages | modules


def below(room):
    (level,) = (n for n, layer in enumerate(LAYERS) if room in layer)
    lower = {name for layer in LAYERS[level + 1 :] for name in layer} & rooms()
    return lower - {"named"}  # the base of values, free to all


def forbidden(name):
    listed = CONTRACTS[name]["forbidden_modules"]
    return {module.removeprefix("benchlay.") for module in listed}


def test_every_room_has_its_layer():
    assert rooms() <= {name for layer in LAYERS for name in layer}


def test_every_folder_with_code_is_a_package():
    """A folder without `__init__.py` would escape the contracts unseen."""
    folders = {p.parent for p in PACKAGE.rglob("*.py")}
    assert [f for f in sorted(folders) if not (f / "__init__.py").exists()] == []


@pytest.mark.parametrize(
    ("room", "contract", "free"),
    [
        ("writers", "writers see a sheet's primitives, never what was drawn", {"geometry"}),
        ("exposure", "exposure limits are numbers: they know optics only", {"optics", "geometry"}),
        ("optics", "optics knows arrays and geometry, and nothing of layouts", {"geometry"}),
        ("findings", "a finding knows its place in the document and nothing else", {"document"}),
    ],
)
def test_a_closed_room_is_closed_to_all_below_it(room, contract, free):
    closed = {name.removesuffix(".*") for name in forbidden(contract)}
    assert below(room) - free <= closed


def test_the_developers_page_names_every_room():
    page = (TOP / "DEVELOPERS.md").read_text(encoding="utf-8")
    rows = "\n".join(line for line in page.splitlines() if line.startswith("| `"))
    unnamed = {r for r in rooms() if not re.search(rf"`{r}(/|\.py)`", rows)}
    assert unnamed == {"__main__"}


def test_the_version_is_in_the_changelog():
    text = (TOP / "CHANGELOG.md").read_text(encoding="utf-8")
    assert f"\n## {benchlay.__version__}" in text


def test_importing_the_package_loads_nothing_of_it():
    before = set(sys.modules)
    kept = {n: sys.modules.pop(n) for n in before if n == "benchlay"}
    try:
        fresh = importlib.import_module("benchlay")
        assert set(fresh.__dir__()) >= {"read", "place", "trace", "check", "draw"}
        assert set(sys.modules) <= before
    finally:
        sys.modules.update(kept)


def test_an_unknown_public_name_is_refused():
    with pytest.raises(AttributeError, match="has no attribute 'tune'"):
        _ = benchlay.tune
